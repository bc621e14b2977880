"""Liner area over reference area."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.base.method import Method

OPTIMUM_RATIO = Method(
    key="liner-area-ratio-optimum",
    quantity="liner area ratio for the strongest jets",
    source="Lefebvre & Norster 1969, Proc. IMechE 183 part 3N; optimum re-derived",
    reading="from memory",
    validity={"dome_share": (0.0, 0.35), "liner_area_ratio": (0.55, 0.78)},
    note="greatest jet to hot-gas momentum ratio; premise fails where the dome takes over 35 %",
)
SIMPLE_RATIO = Method(
    key="liner-area-ratio-simple",
    quantity="liner area ratio by layout",
    source="rule of thumb: can 0.70, can-annular 0.66, annular 0.66",
    reading="common practice, no source",
)
ANNULUS_VELOCITY = Method(
    key="annulus-velocity",
    quantity="cold air velocity in the annulus",
    source="design practice: 25 to 60 m/s, Mach number at most 0.10",
    reading="common practice, no source",
    validity={"annulus_velocity": (25.0, 60.0), "annulus_mach": (0.0, 0.10)},
)

LOWEST_RATIO, HIGHEST_RATIO = 0.55, 0.78
SIMPLE_RATIOS = {"can": 0.70, "can-annular": 0.66, "annular": 0.66}
HIGHEST_ANNULUS_VELOCITY = 60.0
LOWEST_ANNULUS_VELOCITY = 25.0
HIGHEST_ANNULUS_MACH = 0.10


@dataclass(frozen=True)
class OptimumRatio:
    """Optimum liner area ratio; ``bounded`` says why it is not the free optimum."""

    value: float
    bounded: str = ""


def jet_strength(
    liner_area_ratio: float,
    dome_share: float,
    diffuser_loss: float,
    area_step: float,
    loss_factor: float,
) -> float:
    """Return the quantity the optimum maximises: k^2 [B - A/(1-k)^2].

    Proportional to the momentum ratio of jet to hot gas: the static drop over the holes is
    B - A/(1-k)^2 in reference heads, with A = (1-m)^2 - lambda, B = dP/q - lambda r^2, and
    the head of the hot gas varies as 1/k^2.

    Parameters
    ----------
    liner_area_ratio : float
        k [-]
    dome_share : float
        m, share of air through the dome [-]
    diffuser_loss : float
        lambda, loss over the difference of inlet and annulus heads [-]
    area_step : float
        r, reference area over compressor-exit area [-]
    loss_factor : float
        dP/q, pressure loss over reference head [-]

    Returns
    -------
    float
        [-]
    """
    numerator = (1.0 - dome_share) ** 2 - diffuser_loss
    head = loss_factor - diffuser_loss * area_step**2
    return float(liner_area_ratio**2 * (head - numerator / (1.0 - liner_area_ratio) ** 2))


def optimum_ratio(
    dome_share: float, diffuser_loss: float, area_step: float, loss_factor: float
) -> OptimumRatio:
    """Return the liner area ratio with the strongest jets.

    k = 1 - { [(1-m)^2 - lambda] / [dP/q - lambda r^2] }^(1/3), held to 0.55 to 0.78.
    Parameters as in `jet_strength`.

    Returns
    -------
    OptimumRatio
        The value, and in words what bounded it.
    """
    numerator = (1.0 - dome_share) ** 2 - diffuser_loss
    head = loss_factor - diffuser_loss * area_step**2
    if head <= 0.0:
        return OptimumRatio(LOWEST_RATIO, "the diffuser takes the whole loss: no optimum exists")
    if numerator <= 0.0:
        return OptimumRatio(
            HIGHEST_RATIO, "the annulus head gains nothing from a wider annulus: no optimum exists"
        )
    free = 1.0 - (numerator / head) ** (1.0 / 3.0)
    if free < LOWEST_RATIO:
        return OptimumRatio(LOWEST_RATIO, f"optimum {free:.3f} lies below the usual range")
    if free > HIGHEST_RATIO:
        return OptimumRatio(HIGHEST_RATIO, f"optimum {free:.3f} lies above the usual range")
    return OptimumRatio(free)


def ratio_for_annulus_velocity(
    velocity: float, annulus_flow: float, density: float, reference_area: float
) -> float:
    """Return the liner area ratio that leaves the annulus a given cold velocity.

    Parameters
    ----------
    velocity : float
        [m/s]
    annulus_flow : float
        Air that passes the annulus [kg/s]
    density : float
        [kg/m3]
    reference_area : float
        [m2]

    Returns
    -------
    float
        Below zero when even the empty casing is too small [-]
    """
    return 1.0 - annulus_flow / (density * velocity * reference_area)
