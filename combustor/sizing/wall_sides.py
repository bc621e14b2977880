"""Both sides of the liner wall while sizing, as the wall balance wants them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from combustor.airflow.result import Inlet
from combustor.base.method import Method
from combustor.hardware.metal import AxialProfile, Hardware, LinerWall
from combustor.hardware.zone_air import FILM_ROLES, FRONT_ROLES, ROW_ROLES, mixed_share
from combustor.heat.sides import AnnulusSide, GasSide
from combustor.sizing.fire import Array, HotGas
from combustor.sizing.wall_duty import WallDuty

WALL_GAS = Method(
    key="wall-gas-while-sizing",
    quantity="gas along the wall while sizing",
    source="equilibrium of the fuel with the air mixed in so far, averaged over streams; a row's "
    "air joins over half a liner height",
    reading="computed",
    note="stream width 0.2: an unmixedness of 0.4 halved by products brought back one to one; "
    "rating replaces it by the reactor networks",
)
STREAM_WIDTH = 0.2
JET_LENGTH_SHARE = 0.5
LEAST_ANNULUS_SHARE = 0.01

# five-point Gauss-Hermite rule: nodes over the standard deviation, and weights
_NODES = np.array([-2.8569700, -1.3556262, 0.0, 1.3556262, 2.8569700])
_WEIGHTS = np.array([0.0112574, 0.2220759, 0.5333333, 0.2220759, 0.0112574])


@dataclass(frozen=True)
class AirAlong:
    """Air along the liner as shares of all air, arrays over stations.

    Parameters
    ----------
    station : ndarray
        [m]
    entered : ndarray
        Inside the liner so far [-]
    mixed : ndarray
        In the core so far [-]
    """

    station: Array
    entered: Array
    mixed: Array


def air_along(
    metal: Hardware,
    shares: Mapping[str, float],
    station: Array,
    primary_jet_share: float,
    films: Mapping[str, AxialProfile] | None = None,
) -> AirAlong:
    """Return the air inside the liner and in its core.

    Parameters
    ----------
    metal : Hardware
    shares : mapping of str to float
        Of all air, by opening [-]
    station : ndarray
        [m]
    primary_jet_share : float
        [-]
    films : mapping of str to AxialProfile or None
        As for `mixed_share`.
    """
    entered, mixed = np.zeros_like(station), np.zeros_like(station)
    primary_end = metal.zones[0].end
    for opening in metal.openings:
        share = shares[opening.name]
        entered += share * (station >= opening.station)
        if opening.role in ROW_ROLES:
            start = max(opening.station, primary_end)
            early = mixed_share(metal, opening, primary_end, primary_jet_share)
            end = start + JET_LENGTH_SHARE * metal.liner_height
            end = min(end, next((z.end for z in metal.zones if z.start <= start < z.end), end))
            ramp = np.clip((station - start) / max(end - start, 1e-9), 0.0, 1.0)
            mixed += share * (early + (1.0 - early) * ramp)
        elif opening.role in FRONT_ROLES:
            mixed += share
        elif opening.role in FILM_ROLES:
            part = [mixed_share(metal, opening, x, films=films) for x in station.tolist()]
            mixed += share * np.where(station <= primary_end, 0.0, part)
    return AirAlong(station, entered, mixed)


def mean_temperature(table: HotGas, equivalence_ratio: Array) -> Array:
    """Return the mean equilibrium temperature of streams about an equivalence ratio [K]."""
    spread = np.maximum(1.0 + STREAM_WIDTH * _NODES[:, None], 0.0) * equivalence_ratio
    return _WEIGHTS @ table.at(spread).temperature


def gas_side(metal: Hardware, air: AirAlong, duty: WallDuty) -> GasSide:
    """Return the core gas of one operating point along the wall."""
    inlet, core = duty.inlet, duty.table.at(duty.overall / air.mixed)
    temperature = mean_temperature(duty.table, duty.overall / air.mixed)
    # core and film share a velocity: what clings to the wall fills little of the passage
    thinner = inlet.gas_constant * inlet.temperature / (core.gas_constant * temperature)
    apart = np.maximum(air.entered - air.mixed, 0.0)
    flow = (air.mixed + apart * thinner) * inlet.mass_flow + duty.fuel_flow
    return GasSide(
        station=air.station,
        temperature=temperature,
        mass_flow=flow,
        area=metal.liner.area.at(air.station) * metal.cans,
        hydraulic_diameter=metal.liner.hydraulic_diameter.at(air.station),
        fuel_air_ratio=core.equivalence_ratio * duty.stoichiometric,
        pressure=inlet.pressure,
        x_h2o=core.x_h2o,
        x_co2=core.x_co2,
        recirculation_end=metal.zones[0].end,
    )


def annulus_side(
    metal: Hardware, wall: LinerWall, shares: Mapping[str, float], station: Array, inlet: Inlet
) -> AnnulusSide:
    """Return the annulus air behind one wall; at inlet temperature.

    What has not yet entered the liner on this side passes the annulus (straight flow); in
    reverse flow what enters upstream of a station passes it, with this side's share by area of
    what the dome draws.
    """
    passage = next(annulus for annulus in metal.annuli if annulus.side == wall.side)
    passing = np.zeros_like(station)
    for opening in metal.openings:
        if opening.side != wall.side:
            continue
        ahead = opening.station > station
        passing += shares[opening.name] * (ahead if metal.flow == "straight" else ~ahead)
    if metal.flow == "reverse":
        areas = {a.side: float(a.area.at(0.0)) for a in metal.annuli}
        front = sum(shares[o.name] for o in metal.openings if o.side == "dome")
        passing += front * areas[passage.side] / sum(areas.values())
    # the last stretch carries the leakage only; the air there is slow but never at rest
    flow = np.maximum(passing, LEAST_ANNULUS_SHARE / len(metal.walls)) * inlet.mass_flow
    return AnnulusSide(
        station=station,
        mass_flow=flow,
        temperature=np.full_like(station, inlet.temperature),
        area=passage.area.at(station) * metal.cans,
        hydraulic_diameter=passage.hydraulic_diameter.at(station),
    )
