"""Metal that follows from other metal: areas, perimeters, heights from diameters.

The case file leaves these out; reading works them out and writing leaves out what reading
would work out, so both use the functions here.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from combustor.hardware.metal import AxialProfile, Edge, Feed, Layout, Role, Side, Swirler

QUARTER_PI = math.pi / 4.0

EDGE_OF_ROLE: dict[Role, Edge] = {
    "swirler": "swirler",
    "premixer": "orifice",
    "dome": "orifice",
    "primary": "plain",
    "secondary": "plain",
    "dilution": "plain",
    "film": "metering",
    "effusion": "metering",
    "leak": "orifice",
}
"""Discharge law of an opening whose row does not say."""


@dataclass(frozen=True)
class Ring:
    """Outer and inner diameters at stations, m; inner 0 for a round passage."""

    station: tuple[float, ...]
    outer: tuple[float, ...]
    inner: tuple[float, ...]


def round_area(diameter: float) -> float:
    """Return the area of a circle, m2."""
    return QUARTER_PI * diameter**2


def ring_area(outer: float, inner: float) -> float:
    """Return the area between two diameters, m2."""
    return QUARTER_PI * (outer - inner) * (outer + inner)


def swirler_area(swirler: Swirler) -> float:
    """Return the ring less the vanes, normal to the axis, m2."""
    span = swirler.tip_diameter - swirler.hub_diameter
    vanes = 0.5 * swirler.vane_count * swirler.vane_thickness * span
    return ring_area(swirler.tip_diameter, swirler.hub_diameter) - vanes


def edge_of(role: Role, has_vanes: bool) -> Edge:
    """Return the discharge law of a row that does not state one."""
    return "swirler" if has_vanes else EDGE_OF_ROLE[role]


def feed_of(role: Role, edge: Edge) -> Feed:
    """Return the driving pressure of a row that does not state one.

    Metering holes and leakage paths lie flush with the annulus wall and see its static
    pressure; holes, swirlers and dome openings face or turn the flow and see its total.
    """
    return "static" if edge == "metering" or role == "leak" else "total"


def side_of(role: Role) -> Side:
    """Return where a row that does not say is fed from."""
    return "dome" if role in ("swirler", "premixer", "dome") else "outer"


def liner_height(layout: Layout, liner: Ring) -> float:
    """Return the liner diameter (can) or height (annular), m: the largest along the axis."""
    if layout == "annular":
        return max((o - i) / 2.0 for o, i in zip(liner.outer, liner.inner, strict=True))
    return max(liner.outer)


def with_duct(
    area: AxialProfile, liner_length: float, transition_length: float, exit_area: float
) -> AxialProfile:
    """Return the liner area carried on through the transition duct to the exit, m2.

    Stations are those inside ``liner_length``, its end and the end of the duct; without a
    duct the area is returned as it is.
    """
    if transition_length <= 0.0:
        return area
    inside = [(x, a) for x, a in zip(area.station, area.value, strict=True) if x < liner_length]
    end = (liner_length, float(area.at(liner_length)))
    duct = (liner_length + transition_length, exit_area)
    stations, values = zip(*inside, end, duct, strict=True)
    return AxialProfile(stations, values)


def reference_area(layout: Layout, cans: int, annuli: Sequence[Ring]) -> float:
    """Return the casing cross-section with the liner taken out, whole machine, m2."""
    outer = max(annuli[0].outer)
    if layout == "annular":
        return ring_area(outer, min(annuli[-1].inner))
    return cans * round_area(outer)


def reference_height(layout: Layout, annuli: Sequence[Ring]) -> float:
    """Return the casing diameter (can) or casing height (annular), m."""
    outer = max(annuli[0].outer)
    return (outer - min(annuli[-1].inner)) / 2.0 if layout == "annular" else outer


def wall_perimeter(side: Side, liner: Ring) -> tuple[float, ...]:
    """Return the gas-side perimeter of a wall at the liner's stations, m."""
    diameters = liner.inner if side == "inner" else liner.outer
    return tuple(math.pi * diameter for diameter in diameters)


def casing_area_ratio(side: Side, annulus: Ring) -> float:
    """Return liner surface over casing surface across an annulus."""
    ratio = math.fsum(annulus.inner) / math.fsum(annulus.outer)
    return 1.0 / ratio if side == "inner" else ratio
