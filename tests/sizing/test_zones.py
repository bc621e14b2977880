"""Zone lengths and pattern factor."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.sizing.zones import (
    dilution_length_ratio,
    length_ratio_for,
    pattern_factor,
)


@pytest.mark.parametrize(
    ("is_round", "length_ratio", "loss_factor", "expected"),
    [
        pytest.param(True, 3.0, 30.0, 0.147, id="lefebvre-1984-from-memory-can-30"),
        pytest.param(True, 3.0, 20.0, 0.212, id="lefebvre-1984-from-memory-can-20"),
        pytest.param(False, 3.0, 20.0, 0.283, id="lefebvre-1984-from-memory-annular-3"),
        pytest.param(False, 2.0, 20.0, 0.393, id="lefebvre-1984-from-memory-annular-2"),
    ],
)
def test_pattern_factor(is_round, length_ratio, loss_factor, expected):
    assert pattern_factor(length_ratio, loss_factor, is_round) == pytest.approx(expected, abs=6e-4)


def test_length_for_a_pattern_factor():
    """Annular, 0.25 at loss factor 20: 1/(0.05 x 20 x ln(4/3)) = 3.476."""
    assert length_ratio_for(0.25, 20.0, is_round=False) == pytest.approx(3.476, abs=5e-4)


@settings(derandomize=True, max_examples=40)
@given(wanted=st.floats(0.02, 0.6), loss_factor=st.floats(5.0, 80.0), is_round=st.booleans())
def test_length_and_pattern_factor_are_inverse(wanted, loss_factor, is_round):
    length = length_ratio_for(wanted, loss_factor, is_round)
    assert pattern_factor(length, loss_factor, is_round) == pytest.approx(wanted)


@pytest.mark.parametrize(
    ("loss_factor", "expected"),
    [
        pytest.param(15.0, 2.28, id="melconian-modak-1985-from-memory-15"),
        pytest.param(20.0, 1.71, id="melconian-modak-1985-from-memory-20"),
        pytest.param(30.0, 1.33, id="melconian-modak-1985-from-memory-30"),
    ],
)
def test_dilution_length_at_pattern_factor_a_quarter(loss_factor, expected):
    found = dilution_length_ratio(0.25, loss_factor)
    assert found.value == pytest.approx(expected, abs=5e-3)
    assert not found.notices


@settings(derandomize=True, max_examples=60)
@given(low=st.floats(0.05, 0.6), step=st.floats(0.0, 0.3), loss_factor=st.floats(10.0, 60.0))
def test_dilution_length_never_rises_with_pattern_factor(low, step, loss_factor):
    shorter = dilution_length_ratio(low + step, loss_factor).value
    assert shorter <= dilution_length_ratio(low, loss_factor).value + 1e-12


def test_stretched_charts_are_noticed():
    assert len(dilution_length_ratio(0.12, 60.0).notices) == 2


@pytest.mark.parametrize("loss_factor", [20.0, 30.0])
@pytest.mark.parametrize("wanted", [0.15, 0.20])
def test_siblings_chart_and_law_agree_within_their_scatter(wanted, loss_factor):
    """Length of a can by charts (with 0.7 and 0.5 diameters ahead) and by Lefebvre's law."""
    chart = 0.7 + 0.5 + dilution_length_ratio(wanted, loss_factor).value
    assert chart == pytest.approx(length_ratio_for(wanted, loss_factor), rel=0.3)
