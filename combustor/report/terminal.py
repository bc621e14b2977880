"""Set a report as terminal text of a given width, with or without colour."""

from __future__ import annotations

import io
import os
import shutil
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import TextIO

from rich.box import Box
from rich.console import Console
from rich.padding import Padding
from rich.table import Table as RichTable
from rich.text import Text

from combustor.report.document import Block, Facts, Heading, Plot, Prose, Table
from combustor.report.field import printable
from combustor.report.layout import Part, fit
from combustor.report.plot import drawn_plot
from combustor.report.theme import STYLES

WIDEST = 100
NARROWEST = 40
_INDENT = 4

_RULED = Box("    \n    \n ── \n    \n    \n    \n    \n    \n")
_RULED_ASCII = Box("    \n    \n -- \n    \n    \n    \n    \n    \n", ascii=True)


@dataclass(frozen=True)
class Page:
    """How wide a report is set, whether in colour, and whether only ASCII can be shown."""

    width: int = WIDEST
    colour: bool = False
    ascii_only: bool = False

    @classmethod
    def of(cls, stream: TextIO, environment: Mapping[str, str] = os.environ) -> Page:
        """Return the page that suits ``stream``: plain for pipes, NO_COLOR and dumb terminals."""
        terminal = stream.isatty()
        dumb = environment.get("TERM", "").lower() in ("dumb", "unknown")
        width = shutil.get_terminal_size((WIDEST, 24)).columns
        encoding = (getattr(stream, "encoding", None) or "ascii").lower()
        return cls(
            width=min(max(width, NARROWEST), WIDEST),
            colour=terminal and not dumb and not environment.get("NO_COLOR"),
            ascii_only=not encoding.startswith("utf"),
        )


def render(blocks: Iterable[Block], page: Page) -> str:
    """Return the report as text; the same blocks and page give the same text."""
    buffer = io.StringIO()
    console = Console(
        file=buffer,
        width=page.width,
        height=1000,
        color_system="standard" if page.colour else None,
        force_terminal=page.colour,
        no_color=not page.colour,
        legacy_windows=False,
        highlight=False,
        markup=False,
        emoji=False,
    )
    for block in blocks:
        _draw(console, block, page)
    text = buffer.getvalue()
    if page.colour:
        return text
    return "\n".join(line.rstrip() for line in text.split("\n"))


def _draw(console: Console, block: Block, page: Page) -> None:
    if isinstance(block, Heading):
        console.print()
        console.print(Text(printable(block.text), style=STYLES[block.mark or "heading"]))
    elif isinstance(block, Prose):
        console.print(Text(printable(block.text), overflow="fold"))
    elif isinstance(block, Facts):
        console.print(_facts(block))
    elif isinstance(block, Plot):
        console.print()
        console.print(Text(printable(block.title), style=STYLES["title"], overflow="fold"))
        for line in drawn_plot(block, page.width, page.ascii_only):
            console.print(Text(line), no_wrap=True, overflow="crop")
    else:
        _draw_table(console, block, page)


def _facts(block: Facts) -> RichTable:
    grid = RichTable.grid(padding=(0, 2, 0, 0))
    grid.add_column(no_wrap=True)
    grid.add_column(overflow="fold")
    for label, text in block.pairs:
        grid.add_row(Text(printable(label), style=STYLES["label"]), Text(printable(text)))
    return grid


def _draw_table(console: Console, table: Table, page: Page) -> None:
    console.print()
    parts = fit(table, page.width)
    lines = range(len(table.records))
    for number, part in enumerate(parts):
        title = table.title if number == 0 else f"{table.title}, continued"
        console.print(Text(printable(title), style=STYLES["title"], overflow="fold"))
        if not table.below or number < len(parts) - 1:
            console.print(_part(part, lines, table.marks, page))
            continue
        console.print(_part(part, (), table.marks, page))
        for index in lines:
            console.print(_part(part, (index,), table.marks, page, header=False))
            if table.below[index]:
                remark = Text(printable(table.below[index]), overflow="fold")
                console.print(Padding(remark, (0, 0, 0, _INDENT)))


def _part(
    part: Part, lines: Sequence[int], marks: Mapping[int, str], page: Page, header: bool = True
) -> RichTable:
    # Rich draws one blank between columns from the box; the rest of the gap is padding.
    drawn = RichTable(
        box=_RULED_ASCII if page.ascii_only else _RULED,
        show_header=header,
        show_edge=False,
        pad_edge=False,
        padding=(0, part.gap - 1, 0, 0),
        header_style=STYLES["header"],
        border_style=STYLES["rule"],
    )
    for column, width in zip(part.columns, part.widths, strict=True):
        drawn.add_column(
            Text("\n".join(column.heading).rstrip()),
            justify="right" if column.numeric else "left",
            no_wrap=column.numeric,
            overflow="fold",
            width=width,
        )
    for index in lines:
        style = STYLES[marks.get(index, "")]
        drawn.add_row(*(Text(column.cells[index]) for column in part.columns), style=style)
    return drawn
