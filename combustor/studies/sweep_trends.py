"""What a sweep says: sensitivities about the case, and the window in which both limits hold."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from math import log

from combustor.studies.sweep_outcome import Outcome
from combustor.studies.sweep_plan import CASE_ROW, Plan

# What sensitivities are given of, by attribute of an outcome. Not of blow-out: it is found in
# steps of 5 % of the fuel, far coarser than what one percent of an entry moves.
QUANTITIES = (
    "nox",
    "co",
    "ei_nox",
    "ei_co",
    "exit_temperature",
    "primary_temperature",
    "primary_equivalence_ratio",
    "primary_air",
    "primary_residence_time",
    "pressure_loss",
    "combustion_efficiency",
    "pattern_factor",
    "wall_peak",
    "fuel_flow",
)

Outcomes = Mapping[tuple[str, str], Outcome]
"""By row label and operating point."""


@dataclass(frozen=True)
class Sensitivity:
    """How one operating point moves with one axis, about the case.

    Parameters
    ----------
    point, key : str
    step : float
        Taken to either side, percent of the entry.
    value : mapping of str to float or None
        At the case itself, by quantity, SI.
    change : mapping of str to float or None
        Per percent of the entry, SI.
    relative : mapping of str to float or None
        The same in percent of the value.
    reason : str
        Why there is none; empty where there is.
    """

    point: str
    key: str
    step: float
    value: Mapping[str, float | None]
    change: Mapping[str, float | None]
    relative: Mapping[str, float | None]
    reason: str = ""


@dataclass(frozen=True)
class Bound:
    """One end of a window: the value there (unit of the axis) and what ends it."""

    value: float
    by: str


@dataclass(frozen=True)
class Window:
    """Where both limits hold along the last axis at one operating point.

    Parameters
    ----------
    point : str
        Empty for all operating points together.
    held : float or None
        Value of the first axis where there are two.
    spans : tuple of (Bound, Bound)
        In rising order; empty where they never hold.
    """

    point: str
    held: float | None
    spans: tuple[tuple[Bound, Bound], ...]


def sensitivities(plan: Plan, outcomes: Outcomes) -> tuple[Sensitivity, ...]:
    """Return the change of every quantity per percent of every entry, by central differences."""
    found = []
    for step in plan.steps:
        key = plan.axes[step.axis].key
        for point in plan.points:
            rows = [outcomes.get((label, point)) for label in (CASE_ROW, step.up, step.down)]
            good = [row for row in rows if row is not None and row.burning]
            if len(good) < 3:
                reason = next((row.reason for row in rows if row and not row.burning), "not solved")
                nothing = dict.fromkeys(QUANTITIES)
                found.append(
                    Sensitivity(point, key, step.percent, nothing, nothing, nothing, reason)
                )
                continue
            found.append(_sensitivity(point, key, step.percent, *good))
    return tuple(found)


def _sensitivity(
    point: str, key: str, percent: float, case: Outcome, up: Outcome, down: Outcome
) -> Sensitivity:
    value = {name: getattr(case, name) for name in QUANTITIES}
    change: dict[str, float | None] = {}
    relative: dict[str, float | None] = {}
    for name in QUANTITIES:
        high, low, base = getattr(up, name), getattr(down, name), value[name]
        known = high is not None and low is not None
        change[name] = (high - low) / (2.0 * percent) if known else None
        rate = change[name]
        relative[name] = 100.0 * rate / base if rate is not None and base else None
    return Sensitivity(point, key, percent, value, change, relative)


def windows(
    plan: Plan, outcomes: Outcomes, nox: float | None, co: float | None
) -> tuple[Window, ...]:
    """Return where NOx and CO both lie within their limits, along the last axis.

    Between two neighbouring values the logarithm of a concentration is taken as linear. Limits
    are mole fractions, dry at 15 % O2; one that is None always holds. A value without a result
    holds nothing.
    """
    if nox is None and co is None:
        return ()
    last = plan.axes[-1]
    held: Sequence[int | None] = range(len(plan.axes[0].values)) if len(plan.axes) == 2 else [None]
    found = []
    for first in held:
        rows = plan.line((None,) if first is None else (first, None))
        order = sorted(range(len(rows)), key=lambda i: last.shown[i])
        places = [last.shown[i] for i in order]
        shown = None if first is None else plan.axes[0].shown[first]
        each = []
        for point in plan.points:
            line = [outcomes.get((rows[i].label, point)) for i in order]
            spans = _both(places, line, nox, co)
            each.append(spans)
            found.append(Window(point, shown, spans))
        if len(plan.points) > 1:
            found.append(Window("", shown, _common(each)))
    return tuple(found)


Spans = tuple[tuple[Bound, Bound], ...]


def _both(
    places: Sequence[float],
    line: Sequence[Outcome | None],
    nox: float | None,
    co: float | None,
) -> Spans:
    limits = [("NOx", "nox", nox), ("CO", "co", co)]
    spans = [
        _holding(places, [_level(o, name, limit) for o in line], word)
        for word, name, limit in limits
        if limit is not None
    ]
    return _common(spans)


def _level(outcome: Outcome | None, name: str, limit: float) -> float | None:
    """Return the logarithm of a concentration over its limit; None without a result."""
    if outcome is None or not outcome.burning:
        return None
    value = getattr(outcome, name)
    if value is None:
        return None
    # a concentration of nothing is within any limit, and so far within that it bounds nothing
    return log(max(value, 1e-30) / limit) if limit > 0.0 else 1.0


def _holding(places: Sequence[float], levels: Sequence[float | None], word: str) -> Spans:
    """Return the spans in which a piecewise linear level is at most zero."""
    spans: list[tuple[Bound, Bound]] = []
    begun: Bound | None = None
    for index, (place, level) in enumerate(zip(places, levels, strict=True)):
        before = levels[index - 1] if index else None
        if level is not None and level <= 0.0:
            if begun is None:
                if index == 0:
                    begun = Bound(place, "end of the sweep")
                elif before is None:
                    begun = Bound(place, "no result beyond")
                else:
                    begun = Bound(_crossing(places, levels, index), word)
        elif begun is not None:
            if level is None:
                spans.append((begun, Bound(places[index - 1], "no result beyond")))
            else:
                spans.append((begun, Bound(_crossing(places, levels, index), word)))
            begun = None
    if begun is not None:
        spans.append((begun, Bound(places[-1], "end of the sweep")))
    return tuple(spans)


def _crossing(places: Sequence[float], levels: Sequence[float | None], index: int) -> float:
    before, after = levels[index - 1], levels[index]
    assert before is not None and after is not None
    share = before / (before - after)
    return places[index - 1] + share * (places[index] - places[index - 1])


def _common(several: Sequence[Spans]) -> Spans:
    """Return where all of several sets of spans hold."""
    common = several[0]
    for other in several[1:]:
        common = tuple(
            (low, high)
            for a in common
            for b in other
            for low in [max(a[0], b[0], key=lambda bound: bound.value)]
            for high in [min(a[1], b[1], key=lambda bound: bound.value)]
            if low.value <= high.value
        )
    return common
