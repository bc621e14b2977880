"""What gave way: the table of targets relaxed one by one."""

from __future__ import annotations

from collections.abc import Sequence

from combustor.report.document import Table
from combustor.report.field import Field
from combustor.sizing.trades import Trade

TRADES = (
    Field("target", "relaxed"),
    Field("step", "by"),
    Field("verdict", "verdict"),
    Field("limits_met", "broken limits\nmet", decimals=0),
    Field("film_air_points", "film\nair", "film_air", "points", 100.0, decimals=2),
    Field("liner_length_mm", "liner\nlength", "liner_length", "mm", 1e3, decimals=0),
    Field("casing_height_mm", "casing\nheight", "casing_height", "mm", 1e3, decimals=0),
    Field(
        "momentum_ratio_percent", "dilution jet\nmomentum", "momentum_ratio", "%", 100.0, decimals=1
    ),
    Field("note", "why refused", lines=True),
)


def trades_table(trades: Sequence[Trade]) -> Table:
    """Return one line a target: what relaxing it by its step would change."""
    return Table("trades", "What gave way: each target relaxed, sized again", TRADES, tuple(trades))
