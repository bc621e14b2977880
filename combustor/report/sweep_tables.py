"""The report of a sweep: trends, plots, the NOx-CO window, sensitivities, failures."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

import numpy as np

from combustor.report import theme
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field
from combustor.report.sweep_fields import OUTCOME, Limits, axis_field
from combustor.report.sweep_plots import plots
from combustor.studies.sweep import Sweep
from combustor.studies.sweep_axis import Axis
from combustor.studies.sweep_outcome import Outcome
from combustor.studies.sweep_trends import Sensitivity, Window

MOST_LINES = 12  # of a trend on the terminal; the files hold all
MOST_FAILURES = 8
_TREND = (
    "nox",
    "co",
    "exit_temperature",
    "primary_temperature",
    "primary_equivalence_ratio",
    "pressure_loss",
    "combustion_efficiency",
    "wall_peak",
    "blowout_margin",
)


def sweep_report(sweep: Sweep, limits: Limits, file: str) -> tuple[Block, ...]:
    """Return the whole report."""
    blocks: list[Block] = [
        Heading(f"{sweep.plan.case.title}: sweep"),
        Facts(tuple(_facts(sweep, file))),
        *_remarks(sweep),
    ]
    for point in sweep.plan.points:
        blocks.append(trend_table(sweep, point))
        blocks += _cut(sweep, point)
    blocks += plots(sweep, limits)
    blocks += window_blocks(sweep, limits)
    blocks += sensitivity_blocks(sweep.sensitivities)
    blocks += failure_blocks(sweep)
    return tuple(blocks)


def record_of(sweep: Sweep, indices: Sequence[int], point: str, outcome: Outcome) -> dict[str, Any]:
    """Return one line of a table of outcomes."""
    places = {
        f"axis{number}": axis.shown[index]
        for number, (axis, index) in enumerate(zip(sweep.plan.axes, indices, strict=True))
    }
    return {
        **places,
        "point": point,
        "outcome": outcome,
        "status": theme.status(outcome.status),
        "verdict": theme.verdict(outcome.level),
        "gravest": outcome.gravest if outcome.burning and outcome.level == "act" else "",
    }


def trend_table(sweep: Sweep, point: str) -> Table:
    """Return the trend at one operating point, thinned out to a page."""
    records = [
        record_of(sweep, row.indices, point, result.outcome)
        for row, result in sweep.grid
        if result.point == point
    ]
    shown = [records[i] for i in _digest(len(records))]
    axes = sweep.plan.axes
    names = [n for n in _TREND if any(getattr(r["outcome"], n) is not None for r in shown)]
    columns = (
        *(axis_field(axis, number) for number, axis in enumerate(axes)),
        Field("status", "status"),
        *(OUTCOME[name].beneath("outcome") for name in names),
        Field("verdict", "verdict"),
        *((Field("gravest", "of"),) if any(r["gravest"] for r in shown) else ()),
    )
    marks = {i: r["outcome"].level for i, r in enumerate(shown) if r["outcome"].level != "ok"}
    title = f"Trend at {point} (NOx, CO: dry, 15 % O2)"
    return Table("trend", title, columns, tuple(shown), marks, lead=len(axes))


def window_blocks(sweep: Sweep, limits: Limits) -> list[Block]:
    """Return where both limits hold."""
    found = sweep.windows(limits.nox, limits.co)
    if not found:
        return [
            Prose(
                "No limit on NOx or CO is stated: give --nox-limit and --co-limit, or "
                "[targets] emissions, to see the window in which both hold."
            )
        ]
    last = sweep.plan.axes[-1]
    records = tuple(line for window in found for line in window_lines(window))
    marks = {i: "act" for i, r in enumerate(records) if r["low"] is None}
    held = (axis_field(sweep.plan.axes[0], 0),) if len(sweep.plan.axes) == 2 else ()
    columns = (
        *held,
        Field("point", "point"),
        Field("words", "limits"),
        Field("low", "from", unit=last.unit, scale=1.0, figures=5),
        Field("low_by", "below it"),
        Field("high", "to", unit=last.unit, scale=1.0, figures=5),
        Field("high_by", "above it"),
    )
    title = f"Window of {last.key} with {limits.words} (dry, 15 % O2)"
    lead = 1 + len(held)
    return [Table("window", title, columns, records, marks, lead=lead)]


def window_lines(window: Window) -> list[dict[str, Any]]:
    """Return one line a span; one line that says so where there is none."""
    base = {"axis0": window.held, "point": window.point or "all points"}
    if not window.spans:
        nothing = {"low": None, "low_by": "", "high": None, "high_by": ""}
        return [{**base, "words": "! never hold", **nothing}]
    return [
        {
            **base,
            "words": "+ hold",
            "low": low.value,
            "low_by": low.by,
            "high": high.value,
            "high_by": high.by,
        }
        for low, high in window.spans
    ]


_RELATIVE = ("nox", "co", "primary_air", "primary_equivalence_ratio")
_ABSOLUTE = ("exit_temperature", "primary_temperature", "wall_peak", "pressure_loss")


def sensitivity_blocks(found: Sequence[Sensitivity]) -> list[Block]:
    """Return what one percent of each entry does, at the case as it stands."""
    if not found:
        return [
            Prose(
                "No sensitivities: the case has no value of these entries to step about, or "
                "cannot take a step to either side."
            )
        ]
    columns = (
        Field("key", "entry"),
        Field("point", "point"),
        *(
            Field(f"relative_{n}", OUTCOME[n].label, f"relative.{n}", "%", 1.0, decimals=2)
            for n in _RELATIVE
        ),
        *(_absolute(name) for name in _ABSOLUTE),
    )
    below = tuple(f"no result: {s.reason}" if s.reason else "" for s in found)
    title = "Change per +1 % of each entry, about the case (temperatures: of kelvin)"
    table = Table(
        "sensitivities",
        title,
        columns,
        tuple(found),
        below=below if any(below) else (),
        lead=2,
    )
    return [table]


def _absolute(name: str) -> Field:
    field = OUTCOME[name]
    scale = (field.scale or 1.0) * field.shown
    unit = "% pts" if field.unit == "%" else field.unit
    return Field(f"change_{name}", field.label, f"change.{name}", unit, scale, decimals=3)


def failure_blocks(sweep: Sweep) -> list[Block]:
    """Return what has no result, with the reason."""
    failures = [(row, r) for row, r in sweep.grid if not r.outcome.burning]
    if not failures:
        return []
    records = tuple(
        record_of(sweep, row.indices, result.point, result.outcome)
        for row, result in failures[:MOST_FAILURES]
    )
    columns = (
        *(axis_field(axis, number) for number, axis in enumerate(sweep.plan.axes)),
        Field("point", "point"),
        Field("status", "status"),
    )
    below = tuple(record["outcome"].reason for record in records)
    marks = dict.fromkeys(range(len(records)), "act")
    lead = len(sweep.plan.axes) + 1
    blocks: list[Block] = [Table("failures", "No result", columns, records, marks, below, lead)]
    if len(failures) > MOST_FAILURES:
        blocks.append(Prose(f"... and {len(failures) - MOST_FAILURES} more; --csv holds all."))
    return blocks


def _facts(sweep: Sweep, file: str) -> list[tuple[str, str]]:
    plan = sweep.plan
    facts = [("varied", _span(axis)) for axis in plan.axes]
    grid = len(sweep.grid)
    about = len(sweep.results) - grid
    failed = sum(not r.outcome.burning for r in sweep.results)
    words = f"{len(sweep.results)}: {grid} of the sweep"
    words += f", {about} about the case" if about else ""
    words += f"; {sweep.resumed} were done before" if sweep.resumed else ""
    words += f"; {failed} without a result" if failed else ""
    return [*facts, ("points", ", ".join(plan.points)), ("ratings", words), ("kept in", file)]


def _span(axis: Axis) -> str:
    unit = f" {axis.unit}" if axis.unit else ""
    words = f"{axis.key}: {axis.shown[0]:g} to {axis.shown[-1]:g}{unit}, {len(axis.values)} values"
    if len(axis.entries) > 1:
        words += f" ({len(axis.entries)} entries alike)"
    return words


def _remarks(sweep: Sweep) -> list[Block]:
    plan = sweep.plan
    if plan.case.hardware is None:
        return [
            Prose(
                "The case holds no metal: it was sized anew for every value, and holes are "
                "rounded to drills, so that trends come in small steps. To vary what is built, "
                "sweep a case that `combustor size -o` has completed."
            )
        ]
    targets = [axis.key for axis in plan.axes if axis.key.startswith("targets.")]
    if targets:
        return [
            Prose(
                f"The case holds its metal, which stays as it is: {targets[0]} moves what is "
                "judged, not what is built. Without [hardware] it would be sized anew."
            )
        ]
    owners = {
        entry.path[1] if entry.path[0] == "points" else None
        for a in plan.axes
        for entry in a.entries
    }
    if len(plan.points) > 1 and len(owners) == 1 and None not in owners:
        (index,) = owners
        name = plan.case.points[int(index or 0)].name
        return [
            Prose(
                f"Only {name} moves with {plan.axes[0].key}: --point {name} leaves the others out."
            )
        ]
    return []


def _cut(sweep: Sweep, point: str) -> list[Block]:
    count = sum(result.point == point for _, result in sweep.grid)
    left_out = count - len(_digest(count))
    return [Prose(f"{left_out} more values are in --csv and --json.")] if left_out else []


def _digest(count: int) -> list[int]:
    even = np.linspace(0, count - 1, min(MOST_LINES, count)).round().astype(int)
    return sorted(set(even.tolist()))
