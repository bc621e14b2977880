"""How far a study has come, and how long it will still take."""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass


@dataclass(frozen=True)
class Progress:
    """How far a sweep has come.

    Parameters
    ----------
    total, finished, resumed, failed : int
        Ratings in all, with a result, of those found in the results file, without a flame or an
        answer.
    elapsed : float
        s.
    remaining : float or None
        s, at the pace so far; None before the first.
    """

    total: int
    finished: int
    resumed: int
    failed: int
    elapsed: float
    remaining: float | None


Report = Callable[[Progress], None]


class Pace:
    """A clock that judges the time left by the pace since the first result."""

    def __init__(self) -> None:
        self.begun = time.monotonic()
        self.first: tuple[float, int] | None = None

    def times(self, finished: int, left: int) -> tuple[float, float | None]:
        """Return elapsed and remaining time, s; None before there is a pace.

        Starting up counts once: it says nothing of what is left.

        Parameters
        ----------
        finished, left : int
            Since the start of this clock, and still to do.
        """
        elapsed = time.monotonic() - self.begun
        if left == 0:
            return elapsed, 0.0
        if finished < 1:
            return elapsed, None
        if self.first is None:
            self.first = (elapsed, finished)
        since, more = elapsed - self.first[0], finished - self.first[1]
        return elapsed, since / more * left if more else elapsed / finished * left
