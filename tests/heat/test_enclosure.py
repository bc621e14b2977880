"""Liner to casing."""

from __future__ import annotations

import numpy as np
import pytest

from combustor.heat.enclosure import casing_temperature, exchange_factor
from combustor.heat.sides import Casing


def test_black_surfaces_exchange_everything():
    assert exchange_factor(1.0, 1.0, 0.8) == 1.0


def test_a_very_large_casing_is_black_whatever_its_paint():
    assert exchange_factor(0.7, 0.1, 1e-9) == pytest.approx(0.7)


def test_the_ready_value_for_a_steel_casing_is_typical():
    """Published ready value 0.6, from memory: oxidised sheet in a rolled steel casing."""
    assert exchange_factor(0.8, 0.7, 0.8) == pytest.approx(0.6, abs=0.05)


def test_casing_without_stated_loss_is_at_air_temperature():
    air = np.array([700.0, 750.0])
    T, slope = casing_temperature(np.full(2, 1200.0), air, np.full(2, 800.0), 0.6, 0.8, Casing())
    assert pytest.approx(air) == T
    assert slope == pytest.approx(0.0)


@pytest.mark.parametrize("loss", [0.0, 10.0, 100.0])
def test_casing_balance_closes(loss):
    T2, Ta, h, Z, ratio = np.array([1000.0, 1300.0]), np.full(2, 750.0), np.full(2, 500.0), 0.6, 0.8
    casing = Casing(loss, 300.0)
    T, slope = casing_temperature(T2, Ta, h, Z, ratio, casing)
    received = Z * 5.670374e-8 * (T2**4 - T**4)
    given = (h * (T - Ta) + loss * (T - 300.0)) / ratio
    assert received == pytest.approx(given, rel=1e-9)
    warmer, _ = casing_temperature(T2 + 0.01, Ta, h, Z, ratio, casing)
    assert (warmer - T) / 0.01 == pytest.approx(slope, rel=1e-3)


def test_an_insulated_casing_runs_above_the_air():
    T, _ = casing_temperature(
        np.full(1, 1200.0), np.full(1, 750.0), np.full(1, 500.0), 0.6, 0.8, Casing(0.0)
    )
    assert 750.0 < T[0] < 1200.0
