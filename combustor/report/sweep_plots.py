"""What a sweep draws: NOx and CO along it, and against each other."""

from __future__ import annotations

import numpy as np

from combustor.report.document import Curve, Plot
from combustor.report.sweep_fields import Limits, axis_words
from combustor.studies.sweep import Sweep
from combustor.studies.sweep_outcome import Outcome

MOST_CURVES = 6


def plots(sweep: Sweep, limits: Limits) -> list[Plot]:
    """Return NOx and CO over the last axis, and NOx against CO."""
    last = sweep.plan.axes[-1]
    along = axis_words(last)
    words = {"nox": "NOx, ppm dry 15 % O2", "co": "CO, ppm dry 15 % O2"}
    over: list[Plot] = []
    if len(last.values) > 1:
        over = [
            Plot(
                f"{title} along the sweep{_where(sweep)}",
                along,
                words[name],
                _curves(sweep, name),
                log_up=True,
                limit_up=None if limit is None else 1e6 * limit,
            )
            for title, name, limit in (("NOx", "nox", limits.nox), ("CO", "co", limits.co))
        ]
    trade = Plot(
        f"CO against NOx{_where(sweep)}",
        words["nox"],
        words["co"],
        _trade_curves(sweep),
        log_across=True,
        log_up=True,
        limit_across=None if limits.nox is None else 1e6 * limits.nox,
        limit_up=None if limits.co is None else 1e6 * limits.co,
    )
    return [*over, trade]


def _where(sweep: Sweep) -> str:
    if len(sweep.plan.axes) == 1:
        return ""
    return f", at {_plotted_point(sweep)}"


def _plotted_point(sweep: Sweep) -> str:
    design = sweep.plan.case.targets.design_point
    return design if design in sweep.plan.points else sweep.plan.points[0]


def _lines(sweep: Sweep) -> list[tuple[str, list[tuple[float, Outcome]]]]:
    """Return what is drawn as one curve each: a name and outcomes along the last axis."""
    last = sweep.plan.axes[-1]
    if len(sweep.plan.axes) == 1:
        return [
            (
                point,
                [(last.shown[r.indices[-1]], x.outcome) for r, x in sweep.grid if x.point == point],
            )
            for point in sweep.plan.points
        ]
    first, point = sweep.plan.axes[0], _plotted_point(sweep)
    count = len(first.values)
    picked = np.linspace(0, count - 1, min(MOST_CURVES, count)).round().astype(int).tolist()
    return [
        (
            f"{first.key.split('.')[-1]} {first.shown[i]:g} {first.unit}".rstrip(),
            [
                (last.shown[r.indices[-1]], x.outcome)
                for r, x in sweep.grid
                if x.point == point and r.indices[0] == i
            ],
        )
        for i in dict.fromkeys(picked)
    ]


def _ppm(value: float | None) -> float | None:
    return None if value is None else 1e6 * value


def _curves(sweep: Sweep, name: str) -> tuple[Curve, ...]:
    return tuple(
        Curve(title, tuple((x, _ppm(getattr(outcome, name))) for x, outcome in line))
        for title, line in _lines(sweep)
    )


def _trade_curves(sweep: Sweep) -> tuple[Curve, ...]:
    return tuple(
        Curve(
            title,
            tuple(
                (1e6 * outcome.nox, _ppm(outcome.co))
                for _, outcome in line
                if outcome.nox is not None
            ),
        )
        for title, line in _lines(sweep)
    )
