"""A zone: parallel stirred streams that share one volume, and the states it can take.

Every reactor of the chain is such a zone. The primary zone has many streams joined by
recirculation; a later cell has the same streams joined by exchange; a single stirred reactor is a
zone of one stream.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, Problem
from combustor.fuel.gas import UNIVERSAL_GAS_CONSTANT, Gas

Array = NDArray[np.float64]

GAS_CONSTANT = 1000.0 * UNIVERSAL_GAS_CONSTANT  # J/(kmol K)


@dataclass(frozen=True, eq=False)
class Zone:
    """What flows into parallel stirred streams and what they share.

    Parameters
    ----------
    gas : Gas
    pressure : float
        [Pa]
    flows : ndarray, shape (streams,)
        Fresh mass flow into each stream [kg/s]
    moles : ndarray, shape (streams, species)
        Of the fresh inflows [kmol/kg]
    enthalpies : ndarray, shape (streams,)
        Of the fresh inflows [J/kg]
    volume : float or None
        Shared volume [m3]
    residence_time : float or None
        Of one pass, equal for all streams; give this or ``volume`` [s]
    recirculation : float
        Mean products brought back to every stream, by mass of its fresh inflow [-]
    mixing : float
        Rate at which the inflows approach their mean during the residence time [1/s]
    heat_loss : float
        Of the whole zone, shared by mass [W]
    apart : int
        So many of the last streams keep out of the exchange with the mean.
    """

    gas: Gas
    pressure: float
    flows: Array
    moles: Array
    enthalpies: Array
    volume: float | None = None
    residence_time: float | None = None
    recirculation: float = 0.0
    mixing: float = 0.0
    heat_loss: float = 0.0
    apart: int = 0

    def __post_init__(self) -> None:
        if (self.volume is None) == (self.residence_time is None):
            raise InputError(
                Problem(
                    "a stirred zone needs its size once",
                    key="volume",
                    value=self.volume,
                    allowed="give either the volume or the residence time",
                )
            )
        positive = (("flow", float(self.flows.min())), ("pressure", self.pressure))
        sizes = (("volume", self.volume), ("residence time", self.residence_time))
        for name, value in (*positive, *sizes):
            if value is not None and not 0.0 < value < float("inf"):
                raise InputError(
                    Problem("must be a positive number", key=name, value=value, allowed="above 0")
                )
        not_negative = (("recirculation", self.recirculation), ("mixing", self.mixing))
        for name, value in not_negative:
            if not 0.0 <= value < float("inf"):
                raise InputError(
                    Problem("must not be negative", key=name, value=value, allowed="0 or above")
                )

    @property
    def streams(self) -> int:
        """Number of parallel streams."""
        return len(self.flows)

    @cached_property
    def total_flow(self) -> float:
        """Fresh mass flow of all streams [kg/s]."""
        return float(self.flows.sum())

    @cached_property
    def shares(self) -> Array:
        """Mass share of each stream [-]."""
        return self.flows / self.total_flow

    @cached_property
    def mean_moles(self) -> Array:
        """Fresh inflow, all streams mixed [kmol/kg]."""
        return self.shares @ self.moles

    @cached_property
    def mean_enthalpy(self) -> float:
        """Fresh inflow, all streams mixed [J/kg]."""
        return float(self.shares @ self.enthalpies)

    @property
    def exchanging(self) -> int:
        """Number of streams that mix towards their mean; they come first."""
        return self.streams - self.apart

    @cached_property
    def exchange_mean(self) -> tuple[Array, float]:
        """Fresh moles [kmol/kg] and enthalpy [J/kg] of the exchanging streams, mixed."""
        few = self.exchanging
        shares = self.flows[:few] / self.flows[:few].sum()
        return shares @ self.moles[:few], float(shares @ self.enthalpies[:few])

    @cached_property
    def loss_per_pass(self) -> float:
        """Heat lost per mass and pass [J/kg]."""
        return self.heat_loss / (self.total_flow * (1.0 + self.recirculation))

    @cached_property
    def exit_enthalpy(self) -> float:
        """Mean enthalpy of what leaves [J/kg]."""
        return self.mean_enthalpy - self.heat_loss / self.total_flow

    def exchanged(self, rate: float) -> float:
        """Return how far the inflows have come to their mean at a throughflow rate [1/s]."""
        return -float(np.expm1(-self.mixing / rate))

    def inlets(self, mean: Array, rate: float) -> Array:
        """Return what each stream takes in: its inflow, after exchange, with mean products.

        Parameters
        ----------
        mean : ndarray
            Mean products [kmol/kg]
        rate : float
            Inverse residence time [1/s]

        Returns
        -------
        ndarray, shape (streams, species)
            [kmol/kg]
        """
        fresh = self.moles
        if self.mixing > 0.0 and self.exchanging > 1:
            few = self.exchanging
            fresh = fresh.copy()
            fresh[:few] += self.exchanged(rate) * (self.exchange_mean[0] - fresh[:few])
        if self.recirculation == 0.0:
            return fresh
        return (fresh + self.recirculation * mean) / (1.0 + self.recirculation)

    def inlet_slope(self, rate: float) -> Array | None:
        """Return d(inlets)/d(rate), or None where the exchange does not depend on it."""
        if self.mixing == 0.0 or self.exchanging <= 1:
            return None
        few = self.exchanging
        slope = np.zeros_like(self.moles)
        slope[:few] = self.exchange_mean[0] - self.moles[:few]
        slope *= -np.exp(-self.mixing / rate) * self.mixing / rate**2
        return slope / (1.0 + self.recirculation)

    def inlet_enthalpies(self, rate: float) -> Array:
        """Return the enthalpy of what each stream takes in [J/kg]."""
        fresh = self.enthalpies
        if self.mixing > 0.0 and self.exchanging > 1:
            few = self.exchanging
            fresh = fresh.copy()
            fresh[:few] += self.exchanged(rate) * (self.exchange_mean[1] - fresh[:few])
        back = self.recirculation
        return (fresh + back * self.exit_enthalpy) / (1.0 + back)

    def throughflow_volume(self, state: ZoneState) -> float:
        """Return the mean specific volume of a state, by mass [m3/kg]."""
        each = state.temperatures * state.moles.sum(axis=1)
        return float(self.shares @ each) * GAS_CONSTANT / self.pressure

    def throughflow_rate(self, specific_volume: float) -> float:
        """Return the inverse residence time of one pass at a mean hot specific volume [1/s]."""
        if self.residence_time is not None:
            return 1.0 / self.residence_time
        assert self.volume is not None
        return (1.0 + self.recirculation) * self.total_flow * specific_volume / self.volume


@dataclass(frozen=True, eq=False)
class ZoneState:
    """Composition and temperature of every stream, and the shared throughflow rate.

    Parameters
    ----------
    moles : ndarray, shape (streams, species)
        [kmol/kg]
    temperatures : ndarray, shape (streams,)
        [K]
    rate : float
        Inverse residence time of one pass [1/s]
    margins : ndarray or None
        Of streams that cannot burn: where their burning branch ends, in residence times of
        this state. Zero for burning streams; None where all burn or nobody asked [-]
    """

    moles: Array
    temperatures: Array
    rate: float
    margins: Array | None = None
