"""Which steady state: the burning branch, followed from a long residence time when in doubt."""

from __future__ import annotations

from dataclasses import dataclass, replace
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
LONG_RESIDENCE = 1000.0  # times the wanted residence time, where the burning branch is entered
FIRST_RATIO = 0.1  # of residence time from one step along the branch to the next
LAST_RATIO = 0.97  # a step this small that still loses the branch is the end of it


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
    outcome = follow(zone)
    return _judged(zone, outcome, spent + outcome.iterations)


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


def zone_burns(zone: Zone, state: ZoneState) -> bool:
    """Say whether the mass-mean temperature has left the fresh inflow's far enough behind."""
    inlet, hottest = _limits(zone.gas, zone.pressure, zone.mean_moles, zone.mean_enthalpy, zone)
    return mean_temperature(zone, state) > inlet + BURNING_SHARE * (hottest - inlet)


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


def enter(zone: Zone, factor: float = LONG_RESIDENCE) -> Outcome:
    """Find the state of an enlarged zone from equilibrium, in time if need be.

    Parameters
    ----------
    zone : Zone
    factor : float
        Enlargement of its volume or residence time.

    Returns
    -------
    Outcome
    """
    large = at_size(zone, factor)
    start = equilibrium_state(large)
    outcome = newton(large, start)
    if outcome.converged and outcome.stable and burning_streams(large, outcome.state).all():
        return outcome
    marched = march(large, start)
    return replace(marched, iterations=marched.iterations + outcome.iterations)


def follow(zone: Zone) -> Outcome:
    """Follow the burning branch from a long residence time down to the zone's own.

    Parameters
    ----------
    zone : Zone

    Returns
    -------
    Outcome
        At the zone's own size: on the burning branch if it reaches that far, else what the last
        burning state turns into.
    """
    entered = enter(zone)
    spent = entered.iterations
    factor, state = LONG_RESIDENCE, entered.state
    burning = int(burning_streams(zone, state).sum()) if entered.converged else 0
    ratio = FIRST_RATIO
    while factor > 1.0 and entered.converged:
        trial = max(factor * ratio, 1.0)
        smaller = at_size(zone, trial)
        start = replace(state, rate=state.rate * factor / trial)
        outcome = newton(smaller, start, 12)
        spent += outcome.iterations
        kept = outcome.converged and outcome.stable
        kept = kept and int(burning_streams(smaller, outcome.state).sum()) >= burning
        if not kept and ratio < LAST_RATIO:
            ratio = ratio**0.5
            continue
        if not kept:
            outcome = march(smaller, start)
            spent += outcome.iterations
            if not outcome.converged:
                return replace(outcome, iterations=spent)
            burning = int(burning_streams(smaller, outcome.state).sum())
            if not zone_burns(smaller, outcome.state):
                state, factor = outcome.state, trial
                break
        state, factor = outcome.state, trial
        ratio = max(ratio**1.5, FIRST_RATIO)
    if factor == 1.0 and entered.converged:
        return Outcome(state, True, 0.0, spent, True)
    final = march(zone, replace(state, rate=state.rate * factor))
    return replace(final, iterations=spent + final.iterations)


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
        good = outcome.converged and outcome.stable
        if not (good and burning_streams(alone, outcome.state).all()):
            outcome = march(alone, own)
            spent += outcome.iterations
            if not (outcome.converged and burning_streams(alone, outcome.state).all()):
                outcome = follow(alone)
                spent += outcome.iterations
        moles[place], temperatures[place] = outcome.state.moles[0], outcome.state.temperatures[0]
    return ZoneState(moles, temperatures, start.rate), spent


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
        if zone.streams == 1 or not zone_burns(zone, outcome.state):
            return None
        for place in np.flatnonzero(~burning):
            alone = _alone(zone, outcome.state, int(place))
            best = follow(alone)
            spent += best.iterations
            if not best.converged or burning_streams(alone, best.state).all():
                return None
    return Solved(outcome.state, "burning", burning, outcome.step, spent)


def _judged(zone: Zone, outcome: Outcome, spent: int) -> Solved:
    burning = burning_streams(zone, outcome.state)
    if not outcome.converged:
        return Solved(outcome.state, "not_converged", burning, outcome.step, spent)
    status: Status = "burning" if zone_burns(zone, outcome.state) else "blown_out"
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
