"""From a name, a blend or an analysis to a `Fuel`."""

from __future__ import annotations

from collections.abc import Mapping
from difflib import get_close_matches

from combustor.base.errors import InputError, Problem
from combustor.fuel import blend, choose_mechanism
from combustor.fuel.composition import checked, stoichiometric_fuel_air_ratio
from combustor.fuel.entries import Entry, entries, plain
from combustor.fuel.gas import Gas
from combustor.fuel.heating_value import mixture_heat, mixture_oxygen
from combustor.fuel.mechanism import locate
from combustor.fuel.record import Fuel


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
        Shares are by volume, each of the part after it.
    mechanism : str, optional
        A mechanism file to use in place of the tool's choice.

    Raises
    ------
    InputError
        Unknown name (with the nearest spelling), unreadable blend, or a mixture that nothing
        burns.
    """
    parts = blend.parts(name)
    rows = [entry(part.name) for part in parts if part.share > 0.0]
    return _assemble(
        name=blend.tidied(name),
        composition=composition_of(name),
        mechanism=mechanism,
        cautions=tuple(caution for row in rows for caution in row.cautions),
        source="; ".join(f"{row.name}: {row.source} ({row.reading})" for row in rows),
    )


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
    return _assemble(name, composition, mechanism, (), "as stated in the case")


def _assemble(
    name: str,
    composition: Mapping[str, float],
    mechanism: str | None,
    cautions: tuple[str, ...],
    source: str,
) -> Fuel:
    fractions, said = checked(composition)
    path, note, warned = _mechanism_for(fractions, mechanism)
    gas = Gas.load(path)
    fractions = _as_in(gas, fractions)
    if mechanism is not None and not gas.has("NO"):
        warned += ("this mechanism holds no nitrogen chemistry: its NOx is zero",)
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
    return Fuel(
        name=name,
        composition=fractions,
        molar_mass=mass,
        lower_heating_value=heat.lower / mass,
        higher_heating_value=heat.higher / mass,
        heating_value_basis=heat.basis,
        mechanism_lower_heating_value=gas.lower_heating_value(gas.from_mole_fractions(fractions)),
        stoichiometric_fuel_air_ratio=stoichiometric_fuel_air_ratio(mass, oxygen),
        stoichiometric_oxygen=oxygen,
        atoms=atoms,
        hydrogen_mass_fraction=hydrogen / mass,
        carbon_hydrogen_mass_ratio=carbon / hydrogen if hydrogen > 0.0 else None,
        mechanism=path,
        mechanism_note=note,
        cautions=tuple(dict.fromkeys((*cautions, *said, *warned))),
        source=source,
    )


def _mechanism_for(
    fractions: Mapping[str, float], mechanism: str | None
) -> tuple[str, str, tuple[str, ...]]:
    if mechanism is None:
        chosen = choose_mechanism.choose([fractions])
        return str(chosen.path), f"{chosen.name}: {chosen.note}", chosen.cautions_for(fractions)
    path = locate(mechanism)
    known = choose_mechanism.known_as(path)
    if known is None:
        return str(path), f"{path.name}: a file of your own, its validity is yours to judge", ()
    return str(path), f"{known.name}: {known.note}", known.cautions_for(fractions)


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
