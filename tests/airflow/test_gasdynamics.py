import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor import gasdynamics


@pytest.mark.parametrize(
    ("drop", "ratio", "tolerance"),
    [
        pytest.param(0.03, 0.98356, 5e-6, id="derived-3-percent"),
        pytest.param(0.05, 0.97246, 5e-6, id="derived-5-percent"),
        pytest.param(0.10, 0.94415, 5e-6, id="derived-10-percent"),
        pytest.param(0.20, 0.8849, 5e-5, id="derived-20-percent"),
    ],
)
def test_compressible_over_incompressible_orifice(drop, ratio, tolerance):
    pressure, temperature, gas_constant = 1.6e6, 750.0, 287.05
    compressible = gasdynamics.orifice_flux(
        pressure, temperature, pressure * (1 - drop), gas_constant, 1.38
    )
    density = pressure / (gas_constant * temperature)
    assert compressible / math.sqrt(2 * density * drop * pressure) == pytest.approx(
        ratio, abs=tolerance
    )


def test_orifice_small_difference_follows_the_series():
    # derived: W_comp / W_inc = 1 - 3/(4 g) dp/P to first order
    pressure, drop, gamma = 1e6, 1e-4, 1.38
    flux = gasdynamics.orifice_flux(pressure, 700.0, pressure * (1 - drop), 287.05, gamma)
    incompressible = math.sqrt(2 * drop * pressure**2 / (287.05 * 700.0))
    assert 1 - flux / incompressible == pytest.approx(0.75 / gamma * drop, rel=1e-3)


def test_orifice_flow_at_the_design_point_derived_0_4985():
    flux = gasdynamics.orifice_flux(1.6e6, 750.0, 0.97 * 1.6e6, 287.05, 1.38)
    assert 0.6 * 1e-3 * flux == pytest.approx(0.4985, abs=5e-5)
    assert 20.0 / flux == pytest.approx(0.02407, abs=5e-6)


def test_critical_flow_gamma_1_4_derived():
    assert gasdynamics.critical_pressure_ratio(1.4) == pytest.approx(0.5283, abs=5e-5)
    flux = gasdynamics.orifice_flux(1e5, 300.0, 0.1e5, 287.05, 1.4)
    assert flux * math.sqrt(300.0) / 1e5 == pytest.approx(0.040415, abs=5e-6)


def test_choked_orifice_no_longer_sees_the_receiver():
    at_critical = gasdynamics.orifice_flux(1e6, 600.0, 0.5e6, 287.0, 1.4)
    assert gasdynamics.orifice_flux(1e6, 600.0, 0.2e6, 287.0, 1.4) == pytest.approx(at_critical)


def test_no_flow_against_the_pressure():
    assert gasdynamics.orifice_flux(1e5, 300.0, 1.1e5, 287.0, 1.4) == 0.0
    assert gasdynamics.jet_velocity(1e5, 300.0, 1.1e5, 287.0, 1.4) == 0.0


def test_orifice_flux_is_density_times_jet_velocity():
    velocity = gasdynamics.jet_velocity(1e6, 600.0, 0.96e6, 287.0, 1.38)
    heat_capacity = gasdynamics.heat_capacity(287.0, 1.38)
    density = 0.96e6 / (287.0 * (600.0 - velocity**2 / (2 * heat_capacity)))
    flux = gasdynamics.orifice_flux(1e6, 600.0, 0.96e6, 287.0, 1.38)
    assert density * velocity == pytest.approx(flux, rel=1e-12)


@pytest.mark.parametrize(
    ("mach", "heating", "mach_after", "loss", "over_low_mach"),
    [
        pytest.param(0.02, 2.2, None, None, 1.2008, id="derived-exact-M0.02-T2.2"),
        pytest.param(0.05, 2.2, None, None, 1.2053, id="derived-exact-M0.05-T2.2"),
        pytest.param(0.10, 2.2, 0.1506, 0.00807, 1.2218, id="derived-exact-M0.10-T2.2"),
        pytest.param(0.10, 3.0, None, None, 2.052, id="derived-exact-M0.10-T3.0"),
    ],
)
def test_rayleigh_exact(mach, heating, mach_after, loss, over_low_mach):
    after, total_ratio = gasdynamics.rayleigh(mach, heating, 1.33)
    # the head of the low-Mach form is 1/2 rho U^2, over total pressure
    head = 0.5 * 1.33 * mach**2 / gasdynamics.pressure_ratio(mach, 1.33)
    assert (1 - total_ratio) / head == pytest.approx(over_low_mach, abs=1.0e-3)
    if mach_after is not None:
        assert after == pytest.approx(mach_after, abs=5e-5)
        assert 1 - total_ratio == pytest.approx(loss, abs=5e-6)


def test_rayleigh_conserves_mass_momentum_and_total_temperature():
    gamma, mach, heating = 1.3, 0.15, 2.5
    after, total_ratio = gasdynamics.rayleigh(mach, heating, gamma)
    static = total_ratio * gasdynamics.pressure_ratio(mach, gamma)
    static /= gasdynamics.pressure_ratio(after, gamma)
    assert static * (1 + gamma * after**2) == pytest.approx(1 + gamma * mach**2, rel=1e-12)
    flow_before = gasdynamics.flow_function(mach, gamma)
    flow_after = gasdynamics.flow_function(after, gamma) * total_ratio / math.sqrt(heating)
    assert flow_after == pytest.approx(flow_before, rel=1e-12)


def test_rayleigh_refuses_more_heat_than_the_duct_can_take():
    assert math.isnan(gasdynamics.rayleigh(0.4, 5.0, 1.33)[0])


def test_rayleigh_without_heat_changes_nothing():
    after, total_ratio = gasdynamics.rayleigh(0.2, 1.0, 1.33)
    assert after == pytest.approx(0.2, rel=1e-12)
    assert total_ratio == pytest.approx(1.0, rel=1e-12)


def test_dynamic_head_at_mach_0_28_derived():
    assert gasdynamics.dynamic_head(0.28, 1.38) == pytest.approx(0.0523, abs=5e-5)


@given(mach=st.floats(1e-4, 0.999), gamma=st.floats(1.2, 1.4))
@settings(max_examples=100, derandomize=True)
def test_mach_from_flow_function_inverts(mach, gamma):
    function = gasdynamics.flow_function(mach, gamma)
    assert gasdynamics.mach_from_flow_function(function, gamma) == pytest.approx(mach, rel=1e-6)


def test_mach_from_flow_function_of_no_flow_and_of_too_much():
    assert gasdynamics.mach_from_flow_function(0.0, 1.4) == 0.0
    assert math.isnan(gasdynamics.mach_from_flow_function(0.6, 1.4))


@given(mach=st.floats(0.0, 0.9), temperature=st.floats(300.0, 2300.0))
@settings(max_examples=50, derandomize=True)
def test_velocity_from_static_satisfies_continuity(mach, temperature):
    gamma, gas_constant, pressure = 1.3, 289.0, 9e5
    static_temperature = temperature / (1 + 0.5 * (gamma - 1) * mach**2)
    velocity = mach * gasdynamics.speed_of_sound(static_temperature, gas_constant, gamma)
    flux = pressure / (gas_constant * static_temperature) * velocity
    found = gasdynamics.velocity_from_static(flux, pressure, temperature, gas_constant, gamma)
    assert found == pytest.approx(velocity, rel=1e-12, abs=1e-12)


@pytest.mark.parametrize(
    ("temperature", "viscosity", "conductivity", "stated_scatter"),
    [
        pytest.param(300.0, 1.846e-5, 0.0263, 0.02, id="from-memory-handbook-300K"),
        pytest.param(600.0, 3.058e-5, 0.0469, 0.02, id="from-memory-handbook-600K"),
        pytest.param(1000.0, 4.244e-5, 0.0667, 0.03, id="from-memory-handbook-1000K"),
    ],
)
def test_transport_of_air(temperature, viscosity, conductivity, stated_scatter):
    found = gasdynamics.viscosity_sutherland(temperature)
    assert found == pytest.approx(viscosity, rel=stated_scatter)
    found = gasdynamics.conductivity_sutherland(temperature)
    assert found == pytest.approx(conductivity, rel=0.03)


def test_functions_take_arrays():
    receivers = np.array([0.9e6, 0.95e6, 1.0e6])
    fluxes = gasdynamics.orifice_flux(1e6, 600.0, receivers, 287.0, 1.38)
    single = [gasdynamics.orifice_flux(1e6, 600.0, float(p), 287.0, 1.38) for p in receivers]
    assert fluxes == pytest.approx(single, rel=1e-14)
