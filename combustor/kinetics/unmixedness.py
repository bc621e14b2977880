"""Unmixedness: the distribution of mixture fraction over parallel streams."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import eigh_tridiagonal

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

Array = NDArray[np.float64]

UNMIXED_STREAMS = Method(
    key="unmixed-streams",
    quantity="primary zone as parallel streams over a distribution of mixture fraction",
    source="Fletcher and Heywood, AIAA paper 71-123 (1971); Heywood and Mikus, AGARD CP-125 (1973)",
    reading="from memory",
    note="beta instead of their normal distribution: it needs no clipping at zero fuel, so mean "
    "fuel, mean air and width are exact at every width",
)
BETA_QUADRATURE = Method(
    key="beta-quadrature",
    quantity="mixture fraction and mass share of each stream",
    source="Gauss-Jacobi nodes of the beta distribution by the eigenvalues of its recurrence, "
    "Golub and Welsch, Mathematics of Computation 23 (1969)",
    reading="from memory",
)


@dataclass(frozen=True, eq=False)
class Distribution:
    """Streams that stand for a distribution of mixture fraction.

    Parameters
    ----------
    mixture_fractions : ndarray
        Fuel by mass of each stream, lean to rich [-]
    shares : ndarray
        Mass share of each stream, summing to one [-]
    """

    mixture_fractions: Array
    shares: Array

    @property
    def mean(self) -> float:
        """Mass-mean mixture fraction [-]."""
        return float(self.shares @ self.mixture_fractions)

    @property
    def unmixedness(self) -> float:
        """Realised standard deviation over mean [-]."""
        spread = self.shares @ (self.mixture_fractions - self.mean) ** 2
        return float(np.sqrt(spread)) / self.mean


def beta_streams(mean: float, unmixedness: float, streams: int) -> Distribution:
    """Return the streams of a beta distribution of mixture fraction.

    The nodes and weights of Gauss quadrature with the beta density as weight: mean fuel, mean
    air and width come out exactly, and a smooth yield is summed to high order.

    Parameters
    ----------
    mean : float
        Mass-mean mixture fraction, between 0 and 1 [-]
    unmixedness : float
        Standard deviation over mean, mass-weighted [-]
    streams : int
        Number of streams; a width of zero needs only one and gets one.

    Returns
    -------
    Distribution

    Raises
    ------
    InputError
        A mean outside 0 to 1, a width no distribution between pure air and pure fuel can have,
        or one stream for a width above zero.
    """
    if not 0.0 < mean < 1.0:
        raise InputError(
            Problem("mixture fraction outside its range", "between 0 and 1", "mean", mean)
        )
    widest = np.sqrt((1.0 - mean) / mean)
    if not 0.0 <= unmixedness < widest:
        raise InputError(
            Problem(
                "no distribution has this width",
                f"0 or above and below {widest:.3g} at this fuel-air ratio",
                "unmixedness",
                unmixedness,
            )
        )
    if unmixedness == 0.0:
        return Distribution(np.array([mean]), np.ones(1))
    if streams < 2:
        raise InputError(
            Problem("one stream has no width", "2 or more, or unmixedness 0", "streams", streams)
        )
    total = (1.0 - mean) / (mean * unmixedness**2) - 1.0
    nodes, weights = _beta_quadrature(mean * total, (1.0 - mean) * total, streams)
    return Distribution(nodes, weights)


def _beta_quadrature(first: float, second: float, count: int) -> tuple[Array, Array]:
    """Return nodes and weights, summing to one, of the beta density on 0 to 1."""
    alpha, beta = second - 1.0, first - 1.0
    order = np.arange(count, dtype=float)
    both = 2.0 * order + alpha + beta
    diagonal = np.empty(count)
    diagonal[0] = (beta - alpha) / (alpha + beta + 2.0)
    later = both[1:]
    diagonal[1:] = (beta**2 - alpha**2) / (later * (later + 2.0))
    n, s = order[1:], both[1:]
    square = np.empty(count - 1)
    square[0] = 4.0 * (1 + alpha) * (1 + beta) / (s[0] ** 2 * (s[0] + 1.0))
    m, z = n[1:], s[1:]
    square[1:] = (
        4.0 * m * (m + alpha) * (m + beta) * (m + alpha + beta) / (z**2 * (z + 1.0) * (z - 1.0))
    )
    values, vectors = eigh_tridiagonal(diagonal, np.sqrt(square))
    weights = vectors[0] ** 2
    return 0.5 * (1.0 + values), weights / weights.sum()
