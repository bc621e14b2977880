"""What sizing keeps and what it carries from pass to pass."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.case.schema import Case
from combustor.hardware.metal import Hardware
from combustor.sizing.air_budget import AirBudget
from combustor.sizing.casing import Casing
from combustor.sizing.cooling import FilmPlan
from combustor.sizing.duty import Duty
from combustor.sizing.frame import Frame, LossShares
from combustor.sizing.loop import Fit
from combustor.sizing.profile import LinerProfile, liner_profile
from combustor.sizing.rows import RowPlan
from combustor.sizing.section import Section
from combustor.sizing.sketch import (
    DOME,
    LEAK,
    SWIRLER,
    Sketch,
    metal_of,
)


@dataclass(frozen=True)
class Task:
    """What stays the same from pass to pass."""

    case: Case
    duty: Duty
    section: Section
    casing: Casing


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
    by_name = {
        SWIRLER: shares.swirler,
        DOME: shares.dome,
        "primary": shares.primary,
        "secondary": shares.secondary,
        "dilution": shares.dilution,
        LEAK: shares.leak,
    }
    total = sum(films)
    for ring, flow in zip(sketch.slots, films, strict=True):
        by_name[ring.name] = shares.film * flow / total
    return by_name


def bare_metal(sketch: Sketch) -> Hardware:
    """Return the metal with openings of token size, for what depends on positions only."""
    names = [SWIRLER, DOME, LEAK, *(row.name for row in sketch.rows)]
    names += [ring.name for ring in sketch.slots]
    return metal_of(sketch, dict.fromkeys(names, 1e-4), drilled=False)


def profile_of(task: Task, sketch: Sketch, shares: Mapping[str, float]) -> LinerProfile:
    """Return the gas along the liner of a sketch for given shares of the air."""
    return liner_profile(
        bare_metal(sketch),
        shares,
        task.duty.overall,
        task.duty.table,
        task.case.model.primary_jet_share,
    )
