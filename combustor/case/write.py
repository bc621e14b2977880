"""Writing case files: the user's comments and order stay, nothing is lost half-way."""

from __future__ import annotations

import contextlib
import os
import tempfile
import tomllib
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.case.load import loads_case, parse
from combustor.case.schema import Case

HEADING = (
    "The metal, per can. Edit a row, then rate again: areas follow from diameters.",
    "x counts from the dome face; count is holes per can.",
)
"""Comment above a [hardware] table that is added to a case."""


def write_case(
    path: str | os.PathLike[str],
    case: Case | str,
    hardware: Mapping[str, Any] | None = None,
    force: bool = False,
) -> str:
    """Write a case to ``path``, with the metal ``hardware`` in it, and return the text.

    Parameters
    ----------
    case : Case or str
        A case, or the text of one.
    hardware : mapping, optional
        The ``[hardware]`` table to put in (``hardware.to_case.table_of``).
    force : bool
        Replace a file that is there.

    Raises
    ------
    InputError
        The file is there and ``force`` is not given, or cannot be written.
    """
    text = case if isinstance(case, str) else text_of(case)
    if hardware is not None:
        text = complete(text, hardware)
    write_text(path, text, force)
    return text


def text_of(case: Case) -> str:
    """Return a case as TOML: its own text with what has changed since, comments kept."""
    import tomlkit

    if not case.text:
        return tomlkit.dumps(
            _item(_plain(case.model_dump(exclude_none=True, exclude_defaults=True)))
        )
    read = loads_case(case.text, case.file)
    if read == case:
        return case.text
    document = tomlkit.parse(case.text)
    written = parse(case.text, case.file)
    _merge(document, _differences(_whole(read), _whole(case), written))
    return tomlkit.dumps(document)


def complete(text: str, hardware: Mapping[str, Any]) -> str:
    """Return a case text with its ``[hardware]`` table replaced or added.

    Comments outside the table stay, and so do those beside rows and keys that stay.
    """
    import tomlkit

    document = tomlkit.parse(text)
    wanted = parse(text, "case") | {"hardware": hardware}
    if "hardware" not in document:
        document.add(tomlkit.nl())
        for line in HEADING:
            document.add(tomlkit.comment(line))
    _merge(document, wanted)
    result = tomlkit.dumps(document)
    if tomllib.loads(result) != _plain(wanted):
        raise InputError(
            Problem(
                "its tables stand in an order that cannot be completed",
                "gather all of [hardware] in one place, or leave it out",
            )
        )
    return result


def write_text(path: str | os.PathLike[str], text: str, force: bool = False) -> None:
    """Write a text file in one step: whole, or not at all.

    Raises
    ------
    InputError
        The file is there and ``force`` is not given, or cannot be written.
    """
    name = os.fspath(path)
    target = Path(path)
    try:
        if not force and os.path.lexists(target):
            raise InputError(
                Problem("is there already", "choose another name or --force", file=name)
            )
        target = target.resolve() if target.is_symlink() else target
        if target.is_dir():
            raise InputError(Problem("is a directory", "name a file", file=name))
        _replace(target, text)
    except (ValueError, RuntimeError):
        raise InputError(Problem("is not a file name", file=name)) from None
    except OSError as error:
        reason = (error.strerror or "unknown reason").lower()
        raise InputError(Problem(f"cannot be written: {reason}", file=name)) from None


def _replace(target: Path, text: str) -> None:
    """Write beside the target and rename: a reader never sees half a file."""
    handle, temporary = tempfile.mkstemp(prefix=f".{target.name[:40]}.", dir=target.parent)
    try:
        with os.fdopen(handle, "w", encoding="utf-8", newline="") as stream:
            stream.write(text)
        Path(temporary).chmod(_mode_of(target))
        Path(temporary).replace(target)
    except BaseException:
        with contextlib.suppress(OSError):
            Path(temporary).unlink()
        raise


def _mode_of(target: Path) -> int:
    if target.exists():
        return target.stat().st_mode & 0o777
    mask = os.umask(0)
    os.umask(mask)
    return 0o666 & ~mask


def _whole(case: Case) -> Any:
    return _plain(case.model_dump(exclude_none=True))


def _plain(node: Any) -> Any:
    if isinstance(node, Mapping):
        return {str(key): _plain(value) for key, value in node.items()}
    if isinstance(node, list | tuple):
        return [_plain(item) for item in node]
    return node


def _differences(read: Any, wanted: Any, written: Any) -> Any:
    """Return what the file should say: the user's own writing wherever that still holds.

    ``read`` and ``wanted`` are the whole case, defaults included, as it was and as it is to
    be; ``written`` is the document as the user wrote it.
    """
    if read == wanted:
        return written
    if isinstance(wanted, dict) and isinstance(read, dict):
        written = written if isinstance(written, dict) else {}
        return {
            key: _differences(read.get(key), wanted[key], written.get(key))
            for key in (*written, *(key for key in wanted if key not in written))
            if key in wanted and (key in written or read.get(key) != wanted[key])
        }
    lists = isinstance(wanted, list) and isinstance(read, list) and isinstance(written, list)
    if lists and len(wanted) == len(read) == len(written):
        return [_differences(r, w, t) for r, w, t in zip(read, wanted, written, strict=True)]
    return wanted


def _merge(old: Any, new: Mapping[str, Any]) -> None:
    """Make the tomlkit table ``old`` say ``new``, touching only what differs."""
    for key in [key for key in old if key not in new]:
        del old[key]
    for key, value in new.items():
        if key not in old:
            old[key] = _item(value)
        elif not _same(old[key], value):
            _change(old, key, value)


def _change(old: Any, key: str, value: Any) -> None:
    current = old[key]
    if isinstance(current, Mapping) and isinstance(value, Mapping):
        _merge(current, value)
    elif _rows_match(current, value):
        for row, wanted in zip(current, value, strict=True):
            _merge(row, wanted)
    else:
        old[key] = _item(value)


def _rows_match(current: Any, wanted: Any) -> bool:
    """Return whether two lists of tables have the same names in the same order."""
    if not isinstance(current, list) or not isinstance(wanted, Sequence) or not current:
        return False
    if len(current) != len(wanted) or isinstance(wanted, str):
        return False
    return all(
        isinstance(row, Mapping)
        and isinstance(want, Mapping)
        and row.get("name") == want.get("name")
        for row, want in zip(current, wanted, strict=True)
    )


def _same(current: Any, value: Any) -> bool:
    unwrapped = current.unwrap() if hasattr(current, "unwrap") else current
    plain = _plain(value)
    return bool(type(unwrapped) is type(plain) and unwrapped == plain)


def _item(value: Any, inside: bool = False) -> Any:
    """Return a tomlkit item: tables and rows as blocks, small tables on one line."""
    import tomlkit

    if isinstance(value, Mapping):
        table = tomlkit.inline_table() if inside else tomlkit.table()
        for key, item in value.items():
            table.add(str(key), _item(item, inside or _is_small(item)))
        return table
    if isinstance(value, list | tuple):
        if value and all(isinstance(item, Mapping) for item in value) and not inside:
            rows = tomlkit.aot()
            for row in value:
                rows.append(_row(row))
            return rows
        return tomlkit.item([_plain(item) for item in value])
    return tomlkit.item(value)


def _row(row: Mapping[str, Any]) -> Any:
    import tomlkit

    table = tomlkit.table()
    # a block below a row ends the row: plain values first
    blocks = {k: v for k, v in row.items() if isinstance(v, Mapping) and not _is_small(v)}
    for key, item in row.items():
        if key not in blocks:
            table.add(str(key), _item(item, inside=True))
    for key, item in blocks.items():
        table.add(str(key), _item(item))
    return table


def _is_small(item: Any) -> bool:
    """A table of up to three plain values reads best on one line."""
    return (
        isinstance(item, Mapping)
        and len(item) <= 3
        and not any(isinstance(value, Mapping | list | tuple) for value in item.values())
    )
