"""Injectors, Wobbe and Weaver: one fuel in place of another."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.operability import injector
from combustor.operability.injector import Vapour
from combustor.sizing.fire import Supply, burn_to_equilibrium, fuel_air_ratio_for

GRI = "gri30.yaml"


@pytest.fixture(scope="module")
def gas():
    return Gas.load(GRI)


def vapour(gas, name, temperature=350.0):
    masses = gas.fuel(catalogue.find(name, GRI))
    return Vapour(
        temperature,
        gas.gas_constant(masses),
        gas.heat_capacity_ratio(temperature, 101325.0, masses),
    )


# Equal heat through one injector, 350 K, pressure ratio 1.3 on methane.
@pytest.mark.parametrize(
    ("name", "printed", "choked"),
    [
        ("hydrogen", 1.407, False),
        ("methane+30%hydrogen", 1.354, False),
        ("biogas", 2.478, True),
        ("syngas", 4.425, True),
    ],
)
def test_injector_pressure_ratio_of_equal_heat(gas, name, printed, choked):
    base = catalogue.find("methane", GRI)
    new = catalogue.find(name, GRI)
    pressure = 20e5
    methane = vapour(gas, "methane")
    area = injector.effective_area_for(methane, 1.0, 1.3, pressure)
    flow = base.lower_heating_value / new.lower_heating_value
    ratio = injector.pressure_ratio_for(vapour(gas, name), flow, area, pressure)
    assert ratio == pytest.approx(printed, rel=0.005)
    assert injector.is_choked(vapour(gas, name), ratio) is choked


# MW per cm2 of effective area into 20 bar at 350 K, pressure ratios 1.2 and 1.5.
@pytest.mark.parametrize(
    ("name", "at_1_2", "at_1_5"),
    [
        ("methane", 14.61, 22.61),
        ("hydrogen", 12.54, 19.62),
        ("methane+30%hydrogen", 13.46, 20.84),
        ("syngas", 3.68, 5.74),
    ],
)
def test_heat_through_an_injector(gas, name, at_1_2, at_1_5):
    heat = catalogue.find(name, GRI).lower_heating_value
    for ratio, printed in ((1.2, at_1_2), (1.5, at_1_5)):
        flow = injector.flow(vapour(gas, name), 1e-4, ratio, 20e5)
        assert 1e-6 * flow * heat == pytest.approx(printed, rel=0.005)


@settings(derandomize=True, max_examples=40)
@given(st.floats(1.001, 8.0), st.floats(1.1, 1.45), st.floats(200.0, 4200.0))
def test_pressure_ratio_comes_back_from_its_flow(ratio, gamma, gas_constant):
    through = Vapour(300.0, gas_constant, gamma)
    flow = injector.flow(through, 1e-4, ratio, 1e6)
    back = injector.pressure_ratio_for(through, flow, 1e-4, 1e6)
    assert injector.flow(through, 1e-4, back, 1e6) == pytest.approx(flow, rel=1e-9)
    assert back == pytest.approx(ratio, rel=1e-8)


def test_an_injector_that_cannot_pass_a_fuel_says_so():
    with pytest.raises(InputError, match="open its area"):
        injector.pressure_ratio_for(Vapour(300.0, 500.0, 1.3), 1.0, 1e-9, 1e6)


# Dry air at 700 K and 20 bar: stoichiometric fuel-air ratio, stoichiometric temperature with the
# fuel at the air's temperature; with the fuel at 298 K, fuel-air ratio and heat per air for
# equilibrium at 1600 K, water in the products.
@pytest.mark.parametrize(
    ("name", "stoichiometric", "flame", "fuel_air", "heat", "water"),
    [
        ("methane", 0.0580, 2509.0, 0.02345, 1.173, 0.081),
        ("natural-gas", 0.0608, 2510.0, 0.02452, 1.173, 0.080),
        ("methane+30%hydrogen", 0.0552, 2528.0, 0.02195, 1.176, 0.087),
        ("methane+50%hydrogen", 0.0523, 2548.0, 0.02040, 1.180, 0.094),
        ("hydrogen", 0.0292, 2695.0, 0.01003, 1.203, 0.134),
        ("propane", 0.0638, 2553.0, 0.02500, 1.158, 0.064),
        ("biogas", 0.1642, 2385.0, 0.07078, 1.251, 0.084),
        ("syngas", 0.3185, 2588.0, 0.10804, 1.288, 0.064),
    ],
)
def test_fuel_properties_in_dry_air(gas, name, stoichiometric, flame, fuel_air, heat, water):
    fuel = catalogue.find(name, GRI)
    assert fuel.stoichiometric_fuel_air_ratio == pytest.approx(stoichiometric, rel=0.005)
    hot = burn_to_equilibrium(
        gas, fuel, Supply(20e5, 700.0, 0.0, 700.0), fuel.stoichiometric_fuel_air_ratio
    )
    assert hot.temperature == pytest.approx(flame, abs=5.0)
    supply = Supply(20e5, 700.0, 0.0, 298.15)
    found = fuel_air_ratio_for(gas, fuel, supply, 1600.0)
    assert found == pytest.approx(fuel_air, rel=0.005)
    assert 1e-6 * found * fuel.lower_heating_value == pytest.approx(heat, rel=0.005)
    made = gas.mole_fractions(burn_to_equilibrium(gas, fuel, supply, found).mass_fractions)
    assert made[gas.index("H2O")] == pytest.approx(water, abs=0.0006)


@pytest.mark.parametrize(
    ("name", "flame"),
    [("methane", 2478.0), ("hydrogen", 2629.0), ("syngas", 2517.0), ("biogas", 2337.0)],
)
def test_flame_temperature_with_cold_fuel(gas, name, flame):
    fuel = catalogue.find(name, GRI)
    supply = Supply(20e5, 700.0, 0.0, 298.15)
    hot = burn_to_equilibrium(gas, fuel, supply, fuel.stoichiometric_fuel_air_ratio)
    assert hot.temperature == pytest.approx(flame, abs=5.0)


# Molar mass, lower heating value, lower and higher Wobbe, corrected Wobbe at 15 degC, Weaver's S.
@pytest.mark.parametrize(
    ("name", "molar", "heat", "lower", "higher", "corrected", "speed"),
    [
        ("methane", 16.04, 50.01, 45.59, 50.60, 53.7, 14.0),
        ("natural-gas", 17.34, 47.85, 45.36, 50.25, 53.5, 14.2),
        ("methane+30%hydrogen", 11.84, 53.58, 41.96, 46.91, 49.4, 24.4),
        ("methane+50%hydrogen", 9.03, 57.82, 39.55, 44.55, 46.6, 34.9),
        ("hydrogen", 2.016, 119.96, 38.77, 45.82, 45.7, 100.0),
        ("propane", 44.10, 46.33, 70.03, 76.07, 82.5, 16.0),
        ("biogas", 27.23, 17.68, 21.00, 23.30, 24.7, 10.2),
        ("syngas", 17.61, 11.92, 11.39, 12.34, 13.4, 40.9),
    ],
)
def test_property_table(name, molar, heat, lower, higher, corrected, speed):
    fuel = catalogue.find(name)
    assert 1e3 * fuel.molar_mass == pytest.approx(molar, rel=0.005)
    assert 1e-6 * fuel.lower_heating_value == pytest.approx(heat, rel=0.005)
    assert 1e-6 * fuel.wobbe_lower == pytest.approx(lower, rel=0.005)
    assert 1e-6 * fuel.wobbe_higher == pytest.approx(higher, rel=0.005)
    index = injector.modified_wobbe(fuel.lower_heat_per_volume, fuel.relative_density, 288.15)
    assert index == pytest.approx(corrected, rel=0.005)
    assert injector.weaver_factor(fuel.composition) == pytest.approx(speed, abs=0.1)


def test_weaver_indices_of_thirty_percent_hydrogen_for_methane():
    found = injector.interchange({"CH4": 0.7, "H2": 0.3}, {"CH4": 1.0}, 0.93, 0.4086 / 0.5539)
    assert found.primary_air == pytest.approx(0.902, abs=0.001)
    # printed from speed factors rounded to 24.4 and 14.03
    assert found.lifting == pytest.approx(1.569, rel=0.0025)
    assert found.flashback == pytest.approx(0.876, abs=0.003)
    assert injector.interchange({"NH3": 1.0}, {"CH4": 1.0}, 0.5, 1.0) is None
