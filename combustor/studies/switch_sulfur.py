"""Sulfur of the fuels of a comparison, for the acid dew points of their exhausts."""

from __future__ import annotations

from collections.abc import Sequence

from combustor.case.schema import Case
from combustor.fuel import catalogue
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.studies.machine_facts import fuel_sulfur, sulfur_held


def sulfur_of(case: Case, fuel: Fuel, parts: Sequence[tuple[str, float]]) -> float | None:
    """Return sulfur as share of a fuel's mass, or None where nobody stated it.

    What a case states of its own fuel also holds for the part of a blend that is this fuel.

    Parameters
    ----------
    case : Case
    fuel : Fuel
    parts : sequence of (str, float)
        Catalogue names of what the fuel is blended from, shares of its mass [-]
    """
    own = fuel_of(case).name
    if fuel.name == own:
        return fuel_sulfur(case, fuel)
    total = 0.0
    for name, share in parts:
        part = catalogue.find(name)
        sulfur = fuel_sulfur(case, part) if part.name == own else sulfur_held(part)
        if sulfur is None:
            return None
        total += share * sulfur
    return total
