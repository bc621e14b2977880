"""How the film regimes are joined so that no result steps with the blowing ratio."""

from __future__ import annotations

from combustor.base.method import Method

JOIN = Method(
    key="film-regime-join",
    quantity="weights that join the film regimes",
    source="cubic smooth steps: mixing layer to boundary layer over blowing ratio 0.3 to 0.5, "
    "boundary layer to wall jet (convection only) over 1.2 to 1.4",
    reading="judgement",
    note="each published law stands unaltered in its own range outside the joints",
)

MIXING_END = 0.3
BOUNDARY_LAYER_START = 0.5
BOUNDARY_LAYER_END = 1.2
WALL_JET_START = 1.4


def smooth_step(value: float, low: float, high: float) -> float:
    """Return 0 below ``low``, 1 above ``high`` and a cubic with flat ends between."""
    t = min(max((value - low) / (high - low), 0.0), 1.0)
    return t * t * (3.0 - 2.0 * t)


def boundary_layer_share(blowing_ratio: float) -> float:
    """Weight of the attached film laws against the weak-film ones."""
    return smooth_step(blowing_ratio, MIXING_END, BOUNDARY_LAYER_START)


def wall_jet_share(blowing_ratio: float) -> float:
    """Weight of the wall-jet convection law against the boundary-layer one."""
    return smooth_step(blowing_ratio, BOUNDARY_LAYER_END, WALL_JET_START)
