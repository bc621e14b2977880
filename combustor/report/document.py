"""What a report is made of, before any width or colour: headings, facts, prose, tables."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import Any

from combustor.report.field import Field, row


@dataclass(frozen=True)
class Heading:
    """A line that opens a part of the report; ``mark`` is a word of the theme or empty."""

    text: str
    mark: str = ""


@dataclass(frozen=True)
class Prose:
    """Running text, wrapped to the width."""

    text: str


@dataclass(frozen=True)
class Facts:
    """Label and text in pairs, one a line."""

    pairs: tuple[tuple[str, str], ...]


@dataclass(frozen=True)
class Table:
    """Records under fields: one terminal table, one CSV file.

    Parameters
    ----------
    name : str
        Stem of the CSV file.
    title : str
    fields : tuple of Field
        Columns.
    records : tuple
        Anything the fields can pick from; one line each.
    marks : mapping of int to str
        A word of the theme by record index: the line is set off in that colour. Whatever
        it means is said in the line's words as well.
    below : tuple of str
        A remark under each line, set across the width; empty where there is none.
    lead : int
        How many first columns name the line and are repeated when a narrow terminal
        needs the table in two parts.
    """

    name: str
    title: str
    fields: tuple[Field, ...]
    records: tuple[Any, ...]
    marks: Mapping[int, str] = field(default_factory=dict)
    below: tuple[str, ...] = ()
    lead: int = 1

    def values(self) -> Iterable[dict[str, Any]]:
        """Yield key -> value of each record in full precision."""
        return (row(self.fields, record) for record in self.records)


@dataclass(frozen=True)
class Curve:
    """One line of a plot: what it is called, and its points; None breaks it."""

    name: str
    points: tuple[tuple[float, float | None], ...]


@dataclass(frozen=True)
class Plot:
    """Curves in characters, each with a letter of its own, at most 80 columns wide.

    Parameters
    ----------
    title : str
    across, up : str
        What the axes show, unit included.
    curves : tuple of Curve
    log_across, log_up : bool
        Whether an axis is logarithmic; values that are not positive are left out then.
    limit_across, limit_up : float or None
        A limit drawn as a line.
    """

    title: str
    across: str
    up: str
    curves: tuple[Curve, ...]
    log_across: bool = False
    log_up: bool = False
    limit_across: float | None = None
    limit_up: float | None = None


Block = Heading | Prose | Facts | Table | Plot
