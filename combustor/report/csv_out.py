"""Tables as CSV files: one file a table, whole or not at all, nothing overwritten unasked."""

from __future__ import annotations

import csv
import io
from collections.abc import Iterable
from pathlib import Path
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.case.write import write_text
from combustor.report.document import Table


def csv_text(table: Table) -> str:
    """Return the table as CSV, unit in the header, full precision, empty where no result."""
    buffer = io.StringIO()
    writer = csv.writer(buffer, lineterminator="\n")
    writer.writerow([field.key for field in table.fields])
    for values in table.values():
        writer.writerow([_cell(values[field.key]) for field in table.fields])
    return buffer.getvalue()


def write_csv(tables: Iterable[Table], directory: Path, force: bool = False) -> tuple[Path, ...]:
    """Write each table to ``directory``/name.csv and return the paths.

    Raises
    ------
    InputError
        When a file is there already and ``force`` is not given (nothing is written then), or
        the directory cannot be written to.
    """
    texts = {directory / f"{table.name}.csv": csv_text(table) for table in tables}
    check_free(texts, force)
    try:
        directory.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        raise InputError(
            Problem(
                f"CSV files cannot be written: {error.strerror or error}",
                "name a folder that can be written to",
                key="--csv",
                value=str(directory),
            )
        ) from error
    for path, text in texts.items():
        write_text(path, text, force=force)
    return tuple(texts)


def check_free(paths: Iterable[Path], force: bool) -> None:
    """Raise InputError naming every path that is there already, unless ``force``."""
    taken = [] if force else [path for path in paths if path.exists()]
    if taken:
        raise InputError(
            [
                Problem("the file is there already", "give --force to replace it", file=str(path))
                for path in taken
            ]
        )


def _cell(value: Any) -> str:
    if value is None:
        return ""
    if isinstance(value, bool):
        return "true" if value else "false"
    return repr(value) if isinstance(value, float) else str(value)
