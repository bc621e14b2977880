"""Mean radiation path from the hot gas to a liner wall."""

from __future__ import annotations

from typing import Literal

from combustor.base.method import Method
from combustor.hardware.metal import Layout

BEAM_LENGTH = Method(
    key="beam-length-lefebvre",
    quantity="mean beam length of the flame tube",
    source="Lefebvre, A. H., Gas Turbine Combustion (1983), chapter on heat transfer",
    reading="from memory",
    note="0.6 diameters for a can; 1.0 and 1.2 heights for inner and outer wall of an annulus",
)


def beam_length(layout: Layout, side: Literal["outer", "inner"], liner_height: float) -> float:
    """Return the mean beam length, m.

    Parameters
    ----------
    layout : as in the case file; a can-annular machine has round flame tubes.
    side : {"outer", "inner"}
    liner_height : float
        Liner diameter (can) or height (annular), m.

    Notes
    -----
    Source: see ``BEAM_LENGTH``.
    """
    if layout != "annular":
        return 0.6 * liner_height
    return (1.2 if side == "outer" else 1.0) * liner_height
