"""A torn recirculation: fixed-point passes, accelerated by their own history."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from combustor.kinetics.newton import ABSOLUTE_TOLERANCE, RELATIVE_TOLERANCE

Array = NDArray[np.float64]

REMEMBERED = 6


class Tear:
    """What is assumed to come back, improved from pass to pass.

    Anderson's method (Journal of the ACM 12, 1965, from memory): the next value is the
    combination of the last ones whose residual is smallest. The weights sum to one, so
    elements and enthalpy that every pass agrees on stay as they are.

    Parameters
    ----------
    first : ndarray
        Specific moles, then enthalpy.
    """

    def __init__(self, first: Array) -> None:
        self.value = first
        self._scale = np.abs(first) + 1e-6 * np.abs(first[:-1]).max()
        self._scale[-1] = abs(first[-1]) + 1e5  # J/kg
        self._values: list[Array] = []
        self._residuals: list[Array] = []

    def closed_by(self, back: Array) -> bool:
        """Take what did come back; say whether that closes the loop, else choose the next value."""
        residual = back - self.value
        tolerated = RELATIVE_TOLERANCE * np.abs(back) + ABSOLUTE_TOLERANCE
        if bool(np.all(np.abs(residual) <= tolerated)):
            return True
        self._values = [*self._values, back][-REMEMBERED:]
        self._residuals = [*self._residuals, residual / self._scale][-REMEMBERED:]
        self.value = self._combined()
        return False

    def _combined(self) -> Array:
        last = self._residuals[-1]
        if len(self._residuals) == 1:
            return self._values[-1]
        differences = np.array([last - earlier for earlier in self._residuals[:-1]]).T
        weights = np.linalg.lstsq(differences, last, rcond=1e-10)[0]
        value = (1.0 - weights.sum()) * self._values[-1]
        for weight, earlier in zip(weights, self._values[:-1], strict=True):
            value = value + weight * earlier
        return value
