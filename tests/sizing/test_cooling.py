"""Film slots: stations, heights, air; the panel balance against the wall march."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.heat.sides import Film, Radiation
from combustor.heat.wall import march
from combustor.sizing import cooling, film_slots, wall_sides
from combustor.sizing.profile import liner_profile
from combustor.sizing.size import settle
from combustor.sizing.state import bare_metal


@settings(derandomize=True, max_examples=60)
@given(
    length=st.floats(0.2, 1.2),
    places=st.lists(st.floats(0.1, 0.9), min_size=0, max_size=3),
    width=st.floats(0.02, 0.08),
    pitch=st.floats(0.025, 0.06),
)
def test_slots_keep_clear_of_the_rows(length, places, width, pitch):
    bands = [(length * p - 0.5 * width, length * p + 0.5 * width) for p in places]
    stations = film_slots.slot_stations(length, bands, pitch)
    assert stations[0] == 0.0 or bands
    assert list(stations) == sorted(set(stations))
    for x in stations:
        assert not any(start + 1e-3 < x < end - 1e-3 for start, end in bands)
        assert 0.0 <= x < length
    # beside the bands the pitch holds; a band may add its own width to a panel
    for before, after in zip(stations, [*stations[1:], length], strict=True):
        inside = sum(max(0.0, min(after, e) - max(before, s)) for s, e in bands)
        assert after - before <= pitch + inside + 2 * film_slots.BAND_MARGIN + 2e-3


def test_slot_heights_lie_in_the_usual_range():
    for liner in (0.05, 0.3, 0.6, 1.0):
        heights = film_slots.slot_heights(liner)
        assert list(heights) == sorted(heights)
        assert heights[0] >= 1e-3 and heights[-1] <= 3e-3
        assert heights[0] >= 0.004 * min(liner, 0.75) - 1e-9


def test_metering_holes_fit_the_slot():
    assert film_slots.metering_diameter(5e-4, 1.0, 1.3e-3) == pytest.approx(1.5e-3, abs=0.11e-3)
    assert film_slots.metering_diameter(1e-5, 1.0, 1.3e-3) == pytest.approx(1.3e-3)
    assert film_slots.metering_diameter(1e-2, 1.0, 1.4e-3) == pytest.approx(2.1e-3)


ALONG = (
    "temperature",
    "mass_flow",
    "area",
    "hydraulic_diameter",
    "fuel_air_ratio",
    "x_h2o",
    "x_co2",
)


@pytest.fixture(scope="module")
def sides(task):
    state, *_ = settle(task)
    sketch, duty = state.sketch, task.duty
    profile = liner_profile(bare_metal(sketch), state.shares, duty.overall, duty.table, 0.5)
    gas = wall_sides.gas_side(
        sketch, profile, duty.inlet, duty.fuel_flow, duty.inlet.pressure, duty.stoichiometric
    )
    air = wall_sides.annulus_side(sketch, profile, duty.inlet, state.budget.front)
    return state, bare_metal(sketch).walls[0], gas, air


def test_panel_ends_agree_with_the_wall_march(task, sides):
    """The first panel sees its own film only, so the whole march must say the same."""
    state, wall, gas, air = sides
    sketch, inlet = state.sketch, task.duty.inlet
    plan = cooling.plan_films(sketch, wall, gas, air, inlet, 1123.15, 300.0)
    ring = sketch.slots[0]
    film = Film.from_slot(
        ring.name,
        ring.station,
        plan.flow[0],
        inlet.temperature,
        task.duty.density,
        ring.height,
        ring.lip_thickness,
        sketch.perimeter,
    )
    # the march ends where the panel ends, before the next slot's air joins the gas
    end = gas.station < sketch.slots[1].station - 1e-7
    short = replace(
        gas,
        station=gas.station[end],
        **{name: getattr(gas, name)[end] for name in ALONG},
    )
    walled = march(wall, short, [film], air, Radiation("grey-gas"))
    assert plan.peak[0] == pytest.approx(walled.temperature[-1], abs=0.1)


def test_a_colder_wall_takes_more_film(task, sides):
    state, wall, gas, air = sides
    total = []
    for wanted in (1000.0, 1100.0, 1250.0):
        # without the least flow of the metering holes, so that the wall alone decides
        plan = cooling.plan_films(
            state.sketch, wall, gas, air, task.duty.inlet, wanted, metering_flux=0.0
        )
        total.append(sum(plan.flow))
    assert total[0] > total[1] > total[2]


def test_least_film_holds_the_limit(task, sides):
    state, wall, gas, air = sides
    plan = cooling.plan_films(
        state.sketch, wall, gas, air, task.duty.inlet, 1123.15, metering_flux=0.0, passes=60
    )
    assert plan.is_cool
    low = plan.limit - 5.0
    loosest = [flow for flow, peak in zip(plan.flow, plan.peak, strict=True) if peak < low]
    at_limit = [peak for peak in plan.peak if peak >= low]
    # every slot is either at the limit or at its least flow
    assert len(loosest) + len(at_limit) == len(plan.flow)
    assert at_limit


def test_sparse_metering_sets_the_least_air(task, sides):
    state, wall, gas, air = sides
    flux = 400.0
    plan = cooling.plan_films(state.sketch, wall, gas, air, task.duty.inlet, 2000.0, flux)
    for ring, flow in zip(state.sketch.slots, plan.flow, strict=True):
        drill = ring.height
        count = state.sketch.perimeter / (film_slots.METERING_PITCH * drill)
        least = flux * count * np.pi / 4 * drill**2
        assert flow >= least * (1 - 1e-9)
