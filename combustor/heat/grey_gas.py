"""Emissivity of carbon dioxide and water by a weighted sum of grey gases."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat.leckner import pressure_broadening
from combustor.heat.sides import FloatArray

ATMOSPHERE = 101325.0

GREY_GAS = Method(
    key="grey-gas-smith",
    quantity="emissivity of CO2 and H2O in clean combustion gas",
    source="Smith, Shen and Friedman, Evaluation of coefficients for the weighted sum of gray "
    "gases model, J. Heat Transfer 104, 1982",
    reading="from memory",
    validity={"temperature": (600.0, 2400.0), "pressure_path": (0.001, 10.0), "p_h2o": (0.0, 1.0)},
    scatter="about 5 % against the source's exponential wide-band spectra; 1 atm total pressure",
    note="emissivity interpolated linearly in the water share of H2O + CO2 between the "
    "tabulated mixtures; pressure path in atm m; water partial "
    "pressure in atm counts only where water is more than three quarters of H2O + CO2",
)

# Each row: absorption coefficient (1/atm/m) and the cubic in T (K) of its weight.
_SCALE = np.array([1e-1, 1e-4, 1e-7, 1e-11])
_CARBON_DIOXIDE = (
    (0.3966, 0.4334, 2.620, -1.560, 2.565),
    (15.64, -0.4814, 2.822, -1.794, 3.274),
    (394.3, 0.5492, 0.1087, -0.3500, 0.9123),
)
_EQUAL = (
    (0.4303, 5.150, -2.303, 0.9779, -1.494),
    (7.055, 0.7749, 3.399, -2.297, 3.770),
    (178.1, 1.907, -1.824, 0.5608, -0.5122),
)
_WATER_TWICE = (
    (0.4201, 6.508, -5.551, 3.029, -5.353),
    (6.516, -0.2504, 6.112, -3.882, 6.528),
    (131.9, 2.718, -3.118, 1.221, -1.612),
)
_WATER_THIN = (
    (0.4098, 5.977, -5.119, 3.042, -5.564),
    (6.325, 0.5677, 3.333, -1.967, 2.718),
    (120.5, 1.800, -2.334, 1.008, -1.454),
)
_WATER_ATMOSPHERE = (
    (0.4496, 6.324, -8.358, 6.135, -13.03),
    (7.113, -0.2016, 7.145, -5.212, 9.868),
    (119.7, 3.500, -5.040, 2.425, -3.888),
)
_SHARES = np.array([0.0, 0.5, 2.0 / 3.0, 1.0])


def pressure_path(
    pressure: ArrayLike, x_h2o: ArrayLike, x_co2: ArrayLike, beam_length: ArrayLike
) -> FloatArray:
    """Partial pressure of H2O + CO2 times path, atm m; pressure in Pa, path in m."""
    radiating = np.asarray(x_h2o, dtype=float) + np.asarray(x_co2, dtype=float)
    return np.asarray(pressure, dtype=float) / ATMOSPHERE * radiating * beam_length


def emissivity_base(
    temperature: ArrayLike, p_h2o: ArrayLike, p_co2: ArrayLike, beam_length: ArrayLike
) -> FloatArray:
    """Emissivity at 1 atm total pressure, Smith et al. 1982.

    Parameters
    ----------
    temperature : array
        Gas temperature, K.
    p_h2o, p_co2 : array
        Partial pressures, Pa; either may be zero.
    beam_length : array
        Mean radiation path, m.

    Returns
    -------
    array
        Emissivity. The set for pure water moves from its thin limit to its 1 atm table with
        the partial pressure and keeps the latter above 1 atm, where nothing is tabulated.
    """
    T = np.asarray(temperature, dtype=float)
    pw = np.asarray(p_h2o, dtype=float) / ATMOSPHERE
    pc = np.asarray(p_co2, dtype=float) / ATMOSPHERE
    T, pw, pc, length = np.broadcast_arrays(T, pw, pc, np.asarray(beam_length, dtype=float))
    total = pw + pc
    path = total * length
    share = np.divide(pw, total, out=np.zeros_like(total), where=total > 0.0)
    richness = np.minimum(pw, 1.0)
    thin, dense = _sum(_WATER_THIN, T, path), _sum(_WATER_ATMOSPHERE, T, path)
    nodes = (
        _sum(_CARBON_DIOXIDE, T, path),
        _sum(_EQUAL, T, path),
        _sum(_WATER_TWICE, T, path),
        thin + richness * (dense - thin),
    )
    return sum(
        (weight * node for weight, node in zip(_hats(share), nodes, strict=True)),
        np.zeros_like(T),
    )


def emissivity_grey_gas(
    pressure: ArrayLike,
    temperature: ArrayLike,
    x_h2o: ArrayLike,
    x_co2: ArrayLike,
    beam_length: ArrayLike,
    broadening: bool = True,
) -> FloatArray:
    """Emissivity of clean combustion gas at pressure.

    Smith et al. 1982 at the partial-pressure path, times Leckner's 1972 ratio of the
    emissivity at pressure to that at 1 bar.

    Parameters
    ----------
    pressure : array
        Total pressure, Pa.
    temperature : array
        Gas temperature, K.
    x_h2o, x_co2 : array
        Mole fractions, wet.
    beam_length : array
        Mean radiation path, m.
    broadening : bool
        ``False`` leaves the emissivity at its 1 atm base.

    Returns
    -------
    array
        Emissivity, 0 to 1.
    """
    p = np.asarray(pressure, dtype=float)
    p_h2o, p_co2 = p * np.asarray(x_h2o, dtype=float), p * np.asarray(x_co2, dtype=float)
    base = emissivity_base(temperature, p_h2o, p_co2, beam_length)
    if not broadening:
        return base
    return base * pressure_broadening(p, temperature, p_h2o, p_co2, beam_length)


def _sum(rows: tuple[tuple[float, ...], ...], T: FloatArray, path: FloatArray) -> FloatArray:
    total = np.zeros_like(T)
    for absorption, *cubic in rows:
        b = np.array(cubic) * _SCALE
        weight = b[0] + T * (b[1] + T * (b[2] + T * b[3]))
        total = total - weight * np.expm1(-absorption * path)
    return total


def _hats(share: FloatArray) -> list[FloatArray]:
    """Return the linear-interpolation weight of each tabulated water share."""
    identity = np.eye(_SHARES.size)
    return [np.interp(share, _SHARES, row) for row in identity]
