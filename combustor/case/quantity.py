"""A quantity in a case file: number and unit in, plausible SI float out."""

from __future__ import annotations

import datetime
import math
import re
from collections.abc import Callable
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from pydantic_core import PydanticCustomError

from combustor.case.units import SI_UNIT, UNITS, UnitError, find_unit

_NUMBER = re.compile(r"\s*([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)\s*(.*)", re.S)
_NOT_A_NUMBER = re.compile(r"\s*[+-]?(?:nan|inf|infinity)\b.*", re.I | re.S)
_COMMA = re.compile(r"\s*[+-]?[0-9]+,[0-9]+.*", re.S)
_LONGEST = 80


class QuantityError(Exception):
    """A value that cannot be used: the fact, what is allowed, the nearest spelling."""

    def __init__(self, what: str, allowed: str = "", nearest: str | None = None) -> None:
        self.what = what
        self.allowed = allowed
        self.nearest = nearest
        super().__init__(what)


def refusal(what: str, allowed: str = "", nearest: str | None = None) -> PydanticCustomError:
    """Return the error a schema validator raises; the three parts reach the user apart."""
    context = {"what": what, "allowed": allowed, "nearest": nearest}
    return PydanticCustomError("refused", "{what}", context)


@dataclass(frozen=True)
class Quantity:
    """What a key of the case file may hold.

    Parameters
    ----------
    name : str
        The trade's word, for messages.
    dimension : str
        One of the dimensions in ``units.SI_UNIT``.
    low, high : float
        Plausible window, SI, ends included.
    example : str
        How to write it.
    window : str
        The window as a person reads it.
    bare : {"SI", "fraction", "percent"}
        What a number without unit means. A ``fraction`` above 1 is refused with the way to
        write it; ``percent`` values are held in percent.
    """

    name: str
    dimension: str
    low: float
    high: float
    example: str
    window: str
    bare: str = "SI"

    def read(self, value: object) -> float:
        """Return ``value`` in SI (percent for ``bare="percent"``).

        Raises
        ------
        QuantityError
            Not a quantity, wrong dimension, or outside the window.
        """
        if isinstance(value, bool) or not isinstance(value, int | float | str):
            raise QuantityError("not a quantity", self._how())
        number = self._from_text(value) if isinstance(value, str) else self._from_number(value)
        return self._within(number, bare=not isinstance(value, str))

    def validate(self, value: object) -> float:
        """Return :meth:`read`, with the schema's own error."""
        try:
            return self.read(value)
        except QuantityError as error:
            raise refusal(error.what, error.allowed, error.nearest) from None

    def validate_list(self, value: object) -> tuple[float, ...]:
        """Return a list of quantities; a single one is a list of one."""
        items = value if isinstance(value, list | tuple) else [value]
        if not items:
            raise refusal("empty list", f"one or more values, {self._how()}")
        return tuple(self.validate(item) for item in items)

    def _how(self) -> str:
        if self.bare == "percent":
            return f"write {self.example}, or a bare number in percent; {self.window}"
        unit = SI_UNIT[self.dimension]
        tail = f", or a bare number in {unit}" if unit else ", or a bare number"
        return f"write {self.example}{tail}; {self.window}"

    def _from_number(self, value: int | float) -> float:
        try:
            number = float(value)
        except OverflowError:
            raise QuantityError(f"{self.name} is absurdly large", self._how()) from None
        if self.bare == "fraction" and number > 1.0 and math.isfinite(number):
            raise QuantityError(
                "a bare number above 1 is not a fraction",
                f'write "{number:g} %" or {number / 100:g}',
            )
        if self.bare == "percent" and 0.0 < number <= 1.5:
            raise QuantityError(
                f"{self.name} in percent, or a fraction?",
                f'write "{100 * number:g} %" if a fraction was meant, else "{number:g} %"',
            )
        return number

    def _from_text(self, text: str) -> float:
        if _NOT_A_NUMBER.fullmatch(text):
            raise QuantityError(f"{self.name} is not a finite number", self._how())
        match = _NUMBER.fullmatch(text) if len(text) <= _LONGEST else None
        if _COMMA.fullmatch(text):
            raise QuantityError("a comma in a number", f"use a decimal point; {self._how()}")
        if match is None:
            raise QuantityError("not a number with a unit", self._how())
        return self._convert(match[1], match[2].strip())

    def _convert(self, number: str, unit_text: str) -> float:
        if not unit_text:
            if self.dimension == "ratio":
                return self._from_number(float(number))
            raise QuantityError("no unit in the text", self._how())
        try:
            unit = find_unit(unit_text)
        except UnitError as error:
            allowed = error.allowed or self._how()
            raise QuantityError(error.what, allowed, self._suggest(error.nearest)) from None
        if unit.dimension != self.dimension:
            raise QuantityError(
                f"{unit_text[:40]!r} is a unit of {unit.dimension}",
                f"a unit of {self.dimension} is needed: {self._how()}",
            )
        value = (Fraction(Decimal(number)) + unit.offset) * unit.factor
        if self.bare == "percent":
            value *= 100
        try:
            return float(value)
        except OverflowError:
            raise QuantityError(f"{self.name} is absurdly large", self._how()) from None

    def _suggest(self, nearest: str | None) -> str | None:
        """Offer a spelling only when it would be accepted here."""
        if nearest is None or UNITS[nearest].dimension != self.dimension:
            return None
        return nearest

    def _within(self, number: float, bare: bool) -> float:
        if not math.isfinite(number):
            raise QuantityError(f"{self.name} is not a finite number", self._how())
        if self.low <= number <= self.high:
            return number
        if number < 0.0:
            raise QuantityError(f"{self.name} is negative", self._how())
        if number == 0.0:
            raise QuantityError(f"{self.name} is zero", self._how())
        what = f"{self.name} outside the plausible range"
        if bare and SI_UNIT[self.dimension]:
            what += f" (bare numbers are {SI_UNIT[self.dimension]})"
        raise QuantityError(what, self._how())


def whole(name: str, low: int, high: int) -> Callable[[object], int]:
    """Return a validator for a whole number between ``low`` and ``high``."""

    def validate(value: object) -> int:
        if isinstance(value, bool) or not isinstance(value, int):
            raise refusal(f"{name} is not a whole number", f"a whole number, {low} to {high}")
        if not low <= value <= high:
            raise refusal(f"{name} outside {low} to {high}", f"a whole number, {low} to {high}")
        return value

    return validate


def calendar_day(value: object) -> datetime.date:
    """Return a day: a TOML date, or the same in quotes."""
    if isinstance(value, datetime.date) and not isinstance(value, datetime.datetime):
        return value
    if isinstance(value, str):
        try:
            return datetime.date.fromisoformat(value)
        except ValueError:
            pass
    raise refusal("not a day", "write 2015-06-30")


def word(name: str, longest: int = 60, forbidden: str = "") -> Callable[[object], str]:
    """Return a validator for a name or title: text that prints on one line."""

    def validate(value: object) -> str:
        if not isinstance(value, str):
            raise refusal(f"{name} is not text", 'write it in quotes, "..."')
        if not value.strip():
            raise refusal(f"{name} is empty", "give it a text")
        if len(value) > longest:
            raise refusal(f"{name} is too long", f"at most {longest} characters")
        if not value.isprintable():
            raise refusal(f"{name} holds control characters", "use plain text on one line")
        for character in forbidden:
            if character in value:
                raise refusal(f"{name} holds {character!r}", "leave that character out")
        return value.strip()

    return validate
