"""Emissions of one exhaust gas on every basis that is reported."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Emissions:
    """Emissions of one gas; SI and fractions throughout, None where a basis is undefined.

    Parameters
    ----------
    ei_nox, ei_co, ei_uhc : float or None
        kg per kg fuel. NOx (NO + NO2) as NO2; unburnt hydrocarbons as CH4 by carbon. None
        without fuel.
    nox_dry_15, co_dry_15, n2o_dry_15, nh3_dry_15 : float or None
        Mole fractions, dry, at 15 % O2 with 20.95 % O2 in air. None when the gas is rich or
        its dry O2 is above 20 %.
    nox_mass_15, co_mass_15 : float or None
        kg per dry m3 (0 degC, 101.325 kPa) at 15 % O2; NOx as NO2.
    nox_per_energy : float or None
        kg NO2 per J of lower heating value.
    o2_dry, co2_dry, h2o_wet : float
        Mole fractions as found.
    combustion_efficiency : float or None
        1 - (CO, H2, NH3 and hydrocarbons as CH4, each at its lower heating value) / fuel's.
    no_share : float or None
        NO / (NO + NO2) by mole; None without NOx.
    """

    ei_nox: float | None
    ei_co: float | None
    ei_uhc: float | None
    nox_dry_15: float | None
    co_dry_15: float | None
    n2o_dry_15: float | None
    nox_mass_15: float | None
    co_mass_15: float | None
    nox_per_energy: float | None
    o2_dry: float
    co2_dry: float
    h2o_wet: float
    combustion_efficiency: float | None
    no_share: float | None
    nh3_dry_15: float | None = None
