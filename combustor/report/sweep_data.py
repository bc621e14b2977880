"""A sweep in full: CSV tables and the JSON document."""

from __future__ import annotations

from typing import Any

from combustor.rating.record import PointRating
from combustor.report.document import Table
from combustor.report.field import Field, row
from combustor.report.json_out import strict
from combustor.report.rating_json import point_document
from combustor.report.sweep_fields import OUTCOME, Limits, axis_field
from combustor.report.sweep_tables import record_of, window_lines
from combustor.studies.sweep import Sweep
from combustor.studies.sweep_trends import Sensitivity

SWEEP_TABLES = ("sweep", "sensitivities", "windows")


def described(rated: PointRating) -> dict[str, Any]:
    """Return the object of one rated point as it stands in ``rate --json``, in plain values."""
    document: dict[str, Any] = strict(point_document(rated))
    return document


def sweep_data(sweep: Sweep, limits: Limits) -> tuple[Table, ...]:
    """Return every number of a sweep as tables, one CSV file each."""
    return _outcomes(sweep), _sensitivities(sweep), _windows(sweep, limits)


def sweep_document(sweep: Sweep, limits: Limits, file: str, version: str) -> dict[str, Any]:
    """Return the document of ``sweep --json``."""
    plan = sweep.plan
    return {
        "title": plan.case.title,
        "version": version,
        "case_sha256": plan.case.sha256,
        "sized": plan.case.hardware is None,
        "results_file": file,
        "vary": [
            {
                "key": axis.key,
                "values": list(axis.values),
                "unit": axis.unit,
                "values_in_unit": list(axis.shown),
            }
            for axis in plan.axes
        ],
        "points": [
            {
                **(result.document or {}),
                "varied": {
                    axis.key: axis.values[i]
                    for axis, i in zip(plan.axes, found.indices, strict=True)
                },
                "reason": result.outcome.reason or None,
            }
            for found, result in sweep.grid
        ],
        "sensitivities": [_sensitivity(line) for line in sweep.sensitivities],
        "limits": {"nox_ppmvd_15": _ppm(limits.nox), "co_ppmvd_15": _ppm(limits.co)},
        "windows": [
            {
                "point": window.point or None,
                "held": window.held,
                "spans": [
                    {"from": low.value, "from_by": low.by, "to": high.value, "to_by": high.by}
                    for low, high in window.spans
                ],
            }
            for window in sweep.windows(limits.nox, limits.co)
        ],
    }


def _ppm(value: float | None) -> float | None:
    return None if value is None else 1e6 * value


def _sensitivity(line: Sensitivity) -> dict[str, Any]:
    known = {name: field for name, field in OUTCOME.items() if name in line.value}
    return {
        "point": line.point,
        "key": line.key,
        "step_percent": line.step,
        "value": row(known.values(), line.value),
        "change_per_percent": row(known.values(), line.change),
        "percent_per_percent": {field.key: line.relative[n] for n, field in known.items()},
        "reason": line.reason or None,
    }


def _outcomes(sweep: Sweep) -> Table:
    records = tuple(
        record_of(sweep, found.indices, result.point, result.outcome)
        for found, result in sweep.grid
    )
    columns = (
        *(axis_field(axis, number) for number, axis in enumerate(sweep.plan.axes)),
        Field("point", "point"),
        Field("status", "status", "outcome.status"),
        Field("converged", "converged", "outcome.converged"),
        Field("level", "level", "outcome.level"),
        Field("gravest", "gravest", "outcome.gravest"),
        *(field.beneath("outcome") for field in OUTCOME.values()),
        Field("reason", "reason", "outcome.reason"),
    )
    return Table("sweep", "Sweep", columns, records)


def _sensitivities(sweep: Sweep) -> Table:
    records = tuple(
        {
            "line": line,
            "quantity": OUTCOME[name].key,
            "value": OUTCOME[name].value(line.value),
            "change": OUTCOME[name].value(line.change),
            "relative": line.relative[name],
        }
        for line in sweep.sensitivities
        for name in line.value
    )
    columns = (
        Field("key", "entry", "line.key"),
        Field("point", "point", "line.point"),
        Field("step_percent", "step", "line.step"),
        Field("quantity", "quantity"),
        Field("value", "value"),
        Field("change_per_percent", "change", "change"),
        Field("percent_per_percent", "percent", "relative"),
    )
    return Table("sensitivities", "Sensitivities", columns, records)


def _windows(sweep: Sweep, limits: Limits) -> Table:
    lines = tuple(
        {**line, "holds": line["low"] is not None, "window": window}
        for window in sweep.windows(limits.nox, limits.co)
        for line in window_lines(window)
    )
    held = (axis_field(sweep.plan.axes[0], 0),) if len(sweep.plan.axes) == 2 else ()
    columns = (
        Field("point", "point"),
        *held,
        Field("holds", "holds"),
        Field("from", "from", "low"),
        Field("from_by", "by", "low_by"),
        Field("to", "to", "high"),
        Field("to_by", "by", "high_by"),
    )
    return Table("windows", "Windows", columns, lines)
