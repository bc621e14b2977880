"""Reading what was measured and what is wanted: values, O2 a run, units."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import replace

from combustor.base.errors import InputError, Problem
from combustor.emissions.emission_unit import EmissionUnit, read_unit
from combustor.studies.convert_record import Moisture

_VALUE = re.compile(r"\s*([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)\s*(.*)", re.S)
_LEAST_PPM = 1e-3


def read_value(text: str, moisture: Moisture) -> tuple[float, EmissionUnit, Moisture]:
    """Return number, unit and moisture of what an analyser showed.

    A bare number is in ppm of the gas as sampled.

    Raises
    ------
    InputError
        Not a number with a unit of emission, negative, or so small that a mole fraction
        was meant; dry in the unit and wet in the sample.
    """
    match = _VALUE.fullmatch(text)
    if match is None:
        raise InputError(
            Problem("not a number with a unit", 'write 43.2 or "43.2 ppm"', "VALUE", text)
        )
    number, unit_text = float(match[1]), match[2].strip()
    if not 0.0 <= number < 1e9:
        raise InputError(Problem("not a concentration", "zero or above", "VALUE", text))
    if not unit_text and 0.0 < number < _LEAST_PPM:
        raise InputError(
            Problem(
                "a bare number is in ppm: was a mole fraction meant?",
                f'write "{number * 1e6:.6g} ppm", or "{number:g} ppm" if it is that small',
                "VALUE",
                text,
            )
        )
    unit = read_unit(unit_text or "ppm")
    stated: Moisture | None = None
    if re.match(r"^(ppm|ppb)v?d|.*dry", unit_text):
        stated = "dry"
    elif unit.moisture == "wet":
        stated = "wet"
    if stated is not None and stated != moisture and unit.oxygen is None and moisture == "wet":
        raise InputError(
            Problem(
                f"{unit_text} is {stated}, but the sample is said to be {moisture}",
                "leave out --wet, or write ppm",
                "VALUE",
                text,
            )
        )
    seen = stated or ("dry" if unit.oxygen is not None else moisture)
    if unit.kind == "volume":
        letter = "w" if seen == "wet" else "d"
        name = re.sub(r"v[dw]", f"v{letter}", unit.text)
        unit = replace(unit, moisture=seen, text=name)
    return number, unit, seen


def per_run(oxygen: Sequence[float], runs: int) -> list[float | None]:
    """Return one reading of O2 a run; InputError where their number does not fit."""
    if not oxygen:
        return [None] * runs
    if len(oxygen) == 1:
        return [oxygen[0]] * runs
    if len(oxygen) != runs:
        raise InputError(
            Problem(
                f"{runs} values and {len(oxygen)} readings of O2",
                "give one O2 for all runs, or one each",
                "--o2",
            )
        )
    return list(oxygen)


def units_of(to: Sequence[str]) -> list[EmissionUnit]:
    """Return the units asked for; InputError with every one that cannot be given."""
    units, problems = [], []
    for text in to:
        try:
            unit = read_unit(text)
        except InputError as error:
            problems += [replace(problem, key="--to") for problem in error.problems]
            continue
        if unit.kind in ("thrust", "fuel mass"):
            problems += list(impossible(unit).problems)
        units.append(unit)
    if problems:
        raise InputError(problems)
    return units


def lacking(option: str, why: str) -> InputError:
    """Return the error of a piece that a conversion needs and was not given."""
    return InputError(Problem(why, f"give {option}", option))


def impossible(unit: EmissionUnit) -> InputError:
    """Return the error of a unit that does not follow from one reading."""
    why = "mass per thrust is of a landing and take-off cycle, not of one reading"
    if unit.kind == "fuel mass":
        why = "a share of the fuel's mass does not follow from the exhaust"
    return InputError(Problem(why, "choose another unit", "--to", unit.text))
