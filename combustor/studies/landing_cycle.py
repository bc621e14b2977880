"""The landing and take-off cycle of a case: one operating point a mode, judged as one."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case
from combustor.emissions.facts import Facts
from combustor.emissions.landing_takeoff import TIME_IN_MODE, Mode, mass_per_thrust
from combustor.emissions.limit import FuelOfLimit
from combustor.emissions.reference_day import aircraft_humidity_factor
from combustor.emissions.stack import FactMissing, Stack
from combustor.emissions.verdict import Subject
from combustor.rating.record import Ratings

CYCLE = "landing and take-off"
_MODES = {
    "take-off": "take-off",
    "takeoff": "take-off",
    "climb": "climb",
    "climb-out": "climb",
    "approach": "approach",
    "idle": "idle",
    "taxi": "idle",
}


def cycle_of(
    case: Case, fuel: FuelOfLimit, facts: Facts, ratings: Ratings, stacks: Mapping[str, Stack]
) -> Subject:
    """Return the landing and take-off cycle as one subject."""
    subject = Subject(
        CYCLE,
        None,
        facts,
        fuel,
        front_end=case.targets.front_end,
        no_result="needs points with cycle_mode " + ", ".join(TIME_IN_MODE),
    )
    modes = _modes(case, ratings)
    lacking = [mode for mode in TIME_IN_MODE if mode not in modes]
    if lacking:
        return replace(subject, no_result=f"needs a point with cycle_mode {', '.join(lacking)}")
    silent = [name for name in modes.values() if name not in stacks]
    if silent:
        return replace(subject, no_result=f"no result at point {', '.join(silent)}")
    thrust = facts.values.get("rated_thrust")
    stack = stacks[modes["take-off"]]
    if thrust is not None:
        totals = {}
        for pollutant in ("NOx", "CO", "UHC"):
            try:
                totals[pollutant] = _per_thrust(case, pollutant, modes, stacks, thrust)
            except FactMissing:
                continue
        stack = replace(stack, per_thrust=totals)
    return replace(subject, stack=stack)


def _per_thrust(
    case: Case, pollutant: str, modes: Mapping[str, str], stacks: Mapping[str, Stack], thrust: float
) -> float:
    found = {}
    for mode, name in modes.items():
        stack = stacks[name]
        index = stack.mass_flow(pollutant) / stack.fuel_flow
        if pollutant == "NOx":
            index *= aircraft_humidity_factor(case.point(name).humidity)
        found[mode] = Mode(index, stack.fuel_flow)
    return mass_per_thrust(found, thrust)


def _modes(case: Case, ratings: Ratings) -> dict[str, str]:
    """Return the point of each mode of the landing and take-off cycle."""
    rated = {point.name for point in ratings.points}
    modes: dict[str, str] = {}
    for point in case.points:
        if point.cycle_mode is None or point.name not in rated:
            continue
        mode = _MODES.get(point.cycle_mode.lower())
        if mode is None:
            continue
        if mode in modes:
            raise InputError(
                Problem(
                    f"two points are the {mode} of the cycle",
                    "one point a mode",
                    "points.cycle_mode",
                    f"{modes[mode]}, {point.name}",
                )
            )
        modes[mode] = point.name
    return modes
