"""Gas emissivity: published check values, two models side by side, limits."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.heat.gas_radiation import (
    emissivity_luminous,
    flux_to_wall,
    luminosity_carbon_hydrogen,
    luminosity_hydrogen,
)
from combustor.heat.grey_gas import ATMOSPHERE, emissivity_base, emissivity_grey_gas, pressure_path
from combustor.heat.leckner import emissivity_leckner, pressure_broadening

LEFEBVRE = "Lefebvre-1984-from-memory"
SMITH = "Smith-1982-from-memory"


@pytest.mark.parametrize(
    ("temperature", "luminosity", "expected"),
    [
        pytest.param(1800.0, 1.0, 0.2272, id=f"{LEFEBVRE}:1800K-L1"),
        pytest.param(1800.0, 1.7, 0.3548, id=f"{LEFEBVRE}:1800K-L1.7"),
        pytest.param(2100.0, 1.0, 0.1850, id=f"{LEFEBVRE}:2100K-L1"),
        pytest.param(2100.0, 1.7, 0.2937, id=f"{LEFEBVRE}:2100K-L1.7"),
    ],
)
def test_luminous_emissivity(temperature, luminosity, expected):
    value = emissivity_luminous(1.6e6, temperature, 0.03, 0.06, luminosity)
    assert value == pytest.approx(expected, abs=5e-5)


def test_older_constant_in_atmospheres_and_feet_is_the_larger_one():
    constant = 18.5e3 / (101.325 * np.sqrt(0.3048))
    assert constant == pytest.approx(330.7, abs=0.05)
    value = emissivity_luminous(1.6e6, 1800.0, 0.03, 0.06, 1.7, constant)
    assert value == pytest.approx(0.3933, abs=5e-5)


@pytest.mark.parametrize(
    ("hydrogen", "expected"),
    [
        pytest.param(0.138, 1.764, id=f"{LEFEBVRE}:13.8-percent"),
        pytest.param(0.1437, 1.627, id=f"{LEFEBVRE}:14.37-percent"),
    ],
)
def test_luminosity_from_hydrogen_content(hydrogen, expected):
    assert luminosity_hydrogen(hydrogen) == pytest.approx(expected, abs=6e-4)


@pytest.mark.parametrize(
    ("hydrogen", "expected"),
    [
        pytest.param(0.138, 3.10, id=f"{LEFEBVRE}:13.8-percent"),
        pytest.param(0.1437, 2.44, id=f"{LEFEBVRE}:14.37-percent"),
    ],
)
def test_luminosity_from_carbon_hydrogen_ratio(hydrogen, expected):
    ratio = (1.0 - hydrogen) / hydrogen
    assert luminosity_carbon_hydrogen(ratio) == pytest.approx(expected, abs=6e-3)


@pytest.mark.parametrize(
    ("temperature", "expected"),
    [
        pytest.param(1800.0, 0.121, id=f"{SMITH}:path-0.114-1800K"),
        pytest.param(2100.0, 0.093, id=f"{SMITH}:path-0.114-2100K"),
    ],
)
def test_grey_gas_emissivity_of_equal_water_and_carbon_dioxide(temperature, expected):
    partial = 0.057 * ATMOSPHERE
    assert emissivity_base(temperature, partial, partial, 1.0) == pytest.approx(expected, rel=0.01)


@pytest.mark.parametrize("water", [0.5, 2.0 / 3.0, 1.0])
def test_two_grey_gas_sources_agree_at_one_atmosphere(water):
    """Smith et al. 1982 and Leckner 1972 rest on different spectra: within 15 %."""
    T, path = np.meshgrid([1000.0, 1400.0, 1800.0, 2100.0], [0.03, 0.1, 0.3, 1.0])
    pw, pc = 0.2 * water * ATMOSPHERE, 0.2 * (1.0 - water) * ATMOSPHERE
    smith = emissivity_base(T, pw, pc, path / 0.2)
    leckner = emissivity_leckner(ATMOSPHERE, T, pw, pc, path / 0.2)
    assert np.abs(smith / leckner - 1.0).max() < 0.15


@pytest.mark.parametrize(
    ("pressure", "low", "high"),
    [(1e5, 0.5, 0.95), (1.0e6, 0.9, 1.35), (1.6e6, 1.1, 1.5), (3.0e6, 1.35, 1.75)],
)
def test_how_far_luminous_and_grey_gas_lie_apart_for_clean_gas(pressure, low, high):
    """Fuel-air ratio 0.03 of methane, path 0.06 and 0.2 m, 1500 to 2100 K, luminosity 1.

    The luminous law gives half to nine tenths of the grey-gas emissivity at 1 bar, about the
    same at 10 bar and half as much again at 30 bar: its optical depth grows with the whole
    pressure where the grey gases saturate.
    """
    T, path = np.meshgrid([1500.0, 1800.0, 2100.0], [0.06, 0.2])
    luminous = emissivity_luminous(pressure, T, 0.03, path)
    grey = emissivity_grey_gas(pressure, T, 0.10, 0.05, path)
    ratio = luminous / grey
    assert low < ratio.min()
    assert ratio.max() < high


def test_clear_gas_at_16_bar_without_broadening_is_overstated_by_the_luminous_law():
    partial = 0.057 * ATMOSPHERE
    luminous = emissivity_luminous(1.6e6, 1800.0, 0.03, 0.06)
    ratio = luminous / emissivity_base(1800.0, partial, partial, 1.0)
    assert ratio == pytest.approx(1.9, abs=0.05)


def test_no_radiating_species_means_no_emission():
    assert emissivity_grey_gas(1e6, 1800.0, 0.0, 0.0, 0.2) == 0.0


def test_hydrogen_products_have_water_alone():
    value = emissivity_grey_gas(1.6e6, 1800.0, 0.15, 0.0, 0.06)
    leckner = emissivity_leckner(1.6e6, 1800.0, 0.15 * 1.6e6, 0.0, 0.06)
    assert value == pytest.approx(leckner, rel=0.15)


def test_mixtures_between_the_tables_are_continuous():
    share = np.linspace(0.0, 1.0, 20001)
    value = emissivity_base(1800.0, 0.2 * ATMOSPHERE * share, 0.2 * ATMOSPHERE * (1 - share), 1.0)
    assert np.abs(np.diff(value)).max() < 1e-4


def test_broadening_is_none_for_a_trace_at_one_bar_and_raises_emission_above():
    assert pressure_broadening(1e5, 1800.0, 1.0, 1.0, 0.1) == pytest.approx(1.0, abs=1e-3)
    rise = pressure_broadening(1.6e6, 1800.0, 1.6e5, 0.8e5, 0.06)
    assert 1.05 < rise < 1.4


def test_pressure_path_in_atmosphere_metres():
    assert pressure_path(2 * ATMOSPHERE, 0.1, 0.05, 0.5) == pytest.approx(0.15)


def test_equal_temperatures_exchange_nothing():
    assert flux_to_wall(1200.0, 1200.0, 0.3, 0.8) == 0.0


@given(
    temperature=st.floats(700.0, 2400.0),
    pressure=st.floats(1e5, 3e6),
    water=st.floats(0.01, 0.3),
    carbon=st.floats(0.0, 0.12),
    path=st.floats(0.01, 0.4),
)
@settings(max_examples=100, derandomize=True, deadline=None)
def test_grey_gas_emissivity_is_a_fraction_and_grows_with_path(
    temperature, pressure, water, carbon, path
):
    thin = emissivity_grey_gas(pressure, temperature, water, carbon, path, broadening=False)
    thick = emissivity_grey_gas(pressure, temperature, water, carbon, 1.5 * path, broadening=False)
    broadened = emissivity_grey_gas(pressure, temperature, water, carbon, path)
    assert 0.0 < thin < thick < 1.0
    assert 0.0 < broadened < 1.0
