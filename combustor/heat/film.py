"""Film-cooling effectiveness behind slots, and the mixing rate it implies."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike

from combustor.base.method import Method
from combustor.hardware.film_decay import decay, decay_exponent
from combustor.heat.join import boundary_layer_share
from combustor.heat.sides import FloatArray

Regime = Literal[
    "no film", "potential core", "mixing layer", "boundary layer", "wall jet", "effusion"
]

SLOT_FILM = Method(
    key="slot-effectiveness-ballal-lefebvre",
    quantity="film-cooling effectiveness behind a slot",
    source="Ballal and Lefebvre 1972-73: 1.10 m^0.65 (mu ratio)^0.15 (x/s)^-0.2 (t/s)^-0.2 "
    "to blowing ratio 1.3, 1.28 in place of 1.10 m^0.65 above",
    reading="from memory",
    validity={
        "blowing_ratio": (0.5, 4.0),
        "slot_heights": (0.0, 150.0),
        "lip_ratio": (0.2, 1.0),
    },
    note="the laws meet at blowing ratio 1.263; the smaller is taken, the corner rounded by "
    "less than 0.5 %; never above 1; beyond 150 slot heights it decays as film-decay-far says",
)
WEAK_FILM = Method(
    key="slot-effectiveness-mixing-juhasz-marek",
    quantity="film-cooling effectiveness behind a slot at low blowing ratio",
    source="Juhasz and Marek, NASA 1971: 1 / (1 + C x / (m s)), C 0.05 to 0.15",
    reading="from memory",
    validity={"blowing_ratio": (0.0, 0.5)},
    note="mixing constant uncertain by a factor of three; calibration input, default 0.10",
)
SUPERPOSITION = Method(
    key="film-superposition-sellers",
    quantity="effectiveness of several films or rows together",
    source="Sellers 1963: 1 - product of (1 - effectiveness)",
    reading="from memory",
)
ENTRAINMENT = Method(
    key="film-entrainment-rate",
    quantity="core gas entrained by a film",
    source="a film that mixes uniformly has film flow / effectiveness as its total flow; its "
    "slope along the wall is the entrainment",
    reading="derived",
)

MIXING_CONSTANT = 0.10
_CORNER = 0.02  # half-width, in the leading coefficient, of the rounded corner at m = 1.263


@dataclass(frozen=True)
class SlotFilm:
    """Effectiveness of one slot's film and its slope along the wall, 1/m."""

    effectiveness: FloatArray
    slope: FloatArray


def effectiveness_boundary_layer(
    blowing_ratio: float, viscosity_ratio: ArrayLike, slot_heights: ArrayLike, lip_ratio: float
) -> FloatArray:
    """Effectiveness for 0.5 < m <= 1.3, Ballal and Lefebvre; not limited to 1.

    Parameters
    ----------
    blowing_ratio : float
        Film mass flux over gas mass flux.
    viscosity_ratio : array
        Film air over gas.
    slot_heights : array
        Distance over slot height.
    lip_ratio : float
        Lip thickness over slot height.
    """
    return 1.10 * blowing_ratio**0.65 * _shape(viscosity_ratio, slot_heights, lip_ratio)


def effectiveness_wall_jet(
    viscosity_ratio: ArrayLike, slot_heights: ArrayLike, lip_ratio: float
) -> FloatArray:
    """Effectiveness for 1.3 < m <= 4, Ballal and Lefebvre; not limited to 1."""
    return 1.28 * _shape(viscosity_ratio, slot_heights, lip_ratio)


def effectiveness_mixing(
    blowing_ratio: float, slot_heights: ArrayLike, mixing_constant: float = MIXING_CONSTANT
) -> FloatArray:
    """Effectiveness 1 / (1 + C x / (m s)) of a weak film, Juhasz and Marek 1971."""
    return 1.0 / (1.0 + mixing_constant * np.asarray(slot_heights, dtype=float) / blowing_ratio)


def slot_film(
    blowing_ratio: float,
    viscosity_ratio: ArrayLike,
    distance: ArrayLike,
    slot_height: float,
    lip_thickness: float,
    mixing_constant: float = MIXING_CONSTANT,
) -> SlotFilm:
    """Effectiveness behind one slot, regimes joined, at most 1, with its slope.

    Parameters
    ----------
    blowing_ratio : float
        Film mass flux over gas mass flux at the slot.
    viscosity_ratio : array
        Film air over gas, along the wall.
    distance : array
        From the slot, m; zero effectiveness at negative distance (upstream).
    slot_height, lip_thickness : float
        m.
    mixing_constant : float
        Of the weak-film law.

    Notes
    -----
    The slope leaves out the slow change of the viscosity ratio along the wall.
    """
    x = np.asarray(distance, dtype=float)
    behind = x >= 0.0
    # The attached laws diverge at the lip; they pass 1 long before this distance.
    xs = np.maximum(x / slot_height, 1e-6)
    attached = _leading(blowing_ratio) * _shape(viscosity_ratio, xs, lip_thickness / slot_height)
    attached_slope = decay_exponent(xs) * attached / (xs * slot_height)
    share = boundary_layer_share(blowing_ratio)
    if share < 1.0:
        weak = effectiveness_mixing(blowing_ratio, xs, mixing_constant)
        weak_slope = -(weak**2) * mixing_constant / (blowing_ratio * slot_height)
        core = attached >= 1.0
        attached = np.where(core, 1.0, attached)
        attached_slope = np.where(core, 0.0, attached_slope)
        attached = share * attached + (1.0 - share) * weak
        attached_slope = share * attached_slope + (1.0 - share) * weak_slope
    full = attached >= 1.0
    eta = np.where(behind, np.where(full, 1.0, attached), 0.0)
    slope = np.where(behind & ~full, attached_slope, 0.0)
    return SlotFilm(eta, slope)


def superpose(effectiveness: ArrayLike) -> FloatArray:
    """Effectiveness of films together, Sellers 1963; films along the first axis."""
    return 1.0 - np.prod(1.0 - np.asarray(effectiveness, dtype=float), axis=0)


def entrainment_rate(mass_flow: float, film: SlotFilm) -> FloatArray:
    """Core gas taken in by a film, kg/s per m of axis: the slope of flow / effectiveness."""
    eta = film.effectiveness
    safe = np.where(eta > 0.0, eta, 1.0)
    return np.where(eta > 0.0, -mass_flow * film.slope / safe**2, 0.0)


def mean_entrainment_coefficient(effectiveness: ArrayLike, slot_heights: ArrayLike) -> FloatArray:
    """Mean core gas entrained per film flow and slot height up to there: (1/eta - 1) s/x."""
    return (1.0 / np.asarray(effectiveness, dtype=float) - 1.0) / np.asarray(slot_heights)


def regime_of(blowing_ratio: float) -> Regime:
    """Name of the regime a film belongs to."""
    if blowing_ratio < 0.5:
        return "mixing layer"
    return "boundary layer" if blowing_ratio <= 1.3 else "wall jet"


def _shape(viscosity_ratio: ArrayLike, slot_heights: ArrayLike, lip_ratio: float) -> FloatArray:
    mu = np.asarray(viscosity_ratio, dtype=float) ** 0.15
    return mu * decay(slot_heights) * lip_ratio**-0.2


def _leading(blowing_ratio: float) -> float:
    """Return the smaller of 1.10 m^0.65 and 1.28, the corner rounded."""
    layer, jet = 1.10 * blowing_ratio**0.65, 1.28
    overlap = max(_CORNER - abs(layer - jet), 0.0)
    return min(layer, jet) - overlap**2 / (4.0 * _CORNER)
