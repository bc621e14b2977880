"""Drilled wall patches: film build-up row by row and the heat taken up inside the holes."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.heat import transport
from combustor.heat.film import SlotFilm
from combustor.heat.sides import FloatArray

EFFUSION = Method(
    key="effusion-rows-sellers",
    quantity="film effectiveness over and behind a drilled patch",
    source="Sellers 1963 superposition of equal rows; past the last row the mixing-layer law "
    "of Juhasz and Marek goes on from the value reached",
    reading="from memory",
    validity={"row_effectiveness": (0.05, 0.12)},
    note="effectiveness of one row is a calibration input, default 0.08",
)
HOLE_CONVECTION = Method(
    key="effusion-hole-convection",
    quantity="heat taken up by air inside effusion holes",
    source="Nu = 0.023 Re^0.8 Pr^0.4 (1 + (d/l)^0.7), turbulent tube with entry length",
    reading="from memory",
    note="held to what the air can take up: 1 - exp(-NTU)",
)
TRANSPIRATION = Method(
    key="transpiration-flux",
    quantity="cooling flux of an ideal transpired wall",
    source="all air warms to the wall temperature: G cp (Tw - Tc) = h (Tg - Tw)",
    reading="derived",
    note="lower bound on the air any wall needs",
)

ROW_EFFECTIVENESS = 0.08
_HEAT_CAPACITY = 1085.0  # J/kg/K, air at 750 K
_PRANDTL = 0.70


@dataclass(frozen=True)
class Effusion:
    """A patch of effusion holes.

    Parameters
    ----------
    name : str
    start, end : float
        m.
    rows : int
    holes : int
        In the whole patch, per can.
    hole_diameter, hole_length : float
        m; the length along the (slanted) hole.
    mass_flow : float
        Whole machine, kg/s.
    temperature : float
        Of the air entering the holes, K.
    row_effectiveness : float
    """

    name: str
    start: float
    end: float
    rows: int
    holes: int
    hole_diameter: float
    hole_length: float
    mass_flow: float
    temperature: float
    row_effectiveness: float = ROW_EFFECTIVENESS


def rows_effectiveness(row_effectiveness: ArrayLike, rows: ArrayLike) -> FloatArray:
    """Effectiveness 1 - (1 - e)^N of N equal rows, Sellers 1963."""
    return 1.0 - (1.0 - np.asarray(row_effectiveness, dtype=float)) ** np.asarray(rows)


def transpiration_flux(
    coefficient: float, heat_capacity: float, overall_effectiveness: float
) -> float:
    """Air per wall area of an ideal transpired wall, kg/s/m2.

    Parameters
    ----------
    coefficient : float
        Gas-side convection, W/m2/K.
    heat_capacity : float
        Of the air, J/kg/K.
    overall_effectiveness : float
        (T_gas - T_wall) / (T_gas - T_air), below 1.
    """
    return coefficient / heat_capacity * overall_effectiveness / (1.0 - overall_effectiveness)


def patch_film(
    patch: Effusion, x: FloatArray, flux_per_length: float, gas_flux: float, mixing_constant: float
) -> SlotFilm:
    """Effectiveness of a patch and its slope along the wall.

    Parameters
    ----------
    patch : Effusion
    x : array
        Stations, m.
    flux_per_length : float
        Film flow per length around the wall, kg/s/m.
    gas_flux : float
        Gas mass flux at the end of the patch, kg/s/m2.
    mixing_constant : float
        Of the mixing-layer law past the last row.
    """
    length = patch.end - patch.start
    rows = np.clip((x - patch.start) / length, 0.0, 1.0) * patch.rows
    built = rows_effectiveness(patch.row_effectiveness, rows)
    beyond = np.maximum(x - patch.end, 0.0)
    thinning = mixing_constant * gas_flux / flux_per_length
    eta = np.divide(built, 1.0 + built * thinning * beyond)
    return SlotFilm(eta, np.where(x > patch.end, -(eta**2) * thinning, 0.0))


def hole_uptake(patch: Effusion, cans: int) -> float:
    """Share of the way from air to metal temperature that air gains inside the holes."""
    flow = patch.mass_flow / (patch.holes * cans)
    mu = float(transport.viscosity(patch.temperature))
    k = float(transport.conductivity(patch.temperature))
    d, length = patch.hole_diameter, patch.hole_length
    reynolds = 4.0 * flow / (np.pi * d * mu)
    nusselt = 0.023 * reynolds**0.8 * _PRANDTL**0.4 * (1.0 + (d / length) ** 0.7)
    transfer_units = nusselt * k / d * np.pi * d * length / (flow * _HEAT_CAPACITY)
    return float(-np.expm1(-transfer_units))


def hole_conductance(patch: Effusion, wall_area: float, uptake: float) -> float:
    """Heat taken up in the holes per wall area and K of metal above air, W/m2/K.

    ``wall_area`` of the patch for the whole machine, m2.
    """
    return patch.mass_flow * _HEAT_CAPACITY * uptake / wall_area
