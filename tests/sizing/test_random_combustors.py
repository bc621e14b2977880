"""A fixed twenty of the random combustors of the campaign, and refusals shown to be right."""

import importlib.util
import math
import sys
from pathlib import Path

import numpy as np
import pytest

from combustor.base.errors import InfeasibleError
from combustor.sizing import size
from combustor.sizing.fire import Supply, burn_to_equilibrium, fuel_air_ratio_for
from combustor.sizing.reference_area import PRESSURE_LOSS_FACTOR, chemical_loading, corrected_loss

CAMPAIGNS = Path(__file__).parents[1] / "campaigns"
COUNT = 20


def load(name):
    spec = importlib.util.spec_from_file_location(name, CAMPAIGNS / f"{name}.py")
    module = importlib.util.module_from_spec(spec)
    sys.modules[name] = module
    spec.loader.exec_module(module)
    return module


random_machines = load("sizing_cases")
campaign = load("sizing_robustness")


@pytest.fixture(scope="module")
def outcomes():
    return [campaign.outcome_of(one) for one in random_machines.points(COUNT)]


def test_every_machine_gives_metal_or_a_reason(outcomes):
    assert len(outcomes) == COUNT
    for one in outcomes:
        assert one["outcome"] in ("converged", "not converged", "refused", "no such flame")
        if one["outcome"] != "converged":
            assert one["said"]


def test_nineteen_in_twenty_converge_below_half_of_stoichiometric(outcomes):
    lean = [one for one in outcomes if one["overall"] is not None and one["overall"] < 0.5]
    good = [one for one in lean if one["outcome"] == "converged"]
    assert len(lean) >= 15
    assert len(good) >= 0.95 * len(lean)


def test_the_sequence_is_fixed_and_within_its_ranges():
    again = random_machines.points(COUNT)
    assert again == random_machines.points(COUNT)
    assert again[:5] == random_machines.points(32)[:5]
    for one in again:
        assert 1.5e5 <= one["pressure"] <= 45e5
        assert 0.1 <= one["flow"] <= 120.0
        assert 300.0 <= one["exit"] - one["inlet"] <= 1300.0
        assert one["flow"] / random_machines.cans_of(one) <= 15.0 or one["layout"] == "annular"


def refusal(case, fuel, gas):
    with pytest.raises(InfeasibleError) as caught:
        size(case, fuel, gas)
    return caught.value


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ('pressure_loss = "4.5 %"', 'pressure_loss = "1 %"'),
        ('pressure_loss = "4.5 %"', 'pressure_loss = "2.4 %"'),
        ('casing_diameter = "440 mm"', 'casing_diameter = "350 mm"'),
    ],
)
def test_no_casing_in_the_room_gives_the_loss(old, new, fuel, gas, make_can):
    """Every bore the room allows, tried: the loss at the usual factor stays above the target."""
    case = make_can((old, new))
    assert "no area inside the envelope" in str(refusal(case, fuel, gas))
    point = case.design_point
    constant = gas.gas_constant(gas.air(point.humidity))
    losses = [
        PRESSURE_LOSS_FACTOR["can"]
        * corrected_loss(
            point.air_flow,
            point.inlet_temperature,
            point.inlet_pressure,
            0.25 * math.pi * bore**2,
            constant,
        )
        for bore in np.linspace(0.02, case.combustor.casing_diameter, 2000).tolist()
    ]
    assert min(losses) > case.targets.pressure_loss


@pytest.mark.parametrize("pressure", [1.2, 1.0, 0.8])
def test_no_casing_in_the_room_burns_the_point_out(pressure, fuel, gas, make_can):
    case = make_can(('inlet_pressure = "3.0 bar"', f'inlet_pressure = "{pressure} bar"'))
    assert "chemical loading" in str(refusal(case, fuel, gas))
    idle = case.point("idle")
    loadings = [
        chemical_loading(
            idle.inlet_pressure,
            0.25 * math.pi * bore**2,
            bore,
            idle.inlet_temperature,
            idle.air_flow,
        )
        for bore in np.linspace(0.02, case.combustor.casing_diameter, 2000).tolist()
    ]
    assert max(loadings) < 73e6


@pytest.mark.parametrize("celsius", [2150, 2250, 2500])
def test_no_mixture_is_as_hot_as_asked(celsius, fuel, gas, make_can):
    case = make_can(
        ('exit_temperature = "1000 degC"', f'exit_temperature = "{celsius} degC"'),
    )
    assert "burns at" in str(refusal(case, fuel, gas))
    point = case.design_point
    supply = Supply(point.inlet_pressure, point.inlet_temperature, point.humidity, 288.15)
    hottest = max(
        burn_to_equilibrium(
            gas, fuel, supply, ratio * fuel.stoichiometric_fuel_air_ratio
        ).temperature
        for ratio in np.linspace(0.3, 2.0, 171).tolist()
    )
    assert hottest < point.exit_temperature


def test_no_split_of_the_air_is_lean_enough(fuel, gas, make_can):
    case = make_can(('exit_temperature = "1000 degC"', 'exit_temperature = "1650 degC"'))
    assert "over 100 %" in str(refusal(case, fuel, gas))
    point = case.design_point
    supply = Supply(point.inlet_pressure, point.inlet_temperature, point.humidity, 288.15)
    ratio = fuel_air_ratio_for(gas, fuel, supply, point.exit_temperature)
    overall = ratio / fuel.stoichiometric_fuel_air_ratio
    shares = np.linspace(0.01, 1.0, 1000)
    assert not np.any(overall / shares <= case.targets.equivalence_ratio.secondary)
