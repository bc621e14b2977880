import math
from dataclasses import replace

import pytest

from combustor.rating.drilled import crowded_rows


def around(metal, row):
    (wall,) = metal.walls
    return float(wall.perimeter.at(row.station))


def test_sized_metal_has_room_between_its_holes(bench):
    assert list(crowded_rows(bench.design.hardware)) == []


@pytest.mark.parametrize(("pitch", "level"), [(1.49, "watch"), (1.01, "watch"), (0.9, "act")])
def test_row_with_too_little_between_its_holes_is_named(bench, pitch, level):
    row = bench.design.hardware.opening("primary")
    wide = around(bench.design.hardware, row) / (row.count * pitch)
    metal = bench.with_row("primary", diameter=wide, area=math.pi / 4.0 * wide**2)
    (finding,) = crowded_rows(metal)
    assert finding.level == level
    assert "primary" in finding.what
    assert finding.value == pytest.approx(pitch)
    assert finding.limit == 1.5


def test_as_many_holes_as_the_advice_allows_are_not_named(bench):
    row = bench.design.hardware.opening("primary")
    crowd = bench.with_row("primary", count=10 * row.count)
    (finding,) = crowded_rows(crowd)
    most = int(finding.advice.split("where ")[1].split(" fit")[0])
    assert list(crowded_rows(bench.with_row("primary", count=most))) == []
    (more,) = crowded_rows(bench.with_row("primary", count=most + 1))
    assert more.level == "watch"


def test_rows_without_a_diameter_are_not_judged(bench):
    metal = bench.design.hardware
    bare = tuple(replace(row, diameter=None) for row in metal.openings)
    assert list(crowded_rows(replace(metal, openings=bare))) == []
