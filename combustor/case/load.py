"""Reading a case file: every problem at once, each with its place."""

from __future__ import annotations

import copy
import difflib
import hashlib
import os
import re
import stat
import tomllib
from collections.abc import Mapping
from pathlib import Path
from typing import Any

from pydantic import ValidationError

from combustor.base.errors import InputError, Problem
from combustor.case.consistency import consistency_problems
from combustor.case.problems import Reporter, key_text
from combustor.case.reading import named
from combustor.case.schema import Case

_LARGEST = 4_000_000


def load_case(path: str | os.PathLike[str]) -> Case:
    """Return the case in the TOML file at ``path``.

    Raises
    ------
    InputError
        Every problem found, each with file, line, key, value and what is allowed.
    """
    name = _printable(os.fspath(path))
    case = loads_case(read_text(path), name)
    return _with_local_mechanism(case, Path(path))


def loads_case(text: str, name: str = "case") -> Case:
    """Return the case in ``text``; ``name`` stands for the file in messages."""
    document = parse(text, name)
    case = validate(document, text, name)
    case._text = text
    case._file = name
    case._sha256 = hashlib.sha256(text.encode("utf-8", "surrogatepass")).hexdigest()
    return case


def read_text(path: str | os.PathLike[str]) -> str:
    """Return the text of a file that should hold a case.

    Raises
    ------
    InputError
        Not there, not a file, not readable, too large, not text.
    """
    name = _printable(os.fspath(path))
    try:
        mode = Path(path).stat().st_mode
        if stat.S_ISDIR(mode):
            raise InputError(Problem("is a directory", "name a case file (.toml)", file=name))
        if not (stat.S_ISREG(mode) or stat.S_ISFIFO(mode)):
            raise InputError(Problem("is not a file", "name a case file (.toml)", file=name))
        with open(path, "rb") as stream:  # noqa: PTH123 - path may be any os.PathLike
            data = stream.read(_LARGEST + 1)
    except FileNotFoundError:
        raise InputError(_not_there(name, Path(path))) from None
    except ValueError:
        raise InputError(Problem("is not a file name", file=name)) from None
    except OSError as error:
        reason = (error.strerror or "cannot be read").lower()
        raise InputError(Problem(f"cannot be read: {reason}", file=name)) from None
    return _decode(data, name)


def _decode(data: bytes, name: str) -> str:
    if len(data) > _LARGEST:
        raise InputError(Problem("is too large for a case file", "at most 4 MB", file=name))
    if not data.strip():
        raise InputError(
            Problem("is empty", "`combustor new FILE` writes a case to start from", file=name)
        )
    if b"\0" in data:
        raise InputError(Problem("is a binary file", "a case is a UTF-8 text in TOML", file=name))
    try:
        return data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        problem = Problem("is not UTF-8 text", "save it as UTF-8", file=name, line=line)
        raise InputError(problem) from None


def _not_there(name: str, path: Path) -> Problem:
    try:
        siblings = [entry.name for entry in path.parent.iterdir() if entry.suffix == ".toml"]
    except OSError:
        siblings = []
    close = difflib.get_close_matches(path.name, siblings, n=1, cutoff=0.5)
    nearest = str(path.parent / close[0]) if close else None
    return Problem("there is no such file", file=name, nearest=nearest)


def _printable(name: str | bytes) -> str:
    text = name.decode("utf-8", "replace") if isinstance(name, bytes) else name
    return text if text.isprintable() else repr(text)


def parse(text: str, name: str) -> dict[str, Any]:
    """Return the document in a TOML text; InputError with the line where it breaks."""
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise InputError(_syntax_problem(str(error), text, name)) from None
    except RecursionError:
        raise InputError(Problem("is nested too deeply", file=name)) from None
    except ValueError as error:
        # a date that does not exist, an integer of thousands of digits
        problem = Problem("holds a value that cannot be read", str(error), file=name)
        raise InputError(problem) from None


def _syntax_problem(message: str, text: str, name: str) -> Problem:
    match = re.search(r"^(.*) \(at line (\d+), column (\d+)\)$", message, re.S)
    if match:
        fact, line = match[1], int(match[2])
    else:
        fact, line = message.removesuffix(" (at end of document)"), text.count("\n") + 1
    fact = fact[:1].lower() + fact[1:]
    lines = text.split("\n")
    shown = lines[line - 1].strip()[:60] if 0 < line <= len(lines) else None
    return Problem(f"not valid TOML: {fact}", value=shown, file=name, line=line)


def validate(document: Mapping[str, Any], text: str = "", name: str | None = None) -> Case:
    """Return the case a document states.

    Raises
    ------
    InputError
        Every problem found; with lines when ``text`` is the document's own.
    """
    if not document:
        advice = "`combustor new FILE` writes a case to start from"
        raise InputError(Problem("nothing is stated", advice, file=name))
    report = Reporter(name, text, document)
    problems: list[Problem] = []
    case: Case | None = None
    try:
        case = Case.model_validate(document)
    except ValidationError as error:
        problems += report.from_schema(error, Case)
    seen = {problem.key for problem in problems}
    problems += [p for p in consistency_problems(document, report) if p.key not in seen]
    if problems or case is None:
        raise InputError(sorted(problems, key=lambda problem: problem.line or 0))
    return _with_design_point(case)


def _with_design_point(case: Case) -> Case:
    if case.targets.design_point:
        return case
    rated = [point for point in case.points if point.kind == "rated"]
    name = (rated or list(case.points))[0].name
    targets = case.targets.model_copy(update={"design_point": name})
    return case.model_copy(update={"targets": targets})


def _with_local_mechanism(case: Case, path: Path) -> Case:
    """Let a mechanism file be named relative to the case file."""
    mechanism = case.model.mechanism
    if mechanism is None or Path(mechanism).is_absolute():
        return case
    local = path.parent / mechanism
    if not local.is_file():
        return case
    model = case.model.model_copy(update={"mechanism": str(local.resolve())})
    return case.model_copy(update={"model": model})


def override(case: Case, key: str, value: float | str) -> Case:
    """Return the case with one quantity changed.

    Parameters
    ----------
    key : str
        Dotted path: ``targets.pressure_loss``, ``points.NAME.air_flow`` for one point,
        ``points.*.air_flow`` for all, ``hardware.openings.NAME.diameter`` for a row.
    value : float or str
        SI number (load in percent), or text with a unit.

    Raises
    ------
    InputError
        Unknown path, or a value that the case file would not take either.
    """
    document = case.model_dump(exclude_none=True)
    document = copy.deepcopy(_plain_lists(document))
    targets = _find(document, key.split("."), ())
    if not targets:
        raise InputError(Problem("no such key in this case", _choices(document, key), key=key))
    for node, last in targets:
        node[last] = value
    changed = validate(document)
    changed._text, changed._file, changed._sha256 = case._text, case._file, case._sha256
    return changed


def _plain_lists(node: Any) -> Any:
    if isinstance(node, Mapping):
        return {key: _plain_lists(value) for key, value in node.items()}
    if isinstance(node, list | tuple):
        return [_plain_lists(item) for item in node]
    return node


def _find(
    node: Any, parts: list[str], path: tuple[str | int, ...]
) -> list[tuple[dict[str, Any], str]]:
    """Return (table, key) pairs a dotted path points at; row names may hold dots."""
    if isinstance(node, dict):
        if len(parts) == 1:
            return [(node, parts[0])] if not isinstance(node.get(parts[0]), dict | list) else []
        return _find(node.get(parts[0]), parts[1:], (*path, parts[0]))
    if not isinstance(node, list):
        return []
    for length in range(1, len(parts)):
        name = ".".join(parts[:length])
        rows = [
            row for row in node if isinstance(row, dict) and name in ("*", str(row.get("name")))
        ]
        if rows:
            return [found for row in rows for found in _find(row, parts[length:], path)]
    return []


def _choices(document: Mapping[str, Any], key: str) -> str:
    head = key.split(".")[0]
    if head == "points":
        names = ", ".join(row["name"] for _, row in named(document, "points"))
        return f"write points.NAME.KEY or points.*.KEY; points: {names}"
    if head in document:
        return f"write {key_text((head,))}.KEY"
    return f"write TABLE.KEY; tables: {', '.join(k for k in document if k != 'title')}"
