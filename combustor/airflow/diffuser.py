"""Diffusers: ideal recovery, loss, stall limit, dump."""

from __future__ import annotations

import math

from combustor.base.method import Method

DIFFUSER_LOSS = Method(
    key="diffuser-loss",
    quantity="total-pressure loss of a diffuser over its inlet dynamic head",
    source="(1 - effectiveness)(1 - 1/AR^2): continuity and Bernoulli, uniform profiles",
    reading="derived",
    validity={"inlet_mach": (0.0, 0.35)},
)
DUMP_LOSS = Method(
    key="dump-loss",
    quantity="loss of a dump over the pre-diffuser's exit head",
    source="usual range 0.5-0.9, Lefebvre 1983",
    reading="from memory",
    validity={"dump_coefficient": (0.5, 0.9)},
)
BORDA_CARNOT = Method(
    key="borda-carnot",
    quantity="loss of a sudden expansion over its inlet head",
    source="momentum balance over the expansion, Borda 1766",
    reading="derived",
)
STALL_LIMIT = Method(
    key="diffuser-stall-reneau",
    quantity="included angle at first appreciable stall of a straight plane diffuser",
    source="power-law fit 33 deg (N/W1)^-0.5 to the chart of Reneau, Johnston and Kline 1967",
    reading="from memory",
    validity={"length_ratio": (1.5, 20.0)},
    scatter="3 deg",
    note="design on 0.7-0.8 of it",
)


def ideal_recovery(area_ratio: float) -> float:
    """Return the ideal static recovery over the inlet head, 1 - 1/AR^2."""
    return 1.0 - 1.0 / area_ratio**2


def loss_coefficient(area_ratio: float, effectiveness: float) -> float:
    """Return the loss over the inlet head, exit kinetic energy not counted as lost.

    Parameters
    ----------
    area_ratio : float
        Exit over inlet.
    effectiveness : float
        Real over ideal recovery: 0.85-0.93 unstalled with thin inlet boundary layers.
    """
    return (1.0 - effectiveness) * ideal_recovery(area_ratio)


def dump_loss_coefficient(
    area_ratio: float, effectiveness: float, dump_coefficient: float = 0.8
) -> float:
    """Return the loss of a pre-diffuser with a dump behind it, over the inlet head.

    Parameters
    ----------
    area_ratio : float
        Of the pre-diffuser.
    effectiveness : float
    dump_coefficient : float
        Loss of the dump over the pre-diffuser's exit head.
    """
    return loss_coefficient(area_ratio, effectiveness) + dump_coefficient / area_ratio**2


def borda_carnot(area_ratio: float) -> float:
    """Return the loss of a sudden expansion over its inlet head, (1 - A1/A2)^2.

    ``area_ratio`` is small over large area, A1/A2.
    """
    return (1.0 - area_ratio) ** 2


def plane_area_ratio(length_ratio: float, included_angle: float) -> float:
    """Return exit over inlet area of a plane or annular diffuser, 1 + 2 (N/W1) tan(angle/2)."""
    return 1.0 + 2.0 * length_ratio * math.tan(0.5 * included_angle)


def conical_area_ratio(length_ratio: float, included_angle: float) -> float:
    """Return exit over inlet area of a cone, (1 + 2 (N/D1) tan(angle/2))^2."""
    return (1.0 + 2.0 * length_ratio * math.tan(0.5 * included_angle)) ** 2


def plane_included_angle(length_ratio: float, area_ratio: float) -> float:
    """Return the included angle, rad, of a plane or annular diffuser."""
    return 2.0 * math.atan(0.5 * (area_ratio - 1.0) / length_ratio)


def stall_angle(length_ratio: float) -> float:
    """Return the included angle of first appreciable stall, rad.

    ``length_ratio`` is axial length over inlet gap. Source: :data:`STALL_LIMIT`.
    """
    return math.radians(33.0 / math.sqrt(length_ratio))
