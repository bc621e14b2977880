"""The landing and take-off cycle of aircraft engines: four modes, mass per rated thrust."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import sqrt

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

LANDING_TAKEOFF_CYCLE = Method(
    key="landing-takeoff-cycle",
    quantity="time in mode of a subsonic turbofan, and emission per rated thrust",
    source="ICAO Annex 16 Volume II; modes and times as given in copies of 14 CFR 34 subpart G",
    reading="as given in",
)
CHARACTERISTIC_LEVEL = Method(
    key="characteristic-level",
    quantity="mean of the engines tested to the level that is compared with the limit",
    source="ICAO Annex 16 Volume II, appendix 6",
    reading="from memory",
    note="rows 3 to 10 follow from the closed form of more than ten engines; rows 1 and 2 do not",
)

# s
TIME_IN_MODE: Mapping[str, float] = {
    "idle": 26.0 * 60.0,
    "approach": 4.0 * 60.0,
    "climb": 2.2 * 60.0,
    "take-off": 0.7 * 60.0,
}
MODE_THRUST: Mapping[str, float] = {"idle": 0.07, "approach": 0.30, "climb": 0.85, "take-off": 1.0}

_FACTORS: Mapping[str, tuple[float, ...]] = {
    "CO": (0.8147, 0.8777, 0.9246, 0.9347, 0.9416, 0.9467, 0.9506, 0.9538, 0.9565, 0.9587),
    "UHC": (0.6493, 0.7685, 0.8572, 0.8764, 0.8894, 0.8990, 0.9065, 0.9126, 0.9176, 0.9218),
    "NOx": (0.8627, 0.9094, 0.9441, 0.9516, 0.9567, 0.9605, 0.9634, 0.9658, 0.9677, 0.9694),
}
_SLOPE = {"CO": 0.13059, "UHC": 0.24724, "NOx": 0.09678}


@dataclass(frozen=True)
class Mode:
    """One engine in one mode: kg per kg fuel, and kg fuel per s."""

    emission_index: float
    fuel_flow: float


def mass_per_thrust(modes: Mapping[str, Mode], rated_thrust: float) -> float:
    """Return the mass emitted over the cycle per rated thrust, kg/N.

    Parameters
    ----------
    modes : mapping of str to Mode
        All four of ``TIME_IN_MODE``.
    rated_thrust : float
        Of one engine, N.

    Raises
    ------
    InputError
        A mode is missing, or there is one that the cycle does not know.

    Source
    ------
    ``LANDING_TAKEOFF_CYCLE``.
    """
    missing = [name for name in TIME_IN_MODE if name not in modes]
    unknown = [name for name in modes if name not in TIME_IN_MODE]
    if missing or unknown:
        raise InputError(
            Problem(
                "the landing and take-off cycle needs its four modes",
                f"{', '.join(TIME_IN_MODE)}; missing: {', '.join(missing) or 'none'}",
                "modes",
                ", ".join(unknown) or None,
            )
        )
    total = sum(
        mode.emission_index * mode.fuel_flow * TIME_IN_MODE[name] for name, mode in modes.items()
    )
    return total / rated_thrust


def characteristic_factor(pollutant: str, engines: int) -> float:
    """Return the divisor that takes a mean of engines tested to the characteristic level.

    Parameters
    ----------
    pollutant : {"NOx", "CO", "UHC"}
    engines : int
        Tested, at least 1.

    Source
    ------
    ``CHARACTERISTIC_LEVEL``.
    """
    if engines <= 10:
        return _FACTORS[pollutant][engines - 1]
    return 1.0 - _SLOPE[pollutant] / sqrt(engines)
