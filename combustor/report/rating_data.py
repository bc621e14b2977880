"""The tables of a rating in full: every point, every station, under the JSON keys."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

from combustor.rating.record import PointRating, Ratings
from combustor.report import fields
from combustor.report.document import Table
from combustor.report.field import Field
from combustor.report.rating_rows import profile_rows, split_rows

_POINT_NAME = Field("point", "point")


def point_fields(points: Iterable[PointRating]) -> tuple[Field, ...]:
    """Return one field per scalar of a point; the keys say what they belong to."""
    operability = dict.fromkeys(key for point in points for key in point.operability)
    return (
        *fields.POINT,
        *(field.renamed(f"inlet_{field.key}") for field in fields.INLET),
        *fields.FUEL_AIR,
        *fields.LOSS,
        *(field.renamed(f"pressure_loss_{field.key}_percent") for field in fields.LOSS_PARTS),
        *(field.renamed(f"exit_{field.key}") for field in fields.EXIT),
        *(field.beneath("emissions", field.key) for field in fields.EMISSIONS),
        *(Field(key, key, f"operability.{key}") for key in operability),
        *(field.beneath("balances", f"balance_{field.key}") for field in fields.BALANCES),
    )


RATING_TABLES = ("points", "split", "zones", "profile", "walls", "findings")


def rating_data(ratings: Ratings) -> tuple[Table, ...]:
    """Return every number of the ratings as tables, one CSV file each."""
    points = ratings.points
    return (
        Table("points", "Operating points", point_fields(points), points),
        _by_point("split", fields.SPLIT, ((p, split_rows(p)) for p in points)),
        _by_point("zones", fields.ZONES, ((p, p.zones) for p in points)),
        _by_point("profile", fields.PROFILE, ((p, profile_rows(p.profile)) for p in points)),
        _by_point("walls", fields.WALLS, ((p, p.walls) for p in points)),
        _findings(ratings),
    )


def _by_point(
    name: str,
    group: tuple[Field, ...],
    lines: Iterable[tuple[PointRating, Iterable[Any]]],
) -> Table:
    records = tuple({"point": point.name, "line": line} for point, found in lines for line in found)
    columns = (_POINT_NAME, *(field.beneath("line") for field in group))
    return Table(name, name, columns, records, lead=2)


def _findings(ratings: Ratings) -> Table:
    general = [{"point": None, "line": finding} for finding in ratings.findings]
    of_points = [
        {"point": p.name, "line": finding} for p in ratings.points for finding in p.findings
    ]
    columns = (_POINT_NAME, *(field.beneath("line") for field in fields.FINDINGS))
    return Table("findings", "findings", columns, (*general, *of_points), lead=2)
