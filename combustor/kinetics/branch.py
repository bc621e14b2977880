"""Which steady state: the burning branch, followed from a long residence time when in doubt."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from functools import partial
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from combustor.fuel.gas import Gas
from combustor.kinetics.newton import Outcome, march, newton
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]
Status = Literal["burning", "blown_out", "not_converged"]

BURNING_SHARE = 0.35  # of the rise from inlet to equilibrium temperature
NEGLIGIBLE_HEAT = 150.0  # K of temperature rise still to come: burnt, without asking equilibrium
NEGLIGIBLE_RISE = 50.0  # K from inlet to equilibrium: nothing to ignite
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
        Its residence time over the wanted one; 1 means that the zone burns.
    iterations : int
    """

    state: ZoneState | None
    factor: float
    iterations: int

    @property
    def arrived(self) -> bool:
        """Whether the zone burns at its own residence time."""
        return self.state is not None and self.factor == 1.0


@dataclass(frozen=True, eq=False)
class Solved:
    """A zone's steady state and how sure it is.

    Parameters
    ----------
    state : ZoneState
    status : {"burning", "blown_out", "not_converged"}
        Of the zone as a whole, by its mass-mean temperature.
    burning : ndarray of bool, shape (streams,)
        Of each stream.
    step : float
        Last Newton step, in units of the tolerance.
    iterations : int
        Newton iterations spent, all attempts together.
    """

    state: ZoneState
    status: Status
    burning: NDArray[np.bool_]
    step: float
    iterations: int


def solve(zone: Zone, guess: ZoneState | None = None) -> Solved:
    """Find the burning steady state of a zone, or make sure that it has none.

    A result is accepted when it is stable and every stream burns, or cannot burn where it is.
    Otherwise the zone is entered at a long residence time and followed down, each step from the
    last burning state; only a zone that loses the branch on the way is called blown out.

    Parameters
    ----------
    zone : Zone
    guess : ZoneState, optional
        A neighbouring solution. It saves time and does not choose the branch.

    Returns
    -------
    Solved
    """
    spent = 0
    if guess is not None:
        outcome = newton(zone, guess)
        spent += outcome.iterations
        found = _accepted(zone, outcome, spent)
        if found is not None:
            return found
    start, iterations = _started(zone)
    spent += iterations
    outcome = newton(zone, start)
    spent += outcome.iterations
    found = _accepted(zone, outcome, spent)
    if found is not None:
        return found
    followed = follow(zone)
    spent += followed.iterations
    if followed.arrived:
        assert followed.state is not None
        burning = burning_streams(zone, followed.state)
        return Solved(followed.state, "burning", burning, 0.0, spent)
    last = start if followed.state is None else followed.state
    rate = zone.throughflow_rate(zone.throughflow_volume(last))
    outcome = march(zone, replace(last, rate=rate))
    return _judged(zone, outcome, spent + outcome.iterations)


def hold(zone: Zone, guess: ZoneState | None = None) -> Solved:
    """Solve a zone that has to hold its flame against its fresh inflow.

    Like `solve`, but a zone that is steady only because there is nothing to burn in it counts
    as blown out.

    Parameters
    ----------
    zone : Zone
    guess : ZoneState, optional
        A neighbouring solution.

    Returns
    -------
    Solved
    """
    solved = solve(zone, guess)
    if solved.status != "burning":
        return solved
    masses = zone.mean_moles * zone.gas.rates.molar_masses
    temperature = mean_temperature(zone, solved.state)
    inlet = zone.gas.temperature(zone.mean_enthalpy, zone.pressure, masses)
    if temperature > inlet + NEGLIGIBLE_RISE or temperature > burning_temperature(zone):
        return solved
    return replace(solved, status="blown_out")


def equilibrium_state(zone: Zone, residence_time: float | None = None) -> ZoneState:
    """Return every stream at the equilibrium of what it takes in.

    Parameters
    ----------
    zone : Zone
    residence_time : float, optional
        Used where the zone has a volume; by default what the volume gives [s]

    Returns
    -------
    ZoneState
    """
    gas = zone.gas
    rate = 1.0 / residence_time if residence_time is not None else _equilibrium_rate(zone)
    inlets = zone.inlets(zone.mean_moles, rate)
    enthalpies = zone.inlet_enthalpies(rate) - zone.loss_per_pass
    moles = np.empty_like(inlets)
    temperatures = np.empty(zone.streams)
    for place in range(zone.streams):
        state = gas.equilibrium(
            float(enthalpies[place]), zone.pressure, inlets[place] * gas.rates.molar_masses
        )
        moles[place] = state.mass_fractions / gas.rates.molar_masses
        temperatures[place] = state.temperature
    return ZoneState(moles, temperatures, rate)


def mean_temperature(zone: Zone, state: ZoneState) -> float:
    """Return the mass-mean temperature [K]."""
    return float(zone.shares @ state.temperatures)


def burning_temperature(zone: Zone) -> float:
    """Return the mass-mean temperature above which the zone as a whole counts as burning [K].

    A mixture that could hardly warm itself has to warm by a share of the least rise that counts.
    """
    inlet, hottest = _limits(zone.gas, zone.pressure, zone.mean_moles, zone.mean_enthalpy, zone)
    return inlet + BURNING_SHARE * max(hottest - inlet, NEGLIGIBLE_RISE)


def burning_streams(zone: Zone, state: ZoneState) -> NDArray[np.bool_]:
    """Say of every stream whether it burns, against what it takes in.

    A stream whose products hold no more heat to release, or whose inflow had none, counts as
    burning: there is no hotter branch it could be on.
    """
    gas = zone.gas
    mean = zone.shares @ state.moles
    inlets = zone.inlets(mean, state.rate)
    enthalpies = zone.inlet_enthalpies(state.rate)
    verdicts = np.ones(zone.streams, dtype=bool)
    for place in range(zone.streams):
        if _rise_to_come(gas, state.moles[place]) < NEGLIGIBLE_HEAT:
            continue
        inlet, hottest = _limits(gas, zone.pressure, inlets[place], float(enthalpies[place]), zone)
        rise = hottest - inlet
        enough = inlet + BURNING_SHARE * rise
        verdicts[place] = rise < NEGLIGIBLE_RISE or bool(state.temperatures[place] > enough)
    return verdicts


def at_size(zone: Zone, factor: float) -> Zone:
    """Return the zone with its volume or residence time multiplied by a factor."""
    if zone.volume is not None:
        return replace(zone, volume=zone.volume * factor)
    assert zone.residence_time is not None
    return replace(zone, residence_time=zone.residence_time * factor)


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
    burning = _count_burning(zone_at(start), state) if len(state.moles) > 1 else 1
    while value > stop:
        trial = max(value * ratio, stop)
        zone = zone_at(trial)
        threshold = burning_temperature(zone)
        guess = replace(state, rate=zone.throughflow_rate(zone.throughflow_volume(state)))
        outcome = newton(zone, guess, STEP_ITERATIONS)
        spent += outcome.iterations
        kept = outcome.converged and outcome.stable
        kept = kept and mean_temperature(zone, outcome.state) > threshold
        if kept and zone.streams > 1:
            fall = float(np.max(state.temperatures - outcome.state.temperatures))
            kept = fall < GENTLE_FALL or _count_burning(zone, outcome.state) >= burning
        if not kept and trial / value < last_ratio:
            ratio = (trial / value) ** 0.5
            continue
        if not kept:
            outcome = march(zone, guess, threshold)
            spent += outcome.iterations
            if not outcome.converged:
                return Followed(state, value, spent)
        state, value = outcome.state, trial
        burning = _count_burning(zone, state) if zone.streams > 1 else 1
        ratio = max(ratio**1.5, first_ratio)
    return Followed(state, value, spent)


def _entered(large: Zone) -> tuple[ZoneState | None, int]:
    """Return a long zone's state from equilibrium, in time if need be."""
    start = equilibrium_state(large)
    outcome = newton(large, start)
    threshold = burning_temperature(large)
    good = outcome.converged and outcome.stable and _all_burn(large, outcome.state)
    if good and mean_temperature(large, outcome.state) > threshold:
        return outcome.state, outcome.iterations
    marched = march(large, start, threshold)
    spent = outcome.iterations + marched.iterations
    return (marched.state if marched.converged else None), spent


def _count_burning(zone: Zone, state: ZoneState) -> int:
    return int(np.count_nonzero(burning_streams(zone, state)))


def _started(zone: Zone) -> tuple[ZoneState, int]:
    """Return each stream burning by itself amid the equilibrium of all, as a start for all."""
    start = equilibrium_state(zone)
    if zone.streams == 1:
        return start, 0
    spent = 0
    moles, temperatures = start.moles.copy(), start.temperatures.copy()
    for place in range(zone.streams):
        alone = _alone(zone, start, place)
        own = ZoneState(moles[place : place + 1], temperatures[place : place + 1], start.rate)
        outcome = newton(alone, own)
        spent += outcome.iterations
        found = outcome.state
        if not (outcome.converged and outcome.stable and _all_burn(alone, found)):
            outcome = march(alone, own)
            spent += outcome.iterations
            found = outcome.state
            if not (outcome.converged and _all_burn(alone, found)):
                followed = follow(alone)
                spent += followed.iterations
                if followed.arrived:
                    assert followed.state is not None
                    found = followed.state
        moles[place], temperatures[place] = found.moles[0], found.temperatures[0]
    return ZoneState(moles, temperatures, start.rate), spent


def _all_burn(zone: Zone, state: ZoneState) -> bool:
    return bool(burning_streams(zone, state).all())


def _alone(zone: Zone, state: ZoneState, place: int) -> Zone:
    """Return one stream as a zone of its own, its mean products and residence time held."""
    inlets = zone.inlets(zone.shares @ state.moles, state.rate)
    enthalpies = zone.inlet_enthalpies(state.rate)
    flow = zone.flows[place : place + 1]
    return Zone(
        gas=zone.gas,
        pressure=zone.pressure,
        flows=flow,
        moles=inlets[place : place + 1],
        enthalpies=enthalpies[place : place + 1],
        residence_time=1.0 / state.rate,
        heat_loss=zone.loss_per_pass * float(flow[0]),
    )


def _accepted(zone: Zone, outcome: Outcome, spent: int) -> Solved | None:
    """Return the result if it is beyond doubt the burning state."""
    if not (outcome.converged and outcome.stable):
        return None
    burning = burning_streams(zone, outcome.state)
    if not burning.all():
        if zone.streams == 1:
            return None
        if mean_temperature(zone, outcome.state) <= burning_temperature(zone):
            return None
        for place in np.flatnonzero(~burning):
            alone = _alone(zone, outcome.state, int(place))
            followed = follow(alone)
            spent += followed.iterations
            if followed.arrived:
                return None
    return Solved(outcome.state, "burning", burning, outcome.step, spent)


def _judged(zone: Zone, outcome: Outcome, spent: int) -> Solved:
    burning = burning_streams(zone, outcome.state)
    if not outcome.converged:
        return Solved(outcome.state, "not_converged", burning, outcome.step, spent)
    burns = mean_temperature(zone, outcome.state) > burning_temperature(zone)
    status: Status = "burning" if burns else "blown_out"
    return Solved(outcome.state, status, burning, outcome.step, spent)


def _equilibrium_rate(zone: Zone) -> float:
    if zone.residence_time is not None:
        return 1.0 / zone.residence_time
    gas = zone.gas
    masses = zone.mean_moles * gas.rates.molar_masses
    state = gas.equilibrium(zone.exit_enthalpy, zone.pressure, masses)
    density = gas.density(state.temperature, zone.pressure, state.mass_fractions)
    return zone.throughflow_rate(1.0 / density)


def _limits(
    gas: Gas, pressure: float, moles: Array, enthalpy: float, zone: Zone
) -> tuple[float, float]:
    """Return temperature as it comes in and at equilibrium after the zone's heat loss."""
    masses = moles * gas.rates.molar_masses
    inlet = gas.temperature(enthalpy, pressure, masses)
    hottest = gas.equilibrium(enthalpy - zone.loss_per_pass, pressure, masses)
    return inlet, hottest.temperature


def _rise_to_come(gas: Gas, moles: Array) -> float:
    """Return the temperature rise of complete combustion of what is left, at most [K]."""
    demand = gas.oxygen_demands * moles
    needed = float(demand[gas.oxygen_demands > 0.0].sum())
    if needed <= 0.0:
        return 0.0
    free = max(float(moles[gas.index("O2")]), 0.0)
    heat = float((gas.combustion_heats * moles)[gas.oxygen_demands > 0.0].sum()) * 1000.0
    return heat * min(1.0, free / needed) / LEAST_HEAT_CAPACITY


LEAST_HEAT_CAPACITY = 1100.0  # J/(kg K), below that of any hot combustion gas but the rarest
