"""SI numbers as a person writes them, reading back to the last few bits."""

from __future__ import annotations

import math
from decimal import Decimal

from combustor.case.kinds import VANE_ANGLE

_SHIFT = {"m": 0, "mm": 3, "um": 6, "m2": 0, "mm2": 6}

NOISE = 2e-15
"""Relative difference that arithmetic leaves behind: 31.499999999999986 mm is 31.5 mm."""


def bare(value: float) -> float | int:
    """Return a number as it is written without unit: 1 rather than 1.0."""
    value = neat(float(value))
    return int(value) if float(value).is_integer() and abs(value) < 1e15 else value


def neat(value: float) -> float:
    """Return ``value`` without the noise of arithmetic in its last digits."""
    for digits in range(12, 16):
        short = float(f"{value:.{digits}g}")
        if abs(short - value) <= NOISE * abs(value):
            return short
    return value


def _shifted(value: float, unit: str) -> str:
    # a shift of the decimal point is exact, where a product of floats is not
    text = format(Decimal(repr(neat(float(value)))).scaleb(_SHIFT[unit]), "f")
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    return f"{text} {unit}"


def length(value: float, unit: str = "mm") -> str:
    """Return a length (m) in mm, or in ``unit``."""
    return _shifted(value, unit)


def area(value: float) -> str:
    """Return an area (m2) in mm2."""
    return _shifted(value, "mm2")


def vane_angle(value: float) -> str:
    """Return an angle (rad) in degrees where that reads back exactly, else in rad."""
    degrees = math.degrees(value)
    for digits in range(1, 16):
        text = f"{bare(round(degrees, digits))} deg"
        if VANE_ANGLE.read(text) == value:
            return text
    return f"{value!r} rad"
