"""The band round a predicted emission: an interim judgement until models are calibrated.

This module is the one place that holds it; a calibrated scatter replaces ``INTERIM_SCATTER``.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import erfc, exp, log, sqrt

from combustor.base.method import Method

# Standard deviation of ln(measured / predicted).
INTERIM_SCATTER: Mapping[str, float] = {
    "NOx": 0.35,
    "NO": 0.40,
    "NO2": 0.70,
    "CO": 0.70,
    "UHC": 0.90,
    "N2O": 0.70,
    "NH3": 0.90,
    "SO2": 0.03,
    "SO3": 0.50,
    "CO2": 0.01,
}
COVERAGE = 0.90
_QUANTILE = 1.6448536269514722  # of the normal distribution at 95 %

SCATTER = Method(
    key="prediction-band-interim",
    quantity="band that holds the measured value in 9 of 10 machines, log-normal",
    source="judgement, not calibrated: reactor chains of conventional combustors with settings "
    "common to all scatter by 0.1 to 0.3 in ln NOx and 0.5 to 0.6 in ln CO, and published NOx "
    "correlations differ by a factor of 2 on one machine; sulfur and carbon are mass balances",
    reading="judgement",
    scatter="ln standard deviation 0.35 NOx, 0.7 CO, 0.9 unburnt hydrocarbons",
    note="interim: replaced by the scatter of a calibration, or by [rules] scatter",
)


@dataclass(frozen=True)
class Band:
    """A predicted value with the band it is known within.

    Parameters
    ----------
    value, low, high : float
        Any one unit; 5 and 95 % of a log-normal distribution whose median is ``value``.
    scatter : float
        Standard deviation of the logarithm.
    """

    value: float
    low: float
    high: float
    scatter: float

    def probability_above(self, limit: float) -> float:
        """Return the probability that the true value exceeds ``limit`` (above zero)."""
        if self.value <= 0.0:
            return 0.0
        return 0.5 * erfc(log(limit / self.value) / (self.scatter * sqrt(2.0)))


def band_of(value: float, pollutant: str, own: Mapping[str, float] | None = None) -> Band:
    """Return the band of a predicted value.

    Parameters
    ----------
    value : float
        Any unit.
    pollutant : str
    own : mapping of str to float, optional
        The user's scatter by pollutant, in place of the interim one.

    Source
    ------
    ``SCATTER``.
    """
    scatter = (own or {}).get(pollutant) or INTERIM_SCATTER[pollutant]
    width = exp(_QUANTILE * scatter)
    return Band(value, value / width, value * width, scatter)
