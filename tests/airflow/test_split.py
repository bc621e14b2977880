"""Limits, balances and behaviour of the solved split."""

import math
from dataclasses import replace

import metal_samples as metal
import numpy as np
import pytest
from metal_samples import row, swirler, with_opening

from combustor import gasdynamics
from combustor.airflow.methods import methods_used
from combustor.airflow.split import AnnulusHeat, Inlet, LinerGas, split, split_for_loss
from combustor.base.errors import InfeasibleError, InputError
from combustor.hardware.metal import AxialProfile

MACHINES = {
    f"{name}-{flow}-{'fired' if fuel else 'cold'}": (make, inlet, flow, fuel)
    for name, make, inlet, fired in (
        ("can", metal.can, metal.can_inlet, 0.245),
        ("annular", metal.annular, metal.annular_inlet, 0.50),
    )
    for flow in ("straight", "reverse")
    for fuel in (None, fired)
}


@pytest.fixture(params=MACHINES.values(), ids=MACHINES.keys())
def machine(request):
    make, inlet, flow, fuel = request.param
    hardware = make(flow)
    gas = None if fuel is None else metal.fire(hardware, fuel)
    return hardware, inlet(), gas


def scaled(hardware, roles, factor):
    """Area of the named roles times ``factor``."""
    rows = tuple(
        replace(o, area=o.area * factor, diameter=o.diameter and o.diameter * math.sqrt(factor))
        if o.role in roles
        else o
        for o in hardware.openings
    )
    return replace(hardware, openings=rows)


def wide(hardware, factor):
    """Annuli ``factor`` times as wide."""
    annuli = tuple(
        replace(p, area=AxialProfile(p.area.station, tuple(a * factor for a in p.area.value)))
        for p in hardware.annuli
    )
    return replace(hardware, annuli=annuli)


def dome_flow(result):
    return sum(o.mass_flow for o in result.openings if o.side == "dome")


# --- balances -------------------------------------------------------------------------------


def test_openings_pass_the_inlet_air_and_parts_sum_to_the_loss(machine):
    hardware, inlet, gas = machine
    result = split(hardware, inlet, gas)
    assert result.convergence.converged
    assert result.imbalance <= 1e-9
    assert result.flow() == pytest.approx(inlet.mass_flow, rel=1e-9)
    parts = result.pressure_loss_parts
    assert set(parts) == {"diffuser", "liner", "hot"}
    assert sum(parts.values()) == pytest.approx(result.pressure_loss, rel=1e-12)
    assert result.exit_pressure == pytest.approx(inlet.pressure * (1 - result.pressure_loss))
    assert [o.name for o in result.openings] == [o.name for o in hardware.openings]
    fuel = 0.0 if gas is None else gas.fuel_flow
    assert result.liner.mass_flow[-1] == pytest.approx(inlet.mass_flow + fuel, rel=1e-9)


def test_every_row_obeys_the_orifice_on_its_own_pressures(machine):
    hardware, inlet, gas = machine
    for opening in split(hardware, inlet, gas).openings:
        flux = gasdynamics.orifice_flux(
            opening.driving_pressure,
            opening.air_temperature,
            opening.liner_pressure,
            inlet.gas_constant,
            inlet.heat_capacity_ratio,
        )
        assert opening.mass_flow == pytest.approx(opening.effective_area * flux, rel=1e-12)


def test_annulus_air_is_what_its_rows_draw(machine):
    hardware, inlet, gas = machine
    result = split(hardware, inlet, gas)
    for side in result.annuli:
        drawn = sum(o.mass_flow for o in result.openings if o.side == side.side)
        ends = sorted((float(side.mass_flow[0]), float(side.mass_flow[-1])))
        assert ends[1] - ends[0] == pytest.approx(drawn, rel=1e-9)
        assert np.all(np.diff(side.station) >= 0)


def test_reverse_flow_feeds_the_dome_from_the_annuli_and_straight_flow_from_the_dump():
    for make, inlet in ((metal.can, metal.can_inlet()), (metal.annular, metal.annular_inlet())):
        straight, reverse = split(make("straight"), inlet), split(make("reverse"), inlet)
        assert straight.dome_pressure == straight.dump_pressure
        assert reverse.dome_pressure < reverse.dump_pressure
        at_dome = sum(float(side.mass_flow[0]) for side in reverse.annuli)
        assert at_dome == pytest.approx(dome_flow(reverse), rel=1e-9)


def test_liner_momentum_closes_over_its_length_with_every_jet():
    # derived: constant area, p A + m U at the end less p A at the head is what the jets bring
    hardware, inlet = metal.can(), metal.can_inlet()
    gas = metal.fire(hardware, 0.245)
    result = split(hardware, inlet, gas)
    area = float(hardware.liner.area.at(0.0))
    brought = sum(o.mass_flow * o.jet_velocity * math.cos(o.jet_angle) for o in result.openings)
    liner = result.liner
    gained = (liner.static_pressure[-1] - liner.static_pressure[0]) * area
    gained += liner.mass_flow[-1] * liner.velocity[-1]
    assert gained == pytest.approx(brought, rel=1e-8)


def test_liner_gas_obeys_continuity_and_the_gas_law():
    hardware, inlet = metal.annular(), metal.annular_inlet()
    liner = split(hardware, inlet, metal.fire(hardware, 0.5)).liner
    area = hardware.liner.area.at(liner.station)
    assert liner.density * liner.velocity * area == pytest.approx(liner.mass_flow, rel=1e-12)


@pytest.mark.parametrize("flow", ["straight", "reverse"])
def test_heat_given_to_the_annuli_comes_into_the_liner(flow):
    hardware, inlet = metal.annular(flow), metal.annular_inlet()
    x = np.linspace(0.0, 0.25, 11)  # reaches past the last rows and the liner's end
    heats = (
        AnnulusHeat("outer", x, 8e5 * (1 + 2 * x)),
        AnnulusHeat("inner", x, np.full(11, 5e5)),
    )
    result = split(hardware, inlet, annulus_heat=heats)
    given = sum(float(np.trapezoid(heat.heat_rate, heat.station)) for heat in heats)
    carried = sum(o.mass_flow * (o.air_temperature - inlet.temperature) for o in result.openings)
    assert carried * inlet.heat_capacity == pytest.approx(given, rel=1e-9)
    assert result.liner.temperature[-1] == pytest.approx(
        inlet.temperature + given / (inlet.mass_flow * inlet.heat_capacity), rel=1e-9
    )


# --- limits ---------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("make", "inlet"),
    [(metal.can, metal.can_inlet), (metal.annular, metal.annular_inlet)],
    ids=["can", "annular"],
)
@pytest.mark.parametrize("flow", ["straight", "reverse"])
def test_halving_corrected_flow_in_cold_flow(make, inlet, flow):
    hardware = make(flow)
    for loss, ratio, tolerance in ((0.01, 4.0, 0.08), (0.02, 4.0, 0.08), (0.05, 4.17, 0.05)):
        full = split_for_loss(hardware, inlet(), loss)
        half = split(hardware, replace(inlet(), mass_flow=0.5 * full.flow()))
        assert full.pressure_loss == pytest.approx(loss, rel=1e-9)
        assert full.pressure_loss / half.pressure_loss == pytest.approx(ratio, abs=tolerance)


def test_loss_depends_on_corrected_flow_alone_without_friction():
    # fixed metal: only W sqrt(T) / P counts but for the friction factor's Reynolds number
    hardware = metal.can()
    one = split(hardware, Inlet(14.2, 9.9e5, 600.0, 287.05, 1.38))
    other = split(hardware, Inlet(7.1, 9.9e5 * math.sqrt(2) / 2, 1200.0, 287.05, 1.38))
    assert other.pressure_loss == pytest.approx(one.pressure_loss, rel=2e-3)


def ideal_openings():
    """A dome of 24 %, a dilution row of 40 %, others: constant Cd, annulus nearly at rest."""
    rows = [
        replace(row("dome air", "dome", 0.0, 1, 0.1, side="dome", edge="orifice"), area=24e-4),
        replace(row("primaries", "primary", 0.2, 8, 0.02), area=36e-4 / 8),
        replace(row("dilution", "dilution", 0.5, 8, 0.02), area=40e-4 / 8),
    ]
    rows = [replace(o, discharge_coefficient=0.7) for o in rows]
    hardware = wide(metal.can(openings=rows), 40.0)
    huge = AxialProfile.constant(40 * float(hardware.liner.area.at(0)))
    diffuser = replace(hardware.diffuser, loss_coefficient=0.0)
    liner = replace(hardware.liner, area=huge)
    return replace(hardware, liner=liner, diffuser=diffuser, exit_area=0.5)


def test_ten_percent_more_dilution_area_with_ideal_openings_computed():
    # computed: at fixed flow 40 -> 42.3 %, loss -7.5 %, dome -3.8 %
    hardware = ideal_openings()
    inlet = Inlet(1.0, 9.9e5, 600.0)  # little flow: incompressible
    before, after = split(hardware, inlet), split(scaled(hardware, {"dilution"}, 1.1), inlet)
    assert before.flow("dilution") == pytest.approx(0.40, abs=5e-4)
    assert after.flow("dilution") == pytest.approx(0.423, abs=5e-4)
    assert dome_flow(after) / dome_flow(before) - 1 == pytest.approx(-0.038, abs=7e-4)
    assert after.pressure_loss / before.pressure_loss - 1 == pytest.approx(-0.075, abs=7e-4)


def test_five_percent_in_every_discharge_coefficient_computed():
    # computed: -5 / +5 % in every Cd is +10.8 / -9.3 % in loss at fixed flow
    hardware, inlet = ideal_openings(), Inlet(1.0, 9.9e5, 600.0)
    roles = {"dome", "primary", "dilution"}
    base = split(hardware, inlet).pressure_loss
    low = split(scaled(hardware, roles, 0.95), inlet).pressure_loss
    high = split(scaled(hardware, roles, 1.05), inlet).pressure_loss
    assert low / base - 1 == pytest.approx(0.108, abs=7e-4)
    assert high / base - 1 == pytest.approx(-0.093, abs=7e-4)


@pytest.mark.parametrize("fuel", [None, 0.245], ids=["cold", "fired"])
def test_ten_percent_more_dilution_area_takes_its_share_from_the_dome(fuel):
    # heads of all rows above eight annulus heads; with faster annuli the wall holes, not the
    # dome, give more of it
    hardware, inlet = wide(metal.can(), 1.25), metal.can_inlet()
    gas = None if fuel is None else metal.fire(hardware, fuel)
    before = split(hardware, inlet, gas)
    after = split(scaled(hardware, {"dilution"}, 1.1), inlet, gas)
    assert min(o.head_ratio for o in before.openings) > 8
    taken = 1 - dome_flow(after) / dome_flow(before)
    assert 0.08 <= taken / (before.flow("dilution") / inlet.mass_flow) <= 0.10
    assert after.pressure_loss < before.pressure_loss


def test_hot_part_is_the_exact_rayleigh_loss_in_a_plain_duct():
    # one opening at the head, air heated in a duct of constant area, same gas throughout
    opening = replace(
        row("port", "dome", 0.0, 1, 0.1, side="dome", edge="orifice"), discharge_coefficient=0.8
    )
    hardware = metal.can(openings=[opening])
    inlet = Inlet(8.0, 9.9e5, 600.0, 287.05, 1.33)
    x = np.linspace(0, 0.9, 10)
    heated = LinerGas(
        x,
        600.0 * (1 + 1.2 * np.clip((x - 0.1) / 0.5, 0, 1)),
        np.full(10, 287.05),
        np.full(10, 1.33),
    )
    result = split(hardware, inlet, heated)
    node = 1  # just behind the opening
    liner = result.liner
    mach = liner.velocity[node] / gasdynamics.speed_of_sound(
        liner.static_pressure[node] / (liner.density[node] * 287.05), 287.05, 1.33
    )
    total = liner.static_pressure[node] * gasdynamics.pressure_ratio(mach, 1.33)
    loss = (1 - gasdynamics.rayleigh(mach, 2.2, 1.33)[1]) * total
    assert result.pressure_loss_parts["hot"] * inlet.pressure == pytest.approx(loss, rel=1e-6)


def test_cold_flow_has_no_hot_part_and_the_fire_costs_some():
    hardware, inlet = metal.can(), metal.can_inlet()
    assert split(hardware, inlet).pressure_loss_parts["hot"] == 0.0
    parts = split(hardware, inlet, metal.fire(hardware, 0.245)).pressure_loss_parts
    assert 0.001 < parts["hot"] < 0.01


def test_diffuser_part_is_its_coefficient_times_the_compressible_head():
    hardware, inlet = metal.annular(), metal.annular_inlet()
    result = split(hardware, inlet)
    assert result.dump_pressure == pytest.approx(
        inlet.pressure * (1 - result.pressure_loss_parts["diffuser"])
    )
    static = inlet.pressure
    for _ in range(60):  # static pressure at the inlet by substitution
        cold = inlet.temperature * (static / inlet.pressure) ** (0.38 / 1.38)
        speed = inlet.mass_flow * inlet.gas_constant * cold / (static * 0.0210)
        kinetic = speed**2 / (2 * inlet.heat_capacity)
        static = inlet.pressure * (1 - kinetic / inlet.temperature) ** (1.38 / 0.38)
    head = 1 - static / inlet.pressure
    assert result.pressure_loss_parts["diffuser"] == pytest.approx(0.35 * head, rel=1e-9)


def test_total_pressure_survives_the_bleed_and_static_rises_by_bernoulli():
    hardware, inlet = metal.can(), metal.can_inlet()
    side = split(hardware, inlet).annuli[0]
    for at in np.flatnonzero(np.diff(side.station) == 0.0):
        assert side.total_pressure[at + 1] == side.total_pressure[at]
        density = side.static_pressure[at] / (inlet.gas_constant * inlet.temperature)
        heads = 0.5 * density * (side.velocity[at] ** 2 - side.velocity[at + 1] ** 2)
        rise = side.static_pressure[at + 1] - side.static_pressure[at]
        assert rise == pytest.approx(heads, rel=0.02)


def test_doubling_the_cells_moves_the_loss_by_less_than_0_02_points(machine):
    hardware, inlet, gas = machine
    coarse, fine = split(hardware, inlet, gas, cells=40), split(hardware, inlet, gas, cells=80)
    assert 100 * abs(fine.pressure_loss - coarse.pressure_loss) < 0.02


# --- invariances ----------------------------------------------------------------------------


def test_a_row_without_openings_leaves_the_split_untouched():
    hardware, inlet = metal.can(), metal.can_inlet()
    closed = row("closed", "dilution", 0.5, 0, 0.03)
    before, after = split(hardware, inlet), split(with_opening(hardware, closed), inlet)
    for opening in before.openings:
        assert after.opening(opening.name).mass_flow == opening.mass_flow
    assert after.pressure_loss == before.pressure_loss
    assert after.opening("closed").mass_flow == 0.0
    assert after.opening("closed").penetration is None


@pytest.mark.parametrize("flow", ["straight", "reverse"])
def test_two_half_rows_at_one_station_are_one_row(flow):
    hardware, inlet = metal.can(flow), metal.can_inlet()
    gas = metal.fire(hardware, 0.245)
    whole = split(hardware, inlet, gas)
    half = replace(hardware.opening("dilution"), count=4)
    halves = with_opening(hardware, half)
    halves = with_opening(halves, replace(half, name="dilution b"))
    parted = split(halves, inlet, gas)
    both = parted.opening("dilution").mass_flow + parted.opening("dilution b").mass_flow
    assert both == pytest.approx(whole.opening("dilution").mass_flow, rel=1e-9)
    assert parted.pressure_loss == pytest.approx(whole.pressure_loss, rel=1e-9)
    for value in ("head_ratio", "bleed_ratio", "jet_velocity", "penetration"):
        one = getattr(parted.opening("dilution b"), value)
        assert one == pytest.approx(getattr(whole.opening("dilution"), value), rel=1e-7)


def test_order_of_openings_does_not_matter():
    hardware, inlet = metal.annular(), metal.annular_inlet()
    turned = replace(hardware, openings=hardware.openings[::-1])
    before, after = split(hardware, inlet), split(turned, inlet)
    for opening in before.openings:
        assert after.opening(opening.name).mass_flow == pytest.approx(opening.mass_flow, rel=1e-8)


def test_cans_scale_the_machine():
    one, twelve = metal.can(), metal.can(cans=12)
    inlet = metal.can_inlet()
    big = replace(inlet, mass_flow=12 * inlet.mass_flow)
    before, after = split(one, inlet), split(twelve, big)
    assert after.pressure_loss == pytest.approx(before.pressure_loss, rel=1e-9)
    for opening in before.openings:
        other = after.opening(opening.name)
        assert other.mass_flow == pytest.approx(12 * opening.mass_flow, rel=1e-8)
        assert other.effective_area == pytest.approx(12 * opening.effective_area, rel=1e-8)
        if opening.penetration is not None:
            assert other.penetration == pytest.approx(opening.penetration, rel=1e-7)


def test_the_answer_does_not_depend_on_the_guess(machine):
    hardware, inlet, gas = machine
    far = split(hardware, replace(inlet, mass_flow=0.4 * inlet.mass_flow))
    cold, warm = split(hardware, inlet, gas), split(hardware, inlet, gas, guess=far)
    assert warm.pressure_loss == pytest.approx(cold.pressure_loss, rel=1e-9)
    for a, b in zip(cold.openings, warm.openings, strict=True):
        assert a.mass_flow == pytest.approx(b.mass_flow, abs=1e-9 * inlet.mass_flow)


def test_a_guess_from_other_metal_is_harmless():
    inlet = metal.can_inlet()
    other = split(metal.annular(), metal.annular_inlet())
    result = split(metal.can(), inlet, guess=other)
    assert result.pressure_loss == pytest.approx(split(metal.can(), inlet).pressure_loss, rel=1e-9)


# --- laws of single openings ----------------------------------------------------------------


def test_measured_effective_area_overrides_size_and_coefficient():
    hardware, inlet = metal.can(), metal.can_inlet()
    measured = replace(hardware.opening("dilution"), effective_area=9.0e-3)
    found = split(with_opening(hardware, measured), inlet).opening("dilution")
    assert found.effective_area == pytest.approx(9.0e-3, rel=1e-12)
    assert found.discharge_coefficient == pytest.approx(9.0e-3 / (8 * measured.area))


def test_stated_coefficient_is_used_as_it_stands():
    hardware, inlet = metal.can(), metal.can_inlet()
    stated = replace(hardware.opening("primaries"), discharge_coefficient=0.7)
    found = split(with_opening(hardware, stated), inlet).opening("primaries")
    assert found.discharge_coefficient == pytest.approx(0.7, rel=1e-12)


def test_static_fed_row_sees_less_pressure_than_a_total_fed_one():
    hardware, inlet = metal.can(), metal.can_inlet()
    slot = replace(hardware.opening("slot 1"), discharge_coefficient=0.7)
    static = split(with_opening(hardware, slot), inlet)
    total = split(with_opening(hardware, replace(slot, feed="total")), inlet)
    assert total.opening("slot 1").mass_flow > static.opening("slot 1").mass_flow
    side = static.annuli[0]
    at = int(np.flatnonzero(side.station == 0.04)[0])
    assert static.opening("slot 1").driving_pressure == side.static_pressure[at]


def test_plunged_holes_pass_more_than_plain_ones():
    hardware, inlet = metal.can(), metal.can_inlet()
    plunged = replace(hardware.opening("dilution"), edge="plunged")
    before, after = split(hardware, inlet), split(with_opening(hardware, plunged), inlet)
    assert after.opening("dilution").mass_flow > before.opening("dilution").mass_flow


def test_film_enters_at_its_lip_velocity_along_the_wall():
    hardware, inlet = metal.can(), metal.can_inlet()
    film = split(hardware, inlet).opening("slot 2")
    lip = hardware.opening("slot 2").slot
    density = film.liner_pressure / (inlet.gas_constant * film.air_temperature)
    speed = film.mass_flow / (density * lip.height * lip.length)
    assert film.jet_velocity == pytest.approx(speed, rel=1e-9)
    assert film.jet_angle == 0.0
    assert film.penetration is None


def test_swirler_leaves_at_its_vane_angle_with_its_throat_velocity():
    hardware, inlet = metal.can(), metal.can_inlet()
    found = split(hardware, inlet).opening("swirler")
    assert found.jet_angle == pytest.approx(math.radians(45))
    throat = hardware.opening("swirler").area * math.cos(math.radians(45))
    speed = found.mass_flow / (found.jet_density * throat)
    assert found.jet_velocity == pytest.approx(speed, rel=1e-9)
    assert math.isinf(found.head_ratio)


def test_can_row_and_annular_jets_penetrate_by_their_own_laws():
    can, annular = metal.can(), metal.annular()
    for hardware, inlet, fuel, name in (
        (can, metal.can_inlet(), 0.245, "dilution"),
        (annular, metal.annular_inlet(), 0.5, "outer dilution"),
    ):
        result = split(hardware, inlet, metal.fire(hardware, fuel))
        jet, hole = result.opening(name), hardware.opening(name)
        diameter = hole.diameter * math.sqrt(jet.discharge_coefficient)
        depth = diameter * math.sqrt(jet.momentum_flux_ratio)
        if hardware is can:
            at = int(np.flatnonzero(result.liner.station == hole.station)[0])
            gas = result.liner.mass_flow[at]
            depth *= 1.25 * gas / (gas + jet.mass_flow)
        else:
            depth *= 1.15 * math.sin(jet.jet_angle)
        assert jet.penetration == pytest.approx(depth, rel=1e-9)


def test_leak_joins_at_its_station():
    hardware, inlet = metal.can(), metal.can_inlet()
    result = split(hardware, inlet)
    leak = result.opening("seals").mass_flow
    gained = result.liner.mass_flow[-1] - result.liner.mass_flow[-2]
    assert gained == pytest.approx(leak, rel=1e-9)


# --- what is out of range -------------------------------------------------------------------


def test_row_below_the_annulus_static_pressure_does_not_flow_and_says_so():
    hardware, inlet = wide(metal.annular("reverse"), 0.3), metal.annular_inlet()
    result = split(hardware, inlet)
    dry = [o for o in result.openings if o.mass_flow == 0.0]
    assert result.convergence.converged
    assert result.imbalance <= 1e-9
    assert dry
    for opening in dry:
        assert any(notice.where == opening.name for notice in result.notices)
        assert opening.discharge_coefficient == 0.0
        assert opening.jet_velocity == 0.0


ALL_ROLES = {"swirler", "dome", "primary", "secondary", "dilution", "film"}


def test_choked_openings_are_noticed():
    result = split(scaled(metal.can(), ALL_ROLES, 0.363), metal.can_inlet())
    assert result.convergence.converged
    assert result.imbalance <= 1e-9
    choked = {n.where for n in result.notices if n.method == "orifice-compressible"}
    assert "swirler" in choked


@pytest.mark.parametrize(
    "factor", [pytest.param(0.362, id="just-too-little"), pytest.param(0.1, id="much-too-little")]
)
def test_more_air_than_the_openings_pass_choked_is_infeasible(factor):
    with pytest.raises(InfeasibleError, match="cannot enter the liner"):
        split(scaled(metal.can(), ALL_ROLES, factor), metal.can_inlet())


def test_annulus_near_choking_is_no_answer_and_says_so():
    result = split(wide(metal.annular("reverse"), 0.2), metal.annular_inlet())
    assert not result.convergence.converged
    assert "annulus is near choking" in result.convergence.message


def test_choked_compressor_exit_is_infeasible():
    hardware = metal.can()
    narrow = replace(hardware, diffuser=replace(hardware.diffuser, inlet_area=0.004))
    with pytest.raises(InfeasibleError, match="diffuser inlet"):
        split(narrow, metal.can_inlet())


def test_choked_turbine_inlet_is_infeasible():
    hardware = replace(metal.can(), exit_area=0.004)
    with pytest.raises(InfeasibleError, match="transition"):
        split(hardware, metal.can_inlet(), metal.fire(hardware, 0.245))


def test_no_opening_at_all_is_infeasible():
    with pytest.raises(InfeasibleError, match="no way into the liner"):
        split(metal.can(openings=[]), metal.can_inlet())


def test_one_opening_is_enough():
    only = row("holes", "dilution", 0.5, 20, 0.05)
    result = split(metal.can(openings=[only]), metal.can_inlet(0.5))
    assert result.imbalance <= 1e-9
    assert result.opening("holes").bleed_ratio == pytest.approx(1.0)


def test_fast_compressor_exit_is_noticed():
    hardware = metal.can()
    fast = replace(hardware, diffuser=replace(hardware.diffuser, inlet_area=0.0150))
    notices = split(fast, metal.can_inlet()).notices
    assert any(notice.where == "diffuser inlet" for notice in notices)


def test_every_problem_with_the_openings_is_named_at_once():
    bad = [
        replace(row("a", "dilution", 0.5, 4, 0.02), side="inner"),
        replace(row("b", "dilution", 0.5, 4, 0.02), area=0.0),
        row("c", "dilution", 0.5, 4, 0.02, feed="static"),
        replace(swirler("d", 1, 0.1, 0.05), swirler=None),
    ]
    with pytest.raises(InputError) as caught:
        split(metal.can(openings=bad), metal.can_inlet())
    assert len(caught.value.problems) == 4
    for name in "abcd":
        assert f"'{name}'" in str(caught.value)


@pytest.mark.parametrize("value", [0.0, -1.0, math.nan, math.inf])
def test_an_inlet_that_is_not_positive_is_refused(value):
    with pytest.raises(InputError, match="mass_flow"):
        split(metal.can(), replace(metal.can_inlet(), mass_flow=value))


def test_split_for_loss_refuses_what_is_no_fraction():
    with pytest.raises(InputError, match="fraction"):
        split_for_loss(metal.can(), metal.can_inlet(), 4.5)


def test_split_for_loss_from_a_choked_first_guess():
    result = split_for_loss(metal.can(), metal.can_inlet(6.0), 0.045)
    assert result.pressure_loss == pytest.approx(0.045, rel=1e-9)


def test_methods_used_follow_the_metal():
    keys = {method.key for method in methods_used(metal.can())}
    assert {"discharge-coefficient-kaddah", "swirler-knight-walker", "friction-haaland"} <= keys
    assert "annulus-turning" not in keys
    assert "annulus-turning" in {m.key for m in methods_used(metal.can("reverse"))}
    stated = [replace(row("r", "dilution", 0.5, 4, 0.02), discharge_coefficient=0.6)]
    keys = {method.key for method in methods_used(metal.can(openings=stated))}
    assert "discharge-coefficient-kaddah" not in keys
