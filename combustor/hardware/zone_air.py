"""Which air counts in which zone: one bookkeeping for sizing targets and for rating.

Swirler, premixer and dome air belong to the zone they stand in; of the primary row a stated
share turns upstream into the primary zone; every other row counts from the zone it stands in;
film air counts as far as it has mixed, by the film's own effectiveness where that is known;
leakage counts at the exit only.
"""

from __future__ import annotations

from collections.abc import Mapping

from combustor.base.method import Method
from combustor.hardware.film_decay import decay
from combustor.hardware.metal import AxialProfile, Hardware, LinerWall, Opening

PRIMARY_JET_SHARE = Method(
    key="primary-jet-share",
    quantity="share of the primary-row air that turns upstream into the primary zone",
    source="Lefebvre 1983, Gas Turbine Combustion: about half",
    reading="from memory",
    validity={"primary_jet_share": (0.3, 0.5)},
)
FILM_MIXING = Method(
    key="film-mixing",
    quantity="share of a film's air that has mixed with the core, by distance over slot height",
    source="what the film has lost of its effectiveness, since a film that mixes evenly holds "
    "that share of its own air; before the wall was marched, 1 - 1.28 (mu ratio)^0.15 "
    "(t/s)^-0.2 (x/s)^-0.2, Ballal & Lefebvre 1972-73, at viscosity ratio 0.53 and lip ratio 0.4",
    reading="from memory",
    note="nothing has mixed while the film is whole, to 5.4 slot heights",
)
FILM_DECAY = 1.28 * 0.53**0.15 * 0.4**-0.2

FRONT_ROLES = ("swirler", "premixer", "dome")
ROW_ROLES = ("primary", "secondary", "dilution")
FILM_ROLES = ("film", "effusion")


def slot_height(hardware: Hardware, opening: Opening) -> float:
    """Return the height of the slot a film leaves by.

    Without a stated slot the row's air is spread round the wall it stands in.

    Returns
    -------
    float
        [m]
    """
    if opening.slot is not None:
        return opening.slot.height
    perimeter = float(_wall_of(hardware, opening).perimeter.at(opening.station))
    area = opening.effective_area or opening.count * opening.area
    return area / perimeter


def mixed_share(
    hardware: Hardware,
    opening: Opening,
    station: float,
    primary_jet_share: float = 0.5,
    films: Mapping[str, AxialProfile] | None = None,
) -> float:
    """Return the share of an opening's air that counts as mixed at a station.

    A row counts whole once the station lies beyond it. Up to the end of the primary zone
    the primary row counts by `primary_jet_share`.

    Parameters
    ----------
    hardware : Hardware
    opening : Opening
    station : float
        Axial position inside the liner [m]
    primary_jet_share : float
        [-]
    films : mapping of str to AxialProfile or None
        Share of each film's air still at the wall, by opening; falling behind the slot.

    Returns
    -------
    float
        From 0 to 1 [-]
    """
    if opening.role == "leak":
        return 0.0
    if opening.role in FILM_ROLES:
        distance = station - opening.station
        if distance <= 0.0:
            return 0.0
        if films is not None and opening.name in films:
            return 1.0 - float(films[opening.name].at(station))
        height = slot_height(hardware, opening)
        if height <= 0.0:
            return 1.0
        return max(0.0, 1.0 - FILM_DECAY * float(decay(distance / height)))
    if opening.role == "primary" and station <= _primary_end(hardware):
        return primary_jet_share
    if opening.role in FRONT_ROLES:
        return 1.0 if opening.station <= station else 0.0
    # a row exactly on a zone's boundary feeds the zone that begins there
    return 1.0 if opening.station < station else 0.0


def zone_air(
    hardware: Hardware,
    flows: Mapping[str, float],
    primary_jet_share: float = 0.5,
    films: Mapping[str, AxialProfile] | None = None,
) -> dict[str, float]:
    """Return the share of all air that counts in each zone, cumulative along the liner.

    Film air does not count in the primary zone, where it clings to the wall outside the
    recirculation; later it counts by `FILM_MIXING`.

    Parameters
    ----------
    hardware : Hardware
    flows : mapping of str to float
        Flow of every opening by name; any common unit.
    primary_jet_share : float
        Share of the primary row that turns upstream [-]
    films : mapping of str to AxialProfile or None
        Share of each film's air still at the wall, as the wall was marched; else `FILM_MIXING`.

    Returns
    -------
    dict of str to float
        By zone name in axial order, then "exit" = 1, all as shares of the sum of flows.
    """
    total = sum(flows.values())
    shares: dict[str, float] = {}
    for zone in hardware.zones:
        mixed = 0.0
        for opening in hardware.openings:
            if zone.name == "primary" and opening.role in FILM_ROLES:
                continue
            share = mixed_share(hardware, opening, zone.end, primary_jet_share, films)
            mixed += share * flows[opening.name]
        shares[zone.name] = mixed / total
    shares["exit"] = 1.0
    return shares


def _primary_end(hardware: Hardware) -> float:
    for zone in hardware.zones:
        if zone.name == "primary":
            return zone.end
    return 0.0


def _wall_of(hardware: Hardware, opening: Opening) -> LinerWall:
    for wall in hardware.walls:
        if wall.side == opening.side:
            return wall
    return hardware.walls[0]
