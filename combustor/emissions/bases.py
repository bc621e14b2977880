"""Exact conversions between the bases on which an emission is stated.

Every function has its inverse beside it. Arguments are floats or arrays of one shape.
"""

from __future__ import annotations

from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.wobbe import molar_volume

Value = TypeVar("Value", float, NDArray[np.float64])

OXYGEN_IN_AIR = 0.2095  # mole fraction, dry; rules that prescribe 0.209 or 0.21 pass their own
REFERENCE_OXYGEN = 0.15  # mole fraction, dry: gas turbines
NORMAL_TEMPERATURE = 273.15  # K, of a normal m3; 288.15 and 293.15 are in use as well
NORMAL_PRESSURE = 101325.0  # Pa

# kg/mol
NO2_MOLAR_MASS = 46.0055e-3
NO_MOLAR_MASS = 30.0061e-3
CO_MOLAR_MASS = 28.0101e-3
CH4_MOLAR_MASS = 16.0425e-3
N2O_MOLAR_MASS = 44.0128e-3
NH3_MOLAR_MASS = 17.0305e-3

REFERENCE_OXYGEN_CORRECTION = Method(
    key="oxygen-correction",
    quantity="concentration at a reference O2, dry",
    source="dilution with dry air until O2 is the reference: (x_air - x_ref) / (x_air - x_O2)",
    reading="derived",
    validity={"o2_dry": (0.0, 0.20)},
)


def dry(wet_fraction: Value, water_fraction: Value) -> Value:
    """Return the mole fraction in the gas without its water.

    Parameters
    ----------
    wet_fraction, water_fraction : float or array
        Mole fractions in the wet gas.
    """
    return wet_fraction / (1.0 - water_fraction)


def wet(dry_fraction: Value, water_fraction: Value) -> Value:
    """Return the mole fraction in the wet gas; inverse of `dry`."""
    return dry_fraction * (1.0 - water_fraction)


def at_reference_oxygen(
    dry_fraction: Value,
    oxygen_dry: Value,
    reference: float = REFERENCE_OXYGEN,
    oxygen_in_air: float = OXYGEN_IN_AIR,
) -> Value:
    """Return a dry mole fraction as it would be at the reference O2.

    Parameters
    ----------
    dry_fraction, oxygen_dry : float or array
        Pollutant and O2, both in the DRY gas.
    reference : float
        O2 to refer to, dry.
    oxygen_in_air : float
        O2 in dry air.

    Raises
    ------
    InputError
        O2 at or above that of air, where the correction is undefined.

    Source
    ------
    ``REFERENCE_OXYGEN_CORRECTION``.
    """
    return dry_fraction * _dilution(oxygen_dry, reference, oxygen_in_air)


def from_reference_oxygen(
    reference_fraction: Value,
    oxygen_dry: Value,
    reference: float = REFERENCE_OXYGEN,
    oxygen_in_air: float = OXYGEN_IN_AIR,
) -> Value:
    """Return the dry mole fraction at the O2 found; inverse of `at_reference_oxygen`."""
    return reference_fraction / _dilution(oxygen_dry, reference, oxygen_in_air)


def mass_concentration(
    fraction: Value,
    molar_mass: float,
    temperature: float = NORMAL_TEMPERATURE,
    pressure: float = NORMAL_PRESSURE,
) -> Value:
    """Return kg of a species per m3 of ideal gas.

    Parameters
    ----------
    fraction : float or array
        Mole fraction.
    molar_mass : float
        Of the species, kg/mol.
    temperature, pressure : float
        At which the m3 is counted, K and Pa.
    """
    return fraction * (molar_mass / molar_volume(temperature, pressure))


def mole_fraction(
    concentration: Value,
    molar_mass: float,
    temperature: float = NORMAL_TEMPERATURE,
    pressure: float = NORMAL_PRESSURE,
) -> Value:
    """Return the mole fraction of a mass concentration (kg/m3); inverse of the above."""
    return concentration / (molar_mass / molar_volume(temperature, pressure))


def emission_index(
    fraction: Value, molar_mass: float, gas_molar_mass: Value, gas_per_fuel: Value
) -> Value:
    """Return kg of a species per kg of fuel.

    Parameters
    ----------
    fraction : float or array
        Mole fraction in the gas as it flows (wet).
    molar_mass, gas_molar_mass : float
        Of the species and of the gas, kg/mol.
    gas_per_fuel : float
        Mass flow of that gas per mass flow of fuel.
    """
    return fraction * molar_mass / gas_molar_mass * gas_per_fuel


def fraction_of_index(
    index: Value, molar_mass: float, gas_molar_mass: Value, gas_per_fuel: Value
) -> Value:
    """Return the wet mole fraction of an emission index (kg/kg); inverse of `emission_index`."""
    return index / molar_mass * gas_molar_mass / gas_per_fuel


def per_energy(index: Value, heating_value: float) -> Value:
    """Return kg per J from an emission index (kg/kg) and the fuel's heating value (J/kg)."""
    return index / heating_value


def index_of_energy(mass_per_energy: Value, heating_value: float) -> Value:
    """Return the emission index of a mass per energy; inverse of `per_energy`."""
    return mass_per_energy * heating_value


def dry_exhaust_per_fuel(
    oxygen: float,
    dry_products: float,
    reference: float = REFERENCE_OXYGEN,
    oxygen_in_air: float = OXYGEN_IN_AIR,
) -> float:
    """Return mol of dry exhaust at the reference O2 per mol of fuel burnt completely.

    Parameters
    ----------
    oxygen : float
        mol O2 that burn one mol of fuel.
    dry_products : float
        mol of dry gas that one mol of fuel leaves: CO2, N2 and inerts.
    reference, oxygen_in_air : float
        Mole fractions of dry exhaust and of dry air.
    """
    air_rest = oxygen * (1.0 - oxygen_in_air) / oxygen_in_air
    excess = oxygen_in_air / (oxygen_in_air - reference)
    return (dry_products + air_rest) * excess


def index_of_reference_fraction(
    reference_fraction: Value, molar_mass: float, fuel_molar_mass: float, dry_exhaust: float
) -> Value:
    """Return the emission index (kg/kg) of a dry mole fraction at the reference O2.

    Parameters
    ----------
    reference_fraction : float or array
        Dry, at the reference O2.
    molar_mass, fuel_molar_mass : float
        kg/mol.
    dry_exhaust : float
        mol dry exhaust at that O2 per mol fuel, from `dry_exhaust_per_fuel`.
    """
    return reference_fraction * (dry_exhaust * molar_mass / fuel_molar_mass)


def reference_fraction_of_index(
    index: Value, molar_mass: float, fuel_molar_mass: float, dry_exhaust: float
) -> Value:
    """Return the dry mole fraction at the reference O2; inverse of the above."""
    return index / (dry_exhaust * molar_mass / fuel_molar_mass)


def _dilution(oxygen_dry: Value, reference: float, oxygen_in_air: float) -> Value:
    if np.any(np.asarray(oxygen_dry) >= oxygen_in_air):
        raise InputError(
            Problem(
                "dry O2 at or above that of air: no exhaust to correct",
                key="oxygen",
                value=float(np.max(oxygen_dry)),
                allowed=f"give the dry mole fraction, below {oxygen_in_air:g}",
            )
        )
    return (oxygen_in_air - reference) / (oxygen_in_air - oxygen_dry)
