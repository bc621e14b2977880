"""Drop size and evaporation: worked values, limits, trends."""

from __future__ import annotations

from math import pi

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.spray import drop_size as d
from combustor.spray import evaporation as e

DENSE, THIN = 7.432, 1.2
OWN = "evaluated by hand from the published formula"


def injection(air_density: float) -> d.Injection:
    return d.Injection(0.02, 780.0, 1.3e-3, 0.0253, air_density)


@pytest.mark.parametrize(
    ("air", "micrometres"),
    [(DENSE, 38.8), (THIN, 61.2)],
    ids=[f"Lefebvre 1987, {OWN}: dense air", f"Lefebvre 1987, {OWN}: thin air"],
)
def test_pressure_swirl_lefebvre(air, micrometres):
    assert 1e6 * d.pressure_swirl_lefebvre(injection(air), 1e6) == pytest.approx(
        micrometres, abs=0.05
    )


@pytest.mark.parametrize(
    ("air", "micrometres"),
    [(DENSE, 28.2), (THIN, 44.5)],
    ids=[f"Wang and Lefebvre 1987, {OWN}: dense", f"Wang and Lefebvre 1987, {OWN}: thin"],
)
def test_pressure_swirl_wang(air, micrometres):
    found = d.pressure_swirl_wang(injection(air), 1e6, 2e-3, pi / 2)
    assert 1e6 * found == pytest.approx(micrometres, abs=0.06)


@pytest.mark.parametrize(
    ("air", "velocity", "micrometres"),
    [(DENSE, 100.0, 11.9), (THIN, 100.0, 37.2), (DENSE, 60.0, 20.2)],
    ids=[f"El-Shanawany and Lefebvre 1980, {OWN}: {case}" for case in ("dense", "thin", "slow")],
)
def test_prefilming_airblast(air, velocity, micrometres):
    found = d.prefilming_airblast(injection(air), velocity, 3.0, 0.0381, 0.015)
    assert 1e6 * found == pytest.approx(micrometres, abs=0.06)


def test_flow_number_and_pressure_drop_are_inverse():
    number = d.flow_number(0.02, 1e6, 780.0)
    assert number == pytest.approx(7.161e-7, rel=1e-4)
    assert d.pressure_drop_of(0.02, number, 780.0) == pytest.approx(1e6)


@pytest.mark.parametrize(("micrometres", "milliseconds"), [(30.0, 0.9), (60.0, 3.6), (100.0, 10.0)])
def test_life_of_a_drop(micrometres, milliseconds):
    assert 1e3 * e.evaporation_time(1e-6 * micrometres, 1e-6) == pytest.approx(milliseconds)


def test_one_size_of_drop():
    share = 1.0 - (4.0 / 9.0) ** 1.5  # 60 um, 1 mm2/s, 2 ms
    assert e.evaporated_single(60e-6, 1e-6, 2e-3) == pytest.approx(share, rel=1e-12)
    assert e.evaporated_single(60e-6, 1e-6, 4e-3) == 1.0


@pytest.mark.parametrize(
    ("spread", "time", "size", "share"),
    [(3.0, 2e-3, 81.2, 0.578), (2.5, 2e-3, 89.4, 0.535), (3.0, 4e-3, 81.2, 0.807)],
    ids=[f"Rosin-Rammler integral, {OWN}: {case}" for case in ("q 3", "q 2.5", "q 3, 4 ms")],
)
def test_rosin_rammler_spray(spread, time, size, share):
    assert 1e6 * e.rosin_rammler_size(60e-6, spread) == pytest.approx(size, abs=0.06)
    assert e.evaporated_spray(60e-6, spread, 1e-6, time) == pytest.approx(share, abs=6e-4)


def test_constant_of_a_drop_at_rest():
    number = e.transfer_number(1900.0, 480.0, 300.0, 2500.0, 2500.0, 2.9e5)
    assert number == pytest.approx(4.797, abs=5e-4)
    assert e.constant_at_rest(0.07, 1300.0, 600.0, number) == pytest.approx(1.262e-6, abs=5e-10)
    assert e.constant_with_slip(1e-6, 0.0) == 1e-6


@settings(derandomize=True, max_examples=40, deadline=None)
@given(size=st.floats(5e-6, 3e-4), first=st.floats(0.0, 0.02), more=st.floats(0.0, 0.02))
def test_more_time_evaporates_more_and_never_more_than_all(size, first, more):
    early = e.evaporated_spray(size, 3.0, 0.8e-6, first)
    late = e.evaporated_spray(size, 3.0, 0.8e-6, first + more)
    assert 0.0 <= early <= late <= 1.0


def test_a_spread_that_narrows_tends_to_one_size():
    single = e.evaporated_single(60e-6, 1e-6, 2e-3)
    assert e.evaporated_spray(60e-6, 400.0, 1e-6, 2e-3) == pytest.approx(single, abs=5e-3)
