"""Records of the chain: the cells that make it up, and what they turned out to be."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from combustor.base.convergence import Convergence
from combustor.base.method import Notice
from combustor.fuel.gas import GasState
from combustor.kinetics.balances import Balances
from combustor.kinetics.branch import Status
from combustor.kinetics.near_wall import NO_EXCHANGE, WallExchange
from combustor.kinetics.streams import Stream
from combustor.kinetics.unmixedness import Distribution
from combustor.kinetics.zone import ZoneState

Array = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Cell:
    """One stirred cell downstream of the primary zone.

    Parameters
    ----------
    name : str
        Zone it belongs to.
    volume : float
        For the flows given [m3]
    start, end : float
        Axial stations [m]
    air : tuple of Stream
        Inflows that enter here, shared among the streams by mass.
    mixing : float
        Rate at which the streams approach their mean [1/s]
    returned : float
        Mean gas drawn from here back into the primary zone [kg/s]
    beside : WallExchange
        What the stream beside the wall takes and gives here.
    """

    name: str
    volume: float
    start: float
    end: float
    air: tuple[Stream, ...] = ()
    mixing: float = 0.0
    returned: float = 0.0
    beside: WallExchange = NO_EXCHANGE


@dataclass(frozen=True, eq=False)
class Part:
    """Core or near-wall stream at the exit of a cell.

    Parameters
    ----------
    mass_flow : float
        [kg/s]
    temperature : float
        Of its streams mixed, enthalpy-mean [K]
    mass_fractions : ndarray
        Of its streams mixed [-]
    density : float
        Hot, by the streams' own temperatures [kg/m3]
    """

    mass_flow: float
    temperature: float
    mass_fractions: Array
    density: float


@dataclass(frozen=True, eq=False)
class Station:
    """What one cell of the chain turned out to be.

    Parameters
    ----------
    name : str
    start, end : float
        [m]
    mass_flow : float
        Through its exit, before anything is drawn back [kg/s]
    temperature : float
        Of all streams mixed, the near-wall stream with them, enthalpy-mean [K]
    mass_fractions : ndarray
        Of all streams mixed [-]
    density : float
        Hot, by the streams' own temperatures: mass over volume [kg/m3]
    core : Part
        The streams of the core alone.
    beside : Part or None
        The stream beside the wall, where there is one.
    residence_time : float
        Hot mass in the volume over the flow through it [s]
    stream_temperatures : ndarray
        Of the core [K]
    stream_shares : ndarray
        Of the core, by mass [-]
    burning : ndarray of bool
        By stream of the core.
    """

    name: str
    start: float
    end: float
    mass_flow: float
    temperature: float
    mass_fractions: Array
    density: float
    core: Part
    beside: Part | None
    residence_time: float
    stream_temperatures: Array
    stream_shares: Array
    burning: NDArray[np.bool_]


@dataclass(frozen=True, eq=False)
class Chain:
    """A solved chain.

    Parameters
    ----------
    status : {"burning", "blown_out", "not_converged"}
        Judged by the primary zone; a blown-out chain has its cold primary zone and nothing after.
    stations : tuple of Station
        The primary zone first.
    distribution : Distribution
        Streams of the primary zone as they enter.
    exit : GasState or None
        All streams mixed after the last cell; None unless burning.
    balances : Balances or None
        None unless burning.
    convergence : Convergence
    notices : tuple of Notice
    states : tuple of ZoneState
        For a warm start of a neighbouring solve.
    return_state : ndarray or None
        Specific moles, then enthalpy, of what is drawn back; for the same purpose.
    """

    status: Status
    stations: tuple[Station, ...]
    distribution: Distribution
    exit: GasState | None
    balances: Balances | None
    convergence: Convergence
    notices: tuple[Notice, ...]
    states: tuple[ZoneState, ...]
    return_state: Array | None = None

    @property
    def unmixedness(self) -> float:
        """Realised standard deviation of mixture fraction over its mean [-]."""
        return self.distribution.unmixedness

    @cached_property
    def x(self) -> Array:
        """Axial station of each cell's exit [m]."""
        return np.array([station.end for station in self.stations])

    @cached_property
    def temperatures(self) -> Array:
        """Enthalpy-mean temperature at each cell's exit [K]."""
        return np.array([station.temperature for station in self.stations])

    @cached_property
    def mass_fractions(self) -> Array:
        """Mean composition at each cell's exit, cells by species [-]."""
        return np.array([station.mass_fractions for station in self.stations])

    @cached_property
    def mass_flows(self) -> Array:
        """Flow through each cell's exit [kg/s]."""
        return np.array([station.mass_flow for station in self.stations])

    @cached_property
    def residence_times(self) -> Array:
        """Residence time of each cell from hot density [s]."""
        return np.array([station.residence_time for station in self.stations])

    @cached_property
    def densities(self) -> Array:
        """Hot density of each cell [kg/m3]."""
        return np.array([station.density for station in self.stations])
