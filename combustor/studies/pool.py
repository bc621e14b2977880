"""Where a study's tasks go: the caller's executor, this process, or processes of our own."""

from __future__ import annotations

from collections.abc import Callable
from concurrent.futures import Executor, Future
from typing import Any

from combustor.studies.executor import InThisProcess, WorkerProcesses

MOST_PENDING = 256  # tasks an executor of the caller's is given at once


class Pool:
    """The caller's executor; or our own, made anew when its processes die."""

    def __init__(self, given: Executor | None, workers: int) -> None:
        self.given = given
        self.workers = workers
        self.own: WorkerProcesses | None = None
        self.here = InThisProcess() if given is None and workers == 1 else None
        self.room = MOST_PENDING if given is not None else 4 * workers
        if self.here is not None:
            self.room = 1

    def submit(self, work: Callable[..., Any], *arguments: Any) -> Future[Any]:
        """Hand a task out."""
        executor = self.given or self.here or self.own
        if executor is None:
            executor = self.own = WorkerProcesses(self.workers)
        return executor.submit(work, *arguments)

    def renew(self) -> bool:
        """Drop a broken executor; False when it is not our own."""
        if self.own is None:
            return False
        self.close()
        return True

    def close(self) -> None:
        """End processes of our own."""
        if self.own is not None:
            self.own.stop()
            self.own = None
