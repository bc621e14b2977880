"""Humidity of air, and NOx referred to a reference day where a rule asks for that."""

from __future__ import annotations

from dataclasses import dataclass
from math import exp, log

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

ISO_TEMPERATURE = 288.0  # K, as the correction writes it
US_HUMIDITY = 0.00633  # kg water per kg air, of 40 CFR 60
AIRCRAFT_HUMIDITY = 0.00634  # kg water per kg dry air, of ICAO Annex 16
REFERENCE_PRESSURE = 101.3e3  # Pa, ambient, as the correction writes it

MAGNUS = Method(
    key="saturation-pressure-magnus",
    quantity="saturation pressure of water",
    source="Magnus form 611.2 Pa exp(17.62 t / (243.12 + t)), WMO guide no. 8",
    reading="from memory",
    validity={"temperature": (228.15, 333.15)},
    scatter="0.3 %",
)
ISO_CORRECTION = Method(
    key="iso-day-correction",
    quantity="NOx of a diffusion flame at the ISO day",
    source="40 CFR 60.335(b)(1): (Pr/Po)^0.5 exp(19 (Ho - 0.00633)) (288/Ta)^1.53",
    reading="from memory",
    validity={"humidity": (0.0, 0.03), "ambient_temperature": (255.0, 320.0)},
    note="reproduces a published stack-test example; written for diffusion flames",
)
AIRCRAFT_HUMIDITY_CORRECTION = Method(
    key="aircraft-humidity-correction",
    quantity="NOx emission index at the reference humidity",
    source="ICAO Annex 16 Volume II: EI exp(19 (h - 0.00634)); exponent as given in public "
    "documents on SAE AIR5715",
    reading="as given in",
)


@dataclass(frozen=True)
class AmbientAir:
    """Air outside: K, Pa, kg water per kg dry air."""

    temperature: float
    pressure: float
    humidity: float


def saturation_pressure(temperature: float) -> float:
    """Return the saturation pressure of water over water, Pa, at ``temperature`` (K).

    Source
    ------
    ``MAGNUS``.
    """
    celsius = temperature - 273.15
    return 611.2 * exp(17.62 * celsius / (243.12 + celsius))


def saturation_temperature(pressure: float) -> float:
    """Return the temperature (K) at which water saturates at ``pressure`` (Pa)."""
    x = log(pressure / 611.2)
    return 273.15 + 243.12 * x / (17.62 - x)


def humidity_ratio(
    relative_humidity: float,
    pressure: float,
    temperature: float | None = None,
    saturation: float | None = None,
) -> float:
    """Return kg water per kg dry air.

    Parameters
    ----------
    relative_humidity : float
        Fraction.
    pressure : float
        Of the air, Pa.
    temperature, saturation : float, optional
        One of both: K, or the saturation pressure, Pa.
    """
    if saturation is None:
        assert temperature is not None
        saturation = saturation_pressure(temperature)
    vapour = relative_humidity * saturation
    return 18.01528 / 28.96559 * vapour / (pressure - vapour)


def iso_factor(
    humidity: float, ambient_temperature: float, pressure_ratio: float, front_end: str
) -> float:
    """Return by what an observed NOx concentration is multiplied to stand at the ISO day.

    Parameters
    ----------
    humidity : float
        Observed, kg water per kg air.
    ambient_temperature : float
        K.
    pressure_ratio : float
        Combustor inlet pressure at an ambient pressure of 101.3 kPa over that observed.
    front_end : str
        ``"diffusion"`` or another; the method holds for diffusion flames alone.

    Raises
    ------
    InputError
        Not a diffusion flame.

    Source
    ------
    ``ISO_CORRECTION``.
    """
    if front_end != "diffusion":
        raise InputError(
            Problem(
                "the ISO-day correction of NOx is made for diffusion flames",
                "a lean premixed or staged flame does not follow its exponents: compare at the "
                "conditions as they are, or rate the point at ISO ambient",
                "front_end",
                front_end,
            )
        )
    warm = (ISO_TEMPERATURE / ambient_temperature) ** 1.53
    return float(pressure_ratio**0.5 * exp(19.0 * (humidity - US_HUMIDITY)) * warm)


def aircraft_humidity_factor(humidity: float) -> float:
    """Return by what a NOx emission index is multiplied to stand at the reference humidity.

    Parameters
    ----------
    humidity : float
        Of the engine's inlet air, kg water per kg dry air.

    Source
    ------
    ``AIRCRAFT_HUMIDITY_CORRECTION``.
    """
    return exp(19.0 * (humidity - AIRCRAFT_HUMIDITY))
