"""How NOx moves with front air: a dilution row is varied and the front gives or takes air."""

from math import exp, log, sqrt

import pytest

from combustor.studies.sweep import sweep
from combustor.studies.sweep_axis import spaced

DILUTION = "hardware.openings.dilution.diameter"

# Bars, kelvin, equivalence ratio of the primary zone, then the change of NOx in percent for
# 1 % more and 1 % less front air. Computed with a stirred reactor of 2 to 4 ms, a plug flow and
# instant dilution, fuel and times held, ideal mixing.
LEAN = (15.0, 700.0, 0.50, -10.1, 11.5)
NEAR_STOICHIOMETRIC = (8.0, 600.0, 0.90, -5.7, 5.5)


@pytest.mark.parametrize(
    ("pressure", "temperature", "wanted", "more_air", "less_air"),
    [
        pytest.param(*LEAN, id="stirred reactor and plug flow, lean"),
        pytest.param(*NEAR_STOICHIOMETRIC, id="stirred reactor and plug flow, near stoichiometric"),
    ],
)
def test_one_percent_of_front_air_moves_nox(
    metal_case, diameter, pressure, temperature, wanted, more_air, less_air
):
    case = _ideally_mixed(metal_case, diameter, pressure, temperature, wanted)
    around = [spaced(case, DILUTION, 0.99 * diameter, 1.01 * diameter, 3)]
    found = sweep(case, around, ["full"], workers=1, operability=False)
    first, middle, last = (result.outcome for _, result in found.grid)
    assert middle.primary_equivalence_ratio == pytest.approx(wanted, abs=0.002)
    slope = log(last.nox / first.nox) / log(last.primary_air / first.primary_air)
    assert 100.0 * (exp(0.01 * slope) - 1.0) == pytest.approx(more_air, abs=3.0)
    assert 100.0 * (exp(-0.01 * slope) - 1.0) == pytest.approx(less_air, abs=3.0)
    # the sensitivity about the case says the same as the trend
    (line,) = found.sensitivities
    assert line.relative["nox"] / line.relative["primary_air"] == pytest.approx(slope, rel=0.05)


def _ideally_mixed(case, diameter, pressure, temperature, wanted):
    """The demo metal at its own corrected flow, one stream, the fuel flow held."""
    flow = 14.2 * pressure / 9.9 * sqrt(598.15 / temperature)
    stated = {
        "air_flow": flow,
        "inlet_pressure": pressure * 1e5,
        "inlet_temperature": temperature,
        "exit_temperature": None,
        "fuel_flow": 0.01 * flow,
        "humidity": 0.0,
    }
    model = case.model.model_copy(update={"unmixedness": 0.0, "streams": 1, "cells": 6})
    case = case.model_copy(update={"model": model})
    for _ in range(3):
        point = case.point("full").model_copy(update=stated)
        case = case.model_copy(update={"points": (point,)})
        here = sweep(
            case, [spaced(case, DILUTION, diameter, diameter, 1)], workers=1, operability=False
        )
        stated["fuel_flow"] *= wanted / here.outcomes["0", "full"].primary_equivalence_ratio
    return case
