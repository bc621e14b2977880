"""Where the gas leaves: exit pressures, and the parts of the total-pressure loss."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from combustor.airflow import liner
from combustor.airflow.liner import LinerField
from combustor.airflow.machine import Machine
from combustor.airflow.openings import OpeningState
from combustor.airflow.result import Array, LossParts
from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.gasdynamics import (
    mach_from_flow_function,
    pressure_ratio,
    speed_of_sound,
    velocity_from_static,
)
from combustor.hardware.metal import Hardware

HOT_LOSS = Method(
    key="hot-loss",
    quantity="total pressure that heating the gas costs",
    source="liner momentum integrated twice with the same streams, with and without the fire",
    reading="derived",
    note="in a duct of constant area this is the exact Rayleigh loss",
)


@dataclass(frozen=True)
class ExitState:
    """Gas at the liner exit (total) and at the end of the transition (static), Pa."""

    total_pressure: float
    static_pressure: float


def hot_loss_low_mach(dynamic_head: float, total_temperature_ratio: float) -> float:
    """Return the loss by heat addition at low Mach number, Pa.

    Parameters
    ----------
    dynamic_head : float
        Of the stream where heating begins, Pa.
    total_temperature_ratio : float
        After over before. Within 3 % of the exact Rayleigh loss up to Mach 0.1.
    """
    return dynamic_head * (total_temperature_ratio - 1.0)


def total_pressure(
    static_pressure: float,
    velocity: float,
    temperature: float,
    gas_constant: float,
    gamma: float,
) -> float:
    """Return the total pressure, Pa, from static pressure, velocity and total temperature."""
    heat_capacity = gamma * gas_constant / (gamma - 1.0)
    static_temperature = temperature - velocity * velocity / (2.0 * heat_capacity)
    ratio = temperature / static_temperature
    return float(static_pressure * ratio ** (gamma / (gamma - 1.0)))


def exit_state(hardware: Hardware, machine: Machine, passage: LinerField) -> ExitState:
    """Return the pressures of the leaving gas; the transition is taken as isentropic.

    Raises
    ------
    InfeasibleError
        The liner exit or the end of the transition is choked.
    """
    gas_constant = float(machine.gas.gas_constant[-1])
    gamma = float(machine.gas.heat_capacity_ratio[-1])
    temperature, velocity = float(passage.temperature[-1]), float(passage.velocity[-1])
    total = total_pressure(
        float(passage.static_pressure[-1]), velocity, temperature, gas_constant, gamma
    )
    if not velocity < speed_of_sound(temperature, gas_constant, gamma):
        raise InfeasibleError(
            ["the hot gas would have to leave the liner faster than sound"],
            "Give the liner more area, or check flow and pressure",
        )
    mass_flow = float(passage.mass_flow[-1])
    passed = mass_flow * math.sqrt(gas_constant * temperature / gamma)
    passed /= hardware.exit_area * hardware.cans * total
    mach = mach_from_flow_function(passed, gamma)
    if math.isnan(mach):
        raise InfeasibleError(
            [
                f"the transition ends in {hardware.exit_area * hardware.cans:.4g} m2",
                f"{mass_flow:.4g} kg/s at {temperature:.4g} K would have to pass it faster "
                "than sound",
            ],
            "Check the turbine-inlet annulus",
        )
    return ExitState(total, float(total / pressure_ratio(mach, gamma)))


def loss_parts(
    machine: Machine,
    passage: LinerField,
    openings: OpeningState,
    state: Array,
    exit_pressure: float,
) -> LossParts:
    """Return the parts of the loss; see :class:`LossParts` for their definition."""
    inlet = machine.inlet.pressure
    hot = 0.0
    if machine.gas.temperature is not None:
        hot = (_unfired_exit_pressure(machine, passage, openings, state) - exit_pressure) / inlet
    diffuser = 1.0 - machine.dump_pressure / inlet
    return LossParts(diffuser, (1.0 - exit_pressure / inlet) - diffuser - hot, hot)


def _unfired_exit_pressure(
    machine: Machine, passage: LinerField, openings: OpeningState, state: Array
) -> float:
    """Return the exit total pressure of the same streams at the temperature they came in with."""
    grid, inlet = machine.liner, machine.inlet
    flow = state[: machine.laws.count] * inlet.mass_flow
    unfired = liner.gas_properties(grid, inlet, None)
    temperature = liner.unfired_temperature(grid, flow, openings.temperature)
    pressure = passage.static_pressure
    head = pressure[:1]
    for _ in range(40):
        field = liner.sweep(
            grid,
            unfired,
            static_pressure=pressure,
            head_pressure=head[0],
            opening_flow=flow,
            axial_momentum=flow * openings.velocity * openings.axial,
            temperature=temperature,
        )
        change = float(np.max(np.abs(field.static_pressure - pressure)))
        pressure = field.static_pressure
        if change <= 1e-13 * inlet.pressure:
            break
    velocity = velocity_from_static(
        float(field.mass_flow[-1] / grid.area[-1]),
        float(pressure[-1]),
        float(temperature[-1]),
        inlet.gas_constant,
        inlet.heat_capacity_ratio,
    )
    return total_pressure(
        float(pressure[-1]),
        float(velocity),
        float(temperature[-1]),
        inlet.gas_constant,
        inlet.heat_capacity_ratio,
    )
