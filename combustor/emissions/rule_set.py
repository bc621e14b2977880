"""Rule sets: those shipped, and a user's own permit file; every wrong line refused at once."""

from __future__ import annotations

import difflib
import os
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, replace
from functools import cache
from importlib.resources import files
from pathlib import Path
from typing import Any

from pydantic import ValidationError

from combustor.base.errors import InputError, Problem
from combustor.case.load import parse, read_text
from combustor.case.problems import Reporter
from combustor.emissions.rule_schema import Row, RuleSetTable

_SHIPPED = files("combustor.emissions").joinpath("rules")


@dataclass(frozen=True)
class RuleSet:
    """A rule set under the name it goes by.

    Parameters
    ----------
    name : str
        Of a shipped set, or the stem of the user's file.
    table : RuleSetTable
        What the file says.
    own : bool
        Whether it is the user's.
    """

    name: str
    table: RuleSetTable
    own: bool = False

    def row(self, name: str) -> Row:
        """Return the row called ``name``; KeyError when there is none."""
        for row in self.table.limits:
            if row.row == name:
                return row
        raise KeyError(name)


def names() -> tuple[str, ...]:
    """Return the names of the shipped sets, in alphabetical order."""
    found = [entry.name for entry in _SHIPPED.iterdir() if entry.name.endswith(".toml")]
    return tuple(sorted(name.removesuffix(".toml") for name in found))


def shipped_text(name: str) -> str:
    """Return the file of a shipped set."""
    return _SHIPPED.joinpath(f"{name}.toml").read_text(encoding="utf-8")


@cache
def shipped(name: str) -> RuleSet:
    """Return a shipped set."""
    return RuleSet(name, loads_rules(shipped_text(name), f"{name}.toml"))


def find_rules(name: str, folder: str | os.PathLike[str] = ".") -> RuleSet:
    """Return a rule set by the name of a shipped one, or by path.

    Parameters
    ----------
    name : str
    folder : path
        Where a relative path starts: the case file's folder.

    Raises
    ------
    InputError
        No such set and no such file; a file that is wrong, with every problem in it.
    """
    known = names()
    if name in known:
        return shipped(name)
    for path in (Path(folder) / name, Path(name)):
        if path.suffix == ".toml" and (path.is_file() or path.is_absolute()):
            return RuleSet(path.stem, loads_rules(read_text(path), str(path)), own=True)
    close = difflib.get_close_matches(name, known, n=1, cutoff=0.4)
    raise InputError(
        Problem(
            "no such rule set",
            f"shipped: {', '.join(known)}; or the path of a .toml file of your own",
            "rules",
            name,
            nearest=close[0] if close else None,
        )
    )


def loads_rules(text: str, name: str = "rules") -> RuleSetTable:
    """Return what a rule file says.

    Raises
    ------
    InputError
        Every problem found, each with file, line, key and what is allowed.
    """
    document = parse(text, name)
    report = Reporter(name, text, document)
    problems: list[Problem] = []
    table: RuleSetTable | None = None
    try:
        table = RuleSetTable.model_validate(document)
    except ValidationError as error:
        problems += map(_worded, report.from_schema(error, RuleSetTable))
    seen = {problem.key for problem in problems}
    problems += [p for p in _consistency(document, report) if p.key not in seen]
    if problems or table is None:
        raise InputError(sorted(problems, key=lambda problem: problem.line or 0))
    return table


def _worded(problem: Problem) -> Problem:
    # at the top of a case file stand tables, at the top of a rule file mostly plain keys
    if problem.what == "missing" and problem.key and problem.allowed.startswith("a ["):
        return replace(problem, allowed=f"add {problem.key} = ...")
    return problem


def _consistency(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    rows = document.get("limits")
    rows = [row for row in rows if isinstance(row, Mapping)] if isinstance(rows, list) else []
    named = [row.get("row") for row in rows]
    conditions = document.get("conditions")
    conditions = conditions if isinstance(conditions, Mapping) else {}
    for index, row in enumerate(rows):
        at: tuple[str | int, ...] = ("limits", index)
        if named.index(row.get("row")) != index:
            yield report.problem((*at, "row"), "two rows have this name", "", row.get("row"))
        if ("limit" in row) == ("terms" in row):
            yield report.problem((*at, "limit"), "one of limit and terms is needed")
        for key in ("given", "unless"):
            if key in row and row[key] not in conditions:
                allowed = f"conditions named here: {', '.join(conditions) or 'none'}"
                yield report.problem((*at, key), "no such condition", allowed, row[key])
        if "prorate_with" in row and row["prorate_with"] not in named:
            yield report.problem((*at, "prorate_with"), "no such row", "", row["prorate_with"])
    date, review = document.get("date"), document.get("review")
    if type(date) is type(review) and date is not None and review < date:
        yield report.problem(("review",), "the review date lies before the date")
