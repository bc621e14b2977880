"""Quantities on the command line: a number with a unit, or a bare number in SI."""

from __future__ import annotations

import argparse

from combustor.base.errors import InputError, Problem
from combustor.case.quantity import Quantity, QuantityError
from combustor.case.units import SI_UNIT
from combustor.studies.flame import ALLOWED

# what flame() calls it -> option, what it is called, its dimension, how to write it
_FLAME = {
    "equivalence_ratio": ("--phi", "equivalence ratio", "ratio", "0.5"),
    "temperature": ("--temperature", "temperature", "temperature", '"700 K"'),
    "pressure": ("--pressure", "pressure", "pressure", '"20 bar"'),
    "residence_time": ("--time", "residence time", "time", '"5 ms"'),
    "fuel_temperature": ("--fuel-temperature", "fuel temperature", "temperature", '"15 degC"'),
    "humidity": ("--humidity", "humidity", "ratio", '0.00634 or "6.34 g/kg"'),
}


def flame_conditions(arguments: argparse.Namespace) -> dict[str, float]:
    """Return the conditions of a flame in SI, those left out on the command line left out.

    Raises
    ------
    InputError
        Every option that cannot be used, at once.
    """
    values: dict[str, float] = {}
    problems = []
    for condition, (option, name, dimension, example) in _FLAME.items():
        text = getattr(arguments, option.removeprefix("--").replace("-", "_"))
        if text is None:
            continue
        low, high = ALLOWED[condition]
        window = f"{low:g} to {high:g} {SI_UNIT[dimension]}".rstrip()
        try:
            quantity = Quantity(name, dimension, low, high, example, window)
            values[condition] = quantity.read(_bare(text))
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
