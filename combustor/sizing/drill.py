"""Diameters that can be drilled."""

from __future__ import annotations

from combustor.base.method import Method

DRILL_STEPS = Method(
    key="drill-steps",
    quantity="diameters of holes",
    source="preferred drill sizes of the metric twist-drill series: 0.05 mm steps to 3 mm, "
    "0.1 mm to 14 mm, 0.25 mm to 32 mm, 0.5 mm to 50 mm, 1 mm above",
    reading="from memory",
)

_STEPS = ((3.0, 0.05), (14.0, 0.1), (32.0, 0.25), (50.0, 0.5))
_LARGEST_STEP = 1.0
SMALLEST_DRILL = 0.5e-3


def drill_step(diameter: float, step: float | None = None) -> float:
    """Return the step of drill sizes near a diameter [m]; a stated step stands everywhere."""
    if step is not None:
        return step
    for limit, size in _STEPS:
        if diameter * 1e3 <= limit:
            return size * 1e-3
    return _LARGEST_STEP * 1e-3


def nearest_drill(diameter: float, step: float | None = None) -> float:
    """Return the drill size nearest to a diameter [m], at least 0.5 mm."""
    size = drill_step(diameter, step)
    # whole hundredths of a millimetre keep the number as it is written on a drawing
    hundredths = round(round(diameter / size) * size * 1e5)
    return max(hundredths / 1e5, SMALLEST_DRILL)
