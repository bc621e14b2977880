"""Ratings as a pandas DataFrame."""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import TYPE_CHECKING

from combustor.rating.record import Ratings
from combustor.report.field import row
from combustor.report.rating_data import point_fields

if TYPE_CHECKING:
    import pandas as pd


def frame(ratings: Ratings) -> pd.DataFrame:
    """Return one row per operating point, columns named as in the CSV table of points."""
    import pandas as pd

    columns = point_fields(ratings.points)
    return pd.DataFrame(
        [row(columns, point) for point in ratings.points],
        columns=[field.key for field in columns],
    )


@dataclass(frozen=True)
class RatedCase(Ratings):
    """Ratings that can be had as a DataFrame."""

    @classmethod
    def of(cls, ratings: Ratings) -> RatedCase:
        """Return the same ratings with :meth:`frame`."""
        return cls(**{field.name: getattr(ratings, field.name) for field in fields(Ratings)})

    def frame(self) -> pd.DataFrame:
        """Return one row per operating point, unit in the column's name."""
        return frame(self)
