"""What a fuel asks to be changed, and by how much: nozzle, rows, premixer, cooling, load."""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace

from combustor.airflow.result import Inlet
from combustor.airflow.split import AirSplit, split
from combustor.base.method import Method
from combustor.case.schema import Case
from combustor.hardware.metal import Hardware, Opening
from combustor.hardware.zone_air import zone_air
from combustor.rating.record import PointRating
from combustor.sizing.drill import drill_step
from combustor.studies.switch_record import Change, InjectorUse, Limit
from combustor.studies.switch_verdict import OTHER_PHASE

ROWS_TO_OPEN = Method(
    key="rows-to-open",
    quantity="holes to open for the equivalence ratios of the present fuel",
    source="air split of the changed metal, cold, solved again until the primary zone's share of "
    "the air has changed as its fuel has",
    reading="computed",
)
MORE_FILM = Method(
    key="more-film-for-a-hotter-wall",
    quantity="film air for a cooler wall",
    source="wall over air temperature taken to fall with the square root of the film's flow",
    reading="judgement",
)

WORTH_A_DRILL = 0.03  # change of the primary equivalence ratio
WORTH_A_NOZZLE = 0.05  # change of the injector's area
MOST_OPENING = 2.5  # of a row's area
MORE_NOX = 1.10  # per heat, over the present fuel's
PASSES = 40


@dataclass(frozen=True)
class Opened:
    """A row opened to the next drill, and what that does.

    Parameters
    ----------
    name : str
    before, after : float
        Diameter [m]
    share_ratio : float
        Primary air over that of the present metal [-]
    loss_ratio : float
        Pressure loss over that of the present metal [-]
    """

    name: str
    before: float
    after: float
    share_ratio: float
    loss_ratio: float


def changes_of(
    case: Case,
    hardware: Hardware,
    inlet: Inlet,
    own: Sequence[PointRating],
    points: Sequence[PointRating],
    uses: Sequence[InjectorUse],
    limits: Sequence[Limit],
) -> tuple[Change, ...]:
    """Return the changes one fuel asks for.

    Parameters
    ----------
    inlet : Inlet
        Of the design point.
    own, points : sequence of PointRating
        On the case's own fuel and on this one.
    """
    design = case.targets.design_point
    broken = [limit for limit in limits if not limit.kept]
    return (
        *_nozzle(design, uses, broken),
        *_rows(case, hardware, inlet, _at(own, design), _at(points, design)),
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


def _rows(
    case: Case, hardware: Hardware, inlet: Inlet, own: PointRating, new: PointRating
) -> Iterator[Change]:
    before, after = _primary(own), _primary(new)
    if before is None or after is None or abs(after / before - 1.0) < WORTH_A_DRILL:
        return
    wanted = after / before
    opened = open_rows(case, hardware, inlet, wanted)
    shift = f"primary equivalence ratio {before:.3f} -> {after:.3f}"
    if opened is None:
        yield Change("air holes", "no row can be opened far enough", shift)
        return
    grown = 100.0 * ((opened.after / opened.before) ** 2 - 1.0)
    yield Change(
        f"row {opened.name}",
        f"{1e3 * opened.before:.2f} -> {1e3 * opened.after:.2f} mm ({grown:+.0f} % area)",
        f"{shift}; opened, it comes to {after / opened.share_ratio:.3f} and the pressure loss "
        f"to {opened.loss_ratio:.3f} of the present. The other way round is welding holes shut",
    )


def open_rows(case: Case, hardware: Hardware, inlet: Inlet, wanted: float) -> Opened | None:
    """Return the row to open so that the primary zone's air share changes by a factor.

    More primary air: the primary row opens. Less: the dilution row, which draws air from all.

    Parameters
    ----------
    wanted : float
        Share of the air in the primary zone over the present one [-]
    """
    roles = ("primary",) if wanted > 1.0 else ("dilution", "secondary")
    rows = [o for o in hardware.openings if o.role in roles and o.diameter and o.count]
    rows = [o for o in rows if o.effective_area is None]
    if not rows:
        return None
    row = max(rows, key=lambda o: (roles.index(o.role) == 0, o.count * o.area))
    assert row.diameter is not None
    present = split(hardware, inlet)
    start = _share(case, hardware, present)

    def opened_to(diameter: float) -> Opened:
        changed = with_diameter(hardware, row, diameter)
        solved = split(changed, inlet, guess=present)
        return Opened(
            row.name,
            float(row.diameter or 0.0),
            diameter,
            _share(case, changed, solved) / start,
            solved.pressure_loss / present.pressure_loss,
        )

    step = drill_step(row.diameter, case.targets.drill_step)
    low, high = row.diameter, row.diameter * math.sqrt(MOST_OPENING)
    reached = opened_to(high).share_ratio
    if (wanted > 1.0 and reached < wanted) or (wanted < 1.0 and reached > wanted):
        return None
    for _ in range(PASSES):
        if high - low < 0.25 * step:
            break
        middle = 0.5 * (low + high)
        enough = opened_to(middle).share_ratio
        if (enough >= wanted) if wanted > 1.0 else (enough <= wanted):
            high = middle
        else:
            low = middle
    size = max(round(high / step), math.floor(row.diameter / step) + 1) * step
    return opened_to(round(size, 6))


def with_diameter(hardware: Hardware, row: Opening, diameter: float) -> Hardware:
    """Return the metal with one row drilled to another diameter."""
    assert row.diameter is not None
    larger = replace(row, diameter=diameter, area=row.area * (diameter / row.diameter) ** 2)
    openings = tuple(larger if o.name == row.name else o for o in hardware.openings)
    return replace(hardware, openings=openings)


def _share(case: Case, hardware: Hardware, solved: AirSplit) -> float:
    flows = {flow.name: flow.mass_flow for flow in solved.openings}
    return zone_air(hardware, flows, case.model.primary_jet_share)["primary"]


def _primary(point: PointRating) -> float | None:
    return next((z.equivalence_ratio for z in point.zones if z.name == "primary"), None)


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
