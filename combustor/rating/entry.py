"""Where each opening's air enters: primary zone, core, beside the wall, exit."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.hardware.metal import Hardware, Opening
from combustor.hardware.zone_air import FILM_ROLES, FRONT_ROLES, mixed_share
from combustor.rating.settings import JET_LENGTH_SHARE, Settings


@dataclass(frozen=True)
class Stretch:
    """One stirred cell's place: zone name, start and end along the axis, m, and volume, m3."""

    zone: str
    start: float
    end: float
    volume: float


@dataclass(frozen=True)
class Entry:
    """How one opening's air is shared out.

    Parameters
    ----------
    primary : float
        Share that enters the primary zone.
    stretches : tuple of float
        Share that enters the core in each stretch behind the primary zone.
    exit : float
        Share that joins at the exit, unburnt.
    beside : int or None
        Stretch in which the whole of it enters beside the wall. The shares sum to one, or to
        nothing where it does.
    """

    primary: float
    stretches: tuple[float, ...]
    exit: float
    beside: int | None = None


def primary_end(hardware: Hardware) -> float:
    """Return the station where the primary zone ends, m."""
    return next(zone.end for zone in hardware.zones if zone.name == "primary")


def stretches_of(hardware: Hardware, settings: Settings) -> tuple[Stretch, ...]:
    """Cut everything behind the primary zone into stirred cells, transition included."""
    counts = {"secondary": settings.secondary_cells, "dilution": settings.dilution_cells}
    found = []
    for zone in hardware.zones:
        if zone.name == "primary" or zone.length <= 0.0:
            continue
        count = counts[zone.name]
        for k in range(count):
            start = zone.start + zone.length * k / count
            end = zone.start + zone.length * (k + 1) / count
            found.append(Stretch(zone.name, start, end, hardware.volume(start, end)))
    if hardware.transition_length > 0.0:
        inlet_area = float(hardware.liner.area.at(hardware.liner_length))
        mean_area = 0.5 * (inlet_area + hardware.exit_area)
        step = hardware.transition_length / settings.transition_cells
        for k in range(settings.transition_cells):
            start = hardware.liner_length + k * step
            volume = mean_area * step * hardware.cans
            found.append(Stretch("transition", start, start + step, volume))
    return tuple(found)


def entry_of(
    opening: Opening, hardware: Hardware, stretches: tuple[Stretch, ...], settings: Settings
) -> Entry:
    """Share one opening's air out over primary zone, stretches, wall and exit.

    Films and what leaks in through the wall enter beside it; those of the primary zone cling to
    it outside the recirculation and count from the zone's end.
    """
    if opening.role in FILM_ROLES or opening.role == "leak":
        return _wall_entry(opening, stretches)
    if opening.role in FRONT_ROLES and opening.station <= primary_end(hardware):
        return Entry(1.0, (0.0,) * len(stretches), 0.0)
    return _row_entry(opening, hardware, stretches, settings)


def _wall_entry(opening: Opening, stretches: tuple[Stretch, ...]) -> Entry:
    nothing = (0.0,) * len(stretches)
    for place, stretch in enumerate(stretches):
        if opening.station < stretch.end and stretch.zone != "transition":
            return Entry(0.0, nothing, 0.0, place)
    return Entry(0.0, nothing, 1.0)


def _row_entry(
    opening: Opening, hardware: Hardware, stretches: tuple[Stretch, ...], settings: Settings
) -> Entry:
    boundary = primary_end(hardware)
    primary = mixed_share(hardware, opening, boundary, settings.primary_jet_share)
    start = max(opening.station, boundary)
    zone_end = next((z.end for z in hardware.zones if z.start <= start < z.end), None)
    if zone_end is None:
        return Entry(primary, (0.0,) * len(stretches), 1.0 - primary)
    end = min(start + JET_LENGTH_SHARE * hardware.liner_height, zone_end)
    weights = [max(0.0, min(end, s.end) - max(start, s.start)) for s in stretches]
    total = sum(weights)
    rest = 1.0 - primary
    return Entry(primary, tuple(rest * weight / total for weight in weights), 0.0)
