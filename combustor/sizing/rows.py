"""Primary, secondary and dilution rows: count, hole diameter, penetration, pitch."""

from __future__ import annotations

import math
from dataclasses import dataclass

from combustor.airflow.jets import penetration_row, penetration_single
from combustor.base.method import Method
from combustor.sizing.section import Section

ROW_COUNT = Method(
    key="row-count-penetration",
    quantity="number of holes in a row",
    source="jets of the size that reaches 0.33 liner diameters (can) or 0.4 liner heights "
    "(ring): penetration of Norster 1964, as quoted by Lefebvre 1983, with n d^2 from continuity",
    reading="from memory",
    validity={"momentum_flux_ratio": (5.0, 105.0)},
)
HOLDEMAN_COUNT = Method(
    key="row-count-holdeman",
    quantity="number of holes in a row for the best mixing",
    source="Holdeman 1993, Prog. Energy Combust. Sci. 19: n = pi sqrt(2 J)/2.5 in a can, pitch "
    "1.25 H/sqrt(J) in rows opposed in line",
    reading="from memory",
    validity={"momentum_flux_ratio": (5.0, 105.0)},
)
ROW_PITCH = Method(
    key="row-pitch",
    quantity="pitch over hole diameter along a row",
    source="ligament of at least half a diameter; one diameter aimed at in a can, 0.8 in a "
    "ring, whose jets need not reach far",
    reading="common practice, no source",
    validity={"pitch_over_diameter": (1.5, math.inf)},
)
ROW_POSITION = Method(
    key="row-position",
    quantity="position of a row along the liner",
    source="primary row closes its zone, secondary row stands a third into its zone, dilution "
    "row opens its zone",
    reading="judgement",
)

PENETRATION_ROUND, PENETRATION_RING = 0.33, 0.40
LEAST_COUNT, LEAST_COUNT_RING = 6, 12
AIMED_PITCH, AIMED_PITCH_RING, LEAST_PITCH = 2.0, 1.8, 1.5
WEAK_MOMENTUM_RATIO = 10.0
SMALLEST_ROW_DRILL = 1.0e-3


@dataclass(frozen=True)
class RowConditions:
    """What one can's row of jets meets.

    Parameters
    ----------
    jet_flow, gas_flow : float
        All jets of the row, and hot gas reaching it, per can [kg/s]
    jet_velocity, jet_density : float
        [m/s], [kg/m3]
    discharge_coefficient : float
    momentum_ratio : float
        J, jet over local hot gas [-]
    jet_angle : float
        From the liner axis [rad]
    """

    jet_flow: float
    gas_flow: float
    jet_velocity: float
    jet_density: float
    discharge_coefficient: float
    momentum_ratio: float
    jet_angle: float = 0.5 * math.pi


@dataclass(frozen=True)
class RowPlan:
    """Count and size of a row.

    ``free_count`` is what the penetration rule asks before rounding and bounds;
    ``best_mixing_count`` is Holdeman's. ``bound`` says what held the count, if anything.
    Lengths in m; ``penetration`` is that of the whole count.
    """

    count: int
    free_count: float
    best_mixing_count: float
    hole_diameter: float
    penetration: float
    bound: str = ""


def wanted_penetration(section: Section, liner_height: float) -> float:
    """Return the depth jets are to reach [m]."""
    share = PENETRATION_ROUND if section.is_round else PENETRATION_RING
    return share * liner_height


def holes_times_diameter_squared(conditions: RowConditions) -> float:
    """Return number of jets times jet diameter squared, n d^2 = (4/pi) m/(rho V) [m2]."""
    flux = conditions.jet_density * conditions.jet_velocity
    return 4.0 / math.pi * conditions.jet_flow / flux


def best_mixing_count(momentum_ratio: float) -> float:
    """Return Holdeman's number of holes round a can, pi sqrt(2 J)/2.5 [-]."""
    return math.pi * math.sqrt(2.0 * momentum_ratio) / 2.5


def best_count_opposed(momentum_ratio: float, mean_diameter: float, height: float) -> float:
    """Return Holdeman's number of holes in two rows opposed in line, both walls of a ring [-].

    Pitch S = 1.25 H / sqrt(J) at the diameter that halves the area.
    """
    pitch = 1.25 * height / math.sqrt(momentum_ratio)
    return 2.0 * math.pi * mean_diameter / pitch


def best_count(momentum_ratio: float, section: Section, liner_height: float) -> float:
    """Return Holdeman's number of holes for a section, all sides [-]."""
    if section.is_round or section.mean_diameter is None:
        return best_mixing_count(momentum_ratio)
    return best_count_opposed(momentum_ratio, section.mean_diameter, liner_height)


def plan_row(
    conditions: RowConditions,
    section: Section,
    liner_height: float,
    stated_count: int | None = None,
) -> RowPlan:
    """Return count and hole diameter of a row.

    Parameters
    ----------
    conditions : RowConditions
    section : Section
    liner_height : float
        Liner diameter or ring height [m]
    stated_count : int or None
        The count to keep, all sides.

    Returns
    -------
    RowPlan
    """
    depth = wanted_penetration(section, liner_height)
    per_diameter = _penetration_per_diameter(conditions, section)
    squared = holes_times_diameter_squared(conditions)
    free = squared / (depth / per_diameter) ** 2
    drilled_squared = squared / conditions.discharge_coefficient
    perimeter = section.perimeter(liner_height)
    sides = 1 if section.is_round else 2
    least = LEAST_COUNT if section.is_round else LEAST_COUNT_RING
    pitch = AIMED_PITCH if section.is_round else AIMED_PITCH_RING
    most = max(sides * int(perimeter**2 / (sides * pitch**2 * drilled_squared)), least)
    finest = sides * int(drilled_squared / (sides * SMALLEST_ROW_DRILL**2))
    count, bound = _bounded(free, least, most, sides, pitch)
    if count > max(finest, sides):
        count = max(finest, sides)
        bound = f"holes of {1e3 * SMALLEST_ROW_DRILL:g} mm at least"
    if stated_count is not None:
        count, bound = stated_count, "count stated in the case"
    jet = math.sqrt(squared / count)
    return RowPlan(
        count=count,
        free_count=free,
        best_mixing_count=best_count(conditions.momentum_ratio, section, liner_height),
        hole_diameter=math.sqrt(drilled_squared / count),
        penetration=per_diameter * jet,
        bound=bound,
    )


def _penetration_per_diameter(conditions: RowConditions, section: Section) -> float:
    """Return penetration over jet diameter, by the law the air split reports it by [-]."""
    ratio = conditions.momentum_ratio
    if section.is_round:
        return penetration_row(1.0, ratio, conditions.gas_flow, conditions.jet_flow)
    return penetration_single(1.0, ratio, conditions.jet_angle)


def pitch_over_diameter(perimeter: float, count: int, diameter: float) -> float:
    """Return hole pitch round the wall over hole diameter [-]."""
    return perimeter / (count * diameter)


def _bounded(free: float, least: int, most: int, sides: int, pitch: float) -> tuple[int, str]:
    count = max(sides * round(free / sides), 1)
    if count > most:
        return most, f"pitch of {pitch:g} diameters allows no more"
    if count < least:
        return least, f"at least {least} holes to close the ring"
    return count, ""
