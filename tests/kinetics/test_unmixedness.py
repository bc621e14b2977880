"""The distribution over streams: what it keeps, and what it does to NOx."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.interpolate import PchipInterpolator

from combustor.base.errors import InputError
from combustor.kinetics.stirred import stirred
from combustor.kinetics.unmixedness import beta_streams

PRESSURE = 20e5
SOURCE = "computed, GRI-3.0, dry air, 700 K, 20 bar, 5 ms, normal distribution"
NODES = np.array(
    [0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6, 0.65, 0.7, 0.75, 0.8, 0.9, 1.0, 1.1, 1.2, 1.4]
)

# width, then EI NOx [g/kg] at mean equivalence ratio 0.45, 0.50, 0.90
TABLE = [
    (0.00, 0.093, 0.238, 84.5),
    (0.05, 0.104, 0.275, 77.5),
    (0.10, 0.146, 0.426, 65.6),
    (0.15, 0.260, 0.844, 54.5),
    (0.20, 0.556, 1.821, 46.0),
    (0.30, 2.51, 6.29, 36.0),
]
MEANS = (0.45, 0.50, 0.90)
CASES = [
    pytest.param(row[0], mean, value, id=f"{SOURCE}, width {row[0]}, mean {mean}")
    for row in TABLE
    for mean, value in zip(MEANS, row[1:], strict=True)
]


@pytest.fixture(scope="module")
def emission_index(mixtures):
    """EI NOx [g/kg] of a stirred reactor over equivalence ratio, interpolated in its logarithm."""
    values = []
    for equivalence_ratio in NODES:
        fractions, share = mixtures.of(float(equivalence_ratio))
        enthalpy = mixtures.gas.enthalpy(700.0, PRESSURE, fractions)
        result = stirred(mixtures.gas, PRESSURE, enthalpy, fractions, 5e-3)
        values.append(max(1000.0 * mixtures.nox(result.state.mass_fractions) / share, 1e-12))
    curve = PchipInterpolator(NODES, np.log(values))
    return lambda equivalence_ratio: np.exp(curve(equivalence_ratio))


def by_normal_grid(emission_index, mean, width):
    """The table's own way: normal over 2001 points, clipped, weighted by fuel."""
    if width == 0.0:
        return float(emission_index(mean))
    grid = np.linspace(mean * (1.0 - 4.0 * width), mean * (1.0 + 4.0 * width), 2001)
    grid = grid[(grid >= 0.25) & (grid <= 1.4)]
    weight = np.exp(-0.5 * ((grid / mean - 1.0) / width) ** 2) * grid
    return float(np.sum(weight * emission_index(grid)) / np.sum(weight))


def by_streams(emission_index, mixtures, mean, width):
    """The product's way: few streams of a beta distribution of mixture fraction."""
    ratio = mean * mixtures.stoichiometric
    streams = beta_streams(ratio / (1.0 + ratio), width, 9)
    fuel = streams.mixture_fractions
    ratios = fuel / (1.0 - fuel) / mixtures.stoichiometric
    inside = np.clip(ratios, NODES[0], NODES[-1])
    weight = streams.shares * fuel
    return float(np.sum(weight * emission_index(inside)) / np.sum(weight))


@pytest.mark.parametrize(("width", "mean", "value"), CASES)
def test_unmixedness_table(emission_index, width, mean, value):
    assert by_normal_grid(emission_index, mean, width) == pytest.approx(value, rel=0.03)


@pytest.mark.parametrize(("width", "mean", "value"), CASES)
def test_streams_against_the_table(emission_index, mixtures, width, mean, value):
    found = by_streams(emission_index, mixtures, mean, width)
    if width <= 0.10:
        assert found == pytest.approx(value, rel=0.12)
    else:
        mixed = float(emission_index(mean))
        assert (found > mixed) == (value > mixed)


@given(mean=st.floats(0.002, 0.3), width=st.floats(0.001, 1.2), count=st.integers(2, 40))
@settings(max_examples=60, derandomize=True, deadline=None)
def test_mean_fuel_mean_air_and_width_are_kept(mean, width, count):
    streams = beta_streams(mean, width, count)
    assert streams.shares.sum() == pytest.approx(1.0, rel=1e-12)
    assert streams.mean == pytest.approx(mean, rel=1e-11)
    assert np.all(streams.shares > 0.0)
    assert np.all(np.diff(streams.mixture_fractions) > 0.0)
    assert streams.mixture_fractions[0] > 0.0
    assert streams.mixture_fractions[-1] < 1.0
    assert streams.unmixedness == pytest.approx(width, rel=1e-9)


def test_a_width_so_large_that_a_stream_would_lose_its_fuel_is_reported_smaller():
    streams = beta_streams(0.3, 1.5, 3)
    assert streams.mixture_fractions[0] > 0.0
    assert 1.4 < streams.unmixedness < 1.5


def test_many_streams_have_the_moments_of_the_beta_distribution():
    mean, width = 0.03, 0.3
    total = (1.0 - mean) / (mean * width**2) - 1.0
    first, second = mean * total, (1.0 - mean) * total
    # computed: mean 0.03 and width 0.3 are the beta distribution of 10.75 and 347.5
    assert first == pytest.approx(10.75, abs=0.005)
    assert second == pytest.approx(347.5, abs=0.05)
    streams = beta_streams(mean, width, 400)
    skewness = streams.shares @ (streams.mixture_fractions / mean - 1.0) ** 3 / width**3
    exact = 2.0 * (second - first) * np.sqrt(total + 1.0)
    exact /= (total + 2.0) * np.sqrt(first * second)
    assert skewness == pytest.approx(exact, rel=0.02)


def test_no_width_is_one_stream():
    streams = beta_streams(0.05, 0.0, 9)
    assert streams.mixture_fractions.tolist() == [0.05]
    assert streams.unmixedness == 0.0


@pytest.mark.parametrize(
    ("mean", "width", "count"),
    [(0.0, 0.1, 9), (1.0, 0.1, 9), (0.05, -0.1, 9), (0.05, 4.5, 9), (0.05, float("nan"), 9),
     (float("nan"), 0.1, 9), (0.05, 0.1, 1)],
)  # fmt: skip
def test_what_cannot_be_is_refused(mean, width, count):
    with pytest.raises(InputError):
        beta_streams(mean, width, count)
