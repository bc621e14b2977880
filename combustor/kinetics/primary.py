"""The primary zone: unmixed streams of fuel and air, each fed back with mean products."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.gas import Gas
from combustor.kinetics.streams import Bundle, Stream
from combustor.kinetics.unmixedness import Distribution, beta_streams
from combustor.kinetics.zone import Zone

Array = NDArray[np.float64]

DEFAULT_STREAMS = 9

RECIRCULATION_TO_STREAMS = Method(
    key="recirculation-to-streams",
    quantity="mean products of the primary zone brought back to every stream",
    source="each stream a stirred reactor fed with its own fuel and air and the zone's mean "
    "products, equal residence time from hot density",
    reading="derived",
)


@dataclass(frozen=True, eq=False)
class PrimaryZone:
    """Where fuel meets air and the flame is held.

    Parameters
    ----------
    fuel : Stream
    air : Stream
        Everything that burns here: swirler, dome, its share of the primary row.
    volume : float
        For the flows given [m3]
    unmixedness : float
        Standard deviation of mixture fraction over its mean, by mass, where fuel and air enter [-]
    recirculation : float
        Recirculated mass per fresh mass [-]
    streams : int
        Number of parallel streams when not fully mixed.
    end : float
        Axial station of its end [m]
    distribution : Distribution or None
        Streams as several injectors make them, in place of `unmixedness` and `streams`.
    """

    fuel: Stream
    air: Stream
    volume: float
    unmixedness: float
    recirculation: float
    streams: int = DEFAULT_STREAMS
    end: float = 0.0
    distribution: Distribution | None = None


def distribution_of(primary: PrimaryZone) -> Distribution:
    """Return the streams' mixture fractions and mass shares.

    Raises
    ------
    InputError
        No fuel, no air, or a width that cannot be.
    """
    for name, stream in (("fuel flow", primary.fuel), ("primary air", primary.air)):
        if not stream.mass_flow > 0.0:
            raise InputError(
                Problem("nothing flows into the primary zone", "above 0", name, stream.mass_flow)
            )
    if primary.distribution is not None:
        return primary.distribution
    mean = primary.fuel.mass_flow / (primary.fuel.mass_flow + primary.air.mass_flow)
    return beta_streams(mean, primary.unmixedness, primary.streams)


def fresh_bundle(gas: Gas, primary: PrimaryZone, distribution: Distribution) -> Bundle:
    """Return the unburnt streams as they enter."""
    fuel = primary.fuel.mass_fractions / gas.rates.molar_masses
    air = primary.air.mass_fractions / gas.rates.molar_masses
    share = distribution.mixture_fractions
    return Bundle(
        distribution.shares * (primary.fuel.mass_flow + primary.air.mass_flow),
        np.outer(share, fuel) + np.outer(1.0 - share, air),
        share * primary.fuel.enthalpy + (1.0 - share) * primary.air.enthalpy,
    )


def primary_zone(
    gas: Gas, pressure: float, primary: PrimaryZone, fresh: Bundle, heat_loss: float
) -> Zone:
    """Return the primary zone as parallel stirred streams."""
    return Zone(
        gas=gas,
        pressure=pressure,
        flows=fresh.flows,
        moles=fresh.moles,
        enthalpies=fresh.enthalpies,
        volume=primary.volume,
        recirculation=primary.recirculation,
        heat_loss=heat_loss,
    )
