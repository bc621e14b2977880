"""Smoke as a trend from one operating point or fuel to another; never a smoke number."""

from __future__ import annotations

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

SMOKE_TREND = Method(
    key="smoke-trend-rizk-mongia",
    quantity="soot formed in the primary zone, relative",
    source="structure of Rizk & Mongia: FAR P^2 / (m T) (18 - H)^1.5, oxidation left out",
    reading="from memory",
    scatter="factor 3, and only between points of one machine",
    note="smoke hangs on rich pockets and spray that no zone model resolves; the published "
    "constants were not read, so that no absolute value is given",
)


def soot_trend(
    fuel_air_ratio: float,
    pressure: float,
    air_flow: float,
    temperature: float,
    hydrogen: float,
) -> float:
    """Return soot formation in arbitrary units: use ratios of it alone.

    Parameters
    ----------
    fuel_air_ratio : float
        Of the primary zone.
    pressure : float
        Pa.
    air_flow : float
        Of the primary zone, kg/s.
    temperature : float
        Of the primary zone, K.
    hydrogen : float
        Mass fraction of the fuel, below 0.18.

    Raises
    ------
    InputError
        A fuel of 18 % hydrogen or more, where the form ends.

    Source
    ------
    ``SMOKE_TREND``.
    """
    if hydrogen >= 0.18:
        raise InputError(
            Problem(
                "the smoke trend ends at 18 % hydrogen",
                "such fuels hardly smoke",
                "hydrogen",
                hydrogen,
            )
        )
    formation = fuel_air_ratio * pressure**2 / (air_flow * temperature)
    return float(formation * (18.0 - 100.0 * hydrogen) ** 1.5)
