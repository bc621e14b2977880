"""Size and rate gas-turbine combustors.

``case = load_case(path)``; ``design = size(case)``; ``ratings = rate(case)``. Everything in SI
units; every name below is imported when it is first used.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from combustor.api import comply, find_fuel, flame, rate, size, switch_fuel
    from combustor.base.errors import (
        CombustorError,
        InfeasibleError,
        InputError,
        NotConvergedError,
    )
    from combustor.case import Case, load_case
    from combustor.case.write import write_case
    from combustor.fuel.of_case import fuel_of
    from combustor.fuel.record import Fuel
    from combustor.rating.record import PointRating, Ratings
    from combustor.sizing.record import Design

__version__ = "0.1.0"

_HOMES = {
    "Case": "combustor.case",
    "CombustorError": "combustor.base.errors",
    "Design": "combustor.sizing.record",
    "Fuel": "combustor.fuel.record",
    "InfeasibleError": "combustor.base.errors",
    "InputError": "combustor.base.errors",
    "NotConvergedError": "combustor.base.errors",
    "PointRating": "combustor.rating.record",
    "Ratings": "combustor.rating.record",
    "comply": "combustor.api",
    "find_fuel": "combustor.api",
    "flame": "combustor.api",
    "fuel_of": "combustor.fuel.of_case",
    "load_case": "combustor.case",
    "rate": "combustor.api",
    "size": "combustor.api",
    "switch_fuel": "combustor.api",
    "write_case": "combustor.case.write",
}

__all__ = [
    "Case",
    "CombustorError",
    "Design",
    "Fuel",
    "InfeasibleError",
    "InputError",
    "NotConvergedError",
    "PointRating",
    "Ratings",
    "__version__",
    "comply",
    "find_fuel",
    "flame",
    "fuel_of",
    "load_case",
    "rate",
    "size",
    "switch_fuel",
    "write_case",
]


def __getattr__(name: str) -> Any:
    if name not in _HOMES:
        raise AttributeError(f"module 'combustor' has no attribute {name!r}")
    return getattr(import_module(_HOMES[name]), name)


def __dir__() -> list[str]:
    return sorted(__all__)
