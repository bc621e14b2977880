"""Trends: a case rated again and again with one or two of its entries varied."""

from __future__ import annotations

import hashlib
import json
import os
from collections.abc import Sequence
from concurrent.futures import Executor
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path

from combustor import __version__
from combustor.case.schema import Case
from combustor.studies.executor import core_count
from combustor.studies.progress import Report
from combustor.studies.sweep_axis import Axis
from combustor.studies.sweep_outcome import Outcome
from combustor.studies.sweep_plan import Plan, Row, plan
from combustor.studies.sweep_run import InMemory, labels, solve
from combustor.studies.sweep_store import Result, ResultsFile
from combustor.studies.sweep_trends import Sensitivity, Window, sensitivities, windows
from combustor.studies.sweep_work import Describe


@dataclass(frozen=True)
class Sweep:
    """A finished sweep.

    Parameters
    ----------
    plan : Plan
    results : tuple of Result
        Every rating, by row and operating point in the order of the plan.
    resumed : int
        How many were taken from the results file.
    """

    plan: Plan
    results: tuple[Result, ...]
    resumed: int = 0

    @cached_property
    def outcomes(self) -> dict[tuple[str, str], Outcome]:
        """Outcome by row label and operating point."""
        return {(result.row, result.point): result.outcome for result in self.results}

    @cached_property
    def grid(self) -> tuple[tuple[Row, Result], ...]:
        """The ratings of the grid, rows in order, operating points within a row."""
        rows = {row.label: row for row in self.plan.rows if row.indices}
        return tuple((rows[r.row], r) for r in self.results if r.row in rows)

    @cached_property
    def sensitivities(self) -> tuple[Sensitivity, ...]:
        """Change of each output per percent of each entry, about the case."""
        return sensitivities(self.plan, self.outcomes)

    def windows(self, nox: float | None, co: float | None) -> tuple[Window, ...]:
        """Return where both limits (mole fractions, dry, 15 % O2) hold along the last axis."""
        return windows(self.plan, self.outcomes, nox, co)


def sweep(
    case: Case,
    axes: Sequence[Axis],
    points: Sequence[str] | None = None,
    results: str | os.PathLike[str] | None = None,
    replace: bool = False,
    executor: Executor | None = None,
    workers: int | None = None,
    report: Report | None = None,
    describe: Describe | None = None,
    operability: bool = True,
) -> Sweep:
    """Rate a case over one or two varied entries.

    A case without metal is sized anew in every row; one with metal is rated as it is built.

    Parameters
    ----------
    case : Case
    axes : sequence of Axis
        From :func:`combustor.studies.sweep_axis.axis` or ``spaced``.
    points : sequence of str, optional
        Operating points; all when left out.
    results : path, optional
        File of JSON lines that finished ratings are appended to and taken up from.
    replace : bool
        Begin the file anew, whatever it holds.
    executor : concurrent.futures.Executor, optional
        Where to run, left open afterwards. Its workers must have this package.
    workers : int, optional
        Processes started here when there is no executor; one for each core when left out.
    report : callable, optional
        Told of progress.
    describe : callable, optional
        Makes a plain document of each rated point, in the worker, to keep beside the numbers.
    operability : bool
        Whether to judge blow-out, light-up and premixers: about doubles the cost.

    Returns
    -------
    Sweep
        The same bits whatever the executor, the number of workers and what was resumed.

    Raises
    ------
    InputError
        Before any work: the request cannot be met, or the file is not this sweep's.
    WorkersDiedError
        What was finished is kept.
    """
    laid = plan(case, axes, points, operability=operability)
    return carried_out(laid, results, replace, executor, workers, report, describe)


def carried_out(
    laid: Plan,
    results: str | os.PathLike[str] | None = None,
    replace: bool = False,
    executor: Executor | None = None,
    workers: int | None = None,
    report: Report | None = None,
    describe: Describe | None = None,
) -> Sweep:
    """Solve a plan that is laid out already; otherwise as :func:`sweep`."""
    processes = core_count() if workers is None else max(1, workers)
    if results is None:
        memory = InMemory()
        solve(laid, memory, describe, executor, processes, report)
        return _finished(laid, memory.results, 0)
    with ResultsFile(Path(results), header_of(laid, describe is not None), replace) as file:
        taken_up = len(labels(file.results))
        solve(laid, file, describe, executor, processes, report)
        return _finished(laid, file.results, taken_up)


def results_name(laid: Plan, stem: str, documents: bool) -> str:
    """Return the file name that this sweep, and no other, keeps its results under."""
    said = json.dumps(header_of(laid, documents), sort_keys=True)
    return f"{stem}.{hashlib.sha256(said.encode()).hexdigest()[:8]}.sweep.jsonl"


def header_of(laid: Plan, documents: bool) -> dict[str, object]:
    """Return what the first line of a results file says of a sweep."""
    return {
        "version": __version__,
        "title": laid.case.title,
        "digest": laid.digest,
        "vary": [
            {"key": axis.key, "unit": axis.unit, "values": list(axis.shown)} for axis in laid.axes
        ],
        "points": list(laid.points),
        "operability": laid.operability,
        "documents": documents,
    }


def _finished(laid: Plan, results: Sequence[Result], resumed: int) -> Sweep:
    known = labels(results)
    order = [(row.label, point) for row in laid.rows for point in laid.points]
    return Sweep(laid, tuple(known[key] for key in order), resumed)
