"""Volume basis of a gaseous fuel: density, relative density, heat per volume, Wobbe index.

Ideal gas, metered and burnt at 15 degC and 101.325 kPa ("15/15").
"""

from __future__ import annotations

from math import sqrt

from combustor.base.method import Method

GAS_CONSTANT = 8.314462618  # J/mol/K, CODATA 2018 (exact)
REFERENCE_TEMPERATURE = 288.15  # K, 15 degC
REFERENCE_PRESSURE = 101325.0  # Pa
AIR_MOLAR_MASS = 0.0289655  # kg/mol, dry air of ISO 6976

WOBBE_INDEX = Method(
    key="wobbe-index",
    quantity="Wobbe index: heating value per volume over the root of relative density",
    source="ISO 6976:2016, ideal gas at 15 degC and 101.325 kPa, air 28.9655 kg/kmol",
    reading="as given in",
    note="ideal gas: the real-gas Wobbe index of natural gas stands about 0.2 % higher",
)


def molar_volume(
    temperature: float = REFERENCE_TEMPERATURE, pressure: float = REFERENCE_PRESSURE
) -> float:
    """Return the ideal molar volume, m3/mol, at ``temperature`` (K) and ``pressure`` (Pa)."""
    return GAS_CONSTANT * temperature / pressure


def ideal_density(molar_mass: float) -> float:
    """Return the ideal-gas density at 15 degC and 101.325 kPa, kg/m3 (``molar_mass`` kg/mol)."""
    return molar_mass / molar_volume()


def relative_density(molar_mass: float) -> float:
    """Return the ideal-gas density over that of dry air (``molar_mass`` kg/mol)."""
    return molar_mass / AIR_MOLAR_MASS


def heat_per_volume(heating_value: float, molar_mass: float) -> float:
    """Return the heating value per volume at 15/15, J/m3.

    Parameters
    ----------
    heating_value : float
        J/kg at 15 degC, lower or higher.
    molar_mass : float
        kg/mol.
    """
    return heating_value * ideal_density(molar_mass)


def wobbe_index(heating_value: float, molar_mass: float) -> float:
    """Return the Wobbe index at 15/15, J/m3; lower or higher as ``heating_value`` (J/kg) is.

    Source
    ------
    ``WOBBE_INDEX``.
    """
    return heat_per_volume(heating_value, molar_mass) / sqrt(relative_density(molar_mass))
