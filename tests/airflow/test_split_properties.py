"""Properties that hold for any machine of the sample's kind."""

import math
from dataclasses import replace

import metal_samples as metal
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from combustor.airflow.split import split
from combustor.hardware.metal import AxialProfile

machines = st.fixed_dictionaries(
    {
        "annular": st.booleans(),
        "reverse": st.booleans(),
        "fired": st.booleans(),
        "load": st.floats(0.2, 1.0),
        "sizes": st.lists(st.floats(0.6, 1.6), min_size=11, max_size=11),
    }
)


def build(values):
    make, full = (
        (metal.annular, metal.annular_inlet) if values["annular"] else (metal.can, metal.can_inlet)
    )
    hardware = make("reverse" if values["reverse"] else "straight")
    rows = tuple(
        replace(o, area=o.area * size, diameter=o.diameter and o.diameter * math.sqrt(size))
        for o, size in zip(hardware.openings, values["sizes"], strict=False)
    )
    hardware = replace(hardware, openings=rows)
    inlet = full(values["load"])
    gas = metal.fire(hardware, 0.018 * inlet.mass_flow) if values["fired"] else None
    return hardware, inlet, gas


@given(machines)
@settings(max_examples=60, derandomize=True, deadline=None)
def test_any_machine_balances(values):
    hardware, inlet, gas = build(values)
    result = split(hardware, inlet, gas)
    assert result.convergence.converged
    assert result.imbalance <= 1e-9
    assert sum(result.pressure_loss_parts.values()) == pytest.approx(result.pressure_loss)
    assert 0.0 < result.pressure_loss < 0.5
    assert all(opening.mass_flow >= 0.0 for opening in result.openings)


@given(machines, st.integers(0, 10))
@settings(max_examples=60, derandomize=True, deadline=None)
def test_enlarging_a_row_gives_it_more_air_and_lowers_the_loss(values, number):
    hardware, inlet, gas = build(values)
    number %= len(hardware.openings)
    opening = hardware.openings[number]
    larger = replace(opening, area=1.1 * opening.area, diameter=None)
    rows = (*hardware.openings[:number], larger, *hardware.openings[number + 1 :])
    before, after = split(hardware, inlet, gas), split(replace(hardware, openings=rows), inlet, gas)
    if before.openings[number].mass_flow > 0.0:
        assert after.openings[number].mass_flow > before.openings[number].mass_flow
        assert after.dome_pressure - after.liner.static_pressure[0] < (
            before.dome_pressure - before.liner.static_pressure[0]
        )


def wide(hardware, factor):
    annuli = tuple(
        replace(p, area=AxialProfile(p.area.station, tuple(a * factor for a in p.area.value)))
        for p in hardware.annuli
    )
    return replace(hardware, annuli=annuli)


@given(machines, st.floats(1.6, 3.0))
@settings(max_examples=40, derandomize=True, deadline=None)
def test_ten_percent_more_dilution_area_takes_its_share_from_the_dome(values, width):
    # Annuli wide enough that every hole has ten annulus heads: the rows compete by area alone.
    hardware, inlet, gas = build(values)
    hardware = wide(hardware, width)
    rows = tuple(
        replace(o, area=1.1 * o.area, diameter=None) if o.role == "dilution" else o
        for o in hardware.openings
    )
    before, after = split(hardware, inlet, gas), split(replace(hardware, openings=rows), inlet, gas)
    assume(min(opening.head_ratio for opening in before.openings) >= 10.0)
    dome = [sum(o.mass_flow for o in r.openings if o.side == "dome") for r in (before, after)]
    share = before.flow("dilution") / inlet.mass_flow
    assert 0.08 <= (1 - dome[1] / dome[0]) / share <= 0.10
    assert after.pressure_loss < before.pressure_loss


@given(machines)
@settings(max_examples=40, derandomize=True, deadline=None)
def test_more_flow_costs_more_loss(values):
    hardware, inlet, gas = build(values)
    more = replace(inlet, mass_flow=1.05 * inlet.mass_flow)
    low, high = split(hardware, inlet, gas), split(hardware, more, gas)
    assert 1.08 < high.pressure_loss / low.pressure_loss < 1.25


@given(machines)
@settings(max_examples=40, derandomize=True, deadline=None)
def test_more_holes_per_row_at_the_same_area_flow_alike(values):
    hardware, inlet, gas = build(values)
    rows = tuple(replace(o, count=2 * o.count, area=0.5 * o.area) for o in hardware.openings)
    before, after = split(hardware, inlet, gas), split(replace(hardware, openings=rows), inlet, gas)
    assert after.pressure_loss == pytest.approx(before.pressure_loss, rel=1e-9)
