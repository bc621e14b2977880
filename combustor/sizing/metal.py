"""The metal of a sketch once the areas of its openings are known."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from typing import Literal

from combustor.hardware.beam_length import beam_length
from combustor.hardware.derived import swirler_area
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
from combustor.sizing.drill import drill_step, nearest_drill
from combustor.sizing.sketch import (
    CROSS_FIRE,
    DOME,
    LEAK,
    PREMIXER,
    SWIRLER,
    Row,
    SideShape,
    Sketch,
    SlotRing,
    VanePack,
)

# wall between pilot and premixer, over the pilot's tip diameter
PILOT_WALL = 1.10
CROSS_FIRE_TUBES = 2
SMALL_PACK = 40e-3
FEW_HOLES = 60
CROSS_FIRE_STATION = 0.6


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
    front = _front(sketch, areas, drilled)
    openings = [*front]
    for row in sketch.rows:
        openings += _row(sketch, row, areas, drilled)
    for ring in sketch.slots:
        openings += _slot(sketch, ring, areas, drilled)
    openings += _leaks(sketch, areas, drilled)
    primary_end, secondary_end, liner_end = sketch.zone_ends
    section = sketch.section
    return Hardware(
        layout=section.layout,
        cans=section.cans,
        flow=sketch.flow,
        reference_area=section.casing_area(sketch.casing_height),
        reference_height=sketch.casing_height,
        liner_height=sketch.liner_height,
        liner=_liner(sketch),
        liner_length=liner_end,
        transition_length=sketch.transition_length,
        exit_area=sketch.exit_area,
        annuli=tuple(
            Passage(
                shape.side,
                AxialProfile.constant(shape.annulus_area),
                AxialProfile.constant(shape.annulus_diameter),
            )
            for shape in sketch.sides
        ),
        walls=tuple(_wall(sketch, shape) for shape in sketch.sides),
        diffuser=_diffuser(sketch),
        openings=tuple(sorted(openings, key=lambda opening: opening.station)),
        zones=(
            Zone("primary", 0.0, primary_end),
            Zone("secondary", primary_end, secondary_end),
            Zone("dilution", secondary_end, liner_end),
        ),
        injectors=_injectors(sketch, front),
        roughness=sketch.sheet.roughness,
    )


def opening_names(sketch: Sketch) -> tuple[str, ...]:
    """Return the name of every opening of a sketch."""
    front = [SWIRLER, DOME] if sketch.premixing is None else [SWIRLER, PREMIXER, DOME]
    rest = [row.name for row in sketch.rows] + [ring.name for ring in sketch.slots] + [LEAK]
    crossing = [CROSS_FIRE] if has_cross_fire(sketch) else []
    return (*front, *(name for one in rest for name in sketch.names(one)), *crossing)


def has_cross_fire(sketch: Sketch) -> bool:
    """Whether tubes join the cans, as they do where cans share a casing."""
    return sketch.section.layout == "can-annular"


def vane_pack_of(pack: VanePack, area: float, drilled: bool) -> Swirler:
    """Return the vane pack whose passage has an area [m2], to 0.1 or 0.01 mm when drilled."""
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
        # a tenth of a millimetre is a percent of the area of a small pack
        tip = round(tip, 4 if tip > SMALL_PACK else 5)
    return Swirler(hub, tip, pack.angle, pack.count, pack.thickness, pack.loss)


def _front(sketch: Sketch, areas: Mapping[str, float], drilled: bool) -> list[Opening]:
    pilot = vane_pack_of(sketch.vane_pack, areas[SWIRLER] / sketch.swirlers, drilled)
    found = [_vaned(sketch, SWIRLER, "swirler", pilot), _dome(sketch, areas[DOME], drilled)]
    if sketch.premixing is not None:
        hub = PILOT_WALL * pilot.tip_diameter
        pack = sketch.premixing.vanes
        round_it = VanePack(
            pack.angle,
            pack.count,
            pack.thickness,
            pack.loss,
            pack.hub_ratio,
            round(hub, 4) if drilled else hub,
        )
        made = vane_pack_of(round_it, areas[PREMIXER] / sketch.swirlers, drilled)
        found.append(_vaned(sketch, PREMIXER, "premixer", made))
    return found


def _vaned(
    sketch: Sketch, name: str, role: Literal["swirler", "premixer"], made: Swirler
) -> Opening:
    passage = swirler_area(made)
    return Opening(
        name, role, "dome", 0.0, sketch.swirlers, passage, "swirler", "total", swirler=made
    )


def _dome(sketch: Sketch, area: float, drilled: bool) -> Opening:
    count, one, diameter = _many_holes(area, sketch.dome_hole_diameter, drilled)
    return Opening(DOME, "dome", "dome", 0.0, count, one, "orifice", "total", diameter)


def _row(sketch: Sketch, row: Row, areas: Mapping[str, float], drilled: bool) -> list[Opening]:
    found = []
    for name, shape in zip(sketch.names(row.name), sketch.sides, strict=True):
        count = row.count // len(sketch.sides)
        diameter = math.sqrt(4.0 * areas[name] / (math.pi * count))
        if drilled:
            diameter = nearest_drill(diameter, sketch.drill_step)
        one = 0.25 * math.pi * diameter**2
        found.append(
            Opening(
                name,
                row.name,
                shape.side,
                row.station,
                count,
                one,
                sketch.hole_edge,
                "total",
                diameter,
            )
        )
    return found


def _slot(
    sketch: Sketch, ring: SlotRing, areas: Mapping[str, float], drilled: bool
) -> list[Opening]:
    found = []
    for name, shape in zip(sketch.names(ring.name), sketch.sides, strict=True):
        count, one, diameter = _many_holes(areas[name], ring.hole_diameter, drilled)
        found.append(
            Opening(
                name,
                "film",
                shape.side,
                ring.station,
                count,
                one,
                "metering",
                "static",
                diameter,
                slot=Slot(ring.height, ring.lip_thickness, shape.perimeter),
            )
        )
    return found


def _leaks(sketch: Sketch, areas: Mapping[str, float], drilled: bool) -> list[Opening]:
    # a leak is not drilled: four figures are how it is written down
    found = []
    for name, shape in zip(sketch.names(LEAK), sketch.sides, strict=True):
        size = _written(areas[name]) if drilled else areas[name]
        found.append(
            Opening(name, "leak", shape.side, sketch.liner_length, 1, size, "orifice", "static")
        )
    if has_cross_fire(sketch):
        one = areas[CROSS_FIRE] / CROSS_FIRE_TUBES
        station = round(CROSS_FIRE_STATION * sketch.zone_ends[0], 3)
        found.append(
            Opening(
                CROSS_FIRE,
                "leak",
                "outer",
                station,
                CROSS_FIRE_TUBES,
                _written(one) if drilled else one,
                "orifice",
                "static",
            )
        )
    return found


def _injectors(sketch: Sketch, front: Sequence[Opening]) -> tuple[Injector, ...]:
    premixing = sketch.premixing
    if premixing is None:
        return (Injector("main", 1.0, (SWIRLER,)),)
    premixer = next(opening for opening in front if opening.name == PREMIXER)
    area = premixer.count * premixer.area
    return (
        Injector("pilot", premixing.pilot_fuel, (SWIRLER,)),
        Injector("main", 1.0 - premixing.pilot_fuel, (PREMIXER,), premixing.length, area),
    )


def _many_holes(area: float, drill: float, drilled: bool) -> tuple[int, float, float]:
    """Return count, area of one and diameter of the holes that make up an area."""
    count = max(round(area / (0.25 * math.pi * drill**2)), 1)
    if not drilled:
        diameter = math.sqrt(4.0 * area / (math.pi * count))
    elif count >= FEW_HOLES:
        diameter = drill
    else:
        count, diameter = _nearest_few(area, drill)
    return count, 0.25 * math.pi * diameter**2, diameter


def _nearest_few(area: float, drill: float) -> tuple[int, float]:
    """Return count and drill nearest to an area, among the drills about the wanted one."""
    step = drill_step(drill)
    best = (math.inf, 1, drill)
    about = [drill + number * step for number in (0, -1, 1, -2, 2, -3, 3)]
    # fewer holes than four of the wanted drill: as few, of whatever drill is nearest
    usual = max(round(area / (0.25 * math.pi * drill**2)), 1)
    few = [math.sqrt(4.0 * area / (math.pi * n)) for n in range(1, 5) if usual < 4]
    for wanted in (*about, *few):
        diameter = nearest_drill(wanted)
        one = 0.25 * math.pi * diameter**2
        count = max(round(area / one), 1)
        best = min(best, (abs(count * one / area - 1.0), count, diameter), key=lambda t: t[0])
    return best[1], best[2]


def _written(area: float) -> float:
    """Return an area to four figures, as it is written down [m2]."""
    return float(f"{area:.4g}")


def _diffuser(sketch: Sketch) -> Diffuser:
    """Return the diffuser to the square millimetre and the tenth of a millimetre."""
    shape = sketch.diffuser
    return Diffuser(
        shape.kind,
        sketch.inlet_area,
        round(sketch.inlet_area * shape.area_ratio, 6),
        math.floor(shape.length * 1e4) / 1e4,
        shape.loss_coefficient,
    )


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


def _wall(sketch: Sketch, shape: SideShape) -> LinerWall:
    return LinerWall(
        side=shape.side,
        perimeter=AxialProfile.constant(shape.perimeter),
        beam_length=beam_length(sketch.section.layout, shape.side, sketch.liner_height),
        thickness=sketch.sheet.thickness,
        conductivity=sketch.sheet.conductivity,
        emissivity=sketch.sheet.emissivity,
        casing_emissivity=sketch.sheet.casing_emissivity,
        casing_area_ratio=shape.casing_area_ratio,
        coating_thickness=sketch.sheet.coating_thickness,
        coating_conductivity=sketch.sheet.coating_conductivity,
    )
