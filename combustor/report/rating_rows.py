"""Records that join what a table line needs from several parts of a rating."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from combustor.airflow.result import AirSplit, OpeningFlow
from combustor.base.finding import Finding
from combustor.hardware.metal import Hardware, Opening
from combustor.rating.record import PointRating, Profile, WallPoint
from combustor.report.field import printable
from combustor.report.theme import severity, worst

MOST_WALL_LINES = 12


@dataclass(frozen=True)
class SummaryRow:
    """One operating point in the duty cycle: its rating, hottest metal (K), gravest level."""

    point: PointRating
    wall_peak: float | None
    level: str


@dataclass(frozen=True)
class SplitRow:
    """One opening: its flow, its share of the air and, where it is known, its metal."""

    flow: OpeningFlow
    share: float
    opening: Opening | None


@dataclass(frozen=True)
class ProfileRow:
    """Mean gas at one station: m, K, mole fractions dry at 15 % O2."""

    station: float
    temperature: float
    nox: float
    co: float


@dataclass(frozen=True)
class FindingRow:
    """One finding and the points it was made at."""

    level: str
    points: str
    what: str
    value: float | str | None
    limit: float | None
    unit: str
    advice: str
    source: str


def level_of(point: PointRating) -> str:
    """Return the gravest level of a point; one that is no result counts as ``act``."""
    if point.status != "burning" or not point.converged:
        return "act"
    return worst([finding.level for finding in point.findings])


def summary_row(point: PointRating) -> SummaryRow:
    """Return the duty-cycle line of a point."""
    peak = max((wall.temperature for wall in point.walls), default=None)
    return SummaryRow(point, peak, level_of(point))


def rows_of_split(
    split: AirSplit | None, hardware: Hardware | None, air_flow: float
) -> tuple[SplitRow, ...]:
    """Return one line per opening, in the order of the metal; ``air_flow`` in kg/s."""
    if split is None:
        return ()
    metal = {} if hardware is None else {o.name: o for o in hardware.openings}
    return tuple(
        SplitRow(flow, flow.mass_flow / air_flow, metal.get(flow.name)) for flow in split.openings
    )


def split_rows(point: PointRating) -> tuple[SplitRow, ...]:
    """Return one line per opening of a rated point."""
    return rows_of_split(point.split, point.hardware, point.inlet.air_flow)


def profile_rows(profile: Profile | None) -> tuple[ProfileRow, ...]:
    """Return one line per station of the profile."""
    if profile is None:
        return ()
    columns = (profile.station, profile.temperature, profile.nox, profile.co)
    return tuple(ProfileRow(*(float(v) for v in line)) for line in zip(*columns, strict=True))


def wall_digest(walls: Sequence[WallPoint], most: int = MOST_WALL_LINES) -> tuple[WallPoint, ...]:
    """Return at most about ``most`` stations a side, the hottest and both ends among them."""
    chosen: list[WallPoint] = []
    for side in dict.fromkeys(wall.side for wall in walls):
        line = [wall for wall in walls if wall.side == side]
        even = np.linspace(0, len(line) - 1, min(most, len(line))).round().astype(int)
        peak = max(range(len(line)), key=lambda i: line[i].temperature)
        chosen += [line[i] for i in sorted({*even.tolist(), peak})]
    return tuple(chosen)


def finding_rows(found: Iterable[tuple[str, Finding]]) -> tuple[FindingRow, ...]:
    """Return findings with the gravest last, like findings of several points on one line."""
    groups: dict[tuple[object, ...], list[tuple[str, Finding]]] = {}
    for point, finding in found:
        like = (finding.level, finding.what, finding.limit, finding.unit)
        groups.setdefault((*like, finding.advice, finding.source), []).append((point, finding))
    rows = [_finding_row(members) for members in groups.values()]
    return tuple(sorted(rows, key=lambda row: severity(row.level)))


def _finding_row(members: list[tuple[str, Finding]]) -> FindingRow:
    first = members[0][1]
    points = ", ".join(dict.fromkeys(printable(point) for point, _ in members if point))
    values = [finding.value for _, finding in members if finding.value is not None]
    value: float | str | None = values[0] if values else None
    if values and min(values) != max(values):
        value = f"{min(values):.4g} to {max(values):.4g}"
    return FindingRow(
        first.level,
        points,
        first.what,
        value,
        first.limit,
        first.unit,
        first.advice,
        first.source,
    )
