"""The cross-section as areas and heights, whatever the layout.

A round section is a can (or several, each in its own casing); a ring is an annular casing
about a mean diameter. Everything else in sizing asks for an area or a height and never for
the shape.
"""

from __future__ import annotations

import math
from dataclasses import dataclass


@dataclass(frozen=True)
class Section:
    """Shape of casing and liner.

    Parameters
    ----------
    cans : int
        Round sections side by side; 1 for a ring.
    mean_diameter : float or None
        Mean diameter of a ring [m]; None for round sections.
    """

    cans: int = 1
    mean_diameter: float | None = None

    @property
    def is_round(self) -> bool:
        """Whether the section is a circle."""
        return self.mean_diameter is None

    @property
    def exponent(self) -> float:
        """Power of the height in the area."""
        return 2.0 if self.is_round else 1.0

    @property
    def coefficient(self) -> float:
        """Area of the whole machine over height to the power `exponent`."""
        if self.mean_diameter is None:
            return self.cans * math.pi / 4.0
        return math.pi * self.mean_diameter

    def area(self, height: float) -> float:
        """Return the area of the whole machine for a diameter or ring height [m2]."""
        return float(self.coefficient * height**self.exponent)

    def height(self, area: float) -> float:
        """Return diameter or ring height for an area of the whole machine [m]."""
        return float((area / self.coefficient) ** (1.0 / self.exponent))

    def perimeter(self, height: float) -> float:
        """Return the wetted perimeter per can [m]; both walls of a ring."""
        if self.mean_diameter is None:
            return math.pi * height
        return 2.0 * math.pi * self.mean_diameter

    def hydraulic_diameter(self, height: float) -> float:
        """Return 4 area / perimeter [m]."""
        return 4.0 * self.area(height) / self.cans / self.perimeter(height)
