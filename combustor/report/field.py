"""One field of a result: where it sits in the record, its key, its label, unit and format."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace
from numbers import Integral, Real
from typing import Any

MISSING = "-"


@dataclass(frozen=True)
class Field:
    """How one value of a result record is named, scaled and printed, everywhere.

    Parameters
    ----------
    key : str
        JSON key and CSV header, unit included ("flow_kg_s").
    label : str
        Column heading on the terminal; a line break where it may be stacked.
    path : str
        Dotted way to the value in the record, through attributes and mappings; the key
        itself when left out.
    unit : str
        Unit printed under the label.
    scale : float
        SI value times this is the value under ``key``.
    shown : float
        Value under ``key`` times this is the value printed on the terminal.
    decimals : int or None
        Fixed decimals on the terminal.
    figures : int or None
        Significant figures on the terminal, where values span decades.
    lines : bool
        Whether the value is text that may hold several lines.
    """

    key: str
    label: str
    path: str = ""
    unit: str = ""
    scale: float | None = None
    shown: float = 1.0
    decimals: int | None = None
    figures: int | None = None
    lines: bool = False

    def value(self, record: Any) -> Any:
        """Return the plain value in the key's unit; None where it is not a result."""
        found = plain(pick(record, self.path or self.key))
        if found is None or self.scale is None or isinstance(found, (bool, str)):
            return found
        return plain(found * self.scale)

    def text(self, record: Any) -> str:
        """Return the value as the terminal shows it, without its unit."""
        found = self.value(record)
        if isinstance(found, float):
            return number_text(found * self.shown, self.decimals, self.figures)
        if self.lines and isinstance(found, str):
            return "\n".join(printable(line) for line in found.split("\n"))
        return value_text(found)

    def with_unit(self, record: Any) -> str:
        """Return value and unit for running text ("9.90 bar"); a dash alone when missing."""
        text = self.text(record)
        if text == MISSING or not self.unit:
            return text
        return f"{text} {self.unit}"

    @property
    def numeric(self) -> bool:
        """Whether the column holds numbers and is aligned as such."""
        return self.scale is not None or self.decimals is not None or self.figures is not None

    def labelled(self, label: str) -> Field:
        """Return the same field under another column heading."""
        return replace(self, label=label)

    def renamed(self, key: str) -> Field:
        """Return the same field under another key, still picked from the same place."""
        return replace(self, key=key, path=self.path or self.key)

    def beneath(self, place: str, key: str | None = None) -> Field:
        """Return the field for a record that holds this one's record under ``place``."""
        return replace(self, path=f"{place}.{self.path or self.key}", key=key or self.key)


def pick(record: Any, path: str) -> Any:
    """Follow ``path`` through attributes and mappings; None as soon as a part is missing."""
    for part in path.split("."):
        if record is None:
            return None
        record = record.get(part) if isinstance(record, Mapping) else getattr(record, part)
    return record


def plain(value: Any) -> Any:
    """Return a Python number, text or None: no array scalars, no NaN, no infinity."""
    if value is None or isinstance(value, (bool, str)):
        return value
    if isinstance(value, Integral):
        return int(value)
    if isinstance(value, Real):
        number = float(value)
        return number if math.isfinite(number) else None
    if hasattr(value, "item"):
        return plain(value.item())
    return value


def value_text(value: Any) -> str:
    """Return a value that has no number format of its own as one printable line."""
    if value is None:
        return MISSING
    if isinstance(value, bool):
        return "yes" if value else "no"
    return printable(str(value))


def number_text(value: float, decimals: int | None = None, figures: int | None = None) -> str:
    """Return a number with fixed decimals, or to so many significant figures.

    Digits before the decimal point are never rounded away; below 1e-4 an exponent is used.
    """
    if not math.isfinite(value):
        return MISSING
    if decimals is not None:
        text = f"{value:.{decimals}f}"
        return text.removeprefix("-") if float(text) == 0.0 else text
    if figures is None:
        return f"{value:.6g}"
    if value == 0.0:
        return "0"
    if abs(value) < 1e-4 or abs(value) >= 1e9:
        return f"{value:.{figures - 1}e}"
    exponent = math.floor(math.log10(abs(float(f"{value:.{figures - 1}e}"))))
    return f"{value:.{max(figures - 1 - exponent, 0)}f}"


def printable(text: str) -> str:
    """Return ``text`` on one line with control characters replaced, so none acts up."""
    return "".join(c if c.isprintable() else " " if c.isspace() else "?" for c in text)


def aligned(texts: Iterable[str]) -> list[str]:
    """Pad texts on the right so that, set flush right, their decimal points stand in line."""
    texts = list(texts)
    tails = [len(text) - text.find(".") if _has_point(text) else 0 for text in texts]
    longest = max(tails, default=0)
    return [
        text + " " * (longest - tail) if _is_number(text) else text
        for text, tail in zip(texts, tails, strict=True)
    ]


def _is_number(text: str) -> bool:
    return text.lstrip("-")[:1].isdigit() and "e" not in text


def _has_point(text: str) -> bool:
    return _is_number(text) and "." in text


def select(fields: Iterable[Field], *keys: str) -> tuple[Field, ...]:
    """Return the fields called ``keys``, in that order; KeyError when one is unknown."""
    known = {field.key: field for field in fields}
    return tuple(known[key] for key in keys)


def row(fields: Iterable[Field], record: Any) -> dict[str, Any]:
    """Return key -> value of one record, full precision: a JSON object or a CSV line."""
    return {field.key: field.value(record) for field in fields}
