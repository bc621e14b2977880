"""Air along one annulus: friction, bleed through the openings, heat from the wall.

Arrays run in the direction of flow; the last axis is the node, a leading axis may hold several
states of the same machine at once.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from combustor.airflow.friction import friction_factor_haaland
from combustor.airflow.grid import doubled_nodes, merged, nearest, profile_at
from combustor.airflow.result import AnnulusHeat, Array, Inlet
from combustor.base.method import Method
from combustor.gasdynamics import velocity_from_static, viscosity_sutherland
from combustor.hardware.metal import Passage

RECOVERY = Method(
    key="annulus-recovery",
    quantity="static rise of the annulus air as part of it leaves",
    source="p2 - p1 = k rho (U1^2 - U2^2): Bernoulli on the core k = 0.5, momentum bound k = 1",
    reading="derived",
    validity={"recovery_factor": (0.4, 0.6)},
    note="0.5 used: the total pressure of the air that goes on is unchanged",
)
TURNING = Method(
    key="annulus-turning",
    quantity="loss of the air that turns from the annulus into the dome of a reverse-flow machine",
    source="0.2 of the annulus head, usual value for a turn or a strut row",
    reading="from memory",
)
RECOVERY_FACTOR = 0.5
TURNING_LOSS = 0.2


def recovery(density: float, velocity_before: float, velocity_after: float, factor: float) -> float:
    """Return the static rise at a bleed, Pa: factor x rho x (U1^2 - U2^2).

    Parameters
    ----------
    density : float
        kg/m3.
    velocity_before, velocity_after : float
        m/s.
    factor : float
        0.5 Bernoulli on the core, 1 momentum bound.
    """
    return factor * density * (velocity_before**2 - velocity_after**2)


@dataclass(frozen=True)
class AnnulusGrid:
    """What stays fixed along one annulus while its flow is solved.

    ``draws`` (opening, node) is 1 where an opening is fed from beyond the node; ``dome_draw``
    (opening) marks the dome's openings where this annulus feeds the dome. ``row`` lists the
    openings of this side and ``node`` the node just upstream of each; ``heat`` is taken up on
    the way to each node from the one before, W.
    """

    side: Literal["outer", "inner"]
    station: Array
    area: Array
    hydraulic_diameter: Array
    length: Array
    relative_roughness: Array
    draws: Array
    dome_draw: Array | None
    row: NDArray[np.intp]
    node: NDArray[np.intp]
    heat: Array | None


def annulus_grid(
    passage: Passage,
    *,
    reverse: bool,
    cans: int,
    end: float,
    cells: int,
    roughness: float,
    openings: Sequence[tuple[int, float]],
    dome_openings: Sequence[int],
    count: int,
    heats: Sequence[AnnulusHeat],
) -> AnnulusGrid:
    """Return the grid of one annulus.

    Parameters
    ----------
    passage : Passage
    reverse : bool
        Air runs from the exit end to the dome and feeds it.
    cans, end, cells, roughness : as in the metal; ``end`` is the exit end, m.
    openings : sequence of (index, station)
        Openings fed from this annulus.
    dome_openings : sequence of int
        Openings fed from the dome region.
    count : int
        All openings.
    heats : sequence of AnnulusHeat
        Heat given to this side's air.
    """
    rows = merged(station for _, station in openings)
    rising = doubled_nodes(0.0, end, cells, rows, passage.area.station)
    station = rising[::-1] if reverse else rising
    draws = np.zeros((station.size, count))
    nodes = []
    for index, position in openings:
        before = int(np.argmin(np.abs(station - nearest(rows, position))))
        draws[: before + 1, index] = 1.0
        nodes.append(before)
    dome_draw = None
    if reverse:
        dome_draw = np.zeros(count)
        dome_draw[list(dome_openings)] = 1.0
    hydraulic_diameter = profile_at(passage.hydraulic_diameter, station)
    return AnnulusGrid(
        side="outer" if passage.side == "outer" else "inner",
        station=station,
        area=profile_at(passage.area, station, cans),
        hydraulic_diameter=hydraulic_diameter,
        length=np.abs(np.diff(station)),
        relative_roughness=roughness / hydraulic_diameter,
        draws=draws.T.copy(),
        dome_draw=dome_draw,
        row=np.array([index for index, _ in openings], dtype=np.intp),
        node=np.array(nodes, dtype=np.intp),
        heat=_heat_on_grid(station, heats, last=_last_flowing(draws, dome_draw)),
    )


def _last_flowing(draws: Array, dome_draw: Array | None) -> int:
    if dome_draw is not None and dome_draw.any():
        return int(draws.shape[0] - 1)
    flowing = np.flatnonzero(draws.any(axis=1))
    return int(flowing[-1]) if flowing.size else 0


def _heat_on_grid(station: Array, heats: Sequence[AnnulusHeat], last: int) -> Array | None:
    """Return the heat taken up on the way to each node from the one before, W.

    Heat given beyond the last row has no other way out than through that row's air.
    """
    if not heats:
        return None
    taken_up = np.zeros_like(station)
    direction = np.sign(station[-1] - station[0])
    for heat in heats:
        knots = np.asarray(heat.station, dtype=float)
        rate = np.asarray(heat.heat_rate, dtype=float)
        steps = 0.5 * (rate[1:] + rate[:-1]) * np.diff(knots)
        along = direction * _integral(station, knots, rate, steps)
        taken_up[1:] += np.diff(along)
        # Heat stated before the entry or past the end still goes into this air.
        taken_up[last] += float(steps.sum()) - (along[-1] - along[0])
    taken_up[last] += taken_up[last + 1 :].sum()
    taken_up[last + 1 :] = 0.0
    return taken_up


def _integral(x: Array, knots: Array, rate: Array, steps: Array) -> Array:
    """Integrate the piecewise linear ``rate`` from its first knot to ``x``."""
    inside = np.clip(x, knots[0], knots[-1])
    cell = np.clip(np.searchsorted(knots, inside, side="right") - 1, 0, knots.size - 2)
    before = np.concatenate(([0.0], np.cumsum(steps)))[cell]
    beyond = inside - knots[cell]
    slope = (rate[cell + 1] - rate[cell]) / np.maximum(knots[cell + 1] - knots[cell], 1e-300)
    return before + (rate[cell] + 0.5 * slope * beyond) * beyond


@dataclass
class AnnulusField:
    """Air along one annulus in its latest sweep (arrays over nodes)."""

    mass_flow: Array
    total_pressure: Array
    static_pressure: Array
    velocity: Array
    temperature: Array


def rest(grid: AnnulusGrid, inlet: Inlet, pressure: float) -> AnnulusField:
    """Return the annulus at rest at ``pressure`` (Pa), to start from."""
    level = np.full(grid.station.size, pressure)
    warm = np.full(grid.station.size, inlet.temperature)
    return AnnulusField(0.0 * level, level, level, 0.0 * level, warm)


def temperature_along(grid: AnnulusGrid, inlet: Inlet, mass_flow: Array) -> Array:
    """Return the total temperature at every node, K, with the heat taken up on the way."""
    if grid.heat is None:
        return np.full(grid.station.size, inlet.temperature)
    carrying = np.maximum(mass_flow, 1e-6 * inlet.mass_flow)
    warming = grid.heat / (carrying * inlet.heat_capacity)
    warmed: Array = inlet.temperature + np.cumsum(warming, axis=-1)
    return warmed


def friction_along(grid: AnnulusGrid, mass_flow: Array, temperature: Array) -> Array:
    """Return friction factor x length / (2 hydraulic diameter) of every cell."""
    flux = np.abs(mass_flow) / grid.area
    reynolds = flux * grid.hydraulic_diameter / viscosity_sutherland(temperature)
    # A stretch without flow has no head to lose; the floor only keeps the logarithm finite.
    factor = friction_factor_haaland(np.maximum(reynolds, 100.0), grid.relative_roughness)
    per_length: Array = factor / grid.hydraulic_diameter
    return 0.25 * (per_length[..., 1:] + per_length[..., :-1]) * grid.length


def sweep(
    grid: AnnulusGrid,
    inlet: Inlet,
    *,
    entry_pressure: float,
    mass_flow: Array,
    temperature: Array,
    friction: Array,
    static_pressure: Array,
    recovery_factor: float = RECOVERY_FACTOR,
) -> AnnulusField:
    """Return the annulus for given flows, static pressures of the last sweep as a start.

    One sweep shrinks the error of the static pressures by about the Mach number squared.

    Parameters
    ----------
    grid : AnnulusGrid
    inlet : Inlet
        For the properties of air.
    entry_pressure : float
        Total pressure where the air enters the annulus, Pa.
    mass_flow, temperature, friction : ndarray
        kg/s and K at every node; :func:`friction_along` of every cell.
    static_pressure : ndarray
        Latest sweep, Pa.
    recovery_factor : float
        See :func:`recovery`.
    """
    gamma, heat_capacity = inlet.heat_capacity_ratio, inlet.heat_capacity
    flux = mass_flow / grid.area
    velocity = velocity_from_static(flux, static_pressure, temperature, inlet.gas_constant, gamma)
    kinetic_share = velocity * velocity / (2.0 * heat_capacity * temperature)
    static_share = (1.0 - kinetic_share) ** (gamma / (gamma - 1.0))
    head = 0.5 * flux * velocity
    signed = head * np.sign(velocity)
    loss = friction * (signed[..., 1:] + signed[..., :-1])
    if recovery_factor != RECOVERY_FACTOR:
        jump = (grid.length == 0.0) * (head[..., :-1] - head[..., 1:])
        loss = loss - 2.0 * (recovery_factor - 0.5) * jump
    total = np.empty(velocity.shape)
    total[..., 0] = entry_pressure
    total[..., 1:] = entry_pressure - np.cumsum(loss, axis=-1)
    return AnnulusField(mass_flow, total, total * static_share, velocity, temperature)
