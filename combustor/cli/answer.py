"""What a command answers with, and the tables it writes beside it."""

from __future__ import annotations

import argparse
import sys
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from pathlib import Path

from combustor.base.errors import EXIT_GOOD
from combustor.report.csv_out import check_free, write_csv
from combustor.report.document import Block, Table
from combustor.report.terminal import Page, render


@dataclass(frozen=True)
class Answer:
    """Text for stdout, the exit code, and lines for stderr."""

    text: str
    code: int = EXIT_GOOD
    notes: tuple[str, ...] = ()


def set_report(blocks: Iterable[Block], page: Page | None = None) -> str:
    """Return a report as text for stdout."""
    return render(blocks, page or Page.of(sys.stdout)).lstrip("\n")


def check_csv(arguments: argparse.Namespace, names: Sequence[str]) -> None:
    """Refuse to replace tables unasked, before any work."""
    if arguments.csv is not None:
        check_free((Path(arguments.csv) / f"{name}.csv" for name in names), arguments.force)


def write_tables(arguments: argparse.Namespace, tables: Iterable[Table]) -> tuple[str, ...]:
    """Write the tables that ``--csv`` asks for and return what to say of it."""
    if arguments.csv is None:
        return ()
    paths = write_csv(tables, Path(arguments.csv), arguments.force)
    return tuple(f"wrote {path}" for path in paths)
