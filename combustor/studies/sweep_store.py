"""The results file of a sweep: JSON lines, appended as ratings finish, resumed by the same sweep.

The first line says which sweep it is. Every further line is one rating. A line that was cut off
is dropped and solved again; a second writer is refused while the first one runs.
"""

from __future__ import annotations

import json
import os
from collections.abc import Iterator, Mapping
from contextlib import suppress
from dataclasses import dataclass
from pathlib import Path
from types import TracebackType
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.studies.sweep_outcome import Outcome

KIND = "combustor sweep results"


@dataclass(frozen=True)
class Result:
    """One finished rating.

    Parameters
    ----------
    row : str
        Label of the row.
    point : str
    outcome : Outcome
    document : mapping or None
        The full record, where one was asked for.
    """

    row: str
    point: str
    outcome: Outcome
    document: Mapping[str, Any] | None


class ResultsFile:
    """An open results file.

    Parameters
    ----------
    path : Path
        Made when it is not there.
    header : mapping
        What this sweep is; a file of another sweep is refused.
    replace : bool
        Begin anew whatever the file holds.

    Raises
    ------
    InputError
        It cannot be written, another sweep is writing to it, or it holds something else.
    """

    def __init__(self, path: Path, header: Mapping[str, Any], replace: bool = False) -> None:
        self.path = path
        self.dropped = 0
        self.results: list[Result] = []
        self._descriptor = _open(path)
        try:
            _lock(self._descriptor, path)
            if replace:
                os.ftruncate(self._descriptor, 0)
            self._take_up({"kind": KIND, **header})
        except BaseException:
            os.close(self._descriptor)
            raise

    def append(self, result: Result) -> None:
        """Write one finished rating; it is in the file when this returns."""
        line = {
            "row": result.row,
            "point": result.point,
            "outcome": result.outcome.written(),
            "document": result.document,
        }
        self._write(line)
        self.results.append(result)

    def close(self) -> None:
        """Give the file up, and with it the lock."""
        os.close(self._descriptor)

    def __enter__(self) -> ResultsFile:
        return self

    def __exit__(
        self,
        kind: type[BaseException] | None,
        error: BaseException | None,
        trace: TracebackType | None,
    ) -> None:
        self.close()

    def _take_up(self, header: Mapping[str, Any]) -> None:
        os.lseek(self._descriptor, 0, os.SEEK_SET)
        with os.fdopen(os.dup(self._descriptor), "rb") as stream:
            data = stream.read()
        whole = data.rfind(b"\n") + 1
        own = _encoded(header)
        if not whole:
            if not own.startswith(data):
                raise _foreign(self.path)
            os.ftruncate(self._descriptor, 0)
            os.lseek(self._descriptor, 0, os.SEEK_SET)
            self._write(header)
            return
        first, *lines = data[:whole].splitlines()
        _check_header(first, header, self.path)
        self.dropped = int(whole < len(data))
        self.results = list(self._read(lines))
        os.ftruncate(self._descriptor, whole)
        os.lseek(self._descriptor, whole, os.SEEK_SET)

    def _read(self, lines: list[bytes]) -> Iterator[Result]:
        for line in lines:
            try:
                found = json.loads(line)
                yield Result(
                    found["row"],
                    found["point"],
                    Outcome.read(found["outcome"]),
                    found["document"],
                )
            except (ValueError, KeyError, TypeError):
                self.dropped += 1

    def _write(self, line: Mapping[str, Any]) -> None:
        data = memoryview(_encoded(line))
        while data:
            data = data[os.write(self._descriptor, data) :]


def _encoded(line: Mapping[str, Any]) -> bytes:
    return json.dumps(line, allow_nan=False).encode() + b"\n"


def _open(path: Path) -> int:
    try:
        if path.exists() and not path.is_file():
            raise InputError(
                Problem("is not a file", "name a file for the results", file=str(path))
            )
        return os.open(path, os.O_RDWR | os.O_CREAT | getattr(os, "O_BINARY", 0), 0o666)
    except (OSError, ValueError) as error:
        reason = (getattr(error, "strerror", None) or "not a file name").lower()
        raise InputError(
            Problem(f"cannot be written: {reason}", "name another file", file=str(path))
        ) from None


def _lock(descriptor: int, path: Path) -> None:
    """Hold the file against other sweeps; the system lets go of it when this process ends."""
    try:
        import fcntl
    except ImportError:
        _lock_on_windows(descriptor, path)
        return
    try:
        fcntl.flock(descriptor, fcntl.LOCK_EX | fcntl.LOCK_NB)
    except BlockingIOError:
        raise _busy(path) from None
    except OSError as error:
        raise InputError(
            Problem(
                f"cannot be locked: {(error.strerror or 'unknown reason').lower()}",
                "name a file on another disk",
                file=str(path),
            )
        ) from None


def _lock_on_windows(descriptor: int, path: Path) -> None:
    import importlib

    msvcrt = importlib.import_module("msvcrt")
    # far beyond the end: a byte that no result is ever written to
    os.lseek(descriptor, 1 << 40, os.SEEK_SET)
    try:
        msvcrt.locking(descriptor, msvcrt.LK_NBLCK, 1)
    except OSError:
        raise _busy(path) from None


def _busy(path: Path) -> InputError:
    return InputError(
        Problem(
            "another sweep is writing to it",
            "wait for it to end, or name another file",
            file=str(path),
        )
    )


def _foreign(path: Path) -> InputError:
    return InputError(
        Problem(
            "holds something other than the results of a sweep", "name another file", file=str(path)
        )
    )


def _check_header(first: bytes, header: Mapping[str, Any], path: Path) -> None:
    found: Any = None
    with suppress(ValueError):
        found = json.loads(first)
    if not isinstance(found, dict) or found.get("kind") != KIND:
        raise _foreign(path)
    own = json.loads(_encoded(header))
    if found == own:
        return
    differ = [key for key in own if found.get(key) != own[key]]
    words = {
        "version": "written by another version of the tool",
        "vary": "it varies other entries",
        "points": "other operating points",
        "digest": "the case or its mechanism has changed",
        "documents": "it holds trends only",
        "operability": "with or without the margins",
    }
    said = [
        words[key]
        for key in ("version", "vary", "points", "operability", "documents")
        if key in differ
    ]
    raise InputError(
        Problem(
            f"holds the results of another sweep: {', '.join(said) or words['digest']}",
            "name another file, or ask for it to be begun anew",
            file=str(path),
        )
    )
