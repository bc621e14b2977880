"""Rates against central differences, and what their derivative conserves."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.fuel.gas import Gas

MECHANISMS = ("gri30.yaml", "h2o2.yaml", "example_data/ammonia-CO-H2-Alzueta-2023.yaml")


@pytest.fixture(scope="module", params=MECHANISMS)
def mechanism(request):
    return Gas.load(request.param)


def composition(gas, random_state):
    values = np.random.default_rng(random_state).random(gas.n_species) ** 3
    for species in ("N2", "H2O", "O2"):
        values[gas.index(species)] += 10.0
    return values / values.sum() / gas.rates.molar_masses


@given(
    random_state=st.integers(0, 1000),
    temperature=st.floats(1050.0, 2600.0),
    bars=st.floats(0.5, 40),
)
@settings(max_examples=6, derandomize=True, deadline=None)
def test_derivative_is_that_of_the_rates_at_constant_enthalpy(
    mechanism, random_state, temperature, bars
):
    rates, pressure = mechanism.rates, bars * 1e5
    moles = composition(mechanism, random_state)
    enthalpy = mechanism.enthalpy(temperature, pressure, moles * rates.molar_masses)
    production, derivative = rates.derivatives(temperature, pressure, moles)
    np.testing.assert_allclose(production, rates.production(temperature, pressure, moles))

    def at(changed):
        there = rates.temperature(enthalpy, pressure, changed, temperature)
        return rates.production(there, pressure, changed)

    for place in range(0, mechanism.n_species, 3):
        step = np.zeros_like(moles)
        step[place] = 1e-4 * moles[place] + 1e-9
        slope = (at(moles + step) - at(moles - step)) / (2.0 * step[place])
        scale = np.abs(derivative).max()
        np.testing.assert_allclose(derivative[:, place], slope, rtol=1e-4, atol=1e-7 * scale)


def test_neither_rates_nor_derivative_make_elements(mechanism):
    moles = composition(mechanism, 1)
    production, derivative = mechanism.rates.derivatives(1800.0, 10e5, moles)
    elements = mechanism.element_matrix
    assert np.abs(elements @ production).max() < 1e-12 * np.abs(production).max()
    assert np.abs(elements @ derivative).max() < 1e-12 * np.abs(derivative).max()


def test_derivative_of_a_species_that_is_absent_is_that_of_its_first_trace(gas):
    rates = gas.rates
    absent = composition(gas, 2)
    absent[gas.index("OH")] = 0.0
    trace = absent.copy()
    trace[gas.index("OH")] = 1e-14
    one = rates.derivatives(1700.0, 1e6, absent)[1][:, gas.index("OH")]
    other = rates.derivatives(1700.0, 1e6, trace)[1][:, gas.index("OH")]
    assert np.abs(one).max() > 0.0
    np.testing.assert_allclose(one, other, rtol=1e-6, atol=1e-9 * np.abs(other).max())


def test_a_hopeless_enthalpy_gives_no_temperature(gas):
    moles = composition(gas, 3)
    assert np.isnan(gas.rates.temperature(1e9, 1e5, moles, 1500.0))
