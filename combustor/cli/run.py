"""Run one command: plain errors on stderr, the documented exit code, and never a traceback."""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    import argparse

INTERNAL_ERROR = 1
INTERRUPTED = 130
BROKEN_PIPE = 141


def main(argv: Sequence[str] | None = None) -> int:
    """Run the command line ``argv`` (default: the process's own) and return the exit code."""
    if sys.stdout is None:
        from pathlib import Path

        sys.stdout = Path(os.devnull).open("w", encoding="utf-8")  # noqa: SIM115 - open as long as the process
    try:
        code = _run(sys.argv[1:] if argv is None else list(argv))
        sys.stdout.flush()
    except BrokenPipeError:
        _silence_stdout()
        return BROKEN_PIPE
    except KeyboardInterrupt:
        return INTERRUPTED
    except OSError as error:
        _silence_stdout()
        _complain(f"combustor: the result cannot be written: {error.strerror or error}")
        return INTERNAL_ERROR
    return code


def _run(argv: list[str]) -> int:
    from combustor.cli.arguments import ArgumentError, parse

    try:
        arguments = parse(argv)
    except ArgumentError as error:
        _complain(str(error))
        return 2
    except SystemExit as finished:
        return int(finished.code or 0)
    return _answer(arguments)


def _answer(arguments: argparse.Namespace) -> int:
    import warnings

    from combustor.base.errors import CombustorError, InputError
    from combustor.cli.complaint import complaint, internal_complaint

    # The matrices are small: a second BLAS thread only burns the other core. Read by numpy
    # when it is first imported, which is below.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            from combustor.cli.commands import answer

            answered = answer(arguments)
    except CombustorError as error:
        if isinstance(error, InputError):
            from combustor.cli.place import placed

            error = placed(error, arguments)
        _complain(complaint(error))
        return error.exit_code
    except Exception as error:
        if os.environ.get("COMBUSTOR_DEBUG"):
            raise
        _complain(internal_complaint(error))
        return INTERNAL_ERROR
    if answered.notes:
        _complain("\n".join(answered.notes))
    sys.stdout.write(answered.text)
    return answered.code


def _complain(text: str) -> None:
    if sys.stderr is not None:
        sys.stderr.write(f"{text}\n")


def _silence_stdout() -> None:
    # Else the interpreter tries to flush what nobody reads and reports that at exit.
    try:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
    except (OSError, ValueError):
        return
