"""The JSON document of a rating."""

from __future__ import annotations

from typing import Any

from combustor.rating.record import PointRating, Ratings
from combustor.report import fields
from combustor.report.field import row
from combustor.report.json_out import findings_list
from combustor.report.rating_rows import profile_rows, split_rows


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
        "injectors": [row(fields.INJECTORS, injector) for injector in point.injectors],
        "profile": [row(fields.PROFILE, line) for line in profile_rows(point.profile)],
        "exit": row(fields.EXIT, point),
        "walls": [row(fields.WALLS, wall) for wall in point.walls],
        "emissions": row(fields.EMISSIONS, point.emissions),
        "operability": dict(point.operability),
        "near_wall": dict(point.near_wall),
        "balances": row(fields.BALANCES, point.balances),
        "findings": findings_list(point.findings),
    }
