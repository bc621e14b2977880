"""Fit a table into a width: wrap its words, never cut its numbers, else set it in parts."""

from __future__ import annotations

from dataclasses import dataclass

from rich.cells import cell_len

from combustor.report.document import Table
from combustor.report.field import aligned

LONGEST_UNBROKEN_WORD = 16
_WIDE_GAP, _NARROW_GAP = 2, 1


@dataclass(frozen=True)
class Column:
    """One column as text: heading lines, cells, and the widths it can live with."""

    heading: tuple[str, ...]
    cells: tuple[str, ...]
    numeric: bool
    natural: int
    least: int


@dataclass(frozen=True)
class Part:
    """Columns that stand side by side, with the width of each and the gap between them."""

    columns: tuple[Column, ...]
    widths: tuple[int, ...]
    gap: int


def columns_of(table: Table) -> tuple[Column, ...]:
    """Return the table's columns as text."""
    made = []
    for field in table.fields:
        cells = [field.text(record) for record in table.records]
        heading = tuple(field.label.split("\n"))
        if field.numeric:
            cells = aligned(cells)
            heading = (*heading, "" if field.unit in ("", "-") else field.unit)
        made.append(_column(heading, tuple(cells), field.numeric))
    return tuple(made)


def fit(table: Table, width: int) -> tuple[Part, ...]:
    """Return the parts in which ``table`` is set within ``width`` characters.

    Numbers are never cut: words wrap first, then the gap narrows, then the columns that do
    not fit continue in a further part under the same leading columns.
    """
    columns = columns_of(table)
    lead, rest = columns[: table.lead], columns[table.lead :]
    parts = []
    while True:
        taken = len(rest)
        while taken > 1 and not _fits((*lead, *rest[:taken]), width):
            taken -= 1
        parts.append(_set((*lead, *rest[:taken]), width))
        rest = rest[taken:]
        if not rest:
            return tuple(parts)


def _column(heading: tuple[str, ...], cells: tuple[str, ...], numeric: bool) -> Column:
    lines = [line for text in (*heading, *cells) for line in text.split("\n")]
    natural = max(map(cell_len, lines))
    words = [word for text in (*heading, *cells) for word in text.split()]
    longest = max((cell_len(word) for word in words), default=1)
    least = natural if numeric else min(longest, LONGEST_UNBROKEN_WORD, natural)
    return Column(heading, cells, numeric, natural, max(least, 1))


def _fits(columns: tuple[Column, ...], width: int) -> bool:
    return _span([column.least for column in columns], _NARROW_GAP) <= width


def _span(widths: list[int], gap: int) -> int:
    return sum(widths) + gap * (len(widths) - 1)


def _set(columns: tuple[Column, ...], width: int) -> Part:
    natural = [column.natural for column in columns]
    least = [column.least for column in columns]
    for gap in (_WIDE_GAP, _NARROW_GAP):
        if _span(natural, gap) <= width:
            return Part(columns, tuple(natural), gap)
    gap = _WIDE_GAP if _span(least, _WIDE_GAP) <= width else _NARROW_GAP
    widths = list(natural)
    while _span(widths, gap) > width:
        widest = max(
            (i for i in range(len(widths)) if widths[i] > least[i]),
            key=lambda i: widths[i],
            default=None,
        )
        if widest is None:
            break
        widths[widest] -= 1
    return Part(columns, tuple(widths), gap)
