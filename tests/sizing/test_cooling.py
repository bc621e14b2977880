"""Film slots: stations, heights, air; the walls they hold against the wall march."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.heat.sides import Film, Radiation
from combustor.heat.wall import march
from combustor.sizing import cooling, film_slots, wall_sides
from combustor.sizing.film_slots import SlotRoom, next_slot
from combustor.sizing.passes import wall_of
from combustor.sizing.size import settle
from combustor.sizing.state import bare_metal
from combustor.sizing.wall_duty import wall_duties

ROOM = SlotRoom(0.02, 0.1, (1.5e-3,))


@settings(derandomize=True, max_examples=80)
@given(
    last=st.floats(0.0, 0.5),
    cool=st.floats(0.0, 0.1),
    row=st.floats(0.0, 0.9),
    width=st.floats(0.02, 0.08),
)
def test_next_slot_keeps_clear_of_the_rows_and_within_the_reach(last, cool, row, width):
    length, end = 0.8, min(last + ROOM.longest, 0.8)
    band = (row - 0.5 * width, row + 0.5 * width)
    reach = min(last + cool, end)
    place, is_short = next_slot(last, reach, end, length, [band], ROOM)
    if place is None:
        assert is_short or reach >= length - film_slots.BAND_MARGIN
        return
    assert last < place < length
    assert not band[0] + 1e-3 < place < band[1] - 1e-3
    if not is_short:
        beyond_row = abs(place - band[1]) <= 1e-3
        assert place <= reach + 2e-3 or beyond_row


def test_panel_too_hot_within_the_shortest_pitch_is_told():
    place, is_short = next_slot(0.1, 0.105, 0.2, 0.8, [], ROOM)
    assert place == pytest.approx(0.12) and is_short
    assert next_slot(0.1, 0.15, 0.2, 0.8, [], ROOM) == (pytest.approx(0.15), False)
    assert next_slot(0.75, 0.8, 0.8, 0.8, [], ROOM) == (None, False)


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


@pytest.fixture(scope="module")
def settled(task):
    return settle(task)[0]


def wall_at(task, state, wanted, metering_flux=0.0):
    wall = wall_of(
        task, bare_metal(state.sketch), state.shares, metering_flux, state.film_plan.left
    )
    return replace(wall, limit=wanted - cooling.WALL_MARGIN)


def test_first_panel_agrees_with_the_wall_march(task, settled):
    """The films laid here and the march the rating uses must say the same of one wall."""
    sketch, duty = settled.sketch, task.walls[0]
    metal = bare_metal(sketch)
    x = np.linspace(0.0, metal.liner_length, 400)
    air = wall_sides.air_along(metal, settled.shares, x, 0.5, settled.film_plan.left)
    gas = wall_sides.gas_side(metal, air, duty)
    behind = wall_sides.annulus_side(metal, metal.walls[0], settled.shares, x, duty.inlet)
    films = [
        Film.from_slot(
            ring.name,
            ring.station,
            flow,
            duty.inlet.temperature,
            task.duty.density,
            ring.height,
            ring.lip_thickness,
            sketch.perimeter,
        )
        for ring, flow in zip(sketch.slots, settled.films, strict=True)
    ]
    walled = march(metal.walls[0], gas, films, behind, Radiation("grey-gas"), 400)
    wall = wall_at(task, settled, 1123.15)
    peaks, _ = cooling.panel_peaks(sketch, wall, np.array(settled.films))
    starts = [ring.station for ring in sketch.slots]
    for start, end, peak in zip(starts, [*starts[1:], metal.liner_length], peaks, strict=True):
        panel = (walled.station >= start) & (walled.station < end)
        assert peak == pytest.approx(walled.temperature[panel].max(), abs=6.0)


def test_a_colder_wall_takes_more_film(task, settled):
    total = []
    for wanted in (1000.0, 1100.0, 1250.0):
        # without the least flow of the metering holes, so that the wall alone decides
        plan = cooling.plan_films(settled.sketch, wall_at(task, settled, wanted))
        total.append(sum(plan.flow))
    assert total[0] > total[1] > total[2]


def test_least_film_holds_the_limit(task, settled):
    plan = cooling.plan_films(settled.sketch, wall_at(task, settled, 1123.15), passes=60)
    assert plan.is_cool
    low = plan.limit - 5.0
    at_one = cooling.plan_films(settled.sketch, wall_at(task, settled, 5000.0)).flow
    for flow, peak, least in zip(plan.flow, plan.peak, at_one, strict=True):
        assert peak >= low or flow == pytest.approx(least)
    assert any(peak >= low for peak in plan.peak)


def test_less_air_in_a_slot_at_the_limit_overheats_its_panel(task, settled):
    wall = wall_at(task, settled, 1123.15)
    plan = cooling.plan_films(settled.sketch, wall, passes=60)
    hottest = int(np.argmax(plan.peak))
    flow = np.array(plan.flow)
    flow[hottest] *= 0.9
    peaks, _ = cooling.panel_peaks(settled.sketch, wall, flow)
    assert peaks[hottest] > plan.limit + 3.0


def test_sparse_metering_sets_the_least_air(task, settled):
    flux = 400.0
    plan = cooling.plan_films(settled.sketch, wall_at(task, settled, 2000.0, flux))
    for ring, flow in zip(settled.sketch.slots, plan.flow, strict=True):
        drill = ring.height
        count = settled.sketch.perimeter / (film_slots.METERING_PITCH * drill)
        least = flux * count * np.pi / 4 * drill**2
        assert flow >= least * (1 - 1e-9)


def test_only_points_that_may_be_hotter_somewhere_are_marched(task, case, fuel, gas):
    assert [duty.name for duty in task.walls] == ["full"]
    points = [
        point.model_copy(update={"inlet_temperature": 640.0}) if point.name == "half" else point
        for point in case.points
    ]
    hotter = case.model_copy(update={"points": tuple(points)})
    named = [duty.name for duty in wall_duties(hotter, fuel, gas, task.duty)]
    assert named == ["full", "half"]


def test_a_hotter_part_load_takes_more_film(task, case, fuel, gas, settled):
    """The wall must hold at any operating point, not at the design point only."""
    points = [
        point.model_copy(update={"inlet_temperature": 680.0, "exit_temperature": 1273.15})
        if point.name == "half"
        else point
        for point in case.points
    ]
    hotter = case.model_copy(update={"points": tuple(points)})
    more = replace(task, case=hotter, walls=wall_duties(hotter, fuel, gas, task.duty))
    alone = cooling.plan_films(settled.sketch, wall_at(task, settled, 1123.15))
    both = cooling.plan_films(settled.sketch, wall_at(more, settled, 1123.15))
    assert sum(both.flow) > sum(alone.flow)
    assert "half" in both.point
