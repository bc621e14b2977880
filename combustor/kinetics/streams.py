"""Streams of gas: one inflow, and the parallel streams that travel down the flame tube."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Stream:
    """One inflow: air through an opening, or fuel.

    Parameters
    ----------
    mass_flow : float
        [kg/s]
    enthalpy : float
        Formation and sensible [J/kg]
    mass_fractions : ndarray
        By species of the mechanism [-]
    """

    mass_flow: float
    enthalpy: float
    mass_fractions: Array


@dataclass(frozen=True, eq=False)
class Bundle:
    """Parallel streams at one station.

    Parameters
    ----------
    flows : ndarray, shape (streams,)
        [kg/s]
    moles : ndarray, shape (streams, species)
        [kmol/kg]
    enthalpies : ndarray, shape (streams,)
        [J/kg]
    """

    flows: Array
    moles: Array
    enthalpies: Array

    @property
    def total_flow(self) -> float:
        """Mass flow of all streams [kg/s]."""
        return float(self.flows.sum())

    @property
    def mean_moles(self) -> Array:
        """All streams mixed [kmol/kg]."""
        return self.flows @ self.moles / self.flows.sum()

    @property
    def mean_enthalpy(self) -> float:
        """All streams mixed [J/kg]."""
        return float(self.flows @ self.enthalpies / self.flows.sum())

    def joined(self, mass_flow: float, moles: Array, enthalpy: float) -> Bundle:
        """Return the bundle after one inflow is shared among its streams by mass."""
        part = mass_flow / self.total_flow
        return Bundle(
            self.flows * (1.0 + part),
            (self.moles + part * moles) / (1.0 + part),
            (self.enthalpies + part * enthalpy) / (1.0 + part),
        )

    def joined_by(self, inflows: Sequence[Stream], molar_masses: Array) -> Bundle:
        """Return the bundle after several inflows are shared among its streams by mass."""
        bundle = self
        for inflow in inflows:
            moles = inflow.mass_fractions / molar_masses
            bundle = bundle.joined(inflow.mass_flow, moles, inflow.enthalpy)
        return bundle

    def drawn(self, mass_flow: float) -> Bundle:
        """Return the bundle after some of its mean gas was drawn off."""
        return Bundle(self.flows * (1.0 - mass_flow / self.total_flow), self.moles, self.enthalpies)
