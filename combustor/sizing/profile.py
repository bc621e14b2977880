"""Gas along the liner from the shares of the air, at equilibrium: core, and mean of all."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from combustor.airflow.result import LinerGas
from combustor.base.method import Method
from combustor.hardware.metal import Hardware, Opening
from combustor.hardware.zone_air import FILM_ROLES, FRONT_ROLES, mixed_share
from combustor.sizing.fire import Array, HotGas

EQUILIBRIUM_PROFILE = Method(
    key="equilibrium-profile",
    quantity="gas temperature along the liner while sizing",
    source="equilibrium of the fuel with the air mixed in so far",
    reading="computed",
    note="rating replaces it by the reactor networks",
)

# a jump in the air lies between two stations this far apart
_JUMP = 1e-6


@dataclass(frozen=True)
class LinerProfile:
    """Gas along the liner.

    Parameters
    ----------
    station : ndarray
        Rising [m]
    entered : ndarray
        Air inside the liner so far over all air [-]
    core : HotGas
        What burns: film air counts as far as it has mixed.
    mean : HotGas
        All gas inside, the film with it.
    """

    station: Array
    entered: Array
    core: HotGas
    mean: HotGas

    def liner_gas(self, fuel_flow: float) -> LinerGas:
        """Return what the air split needs to know of the fire; fuel enters at the dome."""
        mean = self.mean
        return LinerGas(
            self.station,
            mean.temperature,
            mean.gas_constant,
            mean.heat_capacity_ratio,
            fuel_flow,
            0.0,
        )


def liner_profile(
    hardware: Hardware,
    shares: Mapping[str, float],
    overall: float,
    table: HotGas,
    primary_jet_share: float,
) -> LinerProfile:
    """Return the gas along the liner for given shares of the air.

    Parameters
    ----------
    hardware : Hardware
    shares : mapping of str to float
        Share of all air by opening; they sum to one [-]
    overall : float
        Equivalence ratio of all fuel with all air [-]
    table : HotGas
        Equilibrium products of this fuel and inlet.
    primary_jet_share : float
        Share of the primary row that turns upstream [-]
    """
    station = _stations(hardware)
    entered = np.zeros_like(station)
    mean_air = np.zeros_like(station)
    core_air = np.zeros_like(station)
    primary_end = hardware.zones[0].end
    for opening in hardware.openings:
        share = shares[opening.name]
        here = (station >= opening.station).astype(float)
        entered += share * here
        mean_air += share * _burning(opening, here, primary_jet_share)
        mixed = np.array([mixed_share(hardware, opening, x, primary_jet_share) for x in station])
        if opening.role in FILM_ROLES:
            mixed = np.where(station <= primary_end, 0.0, mixed)
        core_air += share * mixed
    return LinerProfile(
        station, entered, table.at(overall / core_air), table.at(overall / mean_air)
    )


def _burning(opening: Opening, here: Array, primary_jet_share: float) -> Array:
    """Return the share of an opening's air the mean gas has met; the turned jets at once."""
    if opening.role == "primary":
        return np.maximum(here, primary_jet_share)
    if opening.role in FRONT_ROLES:
        return np.maximum(here, 1.0) if opening.station <= 0.0 else here
    return here


def _stations(hardware: Hardware) -> Array:
    end = hardware.liner_length
    points = set(np.linspace(0.0, end, 25).tolist())
    for place in [*(o.station for o in hardware.openings), *(z.end for z in hardware.zones)]:
        points.update((place - _JUMP, place, place + _JUMP))
    return np.array(sorted(x for x in points if 0.0 <= x <= end))
