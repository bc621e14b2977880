"""Viscosity and thermal conductivity of air and combustion gas."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat.sides import FloatArray

TRANSPORT = Method(
    key="combustion-gas-transport-fit",
    quantity="viscosity and thermal conductivity of air and lean combustion gas",
    source="least-squares fit to kinetic-theory mixture-averaged properties of GRI-3.0 species "
    "(Cantera 3.2), products of CH4, H2 and CO/H2 with air at equivalence ratio 0 to 1",
    reading="computed",
    validity={"temperature": (300.0, 2400.0), "x_h2o": (0.0, 0.33), "x_co2": (0.0, 0.16)},
    scatter="fit error at most 1.2 % (viscosity) and 2.5 % (conductivity); frozen composition",
)

# Coefficients of 1, t, t^2, w, w t, w t^2, c, c t with t = ln(T / 1000 K), w = x_H2O, c = x_CO2.
_VISCOSITY = (-10.0524, 0.6608, -0.0239, -0.1979, 0.2585, -0.0477, -0.1155, 0.0793)
_CONDUCTIVITY = (-2.6678, 0.7977, -0.0193, 0.4976, 0.4629, 0.0263, -0.0721, 0.1769)


def viscosity(temperature: ArrayLike, x_h2o: ArrayLike = 0.0, x_co2: ArrayLike = 0.0) -> FloatArray:
    """Dynamic viscosity of air or combustion gas.

    Parameters
    ----------
    temperature : array
        K.
    x_h2o, x_co2 : array
        Mole fractions; both 0 for dry air.

    Returns
    -------
    array
        Pa s.
    """
    return _fit(_VISCOSITY, temperature, x_h2o, x_co2)


def conductivity(
    temperature: ArrayLike, x_h2o: ArrayLike = 0.0, x_co2: ArrayLike = 0.0
) -> FloatArray:
    """Thermal conductivity of air or combustion gas, W/m/K; arguments as ``viscosity``."""
    return _fit(_CONDUCTIVITY, temperature, x_h2o, x_co2)


def _fit(
    a: tuple[float, ...], temperature: ArrayLike, x_h2o: ArrayLike, x_co2: ArrayLike
) -> FloatArray:
    t = np.log(np.asarray(temperature, dtype=float) / 1000.0)
    w = np.asarray(x_h2o, dtype=float)
    c = np.asarray(x_co2, dtype=float)
    air = a[0] + t * (a[1] + t * a[2])
    return np.exp(air + w * (a[3] + t * (a[4] + t * a[5])) + c * (a[6] + t * a[7]))
