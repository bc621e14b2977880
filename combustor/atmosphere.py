"""Standard atmosphere and what an intake makes of it in flight."""

from __future__ import annotations

import math
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

STANDARD_ATMOSPHERE = Method(
    key="standard-atmosphere",
    quantity="temperature and pressure of the standard day",
    source="ICAO Doc 7488 / ISO 2533: 288.15 K, 101325 Pa, -6.5 K/km to 11 km, 216.65 K to 20 km",
    reading="as given in",
    validity={"altitude": (-500.0, 20000.0)},
    note="geopotential height; handbooks by geometric height differ by 0.2 % at 11 km",
)
RAM_RECOVERY = Method(
    key="ram-recovery",
    quantity="total pressure and temperature behind an intake",
    source="isentropic stagnation of air with 1.4; recovery is the share of the ram pressure "
    "rise that is kept",
    reading="derived",
    validity={"flight_mach": (0.0, 3.0)},
)

GRAVITY = 9.80665  # m/s2
SEA_LEVEL_TEMPERATURE = 288.15  # K
SEA_LEVEL_PRESSURE = 101325.0  # Pa
LAPSE_RATE = 6.5e-3  # K/m
TROPOPAUSE = 11000.0  # m
CEILING, FLOOR = 20000.0, -500.0  # m
GAS_CONSTANT = 287.05287  # J/(kg K)
HEAT_CAPACITY_RATIO = 1.4
SUTHERLAND_FACTOR, SUTHERLAND_TEMPERATURE = 1.458e-6, 110.4  # kg/(m s K^0.5), K


@dataclass(frozen=True)
class Air:
    """Air of the standard day at one height.

    Parameters
    ----------
    temperature, pressure : float
        Static [K], [Pa]
    """

    temperature: float
    pressure: float

    @property
    def density(self) -> float:
        """Density [kg/m3]."""
        return self.pressure / (GAS_CONSTANT * self.temperature)

    @property
    def speed_of_sound(self) -> float:
        """Speed of sound [m/s]."""
        return math.sqrt(HEAT_CAPACITY_RATIO * GAS_CONSTANT * self.temperature)

    @property
    def viscosity(self) -> float:
        """Dynamic viscosity [Pa s]."""
        return (
            SUTHERLAND_FACTOR * self.temperature**1.5 / (self.temperature + SUTHERLAND_TEMPERATURE)
        )


def standard_air(altitude: float) -> Air:
    """Return the air of the standard day.

    Parameters
    ----------
    altitude : float
        Geopotential height [m]

    Raises
    ------
    InputError
        Outside -500 to 20000 m.

    Source
    ------
    ``STANDARD_ATMOSPHERE``.
    """
    if not FLOOR <= altitude <= CEILING:
        raise InputError(
            Problem(
                "outside the standard atmosphere known here",
                f"{FLOOR:.0f} to {CEILING:.0f} m of geopotential height; above, state "
                "inlet_pressure and inlet_temperature",
                "altitude",
                altitude,
            )
        )
    height = min(altitude, TROPOPAUSE)
    temperature = SEA_LEVEL_TEMPERATURE - LAPSE_RATE * height
    exponent = GRAVITY / (GAS_CONSTANT * LAPSE_RATE)
    pressure = SEA_LEVEL_PRESSURE * (temperature / SEA_LEVEL_TEMPERATURE) ** exponent
    above = altitude - height
    return Air(temperature, pressure * math.exp(-GRAVITY * above / (GAS_CONSTANT * temperature)))


def ram_air(altitude: float, flight_mach: float, ram_recovery: float = 1.0) -> Air:
    """Return total temperature and pressure behind the intake.

    A windmilling compressor is taken to do nothing: what leaves the intake reaches the
    combustor. The share of the ram rise lost on the way, compressor included, is for
    ``ram_recovery``; below zero where the windmilling compressor takes more than ram gives.

    Parameters
    ----------
    altitude : float
        Geopotential height [m]
    flight_mach : float
        [-]
    ram_recovery : float
        Pressure rise kept over the isentropic one [-]

    Returns
    -------
    Air
        Totals.

    Source
    ------
    ``RAM_RECOVERY``.
    """
    air = standard_air(altitude)
    ratio = 1.0 + 0.5 * (HEAT_CAPACITY_RATIO - 1.0) * flight_mach**2
    rise = ratio ** (HEAT_CAPACITY_RATIO / (HEAT_CAPACITY_RATIO - 1.0)) - 1.0
    return Air(air.temperature * ratio, air.pressure * (1.0 + ram_recovery * rise))
