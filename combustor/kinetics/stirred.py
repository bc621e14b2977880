"""One stirred reactor, at a fixed residence time or a fixed volume."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, Problem
from combustor.fuel.gas import Gas, GasState
from combustor.kinetics.branch import Solved, Status, hold
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Stirred:
    """Steady state of one stirred reactor.

    Parameters
    ----------
    state : GasState
    residence_time : float
        Hot mass in the reactor over the flow through it [s]
    status : {"burning", "blown_out", "not_converged"}
        Blown out only after the burning branch was followed from a long residence time and ended
        before this one.
    residual : float
        Last Newton step in units of the tolerance (1e-7 of each species).
    iterations : int
        Newton iterations, all attempts together.
    """

    state: GasState
    residence_time: float
    status: Status
    residual: float
    iterations: int


def stirred(
    gas: Gas,
    pressure: float,
    enthalpy: float,
    mass_fractions: Array,
    residence_time: float | None = None,
    volume: float | None = None,
    mass_flow: float | None = None,
    guess: GasState | None = None,
    heat_loss: float = 0.0,
) -> Stirred:
    """Solve one stirred reactor on its burning branch.

    Parameters
    ----------
    gas : Gas
    pressure : float
        [Pa]
    enthalpy : float
        Of what flows in [J/kg]
    mass_fractions : ndarray
        Of what flows in [-]
    residence_time : float, optional
        Give this, or volume and mass flow [s]
    volume : float, optional
        [m3]
    mass_flow : float, optional
        [kg/s]
    guess : GasState, optional
        A neighbouring solution; saves time only.
    heat_loss : float
        Per mass of flow [J/kg]

    Returns
    -------
    Stirred

    Raises
    ------
    InputError
        Size given twice or not at all, or not positive.

    Notes
    -----
    Steady equations of an open, perfectly stirred, constant-pressure reactor (Longwell and Weiss,
    Industrial and Engineering Chemistry 47, 1955, from memory).
    """
    zone = stirred_zone(
        gas, pressure, enthalpy, mass_fractions, residence_time, volume, mass_flow, heat_loss
    )
    start = None
    if guess is not None:
        moles = guess.mass_fractions / gas.rates.molar_masses
        start = ZoneState(moles[None, :], np.array([guess.temperature]), 1.0)
        rate = zone.throughflow_rate(zone.throughflow_volume(start))
        start = ZoneState(start.moles, start.temperatures, rate)
    return as_stirred(zone, hold(zone, start))


def stirred_zone(
    gas: Gas,
    pressure: float,
    enthalpy: float,
    mass_fractions: Array,
    residence_time: float | None = None,
    volume: float | None = None,
    mass_flow: float | None = None,
    heat_loss: float = 0.0,
) -> Zone:
    """Return one stirred reactor as a zone of one stream."""
    if (volume is None) != (mass_flow is None):
        raise InputError(
            Problem(
                "a stirred reactor needs its size",
                "give the residence time, or both volume and mass flow",
                "volume" if volume is None else "mass_flow",
            )
        )
    flow = 1.0 if mass_flow is None else mass_flow
    return Zone(
        gas=gas,
        pressure=pressure,
        flows=np.array([flow]),
        moles=(mass_fractions / gas.rates.molar_masses)[None, :],
        enthalpies=np.array([enthalpy]),
        volume=volume,
        residence_time=residence_time,
        heat_loss=heat_loss * flow,
    )


def as_stirred(zone: Zone, solved: Solved) -> Stirred:
    """Return the solution of a one-stream zone in the terms of one reactor."""
    masses = np.maximum(solved.state.moles[0] * zone.gas.rates.molar_masses, 0.0)
    state = GasState(float(solved.state.temperatures[0]), zone.pressure, masses, zone.exit_enthalpy)
    return Stirred(state, 1.0 / solved.state.rate, solved.status, solved.step, solved.iterations)
