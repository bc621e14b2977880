"""One entry that is varied, and the values it takes."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from math import isfinite

from combustor.base.errors import InputError, Problem
from combustor.case.entry import Entry, Path, entries
from combustor.case.quantity import Quantity, QuantityError
from combustor.case.schema import Case
from combustor.case.text import neat
from combustor.case.units import SI_UNIT

MOST_VALUES = 10_000

_PARTS = re.compile(
    r"\s*([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)\s*(\S.*)?", re.S
)


@dataclass(frozen=True)
class Axis:
    """A swept key.

    Parameters
    ----------
    key : str
        As asked for: ``points.*.air_flow``.
    entries : tuple of Entry
        Every number it stands for.
    values : tuple of float
        SI, load in percent.
    unit : str
        Unit of ``shown``; empty for pure numbers and counts.
    shown : tuple of float
        The values in the unit they were given in.
    """

    key: str
    entries: tuple[Entry, ...]
    values: tuple[float, ...]
    unit: str
    shown: tuple[float, ...]

    def changes(self, index: int) -> tuple[tuple[Path, float], ...]:
        """Return what the case is to say at one of the values."""
        return tuple((entry.path, self.values[index]) for entry in self.entries)


def axis(case: Case, key: str, values: Sequence[float]) -> Axis:
    """Return a key with the values it is to take, SI.

    Raises
    ------
    InputError
        A key that is no number of the case, no value, a value the key cannot hold.
    """
    found = entries(case, key)
    if not values:
        raise InputError(Problem("no values", "give at least one", key))
    if len(values) > MOST_VALUES:
        raise _too_many(key, len(values))
    read = tuple(_read(found, key, value) for value in values)
    return Axis(key, found, read, _own_unit(found), read)


def spaced(case: Case, key: str, start: float | str, stop: float | str, count: int) -> Axis:
    """Return a key with values evenly spaced from ``start`` to ``stop``, both included.

    Parameters
    ----------
    start, stop : float or str
        SI numbers, or texts with a unit; evenly spaced in that unit where both have the same.

    Raises
    ------
    InputError
        A key that is no number of the case, an empty span, a value the key cannot hold.
    """
    found = entries(case, key)
    if count < 1:
        raise InputError(Problem("no points in the span", "a count of 1 or more", key, count))
    if count > MOST_VALUES:
        raise _too_many(key, count)
    first, first_unit = _split(key, start)
    last, last_unit = _split(key, stop)
    if bool(first_unit) != bool(last_unit):
        raise InputError(
            Problem(
                "a unit on one end of the span only",
                "give both ends a unit, or neither for SI",
                key,
                f"{start}:{stop}",
            )
        )
    unit = first_unit
    if first_unit != last_unit:
        first, last = _read(found, key, start), _read(found, key, stop)
        unit = ""
    if (first == last) != (count == 1):
        what = "start and stop are the same" if count > 1 else "one point cannot span two values"
        raise InputError(Problem(what, "START:STOP:COUNT", key, f"{start}:{stop}:{count}"))
    gaps = max(count - 1, 1)
    shown = tuple(neat(first + (last - first) * step / gaps) for step in range(count))
    values = tuple(_read(found, key, f"{x!r} {unit}" if unit else x) for x in shown)
    return Axis(key, found, values, unit or _own_unit(found), shown)


def _split(key: str, given: float | str) -> tuple[float, str]:
    if not isinstance(given, str):
        return float(given), ""
    match = _PARTS.fullmatch(given)
    number = float(match[1]) if match else float("nan")
    if match is None or not isfinite(number):
        raise InputError(
            Problem("not a number", 'write 0.03, or "30 mm" with a unit', key, given[:60])
        )
    return number, (match[2] or "").strip()


def _read(found: Sequence[Entry], key: str, value: float | str) -> float:
    quantity = found[0].quantity
    if quantity is None:
        return _whole(key, value)
    try:
        return quantity.read(value)
    except QuantityError as error:
        shown = value if isinstance(value, str) else neat(value)
        raise InputError(
            Problem(error.what, error.allowed, key, shown, nearest=error.nearest)
        ) from None


def _whole(key: str, value: float | str) -> int:
    if isinstance(value, str):
        raise InputError(Problem("a count has no unit", "whole numbers", key, value))
    if value != int(value):
        raise InputError(
            Problem(
                "only whole numbers can stand here",
                "choose START, STOP and COUNT so that every step is whole",
                key,
                value,
            )
        )
    return int(value)


def _own_unit(found: Sequence[Entry]) -> str:
    quantity: Quantity | None = found[0].quantity
    if quantity is None:
        return ""
    return "%" if quantity.bare == "percent" else SI_UNIT[quantity.dimension]


def _too_many(key: str, count: int) -> InputError:
    return InputError(
        Problem(f"{count} values", f"at most {MOST_VALUES}: every one is a full rating", key)
    )
