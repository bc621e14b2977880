"""Drilled patches and transpiration."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from combustor.heat.effusion import (
    Effusion,
    hole_uptake,
    patch_film,
    rows_effectiveness,
    transpiration_flux,
)


@pytest.fixture
def patch():
    return Effusion("panel", 0.02, 0.08, 15, 3000, 0.5e-3, 3e-3, 0.25, 750.0)


@pytest.mark.parametrize(
    ("overall", "expected"),
    [
        pytest.param(0.6, 1.09, id="derived:0.6"),
        pytest.param(0.7, 1.70, id="derived:0.7"),
        pytest.param(0.8, 2.91, id="derived:0.8"),
    ],
)
def test_transpiration_flux(overall, expected):
    assert transpiration_flux(800.0, 1100.0, overall) == pytest.approx(expected, abs=6e-3)


@pytest.mark.parametrize(
    ("rows", "expected"),
    [
        pytest.param(10, 0.566, id="Sellers-1963-from-memory:10-rows"),
        pytest.param(20, 0.811, id="Sellers-1963-from-memory:20-rows"),
    ],
)
def test_equal_rows(rows, expected):
    assert rows_effectiveness(0.08, rows) == pytest.approx(expected, abs=6e-4)


def test_patch_builds_up_and_then_thins_without_a_step(patch):
    x = np.linspace(0.0, 0.15, 3001)
    eta = patch_film(patch, x, 0.15, 209.0, 0.10).effectiveness
    last = np.argmin(abs(x - patch.end))
    assert eta[x < patch.start].max() == 0.0
    assert eta[last] == pytest.approx(rows_effectiveness(0.08, 15), rel=1e-3)
    assert np.argmax(eta) == last
    assert np.abs(np.diff(eta)).max() < 0.01


def test_more_holes_for_the_same_air_pick_up_more(patch):
    few, many = hole_uptake(patch, 1), hole_uptake(replace(patch, holes=6000), 1)
    assert 0.0 < few < many < 1.0


def test_march_with_a_patch_closes_and_runs_cooler(bench, patch):
    bare, drilled = bench.march(), bench.march(effusion=(patch,))
    inside = drilled.regime.index("effusion")
    assert drilled.convergence.converged
    assert drilled.temperature[inside + 30] < bare.temperature[0] - 50.0
    out = sum(
        drilled.total(rate)
        for rate in (drilled.annulus_pick_up, drilled.casing_loss, drilled.hole_pick_up)
    )
    assert drilled.total(drilled.heat_from_gas) == pytest.approx(out, rel=1e-9)
    assert drilled.total(drilled.hole_pick_up) > 0.0


def test_air_leaving_the_holes_carries_what_it_picked_up(bench, patch):
    """The heat taken in the holes warms the air by exactly the uptake of the metal's excess."""
    result = bench.march(effusion=(patch,), stations=400)
    inside = (result.station >= patch.start) & (result.station < patch.end)
    excess = (result.cold_side_temperature - 750.0)[inside]
    mean_excess = np.average(excess, weights=result.length[inside])
    expected = patch.mass_flow * 1085.0 * hole_uptake(patch, 1) * mean_excess
    assert result.total(result.hole_pick_up) == pytest.approx(expected, rel=2e-3)
