"""The cross-section as areas and heights, whatever the layout.

The casing is a circle round each can, or one ring about a mean diameter; the liner is round,
or a ring of the same mean diameter. Everything else in sizing asks for an area, a height or a
side and never for the shape.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from combustor.base.method import Method
from combustor.hardware.metal import Layout

CAN_CLEARANCE = Method(
    key="can-clearance",
    quantity="gap between neighbouring cans, and between can and casing ring",
    source="5 % of the liner diameter, 2 mm at least, so that air reaches all sides",
    reading="judgement",
)
CLEARANCE_SHARE, LEAST_CLEARANCE = 0.05, 2e-3


@dataclass(frozen=True)
class Section:
    """Shape of casing and liner.

    Parameters
    ----------
    cans : int
        Round liners side by side; 1 for a ring.
    mean_diameter : float or None
        Mean diameter of the casing ring [m]; None where each can has its own round casing.
    """

    cans: int = 1
    mean_diameter: float | None = None

    @property
    def layout(self) -> Layout:
        """The layout as the metal knows it; several cans in one ring are can-annular."""
        if self.mean_diameter is None:
            return "can"
        return "can-annular" if self.cans > 1 else "annular"

    @property
    def is_round(self) -> bool:
        """Whether the liner is a circle."""
        return self.layout != "annular"

    @property
    def casing_exponent(self) -> float:
        """Power of the casing height in its area."""
        return 2.0 if self.mean_diameter is None else 1.0

    @property
    def casing_coefficient(self) -> float:
        """Casing area of the whole machine over height to the power `casing_exponent`."""
        if self.mean_diameter is None:
            return self.cans * math.pi / 4.0
        return math.pi * self.mean_diameter

    def casing_area(self, height: float) -> float:
        """Return the casing area of the whole machine for a diameter or ring height [m2]."""
        return float(self.casing_coefficient * height**self.casing_exponent)

    def casing_height(self, area: float) -> float:
        """Return casing diameter or ring height for an area of the whole machine [m]."""
        return float((area / self.casing_coefficient) ** (1.0 / self.casing_exponent))

    def casing_perimeter(self, height: float) -> float:
        """Return the casing surface per length and can [m]; both walls of a ring."""
        if self.mean_diameter is None:
            return math.pi * height
        return 2.0 * math.pi * self.mean_diameter / self.cans

    def area(self, height: float) -> float:
        """Return the liner area of the whole machine for a diameter or ring height [m2]."""
        if self.is_round:
            return self.cans * math.pi / 4.0 * height**2
        return math.pi * self._ring * height

    def height(self, area: float) -> float:
        """Return liner diameter or ring height for an area of the whole machine [m]."""
        if self.is_round:
            return math.sqrt(4.0 * area / (math.pi * self.cans))
        return area / (math.pi * self._ring)

    def perimeter(self, height: float) -> float:
        """Return the wetted perimeter of a liner per can [m]; both walls of a ring."""
        if self.is_round:
            return math.pi * height
        return 2.0 * math.pi * self._ring

    def hydraulic_diameter(self, height: float) -> float:
        """Return 4 area / perimeter of a liner [m]."""
        return 4.0 * self.area(height) / self.cans / self.perimeter(height)

    def largest_liner(self, casing_height: float, sheet: float) -> float:
        """Return the largest liner diameter that leaves cans in a ring their clearance [m].

        Infinite where nothing but the casing's own area bounds the liner.

        Parameters
        ----------
        casing_height : float
            Of the ring [m]
        sheet : float
            Liner sheet [m]
        """
        if self.mean_diameter is None or not self.is_round:
            return math.inf
        # the chord between neighbours' axes, and the ring itself
        room = min(casing_height, self.mean_diameter * math.sin(math.pi / self.cans))
        by_share = (room - 2.0 * sheet) / (1.0 + CLEARANCE_SHARE)
        return min(by_share, room - 2.0 * sheet - LEAST_CLEARANCE)

    def height_around(self, liner_diameter: float, sheet: float = 2e-3) -> float:
        """Return the casing ring height that leaves cans of a diameter their clearance [m].

        Zero where the casing follows the liner by its area alone.
        """
        if self.mean_diameter is None or not self.is_round:
            return 0.0
        clearance = max(CLEARANCE_SHARE * liner_diameter, LEAST_CLEARANCE)
        return liner_diameter + clearance + 2.0 * sheet

    @property
    def _ring(self) -> float:
        assert self.mean_diameter is not None  # a ring has one by its layout
        return self.mean_diameter


def cans_that_fit(can_diameter: float, pitch_diameter: float) -> int:
    """Return how many cans fit on a pitch circle: pi / asin(D_can / D_pitch), whole [-].

    Parameters
    ----------
    can_diameter : float
        With its casing wall and clearance [m]
    pitch_diameter : float
        Of the circle through the cans' axes [m]
    """
    return math.floor(math.pi / math.asin(can_diameter / pitch_diameter) + 1e-9)
