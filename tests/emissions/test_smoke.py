"""Smoke as a trend: hydrogen and pressure move it as published, and no absolute value is given."""

from __future__ import annotations

import pytest

from combustor.base.errors import InputError
from combustor.emissions.smoke import SMOKE_TREND, soot_trend


def test_hydrogen_of_the_fuel():
    """(18 - H)^1.5: 13.8 % against 15 % is 1.66 times."""
    ratio = soot_trend(0.06, 1e6, 1.0, 2200.0, 0.138) / soot_trend(0.06, 1e6, 1.0, 2200.0, 0.15)
    assert ratio == pytest.approx(1.66, abs=0.005)


def test_pressure_and_richness():
    base = soot_trend(0.05, 1e6, 1.0, 2200.0, 0.138)
    assert soot_trend(0.05, 2e6, 1.0, 2200.0, 0.138) == pytest.approx(4.0 * base)
    assert soot_trend(0.06, 1e6, 1.0, 2200.0, 0.138) > base


def test_it_ends_where_the_form_does_and_says_it_is_a_trend():
    with pytest.raises(InputError, match="18 % hydrogen"):
        soot_trend(0.05, 1e6, 1.0, 2200.0, 0.25)
    assert "no absolute value" in SMOKE_TREND.note
