"""Dew points of an exhaust: water, and sulfuric acid."""

from __future__ import annotations

from math import log, log10

from combustor.base.method import Method
from combustor.emissions.reference_day import saturation_temperature

MILLIMETRE_OF_MERCURY = 133.322387415  # Pa
ATMOSPHERE = 101325.0  # Pa

WATER_DEW_POINT = Method(
    key="water-dew-point-magnus",
    quantity="water dew point",
    source="Magnus form 611.2 Pa exp(17.62 t / (243.12 + t)) solved for t",
    reading="from memory",
    scatter="0.2 K up to 60 degC",
)
ACID_DEW_POINT = Method(
    key="acid-dew-point-verhoff-banchero",
    quantity="sulfuric acid dew point",
    source="Verhoff & Banchero 1974: 1000/T = 2.276 - 0.0294 ln p_H2O - 0.0858 ln p_SO3 + 0.0062 "
    "ln p_H2O ln p_SO3, mmHg",
    reading="as given in",
    scatter="5 K between the two forms, 0.1 to 10 ppm SO3",
    note="constants as given with a worked example of 402 K; copies misprint 0.0062 as 0.0082",
)
ACID_DEW_POINT_OKKES = Method(
    key="acid-dew-point-okkes",
    quantity="sulfuric acid dew point",
    source="Okkes 1987: t = 203.25 + 27.6 lg p_H2O + 10.83 lg p_SO3 + "
    "1.06 (lg p_SO3 + 8)^2.19, atm",
    reading="as given in",
    scatter="5 K between the two forms, 0.1 to 10 ppm SO3",
)


def water_dew_point(water: float, pressure: float = ATMOSPHERE) -> float:
    """Return the water dew point, K.

    Parameters
    ----------
    water : float
        Mole fraction in the wet gas.
    pressure : float
        Pa.

    Source
    ------
    ``WATER_DEW_POINT``.
    """
    return saturation_temperature(water * pressure)


def acid_dew_point_verhoff_banchero(water_pressure: float, so3_pressure: float) -> float:
    """Return the acid dew point, K, from partial pressures, Pa.

    Source
    ------
    ``ACID_DEW_POINT``.
    """
    w = log(water_pressure / MILLIMETRE_OF_MERCURY)
    s = log(so3_pressure / MILLIMETRE_OF_MERCURY)
    return 1000.0 / (2.276 - 0.0294 * w - 0.0858 * s + 0.0062 * w * s)


def acid_dew_point_okkes(water_pressure: float, so3_pressure: float) -> float:
    """Return the acid dew point, K, from partial pressures, Pa.

    Source
    ------
    ``ACID_DEW_POINT_OKKES``.
    """
    w, s = log10(water_pressure / ATMOSPHERE), log10(so3_pressure / ATMOSPHERE)
    return 273.15 + 203.25 + 27.6 * w + 10.83 * s + 1.06 * (s + 8.0) ** 2.19


def acid_dew_point(water: float, so3: float, pressure: float = ATMOSPHERE) -> float | None:
    """Return the acid dew point, K, from mole fractions in the wet gas; None without SO3."""
    if so3 <= 0.0:
        return None
    return acid_dew_point_verhoff_banchero(water * pressure, so3 * pressure)
