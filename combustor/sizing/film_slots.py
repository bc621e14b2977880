"""Film slots: where they stand, how high they are, how their air is metered."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from combustor.base.method import Method
from combustor.hardware.film_decay import FAR_START
from combustor.sizing.drill import nearest_drill
from combustor.sizing.sketch import Sketch, SlotRing

SLOT_PITCH = Method(
    key="slot-pitch",
    quantity="distance from film slot to film slot",
    source="25 to 50 mm ring to ring in short aero liners; as far apart as the wall allows in "
    "longer ones, to 100 mm or 150 slot heights, since jets tear films and rings stiffen the "
    "sheet; a row of holes lies whole inside one panel",
    reading="common practice, no source",
    note="slot_pitch sets the longest panel",
)
SLOT_HEIGHT = Method(
    key="slot-height",
    quantity="film slot height",
    source="1 to 3 mm and at least 0.4 % of the liner height, lip 0.5 to 1 mm; the lowest that "
    "holds the wall, since effectiveness grows with flow^0.65 but falls with height^0.45",
    reading="common practice, no source",
)
METERING_HOLES = Method(
    key="slot-metering-holes",
    quantity="metering holes of a film slot",
    source="diameter 1 to 1.5 slot heights at a pitch of at most 2.5 diameters, so that the jets "
    "have merged at the lip; poor film where they are sparser (Sturgess 1986)",
    reading="common practice, no source",
    validity={"pitch_over_diameter": (1.5, 2.5)},
    note="sets the least air of a slot",
)

SHORTEST, LONGEST = 20e-3, 100e-3
LOWEST_SLOT, HIGHEST_SLOT, SLOT_STEP = 1.0e-3, 3.0e-3, 0.5e-3
LOWEST_SLOT_SHARE = 0.004
LIP_SHARE, LEAST_LIP = 0.4, 0.5e-3
BAND_MARGIN = 6e-3
METERING_PITCH = 2.4
WIDEST_METERING = 1.5


@dataclass(frozen=True)
class SlotRoom:
    """Shortest and longest panel, and slot heights to choose from, rising; m."""

    shortest: float
    longest: float
    heights: tuple[float, ...]


def next_slot(
    last: float,
    reach: float,
    end: float,
    length: float,
    bands: Sequence[tuple[float, float]],
    room: SlotRoom,
) -> tuple[float | None, bool]:
    """Return where the next slot stands, and whether that is later than the wall allows.

    Parameters
    ----------
    last : float
        The slot before [m]
    reach : float
        As far as the wall stays cool without another slot [m]
    end : float
        As far as a panel may reach [m]
    length : float
        Liner [m]
    bands : sequence of (start, end)
        Stretches taken by rows; a row lies whole inside one panel [m]
    room : SlotRoom

    Returns
    -------
    tuple of float or None, and bool
        To whole millimetres; None where the liner ends before another is needed.
    """
    if reach >= length - 1e-9:
        return None, False
    if length - last <= room.shortest:
        return None, reach < length - BAND_MARGIN
    place = max(reach, last + room.shortest)
    for start, stop in _merged(bands):
        if start < place < stop:
            # before the row where that leaves room, else behind it
            place = start if start - last >= room.shortest else stop
            break
    whole = math.floor(1e3 * place + 1e-6) / 1e3
    if whole >= length - BAND_MARGIN:
        return None, reach < length - BAND_MARGIN
    return whole, whole > max(reach, 0.0) + 2e-3 and reach < end - 1e-9


def slot_room(liner_height: float, pitch: float | None, height: float | None) -> SlotRoom:
    """Return what slots may be: stated pitch and height, else the ranges of practice [m]."""
    heights = slot_heights(liner_height) if height is None else (height,)
    longest = min(FAR_START * heights[0], LONGEST)
    if pitch is not None:
        longest = pitch
    return SlotRoom(min(SHORTEST, longest), longest, heights)


def slot_heights(liner_height: float) -> tuple[float, ...]:
    """Return the slot heights to try, rising [m]."""
    lowest = min(max(LOWEST_SLOT, LOWEST_SLOT_SHARE * liner_height), HIGHEST_SLOT)
    count = math.ceil((HIGHEST_SLOT - lowest) / SLOT_STEP - 1e-9) + 1
    # rounded up to a tenth of a millimetre: the height of a machined lip
    start = math.ceil(lowest * 1e4 - 1e-6) / 1e4
    heights = [round(start + place * SLOT_STEP, 5) for place in range(count)]
    return tuple(height for height in heights if height <= HIGHEST_SLOT + 1e-9)


def metering_diameter(area: float, perimeter: float, slot_height: float) -> float:
    """Return the drill of a slot's metering holes [m].

    Parameters
    ----------
    area : float
        Of all metering holes of one slot [m2]
    perimeter : float
        [m]
    slot_height : float
        [m]
    """
    # n (pi/4) d^2 = area and n pitch d = perimeter
    wanted = 4.0 / math.pi * area * METERING_PITCH / perimeter
    return nearest_drill(min(max(wanted, slot_height), WIDEST_METERING * slot_height))


def lip_thickness(slot_height: float) -> float:
    """Return the lip thickness of a slot [m]."""
    return max(LIP_SHARE * slot_height, LEAST_LIP)


def slot_rings(stations: Sequence[float], height: float) -> tuple[SlotRing, ...]:
    """Return slots named film-1, film-2 ... from the dome on; metering holes still to drill."""
    lip = lip_thickness(height)
    return tuple(
        SlotRing(f"film-{place + 1}", x, height, lip, 1.5 * height)
        for place, x in enumerate(stations)
    )


def with_metering(sketch: Sketch, areas: Mapping[str, float]) -> Sketch:
    """Return the sketch with a drill for every slot's metering area [m2]."""
    rings = tuple(
        replace(
            ring,
            hole_diameter=metering_diameter(
                sum(areas[name] for name in sketch.names(ring.name)), sketch.perimeter, ring.height
            ),
        )
        for ring in sketch.slots
    )
    return replace(sketch, slots=rings)


def _merged(bands: Sequence[tuple[float, float]]) -> list[tuple[float, float]]:
    """Return the bands with those that touch made one."""
    joined: list[tuple[float, float]] = []
    for start, end in sorted(bands):
        if joined and start <= joined[-1][1]:
            joined[-1] = (joined[-1][0], max(joined[-1][1], end))
        else:
            joined.append((start, end))
    return joined
