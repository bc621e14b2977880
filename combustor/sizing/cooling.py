"""Film slots and their air: the least that holds the wall at every operating point."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from combustor.base.method import Method
from combustor.hardware.metal import AxialProfile
from combustor.sizing.film_slots import (
    METERING_PITCH,
    SlotRoom,
    next_slot,
    slot_rings,
)
from combustor.sizing.fire import Array
from combustor.sizing.sketch import Sketch, SlotRing
from combustor.sizing.wall_view import Jet, WallView, effectiveness, metal_temperature

FILM_AIR = Method(
    key="film-air-least",
    quantity="slots and air of each slot",
    source="each slot stands where the films upstream would let the wall pass 25 K below its "
    "target at the hottest operating point; the slot height and the air common to all slots "
    "that need the least, then each slot's air reduced until its own panel reaches that limit",
    reading="derived",
    validity={"blowing_ratio": (0.5, 4.0)},
    scatter="simple wall-temperature methods are good to about 6 %",
    note="balance of Lefebvre & Herbert 1960, films of Ballal & Lefebvre 1972-73 laid over each "
    "other after Sellers 1963; 25 K for hot streaks and for jets that tear the films",
)
FILM_AIR_SHARE = Method(
    key="film-air-practice",
    quantity="film air of conventional liners",
    source="25 to 40 % of the air in early liners, 15 to 25 % with effusion",
    reading="common practice, no source",
)

USUAL_FILM_AIR = 0.30
WALL_MARGIN = 25.0
BLOWING_RANGE = (0.5, 4.0)
COMMON_AIR = (1.0, 1.15, 1.35, 1.6, 2.0, 2.6)
_STEP_TEMPERATURE = 300.0
_SETTLED = 2.0
NEAR_LIMIT = 10.0  # K below the limit: the wall has set the slot


@dataclass(frozen=True)
class FilmPlan:
    """Air of every slot and the wall it gives.

    Parameters
    ----------
    flow : tuple of float
        One a slot, whole machine, at the design point [kg/s]
    peak : tuple of float
        Hottest metal of each slot's panel, at any operating point [K]
    point : tuple of str
        Operating point of each peak.
    limit : float
        What the panels were held to [K]
    left : dict of str to AxialProfile
        Share of each film's air still at the wall at the design point, by opening.
    """

    flow: tuple[float, ...]
    peak: tuple[float, ...]
    point: tuple[str, ...]
    limit: float
    left: dict[str, AxialProfile]

    @property
    def is_cool(self) -> bool:
        """Whether every panel stays below the limit."""
        return max(self.peak) <= self.limit + _SETTLED


@dataclass(frozen=True)
class Wall:
    """The walls to be held: every side at every operating point, the design point first.

    ``limit`` is what the metal is held to, K; ``metering_flux`` the air through metering holes
    over their area, kg/(s m2); ``air`` the design point's air, kg/s.
    """

    views: tuple[WallView, ...]
    limit: float
    metering_flux: float
    air: float


def plan_films(
    sketch: Sketch, wall: Wall, start: Sequence[float] | None = None, passes: int = 14
) -> FilmPlan:
    """Return the least film air that holds every panel of given slots below the limit.

    Parameters
    ----------
    sketch : Sketch
    wall : Wall
    start : sequence of float or None
        Flows to start from [kg/s]
    passes : int
        Most balances.

    Returns
    -------
    FilmPlan
        `FilmPlan.is_cool` is false where the highest blowing ratio does not suffice.
    """
    low, high = _flow_bounds(sketch, wall)
    flow = low if start is None else np.clip(np.asarray(start), low, high)
    peak, point = panel_peaks(sketch, wall, flow)
    for _ in range(passes):
        miss = peak - wall.limit
        settled = (
            (np.abs(miss) < _SETTLED)
            | ((flow >= high) & (miss > 0.0))
            | ((flow <= low) & (miss < 0.0))
        )
        if bool(settled.all()):
            break
        flow = np.clip(flow * np.exp(np.clip(miss / _STEP_TEMPERATURE, -0.5, 0.5)), low, high)
        peak, point = panel_peaks(sketch, wall, flow)
    return FilmPlan(
        tuple(flow.tolist()), tuple(peak.tolist()), point, wall.limit, _left(sketch, wall, flow)
    )


def what_sets(plan: FilmPlan) -> str:
    """Say what the air of the slots is set by, for a table."""
    count = len(plan.peak)
    by_wall = sum(peak >= plan.limit - NEAR_LIMIT for peak in plan.peak)
    by_holes = count - by_wall
    if by_holes == 0:
        return f"all {count} slots are set by the wall"
    return (
        f"{by_wall} of {count} slots are set by the wall, {by_holes} by the sparsest metering "
        "holes that still make a film"
    )


def lay_slots(
    sketch: Sketch, bands: Sequence[tuple[float, float]], room: SlotRoom, wall: Wall
) -> tuple[Sketch, FilmPlan]:
    """Return the sketch with its slots, and their air.

    The lowest slot that holds the wall is taken, and of the amounts of air common to all slots
    the one that needs the least altogether: more air a slot, or more slots.

    Parameters
    ----------
    sketch : Sketch
        Its slots are replaced.
    bands : sequence of (start, end)
        Stretches taken by rows [m]
    room : SlotRoom
        Pitches and heights to choose from.
    wall : Wall

    Returns
    -------
    tuple of Sketch and FilmPlan
        `FilmPlan.is_cool` is false when nothing in the room holds the wall.
    """
    best: tuple[Sketch, FilmPlan] | None = None
    for height in room.heights:
        held = []
        for factor in COMMON_AIR:
            drawn, holds = _laid(sketch, bands, room, wall, height, factor)
            low, high = _flow_bounds(drawn, wall)
            total = float(np.clip(factor * low, low, high).sum())
            if holds:
                held.append((total, factor, drawn))
        if held:
            _, factor, drawn = min(held, key=lambda one: one[0])
            low, high = _flow_bounds(drawn, wall)
            plan = plan_films(drawn, wall, (factor * low).tolist())
            best = drawn, plan
            if plan.is_cool:
                return best
        else:
            plan = plan_films(drawn, wall, (COMMON_AIR[-1] * low).tolist())
            if best is None or max(plan.peak) < max(best[1].peak):
                best = drawn, plan
    assert best is not None
    return best


def panel_peaks(sketch: Sketch, wall: Wall, flow: Array) -> tuple[Array, tuple[str, ...]]:
    """Return the hottest metal of every slot's panel [K] and the operating point it is at."""
    jets = _jets(sketch, wall, sketch.slots, flow)
    starts = np.array([ring.station for ring in sketch.slots])
    peaks = np.zeros((len(wall.views), len(starts)))
    for row, view in zip(peaks, wall.views, strict=True):
        hot = metal_temperature(view, view, jets)
        panel = np.maximum(np.searchsorted(starts, view.station, side="right") - 1, 0)
        np.maximum.at(row, panel, hot)
    worst = np.argmax(peaks, axis=0)
    return peaks.max(axis=0), tuple(wall.views[index].point for index in worst)


def _laid(
    sketch: Sketch,
    bands: Sequence[tuple[float, float]],
    room: SlotRoom,
    wall: Wall,
    height: float,
    factor: float,
) -> tuple[Sketch, bool]:
    """Return the sketch with slots as far apart as the wall allows, and whether it is held."""
    places = [0.0]
    holds = True
    length = sketch.liner_length
    while True:
        drawn = replace(sketch, slots=slot_rings(places, height))
        low, high = _flow_bounds(drawn, wall)
        jets = _jets(drawn, wall, drawn.slots, np.clip(factor * low, low, high))
        last = places[-1]
        end = min(last + room.longest, length)
        reach = min(_reach(view, jets, last, end, wall.limit) for view in wall.views)
        following, is_short = next_slot(last, reach, end, length, bands, room)
        holds = holds and not is_short
        if following is None:
            return drawn, holds
        places.append(following)


def _reach(view: WallView, jets: Sequence[Jet], last: float, end: float, limit: float) -> float:
    """Return how far from the last slot the wall stays below the limit [m]."""
    part = view.part(last, end)
    if part.station.size == 0:
        return end
    hot = metal_temperature(part, view, jets) > limit
    if not hot.any():
        return end
    first = int(np.argmax(hot))
    return last if first == 0 else float(part.station[first - 1])


def _flow_bounds(sketch: Sketch, wall: Wall) -> tuple[Array, Array]:
    """Return the least and the most air of each slot, whole machine [kg/s]."""
    view = wall.views[0]
    stations = np.array([ring.station for ring in sketch.slots])
    heights = np.array([ring.height for ring in sketch.slots])
    around = heights * sketch.perimeter * sketch.section.cans
    at_one = np.interp(stations, view.station, view.mass_flux) * around
    sparsest = 0.25 * math.pi / METERING_PITCH * wall.metering_flux * around
    low = np.maximum(BLOWING_RANGE[0] * at_one, sparsest)
    return low, np.maximum(BLOWING_RANGE[1] * at_one, low)


def _jets(sketch: Sketch, wall: Wall, rings: Sequence[SlotRing], flow: Array) -> list[Jet]:
    around = sketch.perimeter * sketch.section.cans
    return [
        Jet(
            ring.station,
            ring.height,
            ring.lip_thickness,
            float(one) / (wall.air * ring.height * around),
        )
        for ring, one in zip(rings, flow, strict=True)
    ]


def _left(sketch: Sketch, wall: Wall, flow: Array) -> dict[str, AxialProfile]:
    """Return the share of each film still at the wall at the design point, by opening."""
    jets = _jets(sketch, wall, sketch.slots, flow)
    left = {}
    for side, view in zip(sketch.sides, wall.views, strict=False):
        stations = tuple(view.station.tolist())
        for ring, eta in zip(sketch.slots, effectiveness(view, view, jets), strict=True):
            name = sketch.names(ring.name)[sketch.sides.index(side)]
            behind = view.station >= ring.station
            falling = np.minimum.accumulate(np.where(behind, eta, 1.0))
            left[name] = AxialProfile(stations, tuple(falling.tolist()))
    return left
