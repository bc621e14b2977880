"""Static pressure of the gas inside the liner: mass and momentum with the fire's temperature.

Momentum per cell: p2 A2 + m2 U2 = p1 A1 + m1 U1 + sum(W V cos(angle)) + (p1 + p2)/2 (A2 - A1);
wall friction is neglected. Arrays run downstream, the last axis is the node.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.airflow.grid import doubled_nodes, merged, nearest, profile_at
from combustor.airflow.result import Array, Inlet, LinerGas
from combustor.base.method import Method
from combustor.gasdynamics import velocity_from_static
from combustor.hardware.metal import Hardware, Opening

LINER_MOMENTUM = Method(
    key="liner-momentum",
    quantity="static pressure along the liner",
    source="one-dimensional balance of mass and momentum with side jets and given temperatures",
    reading="derived",
    note="no wall friction; fuel brings mass but no momentum",
)


@dataclass(frozen=True)
class LinerGrid:
    """What stays fixed along the liner while its flow is solved.

    ``entered`` (node, opening) is 1 from the node just behind an opening on; ``cell_of``
    (cell, opening) marks the cell in which its jet's momentum comes in; ``fuel`` is the fuel
    flow at each node, kg/s.
    """

    station: Array
    area: Array
    mean_area: Array
    entered: Array
    cell_of: Array
    upstream: NDArray[np.intp]
    fuel: Array


def liner_grid(
    hardware: Hardware,
    openings: Sequence[Opening],
    end: float,
    cells: int,
    liner_gas: LinerGas | None,
) -> LinerGrid:
    """Return the grid of the liner from the dome face to ``end`` (m)."""
    entries = [opening.station for opening in openings]
    fuel_station = None
    if liner_gas is not None and liner_gas.fuel_flow > 0.0:
        fuel_station = min(max(liner_gas.fuel_station, 0.0), end)
        entries.append(fuel_station)
    rows = merged(entries)
    station = doubled_nodes(0.0, end, cells, rows, hardware.liner.area.station)
    count = len(openings)
    entered = np.zeros((station.size, count))
    cell_of = np.zeros((station.size - 1, count))
    upstream = np.zeros(count, dtype=np.intp)
    for index, opening in enumerate(openings):
        before = _before(station, nearest(rows, opening.station))
        upstream[index] = before
        entered[before + 1 :, index] = 1.0
        cell_of[before, index] = 1.0
    fuel = np.zeros(station.size)
    if liner_gas is not None and fuel_station is not None:
        fuel[_before(station, nearest(rows, fuel_station)) + 1 :] = liner_gas.fuel_flow
    area = profile_at(hardware.liner.area, station, hardware.cans)
    return LinerGrid(
        station=station,
        area=area,
        mean_area=0.5 * (area[1:] + area[:-1]),
        entered=entered.T.copy(),
        cell_of=cell_of.T.copy(),
        upstream=upstream,
        fuel=fuel,
    )


def _before(station: Array, row: float) -> int:
    return int(np.argmin(np.abs(station - row)))


@dataclass
class LinerField:
    """Gas along the liner in its latest sweep (arrays over nodes)."""

    mass_flow: Array
    static_pressure: Array
    velocity: Array
    temperature: Array


@dataclass(frozen=True)
class GasProperties:
    """Temperature (None: unfired, that of the air let in), gas constant and gamma at nodes."""

    temperature: Array | None
    gas_constant: Array
    heat_capacity_ratio: Array


def gas_properties(grid: LinerGrid, inlet: Inlet, liner_gas: LinerGas | None) -> GasProperties:
    """Return the gas at the nodes of ``grid``."""
    if liner_gas is None:
        one = np.ones(grid.station.size)
        return GasProperties(None, inlet.gas_constant * one, inlet.heat_capacity_ratio * one)
    return GasProperties(
        np.interp(grid.station, liner_gas.station, liner_gas.temperature),
        np.interp(grid.station, liner_gas.station, liner_gas.gas_constant),
        np.interp(grid.station, liner_gas.station, liner_gas.heat_capacity_ratio),
    )


def unfired_temperature(grid: LinerGrid, mass_flow: Array, air_temperature: Array) -> Array:
    """Return the mass-mean temperature of the air let in so far, K, at every node."""
    entered = mass_flow @ grid.entered
    warm = (mass_flow * air_temperature) @ grid.entered
    first = air_temperature[..., :1]
    return np.where(entered > 0.0, warm / np.where(entered > 0.0, entered, 1.0), first)


def sweep(
    grid: LinerGrid,
    gas: GasProperties,
    *,
    static_pressure: Array,
    head_pressure: Array,
    opening_flow: Array,
    axial_momentum: Array,
    temperature: Array,
) -> LinerField:
    """Return the liner for given flows, static pressures of the last sweep as a start.

    One sweep shrinks the error of the static pressures by about gamma times the Mach number
    squared.

    Parameters
    ----------
    grid : LinerGrid
    gas : GasProperties
    static_pressure : ndarray
        Latest sweep, Pa.
    head_pressure : ndarray
        Static pressure at the dome face, before anything has come in, Pa.
    opening_flow : ndarray
        kg/s.
    axial_momentum : ndarray
        Of each opening's jet, N.
    temperature : ndarray
        Total temperature at the nodes, K.
    """
    mass_flow = opening_flow @ grid.entered + grid.fuel
    velocity = velocity_from_static(
        mass_flow / grid.area,
        static_pressure,
        temperature,
        gas.gas_constant,
        gas.heat_capacity_ratio,
    )
    momentum = mass_flow * velocity
    rise = (axial_momentum @ grid.cell_of - np.diff(momentum, axis=-1)) / grid.mean_area
    pressure = np.empty(momentum.shape)
    pressure[..., 0] = head_pressure
    pressure[..., 1:] = np.asarray(head_pressure)[..., None] + np.cumsum(rise, axis=-1)
    return LinerField(mass_flow, pressure, velocity, temperature)
