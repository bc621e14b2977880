"""Which steady state: the burning one wherever it exists, whatever the start."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import partial
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from combustor.kinetics.burning import (
    NEGLIGIBLE_RISE,
    all_burn,
    burning_streams,
    burning_temperature,
    inlet_temperature,
    mean_temperature,
    zone_burns,
)
from combustor.kinetics.continuation import at_rate_of, equilibrium_state, follow
from combustor.kinetics.newton import Outcome, march, newton
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]
Status = Literal["burning", "blown_out", "not_converged"]

# A stream found out, its branch ending at least this many times above its residence time, is not
# followed again from a guess this near.
CLEAR_MARGIN = 1.5
NEAR_TEMPERATURE = 20.0  # K
NEAR_SHARE = 0.05  # of composition and of residence time


@dataclass(frozen=True, eq=False)
class Solved:
    """A zone's steady state and how sure it is.

    Parameters
    ----------
    state : ZoneState
    status : {"burning", "blown_out", "not_converged"}
        Of the zone as a whole; a zone that need not hold a flame burns whenever it is steady.
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


def solve(zone: Zone, guess: ZoneState | None = None, holds_flame: bool = False) -> Solved:
    """Find the burning steady state of a zone, or make sure that it has none.

    A result is accepted when it is stable and every stream burns, or was followed from a long
    residence time and cannot burn where it is. Otherwise the whole zone is entered at a long
    residence time and followed down, each step from the last burning state; only a zone that
    loses the branch on the way is called blown out.

    Parameters
    ----------
    zone : Zone
    guess : ZoneState, optional
        A neighbouring solution, or the state of what flows in.
    holds_flame : bool
        The zone is fed with fresh gas and must keep its mean temperature above inlet + 0.35
        (equilibrium - inlet). A zone fed with burnt gas need not.

    Returns
    -------
    Solved
    """
    spent = 0
    if guess is not None:
        outcome = newton(zone, guess)
        spent += outcome.iterations
        found = _accepted(zone, outcome, spent, guess, holds_flame)
        if found is not None:
            return found
    start, iterations = _started(zone)
    spent += iterations
    coldest = burning_temperature(zone) if holds_flame else 0.0
    for attempt in (newton, partial(march, coldest=coldest)):
        outcome = attempt(zone, start)
        spent += outcome.iterations
        found = _accepted(zone, outcome, spent, guess, holds_flame)
        if found is not None:
            return found
    return _followed(zone, start, spent, holds_flame)


def hold(zone: Zone, guess: ZoneState | None = None) -> Solved:
    """Solve a zone that has to hold its flame against its fresh inflow; see `solve`."""
    return solve(zone, guess, holds_flame=True)


def _followed(zone: Zone, start: ZoneState, spent: int, holds_flame: bool) -> Solved:
    """Follow the whole zone down from a long residence time and judge what it comes to."""
    followed = follow(zone)
    spent += followed.iterations
    if followed.arrived:
        assert followed.state is not None
        burning = burning_streams(zone, followed.state)
        return Solved(followed.state, "burning", burning, 0.0, spent)
    last = start if followed.state is None else followed.state
    outcome = march(zone, at_rate_of(zone, last))
    burning = burning_streams(zone, outcome.state)
    status: Status = "not_converged"
    if outcome.converged:
        out = holds_flame and not zone_burns(zone, outcome.state)
        status = "blown_out" if out else "burning"
    return Solved(outcome.state, status, burning, outcome.step, spent + outcome.iterations)


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
        steady = outcome.converged and outcome.stable
        if not (steady and all_burn(alone, found)):
            followed = follow(alone)
            spent += followed.iterations
            if followed.arrived:
                assert followed.state is not None
                found = followed.state
            elif not steady:
                outcome = march(alone, own)
                spent += outcome.iterations
                found = outcome.state
        moles[place], temperatures[place] = found.moles[0], found.temperatures[0]
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


def _accepted(
    zone: Zone, outcome: Outcome, spent: int, guess: ZoneState | None, holds_flame: bool
) -> Solved | None:
    """Return the result if it is beyond doubt the burning state."""
    if not (outcome.converged and outcome.stable):
        return None
    state = outcome.state
    burning = burning_streams(zone, state)
    if holds_flame and not _holds(zone, state, burning):
        return None
    margins = np.zeros(zone.streams)
    for place in np.flatnonzero(~burning):
        margin = _carried_margin(state, guess, int(place))
        if margin == 0.0:
            followed = follow(_alone(zone, state, int(place)))
            spent += followed.iterations
            if followed.arrived:
                return None
            margin = followed.factor
        margins[place] = margin
    if not burning.all():
        state = replace(state, margins=margins)
    return Solved(state, "burning", burning, outcome.step, spent)


def _holds(zone: Zone, state: ZoneState, burning: NDArray[np.bool_]) -> bool:
    """Say whether the zone as a whole burns, asking for its equilibrium only when in doubt."""
    rise = mean_temperature(zone, state) - inlet_temperature(zone)
    if bool(burning.all()) and rise > NEGLIGIBLE_RISE:
        return True
    return zone_burns(zone, state)


def _carried_margin(state: ZoneState, guess: ZoneState | None, place: int) -> float:
    """Return what a near guess knew of an extinguished stream, zero where it must be asked anew."""
    if guess is None or guess.margins is None:
        return 0.0
    margin = float(guess.margins[place])
    warmer = abs(float(state.temperatures[place] - guess.temperatures[place]))
    moles, known = state.moles[place], guess.moles[place]
    other = float(np.abs(moles - known).sum() / known.sum())
    faster = abs(state.rate / guess.rate - 1.0)
    near = warmer < NEAR_TEMPERATURE and other < NEAR_SHARE and faster < NEAR_SHARE
    return margin if near and margin >= CLEAR_MARGIN else 0.0
