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

from combustor.airflow.collect import collect
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
from combustor.base.errors import InfeasibleError, InputError, NotConvergedError, Problem
from combustor.gasdynamics import orifice_flux
from combustor.hardware.metal import Hardware

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
    _refuse_choked(machine, float(machine.laws.area_at_rest.sum()))
    state, fields, convergence = solve(machine, *_start(machine, guess))
    if not convergence.converged and guess is not None:
        state, fields, convergence = solve(machine, *_start(machine, None))
    if not convergence.converged:
        state, fields, convergence = solve_from_low_flow(machine)
    if not convergence.converged and fields.openings is not None:
        # With the annulus in motion the holes pass less than at rest.
        _refuse_choked(machine, float(np.sum(fields.openings.effective_area)))
    return collect(hardware, machine, state, fields, convergence)


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
    if not 0.0 < pressure_loss < 1.0:
        raise InputError(
            Problem("not a loss", "a fraction between 0 and 1", "pressure_loss", pressure_loss)
        )
    log_flow, log_loss = math.log(inlet.mass_flow), math.log(pressure_loss)
    tried: list[tuple[float, float]] = []
    for _ in range(40):
        trial = replace(inlet, mass_flow=math.exp(log_flow))
        try:
            guess = split(hardware, trial, liner_gas, annulus_heat, guess, cells)
        except InfeasibleError:
            # Choked: come back half way to the last flow that passed.
            log_flow = 0.5 * (log_flow + tried[-1][0]) if tried else log_flow - 0.5
            continue
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


def _refuse_choked(machine: Machine, area: float) -> None:
    inlet = machine.inlet
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
    if guess is None or len(guess.openings) <= max(machine.laws.index):
        state = first_guess(machine)
        return state, resting_fields(machine, state[machine.laws.count] * machine.inlet.pressure)
    count = machine.laws.count
    taken = np.array([guess.openings[index].mass_flow for index in machine.laws.index])
    state = np.zeros(machine.unknowns)
    state[:count] = taken / taken.sum() if taken.sum() > 0.0 else 1.0 / count
    # Losses go with the square of the corrected flow.
    inlet_pressure = guess.exit_pressure / (1.0 - guess.pressure_loss)
    guess_loss = 1.0 - guess.dump_pressure / inlet_pressure
    own_loss = 1.0 - machine.dump_pressure / machine.inlet.pressure
    growth = own_loss / guess_loss if guess_loss > 0.0 else 1.0

    def grown(static_pressure: Array) -> Array:
        fall = growth * (1.0 - static_pressure / inlet_pressure)
        return machine.inlet.pressure * (1.0 - np.clip(fall, own_loss + 1e-6, 0.5))

    pressure = grown(guess.liner.static_pressure)
    state[count] = pressure[0] / machine.inlet.pressure
    if machine.shares_dome:
        state[-1] = _dome_share(machine, guess)
    fields = resting_fields(machine, float(pressure[0]))
    if pressure.size == machine.liner.station.size:
        fields.liner.static_pressure = pressure
    if len(guess.annuli) == len(fields.annuli):
        for field, side in zip(fields.annuli, guess.annuli, strict=True):
            if side.station.size == field.static_pressure.size:
                along = grown(side.static_pressure)
                field.static_pressure = along[::-1] if machine.reverse else along
    return state, fields


def _dome_share(machine: Machine, guess: AirSplit) -> float:
    """Return the outer annulus's share of the dome air in a neighbouring solution."""
    ends = [float(side.mass_flow[0]) for side in guess.annuli]
    if len(ends) == 2 and sum(ends) > 0.0:
        return ends[0] / sum(ends)
    return float(first_guess(machine)[-1])
