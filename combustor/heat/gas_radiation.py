"""Emissivity of the hot gas: luminous flames by correlation, and the flux it sends."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat.sides import FloatArray

STEFAN_BOLTZMANN = 5.670374e-8  # W/m2/K4

LUMINOUS = Method(
    key="luminous-emissivity-lefebvre",
    quantity="emissivity of a luminous flame",
    source="Lefebvre, Flame radiation in gas turbine combustion chambers, 1984; "
    "constant 290 in kPa and m",
    reading="from memory",
    scatter="printed constants differ by up to 15 %; at luminosity 1 it gives 0.5 to 0.9 of the "
    "grey-gas emissivity of clean gas at 1 bar, 0.9 to 1.35 at 10 bar, 1.35 to 1.75 at 30 bar",
    note="18.5e3 in atm and ft is 14 % above 290 in kPa and m; 1.6e4 is the same correlation",
)
LUMINOSITY = Method(
    key="luminosity-hydrogen-lefebvre",
    quantity="luminosity factor of a well-atomised liquid",
    source="Lefebvre 1984: 336 / (hydrogen mass percent)^2",
    reading="from memory",
    validity={"hydrogen_mass_fraction": (0.09, 0.16)},
    scatter="published luminosity laws differ by a factor of two",
)
LUMINOSITY_RATIO = Method(
    key="luminosity-carbon-hydrogen-lefebvre",
    quantity="luminosity factor of a liquid, by its carbon to hydrogen mass ratio",
    source="Lefebvre and co-workers: 3 (C/H - 5.2)^0.75",
    reading="from memory",
    validity={"carbon_hydrogen_mass_ratio": (5.2, 10.0)},
    note="stands beside the hydrogen-content law as a second opinion",
)
EXCHANGE = Method(
    key="gas-wall-radiation-lefebvre-herbert",
    quantity="net radiation from gas to wall",
    source="Lefebvre and Herbert 1960: 0.5 sigma (1 + wall emissivity) eps T_g^1.5 "
    "(T_g^2.5 - T_w^2.5)",
    reading="from memory",
    note="gas absorptivity for wall radiation taken as eps (T_g / T_w)^1.5",
)


def emissivity_luminous(
    pressure: ArrayLike,
    temperature: ArrayLike,
    fuel_air_ratio: ArrayLike,
    beam_length: ArrayLike,
    luminosity: float = 1.0,
    constant: float = 290.0,
) -> FloatArray:
    """Flame emissivity, Lefebvre 1984.

    Parameters
    ----------
    pressure : array
        Pa.
    temperature : array
        Gas temperature, K.
    fuel_air_ratio : array
        Local burned fuel per air by mass.
    beam_length : array
        Mean radiation path, m.
    luminosity : float
        1 for a clear flame.
    constant : float
        290 in kPa and m.

    Returns
    -------
    array
        Emissivity, 0 to 1.
    """
    pressure_kPa = np.asarray(pressure, dtype=float) / 1000.0
    path = np.sqrt(np.asarray(fuel_air_ratio, dtype=float) * beam_length)
    depth = constant * pressure_kPa * luminosity * path
    return -np.expm1(-depth * np.asarray(temperature, dtype=float) ** -1.5)


def luminosity_hydrogen(hydrogen_mass_fraction: float) -> float:
    """Luminosity factor 336 / H^2 from the hydrogen mass fraction of a liquid, Lefebvre 1984."""
    return 336.0 / (100.0 * hydrogen_mass_fraction) ** 2


def luminosity_carbon_hydrogen(carbon_hydrogen_mass_ratio: float) -> float:
    """Luminosity factor 3 (C/H - 5.2)^0.75 from the carbon to hydrogen mass ratio of a liquid."""
    return 3.0 * (carbon_hydrogen_mass_ratio - 5.2) ** 0.75


def flux_to_wall(
    gas_temperature: ArrayLike,
    surface_temperature: ArrayLike,
    gas_emissivity: ArrayLike,
    wall_emissivity: float,
) -> FloatArray:
    """Net radiation from gas to wall, W/m2, Lefebvre and Herbert 1960. Temperatures in K."""
    Tg = np.asarray(gas_temperature, dtype=float)
    Tw = np.asarray(surface_temperature, dtype=float)
    factor = 0.5 * STEFAN_BOLTZMANN * (1.0 + wall_emissivity) * np.asarray(gas_emissivity)
    return factor * Tg**1.5 * (Tg**2.5 - Tw**2.5)
