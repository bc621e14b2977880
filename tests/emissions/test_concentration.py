"""Concentrations know their basis: published arithmetic, inverses, orders, and slips refused."""

from __future__ import annotations

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.emissions import bases
from combustor.emissions.concentration import BasisError, mean, measured

SETTINGS = settings(derandomize=True, max_examples=60, deadline=None)
SHARE = st.floats(1e-9, 0.01)
WATER = st.floats(0.0, 0.3)
OXYGEN = st.floats(0.0, 0.19)
AIR = st.sampled_from([0.209, 0.2095, 0.21])


@SETTINGS
@given(value=SHARE, water=WATER, oxygen=OXYGEN)
def test_drying_and_its_inverse_return_the_start(value, water, oxygen):
    assume(oxygen / (1.0 - water) < 0.2)
    start = measured(value, "CO", oxygen, "wet", water=water)
    there = start.dry()
    back = there.wet()
    assert back.value == pytest.approx(value, rel=1e-12)
    assert back.basis.like(start.basis)


@SETTINGS
@given(value=SHARE, water=WATER, oxygen=OXYGEN, air=AIR, reference=st.floats(0.0, 0.19))
def test_oxygen_reference_and_back(value, water, oxygen, air, reference):
    start = measured(value, "NOx", oxygen, water=water)
    there = start.at_oxygen(reference, air)
    back = there.at_oxygen(oxygen, air)
    assert back.value == pytest.approx(value, rel=1e-12)
    assert back.basis.water == pytest.approx(water, rel=1e-9, abs=1e-12)


@SETTINGS
@given(value=SHARE, oxygen=OXYGEN, kelvin=st.sampled_from([273.15, 288.15, 293.15]))
def test_mass_and_back(value, oxygen, kelvin):
    start = measured(value, "NOx", oxygen)
    assert start.as_mass(kelvin).as_fraction().value == pytest.approx(value, rel=1e-12)
    as_no = start.as_mass(kelvin, "NO")
    assert as_no.as_fraction().value == pytest.approx(value, rel=1e-12)
    assert as_no.as_fraction().basis == start.basis


@SETTINGS
@given(value=SHARE, water=WATER, oxygen=st.floats(0.0, 0.13), air=AIR)
def test_wet_to_dry_to_reference_in_any_order_agrees(value, water, oxygen, air):
    start = measured(value, "NOx", oxygen, "wet", water=water)
    dried_first = start.dry().at_oxygen(0.15, air)
    referred_first = start.at_oxygen(0.15, air).dry()
    assert referred_first.value == pytest.approx(dried_first.value, rel=1e-12)
    by_mass = start.dry().as_mass(273.15).at_oxygen(0.15, air).as_fraction()
    assert by_mass.value == pytest.approx(dried_first.value, rel=1e-12)


@pytest.mark.parametrize(
    ("change", "said"),
    [
        (lambda c: c.wet(0.08), "wet"),
        (lambda c: c.at_oxygen(0.03, 0.2095), "3 % O2"),
        (lambda c: c.as_mass(273.15), "mass as NO2"),
    ],
)
def test_unlike_bases_are_neither_compared_nor_added(change, said):
    one = measured(20e-6, "NOx", 0.14).at_oxygen(0.15, 0.2095)
    other = change(one)
    for act in (
        lambda: one < other,
        lambda: one >= other,
        lambda: one + other,
        lambda: one - other,
    ):
        with pytest.raises(BasisError, match=said):
            act()


def test_species_air_and_temperature_make_bases_unlike():
    nox = measured(20e-6, "NOx", 0.14)
    pairs = [
        (nox, measured(20e-6, "CO", 0.14)),
        (nox.at_oxygen(0.15, 0.209), nox.at_oxygen(0.15, 0.21)),
        (nox.as_mass(273.15), nox.as_mass(288.15)),
        (nox.as_mass(273.15), nox.as_mass(273.15, "NO")),
        (nox, measured(20e-6, "NOx", 0.141)),
    ]
    for one, other in pairs:
        with pytest.raises(BasisError, match="unlike bases"):
            _ = one <= other


def test_averaging_before_correcting_is_refused_and_would_be_wrong():
    runs = [measured(30e-6, "NOx", 0.12), measured(20e-6, "NOx", 0.17)]
    with pytest.raises(BasisError, match="unlike bases"):
        mean(runs)
    right = mean([run.at_oxygen(0.15, 0.209) for run in runs]).value
    slip = measured(25e-6, "NOx", 0.145).at_oxygen(0.15, 0.209).value
    assert right == pytest.approx((30e-6 * 5.9 / 8.9 + 20e-6 * 5.9 / 3.9) / 2, rel=1e-12)
    assert slip / right == pytest.approx(0.9192, abs=5e-5)


def test_oxygen_left_wet_is_dried_with_the_pollutant():
    # 20 ppm and 14 % O2, both wet, 8 % water, 20.9 % O2 in air: by hand
    # dry 20/0.92 = 21.739 ppm, O2 14/0.92 = 15.217 %, x 5.9/(20.9 - 15.217) = 22.571
    found = measured(20e-6, "NOx", 0.14, "wet", water=0.08).dry().at_oxygen(0.15, 0.209)
    assert found.value * 1e6 == pytest.approx(22.571, abs=5e-4)
    slips = {
        "both wet": 20 * 5.9 / (20.9 - 14.0),
        "dry NOx, wet O2": 20 / 0.92 * 5.9 / (20.9 - 14.0),
        "wet NOx, dry O2": 20 * 5.9 / (20.9 - 14 / 0.92),
    }
    for slip in slips.values():
        assert abs(slip / (found.value * 1e6) - 1.0) > 0.07


def test_wet_without_the_water_is_refused():
    with pytest.raises(BasisError, match="water of the gas is not known"):
        measured(20e-6, "NOx", 0.14, "wet")
    with pytest.raises(BasisError, match="water of the gas is needed"):
        measured(20e-6, "NOx", 0.14).wet()


def test_oxygen_in_percent_for_a_fraction_is_refused():
    with pytest.raises(InputError, match="at or above that of air"):
        measured(20e-6, "NOx", 14.0).at_oxygen(0.15, 0.209)


def test_no_mass_for_no2_is_a_third_too_low():
    as_no2 = measured(25e-6, "NOx", 0.15).as_mass(273.15)
    as_no = measured(25e-6, "NOx", 0.15).as_mass(273.15, "NO")
    assert as_no2.value * 1e6 == pytest.approx(51.3, abs=0.05)
    assert as_no.value * 1e6 == pytest.approx(33.5, abs=0.05)
    with pytest.raises(BasisError, match="unlike bases"):
        _ = as_no < as_no2


@pytest.mark.parametrize(
    ("celsius", "value"),
    [(0.0, 51.3), (15.0, 48.6), (20.0, 47.8)],
    ids=lambda v: f"{v}",
)
def test_25_ppm_nox_at_three_temperatures_of_the_cubic_metre(celsius, value):
    found = measured(25e-6, "NOx", 0.15).as_mass(273.15 + celsius)
    assert found.value * 1e6 == pytest.approx(value, abs=0.05)


@pytest.mark.parametrize(
    ("oxygen", "shift_percent"), [(0.12, 0.6), (0.135, 0.3), (0.17, -0.9)], ids=str
)
def test_21_against_20_9_percent_oxygen_in_air(oxygen, shift_percent):
    run = measured(20e-6, "NOx", oxygen)
    ratio = run.at_oxygen(0.15, 0.21).value / run.at_oxygen(0.15, 0.209).value
    assert 100.0 * (ratio - 1.0) == pytest.approx(shift_percent, abs=0.06)


def test_a_second_reference_with_another_air_is_refused():
    once = measured(20e-6, "NOx", 0.14).at_oxygen(0.15, 0.209)
    with pytest.raises(BasisError, match="one O2 of air"):
        once.at_oxygen(0.03, 0.21)


def test_the_object_agrees_with_the_plain_functions():
    run = measured(30e-6, "CO", 0.13, water=0.07)
    plain = bases.at_reference_oxygen(30e-6, 0.13)
    assert run.at_oxygen(0.15, bases.OXYGEN_IN_AIR).value == plain
