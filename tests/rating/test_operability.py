"""Blow-out, light-up and premixers of a rated machine."""

from dataclasses import replace
from pathlib import Path

import pytest

from combustor.case import load_case, loads_case
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.hardware.metal import Injector
from combustor.rating.operability import KEYS, STEADY_MARGIN, deceleration
from combustor.rating.rate import rate_near, rate_point
from combustor.rating.settings import settings_of
from combustor.sizing.size import size


def judged(bench, point, hardware=None, fuel=None):
    return rate_point(
        bench.case,
        point,
        fuel or bench.fuel,
        bench.gas,
        hardware or bench.design.hardware,
        replace(bench.settings, streams=5),
        operability=True,
    )


@pytest.fixture(scope="module")
def idle(bench):
    return judged(bench, bench.case.point("idle"))


def test_every_key_is_there_and_the_margin_follows_from_the_ratio(idle):
    assert tuple(idle.operability) == KEYS
    ratio, margin = (
        idle.operability[key] for key in ("blowout_fuel_air_ratio", "blowout_margin_percent")
    )
    assert margin == pytest.approx(100.0 * (1.0 - ratio / idle.fuel_air_ratio), rel=1e-9)
    assert idle.operability["premixer_time_ms"] is None
    assert any(finding.what == "blow-out margin" for finding in idle.findings)
    assert {"blowout-margin", "lean-blowout-lefebvre"} <= {m.key for m in idle.methods}


def test_the_point_burns_above_its_blowout_and_not_below(bench, idle):
    ratio = idle.operability["blowout_fuel_air_ratio"]
    free = {"fuel_flow": None, "exit_temperature": None}

    def status(share):
        point = bench.point("idle", **free, fuel_air_ratio=share * ratio)
        settings = replace(bench.settings, streams=5)
        return rate_near(bench.case, point, bench.fuel, bench.gas, bench.design.hardware, settings)[
            0
        ].status

    # the search ends in steps of 5 %; a rating also lets the wall and the split follow
    assert status(1.03) == "burning"
    assert status(0.88) == "blown_out"


def test_losses_of_efficiency_add_up(idle):
    lost = 100.0 * (1.0 - idle.exit.combustion_efficiency)
    parts = (
        idle.operability["efficiency_loss_co_percent"],
        idle.operability["efficiency_loss_unburnt_percent"],
    )
    assert sum(parts) == pytest.approx(lost, rel=1e-6)
    assert all(part > 0.0 for part in parts)


def test_a_blown_out_point_has_every_key_and_no_value(bench):
    point = bench.point("idle", fuel_flow=0.01)
    out = judged(bench, point)
    assert out.status == "blown_out"
    assert set(out.operability.values()) == {None} and tuple(out.operability) == KEYS


def test_relight_point_by_flight_is_held_against_loading_and_flammability(bench):
    text = bench.case.text.replace(
        "[targets]",
        '[[points]]\nname = "relight"\nkind = "relight"\nair_flow = "0.6 kg/s"\n'
        'altitude = "7000 m"\nflight_mach = 0.6\nram_recovery = "90 %"\n'
        "fuel_air_ratio = 0.02\n\n[targets]",
    )
    point = loads_case(text).point("relight")
    assert point.inlet_temperature == pytest.approx(242.65 * 1.072, rel=1e-6)
    found = judged(bench, point)
    assert found.status == "burning"
    assert found.operability["ignition_loading_1e6"] > 0.0
    assert found.operability["light_off_fuel_air_ratio_correlation"] > 0.0
    said = {finding.what for finding in found.findings}
    assert {"loading at light-up", "primary equivalence ratio at light-up"} <= said


def test_a_cut_to_the_least_fuel_is_judged_at_the_air_of_every_point(idle):
    ratio = idle.operability["blowout_fuel_air_ratio"]
    busy = replace(
        idle,
        name="full",
        fuel_flow=4.0 * idle.fuel_flow,
        inlet=replace(idle.inlet, air_flow=3.0 * idle.inlet.air_flow),
    )
    (finding,) = deceleration((busy, idle))
    dry = busy.inlet.air_flow / (1.0 + busy.inlet.humidity)
    assert f"{ratio * dry:.4f} kg/s at the air of full" in finding.advice
    assert deceleration((idle,)) == ()


def premixed(bench, length, area):
    """The demo's metal with its swirler as a premixer of one injector."""
    metal = bench.design.hardware
    swirler = next(o.name for o in metal.openings if o.role == "swirler")
    return replace(metal, injectors=(Injector("main", 1.0, (swirler,), length, area),))


def test_a_slow_premixer_is_refused_and_a_fast_one_is_not(bench):
    point = bench.point("full", inlet_temperature=1050.0, exit_temperature=1500.0)
    slow = judged(bench, point, premixed(bench, 2.0, 0.05))
    fast = judged(bench, point, premixed(bench, 0.05, 0.004))
    ratio = slow.operability["premixer_time_ms"] / fast.operability["premixer_time_ms"]
    assert ratio == pytest.approx(2.0 / 0.05 * 0.05 / 0.004, rel=0.02)
    refused = [f for f in slow.findings if f.what.startswith("autoignition") and f.level == "act"]
    assert refused and refused[0].value < 1.0
    assert not [f for f in fast.findings if f.what.startswith("autoign") and f.level == "act"]
    assert slow.operability["flashback_wall_margin"] < fast.operability["flashback_wall_margin"]


def test_a_passage_of_unknown_size_cannot_be_judged_and_says_so(bench):
    found = judged(bench, bench.case.point("full"), premixed(bench, 0.1, None))
    said = [f for f in found.findings if f.what.endswith("cannot say")]
    assert said and "premix_area" in said[0].advice
    assert found.operability["autoignition_margin"] is None
    assert STEADY_MARGIN == 15.0


def test_a_kerosene_premixer_of_a_tenth_of_a_metre_is_refused():
    """0.1 m at 80 m/s behind air of 20 atm and 800 K: 0.88 ms of delay against 1.25 ms inside."""
    case = load_case(Path(__file__).parents[2] / "demo" / "aero_can_jet_a.toml")
    fuel = fuel_of(case)
    gas = Gas.load(fuel.mechanism)
    metal = size(case, fuel, gas).hardware
    swirler = next(o.name for o in metal.openings if o.role == "swirler")
    design = case.design_point
    point = design.model_copy(
        update={
            "air_flow": design.air_flow * 20.0 * 101325.0 / design.inlet_pressure,
            "inlet_pressure": 20.0 * 101325.0,
            "inlet_temperature": 800.0,
        }
    )

    def rated(area):
        hardware = replace(metal, injectors=(Injector("main", 1.0, (swirler,), 0.1, area),))
        settings = replace(settings_of(case.model), streams=3)
        return rate_point(case, point, fuel, gas, hardware, settings, operability=True)

    guess = rated(1e-3).operability["premixer_time_ms"]
    found = rated(1e-3 * 1.25 / guess)
    assert found.operability["premixer_time_ms"] == pytest.approx(1.25, rel=0.02)
    assert found.operability["autoignition_delay_ms"] == pytest.approx(0.88, abs=0.005)
    assert found.operability["autoignition_margin"] == pytest.approx(0.88 / 3.75, rel=0.03)
    (finding,) = (f for f in found.findings if f.what.startswith("autoignition"))
    assert finding.level == "act"
    assert "autoignition-temperature-of-a-spray" in {m.key for m in found.methods}
