"""JSON documents: unit in the key, full precision, null for what is not a result."""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping
from typing import Any

from combustor.base.finding import Finding
from combustor.rating.record import PointRating, Ratings
from combustor.report import fields
from combustor.report.field import plain, row
from combustor.report.rating_rows import profile_rows, split_rows


def dumps(document: Mapping[str, Any]) -> str:
    """Return ``document`` as JSON text; never NaN, never infinity."""
    return json.dumps(strict(document), indent=2, allow_nan=False, ensure_ascii=False)


def strict(value: Any) -> Any:
    """Return ``value`` in plain Python containers and numbers, null for what is not finite."""
    if isinstance(value, Mapping):
        return {str(key): strict(item) for key, item in value.items()}
    if isinstance(value, (list, tuple)):
        return [strict(item) for item in value]
    if hasattr(value, "tolist"):
        return strict(value.tolist())
    return plain(value)


def ratings_document(ratings: Ratings, version: str) -> dict[str, Any]:
    """Return the document of ``rate --json``."""
    return {
        "title": ratings.title,
        "version": version,
        "case_sha256": ratings.case_sha256,
        "sized": ratings.sized,
        "points": [point_document(point) for point in ratings.points],
        "findings": findings_list(ratings.findings),
    }


def point_document(point: PointRating) -> dict[str, Any]:
    """Return one operating point; the keys are there whatever became of it."""
    return {
        **row(fields.POINT, point),
        "inlet": row(fields.INLET, point),
        **row(fields.FUEL_AIR, point),
        **row(fields.LOSS, point),
        "pressure_loss_parts_percent": row(fields.LOSS_PARTS, point),
        "split": [row(fields.SPLIT, line) for line in split_rows(point)],
        "zones": [row(fields.ZONES, zone) for zone in point.zones],
        "profile": [row(fields.PROFILE, line) for line in profile_rows(point.profile)],
        "exit": row(fields.EXIT, point),
        "walls": [row(fields.WALLS, wall) for wall in point.walls],
        "emissions": row(fields.EMISSIONS, point.emissions),
        "operability": dict(point.operability),
        "balances": row(fields.BALANCES, point.balances),
        "findings": findings_list(point.findings),
    }


def findings_list(found: Iterable[Finding]) -> list[dict[str, Any]]:
    """Return findings as JSON objects."""
    return [row(fields.FINDINGS, finding) for finding in found]
