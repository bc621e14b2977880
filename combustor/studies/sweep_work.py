"""What a worker of a sweep does: size one row, or rate one row at one operating point."""

from __future__ import annotations

import threading
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

from combustor.base.errors import CombustorError
from combustor.case.entry import Path, with_entries
from combustor.case.schema import Case
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.hardware.from_case import hardware_of
from combustor.hardware.metal import Hardware
from combustor.rating.couple import Coupled
from combustor.rating.rate import rate_near
from combustor.rating.record import PointRating
from combustor.rating.settings import settings_of
from combustor.sizing.size import size
from combustor.studies.sweep_outcome import Outcome, failed, outcome_of, reason_of

Describe = Callable[[PointRating], Mapping[str, Any]]
Changes = tuple[tuple[Path, float], ...]

_THREAD = threading.local()


@dataclass(frozen=True)
class Sized:
    """Metal of one row, or why there is none."""

    hardware: Hardware | None
    reason: str = ""


@dataclass(frozen=True)
class Task:
    """One rating, complete: it can run in any process.

    Parameters
    ----------
    case : Case
    changes : tuple of (path, value)
    point : str
    sized : Sized or None
        Metal of a case that states none.
    near : Coupled or None
        The anchor's solution to start from.
    anchors : bool
        Whether others will start from this one.
    describe : callable or None
        Makes the full document of a rated point.
    operability : bool
        Whether blow-out, light-up and premixers are judged as well.
    """

    case: Case
    changes: Changes
    point: str
    sized: Sized | None
    near: Coupled | None
    anchors: bool
    describe: Describe | None
    operability: bool = True


@dataclass(frozen=True)
class Done:
    """What came of a task: numbers, the full document, and what others may start from."""

    outcome: Outcome
    document: Mapping[str, Any] | None
    solution: Coupled | None


def size_row(case: Case, changes: Changes) -> Sized:
    """Size one row of a case without metal."""
    try:
        changed = with_entries(case, changes)
        fuel = fuel_of(changed)
        return Sized(size(changed, fuel, _gas(fuel.mechanism)).hardware)
    except Exception as error:
        return Sized(None, reason_of(error))


def rate_task(task: Task) -> Done:
    """Rate one row at one operating point; a failure becomes a record with its reason."""
    solution: Coupled | None = None
    try:
        rated, solution = _rate(task)
    except Exception as error:
        rated = failed(task.case.point(task.point), _fuel_name(task.case), reason_of(error))
    document = None if task.describe is None else task.describe(rated)
    keep = task.anchors and solution is not None and solution.fire.exit is not None
    return Done(outcome_of(rated), document, solution if keep else None)


def _rate(task: Task) -> tuple[PointRating, Coupled]:
    case = with_entries(task.case, task.changes) if task.changes else task.case
    if task.sized is None:
        hardware = hardware_of(case)
    elif task.sized.hardware is None:
        raise CombustorError(f"sizing: {task.sized.reason}")
    else:
        hardware = task.sized.hardware
    fuel = fuel_of(case)
    near = task.near if task.near is not None and _alike(task.near, hardware) else None
    return rate_near(
        case,
        case.point(task.point),
        fuel,
        _gas(fuel.mechanism),
        hardware,
        settings_of(case.model),
        near,
        operability=task.operability,
    )


def _alike(near: Coupled, hardware: Hardware) -> bool:
    """Whether two machines have the same openings in the same order."""
    return [flow.name for flow in near.split.openings] == [o.name for o in hardware.openings]


def _gas(mechanism: str) -> Gas:
    """Return the gas of this thread: a mechanism is read once, and no two threads share one."""
    known: dict[str, Gas] | None = getattr(_THREAD, "gases", None)
    if known is None:
        known = _THREAD.gases = {}
    if mechanism not in known:
        known[mechanism] = Gas.load(mechanism)
    return known[mechanism]


def _fuel_name(case: Case) -> str:
    return case.fuel.name or "stated composition"
