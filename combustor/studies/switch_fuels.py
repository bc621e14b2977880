"""The fuels of a comparison: read from the request, put on one mechanism, their properties."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case
from combustor.fuel import blend, catalogue
from combustor.fuel.choose_mechanism import choose
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.operability.injector import modified_wobbe, weaver_factor
from combustor.sizing.fire import Supply, burn_to_equilibrium
from combustor.studies.switch_sulfur import sulfur_of

CARBON_DIOXIDE = 44.0095e-3  # kg/mol
MOST_RUNGS = 101


@dataclass(frozen=True)
class Share:
    """One named part of a fuel: its share of it by volume, mass and lower heat [-]."""

    fuel: str
    part: str
    volume: float
    mass: float
    heat: float


@dataclass(frozen=True)
class Properties:
    """One fuel as a fuel engineer compares it, SI.

    Parameters
    ----------
    fuel : Fuel
    shares : tuple of Share
    carbon_dioxide : float
        kg per J of lower heat when all carbon burns.
    modified_wobbe : float or None
        Btu/scf/degR^0.5 at the fuel's own temperature.
    weaver : float or None
        Flame-speed factor, hydrogen 100.
    stoichiometric_temperature : float
        Equilibrium at the inlet of the design point, moist air [K]
    sulfur : float or None
        Of the fuel's mass; None where nobody stated it [-]
    """

    fuel: Fuel
    shares: tuple[Share, ...]
    carbon_dioxide: float
    modified_wobbe: float | None
    weaver: float | None
    stoichiometric_temperature: float
    sulfur: float | None = None


@dataclass(frozen=True)
class Ladder:
    """Shares of one fuel added to the case's own.

    Parameters
    ----------
    added : str
    shares : tuple of float
        By volume, rising [-]
    """

    added: str
    shares: tuple[float, ...]


@dataclass(frozen=True)
class Comparison:
    """Fuels on one mechanism.

    Parameters
    ----------
    own : Fuel
        Of the case.
    fuels : tuple of Fuel
        To be burnt in its place; those that no common mechanism burns are left out.
    refused : tuple of (str, str)
        Those left out and why.
    gas : Gas
    """

    own: Fuel
    fuels: tuple[Fuel, ...]
    refused: tuple[tuple[str, str], ...]
    gas: Gas


def read_ladder(added: str, shares: str) -> Ladder:
    """Return the ladder of ``--ladder NAME --shares START:STOP:COUNT`` (volume percent).

    Raises
    ------
    InputError
        Not three numbers, outside 0 to 100 %, no rungs, an unknown fuel.
    """
    problems: list[Problem] = []
    try:
        catalogue.composition_of(added)
    except InputError as error:
        problems += error.problems
    how = "START:STOP:COUNT in volume percent, 0 to 100 and 1 rung or more, e.g. 0:100:11"
    parts = shares.split(":")
    try:
        start, stop, count = float(parts[0]), float(parts[1]), int(parts[2])
        if len(parts) != 3:
            raise ValueError
    except (ValueError, IndexError):
        raise InputError([*problems, Problem("not understood", how, "--shares", shares)]) from None
    if not 0.0 <= start <= stop <= 100.0:
        problems.append(Problem("shares outside 0 to 100 %, or falling", how, "--shares", shares))
    if not 1 <= count <= MOST_RUNGS:
        problems.append(
            Problem(f"a ladder of {count} rungs", f"1 to {MOST_RUNGS} rungs", "--shares", shares)
        )
    if problems:
        raise InputError(problems)
    step = (stop - start) / (count - 1) if count > 1 else 0.0
    rungs = dict.fromkeys((start + place * step) / 100.0 for place in range(count))
    return Ladder(added, tuple(rungs))


def rungs_of(case: Case, ladder: Ladder) -> tuple[str, ...]:
    """Return the name of the blend on each rung.

    Raises
    ------
    InputError
        The case's own fuel has no name to blend with.
    """
    if case.fuel.name is None:
        raise InputError(
            Problem(
                "the case states its fuel by composition, so a ladder cannot be named",
                "state fuel.name, or give the blends one by one by --to",
                "--ladder",
                ladder.added,
            )
        )
    own = f"({case.fuel.name})" if "+" in case.fuel.name else case.fuel.name
    added = f"({ladder.added})" if "+" in ladder.added else ladder.added
    return tuple(f"{own}+{100.0 * share:.4g}%{added}" for share in ladder.shares)


def check_names(names: Sequence[str]) -> None:
    """Refuse what is no fuel, all of it at once, before any work."""
    problems: list[Problem] = []
    for name in names:
        try:
            catalogue.find(name)
        except InputError as error:
            problems += error.problems
    if problems:
        raise InputError(problems)


def compared(case: Case, names: Sequence[str]) -> Comparison:
    """Return the case's fuel and the others on one mechanism.

    A fuel that shares no mechanism with the case's own is left out and said to be.
    """
    refused: list[tuple[str, str]] = []
    kept = list(names)
    stated = case.model.mechanism
    if stated is None:
        for name in names:
            try:
                _on_one(case, [name])
            except InputError as error:
                refused.append((name, str(error.problems[0].what)))
                kept.remove(name)
    own, *others = _on_one(case, kept)
    return Comparison(own, tuple(others), tuple(refused), Gas.load(own.mechanism))


def _on_one(case: Case, names: Sequence[str]) -> tuple[Fuel, ...]:
    stated = case.model.mechanism
    if stated is not None:
        return (fuel_of(case), *(catalogue.find(name, stated) for name in names))
    if case.fuel.name is not None:
        return catalogue.together([case.fuel.name, *names])
    own = fuel_of(case)
    mechanism = str(choose([own.composition, *(catalogue.composition_of(n) for n in names)]).path)
    return (fuel_of(case, None, mechanism), *(catalogue.find(n, mechanism) for n in names))


def properties_of(case: Case, fuel: Fuel, gas: Gas) -> Properties:
    """Return the figures a fuel engineer compares."""
    point = case.design_point
    supply = Supply(
        point.inlet_pressure, point.inlet_temperature, point.humidity, case.fuel.temperature
    )
    flame = burn_to_equilibrium(gas, fuel, supply, fuel.stoichiometric_fuel_air_ratio)
    carbon = fuel.atoms.get("C", 0.0)
    density = fuel.relative_density
    shares = shares_of(fuel)
    return Properties(
        fuel=fuel,
        shares=shares,
        carbon_dioxide=carbon * CARBON_DIOXIDE / fuel.molar_mass / fuel.lower_heating_value,
        modified_wobbe=None
        if density is None
        else modified_wobbe(fuel.lower_heat_per_volume, density, case.fuel.temperature),
        weaver=None if fuel.phase == "liquid" else weaver_factor(fuel.composition),
        stoichiometric_temperature=flame.temperature,
        sulfur=sulfur_of(case, fuel, [(share.part, share.mass) for share in shares]),
    )


def shares_of(fuel: Fuel) -> tuple[Share, ...]:
    """Return volume, mass and heat share of each named part of a blend."""
    try:
        parts = [part for part in blend.parts(fuel.name) if part.share > 0.0]
        found = [catalogue.find(part.name) for part in parts]
    except InputError:
        return (Share(fuel.name, fuel.name, 1.0, 1.0, 1.0),)
    volumes = [part.share for part in parts]
    masses = [v * one.density_15 for v, one in zip(volumes, found, strict=True)]
    heats = [m * one.lower_heating_value for m, one in zip(masses, found, strict=True)]
    return tuple(
        Share(fuel.name, part.name, v, m / sum(masses), h / sum(heats))
        for part, v, m, h in zip(parts, volumes, masses, heats, strict=True)
    )
