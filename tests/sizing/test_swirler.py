"""Axial swirler: area, swirl number, hub and tip."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.airflow.discharge import swirler_flow
from combustor.sizing.swirler import (
    passage_area,
    recirculated_share,
    swirl_number,
    swirler_area_ratio,
    tip_diameter,
    tip_diameter_on_hub,
)

ANGLE = math.radians(45.0)


def test_area_by_hand():
    """K 1.3, 45 deg, loss factor 14, 9 % of the air, k 0.7: 1.4142/36.49."""
    assert swirler_area_ratio(0.09, 14.0, ANGLE, 1.3, 0.7) == pytest.approx(0.03876, abs=5e-6)


def test_area_fed_back_gives_the_flow():
    """The rating form of the same equation, kept in another room, returns the air share."""
    reference, density, velocity = 0.1, 5.0, 20.0
    ratio = swirler_area_ratio(0.09, 14.0, ANGLE, 1.3, 0.7)
    head = 0.5 * density * velocity**2
    flow = swirler_flow(ratio * reference, ANGLE, 1.3, 0.7 * reference, density, 14.0 * head)
    assert flow / (density * velocity * reference) == pytest.approx(0.09)


@pytest.mark.parametrize(
    ("degrees", "hub_ratio", "expected"),
    [
        pytest.param(40.0, 0.5, 0.653, id="beer-chigier-1972-from-memory-40"),
        pytest.param(45.0, 0.5, 0.778, id="beer-chigier-1972-from-memory-45"),
        pytest.param(45.0, 0.3, 0.713, id="beer-chigier-1972-from-memory-45-small-hub"),
        pytest.param(60.0, 0.5, 1.347, id="beer-chigier-1972-from-memory-60"),
    ],
)
def test_swirl_number(degrees, hub_ratio, expected):
    assert swirl_number(hub_ratio, 1.0, math.radians(degrees)) == pytest.approx(expected, abs=5e-4)


def test_swirl_number_without_hub():
    assert swirl_number(0.0, 1.0, ANGLE) == pytest.approx(2.0 / 3.0)


@settings(derandomize=True, max_examples=50)
@given(
    area=st.floats(1e-4, 2e-2),
    count=st.integers(6, 20),
    thickness=st.floats(0.5e-3, 2e-3),
    hub_ratio=st.floats(0.2, 0.7),
)
def test_tip_diameter_gives_the_area(area, count, thickness, hub_ratio):
    tip = tip_diameter(area, count, thickness, hub_ratio)
    assert passage_area(hub_ratio * tip, tip, count, thickness) == pytest.approx(area)
    same = tip_diameter_on_hub(area, count, thickness, hub_ratio * tip)
    assert same == pytest.approx(tip)


def test_no_recirculation_without_swirl():
    assert recirculated_share(0.4) == 0.0
    assert recirculated_share(0.7) < recirculated_share(1.0) < recirculated_share(1.5)
