"""Errors as the plain lines a user reads on stderr."""

from __future__ import annotations

import traceback
from pathlib import Path

from combustor.base.errors import CombustorError, InfeasibleError, InputError
from combustor.report.field import printable


def complaint(error: CombustorError) -> str:
    """Return the lines of an error raised on purpose."""
    if isinstance(error, InputError):
        lines = [str(problem) for problem in error.problems] + ["nothing was computed"]
    elif isinstance(error, InfeasibleError):
        lines = _chain(error)
    else:
        lines = str(error).splitlines()
    return "\n".join(printable(line) for line in lines)


def internal_complaint(error: Exception) -> str:
    """Return the one line of an error nobody meant: what, where, and how to see more."""
    frames = traceback.extract_tb(error.__traceback__)
    place = f" at {Path(frames[-1].filename).name}:{frames[-1].lineno}" if frames else ""
    words = printable(" ".join(str(error).split()))[:200]
    return (
        f"combustor: internal error, {type(error).__name__}: {words}{place}; "
        "COMBUSTOR_DEBUG=1 shows where it came from"
    )


def _chain(error: InfeasibleError) -> list[str]:
    first, *rest = error.chain or ("the targets exclude each other",)
    lines = [f"no design meets the targets: {first}"]
    lines += [f"  therefore {cause}" for cause in rest]
    if error.advice:
        lines.append(f"  to change: {error.advice}")
    return lines
