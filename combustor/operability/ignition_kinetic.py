"""Ignition delay from the mechanism: a charge left to itself at constant pressure."""

from __future__ import annotations

import cantera as ct
import numpy as np
from numpy.typing import NDArray

from combustor.base.method import Method
from combustor.fuel.gas import Gas
from combustor.operability.autoignition import Delay

DELAY_KINETIC = Method(
    key="ignition-delay-kinetic",
    quantity="ignition delay from the mechanism",
    source="adiabatic charge at constant pressure, time to half of the temperature rise",
    reading="computed",
    validity={"temperature": (1000.0, 2500.0), "pressure": (1333.0, 1013250.0)},
    note="the range is that of GRI-Mech 3.0; below it high-temperature mechanisms run long",
)

HALF_RISE = 0.5
LEAST_RISE = 200.0  # K


def ignition_delay(
    gas: Gas,
    temperature: float,
    pressure: float,
    mass_fractions: NDArray[np.float64],
    longest: float,
) -> Delay:
    """Return the mechanism's ignition delay, or that it is longer than ``longest``.

    Parameters
    ----------
    gas : Gas
    temperature, pressure : float
        Of the charge [K], [Pa]
    mass_fractions : ndarray
        Of the charge [-]
    longest : float
        Where to stop counting [s]
    """
    enthalpy = gas.enthalpy(temperature, pressure, mass_fractions)
    rise = gas.equilibrium(enthalpy, pressure, mass_fractions).temperature - temperature
    outside = bool(DELAY_KINETIC.notices(temperature=temperature, pressure=pressure))
    if rise < LEAST_RISE:
        return Delay(longest, DELAY_KINETIC, outside, is_bound=True)
    wanted = temperature + HALF_RISE * rise
    solution = gas.solution
    solution.TPY = temperature, pressure, mass_fractions
    reactor = ct.IdealGasConstPressureReactor(solution, clone=False)
    network = ct.ReactorNet([reactor])
    network.rtol, network.atol = 1e-6, 1e-15
    before, then = temperature, 0.0
    while network.time < longest:
        now = network.step()
        if wanted <= reactor.T:
            share = (wanted - before) / (reactor.T - before)
            return Delay(then + share * (now - then), DELAY_KINETIC, outside)
        before, then = reactor.T, now
    return Delay(longest, DELAY_KINETIC, outside, is_bound=True)
