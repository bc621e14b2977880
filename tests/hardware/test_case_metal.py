"""Metal through the case file: derived areas, defaults, and the round trip."""

import dataclasses
import math
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.case import loads_case, override
from combustor.case.schema import Case, Combustor
from combustor.case.write import complete
from combustor.hardware import derived
from combustor.hardware.beam_length import beam_length
from combustor.hardware.from_case import hardware_of
from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Hardware,
    Injector,
    LinerWall,
    Opening,
    Passage,
    Slot,
    Swirler,
    Zone,
)
from combustor.hardware.to_case import table_of

CONST = AxialProfile.constant

HEAD = """\
[combustor]
layout = "{layout}"
cans = {cans}
flow = "{flow}"
{envelope}
inlet_annulus = {{ inner = "403 mm", outer = "445 mm" }}
exit_annulus = {{ inner = "430 mm", outer = "520 mm" }}
transition_length = "250 mm"
[fuel]
name = "natural-gas"
[[points]]
name = "full"
kind = "rated"
air_flow = "14.2 kg/s"
inlet_pressure = "9.9 bar"
inlet_temperature = "325 degC"
exit_temperature = "1000 degC"
"""

CAN = """
[hardware]
liner_length = "900 mm"
liner = { diameter = "372 mm" }
zones = { primary_end = "260 mm", secondary_end = "440 mm" }
diffuser = { kind = "dump", exit_area = "500 cm2", length = "100 mm", loss_coefficient = 0.45 }
[[hardware.annuli]]
outer_diameter = "440 mm"
inner_diameter = "374.4 mm"
[[hardware.walls]]
thickness = "1.2 mm"
[[hardware.openings]]
name = "dilution"
role = "dilution"
x = "500 mm"
count = 10
diameter = "30 mm"
[[hardware.openings]]
name = "leak"
role = "leak"
x = "900 mm"
effective_area = "180 mm2"
[[hardware.openings]]
name = "vanes"
role = "swirler"
[hardware.openings.swirler]
hub_diameter = "50 mm"
tip_diameter = "120 mm"
vane_angle = "45 deg"
vane_count = 12
vane_thickness = "1.2 mm"
[[hardware.openings]]
name = "film"
role = "film"
x = "100 mm"
count = 120
diameter = "3 mm"
slot = { height = "2.5 mm", lip_thickness = "1 mm" }
"""


def head(layout: str = "can", cans: int = 1, flow: str = "straight", envelope: str = "") -> str:
    return HEAD.format(layout=layout, cans=cans, flow=flow, envelope=envelope)


def can_case() -> Case:
    return loads_case(head(envelope='casing_diameter = "440 mm"') + CAN)


def test_areas_follow_from_diameters() -> None:
    metal = hardware_of(can_case())
    assert metal.reference_area == pytest.approx(math.pi / 4 * 0.44**2, rel=1e-14)
    assert (metal.reference_height, metal.liner_height) == (0.44, 0.372)
    assert metal.liner.area.value[0] == pytest.approx(math.pi / 4 * 0.372**2, rel=1e-14)
    annulus = metal.annuli[0]
    assert annulus.area.value[0] == pytest.approx(math.pi / 4 * (0.44**2 - 0.3744**2), rel=1e-13)
    assert annulus.hydraulic_diameter.value[0] == pytest.approx(2 * 0.0328, rel=1e-13)
    assert metal.opening("dilution").area == pytest.approx(math.pi / 4 * 0.03**2, rel=1e-14)
    assert metal.walls[0].perimeter.value[0] == pytest.approx(math.pi * 0.372, rel=1e-14)
    assert metal.walls[0].casing_area_ratio == pytest.approx(0.3744 / 0.44, rel=1e-14)
    assert metal.exit_area == pytest.approx(math.pi / 4 * (0.52**2 - 0.43**2), rel=1e-13)
    assert metal.diffuser.inlet_area == pytest.approx(
        math.pi / 4 * (0.445**2 - 0.403**2), rel=1e-13
    )
    assert metal.volume(0.0, 0.9) == pytest.approx(0.9 * math.pi / 4 * 0.372**2, rel=1e-13)


def test_swirler_area_is_the_ring_less_its_vanes() -> None:
    # Lefebvre's swirler geometry, from memory: pi/4 (D^2 - d^2) - n t (D - d) / 2
    by_hand = math.pi / 4 * (0.12**2 - 0.05**2) - 12 * 0.0012 * 0.07 / 2
    assert hardware_of(can_case()).opening("vanes").area == pytest.approx(by_hand, rel=1e-14)


def test_rows_are_sorted_and_defaults_follow_from_the_role() -> None:
    metal = hardware_of(can_case())
    assert [o.name for o in metal.openings] == ["vanes", "film", "dilution", "leak"]
    assert [(o.side, o.edge, o.feed) for o in metal.openings] == [
        ("dome", "swirler", "total"),
        ("outer", "metering", "static"),
        ("outer", "plain", "total"),
        ("outer", "orifice", "static"),
    ]
    leak = metal.opening("leak")
    assert (leak.effective_area, leak.area, leak.diameter) == (180e-6, 180e-6, None)
    slot = metal.opening("film").slot
    assert slot is not None
    assert slot.length == pytest.approx(math.pi * 0.372, rel=1e-14)


def test_zones_are_contiguous_and_fill_the_liner() -> None:
    zones = hardware_of(can_case()).zones
    assert [(z.name, z.start, z.end) for z in zones] == [
        ("primary", 0.0, 0.26),
        ("secondary", 0.26, 0.44),
        ("dilution", 0.44, 0.9),
    ]


def test_one_edited_diameter_moves_its_area_alone() -> None:
    case = can_case()
    before, after = (
        hardware_of(case),
        hardware_of(override(case, "hardware.openings.dilution.diameter", "31.5 mm")),
    )
    assert after.opening("dilution").area == pytest.approx(
        before.opening("dilution").area * 1.05**2, rel=1e-13
    )
    assert [o for o in after.openings if o.name != "dilution"] == [
        o for o in before.openings if o.name != "dilution"
    ]
    assert dataclasses.replace(after, openings=before.openings) == before


def test_a_liner_that_runs_to_the_exit_tapers_through_the_duct() -> None:
    text = (head(envelope='casing_diameter = "440 mm"') + CAN).replace(
        'liner = { diameter = "372 mm" }', 'liner = { diameter = "372 mm", runs_to_exit = true }'
    )
    metal = hardware_of(loads_case(text))
    assert metal.liner.area.station == (0.0, 0.9, 1.15)
    full = math.pi / 4 * 0.372**2
    # half-way through the duct the area is the mean of both its ends
    assert float(metal.liner.area.at(1.025)) == pytest.approx((full + metal.exit_area) / 2)
    assert metal.liner.hydraulic_diameter == AxialProfile.constant(0.372)
    assert table_of(metal)["liner"] == {"diameter": "372 mm", "runs_to_exit": True}


def test_a_case_without_metal_says_what_to_do() -> None:
    envelope = 'casing_diameter = "440 mm"\ncasing_length = "1150 mm"'
    case = loads_case(head(envelope=envelope) + '[targets]\npressure_loss = "4.5 %"\n')
    with pytest.raises(InputError, match="combustor size"):
        hardware_of(case)


@pytest.mark.parametrize(
    ("layout", "side", "expected"),
    [
        pytest.param("can", "outer", 0.6, id="Lefebvre 1983, from memory: can 0.6 D"),
        pytest.param("annular", "inner", 1.0, id="Lefebvre 1983, from memory: inner 1.0 H"),
        pytest.param("annular", "outer", 1.2, id="Lefebvre 1983, from memory: outer 1.2 H"),
    ],
)
def test_beam_length(layout: Any, side: Any, expected: float) -> None:
    assert beam_length(layout, side, 1.0) == expected


def test_a_hole_whose_area_is_not_round_is_not_written_as_round() -> None:
    metal = hardware_of(can_case())
    wrong = dataclasses.replace(metal.opening("dilution"), area=1e-3)
    with pytest.raises(ValueError, match="not that of a round hole"):
        table_of(dataclasses.replace(metal, openings=(wrong,)))


def assert_same(one: Any, other: Any, place: str = "") -> None:
    """Equal structure, equal words, numbers within 1e-12."""
    if dataclasses.is_dataclass(one):
        assert type(one) is type(other), place
        for field in dataclasses.fields(one):
            name = f"{place}.{field.name}"
            assert_same(getattr(one, field.name), getattr(other, field.name), name)
    elif isinstance(one, tuple):
        assert len(one) == len(other), place
        for index, (a, b) in enumerate(zip(one, other, strict=True)):
            assert_same(a, b, f"{place}[{index}]")
    elif isinstance(one, float):
        assert other == pytest.approx(one, rel=1e-12, abs=0.0), place
    else:
        assert one == other, place


def round_trip(metal: Hardware, combustor_text: str, beside: Combustor | None) -> Hardware:
    text = complete(combustor_text, table_of(metal, beside))
    return hardware_of(loads_case(text))


def test_the_written_table_holds_nothing_that_follows() -> None:
    case = can_case()
    table = table_of(hardware_of(case), case.combustor)
    assert set(table) == {
        "liner_length", "roughness", "zones", "diffuser", "liner", "annuli", "walls", "openings",
    }  # fmt: skip
    assert table["liner"] == {"diameter": "372 mm"}
    assert table["annuli"] == [
        {"side": "outer", "outer_diameter": "440 mm", "inner_diameter": "374.4 mm"}
    ]
    assert table["openings"][2] == {
        "name": "dilution",
        "role": "dilution",
        "x": "500 mm",
        "count": 10,
        "diameter": "30 mm",
    }
    assert table["openings"][1]["slot"] == {"height": "2.5 mm", "lip_thickness": "1 mm"}


def test_a_written_can_is_the_same_metal() -> None:
    case = can_case()
    metal = hardware_of(case)
    base = head(envelope='casing_diameter = "440 mm"')
    text = complete(base + "[targets]\n", table_of(metal, case.combustor))
    assert hardware_of(loads_case(text)) == metal


LENGTH = st.floats(0.1, 2.0)
TAPER = AxialProfile((0.0, 1.0), (1.0, 2.0))
FRACTION = st.floats(0.05, 0.95)


@st.composite
def cans(draw: st.DrawFn) -> tuple[Hardware, str]:
    """Can or can-annular metal with odd numbers everywhere."""
    layout = draw(st.sampled_from(["can", "can-annular"]))
    count = draw(st.integers(2, 12))
    casing, length = draw(LENGTH), draw(LENGTH)
    liner = casing * draw(FRACTION)
    inner = liner + (casing - liner) * draw(st.floats(0.01, 0.3))
    stations = draw(st.sampled_from([(0.0,), (0.0, 0.3 * length), (0.01, 0.2, 0.7)]))
    diameters = tuple(liner * (1 - 0.1 * i) for i in range(len(stations)))
    tapered = AxialProfile(stations, tuple(math.pi / 4 * d**2 for d in diameters))
    transition, exit_area = draw(st.sampled_from([0.0, 0.25, 0.1 + 0.2])), draw(st.floats(1e-3, 1))
    if transition and stations[-1] < length and draw(st.booleans()):
        tapered = AxialProfile(
            (*stations, length, length + transition), (*tapered.value, tapered.value[-1], exit_area)
        )
    annulus = Passage("outer", CONST(math.pi / 4 * (casing**2 - inner**2)), CONST(casing - inner))
    hole = draw(st.floats(1e-3, 0.1))
    hub, tip = sorted((0.2 * liner * draw(FRACTION), 0.3 * liner))
    vanes = Swirler(hub, tip, draw(st.floats(0.1, 1.4)), 8, 6e-5, 1.3)
    exact = draw(st.booleans())
    area = derived.swirler_area(vanes) if exact else draw(st.floats(1e-4, 1e-2))
    metal = Hardware(
        layout=layout,  # type: ignore[arg-type]
        cans=count,
        flow=draw(st.sampled_from(["straight", "reverse"])),
        reference_area=draw(st.sampled_from([count * math.pi / 4 * casing**2, 0.321])),
        reference_height=draw(st.sampled_from([casing, 0.2])),
        liner_height=draw(st.sampled_from([liner, 0.1234567])),
        liner=Passage("liner", tapered, AxialProfile(stations, diameters)),
        liner_length=length,
        transition_length=transition,
        exit_area=exit_area,
        annuli=(annulus,),
        walls=(
            LinerWall(
                "outer",
                draw(st.sampled_from([CONST(math.pi * liner), TAPER])),
                draw(st.sampled_from([0.6 * liner, 0.111])),
                draw(st.floats(1e-4, 1e-2)),
                draw(st.floats(1.0, 40.0)),
                0.8,
                draw(FRACTION),
                draw(st.sampled_from([inner / casing, 0.777])),
                draw(st.sampled_from([0.0, 3e-4])),
                1.1,
            ),
        ),
        diffuser=Diffuser("faired", draw(st.floats(1e-3, 1.0)), 0.3, 0.0, draw(FRACTION)),
        openings=(
            Opening("v", "swirler", "dome", 0.0, 1, area, "swirler", "total", swirler=vanes),
            Opening("d", "dome", "dome", 0.0, 40, 1.23e-5, "orifice", "static"),
            Opening("p", "primary", "outer", 0.2 * length, 0, math.pi / 4 * hole**2, "plunged",
                    "total", diameter=hole, discharge_coefficient=draw(FRACTION)),
            Opening("f", "film", "outer", 0.3 * length, 99, math.pi / 4 * 0.003**2, "metering",
                    "total", diameter=0.003, effective_area=draw(st.floats(1e-5, 1e-2)),
                    slot=Slot(0.002, 0.001, draw(LENGTH))),
            Opening("e", "leak", "outer", length, 3, 1e-4, "orifice", "total",
                    effective_area=3e-4),
        ),
        zones=(Zone("primary", 0.0, 0.25 * length), Zone("secondary", 0.25 * length, 0.5 * length),
               Zone("dilution", 0.5 * length, length)),
        injectors=(Injector("a", 0.3, ("v",)), Injector("b", 0.7, ())),
        roughness=draw(st.sampled_from([0.0, 1.5e-6, 1.7e-5])),
    )  # fmt: skip
    ring = 'casing_outer_diameter = "1.5 m"\ncasing_inner_diameter = "0.7 m"'
    envelope = ring if layout == "can-annular" else 'casing_diameter = "440 mm"'
    return metal, head(layout, count, metal.flow, envelope)


@settings(derandomize=True, max_examples=60, deadline=None)
@given(cans(), st.booleans())
def test_any_can_survives_the_case_file(sample: tuple[Hardware, str], beside: bool) -> None:
    metal, text = sample
    combustor = None
    if beside:
        combustor = Combustor.model_validate(
            {"layout": metal.layout, "cans": metal.cans}
            | {"casing_outer_diameter": 1.5, "casing_inner_diameter": 0.7}
            | {"inlet_annulus": {"inner": 0.403, "outer": 0.445}}
            | {"exit_annulus": {"inner": 0.43, "outer": 0.52}, "transition_length": 0.25}
        )
    assert_same(metal, round_trip(metal, text, combustor), "hardware")


@settings(derandomize=True, max_examples=40, deadline=None)
@given(
    st.lists(st.floats(0.05, 0.2), min_size=4, max_size=4),
    st.floats(0.2, 0.8),
    st.booleans(),
)
def test_an_annular_liner_survives_the_case_file(
    steps: list[float], start: float, follows: bool
) -> None:
    # casing inside, liner inside, liner outside, casing outside
    d = [start + sum(steps[:i]) for i in range(4)]
    rings = {"inner": (d[1], d[0]), "liner": (d[2], d[1]), "outer": (d[3], d[2])}
    passages = {
        side: Passage(
            side,  # type: ignore[arg-type]
            CONST(math.pi / 4 * (outer**2 - inner**2)),
            CONST(outer - inner),
        )
        for side, (outer, inner) in rings.items()
    }
    height = (d[2] - d[1]) / 2
    factor = 1.0 if follows else 1.1

    def wall(side: Any, diameter: float, path: float, ratio: float) -> LinerWall:
        perimeter = CONST(factor * math.pi * diameter)
        return LinerWall(side, perimeter, path, 1e-3, 20.0, 0.7, 0.8, factor * ratio)

    metal = Hardware(
        layout="annular",
        cans=1,
        flow="straight",
        reference_area=math.pi / 4 * (d[3] ** 2 - d[0] ** 2),
        reference_height=(d[3] - d[0]) / 2,
        liner_height=height,
        liner=passages["liner"],
        liner_length=0.3,
        transition_length=0.0,
        exit_area=0.05,
        annuli=(passages["outer"], passages["inner"]),
        walls=(
            wall("outer", d[2], 1.2 * height, d[2] / d[3]),
            wall("inner", d[1], 1.0 * height, d[1] / d[0]),
        ),
        diffuser=Diffuser("dump", 0.03, 0.06, 0.1, 0.5),
        openings=(
            Opening("i", "primary", "inner", 0.1, 20, math.pi / 4 * 0.01**2, "plain", "total",
                    diameter=0.01),
            Opening("o", "primary", "outer", 0.1, 20, math.pi / 4 * 0.01**2, "plain", "total",
                    diameter=0.01),
        ),
        zones=(Zone("primary", 0.0, 0.1), Zone("secondary", 0.1, 0.2), Zone("dilution", 0.2, 0.3)),
    )  # fmt: skip
    table = table_of(metal)
    assert ("perimeter" in table["walls"][0]) is (not follows)
    envelope = 'casing_outer_diameter = "1.5 m"\ncasing_inner_diameter = "0.2 m"'
    text = complete(head("annular", envelope=envelope), table)
    assert_same(metal, hardware_of(loads_case(text)), "hardware")


def test_sized_metal_survives_its_own_case_file() -> None:
    import combustor

    case = combustor.load_case(Path(__file__).parents[2] / "demo" / "industrial_can.toml")
    metal = combustor.size(case).hardware
    text = complete(case.text, table_of(metal, case.combustor))
    assert_same(metal, hardware_of(loads_case(text)), "hardware")
    assert text.startswith(case.text)
