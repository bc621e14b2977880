"""One line that says how far a study has come."""

from __future__ import annotations

from typing import TextIO

from combustor.studies.progress import Progress

_WIDTH = 79


def progress_line(progress: Progress) -> str:
    """Return count, failures, elapsed and remaining time in words."""
    words = f"{progress.finished} of {progress.total} ratings"
    if progress.resumed:
        words += f", {progress.resumed} from before"
    if progress.failed:
        words += f", {progress.failed} without a result"
    words += f"; {clock(progress.elapsed)} so far"
    if progress.remaining is not None:
        words += f", about {clock(progress.remaining)} left"
    return words


def clock(seconds: float) -> str:
    """Return a time as 0:05 or 1:02:03."""
    minutes, rest = divmod(round(seconds), 60)
    hours, minutes = divmod(minutes, 60)
    return f"{hours}:{minutes:02d}:{rest:02d}" if hours else f"{minutes}:{rest:02d}"


class ProgressLine:
    """Draws progress over itself on a terminal, and nowhere else.

    Parameters
    ----------
    stream : text stream or None
        Where to; nothing is drawn on what is no terminal.
    """

    def __init__(self, stream: TextIO | None) -> None:
        self.stream = stream if stream is not None and stream.isatty() else None
        self.last: Progress | None = None

    def __call__(self, progress: Progress) -> None:
        """Draw it."""
        self.last = progress
        if self.stream is not None:
            self.stream.write(f"\r{progress_line(progress)[:_WIDTH]:<{_WIDTH}}")
            self.stream.flush()

    def clear(self) -> None:
        """Wipe the line."""
        if self.stream is not None and self.last is not None:
            self.stream.write(f"\r{' ' * _WIDTH}\r")
            self.stream.flush()
