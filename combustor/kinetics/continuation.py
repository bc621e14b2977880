"""Following the burning branch: each step from the last burning state."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from functools import partial

import numpy as np
from numpy.typing import NDArray

from combustor.kinetics.burning import (
    all_burn,
    burning_temperature,
    count_burning,
    mean_temperature,
)
from combustor.kinetics.newton import Outcome, march, newton
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]

# The branch is entered at this many times the wanted residence time. Equilibrium falls off the
# burning branch at two to three times the residence time of true extinction, so this is ample.
LONG_RESIDENCE = 20.0
FIRST_RATIO = 0.2  # of residence time from one step along the branch to the next
LAST_RATIO = 0.9  # a step this small that loses the branch is marched in time instead
GENTLE_FALL = 100.0  # K in one step: a stream that cools by less has not gone out
STEP_ITERATIONS = 9  # a continuation step that needs more is too long


@dataclass(frozen=True, eq=False)
class Followed:
    """How far along its burning branch a zone was followed.

    Parameters
    ----------
    state : ZoneState or None
        The last burning state, None where no burning state was found at all.
    factor : float
        The falling quantity there; of `follow`, residence time over the wanted one, so that 1
        means that the zone burns.
    iterations : int
        Newton iterations spent.
    """

    state: ZoneState | None
    factor: float
    iterations: int

    @property
    def arrived(self) -> bool:
        """Whether `follow` found the zone burning at its own residence time."""
        return self.state is not None and self.factor == 1.0


def at_size(zone: Zone, factor: float) -> Zone:
    """Return the zone with its volume or residence time multiplied by a factor."""
    if zone.volume is not None:
        return replace(zone, volume=zone.volume * factor)
    assert zone.residence_time is not None
    return replace(zone, residence_time=zone.residence_time * factor)


def at_rate_of(zone: Zone, state: ZoneState) -> ZoneState:
    """Return a state as a start for a zone of another size."""
    return replace(state, rate=zone.throughflow_rate(zone.throughflow_volume(state)))


def equilibrium_state(zone: Zone) -> ZoneState:
    """Return every stream at the equilibrium of what it takes in.

    Parameters
    ----------
    zone : Zone

    Returns
    -------
    ZoneState
    """
    gas, masses = zone.gas, zone.gas.rates.molar_masses
    rate = _equilibrium_rate(zone)
    inlets = zone.inlets(zone.mean_moles, rate)
    enthalpies = zone.inlet_enthalpies(rate) - zone.loss_per_pass
    states = [
        gas.equilibrium(float(enthalpy), zone.pressure, moles * masses)
        for enthalpy, moles in zip(enthalpies, inlets, strict=True)
    ]
    return ZoneState(
        np.array([state.mass_fractions for state in states]) / masses,
        np.array([state.temperature for state in states]),
        rate,
    )


def follow(zone: Zone, longest: float = LONG_RESIDENCE, last_ratio: float = LAST_RATIO) -> Followed:
    """Follow the burning branch from a long residence time down to the zone's own.

    Parameters
    ----------
    zone : Zone
    longest : float
        Where to enter the branch, in wanted residence times.
    last_ratio : float
        Of residence times: how finely the end of the branch is resolved.

    Returns
    -------
    Followed
    """
    state, spent = _entered(at_size(zone, longest))
    if state is None:
        return Followed(None, longest, spent)
    followed = descend(partial(at_size, zone), state, longest, 1.0, FIRST_RATIO, last_ratio)
    return replace(followed, iterations=followed.iterations + spent)


def descend(
    zone_at: Callable[[float], Zone],
    state: ZoneState,
    start: float,
    stop: float,
    first_ratio: float,
    last_ratio: float,
) -> Followed:
    """Follow a burning state as one quantity falls, each step from the last burning state.

    Single streams may go out on the way; the zone is followed as long as its mean burns.

    Parameters
    ----------
    zone_at : callable
        The zone at a value of the falling quantity.
    state : ZoneState
        Burning, at ``start``.
    start, stop : float
        Values of the falling quantity.
    first_ratio, last_ratio : float
        Of one value to the one before: the boldest step, and the one so small that losing the
        branch on it is the end of the branch.

    Returns
    -------
    Followed
        Its factor is the last value with a burning state.
    """
    spent = 0
    value, ratio = start, first_ratio
    many = len(state.moles) > 1
    burning = count_burning(zone_at(start), state) if many else 1
    while value > stop:
        trial = max(value * ratio, stop)
        zone = zone_at(trial)
        threshold = burning_temperature(zone)
        guess = at_rate_of(zone, state)
        outcome = newton(zone, guess, STEP_ITERATIONS)
        spent += outcome.iterations
        same_branch = _same_branch(zone, state, outcome, burning)
        kept = same_branch and mean_temperature(zone, outcome.state) > threshold
        if same_branch and not kept and last_ratio <= LAST_RATIO:
            # The branch has no end: it cools without a jump, and has ceased to burn.
            return Followed(state, value, spent)
        if not kept and trial / value < last_ratio:
            ratio = (trial / value) ** 0.5
            continue
        if not kept:
            outcome = march(zone, guess, threshold)
            spent += outcome.iterations
            if not outcome.converged:
                return Followed(state, value, spent)
        state, value = outcome.state, trial
        burning = count_burning(zone, state) if many else 1
        ratio = max(ratio**1.5, first_ratio)
    return Followed(state, value, spent)


def _same_branch(zone: Zone, before: ZoneState, outcome: Outcome, burning: int) -> bool:
    """Say whether a step ended on the branch it came from: no stream went out with a jump."""
    if not (outcome.converged and outcome.stable):
        return False
    fall = float(np.max(before.temperatures - outcome.state.temperatures))
    if fall < GENTLE_FALL:
        return True
    if zone.streams == 1:
        return mean_temperature(zone, outcome.state) > burning_temperature(zone)
    return count_burning(zone, outcome.state) >= burning


def _entered(large: Zone) -> tuple[ZoneState | None, int]:
    """Return a long zone's state from equilibrium, in time if need be."""
    start = equilibrium_state(large)
    outcome = newton(large, start)
    threshold = burning_temperature(large)
    good = outcome.converged and outcome.stable and all_burn(large, outcome.state)
    if good and mean_temperature(large, outcome.state) > threshold:
        return outcome.state, outcome.iterations
    marched = march(large, start, threshold)
    spent = outcome.iterations + marched.iterations
    return (marched.state if marched.converged else None), spent


def _equilibrium_rate(zone: Zone) -> float:
    if zone.residence_time is not None:
        return 1.0 / zone.residence_time
    gas = zone.gas
    masses = zone.mean_moles * gas.rates.molar_masses
    state = gas.equilibrium(zone.exit_enthalpy, zone.pressure, masses)
    density = gas.density(state.temperature, zone.pressure, state.mass_fractions)
    return zone.throughflow_rate(1.0 / density)
