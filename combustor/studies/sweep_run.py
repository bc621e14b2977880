"""Solving a plan: ready tasks to an executor, finished ones to the store, until none is left."""

from __future__ import annotations

from collections import deque
from collections.abc import Iterable
from concurrent.futures import (
    FIRST_COMPLETED,
    BrokenExecutor,
    CancelledError,
    Executor,
    Future,
    wait,
)
from dataclasses import dataclass
from typing import Any, Protocol

from combustor.base.errors import CombustorError
from combustor.rating.couple import Coupled
from combustor.studies.pool import Pool
from combustor.studies.progress import Pace, Progress, Report
from combustor.studies.sweep_outcome import reason_of
from combustor.studies.sweep_plan import Chunk, Plan
from combustor.studies.sweep_store import Result
from combustor.studies.sweep_work import (
    Describe,
    Done,
    Sized,
    Task,
    rate_task,
    size_row,
)

MOST_BREAKS = 3  # times that all workers may die with nothing brought back in between


class Store(Protocol):
    """Where finished ratings go."""

    results: list[Result]

    def append(self, result: Result) -> None:
        """Keep one."""


class InMemory:
    """A store without a file."""

    def __init__(self) -> None:
        self.results: list[Result] = []

    def append(self, result: Result) -> None:
        """Keep one."""
        self.results.append(result)


class WorkersDiedError(CombustorError):
    """The worker processes keep dying; what was finished is kept."""

    exit_code = 1


def solve(
    plan: Plan,
    store: Store,
    describe: Describe | None = None,
    executor: Executor | None = None,
    workers: int = 1,
    report: Report | None = None,
) -> None:
    """Solve what a plan holds and the store does not.

    Parameters
    ----------
    plan : Plan
    store : Store
        Finished ratings, and where further ones go.
    describe : callable, optional
        Makes the full document of a rated point, in the worker.
    executor : concurrent.futures.Executor, optional
        Used and left open; by default worker processes of this machine, or this process alone
        where ``workers`` is 1.
    workers : int
        How many processes, when there is no executor.
    report : callable, optional
        Told how far it has come.

    Raises
    ------
    WorkersDiedError
        Own workers died again and again, or the caller's executor broke.
    """
    pool = Pool(executor, workers)
    run = _Run(plan, store, describe, report)
    if run.todo:
        try:
            run.through(pool)
        finally:
            pool.close()
    run.tell()


@dataclass(frozen=True)
class _Job:
    """One rating to do, and whether its result is still wanted or only its solution."""

    row: int
    point: str
    chunk: Chunk
    wanted: bool

    @property
    def anchors(self) -> bool:
        return self.row == self.chunk.anchor


class _Run:
    """The state of one pass through a plan."""

    def __init__(
        self, plan: Plan, store: Store, describe: Describe | None, report: Report | None
    ) -> None:
        self.plan = plan
        self.store = store
        self.describe = describe
        self.report = report
        self.pace = Pace()
        rows = {row.label for row in plan.rows}
        known = {(r.row, r.point) for r in store.results if r.row in rows}
        self.resumed = len(known)
        self.failed = sum(not r.outcome.burning for r in store.results)
        self.finished = self.resumed
        self.todo: dict[Chunk, list[_Job]] = {}
        for chunk in plan.chunks:
            wanted = [r for r in chunk.rows if (plan.rows[r].label, chunk.point) not in known]
            if wanted:
                self.todo[chunk] = [
                    _Job(r, chunk.point, chunk, r in wanted)
                    for r in chunk.rows
                    if r in wanted or r == chunk.anchor
                ]
        self.by_row: dict[int, list[_Job]] = {}
        for jobs in self.todo.values():
            for job in jobs:
                self.by_row.setdefault(job.row, []).append(job)
        self.left = {chunk: len(jobs) for chunk, jobs in self.todo.items()}
        self.metal: dict[int, Sized] = {}
        self.solutions: dict[Chunk, Coupled | None] = {}
        self.unsized: deque[int] = deque()
        self.ready: deque[_Job] = deque()
        self.pending: dict[Future[Any], int | _Job] = {}

    def through(self, pool: Pool) -> None:
        """Do everything."""
        self._begin()
        breaks = 0
        self.tell()
        try:
            while self.ready or self.unsized or self.pending:
                lost: BaseException | None = None
                try:
                    self._fill(pool)
                    done, _ = wait(self.pending, return_when=FIRST_COMPLETED)
                    for future in done:
                        error = self._take(future)
                        lost = error or lost
                        breaks = breaks if error else 0
                except BrokenExecutor as error:
                    lost = error
                if lost is None:
                    continue
                breaks += 1
                broken = isinstance(lost, BrokenExecutor)
                if breaks >= MOST_BREAKS or (broken and not pool.renew()):
                    raise self._died(lost)
                if broken:
                    self._again()
        except BaseException:
            self._leave()
            raise

    def tell(self) -> None:
        """Report how far it has come."""
        if self.report is None:
            return
        fresh, left = self.finished - self.resumed, self.plan.ratings - self.finished
        elapsed, remaining = self.pace.times(fresh, left)
        self.report(
            Progress(
                self.plan.ratings, self.finished, self.resumed, self.failed, elapsed, remaining
            )
        )

    def _begin(self) -> None:
        """Make ready what waits for nothing: anchors, and metal where there is none."""
        anchors = [job for jobs in self.todo.values() for job in jobs if job.anchors]
        if self.plan.case.hardware is not None:
            self.ready.extend(anchors)
            return
        self.unsized.extend(dict.fromkeys([*(job.row for job in anchors), *self.by_row]))

    def _fill(self, pool: Pool) -> None:
        while len(self.pending) < pool.room and (self.ready or self.unsized):
            if self.ready:
                job = self.ready[0]
                future = pool.submit(rate_task, self._task(job))
                self.pending[future] = self.ready.popleft()
            else:
                row = self.unsized[0]
                future = pool.submit(size_row, self.plan.case, self.plan.rows[row].changes)
                self.pending[future] = self.unsized.popleft()

    def _task(self, job: _Job) -> Task:
        return Task(
            case=self.plan.case,
            changes=self.plan.rows[job.row].changes,
            point=job.point,
            sized=self.metal.get(job.row),
            near=None if job.anchors else self.solutions[job.chunk],
            anchors=job.anchors and len(self.todo[job.chunk]) > 1,
            describe=self.describe if job.wanted else None,
            operability=self.plan.operability,
        )

    def _take(self, future: Future[Any]) -> BaseException | None:
        """Take one finished future in; put its job back when its worker brought nothing."""
        job = self.pending.pop(future)
        error = CancelledError() if future.cancelled() else future.exception()
        if error is not None:
            # tasks answer for their own failures: this is the executor's, or a fault of ours
            self._put_back(job)
            return error
        if isinstance(job, int):
            self.metal[job] = future.result()
            self._sized(job)
            return None
        done: Done = future.result()
        if job.wanted:
            label = self.plan.rows[job.row].label
            self.store.append(Result(label, job.point, done.outcome, done.document))
            self.finished += 1
            self.failed += not done.outcome.burning
        if job.anchors:
            self.solutions[job.chunk] = done.solution
            self._release(job.chunk)
        self.left[job.chunk] -= 1
        if not self.left[job.chunk]:
            del self.solutions[job.chunk]
        self.tell()
        return None

    def _sized(self, row: int) -> None:
        for job in self.by_row[row]:
            if job.anchors or job.chunk in self.solutions:
                self.ready.append(job)

    def _release(self, chunk: Chunk) -> None:
        """Make ready what waited for an anchor."""
        needs_metal = self.plan.case.hardware is None
        for job in self.todo[chunk]:
            if not job.anchors and (not needs_metal or job.row in self.metal):
                self.ready.append(job)

    def _again(self) -> None:
        """Take in or put back all that was out when the workers died."""
        for future in list(self.pending):
            if future.done():
                self._take(future)
            else:
                self._put_back(self.pending.pop(future))

    def _put_back(self, job: int | _Job) -> None:
        if isinstance(job, int):
            self.unsized.appendleft(job)
        else:
            self.ready.appendleft(job)

    def _leave(self) -> None:
        """On the way out: keep what has been brought back, drop what has not begun."""
        for future in list(self.pending):
            if not future.cancel() and future.done() and future.exception() is None:
                self._take(future)

    def _died(self, error: BaseException) -> WorkersDiedError:
        left = self.plan.ratings - self.finished
        words = reason_of(error) if isinstance(error, Exception) else repr(error)
        return WorkersDiedError(
            f"the workers brought nothing back {MOST_BREAKS} times in a row, or cannot be started "
            f"again ({words}); {left} of {self.plan.ratings} ratings are left; what was finished "
            "is kept, and the same sweep goes on from there"
        )


def labels(results: Iterable[Result]) -> dict[tuple[str, str], Result]:
    """Return results by row label and point; the first of each counts."""
    found: dict[tuple[str, str], Result] = {}
    for result in results:
        found.setdefault((result.row, result.point), result)
    return found
