"""Rows to open so that a fuel meets the present fuel's primary equivalence ratio."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace

from combustor.airflow.result import Inlet
from combustor.airflow.split import AirSplit, split
from combustor.base.method import Method
from combustor.case.schema import Case
from combustor.hardware.metal import Hardware, Opening
from combustor.hardware.zone_air import zone_air
from combustor.rating.record import PointRating
from combustor.sizing.drill import drill_step
from combustor.studies.switch_record import Change

ROWS_TO_OPEN = Method(
    key="rows-to-open",
    quantity="holes to open for the equivalence ratios of the present fuel",
    source="air split of the changed metal, cold, solved again until the primary zone's share of "
    "the air has changed as its fuel has; the changed metal then rated on the fuel, and drilled "
    "once more by what is still missing",
    reading="computed",
)

WORTH_A_DRILL = 0.03  # change of the primary equivalence ratio
CLOSE_ENOUGH = 0.01  # to the primary equivalence ratio wanted
MOST_OPENING = 2.5  # of a row's area
PASSES = 40

Rate = Callable[[Hardware], PointRating | None]


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


def row_changes(
    case: Case,
    hardware: Hardware,
    inlet: Inlet,
    own: PointRating,
    new: PointRating,
    rate: Rate,
) -> Iterator[Change]:
    """Yield the row to open at the design point, what it comes to when rated, if it is worth it.

    Parameters
    ----------
    inlet : Inlet
        Of the design point.
    own, new : PointRating
        The design point on the case's own fuel and on the other.
    rate : callable
        Rates other metal on the other fuel there; None where nothing burns.
    """
    before, after = _primary(own), _primary(new)
    if before is None or after is None or abs(after / before - 1.0) < WORTH_A_DRILL:
        return
    shift = f"primary equivalence ratio {before:.3f} -> {after:.3f}"
    opened = open_rows(case, hardware, inlet, after / before)
    if opened is None:
        yield Change("air holes", "no row can be opened far enough", shift)
        return
    opened, rated = _drilled_again(case, hardware, inlet, before, after, opened, rate)
    grown = 100.0 * ((opened.after / opened.before) ** 2 - 1.0)
    yield Change(
        f"row {opened.name}",
        f"{1e3 * opened.before:.2f} -> {1e3 * opened.after:.2f} mm ({grown:+.0f} % area)",
        f"{shift}; {_comes_to(opened, after, rated)}. The other way round is welding holes shut",
    )


def _drilled_again(
    case: Case,
    hardware: Hardware,
    inlet: Inlet,
    before: float,
    after: float,
    opened: Opened,
    rate: Rate,
) -> tuple[Opened, PointRating | None]:
    """Return the opened row and its rating: a second size where that comes nearer."""
    rated = rate(_opened(hardware, opened))
    reached = None if rated is None else _primary(rated)
    if reached is None or abs(reached / before - 1.0) < CLOSE_ENOUGH:
        return opened, rated
    # the fire shifts the split a little against the cold one the row was drilled by
    second = open_rows(case, hardware, inlet, after / before * reached / before)
    if second is None or second.name != opened.name or second.after == opened.after:
        return opened, rated
    again = rate(_opened(hardware, second))
    nearer = None if again is None else _primary(again)
    if nearer is None or abs(nearer - before) >= abs(reached - before):
        return opened, rated
    return second, again


def _opened(hardware: Hardware, opened: Opened) -> Hardware:
    return with_diameter(hardware, hardware.opening(opened.name), opened.after)


def _comes_to(opened: Opened, after: float, rated: PointRating | None) -> str:
    """Return what the opened row brings: rated, or by the cold split where that fails."""
    reached = None if rated is None else _primary(rated)
    if rated is None or reached is None or rated.pressure_loss is None:
        return (
            f"by the cold air split alone, the opened metal having no rating that burns, it comes "
            f"to {after / opened.share_ratio:.3f} and the pressure loss to {opened.loss_ratio:.3f} "
            "of the present"
        )
    words = (
        f"opened and rated again at {rated.name}, it comes to {reached:.3f} at "
        f"{100.0 * rated.pressure_loss:.2f} % pressure loss"
    )
    if rated.emissions is not None and rated.emissions.nox_dry_15 is not None:
        words += f", NOx {1e6 * rated.emissions.nox_dry_15:.3g} ppm at 15 % O2"
    if rated.walls:
        words += f", peak wall {max(wall.temperature for wall in rated.walls):.0f} K"
    return words


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
