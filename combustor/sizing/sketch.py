"""Everything about the metal but the sizes of its openings, and the metal once they are known."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

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
from combustor.sizing import swirler as vanes
from combustor.sizing.diffuser import DiffuserShape
from combustor.sizing.drill import nearest_drill
from combustor.sizing.section import Section

RowName = Literal["primary", "secondary", "dilution"]

SWIRLER, DOME, LEAK = "swirler", "dome", "leakage"


@dataclass(frozen=True)
class Row:
    """One row of jets: name and role are the same word."""

    name: RowName
    station: float
    count: int


@dataclass(frozen=True)
class SlotRing:
    """One film slot: lip end, heights, and the drill of its metering holes; m."""

    name: str
    station: float
    height: float
    lip_thickness: float
    hole_diameter: float


@dataclass(frozen=True)
class VanePack:
    """Swirler as chosen; ``hub_diameter`` None keeps ``hub_ratio``. m and rad."""

    angle: float
    count: int
    thickness: float
    loss: float
    hub_ratio: float
    hub_diameter: float | None = None


@dataclass(frozen=True)
class Sheet:
    """Liner sheet, coating and casing surface; SI."""

    thickness: float
    conductivity: float
    emissivity: float
    casing_emissivity: float
    coating_thickness: float
    coating_conductivity: float
    roughness: float


@dataclass(frozen=True)
class Sketch:
    """The metal without the sizes of its openings. Lengths m, areas m2.

    ``zone_ends`` are the axial ends of primary, secondary and dilution zone; the last is the
    liner's. ``drill_step`` None leaves the steps to the drill series.
    """

    section: Section
    flow: Literal["straight", "reverse"]
    casing_height: float
    liner_height: float
    zone_ends: tuple[float, float, float]
    transition_length: float
    exit_area: float
    diffuser: DiffuserShape
    inlet_area: float
    vane_pack: VanePack
    dome_hole_diameter: float
    rows: tuple[Row, ...]
    slots: tuple[SlotRing, ...]
    hole_edge: Literal["plain", "plunged"]
    sheet: Sheet
    drill_step: float | None = None

    @property
    def liner_length(self) -> float:
        """Dome face to liner exit [m]."""
        return self.zone_ends[-1]

    @property
    def liner_area(self) -> float:
        """Flow area of one liner [m2]."""
        return self.section.area(self.liner_height) / self.section.cans

    @property
    def annulus_area(self) -> float:
        """Annulus area of one can [m2]."""
        outside = self.liner_height + 2.0 * self.sheet.thickness
        return (
            self.section.area(self.casing_height) - self.section.area(outside)
        ) / self.section.cans

    @property
    def annulus_gap(self) -> float:
        """Radial gap [m]."""
        return 0.5 * (self.casing_height - self.liner_height) - self.sheet.thickness

    @property
    def perimeter(self) -> float:
        """Gas-side perimeter of one liner [m]."""
        return self.section.perimeter(self.liner_height)

    def row(self, name: str) -> Row:
        """Return the row called ``name``; KeyError when there is none."""
        for row in self.rows:
            if row.name == name:
                return row
        raise KeyError(name)


def metal_of(sketch: Sketch, areas: Mapping[str, float], drilled: bool) -> Hardware:
    """Return the hardware of a sketch.

    Parameters
    ----------
    sketch : Sketch
    areas : mapping of str to float
        Geometric area of every opening by name, the whole row of one can [m2]
    drilled : bool
        Whole holes and drillable diameters; else the areas exactly.

    Returns
    -------
    Hardware
    """
    openings = [_swirler(sketch, areas[SWIRLER], drilled), _dome(sketch, areas[DOME], drilled)]
    openings += [_row(sketch, row, areas[row.name], drilled) for row in sketch.rows]
    openings += [_slot(sketch, ring, areas[ring.name], drilled) for ring in sketch.slots]
    openings.append(_leak(sketch, areas[LEAK], drilled))
    primary_end, secondary_end, liner_end = sketch.zone_ends
    return Hardware(
        layout="can",
        cans=sketch.section.cans,
        flow=sketch.flow,
        reference_area=sketch.section.area(sketch.casing_height),
        reference_height=sketch.casing_height,
        liner_height=sketch.liner_height,
        liner=_liner(sketch),
        liner_length=liner_end,
        transition_length=sketch.transition_length,
        exit_area=sketch.exit_area,
        annuli=(
            Passage(
                "outer",
                AxialProfile.constant(sketch.annulus_area),
                AxialProfile.constant(2.0 * sketch.annulus_gap),
            ),
        ),
        walls=(_wall(sketch),),
        diffuser=Diffuser(
            sketch.diffuser.kind,
            sketch.inlet_area,
            sketch.inlet_area * sketch.diffuser.area_ratio,
            sketch.diffuser.length,
            sketch.diffuser.loss_coefficient,
        ),
        openings=tuple(sorted(openings, key=lambda opening: opening.station)),
        zones=(
            Zone("primary", 0.0, primary_end),
            Zone("secondary", primary_end, secondary_end),
            Zone("dilution", secondary_end, liner_end),
        ),
        injectors=(Injector("main", 1.0, (SWIRLER,)),),
        roughness=sketch.sheet.roughness,
    )


def beam_length(sketch: Sketch) -> float:
    """Return the mean radiation path to the wall of a round liner, 0.6 diameters [m]."""
    return 0.6 * sketch.liner_height


def vane_pack_of(pack: VanePack, area: float, drilled: bool) -> Swirler:
    """Return the vane pack whose passage has an area [m2], to 0.1 mm when drilled."""
    if pack.hub_diameter is None:
        tip = vanes.tip_diameter(area, pack.count, pack.thickness, pack.hub_ratio)
        hub = pack.hub_ratio * tip
    else:
        hub = pack.hub_diameter
        tip = vanes.tip_diameter_on_hub(area, pack.count, pack.thickness, hub)
    if drilled and pack.hub_diameter is None:
        hub = round(hub, 4)
        tip = vanes.tip_diameter_on_hub(area, pack.count, pack.thickness, hub)
    if drilled:
        tip = round(tip, 4)
    return Swirler(hub, tip, pack.angle, pack.count, pack.thickness, pack.loss)


def _swirler(sketch: Sketch, area: float, drilled: bool) -> Opening:
    made = vane_pack_of(sketch.vane_pack, area, drilled)
    passage = vanes.passage_area(
        made.hub_diameter, made.tip_diameter, made.vane_count, made.vane_thickness
    )
    return Opening(SWIRLER, "swirler", "dome", 0.0, 1, passage, "swirler", "total", swirler=made)


def _dome(sketch: Sketch, area: float, drilled: bool) -> Opening:
    count, one, diameter = _many_holes(area, sketch.dome_hole_diameter, drilled)
    return Opening(DOME, "dome", "dome", 0.0, count, one, "orifice", "total", diameter)


def _row(sketch: Sketch, row: Row, area: float, drilled: bool) -> Opening:
    diameter = math.sqrt(4.0 * area / (math.pi * row.count))
    if drilled:
        diameter = nearest_drill(diameter, sketch.drill_step)
    one = 0.25 * math.pi * diameter**2
    return Opening(
        row.name,
        row.name,
        "outer",
        row.station,
        row.count,
        one,
        sketch.hole_edge,
        "total",
        diameter,
    )


def _slot(sketch: Sketch, ring: SlotRing, area: float, drilled: bool) -> Opening:
    count, one, diameter = _many_holes(area, ring.hole_diameter, drilled)
    return Opening(
        ring.name,
        "film",
        "outer",
        ring.station,
        count,
        one,
        "metering",
        "static",
        diameter,
        slot=Slot(ring.height, ring.lip_thickness, sketch.perimeter),
    )


def _leak(sketch: Sketch, area: float, drilled: bool) -> Opening:
    # a leak is not drilled; a tenth of a square millimetre is how it is written down
    size = round(area, 7) if drilled else area
    return Opening(LEAK, "leak", "outer", sketch.liner_length, 1, size, "orifice", "static")


def _many_holes(area: float, drill: float, drilled: bool) -> tuple[int, float, float]:
    """Return count, area of one and diameter of the holes that make up an area."""
    count = max(round(area / (0.25 * math.pi * drill**2)), 1)
    diameter = drill if drilled else math.sqrt(4.0 * area / (math.pi * count))
    return count, 0.25 * math.pi * diameter**2, diameter


def _liner(sketch: Sketch) -> Passage:
    area, end = sketch.liner_area, sketch.liner_length
    hydraulic = sketch.section.hydraulic_diameter(sketch.liner_height)
    if sketch.transition_length <= 0.0:
        return Passage("liner", AxialProfile.constant(area), AxialProfile.constant(hydraulic))
    stations = (0.0, end, end + sketch.transition_length)
    return Passage(
        "liner",
        AxialProfile(stations, (area, area, sketch.exit_area)),
        AxialProfile.constant(hydraulic),
    )


def _wall(sketch: Sketch) -> LinerWall:
    outside = sketch.liner_height + 2.0 * sketch.sheet.thickness
    return LinerWall(
        side="outer",
        perimeter=AxialProfile.constant(sketch.perimeter),
        beam_length=beam_length(sketch),
        thickness=sketch.sheet.thickness,
        conductivity=sketch.sheet.conductivity,
        emissivity=sketch.sheet.emissivity,
        casing_emissivity=sketch.sheet.casing_emissivity,
        casing_area_ratio=sketch.section.perimeter(outside)
        / sketch.section.perimeter(sketch.casing_height),
        coating_thickness=sketch.sheet.coating_thickness,
        coating_conductivity=sketch.sheet.coating_conductivity,
    )
