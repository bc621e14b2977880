"""The fuel a case states, or one named in its place."""

from __future__ import annotations

from combustor.case.schema import Case
from combustor.fuel import catalogue
from combustor.fuel.record import Fuel


def fuel_of(case: Case, name: str | None = None, mechanism: str | None = None) -> Fuel:
    """Return the fuel of a case under the mechanism stated, or the tool's choice.

    Parameters
    ----------
    case : Case
    name : str, optional
        Catalogue name or blend in place of the case's own fuel.
    mechanism : str, optional
        In place of the case's own.
    """
    chosen = mechanism if mechanism is not None else case.model.mechanism
    if name is not None:
        return catalogue.find(name, chosen)
    if case.fuel.name is not None:
        return catalogue.find(case.fuel.name, chosen)
    return catalogue.from_composition(case.fuel.composition or {}, chosen)
