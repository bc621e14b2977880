"""Convection coefficients on both sides of the wall."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat.join import boundary_layer_share, wall_jet_share
from combustor.heat.sides import FloatArray

DUCT = Method(
    key="duct-convection-lefebvre-herbert",
    quantity="convection coefficient of gas along an unfilmed wall and of annulus air",
    source="Lefebvre and Herbert 1960; Lefebvre 1984: 0.020 k D^-0.2 (G / mu)^0.8, 0.017 in "
    "the recirculating primary zone",
    reading="from memory",
)
FILM_CONVECTION = Method(
    key="film-convection-lefebvre",
    quantity="convection coefficient under a film",
    source="Lefebvre, after Ballal and Lefebvre 1972-73: 0.069 (k/x) Re^0.7 for a boundary "
    "layer, 0.10 (k/x) Re^0.8 (x/s)^-0.36 for a wall jet",
    reading="from memory",
    validity={"blowing_ratio": (0.5, 4.0)},
    note="the laws differ by up to a factor of two at blowing ratio 1.3: joined in the "
    "logarithm between 1.2 and 1.4; below 0.5 it returns to the unfilmed value by 0.3; the "
    "distance is counted as at least one slot height",
)

DUCT_CONSTANT = 0.020
RECIRCULATING_CONSTANT = 0.017


def duct_coefficient(
    conductivity: ArrayLike,
    hydraulic_diameter: ArrayLike,
    mass_flux: ArrayLike,
    viscosity: ArrayLike,
    constant: ArrayLike = DUCT_CONSTANT,
) -> FloatArray:
    """Convection coefficient of a stream along a wall, W/m2/K.

    Parameters
    ----------
    conductivity : array
        W/m/K.
    hydraulic_diameter : array
        m.
    mass_flux : array
        kg/s/m2.
    viscosity : array
        Pa s.
    constant : array
        0.020; 0.017 where the gas recirculates.

    Notes
    -----
    Source: Lefebvre and Herbert 1960, from memory.
    """
    reynolds_per_m = np.abs(np.asarray(mass_flux, dtype=float)) / viscosity
    per_diameter = np.asarray(hydraulic_diameter, dtype=float) ** -0.2
    factor = np.asarray(constant, dtype=float) * np.asarray(conductivity, dtype=float)
    return factor * per_diameter * reynolds_per_m**0.8


def boundary_layer_coefficient(
    conductivity: float, distance: ArrayLike, reynolds: ArrayLike
) -> FloatArray:
    """Coefficient under a film that is slower than a wall jet: 0.069 (k/x) Re_x^0.7, W/m2/K."""
    return 0.069 * conductivity / np.asarray(distance) * np.asarray(reynolds) ** 0.7


def wall_jet_coefficient(
    conductivity: float, distance: ArrayLike, reynolds: ArrayLike, slot_heights: ArrayLike
) -> FloatArray:
    """Coefficient under a wall jet: 0.10 (k/x) Re_x^0.8 (x/s)^-0.36, W/m2/K."""
    decay = np.asarray(slot_heights, dtype=float) ** -0.36
    return 0.10 * conductivity / np.asarray(distance) * np.asarray(reynolds) ** 0.8 * decay


def film_coefficient(
    blowing_ratio: float,
    conductivity: float,
    mass_flux: float,
    viscosity: float,
    distance: ArrayLike,
    slot_height: float,
    unfilmed: ArrayLike,
) -> FloatArray:
    """Convection coefficient under a film, the regimes joined, W/m2/K.

    Parameters
    ----------
    blowing_ratio : float
        Film mass flux over gas mass flux.
    conductivity, mass_flux, viscosity : float
        Of the film air at the slot: W/m/K, kg/s/m2, Pa s.
    distance : array
        From the slot, m; counted as at least one slot height, where the laws diverge.
    slot_height : float
        m.
    unfilmed : array
        Coefficient of the gas without a film, W/m2/K.
    """
    x = np.maximum(np.asarray(distance, dtype=float), slot_height)
    reynolds = mass_flux * x / viscosity
    layer = boundary_layer_coefficient(conductivity, x, reynolds)
    share = wall_jet_share(blowing_ratio)
    if share > 0.0:
        jet = wall_jet_coefficient(conductivity, x, reynolds, x / slot_height)
        layer = layer ** (1.0 - share) * jet**share
    attached = boundary_layer_share(blowing_ratio)
    return attached * layer + (1.0 - attached) * np.asarray(unfilmed, dtype=float)
