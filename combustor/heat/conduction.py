"""Conduction through the sheet and its coating."""

from __future__ import annotations

from combustor.base.method import Method
from combustor.hardware.metal import LinerWall

CONDUCTION = Method(
    key="sheet-conduction",
    quantity="temperature drop through sheet and coating",
    source="one-dimensional conduction through plane layers in series",
    reading="derived",
    note="inner and outer area equal (thin wall); no conduction along the sheet",
)


def sheet_resistance(wall: LinerWall) -> float:
    """Thickness over conductivity of the sheet, m2 K/W."""
    return wall.thickness / wall.conductivity


def coating_resistance(wall: LinerWall) -> float:
    """Thickness over conductivity of the coating, m2 K/W; 0 when there is none."""
    return wall.coating_thickness / wall.coating_conductivity
