"""Where one layout becomes another, the air splits alike."""

from dataclasses import replace

import metal_samples as metal
import pytest

from combustor.airflow.split import split
from combustor.hardware.metal import AxialProfile, Passage


def test_can_annular_of_one_can_with_the_same_annulus_is_a_can():
    can = metal.can()
    ring = replace(can, layout="can-annular", cans=1)
    gas = metal.fire(can, 0.245)
    one, other = split(can, metal.can_inlet(), gas), split(ring, metal.can_inlet(), gas)
    assert one.pressure_loss == other.pressure_loss
    for flow in one.openings:
        assert other.opening(flow.name).mass_flow == flow.mass_flow
        assert other.opening(flow.name).penetration == flow.penetration


def test_annulus_of_another_shape_but_equal_hydraulic_diameter_is_the_same():
    """Only area and hydraulic diameter of the passage between cans count."""
    can = metal.can(cans=3)
    passage = can.annuli[0]
    same = Passage("outer", passage.area, passage.hydraulic_diameter)
    ring = replace(can, layout="can-annular", annuli=(same,))
    inlet = metal.can_inlet(3.0)
    assert split(ring, inlet).pressure_loss == split(can, inlet).pressure_loss


def test_a_tighter_passage_between_cans_costs_friction():
    ring, inlet = metal.can_annular(), metal.can_inlet(3.0)
    tight = Passage("outer", ring.annuli[0].area, AxialProfile.constant(0.02))
    wide, narrow = split(ring, inlet), split(replace(ring, annuli=(tight,)), inlet)
    lost = narrow.annuli[0].total_pressure
    assert lost[0] - lost[-1] > 1.5 * (
        wide.annuli[0].total_pressure[0] - wide.annuli[0].total_pressure[-1]
    )


@pytest.mark.parametrize("fuel", [None, 0.50], ids=["cold", "fired"])
def test_annular_with_equal_sides_feeds_both_alike(fuel):
    """A plane channel: both annuli and both walls the same."""
    ring = metal.annular()
    outer = ring.annuli[0]
    inner = Passage("inner", outer.area, outer.hydraulic_diameter)
    rows = []
    for opening in ring.openings:
        if opening.side == "inner":
            twin = opening.name.replace("inner", "outer")
            rows.append(replace(ring.opening(twin), name=opening.name, side="inner"))
        elif opening.role == "leak":
            continue
        else:
            rows.append(opening)
    plane = replace(ring, annuli=(outer, inner), openings=tuple(rows))
    gas = None if fuel is None else metal.fire(plane, fuel)
    solved = split(plane, metal.annular_inlet(), gas)
    for opening in plane.openings:
        if opening.side == "inner":
            twin = solved.opening(opening.name.replace("inner", "outer"))
            assert solved.opening(opening.name).mass_flow == pytest.approx(twin.mass_flow, rel=1e-9)
