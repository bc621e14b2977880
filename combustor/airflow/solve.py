"""Newton's method on the openings' flows; all perturbed states are evaluated in one pass."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np

from combustor.airflow.machine import Fields, Machine, evaluate, resting_fields, single
from combustor.airflow.result import Array
from combustor.base.convergence import Convergence
from combustor.gasdynamics import orifice_flux

TOLERANCE = 1.0e-11
MOST_ITERATIONS = 60
PERTURBATION = 1.0e-6
NEAR = 1.0e-3


def first_guess(machine: Machine) -> Array:
    """Return a state with every opening at one pressure difference and the annuli at rest."""
    inlet = machine.inlet
    areas = machine.laws.area_at_rest
    low, high = 0.3 * machine.dump_pressure, machine.dump_pressure
    # Bisection on a monotone function: twenty halvings are far finer than the guess needs.
    for _ in range(20):
        middle = 0.5 * (low + high)
        flux = orifice_flux(
            machine.dump_pressure,
            inlet.temperature,
            middle,
            inlet.gas_constant,
            inlet.heat_capacity_ratio,
        )
        if flux * areas.sum() > inlet.mass_flow:
            low = middle
        else:
            high = middle
    state = np.zeros(machine.unknowns)
    state[: machine.laws.count] = areas / areas.sum()
    state[machine.laws.count] = 0.5 * (low + high) / inlet.pressure
    if machine.shares_dome:
        shares = [grid.area[-1] for grid in machine.annuli]
        state[-1] = shares[0] / sum(shares)
    return state


def solve(machine: Machine, state: Array, fields: Fields) -> tuple[Array, Fields, Convergence]:
    """Return the state at which every opening passes what its pressures drive.

    Parameters
    ----------
    machine : Machine
    state : ndarray
        Start; see :mod:`combustor.airflow.machine` for the unknowns.
    fields : Fields
        Start of the sweeps.

    Returns
    -------
    (ndarray, Fields, Convergence)
    """
    with np.errstate(all="ignore"):
        residuals, settled = evaluate(machine, state[None, :], fields, sweeps=3)
    residual, fields = residuals[0], single(settled)
    if _size(residual) <= TOLERANCE and fields.change <= TOLERANCE:
        return state, fields, Convergence(True, _size(residual), 0)
    inverse: Array | None = None
    size = math.inf
    for iteration in range(1, MOST_ITERATIONS + 1):
        fresh = inverse is None
        if inverse is None:
            residual, inverse, fields = _linearised(machine, state, fields)
            size = _size(residual)
            if inverse is None:
                break
        accepted = _advance(machine, state, -inverse @ residual, fields, size)
        if accepted is None:
            if fresh:
                break
            inverse = None
            continue
        state, residual, fields = accepted
        previous, size = size, _size(residual)
        if size <= TOLERANCE and fields.change <= TOLERANCE:
            return state, fields, Convergence(True, size, iteration)
        # Near the solution the last Jacobian gains more digits per second than a new one.
        if size > NEAR or size > 0.1 * previous:
            inverse = None
    return state, fields, _stuck(size, iteration)


def _size(residual: Array) -> float:
    value = float(np.max(np.abs(residual)))
    return value if math.isfinite(value) else math.inf


def _stuck(size: float, iteration: int) -> Convergence:
    return Convergence(
        False,
        size,
        iteration,
        "the air split did not converge: the openings cannot pass the air at any liner pressure "
        "below the inlet's, or an annulus is near choking",
    )


def _linearised(
    machine: Machine, state: Array, fields: Fields
) -> tuple[Array, Array | None, Fields]:
    """Return residual, inverse Jacobian by forward differences, and fields at ``state``."""
    unknowns = machine.unknowns
    states = np.tile(state, (unknowns + 1, 1))
    states[1:][np.diag_indices(unknowns)] += PERTURBATION
    with np.errstate(all="ignore"):
        residuals, all_fields = evaluate(machine, states, fields, sweeps=2)
    jacobian = (residuals[1:] - residuals[0]).T / PERTURBATION
    if not np.all(np.isfinite(jacobian)):
        return residuals[0], None, fields
    try:
        inverse = np.linalg.inv(jacobian)
    except np.linalg.LinAlgError:
        return residuals[0], None, fields
    return residuals[0], inverse, single(all_fields)


def _advance(
    machine: Machine, state: Array, step: Array, fields: Fields, size: float
) -> tuple[Array, Array, Fields] | None:
    """Return state, residual and fields a step on; None when no part of it makes it better."""
    fraction = 1.0
    while fraction > 1e-4:
        trial = state + fraction * step
        head = trial[machine.laws.count] * machine.inlet.pressure
        if 0.0 < head < machine.dump_pressure:
            with np.errstate(all="ignore"):
                residuals, trial_fields = evaluate(machine, trial[None, :], fields, sweeps=2)
            if _size(residuals[0]) < max(size * (1.0 - 0.1 * fraction), 0.1 * TOLERANCE):
                return trial, residuals[0], single(trial_fields)
        fraction *= 0.5
    return None


def solve_from_low_flow(machine: Machine) -> tuple[Array, Fields, Convergence]:
    """Return the solution followed from a tenth of the flow, for machines that start badly."""
    part = at_flow(machine, 0.1)
    state = first_guess(part)
    fields = resting_fields(part, state[part.laws.count] * part.inlet.pressure)
    state, fields, convergence = solve(part, state, fields)
    for share in (0.3, 0.5, 0.7, 0.85, 0.95, 1.0):
        if not convergence.converged:
            break
        part = at_flow(machine, share) if share < 1.0 else machine
        state, fields, convergence = solve(part, state, fields)
    return state, fields, convergence


def at_flow(machine: Machine, share: float) -> Machine:
    """Return the machine with ``share`` of its air; the diffuser's loss goes with its square."""
    inlet = replace(machine.inlet, mass_flow=share * machine.inlet.mass_flow)
    loss = (inlet.pressure - machine.dump_pressure) * share**2
    return replace(machine, inlet=inlet, dump_pressure=inlet.pressure - loss)
