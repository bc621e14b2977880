"""Operating points stated by flight: altitude, Mach number, ram recovery."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from combustor.atmosphere import ram_air
from combustor.case.kinds import ALTITUDE, FLIGHT_MACH, RAM_RECOVERY
from combustor.case.quantity import QuantityError

INLET_KEYS = ("inlet_pressure", "inlet_temperature")
FLIGHT_KEYS = ("altitude", "flight_mach", "ram_recovery")


def with_inlet(point: Mapping[str, Any]) -> dict[str, Any]:
    """Return a point's table with the inlet that its flight gives.

    A value that cannot be read counts as sea level at rest: the key itself is complained of.
    """
    if point.get("altitude") is None:
        return dict(point)
    altitude = _read(ALTITUDE, point["altitude"], 0.0)
    mach = _read(FLIGHT_MACH, point.get("flight_mach"), 0.0)
    recovery = _read(RAM_RECOVERY, point.get("ram_recovery"), 1.0)
    air = ram_air(altitude, mach, recovery)
    return {**point, "inlet_pressure": air.pressure, "inlet_temperature": air.temperature}


def _read(quantity: Any, value: Any, otherwise: float) -> float:
    if value is None:
        return otherwise
    try:
        return float(quantity.read(value))
    except QuantityError:
        return otherwise
