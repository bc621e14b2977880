"""What a sweep has to solve: rows, and the chunks within which a solve may start warm.

Rows and chunks follow from the request alone, never from workers or from what is done already:
a rating that starts from its chunk's anchor gives the same bits wherever and whenever it runs.
"""

from __future__ import annotations

import hashlib
import json
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise, product
from math import ceil
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.case.entry import Entry, Path, with_entries
from combustor.case.schema import Case
from combustor.fuel.mechanism import fingerprint
from combustor.fuel.of_case import fuel_of
from combustor.studies.sweep_axis import Axis

MOST_RATINGS = 10_000  # each is kept whole: about 0.1 MB of memory
CHUNK = 10  # rows at most that share one anchor: a tenth of the ratings start cold
STEP = 0.01  # of an entry's own value, for sensitivities

CASE_ROW = "case"


@dataclass(frozen=True)
class Row:
    """One variant of the case.

    Parameters
    ----------
    label : str
        Place in the grid from 0; ``case`` as it stands; ``up 0`` and ``down 0`` for the steps
        about it along the first axis.
    indices : tuple of int
        Which value of each axis; empty off the grid.
    changes : tuple of (path, value)
        What differs from the case, SI.
    """

    label: str
    indices: tuple[int, ...]
    changes: tuple[tuple[Path, float], ...]


@dataclass(frozen=True)
class Step:
    """The step of one axis about the case, in percent of the entry on either side."""

    axis: int
    up: str
    down: str
    percent: float


@dataclass(frozen=True)
class Chunk:
    """Rows at one operating point; all but the anchor may start from the anchor."""

    point: str
    anchor: int
    rows: tuple[int, ...]


@dataclass(frozen=True)
class Plan:
    """Everything a sweep solves.

    Parameters
    ----------
    case : Case
    axes : tuple of Axis
        One or two; the last runs fastest.
    points : tuple of str
        Operating points, in the order of the case.
    rows : tuple of Row
        The grid first, then the case itself and the steps about it.
    steps : tuple of Step
    chunks : tuple of Chunk
    operability : bool
        Whether blow-out, light-up and premixers are judged as well.
    """

    case: Case
    axes: tuple[Axis, ...]
    points: tuple[str, ...]
    rows: tuple[Row, ...]
    steps: tuple[Step, ...]
    chunks: tuple[Chunk, ...]
    operability: bool = True

    @property
    def ratings(self) -> int:
        """How many ratings there are."""
        return len(self.rows) * len(self.points)

    @cached_property
    def digest(self) -> str:
        """Digest of all that the results depend on, hex: case, mechanism, axes, points."""
        said = {
            "case": self.case.model_dump(),
            "mechanism": fingerprint(fuel_of(self.case).mechanism),
            "axes": [[axis.key, axis.values] for axis in self.axes],
            "points": self.points,
            "rows": [row.label for row in self.rows],
            "operability": self.operability,
        }
        return hashlib.sha256(json.dumps(said, sort_keys=True).encode()).hexdigest()

    def line(self, at: Sequence[int | None]) -> tuple[Row, ...]:
        """Return the grid rows along the one axis left ``None``, the others held."""
        return tuple(
            row
            for row in self.rows
            if row.indices
            and all(a is None or a == i for a, i in zip(at, row.indices, strict=True))
        )


def plan(
    case: Case,
    axes: Sequence[Axis],
    points: Sequence[str] | None = None,
    sensitivities: bool = True,
    operability: bool = True,
) -> Plan:
    """Lay a sweep out.

    Parameters
    ----------
    case : Case
    axes : sequence of Axis
        One or two.
    points : sequence of str, optional
        Names of the operating points wanted; all when left out.
    sensitivities : bool
        Whether to solve the case itself and small steps about it as well.
    operability : bool
        Whether to judge blow-out, light-up and premixers: about doubles the cost.

    Raises
    ------
    InputError
        Nothing to vary, two axes on one entry, too many ratings, an unknown point, a corner of
        the grid that the case file would not take either.
    """
    axes = tuple(axes)
    _refuse_axes(axes)
    names = _points(case, points)
    counts = [len(axis.values) for axis in axes]
    _refuse_size(counts, len(names))
    rows = _grid(axes)
    for corner in product(*({0, count - 1} for count in counts)):
        _check(case, axes, corner)
    _refuse_fuel_of_points(case, axes)
    chunks = [Chunk(name, line[len(line) // 2], line) for name in names for line in _lines(counts)]
    steps: tuple[Step, ...] = ()
    if sensitivities:
        around, steps = _steps(case, axes)
        first = len(rows)
        rows += around
        if around:
            own = tuple(range(first, len(rows)))
            chunks += [Chunk(name, first, own) for name in names]
    return Plan(case, axes, names, tuple(rows), steps, tuple(chunks), operability)


def _refuse_axes(axes: Sequence[Axis]) -> None:
    if not 1 <= len(axes) <= 2:
        raise InputError(Problem("nothing to vary" if not axes else "at most two entries can vary"))
    paths = [entry.path for axis in axes for entry in axis.entries]
    if len(set(paths)) < len(paths):
        raise InputError(
            Problem("the same entry is varied twice", "vary different entries", axes[-1].key)
        )


def _refuse_size(counts: Sequence[int], points: int) -> None:
    ratings = points
    for count in counts:
        ratings *= count
    if ratings > MOST_RATINGS:
        raise InputError(
            Problem(
                f"{ratings} ratings: {' x '.join(map(str, counts))} values at {points} operating "
                "points",
                f"at most {MOST_RATINGS}; take fewer values, or fewer points",
            )
        )


def _points(case: Case, wanted: Sequence[str] | None) -> tuple[str, ...]:
    known = [point.name for point in case.points]
    missing = [] if wanted is None else [name for name in wanted if name not in known]
    if missing:
        raise InputError(
            [
                Problem("no such operating point", f"the case has {', '.join(known)}", "point", n)
                for n in missing
            ]
        )
    return tuple(name for name in known if wanted is None or name in wanted)


def _grid(axes: Sequence[Axis]) -> list[Row]:
    places = product(*(range(len(axis.values)) for axis in axes))
    return [
        Row(
            str(number),
            indices,
            tuple(
                change for axis, i in zip(axes, indices, strict=True) for change in axis.changes(i)
            ),
        )
        for number, indices in enumerate(places)
    ]


def _check(case: Case, axes: Sequence[Axis], corner: Sequence[int]) -> None:
    changes = [c for axis, i in zip(axes, corner, strict=True) for c in axis.changes(i)]
    try:
        with_entries(case, changes)
    except InputError as error:
        place = ", ".join(
            f"{axis.key} = {axis.shown[i]:g} {axis.unit}".rstrip()
            for axis, i in zip(axes, corner, strict=True)
        )
        raise InputError([Problem(f"the case cannot have {place}"), *error.problems]) from None


def _refuse_fuel_of_points(case: Case, axes: Sequence[Axis]) -> None:
    """Let the fuel be found before any work: a mechanism that is not there says so now."""
    fuel_of(with_entries(case, [c for axis in axes for c in axis.changes(0)]))


def _lines(counts: Sequence[int]) -> list[tuple[int, ...]]:
    """Cut the grid into runs of neighbours along its longest axis, evenly, CHUNK at most."""
    along = counts.index(max(counts))
    stride = 1
    for count in counts[along + 1 :]:
        stride *= count
    others = product(*(range(1 if place == along else n) for place, n in enumerate(counts)))
    found = []
    for start in others:
        first = 0
        for place, count in zip(start, counts, strict=True):
            first = first * count + place
        line = [first + stride * step for step in range(counts[along])]
        pieces = ceil(len(line) / CHUNK)
        bounds = [len(line) * piece // pieces for piece in range(pieces + 1)]
        found += [tuple(line[a:b]) for a, b in pairwise(bounds)]
    return found


def _steps(case: Case, axes: Sequence[Axis]) -> tuple[list[Row], tuple[Step, ...]]:
    rows = [Row(CASE_ROW, (), ())]
    steps = []
    for number, axis in enumerate(axes):
        known = [entry for entry in axis.entries if entry.value]
        if not known:
            continue
        moved = [_moved(entry) for entry in known]
        up = tuple((entry.path, high) for entry, (_, high) in zip(known, moved, strict=True))
        down = tuple((entry.path, low) for entry, (low, _) in zip(known, moved, strict=True))
        if not (_possible(case, up) and _possible(case, down)):
            continue
        value = known[0].value
        assert value is not None
        percent = 100.0 * (moved[0][1] - moved[0][0]) / (2.0 * value)
        step = Step(number, f"up {number}", f"down {number}", percent)
        rows += [Row(step.up, (), up), Row(step.down, (), down)]
        steps.append(step)
    return (rows, tuple(steps)) if steps else ([], ())


def _moved(entry: Entry) -> tuple[float, float]:
    assert entry.value is not None
    if entry.whole:
        return int(entry.value) - 1, int(entry.value) + 1
    return entry.value * (1.0 - STEP), entry.value * (1.0 + STEP)


def _possible(case: Case, changes: Any) -> bool:
    try:
        with_entries(case, changes)
    except InputError:
        return False
    return True
