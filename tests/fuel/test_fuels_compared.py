"""Fuels beside each other: hydrogen and methane at one flame temperature, ammonia's crossing."""

from __future__ import annotations

import cantera as ct
import pytest
from scipy.optimize import brentq

from combustor.emissions.exhaust import from_gas
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.kinetics.stirred import stirred


def mixture(gas, fuel, equivalence_ratio, temperature, pressure):
    share = equivalence_ratio * fuel.stoichiometric_fuel_air_ratio
    share /= 1.0 + share
    mixed = share * gas.fuel(fuel) + (1.0 - share) * gas.air(0.0)
    return share, mixed, gas.enthalpy(temperature, pressure, mixed)


@pytest.mark.parametrize("flame", [1700.0, 1900.0], ids="20 bar, 700 K, 15 ms, {} K".format)
def test_hydrogen_makes_more_nox_than_methane_at_equal_flame_temperature(flame):
    fuels = catalogue.together(["methane", "hydrogen"])
    gas = Gas.load(fuels[0].mechanism)
    found = []
    for fuel in fuels:

        def off(ratio, fuel=fuel):
            _, mixed, heat = mixture(gas, fuel, ratio, 700.0, 2e6)
            return gas.equilibrium(heat, 2e6, mixed).temperature - flame

        share, mixed, heat = mixture(gas, fuel, brentq(off, 0.1, 0.9, xtol=1e-4), 700.0, 2e6)
        solved = stirred(gas, 2e6, heat, mixed, residence_time=15e-3)
        found.append(from_gas(gas, solved.state.mass_fractions, 1.0, share, fuel).nox_dry_15)
    assert 1.3 < found[1] / found[0] < 2.5


@pytest.mark.parametrize("pressure", [1e5, 5e5], ids=["1 bar", "5 bar"])
def test_nitric_oxide_and_ammonia_cross_between_1_15_and_1_25(pressure):
    fuel = catalogue.find("ammonia")
    gas = Gas.load(fuel.mechanism)
    surplus = []
    for ratio in (1.15, 1.25):
        _, mixed, heat = mixture(gas, fuel, ratio, 300.0, pressure)
        flame = stirred(gas, pressure, heat, mixed, residence_time=10e-3).state
        gas.solution.TPY = flame.temperature, pressure, flame.mass_fractions
        reactor = ct.IdealGasConstPressureReactor(gas.solution, clone=False)
        ct.ReactorNet([reactor]).advance(0.04)  # plug flow behind the flame
        moles = gas.solution.X
        surplus.append(moles[gas.index("NH3")] - moles[gas.index("NO")])
    assert surplus[0] < 0.0 < surplus[1]
