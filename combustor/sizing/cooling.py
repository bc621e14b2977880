"""A first estimate of the film air, slot by slot, and the slots it needs."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from combustor.airflow.result import Inlet
from combustor.base.method import Method
from combustor.hardware.metal import LinerWall
from combustor.heat import transport
from combustor.heat.balance import WallConditions, solve
from combustor.heat.coefficients import (
    annulus_coefficient,
    gas_emissivity,
    gas_viscosity,
    unfilmed_coefficient,
)
from combustor.heat.conduction import coating_resistance, sheet_resistance
from combustor.heat.convection import film_coefficient
from combustor.heat.enclosure import exchange_factor_of
from combustor.heat.film import slot_film
from combustor.heat.sides import AnnulusSide, Casing, GasSide, Radiation
from combustor.sizing.film_slots import (
    METERING_PITCH,
    SlotRoom,
    pitch_by_zone,
    slot_rings,
    slot_stations,
    zone_index,
)
from combustor.sizing.fire import Array
from combustor.sizing.sketch import Sketch

FILM_AIR = Method(
    key="film-air-first-estimate",
    quantity="air of each film slot",
    source="least flow that holds the end of the slot's own panel 25 K below the wall target: "
    "balance of Lefebvre & Herbert 1960, film of Ballal & Lefebvre 1972-73",
    reading="from memory",
    validity={"blowing_ratio": (0.5, 4.0)},
    scatter="simple wall-temperature methods are good to about 6 %",
    note="25 K for hot streaks; films from upstream, which jets tear, are the further reserve",
)
FILM_AIR_SHARE = Method(
    key="film-air-practice",
    quantity="film air of conventional liners",
    source="25 to 40 % of the air in early liners, 15 to 25 % with effusion",
    reading="common practice, no source",
)

USUAL_FILM_AIR = 0.30
WALL_MARGIN = 25.0
BLOWING_RANGE = (0.5, 1.25)
_STEP_TEMPERATURE = 300.0
_SETTLED = 2.0


@dataclass(frozen=True)
class FilmPlan:
    """Air of every slot and the wall it gives.

    Parameters
    ----------
    flow : tuple of float
        One a slot, whole machine [kg/s]
    peak : tuple of float
        Metal at the end of each slot's panel on that slot's film alone [K]
    limit : float
        What the panels were held to [K]
    """

    flow: tuple[float, ...]
    peak: tuple[float, ...]
    limit: float

    @property
    def is_cool(self) -> bool:
        """Whether every panel stays below the limit."""
        return max(self.peak) <= self.limit + _SETTLED


def plan_films(
    sketch: Sketch,
    wall: LinerWall,
    gas: GasSide,
    air: AnnulusSide,
    inlet: Inlet,
    wall_temperature: float,
    metering_flux: float,
    start: Sequence[float] | None = None,
    passes: int = 14,
) -> FilmPlan:
    """Return the least film air that holds every panel below the wall target.

    Parameters
    ----------
    sketch : Sketch
    wall : LinerWall
    gas, air : GasSide, AnnulusSide
    inlet : Inlet
    wall_temperature : float
        Wall target; the panels are held 25 K below [K]
    metering_flux : float
        Air through the metering holes over their area [kg/(s m2)]
    start : sequence of float or None
        Flows to start from [kg/s]
    passes : int
        Most balances.

    Returns
    -------
    FilmPlan
        `FilmPlan.is_cool` is false where the highest blowing ratio does not suffice.
    """
    limit = wall_temperature - WALL_MARGIN
    low, high = _flow_bounds(sketch, gas, metering_flux)
    flow = np.sqrt(low * high) if start is None else np.clip(np.asarray(start), low, high)
    panels = _panels(sketch, wall, gas, air)
    peak = _panel_ends(sketch, gas, inlet, panels, flow)
    for _ in range(passes):
        miss = peak - limit
        settled = (
            (np.abs(miss) < _SETTLED)
            | ((flow >= high) & (miss > 0.0))
            | ((flow <= low) & (miss < 0.0))
        )
        if bool(settled.all()):
            break
        flow = np.clip(flow * np.exp(np.clip(miss / _STEP_TEMPERATURE, -0.5, 0.5)), low, high)
        peak = _panel_ends(sketch, gas, inlet, panels, flow)
    return FilmPlan(tuple(flow.tolist()), tuple(peak.tolist()), limit)


def lay_slots(
    sketch: Sketch,
    bands: Sequence[tuple[float, float]],
    room: SlotRoom,
    wall: LinerWall,
    gas: GasSide,
    air: AnnulusSide,
    inlet: Inlet,
    wall_temperature: float,
    metering_flux: float,
) -> tuple[Sketch, FilmPlan]:
    """Return the sketch with its slots, and their air.

    Slots start at the widest pitch and the lowest height. Where a panel is too hot its zone's
    pitch shortens; when the shortest does not help, the slots become higher.

    Parameters
    ----------
    sketch : Sketch
        Its slots are replaced.
    bands : sequence of (start, end)
        Stretches taken by rows [m]
    room : SlotRoom
        Pitches and heights to choose from.
    wall, gas, air, inlet, wall_temperature, metering_flux :
        As for `plan_films`.

    Returns
    -------
    tuple of Sketch and FilmPlan
        `FilmPlan.is_cool` is false when nothing in the room holds the wall.
    """
    drawn, plan = sketch, None
    for height in room.heights:
        steps = [0, 0, 0]
        while True:
            pitch = pitch_by_zone(sketch.zone_ends, [room.pitches[step] for step in steps])
            stations = slot_stations(sketch.liner_length, bands, pitch)
            drawn = replace(sketch, slots=slot_rings(stations, height))
            plan = plan_films(drawn, wall, gas, air, inlet, wall_temperature, metering_flux)
            hot = {
                zone_index(sketch.zone_ends, ring.station)
                for ring, peak in zip(drawn.slots, plan.peak, strict=True)
                if peak > plan.limit + _SETTLED
            }
            if not hot:
                return drawn, plan
            closer = [zone for zone in hot if steps[zone] + 1 < len(room.pitches)]
            if not closer:
                break
            for zone in closer:
                steps[zone] += 1
    assert plan is not None
    return drawn, plan


def _flow_bounds(sketch: Sketch, gas: GasSide, metering_flux: float) -> tuple[Array, Array]:
    stations = np.array([ring.station for ring in sketch.slots])
    heights = np.array([ring.height for ring in sketch.slots])
    around = heights * sketch.perimeter * sketch.section.cans
    at_one = gas.at("mass_flow", stations) / gas.at("area", stations) * around
    sparsest = 0.25 * math.pi / METERING_PITCH * metering_flux * around
    low = np.maximum(BLOWING_RANGE[0] * at_one, sparsest)
    return low, np.maximum(BLOWING_RANGE[1] * at_one, low)


@dataclass(frozen=True)
class _Panels:
    """Wall conditions at the end of every panel but for the films, and where that is [m]."""

    station: Array
    viscosity: Array
    bare: WallConditions


def _panels(sketch: Sketch, wall: LinerWall, gas: GasSide, air: AnnulusSide) -> _Panels:
    starts = [ring.station for ring in sketch.slots]
    x = np.array([*starts[1:], sketch.liner_length]) - 1e-6
    unfilmed = unfilmed_coefficient(gas, x, x < sketch.zone_ends[0])
    bare = WallConditions(
        gas_temperature=gas.at("temperature", x),
        adiabatic_wall_temperature=gas.at("temperature", x),
        air_temperature=air.at("temperature", x),
        gas_emissivity=gas_emissivity(gas, x, wall.beam_length, Radiation("grey-gas")),
        gas_coefficient=unfilmed,
        air_coefficient=annulus_coefficient(air, x),
        film_warming=np.zeros_like(x),
        hole_conductance=np.zeros_like(x),
        wall_emissivity=wall.emissivity,
        sheet_resistance=sheet_resistance(wall),
        coating_resistance=coating_resistance(wall),
        exchange_factor=exchange_factor_of(wall),
        casing_area_ratio=wall.casing_area_ratio,
        casing=Casing(),
    )
    return _Panels(x, gas_viscosity(gas, x), bare)


def _panel_ends(
    sketch: Sketch,
    gas: GasSide,
    inlet: Inlet,
    panels: _Panels,
    flow: Array,
) -> Array:
    """Return the metal temperature at every panel's end, each on its own film [K]."""
    air_viscosity = float(transport.viscosity(inlet.temperature))
    air_conductivity = float(transport.conductivity(inlet.temperature))
    slot_area = sketch.perimeter * sketch.section.cans
    seen, coefficient = [], []
    for place, ring in enumerate(sketch.slots):
        flux = float(flow[place]) / (ring.height * slot_area)
        gas_flux = float(gas.at("mass_flow", ring.station) / gas.at("area", ring.station))
        distance = panels.station[place : place + 1] - ring.station
        film = slot_film(
            flux / gas_flux,
            air_viscosity / panels.viscosity[place : place + 1],
            distance,
            ring.height,
            ring.lip_thickness,
        )
        hot = panels.bare.gas_temperature[place]
        seen.append(hot - film.effectiveness[0] * (hot - inlet.temperature))
        coefficient.append(
            film_coefficient(
                flux / gas_flux,
                air_conductivity,
                flux,
                air_viscosity,
                distance,
                ring.height,
                panels.bare.gas_coefficient[place : place + 1],
            )[0]
        )
    filmed = replace(
        panels.bare,
        adiabatic_wall_temperature=np.array(seen),
        gas_coefficient=np.array(coefficient),
    )
    return solve(filmed).hot_side
