"""The solved state of a machine as records, opening by opening and along the axis."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from combustor.airflow import discharge, jets
from combustor.airflow.diffuser import DIFFUSER_LOSS
from combustor.airflow.exit import exit_state, loss_parts
from combustor.airflow.grid import SAME_STATION
from combustor.airflow.machine import Fields, Machine
from combustor.airflow.result import (
    AirSplit,
    AnnulusStations,
    Array,
    LinerStations,
    OpeningFlow,
)
from combustor.base.convergence import Convergence
from combustor.base.errors import InfeasibleError, NotConvergedError
from combustor.base.method import Notice
from combustor.gasdynamics import COMPRESSIBLE_ORIFICE, critical_pressure_ratio, speed_of_sound
from combustor.hardware.metal import Hardware, Opening

WALL_JETS = ("primary", "secondary", "dilution")


def collect(
    hardware: Hardware,
    machine: Machine,
    state: Array,
    fields: Fields,
    convergence: Convergence,
) -> AirSplit:
    """Return the records of a solved (or unsolved, see ``convergence``) state.

    Raises
    ------
    InfeasibleError
        An annulus, the liner exit or the transition is choked.
    NotConvergedError
        The solve ended in numbers that are not finite.
    """
    inlet, passage, openings = machine.inlet, fields.liner, fields.openings
    assert openings is not None  # every solve ends with a sweep
    if not np.all(np.isfinite(passage.static_pressure)):
        raise NotConvergedError(convergence.message)
    _refuse_choked_annulus(machine, fields)
    leaving = exit_state(hardware, machine, passage)
    parts = loss_parts(machine, passage, openings, state, leaving.total_pressure)
    flows = _opening_flows(hardware, machine, fields)
    return AirSplit(
        openings=flows,
        pressure_loss=1.0 - leaving.total_pressure / inlet.pressure,
        pressure_loss_parts=parts.as_mapping(),
        exit_pressure=leaving.total_pressure,
        exit_static_pressure=leaving.static_pressure,
        dump_pressure=machine.dump_pressure,
        dome_pressure=float(fields.dome_pressure[0]),
        annuli=tuple(_annulus_stations(machine, fields)),
        liner=LinerStations(
            station=machine.liner.station,
            mass_flow=passage.mass_flow,
            static_pressure=passage.static_pressure,
            velocity=passage.velocity,
            density=_density(machine, fields),
            temperature=passage.temperature,
        ),
        imbalance=abs(sum(flow.mass_flow for flow in flows) - inlet.mass_flow) / inlet.mass_flow,
        convergence=convergence,
        notices=_notices(machine, flows),
    )


def _refuse_choked_annulus(machine: Machine, fields: Fields) -> None:
    inlet = machine.inlet
    sonic = speed_of_sound(inlet.temperature, inlet.gas_constant, inlet.heat_capacity_ratio)
    for grid, field in zip(machine.annuli, fields.annuli, strict=True):
        fastest = int(np.argmax(np.abs(field.velocity)))
        if not abs(field.velocity[fastest]) < sonic:
            raise InfeasibleError(
                [
                    f"the {grid.side} annulus has {grid.area[fastest] * 1e6:.4g} mm2 "
                    f"at {grid.station[fastest] * 1e3:.4g} mm",
                    f"{field.mass_flow[fastest]:.4g} kg/s would have to pass it faster than sound",
                ],
                "Give the annulus more area, or check flow and pressure",
            )


def _density(machine: Machine, fields: Fields) -> Array:
    """Return the density of the liner gas at its static temperature, kg/m3."""
    gamma, gas_constant = machine.gas.heat_capacity_ratio, machine.gas.gas_constant
    heat_capacity = gamma * gas_constant / (gamma - 1.0)
    passage = fields.liner
    static_temperature = passage.temperature - passage.velocity**2 / (2.0 * heat_capacity)
    return passage.static_pressure / (gas_constant * static_temperature)


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
    assert state is not None  # every solve ends with a sweep
    node = int(machine.liner.upstream[position])
    mass_flow = float(state.law_flow[position])
    flows = mass_flow > 0.0
    area = float(machine.laws.area[position])
    effective_area = float(state.effective_area[position]) if flows else 0.0
    # A measured effective area may come without any drawing of the holes.
    coefficient = effective_area / area if area > 0.0 else float(flows)
    angle = math.acos(float(state.axial[position]))
    velocity = float(state.velocity[position]) if flows else 0.0
    density = float(state.density[position])
    ratio = _momentum_ratio(machine, fields, node, density, velocity)
    at_rest = opening.side == "dome"
    return OpeningFlow(
        name=opening.name,
        role=opening.role,
        side=opening.side,
        station=opening.station,
        mass_flow=mass_flow,
        air_temperature=float(state.temperature[position]),
        discharge_coefficient=coefficient,
        effective_area=effective_area,
        jet_velocity=velocity,
        jet_angle=angle,
        head_ratio=math.inf if at_rest else float(state.head_ratio[position]),
        bleed_ratio=0.0 if at_rest else float(state.bleed_ratio[position]),
        momentum_flux_ratio=ratio,
        penetration=_penetration(
            hardware,
            opening,
            momentum_ratio=ratio,
            coefficient=coefficient,
            angle=angle,
            gas_flow=float(passage.mass_flow[node]),
            row_flow=_row_flow(machine, state.law_flow, opening),
        ),
        jet_density=density,
        liner_pressure=float(passage.static_pressure[node]),
        driving_pressure=float(state.driving_pressure[position]),
    )


def _momentum_ratio(
    machine: Machine, fields: Fields, node: int, jet_density: float, jet_velocity: float
) -> float:
    gas_velocity = float(fields.liner.velocity[node])
    if not jet_velocity > 0.0:
        return 0.0
    if not gas_velocity > 0.0:
        return math.inf
    gas_density = float(_density(machine, fields)[node])
    return float(jets.momentum_flux_ratio(jet_density, jet_velocity, gas_density, gas_velocity))


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
    opening: Opening,
    *,
    momentum_ratio: float,
    coefficient: float,
    angle: float,
    gas_flow: float,
    row_flow: float,
) -> float | None:
    """Return the depth of a wall jet, m: rows of a can by the can's law, others singly."""
    if opening.role not in WALL_JETS or opening.side == "dome":
        return None
    if not 0.0 < momentum_ratio < math.inf:
        return None
    hole = opening.diameter or math.sqrt(4.0 * opening.area / math.pi)
    diameter = jets.jet_diameter(hole, coefficient)
    if hardware.layout == "annular":
        return jets.penetration_single(diameter, momentum_ratio, angle)
    return jets.penetration_row(diameter, momentum_ratio, gas_flow, row_flow)


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
            COMPRESSIBLE_ORIFICE.key,
            "liner static over driving pressure",
            ratio,
            critical,
            1.0,
            name,
        ),
    )
