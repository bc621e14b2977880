"""What a fuel asks to be changed, and by how much: nozzle, rows, premixer, cooling, load."""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterator, Sequence

from combustor.airflow.result import Inlet
from combustor.base.method import Method
from combustor.case.schema import Case
from combustor.hardware.metal import Hardware
from combustor.rating.record import PointRating
from combustor.studies.switch_record import Change, InjectorUse, Limit
from combustor.studies.switch_rows import Rate, row_changes
from combustor.studies.switch_verdict import OTHER_PHASE

MORE_FILM = Method(
    key="more-film-for-a-hotter-wall",
    quantity="film air for a cooler wall",
    source="wall over air temperature taken to fall with the square root of the film's flow",
    reading="judgement",
)

WORTH_A_NOZZLE = 0.05  # change of the injector's area
MORE_NOX = 1.10  # per heat, over the present fuel's


def changes_of(
    case: Case,
    hardware: Hardware,
    inlet: Inlet,
    own: Sequence[PointRating],
    points: Sequence[PointRating],
    uses: Sequence[InjectorUse],
    limits: Sequence[Limit],
    rate: Rate,
) -> tuple[Change, ...]:
    """Return the changes one fuel asks for.

    Parameters
    ----------
    inlet : Inlet
        Of the design point.
    own, points : sequence of PointRating
        On the case's own fuel and on this one.
    rate : callable
        Rates other metal on this fuel at the design point; None where it has no solution.
    """
    design = case.targets.design_point
    broken = [limit for limit in limits if not limit.kept]
    return (
        *_nozzle(design, uses, broken),
        *row_changes(case, hardware, inlet, _at(own, design), _at(points, design), rate),
        *_premixer(broken),
        *_cooling(points, broken),
        *_derate(points, broken),
        *_nox(_at(own, design), points),
    )


def _at(points: Sequence[PointRating], name: str) -> PointRating:
    return next((point for point in points if point.name == name), points[0])


def _nozzle(design: str, uses: Sequence[InjectorUse], broken: Sequence[Limit]) -> Iterator[Change]:
    if any(limit.what == OTHER_PHASE for limit in broken):
        yield Change(
            "fuel nozzle",
            "new",
            "a nozzle, pipes and controls for the other phase; not sized here",
        )
        return
    use = next((use for use in uses if use.point == design), None)
    if use is None or use.area_ratio is None or abs(use.area_ratio - 1.0) < WORTH_A_NOZZLE:
        return
    amount = f"{use.area_ratio:.3f} x the effective area"
    kept = "chokes" if use.choked else "stays subsonic"
    ratio = "more than 50" if use.pressure_ratio is None else f"{use.pressure_ratio:.3f}"
    yield Change(
        "fuel nozzle",
        amount,
        f"for the pressure ratio of the present fuel; the present nozzle {kept} at {ratio}. "
        "Opening is drilled; a smaller nozzle is a new part",
    )


def _premixer(broken: Sequence[Limit]) -> Iterator[Change]:
    margins = [
        limit.value
        for limit in broken
        if limit.value and limit.what.startswith(("flashback", "autoignition"))
    ]
    if margins:
        yield Change(
            "premixer",
            f"{1.0 / min(margins):.2g} x the velocity in the passage",
            "a narrower passage costs pressure; another front end where that is too much",
        )


def _cooling(points: Sequence[PointRating], broken: Sequence[Limit]) -> Iterator[Change]:
    hot = [limit for limit in broken if limit.what == "peak wall temperature"]
    if not hot:
        return
    worst = max(hot, key=lambda limit: limit.value or 0.0)
    point = _at(points, worst.point)
    assert worst.value is not None and worst.limit is not None
    air = point.inlet.temperature
    more = ((worst.value - air) / (worst.limit - air)) ** 2 - 1.0
    peak = max(point.walls, key=lambda wall: wall.temperature)
    yield Change(
        "film cooling",
        f"about {100.0 * more:.0f} % more air in the slot ahead of x = {1e3 * peak.station:.0f} mm",
        f"({MORE_FILM.source}, {MORE_FILM.reading}): rate it again",
    )


def _derate(points: Sequence[PointRating], broken: Sequence[Limit]) -> Iterator[Change]:
    where = {limit.point for limit in broken if limit.point}
    if not where or not any(limit.by_change for limit in broken):
        return
    good = [p for p in points if p.name not in where and p.exit.temperature is not None]
    if not good:
        return
    best = max(good, key=lambda point: point.exit.temperature or 0.0)
    yield Change(
        "load",
        f"no more than that of {best.name}",
        f"exit {best.exit.temperature:.0f} K: the highest point that keeps its limits",
    )


def _nox(own: PointRating, points: Sequence[PointRating]) -> Iterator[Change]:
    """Yield the load at which NOx per heat is back to what the present fuel makes at the design."""
    wanted = own.emissions and own.emissions.nox_per_energy
    curve = sorted(
        (p.exit.temperature, p.emissions.nox_per_energy)
        for p in points
        if p.exit.temperature is not None
        and p.emissions is not None
        and p.emissions.nox_per_energy is not None
    )
    made = _at(points, own.name).emissions
    if not wanted or made is None or made.nox_per_energy is None or len(curve) < 2:
        return
    if made.nox_per_energy <= MORE_NOX * wanted:
        return
    more = 100.0 * (made.nox_per_energy / wanted - 1.0)
    note = f"{more:+.0f} % NOx per heat at {own.name} otherwise; or water, or nitrogen in the fuel"
    for (cool, low), (hot, high) in itertools.pairwise(curve):
        if low <= wanted < high:
            exit_temperature = cool + (hot - cool) * math.log(wanted / low) / math.log(high / low)
            yield Change("NOx", f"derate to an exit of {exit_temperature:.0f} K", note)
            return
    yield Change("NOx", "no load of this case brings it back", note)
