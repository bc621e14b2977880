"""Rows of jets: hole count, diameter, penetration; and drills."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.airflow.jets import penetration_row
from combustor.sizing.drill import drill_step, nearest_drill
from combustor.sizing.rows import (
    AIMED_PITCH,
    LEAST_COUNT,
    RowConditions,
    best_mixing_count,
    holes_times_diameter_squared,
    pitch_over_diameter,
    plan_row,
    wanted_penetration,
)
from combustor.sizing.section import Section


def test_holes_times_diameter_squared_by_hand():
    """5 kg/s at 48 kPa, 1.6 MPa, 750 K: 0.007537 m2 (15.25 in Lefebvre 1983), derived."""
    density = 1.6e6 / (287.05 * 750.0)
    velocity = math.sqrt(2 * 48e3 / density)
    conditions = RowConditions(5.0, 13.0, velocity, density, 0.6, 5.49)
    assert holes_times_diameter_squared(conditions) == pytest.approx(7.537e-3, abs=5e-7)
    jet = math.sqrt(holes_times_diameter_squared(conditions) / 40)
    assert jet == pytest.approx(13.73e-3, abs=5e-6)
    assert jet / math.sqrt(0.6) == pytest.approx(17.72e-3, abs=1e-5)


@pytest.mark.parametrize(
    ("momentum_ratio", "count"),
    [
        pytest.param(25.0, 8.89, id="holdeman-1993-from-memory-25"),
        pytest.param(36.0, 10.66, id="holdeman-1993-from-memory-36"),
        pytest.param(57.0, 13.42, id="holdeman-1993-from-memory-57"),
    ],
)
def test_best_mixing_count(momentum_ratio, count):
    assert best_mixing_count(momentum_ratio) == pytest.approx(count, abs=5e-3)


CONDITIONS = st.builds(
    RowConditions,
    jet_flow=st.floats(0.05, 5.0),
    gas_flow=st.floats(0.5, 10.0),
    jet_velocity=st.floats(60.0, 150.0),
    jet_density=st.floats(2.0, 8.0),
    discharge_coefficient=st.floats(0.4, 0.8),
    momentum_ratio=st.floats(5.0, 100.0),
)


@settings(derandomize=True, max_examples=60)
@given(conditions=CONDITIONS, liner=st.floats(0.1, 0.6))
def test_whole_row_passes_its_flow(conditions, liner):
    plan = plan_row(conditions, Section(), liner)
    area = plan.count * math.pi / 4 * plan.hole_diameter**2
    flux = conditions.discharge_coefficient * conditions.jet_density * conditions.jet_velocity
    assert area * flux == pytest.approx(conditions.jet_flow)
    assert plan.count >= LEAST_COUNT


@settings(derandomize=True, max_examples=60)
@given(conditions=CONDITIONS, liner=st.floats(0.1, 0.6))
def test_free_count_reaches_the_wanted_depth(conditions, liner):
    plan = plan_row(conditions, Section(), liner)
    jet = math.sqrt(holes_times_diameter_squared(conditions) / plan.free_count)
    depth = penetration_row(
        jet, conditions.momentum_ratio, conditions.gas_flow, conditions.jet_flow
    )
    assert depth == pytest.approx(wanted_penetration(Section(), liner))
    if not plan.bound:
        assert abs(plan.count - plan.free_count) <= 0.5
    if plan.count > LEAST_COUNT and not plan.bound:
        pitch = pitch_over_diameter(math.pi * liner, plan.count, plan.hole_diameter)
        assert pitch >= AIMED_PITCH * (1 - 1e-9)


def test_a_stated_count_is_kept():
    conditions = RowConditions(1.0, 5.0, 110.0, 5.7, 0.58, 20.0)
    plan = plan_row(conditions, Section(), 0.3, stated_count=11)
    assert plan.count == 11
    assert "stated" in plan.bound


@pytest.mark.parametrize(
    ("diameter", "step"),
    [(2.5e-3, 0.05e-3), (13.9e-3, 0.1e-3), (20e-3, 0.25e-3), (45e-3, 0.5e-3), (60e-3, 1e-3)],
    ids=lambda value: f"metric-drill-series-from-memory-{1e3 * value:g}",
)
def test_drill_steps(diameter, step):
    assert drill_step(diameter) == pytest.approx(step)


@settings(derandomize=True, max_examples=60)
@given(diameter=st.floats(0.5e-3, 80e-3))
def test_nearest_drill_is_near_and_on_the_grid(diameter):
    found = nearest_drill(diameter)
    step = drill_step(diameter)
    assert abs(found - diameter) <= 0.5 * step + 1e-9
    assert found * 1e5 == pytest.approx(round(found * 1e5), abs=1e-6)


def test_a_stated_step_stands_everywhere():
    assert nearest_drill(8.77e-3, 0.5e-3) == pytest.approx(9.0e-3)
