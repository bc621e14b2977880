"""What the stream beside the wall takes from the core and gives back, from the films' decay.

A film that mixes evenly holds, of its own air, the share that its effectiveness says. The stream
beside the wall keeps the flow of the film air that made it: what it takes in of the core it gives
back, mixed. How much that is in each cell follows from the film air it has to lose there.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from combustor.fuel.gas import Gas
from combustor.hardware.metal import AxialProfile, Hardware
from combustor.hardware.zone_air import FILM_ROLES, mixed_share
from combustor.heat.wall import WallMarch
from combustor.kinetics.near_wall import WallExchange
from combustor.kinetics.record import Chain
from combustor.kinetics.streams import Stream
from combustor.rating.entry import Entry, Stretch

# Beyond these, what has to be taken in within one cell, over the core's flow and over the
# stream's own, leaves no stream to speak of: it joins the core there.
MOST_OF_THE_CORE = 0.5
MOST_OF_ITSELF = 3.0


@dataclass(frozen=True)
class Beside:
    """The stream beside the wall along the chain.

    Parameters
    ----------
    exchanges : tuple of WallExchange
        One a stretch.
    film_left : tuple of float
        Film air not yet mixed at the end of each stretch [kg/s]
    """

    exchanges: tuple[WallExchange, ...]
    film_left: tuple[float, ...]


@dataclass(frozen=True)
class WallQuench:
    """Carbon monoxide beside the wall where the liner ends, over all that leaves the liner.

    Parameters
    ----------
    share : float
        What flows beside the wall [-]
    quenched : float
        Of that, what would not be there had the gas taken in burnt as the core did [-]
    """

    share: float
    quenched: float


def film_shares(walls: Sequence[WallMarch]) -> dict[str, AxialProfile]:
    """Return the share of each film's air still at the wall, as the walls were marched.

    What has mixed stays mixed: where a film's effectiveness would recover, because the gas cools,
    it is held.
    """
    shares = {}
    for wall in walls:
        stations = tuple(wall.station.tolist())
        for name, effectiveness in zip(wall.film_names, wall.slot_effectiveness, strict=True):
            behind = np.maximum.accumulate(effectiveness > 0.0)
            falling = np.minimum.accumulate(np.where(behind, effectiveness, 1.0))
            shares[name] = AxialProfile(stations, tuple(np.where(behind, falling, 1.0).tolist()))
    return shares


def beside_of(
    hardware: Hardware,
    stretches: Sequence[Stretch],
    entries: Sequence[Entry],
    inflows: Sequence[Stream],
    core_flow: Sequence[float],
    films: Mapping[str, AxialProfile] | None,
) -> Beside:
    """Return what passes between core and wall in each stretch.

    Parameters
    ----------
    hardware : Hardware
    stretches : sequence of Stretch
    entries, inflows : sequence of Entry, of Stream
        Of every opening, in the metal's order.
    core_flow : sequence of float
        Of the core in each stretch, without anything from the wall [kg/s]
    films : mapping of str to AxialProfile or None
        As `film_shares` gives them; None: by the law of the zone bookkeeping.
    """
    present: list[int] = []
    exchanges, left_over = [], []
    flow = unmixed = joined = 0.0
    for place, stretch in enumerate(stretches):
        new = [i for i, entry in enumerate(entries) if entry.beside == place]
        new = [i for i in new if inflows[i].mass_flow > 0.0]
        air = tuple(inflows[i] for i in new)
        present += new
        flow += sum(inflow.mass_flow for inflow in air)
        unmixed += sum(inflow.mass_flow for inflow in air)
        left = 0.0
        if stretch.zone != "transition":
            left = sum(
                inflows[i].mass_flow * (1.0 - _mixed(hardware, i, stretch.end, films))
                for i in present
            )
        taken = flow * (unmixed / left - 1.0) if left > 0.0 else np.inf
        if flow == 0.0:
            exchanges.append(WallExchange())
        elif taken > min(MOST_OF_THE_CORE * (core_flow[place] + joined), MOST_OF_ITSELF * flow):
            exchanges.append(WallExchange(air, joins=True))
            joined += flow
            flow = left = 0.0
            present = []
        else:
            taken = max(taken, 0.0)
            exchanges.append(WallExchange(air, taken, taken))
        unmixed = left
        left_over.append(left)
    return Beside(tuple(exchanges), tuple(left_over))


def quenched_of(gas: Gas, hardware: Hardware, chain: Chain, beside: Beside) -> WallQuench | None:
    """Return how much of the carbon monoxide leaving the liner stems from the wall.

    None where nothing flows beside the wall there, or the mechanism knows no carbon monoxide.
    """
    end = hardware.liner_length * (1.0 + 1e-9)
    places = [place for place, station in enumerate(chain.stations) if station.end <= end]
    last = chain.stations[places[-1]]
    wall = last.beside
    if wall is None or not gas.has("CO"):
        return None
    index = gas.index("CO")
    leaving = last.mass_flow * float(last.mass_fractions[index])
    if leaving <= 0.0:
        return None
    own_air = beside.film_left[places[-1] - 1]
    at_wall = wall.mass_flow * float(wall.mass_fractions[index])
    burnt = (wall.mass_flow - own_air) * float(last.core.mass_fractions[index])
    return WallQuench(at_wall / leaving, (at_wall - burnt) / leaving)


def core_only(beside: Beside) -> tuple[float, ...]:
    """Return the film air that mixes into the core in each stretch [kg/s]."""
    entered = np.cumsum([sum(s.mass_flow for s in one.air) for one in beside.exchanges])
    mixed = entered - np.array(beside.film_left)
    return tuple(np.diff(mixed, prepend=0.0).tolist())


def _mixed(
    hardware: Hardware, index: int, station: float, films: Mapping[str, AxialProfile] | None
) -> float:
    opening = hardware.openings[index]
    if opening.role not in FILM_ROLES:
        return 0.0
    return mixed_share(hardware, opening, station, films=films)
