"""Zone lengths, and the pattern factor a length gives."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from combustor.base.method import Method, Notice

PRIMARY_LENGTH = Method(
    key="primary-zone-length",
    quantity="primary zone length over liner height",
    source="Melconian & Modak 1985: 0.67 to 0.75",
    reading="from memory",
    validity={"length_ratio": (0.67, 0.75)},
)
SECONDARY_LENGTH = Method(
    key="secondary-zone-length",
    quantity="secondary zone length over liner height",
    source="Melconian & Modak 1985: 0.5",
    reading="from memory",
)
DILUTION_LENGTH = Method(
    key="dilution-zone-length",
    quantity="dilution zone length over liner height, from pattern factor",
    source="Melconian & Modak 1985, polynomials of charts at liner loss factors 15, 20, 30, 50",
    reading="from memory",
    validity={"pattern_factor": (0.15, 0.30), "loss_factor": (15.0, 50.0)},
    note="each curve is held level beyond its minimum, so that it never rises",
)
PATTERN_FACTOR = Method(
    key="pattern-factor-law",
    quantity="pattern factor from liner length and liner loss factor",
    source="Lefebvre 1984: 1 - exp(-1/(c L/D dP_L/q_ref)), c 0.070 round, 0.050 annular",
    reading="from memory",
    scatter="c between 0.05 and 0.12 seen",
    note="dP_L is the loss over the liner, without diffuser",
)

PRIMARY_LENGTH_RATIO = 0.70
USUAL_FILL = 0.66
SHORTEST_PRIMARY_RATIO = 0.67
SECONDARY_LENGTH_RATIO = 0.50
PATTERN_COEFFICIENT_ROUND, PATTERN_COEFFICIENT_RING = 0.070, 0.050

# loss factor: (constant, linear, quadratic in pattern factor)
_DILUTION_CURVES: tuple[tuple[float, tuple[float, float, float]], ...] = (
    (15.0, (3.78, -6.0, 0.0)),
    (20.0, (3.83, -11.83, 13.4)),
    (30.0, (2.96, -9.86, 13.3)),
    (50.0, (2.718, -12.64, 28.51)),
)


@dataclass(frozen=True)
class LengthRatio:
    """A length over liner height, with notices where the method was stretched."""

    value: float
    notices: tuple[Notice, ...] = ()


def law_area(reference_area: float, liner_area: float, cans_in_ring: bool) -> float:
    """Return the reference area that the law for the pattern factor is taken on [m2].

    The law was drawn from casings the liner fills to about two thirds. A ring of cans that
    leaves more of itself empty would seem to mix by a loss factor it does not have.
    """
    if not cans_in_ring:
        return reference_area
    return min(reference_area, liner_area / USUAL_FILL)


def dilution_length_ratio(pattern_factor: float, loss_factor: float) -> LengthRatio:
    """Return the dilution zone's length over liner height for a pattern factor.

    Parameters
    ----------
    pattern_factor : float
        [-]
    loss_factor : float
        Liner loss over reference dynamic head [-]

    Returns
    -------
    LengthRatio
        Linear between the curves, the nearest curve beyond them; with notices.

    Notes
    -----
    Valid for pattern factors 0.15 to 0.30 and loss factors 15 to 50.
    """
    factors = [factor for factor, _ in _DILUTION_CURVES]
    lengths = [_curve(coefficients, pattern_factor) for _, coefficients in _DILUTION_CURVES]
    notices = DILUTION_LENGTH.notices(pattern_factor=pattern_factor, loss_factor=loss_factor)
    return LengthRatio(float(np.interp(loss_factor, factors, lengths)), notices)


def pattern_factor(length_ratio: float, loss_factor: float, is_round: bool = True) -> float:
    """Return the pattern factor of a liner.

    Parameters
    ----------
    length_ratio : float
        Liner length over liner height [-]
    loss_factor : float
        Liner loss over reference dynamic head [-]
    is_round : bool
        Round liner (0.070) or ring (0.050).

    Returns
    -------
    float
        (highest - mean) over (mean - inlet) temperature [-]
    """
    coefficient = PATTERN_COEFFICIENT_ROUND if is_round else PATTERN_COEFFICIENT_RING
    return 1.0 - math.exp(-1.0 / (coefficient * length_ratio * loss_factor))


def length_ratio_for(wanted: float, loss_factor: float, is_round: bool = True) -> float:
    """Return the liner length over height that gives a pattern factor; inverse of the law."""
    coefficient = PATTERN_COEFFICIENT_ROUND if is_round else PATTERN_COEFFICIENT_RING
    return 1.0 / (coefficient * loss_factor * math.log(1.0 / (1.0 - wanted)))


def _curve(coefficients: tuple[float, float, float], wanted: float) -> float:
    constant, linear, quadratic = coefficients
    if quadratic > 0.0:
        wanted = min(wanted, -linear / (2.0 * quadratic))
    return constant + linear * wanted + quadratic * wanted**2
