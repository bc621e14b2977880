"""Compressible flow of an ideal gas with constant heat capacity; transport of air.

Every function takes and returns SI floats or arrays. Mach numbers are subsonic.
"""

from __future__ import annotations

import math
from typing import Any, TypeAlias

import numpy as np

from combustor.base.method import Method

# A float or an array of floats; arguments broadcast against each other.
Number: TypeAlias = Any

COMPRESSIBLE_ORIFICE = Method(
    key="orifice-compressible",
    quantity="mass flow through an opening",
    source="isentropic expansion of an ideal gas to the receiver pressure, sonic at most",
    reading="derived",
)
RAYLEIGH = Method(
    key="rayleigh",
    quantity="total-pressure loss by heat addition in a duct of constant area",
    source="conservation of mass, momentum and energy for an ideal gas of constant heat capacity",
    reading="derived",
    validity={"mach": (0.0, 1.0)},
)
SUTHERLAND_VISCOSITY = Method(
    key="viscosity-sutherland",
    quantity="dynamic viscosity of air",
    source="Sutherland 1893; constants 1.716e-5 Pa s at 273.15 K and 110.4 K",
    reading="from memory",
    validity={"temperature": (170.0, 1900.0)},
    scatter="2 % to 800 K, 3 % to 1000 K against handbook tables",
)
SUTHERLAND_CONDUCTIVITY = Method(
    key="conductivity-sutherland",
    quantity="thermal conductivity of air",
    source="Sutherland's form; constants 0.0241 W/m/K at 273.15 K and 194 K (White 1974)",
    reading="from memory",
    validity={"temperature": (160.0, 1200.0)},
    scatter="3 %",
)


def heat_capacity(gas_constant: Number, gamma: Number) -> Number:
    """Return the isobaric heat capacity, J/kg/K, from gas constant (J/kg/K) and gamma."""
    return gamma * gas_constant / (gamma - 1.0)


def speed_of_sound(temperature: Number, gas_constant: Number, gamma: Number) -> Number:
    """Return the speed of sound, m/s, at static temperature (K)."""
    return np.sqrt(gamma * gas_constant * temperature)


def pressure_ratio(mach: Number, gamma: Number) -> Number:
    """Return total over static pressure of an isentropic stream."""
    return (1.0 + 0.5 * (gamma - 1.0) * mach * mach) ** (gamma / (gamma - 1.0))


def dynamic_head(mach: Number, gamma: Number) -> Number:
    """Return the compressible dynamic head (total - static) / total."""
    return 1.0 - 1.0 / pressure_ratio(mach, gamma)


def flow_function(mach: Number, gamma: Number) -> Number:
    """Return mass flow x sqrt(R T / gamma) / (area x P), total values; 0.5787 at most (1.4)."""
    exponent = -0.5 * (gamma + 1.0) / (gamma - 1.0)
    return mach * (1.0 + 0.5 * (gamma - 1.0) * mach * mach) ** exponent


def mach_from_flow_function(function: float, gamma: float) -> float:
    """Return the subsonic Mach number of a given flow function.

    Parameters
    ----------
    function : float
        See :func:`flow_function`.
    gamma : float

    Returns
    -------
    float
        Mach number; nan when the passage cannot pass the flow (choked).
    """
    if function > flow_function(1.0, gamma):
        return math.nan
    # On the subsonic branch the flow function is concave in Mach, so Newton from below rises
    # towards the root without passing it.
    mach = function
    for _ in range(60):
        slope = (
            flow_function(mach, gamma)
            * (1.0 - mach * mach)
            / (mach * (1.0 + 0.5 * (gamma - 1.0) * mach * mach) + 1e-300)
        )
        step = (function - flow_function(mach, gamma)) / (slope + 1e-300)
        mach = min(mach + step, 1.0)
        if abs(step) <= 1e-15 * mach + 1e-300:
            break
    return mach


def velocity_from_static(
    mass_flux: Number,
    static_pressure: Number,
    total_temperature: Number,
    gas_constant: Number,
    gamma: Number,
) -> Number:
    """Return the velocity, m/s, of a stream of known static pressure and total temperature.

    Continuity U = G R T / p with T = T0 - U^2 / (2 cp) is a quadratic in U; this is its
    positive root, written without cancellation.

    Parameters
    ----------
    mass_flux : float or ndarray
        kg/s/m2.
    static_pressure : float or ndarray
        Pa.
    total_temperature : float or ndarray
        K.
    gas_constant, gamma : float or ndarray
    """
    per_kelvin = mass_flux * gas_constant / static_pressure
    low_speed = per_kelvin * total_temperature
    double_heat_capacity = 2.0 * gamma * gas_constant / (gamma - 1.0)
    root = np.sqrt(1.0 + 4.0 * low_speed * per_kelvin / double_heat_capacity)
    return 2.0 * low_speed / (1.0 + root)


def critical_pressure_ratio(gamma: Number) -> Number:
    """Return static over total pressure at the sonic throat; 0.5283 for 1.4."""
    return (2.0 / (gamma + 1.0)) ** (gamma / (gamma - 1.0))


def jet_velocity(
    pressure: Number,
    temperature: Number,
    receiver_pressure: Number,
    gas_constant: Number,
    gamma: Number,
) -> Number:
    """Return the velocity, m/s, of air expanded isentropically from rest, sonic at most.

    Parameters
    ----------
    pressure, temperature : float or ndarray
        Driving pressure (Pa) and total temperature (K).
    receiver_pressure : float or ndarray
        Static pressure outside, Pa; at or above ``pressure`` the result is zero.
    gas_constant, gamma : float or ndarray
    """
    ratio = throat_ratio(pressure, receiver_pressure, gamma)
    fall = 1.0 - ratio ** ((gamma - 1.0) / gamma)
    return np.sqrt(2.0 * heat_capacity(gas_constant, gamma) * temperature * fall)


def throat_ratio(pressure: Number, receiver_pressure: Number, gamma: Number) -> Number:
    """Return static over driving pressure in the throat: the receiver's, critical at least."""
    ratio = np.minimum(receiver_pressure / pressure, 1.0)
    return np.maximum(ratio, critical_pressure_ratio(gamma))


def orifice_flux(
    pressure: Number,
    temperature: Number,
    receiver_pressure: Number,
    gas_constant: Number,
    gamma: Number,
) -> Number:
    """Return the mass flux through an ideal opening, kg/s per m2 of effective area.

    W / (Cd A) = P / sqrt(R T) x sqrt(2g/(g-1) (x^(2/g) - x^((g+1)/g))), x = p / P but not below
    the critical ratio.

    Parameters
    ----------
    pressure, temperature : float or ndarray
        Driving pressure (Pa) and total temperature (K).
    receiver_pressure : float or ndarray
        Static pressure outside, Pa.
    gas_constant, gamma : float or ndarray
    """
    ratio = throat_ratio(pressure, receiver_pressure, gamma)
    density = pressure / (gas_constant * temperature) * ratio ** (1.0 / gamma)
    fall = 1.0 - ratio ** ((gamma - 1.0) / gamma)
    return density * np.sqrt(2.0 * heat_capacity(gas_constant, gamma) * temperature * fall)


def rayleigh(mach: float, total_temperature_ratio: float, gamma: float) -> tuple[float, float]:
    """Return Mach number and total-pressure ratio after heat addition at constant area.

    With N = M^2 (1 + (g-1)/2 M^2) / (1 + g M^2)^2, total temperature is proportional to N; the
    subsonic root of the quadratic in M^2 is taken.

    Parameters
    ----------
    mach : float
        Before heating, subsonic.
    total_temperature_ratio : float
        After over before.
    gamma : float

    Returns
    -------
    (float, float)
        Mach number after heating and total pressure after over before; nan when the heat
        would choke the duct.
    """
    square = mach * mach
    before = square * (1.0 + 0.5 * (gamma - 1.0) * square) / (1.0 + gamma * square) ** 2
    after = before * total_temperature_ratio
    # after (1 + g m)^2 = m (1 + (g-1)/2 m), m = M2^2
    a = after * gamma * gamma - 0.5 * (gamma - 1.0)
    b = 2.0 * after * gamma - 1.0
    discriminant = b * b - 4.0 * a * after
    if discriminant < 0.0:
        return math.nan, math.nan
    square_after = 2.0 * after / (-b + math.sqrt(discriminant))
    mach_after = math.sqrt(square_after)
    static_ratio = (1.0 + gamma * square) / (1.0 + gamma * square_after)
    total_ratio = static_ratio * pressure_ratio(mach_after, gamma) / pressure_ratio(mach, gamma)
    return mach_after, total_ratio


def viscosity_sutherland(temperature: Number) -> Number:
    """Return the dynamic viscosity of air, Pa s, at ``temperature`` (K).

    Source: :data:`SUTHERLAND_VISCOSITY`.
    """
    return 1.716e-5 * (temperature / 273.15) ** 1.5 * (273.15 + 110.4) / (temperature + 110.4)


def conductivity_sutherland(temperature: Number) -> Number:
    """Return the thermal conductivity of air, W/m/K, at ``temperature`` (K).

    Source: :data:`SUTHERLAND_CONDUCTIVITY`.
    """
    return 0.0241 * (temperature / 273.15) ** 1.5 * (273.15 + 194.0) / (temperature + 194.0)
