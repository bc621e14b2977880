"""Discharge, jets, friction, diffusers against their check values."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.airflow import annulus, diffuser, discharge, exit, friction, jets
from combustor.airflow.methods import METHODS

KADDAH = [
    (2, 0.2, 0.4051, 0.5348, 53.6),
    (3, 0.1, 0.4983, 0.6578, 63.2),
    (4, 0.2, 0.5249, 0.6929, 66.4),
    (6, 0.1, 0.5651, 0.7459, 72.0),
    (10, 0.1, 0.5897, 0.7785, 76.3),
    (50, 0.1, 0.6181, 0.8159, 84.0),
]


@pytest.mark.parametrize(
    ("head_ratio", "bleed_ratio", "plain", "plunged", "angle"),
    [pytest.param(*r, id=f"Kaddah-1964-from-memory-K{r[0]}-a{r[1]}") for r in KADDAH],
)
def test_discharge_coefficient_and_jet_angle(head_ratio, bleed_ratio, plain, plunged, angle):
    found = discharge.discharge_coefficient_crossflow(head_ratio, bleed_ratio)
    assert found == pytest.approx(plain, abs=5e-5)
    assert discharge.discharge_coefficient_crossflow(
        head_ratio, bleed_ratio, discharge.PLUNGED_LIMIT
    ) == pytest.approx(plunged, abs=5e-5)
    assert math.degrees(discharge.jet_angle(found)) == pytest.approx(angle, abs=0.05)


def test_discharge_limits_at_rest_are_0_625_and_0_825_from_memory():
    for limit in (0.625, 0.825):
        found = discharge.discharge_coefficient_crossflow(math.inf, 0.3, limit)
        assert found == pytest.approx(limit, rel=1e-12)


def test_no_flow_at_or_below_the_annulus_static_pressure():
    assert discharge.discharge_coefficient_crossflow(1.0, 0.1) == 0.0
    assert discharge.discharge_coefficient_crossflow(0.4, 0.1) == 0.0


def test_velocity_triangle_sibling_lies_13_degrees_lower_at_k_2():
    found = discharge.discharge_coefficient_crossflow(2.0, 0.2)
    gap = discharge.jet_angle(found) - discharge.jet_angle_triangle(found)
    assert math.degrees(gap) == pytest.approx(13.2, abs=0.05)
    assert discharge.jet_angle(0.625) == pytest.approx(discharge.jet_angle_triangle(0.625))


@pytest.mark.parametrize("head_ratio", [1.2, 2.0, 5.0, 30.0])
def test_sibling_is_the_velocity_triangle_at_no_bleed(head_ratio):
    # derived: speed along the hole sqrt(K - 1), along the annulus 1, of a jet of head K
    found = discharge.discharge_coefficient_crossflow(head_ratio, 0.0)
    triangle = math.atan(math.sqrt(head_ratio - 1.0))
    assert discharge.jet_angle_triangle(found) == pytest.approx(triangle, rel=1e-9)


@given(low=st.floats(1.01, 40.0), step=st.floats(0.01, 10.0), bleed=st.floats(0.01, 1.0))
@settings(max_examples=60, derandomize=True)
def test_discharge_grows_with_head_ratio(low, step, bleed):
    below = discharge.discharge_coefficient_crossflow(low, bleed)
    above = discharge.discharge_coefficient_crossflow(low + step, bleed)
    # Near K = 1 with much bleed the form is not monotone above its own limit.
    assert above > below or below > 0.6


def test_swirler_equation_knight_walker_from_memory_0_03876():
    # K 1.3, 45 deg, dP/q_ref 14, share 0.09, liner area ratio 0.7
    reference_area, density, velocity = 1.0, 5.0, 20.0
    head = 0.5 * density * velocity**2
    total_flow = density * velocity * reference_area
    flow = discharge.swirler_flow(0.03876, math.radians(45), 1.3, 0.7, density, 14 * head)
    assert flow / total_flow == pytest.approx(0.0900, abs=5e-5)


def test_swirler_effective_area_is_the_same_equation_between_total_and_liner_static():
    area, angle, loss, liner_area, density = 0.006, math.radians(45), 1.3, 0.08, 5.5
    difference = 30e3
    flow = discharge.swirler_flow(area, angle, loss, liner_area, density, difference)
    # the published difference is to the total of the swirler's own flow in the liner
    to_static = difference + 0.5 * (flow / liner_area) ** 2 / density
    effective = discharge.swirler_effective_area(area, angle, loss, liner_area)
    assert effective * math.sqrt(2 * density * to_static) == pytest.approx(flow, rel=1e-12)


@pytest.mark.parametrize(
    ("loss", "coefficient"),
    [
        pytest.param(1.3, 0.877, id="derived-flat-vanes"),
        pytest.param(1.15, 0.933, id="derived-curved-vanes"),
    ],
)
def test_swirler_coefficient_on_its_throat_in_a_wide_liner(loss, coefficient):
    throat = 0.001 * math.cos(math.radians(45))
    effective = discharge.swirler_effective_area(0.001, math.radians(45), loss, 1e3)
    assert effective / throat == pytest.approx(coefficient, abs=5e-4)


@pytest.mark.parametrize(
    ("reynolds", "roughness", "factor"),
    [
        pytest.param(4e5, 0.0, 0.01360, id="Haaland-1983-from-memory-smooth"),
        pytest.param(4e5, 0.005, 0.03065, id="Haaland-1983-from-memory-rough"),
    ],
)
def test_friction_factor(reynolds, roughness, factor):
    found = friction.friction_factor_haaland(reynolds, roughness)
    assert found == pytest.approx(factor, abs=5e-6)


def colebrook_white(reynolds, roughness):
    factor = 0.02
    for _ in range(60):
        root = math.sqrt(factor)
        factor = (-2 * math.log10(roughness / 3.7 + 2.51 / (reynolds * root))) ** -2
    return factor


@given(reynolds=st.floats(1e4, 1e7), roughness=st.floats(0.0, 0.03))
@settings(max_examples=60, derandomize=True)
def test_friction_factor_agrees_with_its_sibling_colebrook_white(reynolds, roughness):
    found = friction.friction_factor_haaland(reynolds, roughness)
    assert found == pytest.approx(colebrook_white(reynolds, roughness), rel=0.025)


def test_annulus_friction_derived_1213_pa():
    # L/Dh 6.67, q 13378 Pa (60 m/s at 7.432 kg/m3), smooth
    loss = friction.friction_factor_haaland(4e5, 0.0) * 6.67 * 13378
    assert loss == pytest.approx(1213, abs=1.5)


@pytest.mark.parametrize(
    ("factor", "rise"),
    [
        pytest.param(0.5, 7432, id="derived-Bernoulli"),
        pytest.param(1.0, 14864, id="derived-momentum-bound"),
    ],
)
def test_static_rise_by_extraction_from_60_to_40_m_s(factor, rise):
    assert annulus.recovery(7.432, 60.0, 40.0, factor) == pytest.approx(rise, abs=0.5)


@pytest.mark.parametrize(
    ("area_ratio", "recovery"),
    [
        pytest.param(a, r, id=f"derived-AR{a}")
        for a, r in [(1.4, 0.4898), (1.6, 0.6094), (2.0, 0.75), (2.5, 0.84)]
    ],
)
def test_ideal_recovery(area_ratio, recovery):
    assert diffuser.ideal_recovery(area_ratio) == pytest.approx(recovery, abs=5e-5)


def test_dump_diffuser_derived_0_404():
    assert diffuser.loss_coefficient(1.6, 0.85) == pytest.approx(0.0914, abs=5e-5)
    assert diffuser.dump_loss_coefficient(1.6, 0.85, 0.8) == pytest.approx(0.404, abs=5e-4)


def test_borda_carnot_derived_0_360():
    assert diffuser.borda_carnot(0.4) == pytest.approx(0.360, abs=5e-4)


@pytest.mark.parametrize(
    ("length_ratio", "degrees"),
    [
        pytest.param(n, a, id=f"fit-to-Reneau-1967-from-memory-N/W{n}")
        for n, a in [(3, 19.1), (6, 13.5), (10, 10.4), (20, 7.4)]
    ],
)
def test_stall_line(length_ratio, degrees):
    assert math.degrees(diffuser.stall_angle(length_ratio)) == pytest.approx(degrees, abs=0.05)


def test_diffuser_angle_for_area_ratio_1_6_derived_11_42():
    angle = diffuser.plane_included_angle(3.0, 1.6)
    assert math.degrees(angle) == pytest.approx(11.42, abs=0.005)
    assert diffuser.plane_area_ratio(3.0, angle) == pytest.approx(1.6, rel=1e-12)
    assert diffuser.conical_area_ratio(3.0, 0.0) == 1.0


def test_penetration_and_trajectory_norster_from_memory():
    assert jets.penetration_single(1.0, 36.0, math.pi / 2) == pytest.approx(6.90, abs=5e-3)
    assert jets.trajectory(1.0, 36.0, 2.8) == pytest.approx(6.91, abs=5e-3)
    assert jets.trajectory(1.0, 36.0, 4.0) == pytest.approx(7.77, abs=6e-3)


def test_row_penetration_without_jets_is_the_row_constant_and_falls_with_blockage():
    assert jets.penetration_row(1.0, 36.0, 5.0, 0.0) == pytest.approx(7.5)
    assert jets.penetration_row(1.0, 36.0, 5.0, 5.0) == pytest.approx(3.75)


def test_momentum_flux_ratio_of_the_compact_annular_derived_5_49():
    gas_density = 1.6e6 / (287.05 * 1900)
    ratio = jets.momentum_flux_ratio(7.432, 113.7, gas_density, 77.2)
    assert ratio == pytest.approx(5.49, abs=0.01)
    depth = 1.15 * math.sqrt(ratio) * 13.73
    assert jets.penetration_single(13.73, ratio, math.pi / 2) == pytest.approx(depth)
    assert depth == pytest.approx(37.0, abs=0.05)


def test_hole_count_constant_derived_15_254():
    found = jets.holes_times_diameter_squared(5.0, 1.6e6, 750.0, 48e3)
    assert found == pytest.approx(0.007537, abs=5e-7)
    constant = found / 5.0 * math.sqrt(1.6e6 * 48e3 / 750.0)
    assert constant == pytest.approx(15.254, abs=5e-4)
    assert jets.jet_diameter(17.72, 0.6) == pytest.approx(13.73, abs=0.005)


def test_entrainment_length_ricou_spalding_from_memory():
    # m/m0 = 0.32 s/d at equal density: a jet has doubled its mass after 6.25 diameters
    assert jets.entrainment_length(1.0, 1.0, 1.0, 1.0) == pytest.approx(6.25)
    assert jets.entrainment_length(1.0, 1.0, 0.25, 1.0) == pytest.approx(12.5)


def test_low_mach_hot_loss_is_within_3_percent_of_rayleigh_to_mach_0_1():
    from combustor.gasdynamics import pressure_ratio, rayleigh

    for mach in (0.02, 0.05, 0.1):
        head = 0.5 * 1.33 * mach**2 / pressure_ratio(mach, 1.33)
        exact = 1 - rayleigh(mach, 2.2, 1.33)[1]
        assert exit.hot_loss_low_mach(head, 2.2) == pytest.approx(exact, rel=0.03)


def test_every_method_says_where_it_was_read_and_keys_are_unique():
    keys = [method.key for method in METHODS]
    assert len(keys) == len(set(keys))
    for method in METHODS:
        assert method.source and method.reading


def test_out_of_validity_is_reported():
    notices = discharge.CROSSFLOW_DISCHARGE.notices("row", head_ratio=0.8)
    assert len(notices) == 1
    assert "row" in str(notices[0])
