"""Diffuser: unstalled length, loss, and the choice between faired and dump."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.airflow.diffuser import plane_included_angle, stall_angle
from combustor.sizing.diffuser import (
    LONGEST,
    STALL_MARGIN,
    WIDEST_ANGLE,
    choose,
    dump,
    unstalled_length_ratio,
)


@settings(derandomize=True, max_examples=50)
@given(area_ratio=st.floats(1.01, 3.0))
def test_length_keeps_its_distance_from_stall(area_ratio):
    ratio = unstalled_length_ratio(area_ratio)
    angle = plane_included_angle(ratio, area_ratio)
    allowed = min(STALL_MARGIN * stall_angle(ratio), WIDEST_ANGLE)
    assert ratio == LONGEST or angle <= allowed * (1 + 1e-9)


def test_longer_diffuser_for_more_area():
    lengths = [unstalled_length_ratio(ratio) for ratio in (1.2, 1.5, 1.8, 2.2)]
    assert lengths == sorted(lengths)
    assert lengths[0] < lengths[-1]


def test_dump_loss_by_hand():
    """Area ratio 1.6, effectiveness 0.85, zeta 0.8: 0.0914 + 0.3125, Lefebvre 1983 form."""
    assert dump(0.02).loss_coefficient == pytest.approx(0.404, abs=5e-4)


def test_faired_is_taken_until_it_would_stall():
    assert choose(0.028, 0.021, 0.040)[0].kind == "faired"
    assert choose(0.028, 0.021, 0.140)[0].kind == "dump"


def test_the_users_kind_is_taken():
    assert choose(0.028, 0.021, 0.040, "dump")[0].kind == "dump"
    assert choose(0.028, 0.021, 0.140, "faired")[0].kind == "faired"


def test_narrowing_passage_is_no_diffuser():
    taken, _ = choose(0.028, 0.021, 0.025)
    assert taken.area_ratio < 1.0
    assert not taken.is_stalled
