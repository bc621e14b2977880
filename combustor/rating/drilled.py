"""Judgements on the metal itself: whether a row of holes fits around its wall."""

from __future__ import annotations

import math
from collections.abc import Iterator

from combustor.base.finding import Finding, Level
from combustor.hardware.metal import Hardware
from combustor.sizing.exit_pattern import JET_ROLES
from combustor.sizing.rows import LEAST_PITCH, ROW_PITCH


def crowded_rows(hardware: Hardware) -> Iterator[Finding]:
    """Yield a finding for every row of jets whose ligaments are thin or gone.

    Parameters
    ----------
    hardware : Hardware

    Yields
    ------
    Finding
        Pitch over hole diameter below 1.5: watch. Below 1 the holes run into each other: act.
    """
    perimeters = {wall.side: wall.perimeter for wall in hardware.walls}
    for row in hardware.openings:
        if row.role not in JET_ROLES or row.diameter is None or row.count < 1:
            continue
        if row.side == "dome":
            continue
        around = float(perimeters[row.side].at(row.station))
        pitch = around / (row.count * row.diameter)
        if pitch >= LEAST_PITCH:
            continue
        level: Level = "act" if pitch < 1.0 else "watch"
        most = math.floor(around / (LEAST_PITCH * row.diameter))
        yield Finding(
            level,
            f"pitch over diameter of {row.name}",
            pitch,
            LEAST_PITCH,
            "",
            f"{row.count} holes of {1e3 * row.diameter:.1f} mm on {1e3 * around:.0f} mm of wall, "
            f"where {most} fit. Several rings of holes are several rows, each with its x.",
            f"{ROW_PITCH.source.partition(';')[0]} ({ROW_PITCH.reading})",
        )
