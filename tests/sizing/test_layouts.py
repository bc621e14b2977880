"""Can-annular and annular machines sized end to end; a ring without curvature is a channel."""

import math
from dataclasses import replace
from pathlib import Path

import pytest

from combustor.airflow.split import split
from combustor.base.errors import InfeasibleError
from combustor.case import load_case, loads_case
from combustor.case.starter import LAYOUTS, starter_text
from combustor.case.write import complete
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.hardware.from_case import hardware_of
from combustor.hardware.metal import AxialProfile, Passage
from combustor.hardware.to_case import table_of
from combustor.sizing import size
from combustor.sizing.metal import metal_of
from combustor.sizing.section import Section, cans_that_fit
from combustor.sizing.size import settle, task_of

DEMO = Path(__file__).parents[2] / "demo"
RING, CANS = "compressor_drive_annular.toml", "reverse_can_annular.toml"


class Sized:
    def __init__(self, case, gas):
        self.case = case
        self.fuel = fuel_of(case)
        self.design = size(case, self.fuel, gas)


@pytest.fixture(scope="module")
def sized(gas):
    return {name: Sized(load_case(DEMO / name), gas) for name in (RING, CANS)}


@pytest.fixture(scope="module")
def ring_state(gas):
    case = load_case(DEMO / RING)
    task = task_of(case, fuel_of(case), gas)
    return task, settle(task)[0]


@pytest.mark.parametrize("name", [RING, CANS])
def test_targets_are_met(sized, name):
    design, targets = sized[name].design, sized[name].case.targets
    assert design.converged
    assert design.split.pressure_loss == pytest.approx(targets.pressure_loss, abs=0.001)
    for zone in design.zones:
        assert zone.reached == pytest.approx(zone.wanted, abs=0.03)
    assert not [finding.what for finding in design.findings if finding.level == "act"]


@pytest.mark.parametrize("layout", LAYOUTS)
def test_starter_of_every_layout_sizes_without_a_broken_limit(layout):
    case = loads_case(starter_text(layout), "starter.toml")
    fuel = fuel_of(case)
    design = size(case, fuel, Gas.load(fuel.mechanism))
    assert design.hardware.layout == layout
    assert design.converged
    assert not [finding.what for finding in design.findings if finding.level == "act"]


@pytest.mark.parametrize("name", [RING, CANS])
def test_metal_survives_the_case_file(sized, name):
    case, design = sized[name].case, sized[name].design
    text = complete(case.text, table_of(design.hardware, case.combustor))
    again, metal = hardware_of(loads_case(text, "sized.toml")), design.hardware
    for read, written in zip(again.openings, metal.openings, strict=True):
        assert replace(read, area=0.0, diameter=None, slot=None) == replace(
            written, area=0.0, diameter=None, slot=None
        )
        assert read.area == pytest.approx(written.area, rel=1e-12)
        if written.slot is not None:
            assert vars(read.slot) == pytest.approx(vars(written.slot), rel=1e-12)
    assert again.injectors == metal.injectors
    assert again.reference_area == pytest.approx(metal.reference_area, rel=1e-12)
    assert again.reference_height == pytest.approx(metal.reference_height, rel=1e-12)
    assert again.liner_height == pytest.approx(metal.liner_height, rel=1e-12)
    for read, written in zip(
        (again.liner, *again.annuli), (metal.liner, *metal.annuli), strict=True
    ):
        assert read.area.at(0.05) == pytest.approx(written.area.at(0.05), rel=1e-12)
        assert read.hydraulic_diameter.value == pytest.approx(written.hydraulic_diameter.value)
    for read, written in zip(again.walls, metal.walls, strict=True):
        assert read.perimeter.value == pytest.approx(written.perimeter.value)
        assert read.casing_area_ratio == pytest.approx(written.casing_area_ratio)
        assert read.beam_length == pytest.approx(written.beam_length)


def test_ring_stays_in_its_envelope_and_adds_up(sized):
    case, metal = sized[RING].case.combustor, sized[RING].design.hardware
    mean = 0.5 * (case.casing_outer_diameter + case.casing_inner_diameter)
    assert metal.reference_height <= 0.5 * (case.casing_outer_diameter - case.casing_inner_diameter)
    assert metal.reference_area == pytest.approx(math.pi * mean * metal.reference_height)
    sheet = 2.0 * math.pi * mean * case_sheet(sized[RING].case)
    parts = metal.liner.area.at(0.0) + sum(annulus.area.at(0.0) for annulus in metal.annuli)
    assert parts + sheet == pytest.approx(metal.reference_area, rel=1e-9)
    assert metal.walls[0].perimeter.at(0.0) > metal.walls[1].perimeter.at(0.0)


def case_sheet(case):
    return case.targets.sheet_thickness


def test_both_walls_of_a_ring_have_the_same_rows_opposed(sized):
    metal = sized[RING].design.hardware
    for role in ("primary", "secondary", "dilution"):
        outer, inner = metal.opening(f"{role}-outer"), metal.opening(f"{role}-inner")
        assert (outer.station, outer.count) == (inner.station, inner.count)
        assert outer.diameter >= inner.diameter
    split_by_side = sized[RING].design.split
    outer = split_by_side.opening("dilution-outer").mass_flow
    inner = split_by_side.opening("dilution-inner").mass_flow
    height, mean = metal.liner_height, 0.52
    assert outer / (outer + inner) == pytest.approx(0.5 + 0.25 * height / mean, abs=0.01)


def test_swirlers_stand_about_one_liner_height_apart(sized):
    metal = sized[RING].design.hardware
    swirler = metal.opening("swirler")
    pitch = math.pi * 0.52 / swirler.count / metal.liner_height
    assert swirler.count % 2 == 0
    assert 0.9 < pitch < 1.3


def test_cans_keep_clear_of_each_other_and_of_the_casing(sized):
    case, metal = sized[CANS].case.combustor, sized[CANS].design.hardware
    mean = 0.5 * (case.casing_outer_diameter + case.casing_inner_diameter)
    outside = metal.liner_height + 2.0 * sized[CANS].case.targets.sheet_thickness
    assert outside < metal.reference_height
    assert outside < mean * math.sin(math.pi / metal.cans)
    assert cans_that_fit(outside, mean) >= metal.cans
    wetted = math.pi * outside + 2.0 * math.pi * mean / metal.cans
    annulus = metal.annuli[0]
    assert annulus.hydraulic_diameter.value[0] == pytest.approx(
        4.0 * annulus.area.value[0] / wetted
    )


def test_cross_fire_tubes_leak_a_quarter_of_the_leakage(sized):
    design, case = sized[CANS].design, sized[CANS].case
    tubes = design.hardware.opening("cross-fire")
    assert tubes.role == "leak" and tubes.station < design.hardware.zones[0].end
    leak = design.split.flow("leak")
    assert design.split.opening("cross-fire").mass_flow / leak == pytest.approx(0.25, abs=0.01)
    assert leak / case.design_point.air_flow == pytest.approx(0.024, abs=0.001)


def test_reverse_flow_feeds_the_domes_from_the_annulus(sized):
    solved = sized[CANS].design.split
    annulus = solved.annuli[0]
    front = sum(flow.mass_flow for flow in solved.openings if flow.side == "dome")
    assert annulus.mass_flow[0] == pytest.approx(front, rel=1e-6) or annulus.mass_flow[
        -1
    ] == pytest.approx(front, rel=1e-6)


def test_eight_cans_handbook_count_derived_12():
    """pi / asin(0.20 / 0.80) = 12.43: twelve cans of 0.20 m on 0.80 m."""
    assert cans_that_fit(0.20, 0.80) == 12


def test_too_many_cans_for_the_ring_are_refused_with_a_better_number(gas):
    text = (DEMO / CANS).read_text().replace("cans = 8", "cans = 90")
    case = loads_case(text, "many.toml")
    with pytest.raises(InfeasibleError) as caught:
        size(case, fuel_of(case), gas)
    assert "90 cans" in str(caught.value)
    assert "fill this ring" in caught.value.advice


def test_section_knows_its_layout():
    assert Section(4).layout == "can"
    assert Section(8, 0.8).layout == "can-annular"
    assert Section(1, 0.5).layout == "annular"
    assert Section(8, 0.8).casing_area(0.2) == pytest.approx(math.pi * 0.8 * 0.2)
    assert Section(8, 0.8).area(0.15) == pytest.approx(8 * math.pi / 4 * 0.15**2)
    assert math.isinf(Section(1, 0.5).largest_liner(0.1, 1e-3))


def channel(sketch, areas):
    """The plane channel that the ring becomes: both sides alike, by widths and gaps alone."""
    width = math.pi * sketch.section.mean_diameter
    hardware = metal_of(sketch, areas, drilled=False)
    gap = sketch.annulus_gap
    passage = AxialProfile.constant(width * gap), AxialProfile.constant(2.0 * gap)
    rows = []
    for opening in hardware.openings:
        twin = {"outer": "inner", "inner": "outer"}.get(opening.side)
        if twin is None:
            rows.append(opening)
            continue
        other = hardware.opening(opening.name.removesuffix(opening.side) + twin)
        both = 0.5 * (opening.count * opening.area + other.count * other.area)
        lip = opening.slot and replace(opening.slot, length=width)
        rows.append(replace(opening, area=both / opening.count, diameter=None, slot=lip))
    return replace(
        hardware,
        annuli=(Passage("outer", *passage), Passage("inner", *passage)),
        openings=tuple(rows),
    )


@pytest.mark.parametrize("widening", [1.0, 10.0, 100.0])
def test_ring_of_vanishing_curvature_is_a_plane_channel(ring_state, widening):
    """Mean diameter, flow and areas grow together; the sides' difference dies with curvature."""
    task, state = ring_state
    mean = widening * state.sketch.section.mean_diameter
    sketch = replace(
        state.sketch,
        section=Section(1, mean),
        inlet_area=widening * state.sketch.inlet_area,
        exit_area=widening * state.sketch.exit_area,
        swirlers=round(widening * state.sketch.swirlers),
    )
    areas = {name: widening * area for name, area in state.fit.areas.items()}
    for row in sketch.rows:
        total = sum(areas[name] for name in sketch.names(row.name))
        for name, share in zip(sketch.names(row.name), sketch.row_shares(row.name), strict=True):
            areas[name] = total * share
    for name in [ring.name for ring in sketch.slots] + ["leakage"]:
        total = sum(areas[one] for one in sketch.names(name))
        for one, share in zip(sketch.names(name), sketch.wall_shares(), strict=True):
            areas[one] = total * share
    inlet = replace(task.duty.inlet, mass_flow=widening * task.duty.inlet.mass_flow)
    gas = state.profile.liner_gas(widening * task.duty.fuel_flow)
    ring = split(metal_of(sketch, areas, drilled=False), inlet, gas)
    plane = split(channel(sketch, areas), inlet, gas)
    for row in sketch.rows:
        outer, inner = (ring.opening(name).mass_flow for name in sketch.names(row.name))
        flat = sum(plane.opening(name).mass_flow for name in sketch.names(row.name))
        assert (outer + inner) / flat == pytest.approx(1.0, abs=0.01 / widening)
        assert abs(outer / inner - 1.0) < 0.4 / widening
    assert ring.pressure_loss == pytest.approx(plane.pressure_loss, rel=0.02 / widening)


def test_a_stated_share_shifts_the_dilution_air_between_the_walls(sized, gas):
    """More through the outer wall cools the tip, less at the root; flame and loss stay."""
    text = (DEMO / RING).read_text() + 'outer_dilution = "62 %"\n'
    case = loads_case(text, "shifted.toml")
    design = size(case, fuel_of(case), gas)
    assert design.converged
    outer = design.split.opening("dilution-outer").mass_flow
    inner = design.split.opening("dilution-inner").mass_flow
    assert outer / (outer + inner) == pytest.approx(0.62, abs=0.01)
    before, after = sized[RING].design.hardware, design.hardware
    assert after.opening("dilution-outer").diameter > before.opening("dilution-outer").diameter
    assert after.opening("dilution-inner").diameter < before.opening("dilution-inner").diameter
