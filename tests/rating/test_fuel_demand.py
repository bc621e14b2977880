import math

import pytest

from combustor.case import loads_case
from combustor.case.starter import starter_text
from combustor.rating.fuel_demand import FuelDemand
from combustor.rating.rate import rate_case

TARGET, COMPLETE = 820.0, 15e3  # K, K s/kg


def search(exit_temperature, start, passes=30):
    """Follow the demand on a plant that answers at once; return it and the last flow."""
    demand, flow = FuelDemand(TARGET), start
    for _ in range(passes):
        temperature = exit_temperature(flow)
        if abs(temperature - TARGET) < 0.05:
            break
        flow = demand.next_flow(flow, temperature, COMPLETE)
        if demand.falls_into_a_jump:
            break
    return demand, flow


def smooth(steepness):
    """Complete combustion but for a deficit that fades over a narrow range of fuel flow."""
    width = 20.0 / (steepness * COMPLETE)

    def plant(flow):
        return 400.0 + COMPLETE * flow + 40.0 / (1.0 + math.exp(-(flow - 0.026) / width))

    return plant


def jumping(flow):
    return 390.0 + COMPLETE * flow + (12.0 if flow > 0.0284 else 0.0)


@pytest.mark.parametrize("steepness", [1.0, 5.0, 15.0])
@pytest.mark.parametrize("start", [0.022, 0.028, 0.034])
def test_flow_of_a_plant_without_jumps_is_found(steepness, start):
    demand, flow = search(smooth(steepness), start)
    assert abs(smooth(steepness)(flow) - TARGET) < 0.05
    assert not demand.falls_into_a_jump


@pytest.mark.parametrize("start", [0.026, 0.0284, 0.031])
def test_target_inside_a_jump_is_noticed_before_the_passes_run_out(start):
    demand, flow = search(jumping, start, passes=20)
    assert demand.falls_into_a_jump
    assert flow == pytest.approx(0.0284, rel=0.01)


def test_exit_temperature_inside_the_jump_of_a_stream_is_met_with_more_streams():
    # nine streams jump from 809 to 819 K where the third goes out
    case = loads_case(starter_text(fuel="methane"), "methane.toml")
    (idle,) = rate_case(case, points=["idle"]).points
    assert idle.status == "burning"
    assert idle.exit.temperature == pytest.approx(818.15, abs=0.05)
    assert "streams" in idle.convergence.message
    assert idle.balances["elements"] <= 1e-10
