"""Humidity, the ISO-day correction, dew points, sulfur, hydrogen's reading."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.emissions import dew_point, reference_day, sulfur
from combustor.emissions.dew_point import ATMOSPHERE, MILLIMETRE_OF_MERCURY
from combustor.emissions.hydrogen_reading import apparent_factor, hydrogen_limit_factor
from combustor.fuel.heating_value import iso_heat_of

SETTINGS = settings(derandomize=True, max_examples=40, deadline=None)


def test_humidity_of_the_published_example():
    """40 CFR 1066.615: p_d 2.93 kPa, 37.5 %, 96.71 kPa give 7.1474 g/kg."""
    found = reference_day.humidity_ratio(0.375, 96.71e3, saturation=2930.0)
    assert found * 1e3 == pytest.approx(7.1474, abs=5e-5)


@pytest.mark.parametrize(
    ("celsius", "relative", "humidity", "factor"),
    [(15.0, 0.60, 0.00633, 1.0), (35.0, 0.80, 0.02884, 0.652), (0.0, 0.60, 0.00226, 1.081)],
    ids=["ISO day", "hot and humid", "freezing"],
)
def test_humidity_of_a_day(celsius, relative, humidity, factor):
    found = reference_day.humidity_ratio(relative, 101325.0, 273.15 + celsius)
    assert found == pytest.approx(humidity, abs=1.5e-5)
    # NOx falls with humidity: measured over reference is the inverse of the correction
    moved = 1.0 / reference_day.aircraft_humidity_factor(found)
    assert moved == pytest.approx(factor, abs=2e-3)


def test_dry_air_for_the_iso_day_is_12_8_percent_off():
    assert 1.0 / reference_day.aircraft_humidity_factor(0.0) == pytest.approx(1.128, abs=5e-4)


def test_the_iso_day_leaves_itself_alone():
    assert reference_day.iso_factor(0.00633, 288.0, 1.0, "diffusion") == 1.0


@pytest.mark.parametrize("front_end", ["lean-premixed", "rich-lean"])
def test_the_iso_correction_is_refused_where_it_does_not_hold(front_end):
    with pytest.raises(InputError, match="diffusion flames") as refused:
        reference_day.iso_factor(0.01, 300.0, 1.0, front_end)
    assert "lean premixed" in str(refused.value)


@SETTINGS
@given(pressure=st.floats(700.0, 20000.0))
def test_saturation_and_its_inverse(pressure):
    kelvin = reference_day.saturation_temperature(pressure)
    assert reference_day.saturation_pressure(kelvin) == pytest.approx(pressure, rel=1e-12)


@pytest.mark.parametrize(
    ("water", "celsius"), [(0.08, 41.8), (0.12, 49.7), (0.18, 58.0)], ids=["8 %", "12 %", "18 %"]
)
def test_water_dew_point(water, celsius):
    assert dew_point.water_dew_point(water) - 273.15 == pytest.approx(celsius, abs=0.06)


def test_acid_dew_point_of_the_published_example():
    """Verhoff & Banchero with 93.44 mmHg H2O and 0.0024917 mmHg SO3: 402 K."""
    found = dew_point.acid_dew_point_verhoff_banchero(
        93.44 * MILLIMETRE_OF_MERCURY, 0.0024917 * MILLIMETRE_OF_MERCURY
    )
    assert found == pytest.approx(402.0, abs=0.5)


@pytest.mark.parametrize("so3", [0.1e-6, 0.5e-6, 2e-6, 10e-6])
def test_two_acid_dew_points_agree_within_their_scatter(so3):
    water = 0.08 * ATMOSPHERE
    one = dew_point.acid_dew_point_verhoff_banchero(water, so3 * ATMOSPHERE)
    other = dew_point.acid_dew_point_okkes(water, so3 * ATMOSPHERE)
    assert one == pytest.approx(other, abs=5.0)


@pytest.mark.parametrize(
    ("form", "so3", "celsius"),
    [
        (dew_point.acid_dew_point_verhoff_banchero, 0.5e-6, 107.0),
        (dew_point.acid_dew_point_okkes, 0.5e-6, 108.1),
        (dew_point.acid_dew_point_verhoff_banchero, 0.1e-6, 93.5),
    ],
    ids=["Verhoff & Banchero, 0.5 ppm", "Okkes, 0.5 ppm", "Verhoff & Banchero, 0.1 ppm"],
)
def test_acid_dew_point_at_8_percent_water_and_one_atmosphere(form, so3, celsius):
    found = form(0.08 * ATMOSPHERE, so3 * ATMOSPHERE)
    assert found - 273.15 == pytest.approx(celsius, abs=0.06)


def test_the_acid_dew_point_rises_with_acid_and_water_and_needs_acid():
    points = [dew_point.acid_dew_point(0.08, so3) for so3 in (1e-7, 1e-6, 1e-5)]
    assert points == sorted(points)
    assert dew_point.acid_dew_point(0.12, 1e-6) > dew_point.acid_dew_point(0.06, 1e-6)
    assert dew_point.acid_dew_point(0.08, 0.0) is None


def test_sulfur_of_the_fuel_is_kept():
    """0.1 % sulfur is 2.0 g SO2 per kg fuel."""
    oxides = sulfur.sulfur_oxides(0.001, 50.0, 0.0286)
    total = (oxides.so2 + oxides.so3) * 64.06e-3 / 0.0286 * 50.0
    assert total * 1e3 == pytest.approx(2.0, abs=0.005)
    assert oxides.so3 / (oxides.so2 + oxides.so3) == pytest.approx(0.02, rel=1e-12)


def blend(hydrogen):
    atoms = {"H": 2.0 * hydrogen + 4.0 * (1.0 - hydrogen), "C": 1.0 - hydrogen}
    heat = hydrogen * iso_heat_of("H2").lower + (1.0 - hydrogen) * iso_heat_of("CH4").lower
    return {k: v for k, v in atoms.items() if v > 0.0}, heat


@pytest.mark.parametrize(
    ("percent", "factor"),
    [(10, 1.009), (20, 1.019), (30, 1.032), (50, 1.066), (70, 1.124), (80, 1.171), (90, 1.243)],
    ids=lambda v: f"{v} % H2 in CH4" if isinstance(v, int) else "element balance, LHV",
)
def test_apparent_factor_of_blends(percent, factor):
    assert apparent_factor(*blend(percent / 100.0)) == pytest.approx(factor, abs=1.1e-3)


def test_apparent_factor_of_hydrogen():
    assert apparent_factor(*blend(1.0)) == pytest.approx(1.365, rel=3e-3)


def test_the_rule_s_hydrogen_factor_is_met_at_both_ends():
    """UK guidance of October 2024: 1.37 at 100 % hydrogen."""
    assert hydrogen_limit_factor(*blend(1.0), 1.37) == pytest.approx(1.37, rel=1e-12)
    assert 50.0 * hydrogen_limit_factor(*blend(1.0), 1.37) == pytest.approx(68.5, abs=0.05)
    assert hydrogen_limit_factor(*blend(0.0), 1.37) == 1.0
