"""Leckner's emissivity of carbon dioxide and water, and its pressure broadening."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat.sides import FloatArray

BAR = 1e5

BROADENING = Method(
    key="pressure-broadening-leckner",
    quantity="rise of gas emissivity with total pressure",
    source="Leckner, Spectral and total emissivity of water vapor and carbon dioxide, "
    "Combustion and Flame 19, 1972",
    reading="from memory",
    validity={"temperature": (400.0, 2700.0)},
    scatter="5 to 10 % of the spectral data; few data above 20 bar",
)

# Rows: powers of log10 of the pressure path in bar cm; columns: powers of T / 1000 K.
_WATER = np.array(
    [
        [-2.2118, -1.1987, 0.035596],
        [0.85667, 0.93048, -0.14391],
        [-0.10838, -0.17156, 0.045915],
    ]
)
_CARBON_DIOXIDE = np.array(
    [
        [-3.9893, 2.7669, -2.1081, 0.39163],
        [1.2710, -1.1090, 1.0195, -0.21897],
        [-0.23678, 0.19731, -0.19544, 0.044644],
    ]
)


def emissivity_leckner(
    pressure: ArrayLike,
    temperature: ArrayLike,
    p_h2o: ArrayLike,
    p_co2: ArrayLike,
    beam_length: ArrayLike,
) -> FloatArray:
    """Emissivity of CO2 and H2O, Leckner 1972.

    Parameters
    ----------
    pressure : array
        Total pressure, Pa.
    temperature : array
        Gas temperature, K.
    p_h2o, p_co2 : array
        Partial pressures, Pa; either may be zero.
    beam_length : array
        Mean radiation path, m.

    Returns
    -------
    array
        Emissivity with band overlap taken off.
    """
    T, pw, pc, length = _broadcast(temperature, p_h2o, p_co2, beam_length)
    total = np.asarray(pressure, dtype=float) / BAR
    water = _base(_WATER, T, pw * length) * _broaden_water(total, pw, T, pw * length)
    carbon = _base(_CARBON_DIOXIDE, T, pc * length) * _broaden_carbon(total, pc, T, pc * length)
    return water + carbon - _overlap(pw, pc, length)


def pressure_broadening(
    pressure: ArrayLike,
    temperature: ArrayLike,
    p_h2o: ArrayLike,
    p_co2: ArrayLike,
    beam_length: ArrayLike,
) -> FloatArray:
    """Emissivity at ``pressure`` over that at 1 bar for the same path, Leckner 1972.

    Arguments as ``emissivity_leckner``. 1 where there is neither water nor carbon dioxide.
    """
    at_pressure = emissivity_leckner(pressure, temperature, p_h2o, p_co2, beam_length)
    T, pw, pc, length = _broadcast(temperature, p_h2o, p_co2, beam_length)
    water, carbon = _base(_WATER, T, pw * length), _base(_CARBON_DIOXIDE, T, pc * length)
    base = water + carbon - _overlap(pw, pc, length)
    return np.divide(at_pressure, base, out=np.ones_like(base), where=base > 0.0)


def _broadcast(
    temperature: ArrayLike, p_h2o: ArrayLike, p_co2: ArrayLike, beam_length: ArrayLike
) -> tuple[FloatArray, FloatArray, FloatArray, FloatArray]:
    """Return T (K), partial pressures (bar) and path (cm) as equal-shaped arrays."""
    T, pw, pc, length = np.broadcast_arrays(
        np.asarray(temperature, dtype=float),
        np.asarray(p_h2o, dtype=float) / BAR,
        np.asarray(p_co2, dtype=float) / BAR,
        np.asarray(beam_length, dtype=float) * 100.0,
    )
    return T, pw, pc, length


def _base(c: FloatArray, T: FloatArray, path: FloatArray) -> FloatArray:
    t = T / 1000.0
    present = path > 0.0
    log_path = np.log10(path, out=np.zeros_like(path), where=present)
    exponent = np.zeros_like(t)
    for row in c[::-1]:
        exponent = exponent * log_path + np.polynomial.polynomial.polyval(t, row)
    return np.where(present, np.exp(exponent), 0.0)


def _overlap(pw: FloatArray, pc: FloatArray, length: FloatArray) -> FloatArray:
    total = pw + pc
    share = np.divide(pw, total, out=np.zeros_like(total), where=total > 0.0)
    path = np.maximum(total * length, 1.0)  # the overlap vanishes at and below 1 bar cm
    strength = share / (10.7 + 101.0 * share) - 0.0089 * share**10.4
    return np.maximum(strength, 0.0) * np.log10(path) ** 2.76


def _broaden(
    a: FloatArray,
    b: FloatArray,
    c: float,
    effective: FloatArray,
    peak: FloatArray,
    path: FloatArray,
) -> FloatArray:
    safe = np.where(path > 0.0, path, peak)
    spread = np.exp(-c * (np.log10(peak) - np.log10(safe)) ** 2)
    return 1.0 - (a - 1.0) * (1.0 - effective) / (a + b - 1.0 + effective) * spread


def _broaden_water(
    total: FloatArray, pw: FloatArray, T: FloatArray, path: FloatArray
) -> FloatArray:
    t = T / 1000.0
    a = np.where(t > 0.75, 1.888 - 2.053 * np.log10(t), 2.144)
    effective = total + 2.56 * pw / np.sqrt(t)
    return _broaden(a, 1.10 / t**1.4, 0.5, effective, 13.2 * t**2, path)


def _broaden_carbon(
    total: FloatArray, pc: FloatArray, T: FloatArray, path: FloatArray
) -> FloatArray:
    t = T / 1000.0
    a = 1.0 + 0.1 / t**1.45
    peak = np.where(t > 0.7, 0.225 * t**2, 0.054 / t**2)
    effective = total + 0.28 * pc
    return _broaden(a, np.full_like(t, 0.23), 1.47, effective, peak, path)
