"""A search for blow-out that starts where a neighbour's ended."""

from dataclasses import replace

import numpy as np
import pytest

from combustor.fuel.gas import Gas
from combustor.kinetics.extinction import blowout_fuel_flow
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.streams import Stream

PRESSURE, FINEST = 10e5, 0.97


@pytest.fixture(scope="module")
def zone():
    gas = Gas.load("gri30.yaml")
    methane, air = gas.from_mole_fractions({"CH4": 1.0}), gas.air(0.0)
    fuel = Stream(0.058, gas.enthalpy(300.0, PRESSURE, methane), methane)
    inflow = Stream(1.0, gas.enthalpy(600.0, PRESSURE, air), air)
    return gas, PrimaryZone(fuel, inflow, 1.2e-3, 0.3, 1.0, 4)


@pytest.mark.parametrize("volume", [0.8, 0.97, 1.03, 1.25])
def test_it_ends_where_a_search_from_the_start_ends_in_fewer_steps(zone, volume):
    gas, primary = zone
    near = blowout_fuel_flow(gas, PRESSURE, primary, finest=FINEST)
    other = replace(primary, volume=volume * primary.volume)
    afresh = blowout_fuel_flow(gas, PRESSURE, other, finest=FINEST)
    found = blowout_fuel_flow(gas, PRESSURE, other, finest=FINEST, near=near)
    assert found.reached
    assert found.share == pytest.approx(afresh.share, rel=1.0 - FINEST)
    assert found.iterations < afresh.iterations
    assert found.fuel_flow == pytest.approx(found.share * primary.fuel.mass_flow)


def test_a_neighbour_too_far_off_or_of_other_streams_is_left_aside(zone):
    gas, primary = zone
    near = blowout_fuel_flow(gas, PRESSURE, primary, finest=FINEST)
    far = replace(near, share=0.1 * near.share)
    coarse = replace(near, state=replace(near.state, moles=np.ones((2, gas.n_species))))
    afresh = blowout_fuel_flow(gas, PRESSURE, primary, finest=FINEST)
    for useless in (far, coarse, replace(near, state=None), replace(near, reached=False)):
        found = blowout_fuel_flow(gas, PRESSURE, primary, finest=FINEST, near=useless)
        assert found.share == afresh.share
