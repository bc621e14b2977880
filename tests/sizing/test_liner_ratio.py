"""Liner area ratio: the closed form against direct maximisation, and its guards."""

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from scipy.optimize import minimize_scalar

from combustor.sizing.liner_ratio import (
    HIGHEST_RATIO,
    LOWEST_RATIO,
    jet_strength,
    optimum_ratio,
    ratio_for_annulus_velocity,
)


@pytest.mark.parametrize(
    ("dome", "diffuser", "step", "factor", "expected"),
    [
        pytest.param(0.12, 0.3, 4.0, 20.0, 0.6852, id="lefebvre-norster-1969-derived-a"),
        pytest.param(0.12, 0.45, 6.0, 28.0, 0.698, id="lefebvre-norster-1969-derived-b"),
        pytest.param(0.12, 0.4, 5.0, 20.0, 0.665, id="lefebvre-norster-1969-derived-c"),
        pytest.param(0.12, 0.5, 6.0, 37.0, 0.756, id="lefebvre-norster-1969-derived-d"),
    ],
)
def test_optimum(dome, diffuser, step, factor, expected):
    assert optimum_ratio(dome, diffuser, step, factor).value == pytest.approx(expected, abs=5e-4)


@settings(derandomize=True, max_examples=40)
@given(
    dome=st.floats(0.0, 0.35),
    diffuser=st.floats(0.05, 0.4),
    step=st.floats(2.0, 6.0),
    factor=st.floats(15.0, 45.0),
)
def test_optimum_is_the_maximum(dome, diffuser, step, factor):
    found = optimum_ratio(dome, diffuser, step, factor)
    assume(not found.bounded)
    direct = minimize_scalar(
        lambda k: -jet_strength(k, dome, diffuser, step, factor),
        bounds=(0.3, 0.95),
        method="bounded",
        options={"xatol": 1e-9},
    )
    assert found.value == pytest.approx(direct.x, abs=1e-5)


@pytest.mark.parametrize(
    ("arguments", "value", "said"),
    [
        ((0.1, 0.6, 8.0, 20.0), LOWEST_RATIO, "diffuser takes the whole loss"),
        ((0.5, 0.4, 2.0, 20.0), HIGHEST_RATIO, "gains nothing"),
        ((0.0, 0.05, 1.0, 5.0), LOWEST_RATIO, "below the usual range"),
        ((0.3, 0.2, 2.0, 60.0), HIGHEST_RATIO, "above the usual range"),
    ],
)
def test_guards_say_what_bounded_the_value(arguments, value, said):
    found = optimum_ratio(*arguments)
    assert found.value == value
    assert said in found.bounded


def test_annulus_velocity_by_hand():
    """12 kg/s through 0.3 of 0.08202 m2 at 7.432 kg/m3 run at 65.6 m/s."""
    assert ratio_for_annulus_velocity(65.61, 12.0, 7.432, 0.08202) == pytest.approx(0.70, abs=1e-4)
