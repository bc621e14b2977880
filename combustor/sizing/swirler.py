"""Axial swirler from its pressure loss: area, hub and tip, swirl, recirculation."""

from __future__ import annotations

import math

import numpy as np

from combustor.airflow.discharge import SWIRLER_LOSS
from combustor.base.method import Method

SWIRLER_AREA = SWIRLER_LOSS
SWIRL_NUMBER = Method(
    key="swirl-number-vanes",
    quantity="swirl number of flat axial vanes",
    source="Beer & Chigier 1972, Combustion Aerodynamics",
    reading="from memory",
    validity={"swirl_number": (0.6, 1.5)},
    note="0.4 to 0.6 may or may not recirculate; below 0.4 none",
)
VANE_LOSS = Method(
    key="swirler-vane-loss",
    quantity="loss coefficient of the vanes",
    source="Knight & Walker 1957: 1.3 flat, 1.15 curved",
    reading="from memory",
)
VANE_PRACTICE = Method(
    key="swirler-vane-practice",
    quantity="vane angle and count, hub over tip",
    source="design practice: 30 to 60 deg, 8 to 16 vanes of 0.7 to 1.5 mm, hub about half the tip",
    reading="common practice, no source",
    validity={
        "vane_angle": (math.radians(29.9), math.radians(60.1)),
        "vane_count": (8.0, 16.0),
        "vane_thickness": (0.7e-3, 1.5e-3),
    },
)
SWIRLER_COUNT = Method(
    key="swirler-count",
    quantity="swirlers round a ring liner",
    source="pitch of 1.0 to 1.2 liner heights at the mean diameter, an even number preferred",
    reading="from memory",
)
RECIRCULATION = Method(
    key="swirl-recirculation",
    quantity="recirculated mass over swirler mass, and length of the recirculation",
    source="trends of Mathur & Maccallum 1967 and Kilik 1976; length about two swirler diameters",
    reading="from memory",
    scatter="order of magnitude only",
    validity={"swirl_number": (0.6, 1.5)},
)

VANE_LOSS_COEFFICIENT = {"flat": 1.3, "curved": 1.15}
HUB_RATIO = 0.5
SWIRLER_PITCH = 1.1
RECIRCULATION_LENGTH_RATIO = 2.0


def swirler_area_ratio(
    air_share: float,
    loss_factor: float,
    vane_angle: float,
    vane_loss: float,
    liner_area_ratio: float,
) -> float:
    """Return swirler passage area over reference area.

    A_sw/A_ref = sec(theta) / sqrt( (dP_sw/q_ref)/(K f^2) + 1/k^2 ).

    Parameters
    ----------
    air_share : float
        f, swirler air over all air [-]
    loss_factor : float
        dP_sw/q_ref, loss over the swirler in reference heads [-]
    vane_angle : float
        From the axis [rad]
    vane_loss : float
        K [-]
    liner_area_ratio : float
        k [-]

    Returns
    -------
    float
        Area normal to the axis, net of vanes, over reference area [-]
    """
    resistance = loss_factor / (vane_loss * air_share**2) + 1.0 / liner_area_ratio**2
    return 1.0 / (math.cos(vane_angle) * math.sqrt(resistance))


def swirl_number(hub_diameter: float, tip_diameter: float, vane_angle: float) -> float:
    """Return the swirl number (2/3) (1-z^3)/(1-z^2) tan(theta), z = hub over tip.

    Parameters
    ----------
    hub_diameter, tip_diameter : float
        [m]
    vane_angle : float
        From the axis [rad]

    Returns
    -------
    float
        Axial flux of angular momentum over axial momentum and tip radius [-]
    """
    ratio = hub_diameter / tip_diameter
    return 2.0 / 3.0 * (1.0 - ratio**3) / (1.0 - ratio**2) * math.tan(vane_angle)


def passage_area(
    hub_diameter: float, tip_diameter: float, vane_count: int, vane_thickness: float
) -> float:
    """Return the passage normal to the axis, net of vanes [m2]."""
    ring = 0.25 * math.pi * (tip_diameter**2 - hub_diameter**2)
    return ring - 0.5 * vane_count * vane_thickness * (tip_diameter - hub_diameter)


def tip_diameter(area: float, vane_count: int, vane_thickness: float, hub_ratio: float) -> float:
    """Return the tip diameter of a swirler of given hub over tip; inverse of `passage_area`.

    Parameters
    ----------
    area : float
        Of one swirler, net of vanes [m2]
    vane_count : int
    vane_thickness : float
        [m]
    hub_ratio : float
        Hub over tip diameter [-]

    Returns
    -------
    float
        [m]
    """
    square = 0.25 * math.pi * (1.0 - hub_ratio**2)
    linear = -0.5 * vane_count * vane_thickness * (1.0 - hub_ratio)
    return (-linear + math.sqrt(linear**2 + 4.0 * square * area)) / (2.0 * square)


def tip_diameter_on_hub(
    area: float, vane_count: int, vane_thickness: float, hub_diameter: float
) -> float:
    """Return the tip diameter of a swirler on a given hub [m]; as `tip_diameter`."""
    blocked = 0.5 * vane_count * vane_thickness
    quarter = 0.25 * math.pi
    constant = area + quarter * hub_diameter**2 - blocked * hub_diameter
    return (blocked + math.sqrt(blocked**2 + 4.0 * quarter * constant)) / (2.0 * quarter)


def recirculated_share(number: float) -> float:
    """Return recirculated mass over swirler mass by swirl number [-]; order of magnitude."""
    return float(np.interp(number, (0.4, 0.7, 1.0, 1.5), (0.0, 0.1, 0.25, 0.5)))
