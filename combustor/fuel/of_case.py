"""The fuel a case states, or one named in its place."""

from __future__ import annotations

from combustor.case.schema import Case, FuelCertificate
from combustor.fuel import catalogue
from combustor.fuel.certificate import Certificate, hydrogen_of_ratio
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
    if case.fuel.certificate is not None:
        return catalogue.from_certificate(_stated(case.fuel.certificate), chosen)
    return catalogue.from_composition(case.fuel.composition or {}, chosen)


def _stated(table: FuelCertificate) -> Certificate:
    """Return a case's certificate; hydrogen may stand there as an H/C ratio."""
    given = {key: value for key, value in table if value is not None}
    ratio = given.pop("hydrogen_carbon_ratio", None)
    if ratio is not None:
        others = (table.oxygen, table.nitrogen, table.sulfur)
        given["hydrogen"] = hydrogen_of_ratio(ratio, *others)
    return Certificate(**given)
