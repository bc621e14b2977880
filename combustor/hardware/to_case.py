"""Hardware as the ``[hardware]`` table of a case file.

What follows from a diameter or from ``[combustor]`` is left out, so that a person who
edits a diameter edits one number. Reading the table gives the same metal to 1e-12.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

from combustor.case.schema import Combustor
from combustor.case.text import area, bare, length, vane_angle
from combustor.hardware import derived
from combustor.hardware.beam_length import beam_length
from combustor.hardware.from_case import slot_length
from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Hardware,
    Injector,
    LinerWall,
    Opening,
    Passage,
    Swirler,
)

_SAME = 1e-12

Table = dict[str, Any]


def table_of(hardware: Hardware, combustor: Combustor | None = None) -> Table:
    """Return the table to write for ``hardware``.

    Parameters
    ----------
    combustor : Combustor, optional
        The ``[combustor]`` table it will stand beside; what follows from it is left out.

    Raises
    ------
    ValueError
        An opening whose diameter and area contradict each other.
    """
    liner_passage, runs_to_exit = _without_duct(hardware)
    liner = _ring_of(liner_passage, hardware.layout)
    annuli = [_ring_of(annulus, hardware.layout) for annulus in hardware.annuli]
    table: Table = {"liner_length": length(hardware.liner_length)}
    table |= _overall(hardware, combustor, liner, annuli)
    table["roughness"] = length(hardware.roughness, "um")
    table["zones"] = {
        "primary_end": length(hardware.zones[0].end),
        "secondary_end": length(hardware.zones[1].end),
    }
    table["diffuser"] = _diffuser(hardware.diffuser, combustor)
    table["liner"] = _passage(liner_passage, liner)
    if runs_to_exit:
        table["liner"]["runs_to_exit"] = True
    table["annuli"] = [
        {"side": passage.side} | _passage(passage, ring)
        for passage, ring in zip(hardware.annuli, annuli, strict=True)
    ]
    table["walls"] = [
        _wall(hardware, wall, liner, annulus)
        for wall, annulus in zip(hardware.walls, annuli, strict=True)
    ]
    table["openings"] = [_opening(opening, hardware.walls) for opening in hardware.openings]
    if hardware.injectors:
        table["injectors"] = [_injector(injector) for injector in hardware.injectors]
    return table


def _injector(injector: Injector) -> Table:
    table: Table = {
        "name": injector.name,
        "share": bare(injector.share),
        "openings": list(injector.openings),
    }
    if injector.premix_length is not None:
        table["premix_length"] = length(injector.premix_length)
    if injector.premix_area is not None:
        table["premix_area"] = area(injector.premix_area)
    return table


def _same(one: float, other: float) -> bool:
    return math.isclose(one, other, rel_tol=_SAME, abs_tol=0.0)


def _overall(
    hardware: Hardware,
    combustor: Combustor | None,
    liner: derived.Ring | None,
    annuli: Sequence[derived.Ring | None],
) -> Table:
    """Quantities of the whole flame tube that do not follow from the rest."""
    table: Table = {}
    if liner is None or not _same(
        hardware.liner_height, derived.liner_height(hardware.layout, liner)
    ):
        table["liner_height"] = length(hardware.liner_height)
    known = [ring for ring in annuli if ring is not None]
    casing = _casing(hardware, combustor, known)
    if casing is None or not _same(hardware.reference_area, casing[0]):
        table["reference_area"] = area(hardware.reference_area)
    if casing is None or not _same(hardware.reference_height, casing[1]):
        table["reference_height"] = length(hardware.reference_height)
    exit_annulus = combustor.exit_annulus if combustor else None
    if exit_annulus is None or not _same(hardware.exit_area, exit_annulus.area / hardware.cans):
        table["exit_area"] = area(hardware.exit_area)
    if combustor is None or combustor.transition_length != hardware.transition_length:
        table["transition_length"] = length(hardware.transition_length)
    return table


def _without_duct(hardware: Hardware) -> tuple[Passage, bool]:
    """Return the liner without its run through the transition duct, and whether it had one."""
    liner, length = hardware.liner, hardware.liner_length
    kept = [(x, a) for x, a in zip(liner.area.station, liner.area.value, strict=True) if x < length]
    if not kept or len(kept) == len(liner.area.station):
        return liner, False
    stations, values = zip(*kept, strict=True)
    inside = AxialProfile(stations, values)
    again = derived.with_duct(inside, length, hardware.transition_length, hardware.exit_area)
    same = len(again.station) == len(liner.area.station) and all(
        math.isclose(a, b, rel_tol=_SAME)
        for a, b in zip(
            (*again.station, *again.value), (*liner.area.station, *liner.area.value), strict=True
        )
    )
    return (Passage("liner", inside, liner.hydraulic_diameter), True) if same else (liner, False)


def _casing(
    hardware: Hardware, combustor: Combustor | None, rings: Sequence[derived.Ring]
) -> tuple[float, float] | None:
    """Reference area and height as reading would derive them; None where it could not."""
    if hardware.layout == "can-annular":
        if combustor is None or not combustor.casing_outer_diameter:
            return None
        if combustor.casing_inner_diameter is None:
            return None
        casing = derived.Ring(
            (0.0,), (combustor.casing_outer_diameter,), (combustor.casing_inner_diameter,)
        )
        return (
            derived.reference_area("annular", 1, (casing,)),
            derived.reference_height("annular", (casing,)),
        )
    if len(rings) != len(hardware.annuli):
        return None
    return (
        derived.reference_area(hardware.layout, hardware.cans, rings),
        derived.reference_height(hardware.layout, rings),
    )


def _ring_of(passage: Passage, layout: str) -> derived.Ring | None:
    """Return the diameters behind a passage's area and hydraulic diameter, if it has any."""
    if layout == "can-annular" and passage.side != "liner":
        return None
    if passage.area.station != passage.hydraulic_diameter.station:
        return None
    pairs = [
        _diameters(a, d, passage.side == "liner" and layout != "annular")
        for a, d in zip(passage.area.value, passage.hydraulic_diameter.value, strict=True)
    ]
    known = [pair for pair in pairs if pair is not None]
    if len(known) != len(pairs):
        return None
    outer, inner = zip(*known, strict=True)
    return derived.Ring(passage.area.station, outer, inner)


def _diameters(passage_area: float, hydraulic: float, is_round: bool) -> tuple[float, float] | None:
    """Return (outer, inner) diameter that give both numbers back, in the fewest digits."""
    total = passage_area / (derived.QUARTER_PI * hydraulic)
    outer = hydraulic if is_round else (total + hydraulic) / 2.0
    inner = 0.0 if is_round else (total - hydraulic) / 2.0
    if inner < 0.0 or (inner == 0.0 and not is_round):
        return None
    for digits in range(5, 18):
        pair = (round(outer, digits), round(inner, digits)) if not is_round else (outer, 0.0)
        if _same(derived.ring_area(*pair), passage_area) and _same(pair[0] - pair[1], hydraulic):
            return pair
    return None


def _stations(profile: AxialProfile) -> Table:
    if profile.station == (0.0,):
        return {}
    return {"station": [length(x) for x in profile.station]}


def _values(texts: Sequence[str]) -> str | list[str]:
    return texts[0] if len(texts) == 1 else list(texts)


def _passage(passage: Passage, ring: derived.Ring | None) -> Table:
    if ring is None and passage.area.station != passage.hydraulic_diameter.station:
        stations = sorted({*passage.area.station, *passage.hydraulic_diameter.station})
        merged = AxialProfile(tuple(stations), tuple(passage.area.at(stations).tolist()))
        hydraulic = passage.hydraulic_diameter.at(stations).tolist()
        return _stations(merged) | {
            "area": _values([area(a) for a in merged.value]),
            "hydraulic_diameter": _values([length(d) for d in hydraulic]),
        }
    table = _stations(passage.area)
    if ring is None:
        table["area"] = _values([area(a) for a in passage.area.value])
        table["hydraulic_diameter"] = _values([length(d) for d in passage.hydraulic_diameter.value])
    elif any(ring.inner):
        table["outer_diameter"] = _values([length(d) for d in ring.outer])
        table["inner_diameter"] = _values([length(d) for d in ring.inner])
    else:
        table["diameter"] = _values([length(d) for d in ring.outer])
    return table


def _diffuser(diffuser: Diffuser, combustor: Combustor | None) -> Table:
    table: Table = {"kind": diffuser.kind}
    inlet = combustor.inlet_annulus if combustor else None
    if inlet is None or not _same(diffuser.inlet_area, inlet.area):
        table["inlet_area"] = area(diffuser.inlet_area)
    return table | {
        "exit_area": area(diffuser.exit_area),
        "length": length(diffuser.length),
        "loss_coefficient": bare(diffuser.loss_coefficient),
    }


def _wall(
    hardware: Hardware,
    wall: LinerWall,
    liner: derived.Ring | None,
    annulus: derived.Ring | None,
) -> Table:
    table: Table = {
        "side": wall.side,
        "thickness": length(wall.thickness),
        "conductivity": f"{bare(wall.conductivity)} W/m/K",
        "emissivity": bare(wall.emissivity),
        "casing_emissivity": bare(wall.casing_emissivity),
    }
    if wall.coating_thickness or wall.coating_conductivity != 1.0:
        table["coating_thickness"] = length(wall.coating_thickness)
        table["coating_conductivity"] = f"{bare(wall.coating_conductivity)} W/m/K"
    if not _same(wall.beam_length, beam_length(hardware.layout, wall.side, hardware.liner_height)):
        table["beam_length"] = length(wall.beam_length)
    if annulus is None or not _same(
        wall.casing_area_ratio, derived.casing_area_ratio(wall.side, annulus)
    ):
        table["casing_area_ratio"] = bare(wall.casing_area_ratio)
    if not _perimeter_follows(wall, liner):
        table |= _stations(wall.perimeter)
        table["perimeter"] = _values([length(p) for p in wall.perimeter.value])
    return table


def _perimeter_follows(wall: LinerWall, liner: derived.Ring | None) -> bool:
    if liner is None or wall.perimeter.station != liner.station:
        return False
    follows = derived.wall_perimeter(wall.side, liner)
    return all(_same(a, b) for a, b in zip(wall.perimeter.value, follows, strict=True))


def _opening(opening: Opening, walls: Sequence[LinerWall]) -> Table:
    table: Table = {"name": opening.name, "role": opening.role}
    if opening.side != derived.side_of(opening.role):
        table["side"] = opening.side
    table["x"] = length(opening.station)
    table["count"] = opening.count
    table |= _size(opening)
    edge = derived.edge_of(opening.role, opening.swirler is not None)
    if opening.edge != edge:
        table["edge"] = opening.edge
    if opening.feed != derived.feed_of(opening.role, opening.edge):
        table["feed"] = opening.feed
    if opening.discharge_coefficient is not None:
        table["discharge_coefficient"] = bare(opening.discharge_coefficient)
    if opening.swirler is not None:
        table["swirler"] = _swirler(opening.swirler)
    if opening.slot is not None:
        slot = {
            "height": length(opening.slot.height),
            "lip_thickness": length(opening.slot.lip_thickness),
        }
        if not _same(opening.slot.length, slot_length(opening.side, opening.station, walls)):
            slot["length"] = length(opening.slot.length)
        table["slot"] = slot
    return table


def _size(opening: Opening) -> Table:
    table: Table = {}
    if opening.diameter is not None:
        if not _same(opening.area, derived.round_area(opening.diameter)):
            raise ValueError(
                f"opening {opening.name!r}: area {opening.area} m2 is not that of a round hole "
                f"of {opening.diameter} m"
            )
        table["diameter"] = length(opening.diameter)
    elif not _area_follows(opening):
        table["area"] = area(opening.area)
    if opening.effective_area is not None:
        table["effective_area"] = area(opening.effective_area)
    return table


def _area_follows(opening: Opening) -> bool:
    if opening.swirler is not None:
        return _same(opening.area, derived.swirler_area(opening.swirler))
    if opening.effective_area is not None and opening.count > 0:
        return _same(opening.area, opening.effective_area / opening.count)
    return False


def _swirler(swirler: Swirler) -> Table:
    return {
        "hub_diameter": length(swirler.hub_diameter),
        "tip_diameter": length(swirler.tip_diameter),
        "vane_angle": vane_angle(swirler.vane_angle),
        "vane_count": swirler.vane_count,
        "vane_thickness": length(swirler.vane_thickness),
        "vane_loss": bare(swirler.vane_loss),
    }
