"""The facts a rule asks for, from what a case states and what its points burn."""

from __future__ import annotations

from collections.abc import Mapping
from difflib import get_close_matches
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case, Point
from combustor.emissions.facts import Facts
from combustor.emissions.fuel_class import FuelStanding, standing
from combustor.fuel.record import Fuel
from combustor.rating.record import PointRating, Ratings

SEA_LEVEL = 101325.0  # Pa

_USES = {
    "electric": "electric",
    "electricity": "electric",
    "power": "electric",
    "generator": "electric",
    "power generation": "electric",
    "mechanical-drive": "mechanical-drive",
    "mechanical drive": "mechanical-drive",
    "mechanical": "mechanical-drive",
    "pump drive": "mechanical-drive",
    "compressor drive": "mechanical-drive",
    "heat-and-power": "heat-and-power",
    "heat and power": "heat-and-power",
    "chp": "heat-and-power",
    "cogeneration": "heat-and-power",
    "aircraft": "aircraft",
    "aviation": "aircraft",
}
_STATED = (
    "unit_state",
    "cycle",
    "duty",
    "site",
    "aftertreatment",
    "country",
    "hours",
    "capacity_factor",
    "efficiency",
    "total_efficiency",
    "built",
    "permitted",
    "type_date",
    "rated_output",
    "rated_thrust",
    "pressure_ratio",
    "engines_tested",
    "fuel_nitrogen",
)


def facts_of(case: Case, fuel: Fuel, ratings: Ratings) -> Facts:
    """Return what is known of the machine, operating points aside.

    What the case does not state but implies (fuel heat, output, efficiency and pressure
    ratio of its rated points) is marked as derived.

    Raises
    ------
    InputError
        A use that no rule knows.
    """
    stated = case.rules
    values: dict[str, Any] = {
        name: getattr(stated, name) for name in _STATED if getattr(stated, name) is not None
    }
    if stated.use is not None:
        values["use"] = _use(stated.use)
    seen = fuel_standing(case, fuel)
    values |= {"fuel": seen.fuel_class, "hydrogen_share": seen.hydrogen_share}
    if fuel.phase == "gas" and _no_bound_nitrogen(fuel):
        values.setdefault("fuel_nitrogen", 0.0)
    if fuel.liquid is not None and fuel.liquid.nitrogen > 0.0:
        values.setdefault("fuel_nitrogen", fuel.liquid.nitrogen)
    derived: dict[str, str] = {}
    heat_input, basis = stated.heat_input, stated.heat_input_basis
    largest = _largest_rated(case, ratings)
    if largest is not None:
        point, rated = largest
        assert rated.fuel_flow is not None
        heat = rated.fuel_flow * fuel.lower_heating_value
        if heat_input is None:
            heat_input, basis = heat, "LHV"
            derived["heat_input"] = f"{heat / 1e6:.4g} MW LHV, fuel heat of point {point.name}"
        if point.output is not None:
            _derive(values, derived, "rated_output", point.output, f"output of point {point.name}")
            share = point.output / heat
            _derive(
                values,
                derived,
                "efficiency",
                share,
                f"{100 * share:.1f} % of point {point.name}, output over fuel heat",
            )
        ratio = point.inlet_pressure / SEA_LEVEL
        if ratio >= 1.0:
            told = f"{ratio:.1f}, combustor inlet of point {point.name} over sea level"
            _derive(values, derived, "pressure_ratio", ratio, told)
    return Facts(
        values=values,
        heat_input=heat_input,
        heat_input_basis=basis,
        higher_over_lower=fuel.higher_heating_value / fuel.lower_heating_value,
        derived=derived,
        natural_gas_share=seen.natural_gas_share,
    )


def facts_at(facts: Facts, point: Point) -> Facts:
    """Return the facts at one operating point; a rated point runs at 100 % load."""
    load = point.load
    if load is None and point.kind == "rated":
        load = 100.0
    return facts.at(load=load, ambient_temperature=point.ambient_temperature)


def fuel_standing(case: Case, fuel: Fuel) -> FuelStanding:
    """Return how the rules see the fuel; a class stated in the case rules."""
    seen = standing(fuel.name, fuel.phase, fuel.composition)
    own = case.rules.fuel_class
    if own is None:
        return seen
    share = 1.0 if own == "natural-gas" else 0.0
    return FuelStanding(own, share, seen.hydrogen_share)


def fuel_sulfur(case: Case, fuel: Fuel) -> float | None:
    """Return sulfur as share of the fuel's mass: stated, or zero where it cannot hold any."""
    if case.rules.fuel_sulfur is not None:
        return case.rules.fuel_sulfur
    return sulfur_held(fuel)


def sulfur_held(fuel: Fuel) -> float | None:
    """Return the sulfur a fuel is known to hold, mass share, or None where that is not known."""
    if fuel.liquid is not None and fuel.liquid.sulfur > 0.0:
        return fuel.liquid.sulfur
    pure = {species.upper() for species in fuel.composition} <= {"H2", "NH3", "N2"}
    return 0.0 if pure and fuel.phase == "gas" else None


def _use(text: str) -> str:
    found = _USES.get(" ".join(text.lower().split()))
    if found is None:
        words = sorted(set(_USES.values()))
        close = get_close_matches(text.lower(), list(_USES), n=1)
        nearest = _USES[close[0]] if close else None
        raise InputError(
            Problem("no such use", ", ".join(words), "rules.use", text, nearest=nearest)
        )
    return found


def _no_bound_nitrogen(fuel: Fuel) -> bool:
    return not any(
        "N" in species.upper() and species.upper() not in ("N2", "AR")
        for species in fuel.composition
    )


def _largest_rated(case: Case, ratings: Ratings) -> tuple[Point, PointRating] | None:
    by_name: Mapping[str, PointRating] = {rated.name: rated for rated in ratings.points}
    found = [
        (point, by_name[point.name])
        for point in case.points
        if point.kind == "rated" and point.name in by_name and by_name[point.name].fuel_flow
    ]
    return max(found, key=lambda pair: pair[1].fuel_flow or 0.0) if found else None


def _derive(
    values: dict[str, Any], derived: dict[str, str], name: str, value: float, told: str
) -> None:
    if name not in values:
        values[name] = value
        derived[name] = told
