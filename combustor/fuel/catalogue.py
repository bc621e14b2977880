"""From a name, a blend or an analysis to a `Fuel`."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from difflib import get_close_matches

from combustor.base.errors import InputError, Problem
from combustor.fuel import blend, choose_mechanism
from combustor.fuel.certificate import Certificate, mixed
from combustor.fuel.certificate import checked as certificate_checked
from combustor.fuel.choose_mechanism import Mechanism
from combustor.fuel.composition import checked, stoichiometric_fuel_air_ratio
from combustor.fuel.entries import Entry, entries, plain
from combustor.fuel.gas import Gas
from combustor.fuel.heating_value import mixture_heat, mixture_oxygen
from combustor.fuel.heavier import lumps_of
from combustor.fuel.liquids import liquid_of, lump_of
from combustor.fuel.lumped import Lump, mechanism_with, parted
from combustor.fuel.mechanism import locate
from combustor.fuel.record import Fuel, Liquid
from combustor.fuel.suitable import NO_NITROGEN, check_suitable

LEFT_OVER_AMMONIA = (
    "NOx comes from the ammonia left over and can reach percent; check unburnt ammonia and N2O"
)


def names() -> tuple[str, ...]:
    """Return the names of all catalogue fuels."""
    return tuple(entry.name for entry in entries())


def entry(name: str) -> Entry:
    """Return the catalogue's data on one named fuel (no blends).

    Raises
    ------
    InputError
        No such fuel; names the nearest spelling.
    """
    wanted = plain(name)
    known = {alias: row for row in entries() for alias in (row.name, *row.synonyms)}
    if wanted in known:
        return known[wanted]
    degree = re.fullmatch(r"cracked-ammonia-(\d+(?:\.\d+)?)", wanted)
    if degree and float(degree[1]) <= 100.0:
        return _cracked_ammonia(known["cracked-ammonia"], float(degree[1]) / 100.0)
    nearest = get_close_matches(wanted, known, n=1, cutoff=0.5)
    raise InputError(
        Problem(
            "no such fuel",
            key="fuel",
            value=name,
            allowed=f"known are {', '.join(names())}, blends of them such as "
            '"natural-gas+30%hydrogen", or a composition in mole fractions',
            nearest=nearest[0] if nearest else None,
        )
    )


def _cracked_ammonia(whole: Entry, degree: float) -> Entry:
    """Return ammonia of which a share has been cracked: 1 mol becomes 1 + degree mol."""
    moles = {"NH3": 1.0 - degree, "H2": 1.5 * degree, "N2": 0.5 * degree}
    composition = {name: n / (1.0 + degree) for name, n in moles.items() if n > 0.0}
    name = f"{whole.name}-{100.0 * degree:g}"
    cautions = () if degree == 1.0 else (LEFT_OVER_AMMONIA,)
    return replace(whole, name=name, composition=composition, cautions=cautions, synonyms=())


def certificate_of(row: Entry) -> Certificate:
    """Return the certificate of a catalogue entry that has one."""
    assert row.certificate is not None
    return Certificate(**row.certificate)


def composition_of(name: str) -> dict[str, float]:
    """Return the mole fractions of a named fuel or blend.

    Raises
    ------
    InputError
        Unknown name, or a blend that cannot be read.
    """
    return blend.mixed(blend.parts(name), lambda part: entry(part).composition)


def find(name: str, mechanism: str | None = None) -> Fuel:
    """Return a fuel by catalogue name or blend, e.g. ``"natural-gas+30%hydrogen"``.

    Parameters
    ----------
    name : str
        Shares are by volume, each of the part after it; liquids blend with liquids, by the
        volume of the liquid.
    mechanism : str, optional
        A mechanism file to use in place of the tool's choice.

    Raises
    ------
    InputError
        Unknown name (with the nearest spelling), unreadable blend, or a mixture that nothing
        burns.
    """
    return _assemble(_named(name), _chemistry_of([_named(name)], mechanism))


def together(names: Sequence[str]) -> tuple[Fuel, ...]:
    """Return several fuels on one mechanism that burns them all, for a comparison.

    Raises
    ------
    InputError
        As `find`; no mechanism burns them all.
    """
    stated = [_named(name) for name in names]
    chemistry = _chemistry_of(stated, None)
    return tuple(_assemble(each, chemistry) for each in stated)


def from_composition(
    composition: Mapping[str, float],
    mechanism: str | None = None,
    name: str = "stated composition",
) -> Fuel:
    """Return a fuel given by its mole fractions.

    Parameters
    ----------
    composition : mapping of str to float
        Mole fractions by species of the mechanism, any letter case; sum 1.
    mechanism : str, optional
        A mechanism file to use in place of the tool's choice.
    name : str
        What to call it in tables.

    Raises
    ------
    InputError
        Not fractions, sum not 1, species that nothing burns, or nothing to burn.
    """
    fractions, said = checked(composition)
    stated = _Stated(name, fractions, said, "as stated in the case")
    return _assemble(stated, _chemistry_of([stated], mechanism))


def from_certificate(
    certificate: Certificate,
    mechanism: str | None = None,
    name: str = "stated certificate",
    source: str = "as stated in the case",
) -> Fuel:
    """Return a liquid fuel given by its certificate.

    Raises
    ------
    InputError
        A certificate no fuel can have; a mechanism of the user's own, which cannot hold the
        lumped species.
    """
    stated = _certified(name, certificate, (), source)
    return _assemble(stated, _chemistry_of([stated], mechanism))


@dataclass(frozen=True)
class _Stated:
    """A fuel before its mechanism is known."""

    name: str
    composition: Mapping[str, float]
    cautions: tuple[str, ...]
    source: str
    lumps: tuple[Lump, ...] = ()
    liquid: Liquid | None = None
    heat: float | None = None  # lower, J/kg, where a certificate states it


@dataclass(frozen=True)
class _Chemistry:
    """A mechanism, loaded, and what is to be said of it with each fuel."""

    gas: Gas
    mechanism: str
    note: str
    known: Mechanism | None

    def cautions_for(self, composition: Mapping[str, float]) -> tuple[str, ...]:
        if self.known is None:
            return () if self.gas.has("NO") else (NO_NITROGEN,)
        return self.known.cautions_for(composition)


def _named(name: str) -> _Stated:
    shared = [(part.share, entry(part.name)) for part in blend.parts(name) if part.share > 0.0]
    rows = [row for _, row in shared]
    cautions = tuple(caution for row in rows for caution in row.cautions)
    source = "; ".join(f"{row.name}: {row.source} ({row.reading})" for row in rows)
    tidy = blend.tidied(name)
    if all(row.certificate is not None for row in rows):
        certificates = {certificate_of(row): share for share, row in shared}
        one = next(iter(certificates)) if len(certificates) == 1 else mixed(certificates)
        return _certified(tidy, one, cautions, source)
    liquids = [row.name for row in rows if row.certificate is not None or row.liquid is not None]
    if liquids and len(rows) > 1:
        raise InputError(
            Problem(
                f"{', '.join(liquids)} cannot stand in this blend",
                key="fuel",
                value=name,
                allowed="liquid fuels by certificate blend with each other by volume of the "
                "liquid, gases with gases by volume of the gas; state anything else by its mole "
                "fractions as vapour",
            )
        )
    liquid = Liquid(**rows[0].liquid) if rows[0].liquid is not None else None
    fractions, said = checked(composition_of(name))
    return _Stated(tidy, fractions, (*cautions, *said), source, liquid=liquid)


def _certified(
    name: str, certificate: Certificate, cautions: tuple[str, ...], source: str
) -> _Stated:
    lump = lump_of(name, certificate_checked(certificate))
    return _Stated(
        name=name,
        composition={lump.name: 1.0},
        cautions=(*cautions, *certificate.remarks()),
        source=source,
        lumps=(lump,),
        liquid=liquid_of(certificate),
        heat=certificate.net_heating_value,
    )


def _chemistry_of(stated: Sequence[_Stated], mechanism: str | None) -> _Chemistry:
    if mechanism is not None:
        path = locate(parted(mechanism)[0])
        known = choose_mechanism.known_as(path)
        added = tuple(lump for each in stated for lump in each.lumps)
        if added and (known is None or not known.adds):
            raise InputError(
                Problem(
                    "a mechanism of your own cannot burn a fuel given by certificate",
                    key="mechanism",
                    value=str(path),
                    allowed="leave the mechanism out, or give the fuel as a species of yours: "
                    "composition = { NAME = 1.0 }",
                )
            )
    else:
        added = tuple(lump for each in stated for lump in each.lumps)
        gases = [each.composition for each in stated if not each.lumps]
        known = choose_mechanism.choose(gases, adding=bool(added))
        path = known.path
    if known is not None and known.adds:
        added += tuple(lump for each in stated for lump in lumps_of(each.composition))
        text = mechanism_with(added, path)
    else:
        text = str(path)
    gas = Gas.load(text)
    if known is None:
        check_suitable(gas)
        note = f"{path.name}: a file of your own, its validity is yours to judge"
    else:
        note = f"{known.name}: {known.note}"
    return _Chemistry(gas, text, note, known)


def _assemble(stated: _Stated, chemistry: _Chemistry) -> Fuel:
    gas, name = chemistry.gas, stated.name
    fractions = _as_in(gas, stated.composition)
    known = {} if stated.lumps else stated.composition
    warned = chemistry.cautions_for(known)
    atoms, oxygen = mixture_oxygen(gas, fractions)
    if "S" in atoms:
        raise InputError(
            Problem(
                "a fuel species holds sulfur, whose heat and SO2 are not worked out for gases here",
                key="composition",
                allowed="leave traces of sulfur out of the composition",
            )
        )
    heat = mixture_heat(gas, fractions)
    if oxygen <= 0.0 or heat.lower <= 0.0:
        raise InputError(
            Problem(
                "this mixture cannot burn: it needs no oxygen",
                key="fuel",
                value=name,
                allowed="a fuel must hold something combustible",
            )
        )
    if fractions.get("O2", 0.0) > 0.0:
        warned += ("the fuel carries oxygen of its own: check that it cannot ignite in the pipe",)
    masses = dict(zip(gas.species_names, gas.molar_masses.tolist(), strict=True))
    mass = sum(share * masses[species] for species, share in fractions.items())
    element_mass = _element_masses(gas, atoms)
    hydrogen, carbon = element_mass.get("H", 0.0), element_mass.get("C", 0.0)
    latent = 0.0 if stated.liquid is None else stated.liquid.latent_heat
    lower = heat.lower / mass - latent if stated.heat is None else stated.heat
    basis = heat.basis if latent == 0.0 else f"{heat.basis}, less the latent heat"
    return Fuel(
        name=name,
        composition=fractions,
        molar_mass=mass,
        lower_heating_value=lower,
        higher_heating_value=lower + (heat.higher - heat.lower) / mass,
        heating_value_basis=basis if stated.heat is None else "the certificate",
        mechanism_lower_heating_value=gas.lower_heating_value(gas.from_mole_fractions(fractions))
        - latent,
        stoichiometric_fuel_air_ratio=stoichiometric_fuel_air_ratio(mass, oxygen),
        stoichiometric_oxygen=oxygen,
        atoms=atoms,
        hydrogen_mass_fraction=hydrogen / mass,
        carbon_hydrogen_mass_ratio=carbon / hydrogen if hydrogen > 0.0 else None,
        mechanism=chemistry.mechanism,
        mechanism_note=chemistry.note,
        cautions=tuple(dict.fromkeys((*stated.cautions, *warned))),
        source=stated.source,
        phase="gas" if stated.liquid is None else "liquid",
        liquid=stated.liquid,
    )


def _as_in(gas: Gas, fractions: Mapping[str, float]) -> dict[str, float]:
    missing = sorted(species for species in fractions if not gas.has(species))
    if missing:
        raise InputError(
            Problem(
                f"the mechanism does not hold {', '.join(missing)}",
                key="composition",
                value=gas.mechanism,
                allowed="name a mechanism that holds every species of the fuel",
            )
        )
    named: dict[str, float] = {}
    for species, share in fractions.items():
        spelled = gas.species_names[gas.index(species)]
        named[spelled] = named.get(spelled, 0.0) + share
    return named


def _element_masses(gas: Gas, atoms: Mapping[str, float]) -> dict[str, float]:
    weights = {
        element.capitalize(): gas.solution.atomic_weight(element) * 1e-3
        for element in gas.element_names
    }
    return {element: count * weights[element] for element, count in atoms.items()}
