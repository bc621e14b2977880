"""Quantities on the command line: a number with a unit, or a bare number in SI."""

from __future__ import annotations

from combustor.base.errors import InputError, Problem
from combustor.case import kinds
from combustor.case.quantity import Quantity, QuantityError

RESIDENCE_TIME = Quantity("residence time", "time", 1e-6, 1e3, '"5 ms"', "1 us to 1000 s")
PHI = kinds.EQUIVALENCE_RATIO
TEMPERATURE = kinds.INLET_TEMPERATURE
PRESSURE = kinds.INLET_PRESSURE
FUEL_TEMPERATURE = kinds.FUEL_TEMPERATURE
HUMIDITY = kinds.HUMIDITY


def read_all(given: dict[str, tuple[Quantity, str | None]]) -> dict[str, float | None]:
    """Return the SI value of each option that was given, None for those left out.

    Raises
    ------
    InputError
        Every option that cannot be used, at once.
    """
    values: dict[str, float | None] = {}
    problems = []
    for option, (quantity, text) in given.items():
        try:
            values[option] = None if text is None else quantity.read(_bare(text))
        except QuantityError as error:
            problems.append(Problem(error.what, error.allowed, option, text, nearest=error.nearest))
    if problems:
        raise InputError(problems)
    return values


def _bare(text: str) -> float | str:
    # The shell hands over text only; what float() reads was written without a unit.
    try:
        return float(text)
    except ValueError:
        return text
