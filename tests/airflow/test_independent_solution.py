from dataclasses import replace

import independent
import metal_samples as metal
import pytest

from combustor.airflow.split import split

CASES = {
    "can-cold": (metal.can, metal.can_inlet, None),
    "can-fired": (metal.can, metal.can_inlet, 0.245),
    "can-reverse-fired": (lambda: metal.can("reverse"), metal.can_inlet, 0.245),
    "can-annular-fired": (metal.can_annular, lambda: metal.can_inlet(3.0), 3 * 0.245),
    "can-annular-reverse-fired": (
        lambda: replace(metal.can_annular(), flow="reverse"),
        lambda: metal.can_inlet(3.0),
        3 * 0.245,
    ),
    "annular-reverse-fired": (lambda: metal.annular("reverse"), metal.annular_inlet, 0.50),
    "annular-cold": (metal.annular, metal.annular_inlet, None),
    "annular-fired": (metal.annular, metal.annular_inlet, 0.50),
}


@pytest.mark.parametrize("case", CASES.values(), ids=CASES.keys())
def test_split_agrees_with_all_unknowns_solved_at_once(case):
    hardware, inlet, fuel = case[0](), case[1](), case[2]
    gas = None if fuel is None else metal.fire(hardware, fuel)
    flows, loss, residual = independent.solve(hardware, inlet, gas)
    assert residual < 1e-10
    result = split(hardware, inlet, gas)
    for opening in result.openings:
        assert abs(opening.mass_flow - flows[opening.name]) <= 1e-6 * inlet.mass_flow
    assert result.pressure_loss == pytest.approx(loss, abs=1e-6)
