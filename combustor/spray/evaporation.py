"""Evaporation of drops by the square of their diameter, one size or a Rosin-Rammler spray."""

from __future__ import annotations

from math import gamma, log

import numpy as np
from numpy.typing import NDArray

from combustor.base.method import Method

D_SQUARED = Method(
    key="evaporation-d-squared",
    quantity="evaporation constant of a drop at rest",
    source="Godsave 1953; Spalding 1953: 8 k ln(1 + B) / (cp rho)",
    reading="from memory",
)
EFFECTIVE_EVAPORATION = Method(
    key="evaporation-effective",
    quantity="evaporation constant in flame gas, heating-up and slip included",
    source="Chin and Lefebvre 1983: 0.6 to 1.2 mm2/s at 1000 to 2000 K and 1 to 10 atm",
    reading="from memory",
    validity={"evaporation_constant": (0.6e-6, 1.2e-6), "pressure": (1e5, 1e6)},
    scatter="factor 1.5",
)
ROSIN_RAMMLER = Method(
    key="spray-rosin-rammler",
    quantity="distribution of drop size: volume in drops larger than D is exp(-(D/X)^q)",
    source="Rosin and Rammler 1933; X = Sauter mean x gamma(1 - 1/q)",
    reading="derived",
    note="q of 2 to 4 is usual; 3 taken",
)

EFFECTIVE_CONSTANT = 0.8e-6  # m2/s, EFFECTIVE_EVAPORATION
SLIP = 0.30  # Ranz and Marshall 1952; 0.276 in Froessling 1938
_QUANTILES = 2000


def transfer_number(
    gas_temperature: float,
    drop_temperature: float,
    supply_temperature: float,
    gas_heat_capacity: float,
    liquid_heat_capacity: float,
    latent_heat: float,
) -> float:
    """Return Spalding's transfer number of an evaporating drop (temperatures K, heats J/kg)."""
    warming = liquid_heat_capacity * (drop_temperature - supply_temperature)
    return gas_heat_capacity * (gas_temperature - drop_temperature) / (latent_heat + warming)


def constant_at_rest(
    conductivity: float, heat_capacity: float, liquid_density: float, number: float
) -> float:
    """Return the evaporation constant of a drop at rest, m2/s.

    Parameters
    ----------
    conductivity, heat_capacity : float
        Of the gas at the drop, W/m/K and J/kg/K.
    liquid_density : float
        kg/m3.
    number : float
        Transfer number.

    Source
    ------
    ``D_SQUARED``.
    """
    return 8.0 * conductivity * log(1.0 + number) / (heat_capacity * liquid_density)


def constant_with_slip(at_rest: float, reynolds: float, prandtl: float = 0.7) -> float:
    """Return the evaporation constant of a drop that moves through the gas, m2/s."""
    return at_rest * (1.0 + SLIP * reynolds**0.5 * prandtl**0.33)


def evaporation_time(diameter: float, constant: float) -> float:
    """Return how long a drop lives, s (m, m2/s)."""
    return diameter**2 / constant


def evaporated_single(diameter: float, constant: float, time: float) -> float:
    """Return the share of a drop's mass evaporated after a time."""
    left = max(1.0 - constant * time / diameter**2, 0.0)
    return 1.0 - left**1.5


def rosin_rammler_size(sauter_mean: float, spread: float) -> float:
    """Return the Rosin-Rammler size X of a Sauter mean, m; ``spread`` q above 1."""
    return sauter_mean * gamma(1.0 - 1.0 / spread)


def evaporated_spray(sauter_mean: float, spread: float, constant: float, time: float) -> float:
    """Return the share of a spray's mass evaporated after a time.

    Parameters
    ----------
    sauter_mean : float
        m.
    spread : float
        Rosin-Rammler exponent q.
    constant : float
        m2/s.
    time : float
        s.

    Source
    ------
    ``ROSIN_RAMMLER``.
    """
    if time <= 0.0:
        return 0.0
    volume = (np.arange(_QUANTILES) + 0.5) / _QUANTILES
    size = rosin_rammler_size(sauter_mean, spread)
    diameters: NDArray[np.float64] = size * (-np.log1p(-volume)) ** (1.0 / spread)
    left = np.maximum(1.0 - constant * time / diameters**2, 0.0) ** 1.5
    return float(1.0 - left.mean())
