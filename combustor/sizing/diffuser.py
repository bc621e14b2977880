"""Diffuser from the compressor exit to the annulus: faired or dump, stall, length, loss."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

from combustor.airflow.diffuser import (
    dump_loss_coefficient,
    plane_included_angle,
    stall_angle,
)
from combustor.base.method import Method

FAIRED_LOSS = Method(
    key="diffuser-loss-faired",
    quantity="total-pressure loss of a faired diffuser with its turn, over the inlet head",
    source="Lefebvre 1983: 0.15 to 0.25 overall",
    reading="from memory",
    validity={"inlet_mach": (0.0, 0.35)},
)
DUMP_LOSS_OVERALL = Method(
    key="diffuser-loss-dump-overall",
    quantity="total-pressure loss of pre-diffuser and dump, over the inlet head",
    source="Lefebvre 1983: 0.40 to 0.55 overall; here (1 - effectiveness)(1 - 1/AR^2) + "
    "zeta/AR^2 with effectiveness 0.85, zeta 0.8",
    reading="from memory",
    validity={"inlet_mach": (0.0, 0.35), "area_ratio": (1.4, 1.8)},
)
DIFFUSER_LENGTH = Method(
    key="diffuser-length",
    quantity="diffuser length, unstalled",
    source="included angle at 0.75 of first appreciable stall, Reneau, Johnston & Kline 1967, "
    "and at most 14 deg",
    reading="from memory",
    validity={"length_ratio": (1.5, 20.0)},
    scatter="3 deg",
)
DIFFUSER_AREA = Method(
    key="diffuser-area-ratio",
    quantity="exit area of the diffuser",
    source="a faired diffuser ends at the annulus velocity; a dump after an area ratio of 1.6",
    reading="common practice, no source",
)
STATED = Method(
    key="stated",
    quantity="a value stated in the case",
    source="the case file",
    reading="judgement",
)

FAIRED_COEFFICIENT = 0.20
PRE_DIFFUSER_AREA_RATIO = 1.6
EFFECTIVENESS = 0.85
DUMP_COEFFICIENT = 0.8
DUMP_GAP_RATIO = 1.1
STALL_MARGIN = 0.75
WIDEST_ANGLE = math.radians(14.0)
SHORTEST, LONGEST = 1.5, 20.0


@dataclass(frozen=True)
class DiffuserShape:
    """One way to slow the air down.

    Parameters
    ----------
    kind : {"faired", "dump"}
    area_ratio : float
        Exit over inlet; of the pre-diffuser where it dumps [-]
    length : float
        Axial, with the dump gap [m]
    loss_coefficient : float
        Total-pressure loss over inlet head [-]
    included_angle, stall_angle : float
        [rad]
    """

    kind: Literal["faired", "dump"]
    area_ratio: float
    length: float
    loss_coefficient: float
    included_angle: float
    stall_angle: float

    @property
    def is_stalled(self) -> bool:
        """Whether the angle exceeds first appreciable stall."""
        return self.included_angle > self.stall_angle


def unstalled_length_ratio(area_ratio: float) -> float:
    """Return the least length over inlet gap at 0.75 of the stall angle and at most 14 deg.

    Held to 1.5 to 20, the range of the chart; a longer one would be needed where the
    included angle that follows still exceeds the margin.
    """
    if _angle_excess(SHORTEST, area_ratio) <= 0.0:
        return SHORTEST
    if _angle_excess(LONGEST, area_ratio) > 0.0:
        return LONGEST
    low, high = SHORTEST, LONGEST
    for _ in range(60):
        middle = math.sqrt(low * high)
        if _angle_excess(middle, area_ratio) > 0.0:
            low = middle
        else:
            high = middle
    return high


def faired(inlet_area: float, inlet_gap: float, annulus_area: float) -> DiffuserShape:
    """Return a faired diffuser that ends with the annulus area.

    Parameters
    ----------
    inlet_area, annulus_area : float
        Whole machine [m2]
    inlet_gap : float
        Height of the compressor-exit annulus [m]
    """
    area_ratio = annulus_area / inlet_area
    ratio = unstalled_length_ratio(area_ratio) if area_ratio > 1.0 else SHORTEST
    return DiffuserShape(
        "faired",
        area_ratio,
        ratio * inlet_gap,
        FAIRED_COEFFICIENT,
        plane_included_angle(ratio, area_ratio),
        stall_angle(ratio),
    )


def dump(inlet_gap: float) -> DiffuserShape:
    """Return a pre-diffuser of area ratio 1.6 with a dump behind it."""
    area_ratio = PRE_DIFFUSER_AREA_RATIO
    ratio = unstalled_length_ratio(area_ratio)
    gap = DUMP_GAP_RATIO * area_ratio * inlet_gap
    return DiffuserShape(
        "dump",
        area_ratio,
        ratio * inlet_gap + gap,
        dump_loss_coefficient(area_ratio, EFFECTIVENESS, DUMP_COEFFICIENT),
        plane_included_angle(ratio, area_ratio),
        stall_angle(ratio),
    )


def choose(
    inlet_area: float,
    inlet_gap: float,
    annulus_area: float,
    kind: Literal["faired", "dump"] | None = None,
) -> tuple[DiffuserShape, DiffuserShape]:
    """Return the diffuser taken and the one that lost.

    The faired one costs less pressure and is taken unless it would stall within 20 inlet
    gaps, or the user asked for the other kind.

    Parameters
    ----------
    inlet_area, annulus_area : float
        Whole machine [m2]
    inlet_gap : float
        [m]
    kind : {"faired", "dump"} or None
        The user's choice.
    """
    smooth, sudden = faired(inlet_area, inlet_gap, annulus_area), dump(inlet_gap)
    stalls = smooth.included_angle > STALL_MARGIN * smooth.stall_angle * 1.0001
    if kind == "dump" or (kind is None and stalls):
        return sudden, smooth
    return smooth, sudden


def _allowed_angle(length_ratio: float) -> float:
    return min(STALL_MARGIN * stall_angle(length_ratio), WIDEST_ANGLE)


def _angle_excess(length_ratio: float, area_ratio: float) -> float:
    return plane_included_angle(length_ratio, area_ratio) - _allowed_angle(length_ratio)
