"""Discharge coefficients and jet angles of openings, and what pressure each refers to."""

from __future__ import annotations

import math

import numpy as np

from combustor.base.method import Method
from combustor.gasdynamics import Number
from combustor.hardware.metal import Opening

PLAIN_LIMIT = 0.625
PLUNGED_LIMIT = 0.825

CROSSFLOW_DISCHARGE = Method(
    key="discharge-coefficient-kaddah",
    quantity="discharge coefficient of a hole in a wall with flow along it",
    source="Kaddah 1964 and Freeman 1965, Cranfield theses, as quoted by Lefebvre 1983",
    reading="from memory",
    validity={"head_ratio": (1.0, math.inf), "bleed_ratio": (0.0, 1.0)},
    note="referred to the annulus total pressure; limits 0.625 plain, 0.825 plunged",
)
JET_ANGLE = Method(
    key="jet-angle-lefebvre",
    quantity="initial angle of a jet from the wall",
    source="sin^2(angle) = Cd / Cd at rest, Kaddah 1964 as quoted by Lefebvre 1983",
    reading="from memory",
    validity={"head_ratio": (1.0, math.inf)},
    note="the velocity triangle at no bleed, sin(angle) = Cd / Cd at rest, is 13 deg lower at K 2",
)
DEFAULT_DISCHARGE = Method(
    key="discharge-coefficient-default",
    quantity="discharge coefficient of metering, effusion and dome openings without a stated one",
    source="usual ranges: metering 0.62-0.75 static-fed, 0.75-0.85 total-fed; effusion 0.65-0.80; "
    "impingement plate 0.75-0.80",
    reading="from memory",
    scatter="0.06",
)
SHARP_ORIFICE = Method(
    key="discharge-coefficient-kirchhoff",
    quantity="discharge coefficient of a sharp-edged orifice and of a leak",
    source="free-streamline contraction of a plane slit, Kirchhoff 1869: pi / (pi + 2)",
    reading="derived",
)
SWIRLER_LOSS = Method(
    key="swirler-knight-walker",
    quantity="air through an axial swirler",
    source="Knight and Walker 1957, as quoted by Lefebvre 1983",
    reading="from memory",
    note="the published pressure difference is total upstream less total in the liner at the "
    "swirler's own flow; converted here to annulus total less liner static",
)

METERING_STATIC = 0.68
METERING_TOTAL = 0.80
EFFUSION = 0.70
DOME_PLATE = 0.77
SHARP = math.pi / (math.pi + 2.0)


def discharge_coefficient_crossflow(
    head_ratio: Number, bleed_ratio: Number, limit: Number = PLAIN_LIMIT
) -> Number:
    """Return the discharge coefficient of a hole with annulus flow across it.

    Cd = 2 c (K - 1) / sqrt(4 K^2 - K (2 - a)^2), with c the value at rest.

    Parameters
    ----------
    head_ratio : float or ndarray
        K = (annulus total - liner static) / annulus dynamic head just upstream.
    bleed_ratio : float or ndarray
        a = flow leaving at the station / annulus flow just upstream.
    limit : float
        Value at rest: 0.625 plain, 0.825 plunged.

    Returns
    -------
    float or ndarray
        0 at K <= 1, where the method gives no flow.
    """
    # In terms of 1/K the form stays finite when the annulus is at rest (K infinite).
    inverse = 1.0 / np.maximum(head_ratio, 1.0)
    below = 4.0 - (2.0 - bleed_ratio) ** 2 * inverse
    return 2.0 * limit * (1.0 - inverse) / np.sqrt(np.maximum(below, 1e-12))


def jet_angle(coefficient: Number, limit: float = PLAIN_LIMIT) -> Number:
    """Return the initial jet angle from the liner axis, rad: sin^2 = Cd / Cd at rest.

    Parameters
    ----------
    coefficient : float or ndarray
    limit : float
        Discharge coefficient at rest.
    """
    return np.arcsin(np.sqrt(np.minimum(coefficient / limit, 1.0)))


def jet_angle_triangle(coefficient: Number, limit: float = PLAIN_LIMIT) -> Number:
    """Return the jet angle by the velocity triangle at no bleed, rad: sin = Cd / Cd at rest."""
    return np.arcsin(np.minimum(coefficient / limit, 1.0))


def swirler_effective_area(
    area: float, vane_angle: float, vane_loss: float, liner_area: float
) -> float:
    """Return the effective area of an axial swirler between annulus total and liner static.

    Knight and Walker: dP = Ks ((sec / A)^2 - 1 / A_L^2) W^2 / (2 rho), dP the total pressure
    upstream less that of the swirler's own flow in the liner. Adding that flow's dynamic head
    gives the difference to liner static, 1 / Ae^2 = Ks (sec / A)^2 - (Ks - 1) / A_L^2.

    Parameters
    ----------
    area : float
        Passage area of all swirlers normal to the axis, net of vanes, m2.
    vane_angle : float
        From the axis, rad.
    vane_loss : float
        Ks: 1.3 flat vanes, 1.15 curved.
    liner_area : float
        m2, of the same number of cans as ``area``.
    """
    throat = area * math.cos(vane_angle)
    return 1.0 / math.sqrt(vane_loss / throat**2 - (vane_loss - 1.0) / liner_area**2)


def swirler_flow(
    area: float,
    vane_angle: float,
    vane_loss: float,
    liner_area: float,
    density: float,
    total_pressure_difference: float,
) -> float:
    """Return the air through a swirler, kg/s, by the published (total to total) equation.

    Parameters
    ----------
    area, vane_angle, vane_loss, liner_area :
        As in :func:`swirler_effective_area`.
    density : float
        Upstream, kg/m3.
    total_pressure_difference : float
        Total upstream less total of the swirler's flow in the liner, Pa.
    """
    resistance = vane_loss * ((1.0 / (area * math.cos(vane_angle))) ** 2 - 1.0 / liner_area**2)
    return math.sqrt(2.0 * density * total_pressure_difference / resistance)


def constant_coefficient(opening: Opening) -> float | None:
    """Return a constant discharge coefficient, stated or default; None where a law gives it."""
    if opening.discharge_coefficient is not None:
        return opening.discharge_coefficient
    if opening.edge in ("plain", "plunged", "swirler"):
        return None
    if opening.edge == "metering":
        return METERING_STATIC if opening.feed == "static" else METERING_TOTAL
    if opening.role == "effusion":
        return EFFUSION
    if opening.role == "dome":
        return DOME_PLATE
    return SHARP
