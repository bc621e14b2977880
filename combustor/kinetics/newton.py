"""Newton's method for all streams of a zone at once, with reused factors, and its march in time.

The streams of a zone are coupled only through their mean products and their residence time, so
the Jacobian is an arrow: one small block for each stream and one border. Each block is factored
when its stream stops converging well and is kept otherwise.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray
from scipy.linalg.lapack import dgetrf, dgetri, dgetrs

from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]

RELATIVE_TOLERANCE = 1e-7  # last Newton step, per species
ABSOLUTE_TOLERANCE = 1e-15  # kmol/kg, about 3e-14 in mass fraction
DEEPEST_DIP = 100.0 * ABSOLUTE_TOLERANCE  # below zero, allowed to an iterate
ELEMENT_TOLERANCE = 1e-12  # of what flows in
LEAST_ELEMENTS = 1e-16  # kmol/kg, the noise of arithmetic
KEPT_CONTRACTION = 0.1  # a factor is kept while steps shrink at least by this
HOPELESS = 1e40  # step size beyond which an iterate is given up at once
# A run whose steps are still this large after this many iterations is not going to settle.
WANDERING, WANDERED = 10, 1e7


@dataclass(frozen=True, eq=False)
class Outcome:
    """What a Newton run ended with.

    Parameters
    ----------
    state : ZoneState
    converged : bool
    step : float
        Size of the last step; converged at one or below, in units of the tolerance.
    iterations : int
    stable : bool
        The Jacobian's determinant has the sign of a stable steady state: false on the branch
        between burning and extinguished.
    """

    state: ZoneState
    converged: bool
    step: float
    iterations: int
    stable: bool


class _Factor:
    """One stream's factored Jacobian."""

    def __init__(self, matrix: Array) -> None:
        # Row-major memory is the transpose in LAPACK's eyes: no copy, and solved as such below.
        self._upper, self._pivots, info = dgetrf(matrix.T, overwrite_a=1)
        self.regular = info == 0
        self.stable = (_sign_changes(self._upper, self._pivots) - len(matrix)) % 2 == 0

    def solve(self, right: Array) -> Array:
        return dgetrs(self._upper, self._pivots, right, trans=1)[0]

    @cached_property
    def inverse(self) -> Array:
        """For the border alone: it keeps elements less well than a solve does."""
        return dgetri(self._upper, self._pivots)[0].T


def _sign_changes(upper: Array, pivots: NDArray[np.int32]) -> int:
    """Return a number whose parity is the sign of the factored matrix's determinant."""
    swaps = np.count_nonzero(pivots != np.arange(len(pivots)))
    return int(swaps + np.count_nonzero(upper.diagonal() < 0.0))


class _Run:
    """The moving parts of one Newton run."""

    def __init__(self, zone: Zone, state: ZoneState, inverse_step: float) -> None:
        self.zone = zone
        self.rates = zone.gas.rates
        self.moles = state.moles.copy()
        self.anchor = state.moles
        self.temperatures = state.temperatures.copy()
        self.rate = state.rate
        self.inverse_step = inverse_step
        self.factors: list[_Factor | None] = [None] * zone.streams
        self.sizes = np.full(zone.streams, np.inf)
        self.signs = np.ones(zone.streams, dtype=bool)
        self.border_sign = True
        self.restored = False

    def advance(self) -> float:
        """Take one step; return its size, infinite when the iterate went astray."""
        zone, pressure = self.zone, self.zone.pressure
        mean = zone.shares @ self.moles
        inlets = zone.inlets(mean, self.rate)
        enthalpies = zone.inlet_enthalpies(self.rate) - zone.loss_per_pass
        residuals = (inlets - self.moles) * self.rate
        if self.inverse_step > 0.0:
            residuals += self.inverse_step * (self.anchor - self.moles)
        volumes = np.empty(zone.streams)
        slopes = np.empty_like(self.moles)
        for place in range(zone.streams):
            moles = self.moles[place]
            temperature = self.rates.temperature(
                enthalpies[place], pressure, moles, self.temperatures[place]
            )
            if not temperature > 0.0:
                return np.inf
            self.temperatures[place] = temperature
            factor = self.factors[place]
            if factor is None:
                production, matrix = self.rates.derivatives(temperature, pressure, moles)
                matrix.flat[:: len(moles) + 1] -= self.rate + self.inverse_step
                factor = self.factors[place] = _Factor(matrix)
                self.signs[place] = factor.stable
                if not factor.regular:
                    return np.inf
            else:
                production = self.rates.production(temperature, pressure, moles)
            residuals[place] += production
            volumes[place], slopes[place] = self.rates.volume_slope(temperature, pressure, moles)
        slope = zone.inlet_slope(self.rate)
        by_rate = inlets - self.moles if slope is None else inlets - self.moles + self.rate * slope
        change, rate_change = self._border(residuals, by_rate, volumes, slopes)
        return self._take(change, rate_change)

    def _border(
        self, residuals: Array, by_rate: Array, volumes: Array, slopes: Array
    ) -> tuple[Array, float]:
        """Solve the arrow system for the change of every stream and of the shared rate."""
        zone, shares = self.zone, self.zone.shares
        size = residuals.shape[1]
        plain = np.empty_like(residuals)
        with_rate = np.empty_like(residuals)
        for place, factor in enumerate(self.factors):
            assert factor is not None
            both = factor.solve(np.stack((residuals[place], by_rate[place]), axis=1))
            plain[place], with_rate[place] = both[:, 0], both[:, 1]
        fixed = zone.residence_time is not None
        scale = 0.0 if fixed else zone.throughflow_rate(1.0)
        gap = zone.throughflow_rate(float(shares @ volumes)) - self.rate
        weighted = scale * shares[:, None] * slopes
        rate_pivot = 1.0 + np.sum(weighted * with_rate)
        rate_right = gap - np.sum(weighted * plain)
        back = zone.recirculation / (1.0 + zone.recirculation) * self.rate
        if back == 0.0:
            self.border_sign = bool(rate_pivot > 0.0)
            rate_change = float(rate_right / rate_pivot)
            return -plain - with_rate * rate_change, rate_change
        factors = [factor for factor in self.factors if factor is not None]
        border = np.zeros((size + 1, size + 1))
        for place, factor in enumerate(factors):
            border[:size, :size] += (back * shares[place]) * factor.inverse
            border[size, :size] += back * (weighted[place] @ factor.inverse)
        border.flat[:: size + 2] += 1.0
        border[:size, size] = shares @ with_rate
        border[size, size] = rate_pivot
        upper, pivots, info = dgetrf(border)
        if info != 0:
            return np.full_like(residuals, np.inf), 0.0
        self.border_sign = _sign_changes(upper, pivots) % 2 == 0
        right = np.append(-(shares @ plain), rate_right)
        answer = dgetrs(upper, pivots, right)[0]
        mean_change, rate_change = answer[:size], float(answer[size])
        change = -plain - with_rate * rate_change
        for place, factor in enumerate(factors):
            change[place] -= factor.solve(back * mean_change)
        return change, rate_change

    def _take(self, change: Array, rate_change: float) -> float:
        moles = self.moles
        tolerated = RELATIVE_TOLERANCE * np.abs(moles) + ABSOLUTE_TOLERANCE
        sizes = np.abs(change / tolerated).max(axis=1)
        rate_size = abs(rate_change) / (RELATIVE_TOLERANCE * self.rate)
        size = max(float(sizes.max()), rate_size)
        if not size < HOPELESS:
            return np.inf
        new = moles + change
        dips = new < -DEEPEST_DIP
        if dips.any():
            # Elements are lost here and come back with the next full step; the last step of a
            # converged run is far too small to dip.
            new = np.where(dips, np.maximum(0.1 * moles, 0.0), new)
        for place in range(self.zone.streams):
            slow = sizes[place] > KEPT_CONTRACTION * self.sizes[place]
            if slow or dips[place].any():
                self.factors[place] = None
        self.sizes = sizes
        self.moles = new
        self.rate = min(max(self.rate + rate_change, 0.2 * self.rate), 5.0 * self.rate)
        return size

    @property
    def stable(self) -> bool:
        return self.border_sign and bool(self.signs.all())

    def refreshed_for_elements(self) -> bool:
        """Say whether elements are still short, once; exact factors then restore them.

        A dip below zero costs elements, and a step from a kept factor gives them back only as
        far as the throughflow has not changed since.
        """
        if self.restored:
            return False
        self.restored = True
        elements = self.zone.gas.element_matrix
        inlets = self.zone.inlets(self.zone.shares @ self.moles, self.rate)
        gap = np.abs((inlets - self.moles) @ elements.T)
        short = bool(np.any(gap > ELEMENT_TOLERANCE * (inlets @ elements.T) + LEAST_ELEMENTS))
        if short:
            self.factors = [None] * self.zone.streams
        return short

    def finish(self) -> ZoneState:
        """Return the last iterate with the temperatures that belong to it."""
        zone = self.zone
        enthalpies = zone.inlet_enthalpies(self.rate) - zone.loss_per_pass
        temperatures = [
            self.rates.temperature(*arguments)
            for arguments in zip(
                enthalpies,
                [zone.pressure] * zone.streams,
                self.moles,
                self.temperatures,
                strict=True,
            )
        ]
        return ZoneState(self.moles, np.array(temperatures), self.rate)


def newton(
    zone: Zone,
    start: ZoneState,
    iterations: int = 25,
    inverse_step: float = 0.0,
    tolerance: float = 1.0,
) -> Outcome:
    """Solve the steady equations of a zone, or one implicit step in time.

    Parameters
    ----------
    zone : Zone
    start : ZoneState
        First iterate; with ``inverse_step`` also the state before the step.
    iterations : int
        Most to spend.
    inverse_step : float
        Inverse time step, zero for the steady state [1/s]
    tolerance : float
        Step size at which to stop, in units of the module's tolerances.

    Returns
    -------
    Outcome
        Its state is the last iterate even when not converged.
    """
    run = _Run(zone, start, inverse_step)
    size = np.inf
    count = 0
    while count < iterations and (count < WANDERING or size < WANDERED):
        size = run.advance()
        count += 1
        if size <= tolerance and inverse_step == 0.0 and run.refreshed_for_elements():
            continue
        if size <= tolerance:
            return Outcome(run.finish(), True, size, count, run.stable)
        if not size < np.inf:
            break
    return Outcome(ZoneState(run.moles, run.temperatures, run.rate), False, size, count, False)


def march(zone: Zone, start: ZoneState, coldest: float = 0.0, most_steps: int = 400) -> Outcome:
    """Follow a zone in time by implicit steps until it is steady, then solve it exactly.

    Parameters
    ----------
    zone : Zone
    start : ZoneState
    coldest : float
        Mass-mean temperature at which to give up, when only a burning state is wanted [K]
    most_steps : int
        Steps in time to spend.

    Returns
    -------
    Outcome
        The steady state the start runs into.
    """
    state = start
    spent = 0
    time_step = min(1e-6, 0.01 / start.rate)
    for _ in range(most_steps):
        outcome = newton(zone, state, 8, 1.0 / time_step, tolerance=1e4)
        spent += outcome.iterations
        if not outcome.converged:
            time_step *= 0.3
            if time_step < 1e-15:
                break
            continue
        state = outcome.state
        if float(zone.shares @ state.temperatures) < coldest:
            break
        time_step *= 3.0 if outcome.iterations <= 4 else 1.5
        if time_step * state.rate > 10.0:
            final = newton(zone, state, 12)
            spent += final.iterations
            warm = float(zone.shares @ final.state.temperatures) >= coldest
            if final.converged and final.stable and warm:
                return Outcome(final.state, True, final.step, spent, True)
    return Outcome(state, False, np.inf, spent, False)
