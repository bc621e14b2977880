"""The quick look at one flame: equilibrium and stirred reactor."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.studies.flame import flame

METHANE = catalogue.find("methane")
GRI = Gas.load(METHANE.mechanism)


@pytest.mark.parametrize(
    ("phi", "temperature", "ei_nox", "ei_co"),
    [
        pytest.param(*row, id=f"computed stirred-reactor table, 700 K 20 bar 5 ms: {row[0]}")
        for row in [
            (0.40, 1603.0, 0.037, 50.8),
            (0.50, 1802.6, 0.238, 13.85),
            (0.60, 1983.0, 1.734, 8.45),
            (0.80, 2297.8, 45.36, 26.7),
            (1.00, 2507.8, 68.1, 201.0),
            (1.20, 2426.4, 9.51, 767.0),
        ]
    ],
)
def test_stirred_methane(phi, temperature, ei_nox, ei_co):
    result = flame(METHANE, GRI, phi, 700.0, 20e5, residence_time=5e-3, humidity=0.0)
    assert result.stirred is not None
    assert result.stirred.status == "burning"
    assert result.stirred.temperature == pytest.approx(temperature, abs=1.0)
    assert result.stirred.emissions.ei_nox * 1e3 == pytest.approx(ei_nox, rel=0.03)
    assert result.stirred.emissions.ei_co * 1e3 == pytest.approx(ei_co, rel=0.03)


@pytest.mark.parametrize(
    ("phi", "temperature", "carbon_monoxide"),
    [
        pytest.param(*row, id=f"computed equilibrium, methane 700 K 20 bar: {row[0]}")
        for row in [(0.5, 1800.4, 4.8), (0.6, 1976.3, 28.4), (0.8, 2289.8, 413.0)]
    ],
)
def test_equilibrium_methane(phi, temperature, carbon_monoxide):
    result = flame(METHANE, GRI, phi, 700.0, 20e5, humidity=0.0)
    assert result.equilibrium_temperature == pytest.approx(temperature, abs=1.0)
    assert result.equilibrium.co_dry_15 * 1e6 == pytest.approx(carbon_monoxide, rel=0.02)
    assert result.stirred is None


def test_a_flame_that_blows_out_has_no_numbers():
    result = flame(METHANE, GRI, 0.3, 700.0, 20e5, residence_time=5e-3, humidity=0.0)
    assert result.stirred.status == "blown_out"
    assert result.stirred.temperature is None
    assert result.stirred.emissions is None
    assert result.equilibrium_temperature > 1300.0


@pytest.mark.parametrize(
    ("name", "temperature"),
    [
        pytest.param(*row, id=f"computed, air 700 K fuel 298 K 20 bar, stoichiometric: {row[0]}")
        for row in [
            ("methane", 2478.0),
            ("hydrogen", 2629.0),
            ("syngas", 2517.0),
            ("biogas", 2337.0),
        ]
    ],
)
def test_cold_fuel_cools_the_flame(name, temperature):
    fuel = catalogue.find(name)
    gas = Gas.load(fuel.mechanism)
    cold = flame(fuel, gas, 1.0, 700.0, 20e5, fuel_temperature=298.15, humidity=0.0)
    warm = flame(fuel, gas, 1.0, 700.0, 20e5, humidity=0.0)
    assert cold.equilibrium_temperature == pytest.approx(temperature, abs=3.0)
    assert warm.equilibrium_temperature > cold.equilibrium_temperature
    assert cold.mixture_temperature < 700.0
    assert warm.mixture_temperature == pytest.approx(700.0, abs=1e-6)


def test_humidity_of_the_iso_day_cools_a_methane_flame_by_15_kelvin():
    dry = flame(METHANE, GRI, 1.0, 700.0, 20e5, humidity=0.0)
    moist = flame(METHANE, GRI, 1.0, 700.0, 20e5)
    drop = dry.equilibrium_temperature - moist.equilibrium_temperature
    assert drop == pytest.approx(15.0, abs=3.0)
    assert moist.fuel_air_ratio == dry.fuel_air_ratio


@settings(derandomize=True, max_examples=10, deadline=None)
@given(phi=st.floats(0.45, 0.9), pressure=st.floats(1e5, 30e5))
def test_longer_times_come_nearer_to_equilibrium(phi, pressure):
    short, long = (
        flame(METHANE, GRI, phi, 700.0, pressure, residence_time=time).stirred
        for time in (5e-3, 20e-3)
    )
    assert long.emissions.co_dry_15 < short.emissions.co_dry_15
    assert long.emissions.nox_dry_15 > short.emissions.nox_dry_15
    assert long.emissions.combustion_efficiency > short.emissions.combustion_efficiency


@pytest.mark.parametrize("name", ["hydrogen", "syngas", "ammonia", "propane", "methanol"])
def test_every_family_of_fuels_burns(name):
    fuel = catalogue.find(name)
    gas = Gas.load(fuel.mechanism)
    result = flame(fuel, gas, 0.8, 700.0, 10e5, residence_time=20e-3)
    assert result.stirred.status == "burning"
    gap = abs(result.stirred.temperature - result.equilibrium_temperature)
    assert gap < 60.0
    assert 0.95 < result.stirred.emissions.combustion_efficiency <= 1.0


def test_every_bad_argument_is_named_at_once():
    with pytest.raises(InputError) as refused:
        flame(METHANE, GRI, -1.0, float("nan"), 0.0, residence_time=0.0, humidity=2.0)
    named = {problem.key for problem in refused.value.problems}
    assert named == {"equivalence_ratio", "temperature", "pressure", "residence_time", "humidity"}


@pytest.mark.parametrize("pressure", [1e5, 20e5])
@pytest.mark.parametrize("time", [5e-3, 20e-3])
@pytest.mark.parametrize("phi", [0.36, 0.44])
def test_two_mechanisms_differ_on_hydrogen_as_the_catalogue_says(pressure, time, phi):
    newer, older = (catalogue.find("hydrogen", mechanism) for mechanism in (None, "gri30.yaml"))
    first, second = (
        flame(fuel, Gas.load(fuel.mechanism), phi, 700.0, pressure, time, humidity=0.0).stirred
        for fuel in (newer, older)
    )
    assert 1640.0 < first.temperature < 1860.0
    assert 1.2 < first.emissions.nox_dry_15 / second.emissions.nox_dry_15 < 2.7
    assert any("1.2 to 2.7 times" in caution for caution in newer.cautions)
