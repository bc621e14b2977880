"""How the air splits through the metal: opening by opening, with the fire's effect.

The one solve that rating and sizing share. Pressures fall from the compressor exit through the
diffuser, along each annulus (friction, bleed, heat), through every opening (its own discharge
law on the pressures at its own station), and along the liner (momentum of jets and fire).
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from combustor.airflow import discharge, jets
from combustor.airflow.diffuser import DIFFUSER_LOSS
from combustor.airflow.exit import exit_state, loss_parts
from combustor.airflow.grid import SAME_STATION
from combustor.airflow.machine import Fields, Machine, build, resting_fields
from combustor.airflow.result import (
    AirSplit,
    AnnulusHeat,
    AnnulusStations,
    Array,
    Inlet,
    LinerGas,
    LinerStations,
    LossParts,
    OpeningFlow,
)
from combustor.airflow.solve import first_guess, solve, solve_from_low_flow
from combustor.base.convergence import Convergence
from combustor.base.errors import InfeasibleError, NotConvergedError
from combustor.base.method import Notice
from combustor.gasdynamics import critical_pressure_ratio, orifice_flux
from combustor.hardware.metal import Hardware, Opening

__all__ = [
    "AirSplit",
    "AnnulusHeat",
    "AnnulusStations",
    "Inlet",
    "LinerGas",
    "LinerStations",
    "LossParts",
    "OpeningFlow",
    "split",
    "split_for_loss",
]

CELLS = 40
WALL_JETS = ("primary", "secondary", "dilution")


def split(
    hardware: Hardware,
    inlet: Inlet,
    liner_gas: LinerGas | None = None,
    annulus_heat: Sequence[AnnulusHeat] = (),
    guess: AirSplit | None = None,
    cells: int = CELLS,
) -> AirSplit:
    """Solve the air split of a machine at one inlet state.

    Parameters
    ----------
    hardware : Hardware
    inlet : Inlet
        Air at the compressor exit, whole machine.
    liner_gas : LinerGas or None
        What the fire does to the gas in the liner; None for cold flow.
    annulus_heat : sequence of AnnulusHeat
        Heat that the annulus air takes up from the liner wall.
    guess : AirSplit or None
        A neighbouring solution to start from; the answer does not depend on it.
    cells : int
        Equal cells along liner and annuli, rows' stations added.

    Returns
    -------
    AirSplit
        With ``convergence.converged`` false when the solve ended without an answer.

    Raises
    ------
    InputError
        An opening that has no discharge law, an inlet value that is not positive.
    InfeasibleError
        The machine is choked, or the air has no way in.
    """
    machine = build(hardware, inlet, liner_gas, annulus_heat, cells)
    _refuse_choked(machine)
    state, fields = _start(machine, guess)
    state, fields, convergence = solve(machine, state, fields)
    if not convergence.converged:
        state, fields, convergence = solve_from_low_flow(machine)
    return _result(hardware, machine, state, fields, convergence)


def split_for_loss(
    hardware: Hardware,
    inlet: Inlet,
    pressure_loss: float,
    liner_gas: LinerGas | None = None,
    annulus_heat: Sequence[AnnulusHeat] = (),
    guess: AirSplit | None = None,
    cells: int = CELLS,
) -> AirSplit:
    """Solve for the inlet flow that gives a pressure loss; the flow is that of ``openings``.

    Parameters
    ----------
    hardware, liner_gas, annulus_heat, guess, cells :
        As in :func:`split`.
    inlet : Inlet
        Its mass flow is the first guess.
    pressure_loss : float
        (inlet total - exit total) / inlet total.

    Raises
    ------
    InfeasibleError
        No flow below choking gives the loss.
    NotConvergedError
    """
    log_flow, log_loss = math.log(inlet.mass_flow), math.log(pressure_loss)
    tried: list[tuple[float, float]] = []
    for _ in range(30):
        trial = replace(inlet, mass_flow=math.exp(log_flow))
        guess = split(hardware, trial, liner_gas, annulus_heat, guess, cells)
        if not guess.convergence.converged:
            break
        gap = math.log(guess.pressure_loss) - log_loss
        if abs(gap) <= 1e-11:
            return guess
        tried.append((log_flow, gap))
        slope = 2.0
        if len(tried) > 1 and tried[-1][0] != tried[-2][0]:
            slope = (tried[-1][1] - tried[-2][1]) / (tried[-1][0] - tried[-2][0])
            if not 0.5 < slope < 20.0:
                slope = 2.0
        step = -gap / slope
        if abs(step) < 4e-16 * max(1.0, abs(log_flow)):
            return guess
        log_flow += max(-0.7, min(0.7, step))
    raise NotConvergedError(f"no flow was found that gives a pressure loss of {pressure_loss:.4g}")


def _refuse_choked(machine: Machine) -> None:
    inlet = machine.inlet
    area = float(machine.laws.area_at_rest.sum())
    most = area * orifice_flux(
        machine.dump_pressure,
        inlet.temperature,
        0.0,
        inlet.gas_constant,
        inlet.heat_capacity_ratio,
    )
    if machine.dump_pressure <= 0.0 or most <= inlet.mass_flow:
        raise InfeasibleError(
            [
                f"all openings together have an effective area of {area * 1e6:.4g} mm2",
                f"choked they pass {most:.4g} kg/s of air at {inlet.pressure:.4g} Pa and "
                f"{inlet.temperature:.4g} K",
                f"{inlet.mass_flow:.4g} kg/s cannot enter the liner",
            ],
            "Open more area, or check the flow, pressure and the units of the holes",
        )


def _start(machine: Machine, guess: AirSplit | None) -> tuple[Array, Fields]:
    """Return state and fields to start from."""
    count = machine.laws.count
    if guess is not None:
        flows = [flow.mass_flow for flow in guess.openings]
        if len(flows) > max(machine.laws.index) and sum(flows) > 0.0:
            taken = np.array([flows[index] for index in machine.laws.index])
            state = np.zeros(machine.unknowns)
            state[:count] = taken / taken.sum() if taken.sum() > 0.0 else 1.0 / count
            inlet_pressure = guess.exit_pressure / (1.0 - guess.pressure_loss)
            level = machine.inlet.pressure / inlet_pressure
            pressure = guess.liner.static_pressure
            state[count] = min(
                float(pressure[0]) * level / machine.inlet.pressure,
                0.999 * machine.dump_pressure / machine.inlet.pressure,
            )
            if machine.shares_dome:
                state[-1] = _dome_share(machine, guess)
            fields = resting_fields(machine, state[count] * machine.inlet.pressure)
            if pressure.size == machine.liner.station.size:
                fields.liner.static_pressure = pressure * level
            return state, fields
    state = first_guess(machine)
    return state, resting_fields(machine, state[count] * machine.inlet.pressure)


def _dome_share(machine: Machine, guess: AirSplit) -> float:
    """Return the outer annulus's share of the dome air in a neighbouring solution."""
    ends = [float(side.mass_flow[0]) for side in guess.annuli]
    if len(ends) == 2 and sum(ends) > 0.0:
        return ends[0] / sum(ends)
    return float(first_guess(machine)[-1])


def _result(
    hardware: Hardware,
    machine: Machine,
    state: Array,
    fields: Fields,
    convergence: Convergence,
) -> AirSplit:
    inlet, passage, openings = machine.inlet, fields.liner, fields.openings
    assert openings is not None  # every solve ends with a sweep
    leaving = exit_state(hardware, machine, passage)
    parts = loss_parts(machine, passage, openings, state, leaving.total_pressure)
    flows = _opening_flows(hardware, machine, fields)
    dome = [o.driving_pressure for o in flows if o.side == "dome"]
    density = passage.static_pressure / (
        machine.gas.gas_constant * _static_temperature(machine, fields)
    )
    return AirSplit(
        openings=flows,
        pressure_loss=1.0 - leaving.total_pressure / inlet.pressure,
        pressure_loss_parts=parts.as_mapping(),
        exit_pressure=leaving.total_pressure,
        exit_static_pressure=leaving.static_pressure,
        dump_pressure=machine.dump_pressure,
        dome_pressure=max(dome, default=machine.dump_pressure),
        annuli=tuple(_annulus_stations(machine, fields)),
        liner=LinerStations(
            station=machine.liner.station,
            mass_flow=passage.mass_flow,
            static_pressure=passage.static_pressure,
            velocity=passage.velocity,
            density=density,
            temperature=passage.temperature,
        ),
        imbalance=abs(sum(flow.mass_flow for flow in flows) - inlet.mass_flow) / inlet.mass_flow,
        convergence=convergence,
        notices=_notices(machine, flows),
    )


def _static_temperature(machine: Machine, fields: Fields) -> Array:
    gamma, gas_constant = machine.gas.heat_capacity_ratio, machine.gas.gas_constant
    heat_capacity = gamma * gas_constant / (gamma - 1.0)
    velocity = fields.liner.velocity
    return fields.liner.temperature - velocity * velocity / (2.0 * heat_capacity)


def _annulus_stations(machine: Machine, fields: Fields) -> list[AnnulusStations]:
    stations = []
    for grid, field in zip(machine.annuli, fields.annuli, strict=True):
        order = slice(None, None, -1) if machine.reverse else slice(None)
        stations.append(
            AnnulusStations(
                side=grid.side,
                station=grid.station[order],
                mass_flow=field.mass_flow[order],
                total_pressure=field.total_pressure[order],
                static_pressure=field.static_pressure[order],
                velocity=field.velocity[order],
                temperature=field.temperature[order],
            )
        )
    return stations


def _opening_flows(hardware: Hardware, machine: Machine, fields: Fields) -> tuple[OpeningFlow, ...]:
    flowing = dict(zip(machine.laws.index, range(machine.laws.count), strict=True))
    return tuple(
        _flow(hardware, machine, fields, opening, flowing[index])
        if index in flowing
        else _closed(machine, fields, opening)
        for index, opening in enumerate(hardware.openings)
    )


def _closed(machine: Machine, fields: Fields, opening: Opening) -> OpeningFlow:
    """Return the result of a row without openings: no flow, nothing disturbed."""
    return OpeningFlow(
        name=opening.name,
        role=opening.role,
        side=opening.side,
        station=opening.station,
        mass_flow=0.0,
        air_temperature=machine.inlet.temperature,
        discharge_coefficient=0.0,
        effective_area=0.0,
        jet_velocity=0.0,
        jet_angle=0.5 * math.pi,
        head_ratio=math.inf,
        bleed_ratio=0.0,
        momentum_flux_ratio=0.0,
        penetration=None,
        jet_density=machine.inlet.pressure
        / (machine.inlet.gas_constant * machine.inlet.temperature),
        liner_pressure=float(
            np.interp(opening.station, machine.liner.station, fields.liner.static_pressure)
        ),
        driving_pressure=machine.dump_pressure,
    )


def _flow(
    hardware: Hardware, machine: Machine, fields: Fields, opening: Opening, position: int
) -> OpeningFlow:
    state, passage = fields.openings, fields.liner
    assert state is not None
    node = machine.liner.upstream[position]
    mass_flow = float(state.law_flow[position])
    effective_area = float(state.effective_area[position]) if mass_flow > 0.0 else 0.0
    area = float(machine.laws.area[position])
    velocity, density = float(state.velocity[position]), float(state.density[position])
    gas_pressure = float(passage.static_pressure[node])
    gas_density = gas_pressure / (
        float(machine.gas.gas_constant[node]) * float(_static_temperature(machine, fields)[node])
    )
    gas_velocity = float(passage.velocity[node])
    ratio = math.inf
    if gas_velocity > 0.0:
        ratio = float(jets.momentum_flux_ratio(density, velocity, gas_density, gas_velocity))
    at_rest = bool(machine.laws.openings[position].side == "dome")
    annulus_head = float(state.head_ratio[position])
    return OpeningFlow(
        name=opening.name,
        role=opening.role,
        side=opening.side,
        station=opening.station,
        mass_flow=mass_flow,
        air_temperature=float(state.temperature[position]),
        discharge_coefficient=effective_area / area if area > 0.0 else 1.0,
        effective_area=effective_area,
        jet_velocity=velocity if mass_flow > 0.0 else 0.0,
        jet_angle=math.acos(float(state.axial[position])),
        head_ratio=math.inf if at_rest else annulus_head,
        bleed_ratio=0.0 if at_rest else float(state.bleed_ratio[position]),
        momentum_flux_ratio=ratio if mass_flow > 0.0 else 0.0,
        penetration=_penetration(
            hardware,
            machine,
            opening,
            ratio,
            mass_flow,
            effective_area / area if area > 0.0 else 1.0,
            math.acos(float(state.axial[position])),
            float(passage.mass_flow[node]),
            _row_flow(machine, state.law_flow, opening),
        ),
        jet_density=density,
        liner_pressure=gas_pressure,
        driving_pressure=float(state.driving_pressure[position]),
    )


def _row_flow(machine: Machine, flows: Array, opening: Opening) -> float:
    """Return the jets entering the liner at this opening's station from its side, kg/s."""
    return sum(
        float(flow)
        for flow, other in zip(flows, machine.laws.openings, strict=True)
        if other.side == opening.side
        and other.role in WALL_JETS
        and abs(other.station - opening.station) <= SAME_STATION
    )


def _penetration(
    hardware: Hardware,
    machine: Machine,
    opening: Opening,
    ratio: float,
    mass_flow: float,
    coefficient: float,
    angle: float,
    gas_flow: float,
    row_flow: float,
) -> float | None:
    if opening.role not in WALL_JETS or opening.side == "dome":
        return None
    if not (mass_flow > 0.0 and math.isfinite(ratio)):
        return None
    hole = opening.diameter or math.sqrt(4.0 * opening.area / math.pi)
    diameter = jets.jet_diameter(hole, coefficient)
    if hardware.layout == "annular":
        return jets.penetration_single(diameter, ratio, angle)
    return jets.penetration_row(diameter, ratio, gas_flow, row_flow)


def _notices(machine: Machine, flows: Sequence[OpeningFlow]) -> tuple[Notice, ...]:
    found = list(DIFFUSER_LOSS.notices("diffuser inlet", inlet_mach=machine.inlet_mach))
    critical = critical_pressure_ratio(machine.inlet.heat_capacity_ratio)
    for index, position in zip(machine.laws.index, range(machine.laws.count), strict=True):
        flow = flows[index]
        if machine.laws.crossflow[position]:
            found += discharge.CROSSFLOW_DISCHARGE.notices(flow.name, head_ratio=flow.head_ratio)
        ratio = flow.liner_pressure / flow.driving_pressure
        found += _expansion_notices(flow.name, ratio, critical)
    return tuple(found)


def _expansion_notices(name: str, ratio: float, critical: float) -> tuple[Notice, ...]:
    if critical <= ratio <= 1.0:
        return ()
    return (
        Notice(
            "orifice-compressible",
            "liner static over driving pressure",
            ratio,
            critical,
            1.0,
            name,
        ),
    )
