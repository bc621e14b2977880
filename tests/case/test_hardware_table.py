"""The [hardware] table: every contradiction in the metal is refused at its place."""

import pytest
from case_samples import GOOD, HARDWARE, swap

from combustor.base.errors import InputError
from combustor.case import loads_case

# (old, new, key, fact): one slip each in a table that is otherwise good
SLIPS = [
    ('liner_length = "900 mm"\n', "", "hardware.liner_length", "missing"),
    ('liner = { diameter = "372 mm" }\n', "", "hardware.liner", "missing"),
    ('liner = { diameter = "372 mm" }', "liner = {}", "hardware.liner", "not clear"),
    ('liner = { diameter = "372 mm" }', 'liner = { diameter = 0.3, area = 0.1 }',
     "hardware.liner", "not clear"),
    ('liner = { diameter = "372 mm" }', "liner = { diameter = [0.3, 0.2] }",
     "hardware.liner.diameter", "2 values for 1 station"),
    ('liner = { diameter = "372 mm" }', "liner = { diameter = [0.3], station = [0, 0.2] }",
     "hardware.liner.diameter", "1 values for 2 stations"),
    ('liner = { diameter = "372 mm" }',
     "liner = { diameter = [0.3, 0.2], station = [0.2, 0.2] }",
     "hardware.liner.station", "do not rise"),
    ('liner = { diameter = "372 mm" }',
     "liner = { diameter = [0.3, 0.3], station = [0, 1], runs_to_exit = true }",
     "hardware.liner.station", "in the transition duct"),
    ('liner = { diameter = "372 mm" }',
     "liner = { diameter = 0.3, runs_to_exit = 1 }",
     "hardware.liner.runs_to_exit", "neither true nor false"),
    ('inner_diameter = "374.4 mm"', 'inner_diameter = "474.4 mm"',
     "hardware.annuli[0].inner_diameter", "not smaller"),
    ('outer_diameter = "440 mm"', 'outer_diameter = "440 mm"\nside = "inner"',
     "hardware.annuli", "sides are inner"),
    ('primary_end = "260 mm"', 'primary_end = "460 mm"', "hardware.zones.secondary_end",
     "not behind primary_end"),
    ('primary_end = "260 mm"', "primary_end = 0", "hardware.zones.primary_end", "dome face"),
    ('secondary_end = "440 mm"', 'secondary_end = "940 mm"', "hardware.zones.secondary_end",
     "not before the end"),
    ('kind = "dump"', 'kind = "dmup"', "hardware.diffuser.kind", "not one of the choices"),
    ('thickness = "1.2 mm"\n[[hardware.openings]]\nname = "swirler"',
     'thicknes = "1.2 mm"\n[[hardware.openings]]\nname = "swirler"',
     "hardware.walls[0].thicknes", "unknown key"),
    ('role = "primary"', 'role = "primery"', "hardware.openings[2].role", "not one of the"),
    ('name = "dilution row"', 'name = "primary row"', "hardware.openings[3].name",
     "the same name twice"),
    ("count = 8", "count = 8.5", "hardware.openings[2].count", "not a whole number"),
    ("count = 8", "count = -8", "hardware.openings[2].count", "outside 0"),
    ('diameter = "18.1 mm"\n', "", "hardware.openings[2]", "without size"),
    ('diameter = "18.1 mm"', 'diameter = "18.1 mm"\narea = "250 mm2"',
     "hardware.openings[2].area", "contradicts diameter"),
    ('diameter = "18.1 mm"', "diameter = 18.1", "hardware.openings[2].diameter",
     "bare numbers are m"),
    ('diameter = "18.1 mm"', 'diameter = "18.1 mm"\nside = "inner"',
     "hardware.openings[2].side", "no inner annulus"),
    ('diameter = "18.1 mm"', 'diameter = "18.1 mm"\nedge = "swirler"',
     "hardware.openings[2].edge", "without vanes"),
    ('diameter = "18.1 mm"',
     'diameter = "18.1 mm"\nslot = { height = 0.002, lip_thickness = 0.001 }',
     "hardware.openings[2].slot", "a film lip on a primary opening"),
    ('x = "500 mm"', 'x = "950 mm"', "hardware.openings[3].x", "not on the liner"),
    ('effective_area = "180 mm2"', 'effective_area = "180 mm2"\ndischarge_coefficient = 0.6',
     "hardware.openings[4].discharge_coefficient", "contradicts effective_area"),
    ('effective_area = "180 mm2"', 'effective_area = "180 mm2"\ncount = 0',
     "hardware.openings[4].count", "no holes"),
    ('hub_diameter = "50 mm"', 'hub_diameter = "150 mm"',
     "hardware.openings[0].swirler.hub_diameter", "not smaller than tip"),
    ('vane_count = 12\nvane_thickness = "1.2 mm"', 'vane_count = 12\nvane_thickness = "30 mm"',
     "hardware.openings[0].swirler.vane_count",
     "the vanes fill the ring"),
    ('vane_angle = "45 deg"', "vane_angle = 45", "hardware.openings[0].swirler.vane_angle",
     "bare numbers are rad"),
    ('role = "swirler"', 'role = "dome"', "hardware.openings[0].swirler", "a vane pack on a dome"),
    ("share = 1", "share = 0.9", "hardware.injectors", "the shares sum to 90 %"),
    ('openings = ["swirler"]', 'openings = ["swiler"]', "hardware.injectors[0].openings[0]",
     "no such opening"),
]  # fmt: skip


@pytest.mark.parametrize(("old", "new", "key", "fact"), SLIPS, ids=[s[2] for s in SLIPS])
def test_a_slip_in_the_metal_is_refused(old: str, new: str, key: str, fact: str) -> None:
    with pytest.raises(InputError) as caught:
        loads_case(swap(GOOD + HARDWARE, old, new), "rig.toml")
    (problem,) = caught.value.problems
    assert problem.key is not None
    assert problem.key.split(" (")[0] == key
    assert fact in problem.what
    assert problem.line is not None


@pytest.mark.parametrize(
    ("old", "keys"),
    [
        ('exit_annulus = { inner = "430 mm", outer = "520 mm" }\n', {"hardware.exit_area"}),
        ('inlet_annulus = { inner = "403 mm", outer = "445 mm" }\n',
         {"hardware.diffuser.inlet_area"}),
    ],
)  # fmt: skip
def test_what_follows_from_the_envelope_must_be_there(old: str, keys: set[str]) -> None:
    with pytest.raises(InputError) as caught:
        loads_case(swap(GOOD + HARDWARE, old, ""))
    assert {problem.key for problem in caught.value.problems} == keys


def test_what_does_not_follow_from_areas_must_be_stated() -> None:
    text = swap(
        GOOD + HARDWARE,
        'liner = { diameter = "372 mm" }',
        'liner = { area = "1087 cm2", hydraulic_diameter = "372 mm" }',
    )
    text = swap(
        text,
        'outer_diameter = "440 mm"\ninner_diameter = "374.4 mm"',
        'area = "420 cm2"\nhydraulic_diameter = "65.6 mm"',
    )
    with pytest.raises(InputError) as caught:
        loads_case(text)
    assert {problem.key for problem in caught.value.problems} == {
        "hardware.liner_height",
        "hardware.reference_area",
        "hardware.reference_height",
        "hardware.walls[0].perimeter",
        "hardware.walls[0].casing_area_ratio",
    }
