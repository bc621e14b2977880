"""The metal stated in a case file, as Hardware."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Literal

from combustor.base.errors import InputError, Problem
from combustor.case import hardware_table as t
from combustor.case.schema import Case, Combustor
from combustor.hardware import derived
from combustor.hardware.beam_length import beam_length
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


def hardware_of(case: Case) -> Hardware:
    """Return the metal in ``[hardware]``.

    Raises
    ------
    InputError
        There is no such table, or a quantity neither stands there nor follows from others.
    """
    if case.hardware is None:
        raise InputError(
            Problem(
                "this case has no [hardware] table",
                "size it first: `combustor size CASE -o FILE`",
                file=case.file or None,
            )
        )
    return _build(case.combustor, case.hardware)


def _build(combustor: Combustor, table: t.HardwareTable) -> Hardware:
    liner_ring = _ring(table.liner)
    annulus_rings = tuple(_ring(annulus) for annulus in table.annuli)
    height = table.liner_height or derived.liner_height(
        combustor.layout, _known(liner_ring, "hardware.liner_height")
    )
    walls = tuple(
        _wall(combustor, wall, liner_ring, annulus_rings[index], height)
        for index, wall in enumerate(table.walls)
    )
    openings = sorted((_opening(row, walls) for row in table.openings), key=lambda o: o.station)
    transition, exit_area = _transition(combustor, table), table.exit_area or _exit_area(combustor)
    liner = _passage(table.liner, "liner")
    if table.liner.runs_to_exit:
        end = derived.with_duct(liner.area, table.liner_length, transition, exit_area)
        liner = Passage("liner", end, liner.hydraulic_diameter)
    return Hardware(
        layout=combustor.layout,
        cans=combustor.cans,
        flow=combustor.flow,
        reference_area=table.reference_area or _reference_area(combustor, annulus_rings),
        reference_height=table.reference_height or _reference_height(combustor, annulus_rings),
        liner_height=height,
        liner=liner,
        liner_length=table.liner_length,
        transition_length=transition,
        exit_area=exit_area,
        annuli=tuple(_passage(annulus, annulus.side) for annulus in table.annuli),
        walls=walls,
        diffuser=_diffuser(combustor, table.diffuser),
        openings=tuple(openings),
        zones=_zones(table),
        injectors=tuple(
            Injector(i.name, i.share, i.openings, i.premix_length, i.premix_area)
            for i in table.injectors
        ),
        roughness=table.roughness,
    )


def _missing(key: str, why: str) -> InputError:
    return InputError(Problem("missing", why, key=key))


def _known(ring: derived.Ring | None, key: str) -> derived.Ring:
    if ring is None:
        raise _missing(key, "it does not follow from areas: state it, or state diameters")
    return ring


def _stations(table: t.PassageTable | t.WallTable) -> tuple[float, ...]:
    return table.station or (0.0,)


def _ring(table: t.PassageTable) -> derived.Ring | None:
    if table.diameter is not None:
        return derived.Ring(_stations(table), table.diameter, (0.0,) * len(table.diameter))
    if table.outer_diameter is not None and table.inner_diameter is not None:
        return derived.Ring(_stations(table), table.outer_diameter, table.inner_diameter)
    return None


def _passage(table: t.PassageTable, side: Literal["liner", "outer", "inner"]) -> Passage:
    ring = _ring(table)
    if ring is not None:
        pairs = list(zip(ring.outer, ring.inner, strict=True))
        area = tuple(derived.ring_area(outer, inner) for outer, inner in pairs)
        hydraulic = tuple(outer - inner for outer, inner in pairs)
    elif table.area is not None and table.hydraulic_diameter is not None:
        area, hydraulic = table.area, table.hydraulic_diameter
    else:
        raise _missing(f"hardware.{side}", "state diameters, or area and hydraulic_diameter")
    station = _stations(table)
    return Passage(side, AxialProfile(station, area), AxialProfile(station, hydraulic))


def _reference_area(combustor: Combustor, rings: Sequence[derived.Ring | None]) -> float:
    casing = _casing_ring(combustor)
    if casing is not None:
        return derived.reference_area("annular", 1, (casing,))
    known = [_known(ring, "hardware.reference_area") for ring in rings]
    return derived.reference_area(combustor.layout, combustor.cans, known)


def _reference_height(combustor: Combustor, rings: Sequence[derived.Ring | None]) -> float:
    casing = _casing_ring(combustor)
    if casing is not None:
        return derived.reference_height("annular", (casing,))
    known = [_known(ring, "hardware.reference_height") for ring in rings]
    return derived.reference_height(combustor.layout, known)


def _casing_ring(combustor: Combustor) -> derived.Ring | None:
    """The ring that holds all cans of a can-annular machine."""
    outer, inner = combustor.casing_outer_diameter, combustor.casing_inner_diameter
    if combustor.layout != "can-annular" or outer is None or inner is None:
        return None
    return derived.Ring((0.0,), (outer,), (inner,))


def _transition(combustor: Combustor, table: t.HardwareTable) -> float:
    stated = table.transition_length
    return combustor.transition_length if stated is None else stated


def _exit_area(combustor: Combustor) -> float:
    if combustor.exit_annulus is None:
        raise _missing("hardware.exit_area", "state it, or combustor.exit_annulus")
    return combustor.exit_annulus.area / combustor.cans


def _diffuser(combustor: Combustor, table: t.DiffuserTable) -> Diffuser:
    inlet_area = table.inlet_area
    if inlet_area is None:
        if combustor.inlet_annulus is None:
            raise _missing("hardware.diffuser.inlet_area", "state it, or combustor.inlet_annulus")
        inlet_area = combustor.inlet_annulus.area
    return Diffuser(table.kind, inlet_area, table.exit_area, table.length, table.loss_coefficient)


def _wall(
    combustor: Combustor,
    table: t.WallTable,
    liner: derived.Ring | None,
    annulus: derived.Ring | None,
    height: float,
) -> LinerWall:
    perimeter = table.perimeter
    if perimeter is None:
        known = _known(liner, "hardware.walls.perimeter")
        profile = AxialProfile(known.station, derived.wall_perimeter(table.side, known))
    else:
        profile = AxialProfile(_stations(table), perimeter)
    ratio = table.casing_area_ratio
    if ratio is None:
        known = _known(annulus, "hardware.walls.casing_area_ratio")
        ratio = derived.casing_area_ratio(table.side, known)
    return LinerWall(
        side=table.side,
        perimeter=profile,
        beam_length=table.beam_length or beam_length(combustor.layout, table.side, height),
        thickness=table.thickness,
        conductivity=table.conductivity,
        emissivity=table.emissivity,
        casing_emissivity=table.casing_emissivity,
        casing_area_ratio=ratio,
        coating_thickness=table.coating_thickness,
        coating_conductivity=table.coating_conductivity,
    )


def _zones(table: t.HardwareTable) -> tuple[Zone, ...]:
    first, second = table.zones.primary_end, table.zones.secondary_end
    return (
        Zone("primary", 0.0, first),
        Zone("secondary", first, second),
        Zone("dilution", second, table.liner_length),
    )


def _opening(row: t.OpeningTable, walls: Sequence[LinerWall]) -> Opening:
    swirler = None
    if row.swirler is not None:
        swirler = Swirler(**row.swirler.model_dump())
    side = row.side or derived.side_of(row.role)
    edge = row.edge or derived.edge_of(row.role, swirler is not None)
    return Opening(
        name=row.name,
        role=row.role,
        side=side,
        station=row.x,
        count=row.count,
        area=_opening_area(row, swirler),
        edge=edge,
        feed=row.feed or derived.feed_of(row.role, edge),
        diameter=row.diameter,
        discharge_coefficient=row.discharge_coefficient,
        effective_area=row.effective_area,
        swirler=swirler,
        slot=None if row.slot is None else _slot(row.slot, side, row.x, walls),
    )


def _opening_area(row: t.OpeningTable, swirler: Swirler | None) -> float:
    if row.diameter is not None:
        return derived.round_area(row.diameter)
    if row.area is not None:
        return row.area
    if swirler is not None:
        return derived.swirler_area(swirler)
    if row.effective_area is not None and row.count > 0:
        # nothing but the bench sheet: the flow needs no more, jets are not rated from it
        return row.effective_area / row.count
    raise _missing(f"hardware.openings ({row.name}).diameter", "every opening needs a size")


def _slot(table: t.SlotTable, side: str, x: float, walls: Sequence[LinerWall]) -> Slot:
    length = table.length
    if length is None:
        length = slot_length(side, x, walls)
    return Slot(table.height, table.lip_thickness, length)


def slot_length(side: str, x: float, walls: Sequence[LinerWall]) -> float:
    """Return the developed length of a slot around its wall, m: the perimeter there."""
    wall = next((wall for wall in walls if wall.side == side), walls[0])
    return float(wall.perimeter.at(x))
