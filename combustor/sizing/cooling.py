"""Film slots: where they stand, how high they are, and a first estimate of their air."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
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
from combustor.sizing.drill import nearest_drill
from combustor.sizing.fire import Array
from combustor.sizing.profile import LinerProfile
from combustor.sizing.sketch import Sketch, SlotRing

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
SLOT_PITCH = Method(
    key="slot-pitch",
    quantity="distance from film slot to film slot",
    source="25 to 50 mm ring to ring; a row of holes lies whole inside one panel",
    reading="common practice, no source",
)
SLOT_HEIGHT = Method(
    key="slot-height",
    quantity="film slot height",
    source="1 to 3 mm and at least 0.4 % of the liner height, lip 0.5 to 1 mm; the lowest that "
    "holds the wall, since effectiveness grows with flow^0.65 but falls with height^0.45",
    reading="common practice, no source",
)
METERING_HOLES = Method(
    key="slot-metering-holes",
    quantity="metering holes of a film slot",
    source="diameter 1 to 1.5 slot heights at a pitch of at most 2.5 diameters, so that the jets "
    "have merged at the lip; poor film where they are sparser (Sturgess 1986)",
    reading="common practice, no source",
    validity={"pitch_over_diameter": (1.5, 2.5)},
    note="sets the least air of a slot",
)

USUAL_FILM_AIR = 0.30
WALL_MARGIN = 25.0
PITCHES = (50e-3, 40e-3, 32e-3, 25e-3)
LOWEST_SLOT, HIGHEST_SLOT, SLOT_STEP = 1.0e-3, 3.0e-3, 0.5e-3
LOWEST_SLOT_SHARE = 0.004
LIP_SHARE, LEAST_LIP = 0.4, 0.5e-3
BLOWING_RANGE = (0.5, 1.25)
BAND_MARGIN = 6e-3
METERING_PITCH = 2.4
WIDEST_METERING = 1.5
_STEP_TEMPERATURE = 300.0
_SETTLED = 2.0


@dataclass(frozen=True)
class SlotRoom:
    """Slot pitches to choose from, falling, and heights, rising; m."""

    pitches: tuple[float, ...]
    heights: tuple[float, ...]


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


def slot_stations(
    length: float,
    bands: Sequence[tuple[float, float]],
    pitch: float | Callable[[float], float],
) -> tuple[float, ...]:
    """Return where slots stand: pitch at most, none within a band of holes.

    Parameters
    ----------
    length : float
        Liner [m]
    bands : sequence of (start, end)
        Stretches taken by rows [m]
    pitch : float or callable
        Largest distance from slot to slot, or that by station; a panel with a row may be
        longer [m]

    Returns
    -------
    tuple of float
        To whole millimetres, the first at the dome [m]
    """
    found: list[float] = []
    begin = 0.0
    for start, end in [*_merged(bands), (length, length)]:
        most = pitch(0.5 * (begin + start)) if callable(pitch) else pitch
        panels = max(math.ceil((end - begin) / most - 1e-9), 1)
        places = [begin + (end - begin) * index / panels for index in range(panels)]
        found += [min(place, start) for place in places]
        begin = end
    whole = sorted({round(place, 3) for place in found if place < length - BAND_MARGIN})
    return tuple(
        place
        for index, place in enumerate(whole)
        if index == 0 or place - whole[index - 1] > BAND_MARGIN
    )


def slot_room(liner_height: float, pitch: float | None, height: float | None) -> SlotRoom:
    """Return what slots may be: stated pitch and height, else the ranges of practice [m]."""
    return SlotRoom(
        PITCHES if pitch is None else (pitch,),
        slot_heights(liner_height) if height is None else (height,),
    )


def slot_heights(liner_height: float) -> tuple[float, ...]:
    """Return the slot heights to try, rising [m]."""
    lowest = min(max(LOWEST_SLOT, LOWEST_SLOT_SHARE * liner_height), HIGHEST_SLOT)
    count = math.ceil((HIGHEST_SLOT - lowest) / SLOT_STEP - 1e-9) + 1
    # rounded up to a tenth of a millimetre: the height of a machined lip
    start = math.ceil(lowest * 1e4 - 1e-6) / 1e4
    heights = [round(start + place * SLOT_STEP, 5) for place in range(count)]
    return tuple(height for height in heights if height <= HIGHEST_SLOT + 1e-9)


def metering_diameter(area: float, perimeter: float, slot_height: float) -> float:
    """Return the drill of a slot's metering holes [m].

    Parameters
    ----------
    area : float
        Of all metering holes of one slot [m2]
    perimeter : float
        [m]
    slot_height : float
        [m]
    """
    # n (pi/4) d^2 = area and n pitch d = perimeter
    wanted = 4.0 / math.pi * area * METERING_PITCH / perimeter
    return nearest_drill(min(max(wanted, slot_height), WIDEST_METERING * slot_height))


def lip_thickness(slot_height: float) -> float:
    """Return the lip thickness of a slot [m]."""
    return max(LIP_SHARE * slot_height, LEAST_LIP)


def slot_rings(stations: Sequence[float], height: float) -> tuple[SlotRing, ...]:
    """Return slots named film-1, film-2 ... from the dome on; metering holes still to drill."""
    lip = lip_thickness(height)
    return tuple(
        SlotRing(f"film-{place + 1}", x, height, lip, 1.5 * height)
        for place, x in enumerate(stations)
    )


def with_metering(sketch: Sketch, areas: Mapping[str, float]) -> Sketch:
    """Return the sketch with a drill for every slot's metering area [m2]."""
    rings = tuple(
        replace(
            ring,
            hole_diameter=metering_diameter(areas[ring.name], sketch.perimeter, ring.height),
        )
        for ring in sketch.slots
    )
    return replace(sketch, slots=rings)


def gas_side(
    sketch: Sketch,
    profile: LinerProfile,
    inlet: Inlet,
    fuel_flow: float,
    pressure: float,
    stoichiometric: float,
) -> GasSide:
    """Return the hot gas as the wall march wants it.

    Parameters
    ----------
    sketch : Sketch
    profile : LinerProfile
    inlet : Inlet
    fuel_flow : float
        [kg/s]
    pressure : float
        In the liner [Pa]
    stoichiometric : float
        Stoichiometric fuel per dry air [-]
    """
    station, core = profile.station, profile.core
    area = sketch.liner_area * sketch.section.cans
    return GasSide(
        station=station,
        temperature=core.temperature,
        mass_flow=profile.entered * inlet.mass_flow + fuel_flow,
        area=np.full_like(station, area),
        hydraulic_diameter=np.full_like(
            station, sketch.section.hydraulic_diameter(sketch.liner_height)
        ),
        fuel_air_ratio=core.equivalence_ratio * stoichiometric,
        pressure=pressure,
        x_h2o=core.x_h2o,
        x_co2=core.x_co2,
        recirculation_end=sketch.zone_ends[0],
    )


def annulus_side(
    sketch: Sketch, profile: LinerProfile, inlet: Inlet, front_share: float
) -> AnnulusSide:
    """Return the annulus air as the wall march wants it; at inlet temperature.

    What has not yet entered the liner passes the annulus (straight flow); in reverse flow
    what enters upstream of a station, dome included, passes it.
    """
    station = profile.station
    if sketch.flow == "straight":
        share = 1.0 - profile.entered
    else:
        share = np.maximum(profile.entered, front_share)
    # the last stretch carries the leakage only; the film there is thin but never at rest
    flow = np.maximum(share, 0.01) * inlet.mass_flow
    return AnnulusSide(
        station=station,
        mass_flow=flow,
        temperature=np.full_like(station, inlet.temperature),
        area=np.full_like(station, sketch.annulus_area * sketch.section.cans),
        hydraulic_diameter=np.full_like(station, 2.0 * sketch.annulus_gap),
    )


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
            pitch = _pitch_by_zone(sketch.zone_ends, [room.pitches[step] for step in steps])
            stations = slot_stations(sketch.liner_length, bands, pitch)
            drawn = replace(sketch, slots=slot_rings(stations, height))
            plan = plan_films(drawn, wall, gas, air, inlet, wall_temperature, metering_flux)
            hot = {
                _zone_index(sketch.zone_ends, ring.station)
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


def _zone_index(zone_ends: Sequence[float], station: float) -> int:
    return min(sum(station >= end for end in zone_ends), len(zone_ends) - 1)


def _pitch_by_zone(
    zone_ends: Sequence[float], pitches: Sequence[float]
) -> Callable[[float], float]:
    return lambda station: pitches[_zone_index(zone_ends, station)]


def _merged(bands: Sequence[tuple[float, float]]) -> list[tuple[float, float]]:
    """Return the bands with those that touch made one."""
    joined: list[tuple[float, float]] = []
    for start, end in sorted(bands):
        if joined and start <= joined[-1][1]:
            joined[-1] = (joined[-1][0], max(joined[-1][1], end))
        else:
            joined.append((start, end))
    return joined


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
