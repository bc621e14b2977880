"""What sizing keeps and what it carries from pass to pass."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.case.schema import Case
from combustor.hardware.metal import Hardware
from combustor.heat.sides import Radiation
from combustor.sizing.air_budget import AirBudget
from combustor.sizing.burnout import Burnout
from combustor.sizing.casing import Casing
from combustor.sizing.cooling import FilmPlan
from combustor.sizing.duty import Duty
from combustor.sizing.frame import Frame, LossShares
from combustor.sizing.loop import Fit
from combustor.sizing.metal import has_cross_fire, metal_of, opening_names
from combustor.sizing.profile import LinerProfile, liner_profile
from combustor.sizing.rows import RowPlan
from combustor.sizing.section import Section
from combustor.sizing.sketch import (
    CROSS_FIRE,
    DOME,
    LEAK,
    PREMIXER,
    SWIRLER,
    Sketch,
)
from combustor.sizing.wall_duty import WallDuty

CROSS_FIRE_SHARE = 0.25
CLEAR_FLAME = Radiation("grey-gas")


@dataclass(frozen=True)
class Task:
    """What stays the same from pass to pass.

    ``burnout`` is a lean flame's; ``walls`` are the operating points that may heat the wall
    most, the design point first.
    """

    case: Case
    duty: Duty
    section: Section
    casing: Casing
    burnout: Burnout | None = None
    walls: tuple[WallDuty, ...] = ()
    radiation: Radiation = CLEAR_FLAME

    @property
    def front_end(self) -> str:
        """The front end asked for."""
        return self.case.targets.front_end


@dataclass(frozen=True)
class State:
    """What one pass hands to the next.

    ``films`` are slot flows of the whole machine, kg/s; ``shares`` are by opening.
    """

    frame: Frame
    sketch: Sketch
    plans: Mapping[str, RowPlan]
    budget: AirBudget
    films: tuple[float, ...]
    film_plan: FilmPlan | None
    shares: Mapping[str, float]
    profile: LinerProfile | None
    fit: Fit | None
    loss: LossShares


def shares_by_opening(
    shares: AirBudget, sketch: Sketch, films: tuple[float, ...]
) -> dict[str, float]:
    """Return the share of all air of every opening; slots take the film air as ``films``."""
    by_name = {SWIRLER: shares.swirler, DOME: shares.dome}
    if sketch.premixing is not None:
        by_name[PREMIXER] = shares.premixer
    for row in sketch.rows:
        by_name |= _apart(sketch, row.name, shares.of_row(row.name), sketch.row_shares(row.name))
    total = sum(films)
    for ring, flow in zip(sketch.slots, films, strict=True):
        by_name |= _apart(sketch, ring.name, shares.film * flow / total, sketch.wall_shares())
    leak = shares.leak
    if has_cross_fire(sketch):
        by_name[CROSS_FIRE] = CROSS_FIRE_SHARE * leak
        leak -= by_name[CROSS_FIRE]
    return by_name | _apart(sketch, LEAK, leak, sketch.wall_shares())


def _apart(sketch: Sketch, name: str, share: float, parts: tuple[float, ...]) -> dict[str, float]:
    return {one: share * part for one, part in zip(sketch.names(name), parts, strict=True)}


def bare_metal(sketch: Sketch) -> Hardware:
    """Return the metal with openings of token size, for what depends on positions only."""
    return metal_of(sketch, dict.fromkeys(opening_names(sketch), 1e-4), drilled=False)


def profile_of(task: Task, sketch: Sketch, shares: Mapping[str, float]) -> LinerProfile:
    """Return the gas along the liner of a sketch for given shares of the air."""
    return liner_profile(
        bare_metal(sketch),
        shares,
        task.duty.overall,
        task.duty.table,
        task.case.model.primary_jet_share,
    )
