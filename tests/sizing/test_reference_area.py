"""Reference area: pressure-loss sizing, chemical loading, and the larger of the two."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.sizing.reference_area import (
    PRESSURE_LOSS_FACTOR,
    REQUIRED_LOADING,
    LoadingPoint,
    chemical_loading,
    corrected_loss,
    governing_loading,
    loading_area,
    pressure_loss_area,
    temperature_scale_kelvin,
)
from combustor.sizing.section import Section

R = 287.05
LEFEBVRE_TABLE = "lefebvre-1983-via-melconian-modak-1985-from-memory"


@pytest.mark.parametrize(
    ("layout", "published_loss", "corrected_flow", "computed_loss"),
    [
        pytest.param("can", 0.07, 0.0036, 0.0688, id=f"{LEFEBVRE_TABLE}-tubular"),
        pytest.param("can-annular", 0.06, 0.0039, 0.0611, id=f"{LEFEBVRE_TABLE}-tubo-annular"),
        pytest.param("annular", 0.06, 0.0046, 0.0607, id=f"{LEFEBVRE_TABLE}-annular"),
    ],
)
def test_published_columns_agree(layout, published_loss, corrected_flow, computed_loss):
    # with area and pressure 1 the flow at 1 K is the corrected flow itself
    loss = PRESSURE_LOSS_FACTOR[layout] * corrected_loss(corrected_flow, 1.0, 1.0, 1.0, 287.0)
    assert loss == pytest.approx(computed_loss, abs=5e-5)
    assert loss == pytest.approx(published_loss, rel=0.02)


def test_pressure_loss_area_of_an_annular_point():
    """Identity by hand: sqrt(143.525 (20 sqrt(750)/1.6e6)^2 20/0.05), derived."""
    area = pressure_loss_area(20.0, 750.0, 1.6e6, 0.05, 20.0, R)
    assert area == pytest.approx(0.08202, abs=5e-6)
    ring = Section(mean_diameter=0.50)
    assert ring.height(area) == pytest.approx(0.0522, abs=5e-5)


@pytest.mark.parametrize(
    ("air_flow", "temperature", "pressure", "expected"),
    [
        pytest.param(20.0, 750.0, 1.6e6, 392.8e6, id="by-hand-derived-design"),
        pytest.param(5.0, 450.0, 350e3, 40.4e6, id="by-hand-derived-idle"),
        pytest.param(1.2, 260.0, 45e3, 2.47e6, id="by-hand-derived-windmill"),
    ],
)
def test_chemical_loading(air_flow, temperature, pressure, expected):
    value = chemical_loading(pressure, 0.082023, 0.052217, temperature, air_flow)
    assert value == pytest.approx(expected, rel=2e-3)


def test_loading_rises_by_e_over_one_temperature_scale():
    hot = chemical_loading(1e6, 0.1, 0.3, 750.0, 1.0)
    cold = chemical_loading(1e6, 0.1, 0.3, 450.0, 1.0)
    assert hot / cold == pytest.approx(math.e)


def test_small_can_is_governed_by_pressure_loss():
    """2 kg/s, 600 kPa, 480 K: 0.1195 m by loading, 0.1663 m by loss 6 % at 37, derived."""
    section = Section()
    point = LoadingPoint("x", "rated", 2.0, 600e3, 480.0)
    by_loading = loading_area(point, section)
    by_loss = pressure_loss_area(2.0, 480.0, 600e3, 0.06, 37.0, 287.0)
    assert section.height(by_loading) == pytest.approx(0.1195, abs=1e-4)
    assert section.height(by_loss) == pytest.approx(0.1663, abs=1e-4)


@pytest.mark.parametrize(
    ("equivalence_ratio", "kelvin"),
    [
        (0.6, 185.4),
        (0.8, 246.5),
        (1.0, 293.8),
        (1.03, 300.1),
        (1.2, 267.7),
        (1.4, 235.0),
    ],
    ids=lambda value: f"melconian-modak-1985-from-memory-{value}",
)
def test_temperature_scale_is_in_kelvin(equivalence_ratio, kelvin):
    assert temperature_scale_kelvin(equivalence_ratio) == pytest.approx(kelvin, abs=0.1)


def test_the_design_form_gives_540_degrees_rankine():
    assert temperature_scale_kelvin(1.03) * 1.8 == pytest.approx(540.2, abs=0.1)


@settings(derandomize=True, max_examples=40)
@given(
    kind=st.sampled_from(sorted(REQUIRED_LOADING)),
    air_flow=st.floats(0.1, 100.0),
    pressure=st.floats(5e4, 4e6),
    temperature=st.floats(230.0, 950.0),
    mean_diameter=st.one_of(st.none(), st.floats(0.2, 1.5)),
)
def test_loading_area_gives_the_loading_asked(kind, air_flow, pressure, temperature, mean_diameter):
    section = Section(mean_diameter=mean_diameter)
    point = LoadingPoint("x", kind, air_flow, pressure, temperature)
    area = loading_area(point, section)
    reached = chemical_loading(pressure, area, section.height(area), temperature, air_flow)
    assert reached == pytest.approx(REQUIRED_LOADING[kind], rel=1e-9)


def test_a_relight_point_is_asked_for_less():
    relight = LoadingPoint("relight", "relight", 1.2, 45e3, 260.0)
    idle = LoadingPoint("relight", "idle", 1.2, 45e3, 260.0)
    section = Section()
    assert loading_area(relight, section) < 0.2 * loading_area(idle, section)


def test_governing_point_does_not_depend_on_order():
    points = [
        LoadingPoint("full", "rated", 20.0, 1.6e6, 750.0),
        LoadingPoint("idle", "idle", 5.0, 350e3, 450.0),
        LoadingPoint("high", "relight", 1.2, 45e3, 260.0),
    ]
    section = Section(mean_diameter=0.5)
    forward = governing_loading(points, section)
    assert forward == governing_loading(points[::-1], section)
    assert forward is not None and forward[0].name == "idle"
    assert governing_loading([], section) is None
