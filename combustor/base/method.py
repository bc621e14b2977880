"""The record that a published correlation carries: source, where it was read, validity, scatter."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

Reading = Literal[
    "read",
    "as given in",
    "from memory",
    "derived",
    "computed",
    "common practice, no source",
    "judgement",
]


@dataclass(frozen=True)
class Notice:
    """A method was used outside its validity range; travels with the result."""

    method: str
    quantity: str
    value: float
    low: float
    high: float
    where: str = ""

    def __str__(self) -> str:
        place = f" at {self.where}" if self.where else ""
        return (
            f"{self.method}: {self.quantity} = {self.value:.4g}{place} lies outside "
            f"{self.low:.4g} to {self.high:.4g}"
        )


@dataclass(frozen=True)
class Method:
    """One published (or derived, or judged) method behind a number.

    Parameters
    ----------
    key : str
        Short identifier, e.g. ``"discharge-coefficient-kaddah"``.
    quantity : str
        What it gives, in the trade's words.
    source : str
        Author, year, report; or the derivation in half a sentence.
    reading : Reading
        Where the figure was really read.
    validity : mapping of str to (low, high)
        Range of each argument in SI units.
    scatter : str
        Stated scatter, empty when not known.
    note : str
        Misprints, deviations, limits.
    """

    key: str
    quantity: str
    source: str
    reading: Reading
    validity: Mapping[str, tuple[float, float]] = field(default_factory=dict)
    scatter: str = ""
    note: str = ""

    def notices(self, where: str = "", **values: float) -> tuple[Notice, ...]:
        """Return a notice for every named value outside this method's validity range."""
        found = []
        for quantity, value in values.items():
            low, high = self.validity[quantity]
            if not low <= value <= high:
                found.append(Notice(self.key, quantity, value, low, high, where))
        return tuple(found)

    @property
    def citation(self) -> str:
        """Source and where it was read, for a table cell."""
        return f"{self.source} ({self.reading})"
