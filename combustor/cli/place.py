"""Where in the case file a problem stands that was found after the file had been read."""

from __future__ import annotations

import argparse
from dataclasses import replace
from pathlib import Path

from combustor.base.errors import InputError, Problem

FUEL = (("fuel", "name"), ("fuel", "composition"), ("fuel", "certificate"), ("fuel",))
# Keys of problems that fuel and kinetics name, and the entries of a case they may come from.
ENTRIES = {
    "fuel": FUEL,
    "composition": FUEL,
    "mechanism": (("model", "mechanism"), *FUEL),
}


def placed(error: InputError, arguments: argparse.Namespace) -> InputError:
    """Return the error with file, line and key of every entry that the case file answers for.

    A fuel named on the command line is not in the file: nothing is added then.
    """
    path = getattr(arguments, "case", None)
    if not isinstance(path, str) or getattr(arguments, "fuel", None):
        return error
    if not Path(path).is_file():  # a pipe can be read only once
        return error
    if all(problem.file or problem.key not in ENTRIES for problem in error.problems):
        return error
    from combustor.case.lines import line_index
    from combustor.case.load import read_text

    lines = line_index(read_text(path))
    return InputError([_placed(problem, path, lines) for problem in error.problems])


def _placed(problem: Problem, path: str, lines: dict[tuple[str | int, ...], int]) -> Problem:
    if problem.file is not None:
        return problem
    for entry in ENTRIES.get(problem.key or "", ()):
        if entry in lines:
            key = ".".join(str(part) for part in entry)
            return replace(problem, file=path, line=lines[entry], key=key)
    return problem
