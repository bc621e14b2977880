"""Films: published check values, joints of the laws, superposition, implied mixing."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.heat.convection import (
    boundary_layer_coefficient,
    film_coefficient,
    wall_jet_coefficient,
)
from combustor.heat.film import (
    effectiveness_boundary_layer,
    effectiveness_mixing,
    effectiveness_wall_jet,
    entrainment_rate,
    mean_entrainment_coefficient,
    regime_of,
    slot_film,
    superpose,
)

BALLAL = "Ballal-Lefebvre-1972-from-memory"
JUHASZ = "Juhasz-Marek-1971-from-memory"
S = 1.5e-3
JOINT = (1.28 / 1.10) ** (1 / 0.65)


@pytest.mark.parametrize(
    ("m", "viscosity_ratio", "slot_heights", "lip_ratio", "expected"),
    [
        pytest.param(0.5, 0.533, 20, 0.4, 0.421, id=f"{BALLAL}:m0.5"),
        pytest.param(1.0, 0.533, 20, 0.4, 0.660, id=f"{BALLAL}:m1.0"),
        pytest.param(1.3, 0.533, 20, 0.4, 0.783, id=f"{BALLAL}:m1.3"),
        pytest.param(0.5, 0.62, 20, 0.2, 0.495, id=f"{BALLAL}:m0.5-thin-lip"),
        pytest.param(1.0, 0.62, 20, 0.2, 0.776, id=f"{BALLAL}:m1.0-thin-lip"),
        pytest.param(1.0, 0.62, 50, 0.2, 0.646, id=f"{BALLAL}:m1.0-x50"),
        pytest.param(1.0, 0.62, 100, 0.2, 0.562, id=f"{BALLAL}:m1.0-x100"),
    ],
)
def test_boundary_layer_effectiveness(m, viscosity_ratio, slot_heights, lip_ratio, expected):
    value = effectiveness_boundary_layer(m, viscosity_ratio, slot_heights, lip_ratio)
    assert value == pytest.approx(expected, abs=6e-4)


@pytest.mark.parametrize(
    ("viscosity_ratio", "slot_heights", "lip_ratio", "expected"),
    [
        pytest.param(0.533, 20, 0.4, 0.768, id=f"{BALLAL}:x20"),
        pytest.param(0.62, 50, 0.2, 0.752, id=f"{BALLAL}:x50-thin-lip"),
        pytest.param(0.62, 100, 0.2, 0.654, id=f"{BALLAL}:x100-thin-lip"),
    ],
)
def test_wall_jet_effectiveness(viscosity_ratio, slot_heights, lip_ratio, expected):
    value = effectiveness_wall_jet(viscosity_ratio, slot_heights, lip_ratio)
    assert value == pytest.approx(expected, abs=6e-4)


@pytest.mark.parametrize(
    ("mixing", "expected"),
    [
        pytest.param(0.02, 0.852, id=f"{JUHASZ}:C0.02"),
        pytest.param(0.05, 0.698, id=f"{JUHASZ}:C0.05"),
        pytest.param(0.10, 0.536, id=f"{JUHASZ}:C0.10"),
        pytest.param(0.15, 0.435, id=f"{JUHASZ}:C0.15"),
    ],
)
def test_mixing_layer_effectiveness(mixing, expected):
    assert effectiveness_mixing(2.31, 20.0, mixing) == pytest.approx(expected, abs=6e-4)


def test_the_two_laws_meet_at_1_263():
    assert pytest.approx(1.263, abs=5e-4) == JOINT
    layer = effectiveness_boundary_layer(JOINT, 0.533, 30.0, 0.4)
    assert layer == pytest.approx(effectiveness_wall_jet(0.533, 30.0, 0.4))


@pytest.mark.parametrize("m", [0.5, 0.7, 0.9, 1.1, 1.2])
def test_joined_law_is_the_boundary_layer_law_in_its_range(m):
    joined = slot_film(m, 0.533, 30 * S, S, 0.4 * S).effectiveness
    assert joined == pytest.approx(effectiveness_boundary_layer(m, 0.533, 30.0, 0.4), rel=1e-12)


@pytest.mark.parametrize("m", [JOINT, 1.3, 1.5, 2.3, 4.0])
def test_joined_law_is_the_wall_jet_law_in_its_range(m):
    joined = slot_film(m, 0.533, 30 * S, S, 0.4 * S).effectiveness
    assert joined == pytest.approx(effectiveness_wall_jet(0.533, 30.0, 0.4), rel=0.005)


def test_convection_laws_step_at_1_3_and_the_joined_one_lies_between():
    """Film air at 750 K, 20 mm behind a 1.5 mm slot: 804 against 1513 W/m2/K, from memory."""
    flux = 1.3 * 209.0
    reynolds = flux * 0.020 / 3.56e-5
    layer = boundary_layer_coefficient(0.0548, 0.020, reynolds)
    jet = wall_jet_coefficient(0.0548, 0.020, reynolds, 0.020 / S)
    assert layer == pytest.approx(804.0, abs=0.5)
    assert jet == pytest.approx(1513.0, abs=0.5)
    joined = film_coefficient(1.3, 0.0548, flux, 3.56e-5, 0.020, S, 650.0)
    assert joined == pytest.approx(np.sqrt(layer * jet))


def test_neither_effectiveness_nor_convection_steps_with_blowing_ratio():
    ratios = np.linspace(0.01, 5.0, 4991)
    eta = np.array([slot_film(m, 0.533, 25 * S, S, 0.6e-3).effectiveness for m in ratios])
    h = np.array(
        [film_coefficient(m, 0.0548, 209.0 * m, 3.56e-5, 25 * S, S, 650.0) for m in ratios]
    )
    assert np.abs(np.diff(eta)).max() < 0.003
    assert np.abs(np.diff(h) / h[1:]).max() < 0.01


def test_vanishing_film_leaves_the_wall_as_it_was():
    film = slot_film(1e-9, 0.533, 5 * S, S, 0.6e-3)
    assert film.effectiveness < 1e-7
    assert film_coefficient(1e-9, 0.0548, 2e-7, 3.56e-5, 5 * S, S, 650.0) == pytest.approx(650.0)


def test_no_effect_upstream_and_full_effect_at_the_lip():
    film = slot_film(1.0, 0.533, np.array([-S, 0.0, 100 * S]), S, 0.6e-3)
    assert film.effectiveness[0] == 0.0
    assert film.effectiveness[1] == 1.0
    assert 0.0 < film.effectiveness[2] < 1.0


@pytest.mark.parametrize(
    ("rows", "expected"),
    [
        pytest.param(10, 0.566, id="Sellers-1963-from-memory:10-rows"),
        pytest.param(20, 0.811, id="Sellers-1963-from-memory:20-rows"),
    ],
)
def test_superposition(rows, expected):
    assert superpose(np.full(rows, 0.08)) == pytest.approx(expected, abs=6e-4)


@pytest.mark.parametrize(
    ("effectiveness", "slot_heights", "expected"),
    [
        pytest.param(0.8311, 13.33, 0.0152, id="derived:x-13.33"),
        pytest.param(0.7235, 26.67, 0.0143, id="derived:x-26.67"),
    ],
)
def test_mean_entrainment_of_the_published_wall_jet(effectiveness, slot_heights, expected):
    value = mean_entrainment_coefficient(effectiveness, slot_heights)
    assert value == pytest.approx(expected, abs=6e-5)


@pytest.mark.parametrize("m", [0.2, 0.4, 0.9, 2.3])
def test_entrained_gas_adds_up_to_film_flow_over_effectiveness(m):
    x = np.linspace(0.0, 120 * S, 400001)
    film = slot_film(m, 0.533, x, S, 0.6e-3)
    rate = entrainment_rate(0.5, film)
    entrained = np.trapezoid(rate, x)
    assert rate.min() >= 0.0
    assert entrained == pytest.approx(0.5 * (1.0 / film.effectiveness[-1] - 1.0), rel=1e-4)


def test_regime_names():
    assert [regime_of(m) for m in (0.3, 0.9, 2.0)] == ["mixing layer", "boundary layer", "wall jet"]


@given(m=st.floats(0.05, 4.0), lip=st.floats(0.2, 1.0), ratio=st.floats(0.4, 1.0))
@settings(max_examples=60, derandomize=True, deadline=None)
def test_effectiveness_is_a_fraction_that_only_decays(m, lip, ratio):
    x = np.linspace(0.0, 0.2, 200)
    film = slot_film(m, ratio, x, S, lip * S)
    assert film.effectiveness.max() <= 1.0
    assert film.effectiveness.min() > 0.0
    assert np.all(np.diff(film.effectiveness) <= 0.0)
    assert np.all(film.slope <= 0.0)
