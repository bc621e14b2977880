"""Blow-out: where the burning branch ends."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from combustor.base.method import Method
from combustor.fuel.gas import Gas, GasState
from combustor.kinetics.branch import hold
from combustor.kinetics.burning import burning_temperature, mean_temperature
from combustor.kinetics.continuation import STEP_ITERATIONS, at_rate_of, descend, follow
from combustor.kinetics.newton import newton
from combustor.kinetics.primary import PrimaryZone, distribution_of, fresh_bundle, primary_zone
from combustor.kinetics.stirred import stirred_zone
from combustor.kinetics.unmixedness import Distribution
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]

STIRRED_BLOWOUT = Method(
    key="stirred-blowout",
    quantity="residence time below which a stirred reactor cannot burn",
    source="continuation along the burning branch of a stirred reactor (Longwell and Weiss, "
    "Industrial and Engineering Chemistry 47, 1955)",
    reading="from memory",
    note="adiabatic and perfectly mixed; flames in hardware blow out at 2 to 5 times this time",
)

SHORTEST_RESIDENCE = 1e-8  # s, shorter than any flame's blow-out
LONGEST_RESIDENCE = 1.0  # s, where the branch is entered
FINEST_RESIDENCE_RATIO = 0.998
BOLDEST_FUEL_RATIO = 0.9
FINEST_FUEL_RATIO = 0.99
LEAST_FUEL_SHARE = 0.01  # of the operating fuel flow: where a search for blow-out stops
NEIGHBOUR_STEPS = 4  # from the fuel a neighbour goes out with upwards, before starting afresh
RICHEST_FUEL_RATIO = 12.0  # of the operating fuel flow: where a search for rich blow-out stops


@dataclass(frozen=True, eq=False)
class Blowout:
    """The end of a stirred reactor's burning branch.

    Parameters
    ----------
    residence_time : float
        The shortest found to burn, within 0.2 % of the end of the branch [s]
    state : GasState
        The last burning state.
    loading : float
        Mass flow per volume there [kg/(s m3)]
    iterations : int
        Newton iterations spent.
    """

    residence_time: float
    state: GasState
    loading: float
    iterations: int


def blowout_residence_time(
    gas: Gas, pressure: float, enthalpy: float, mass_fractions: Array
) -> Blowout | None:
    """Find the residence time at which a stirred reactor blows out.

    Followed along the burning branch from one second, in steps that shrink to 0.2 %, each from
    the last burning state.

    Parameters
    ----------
    gas : Gas
    pressure : float
        [Pa]
    enthalpy : float
        Of what flows in [J/kg]
    mass_fractions : ndarray
        Of what flows in [-]

    Returns
    -------
    Blowout or None
        None where the mixture does not burn even in one second.
    """
    zone = stirred_zone(gas, pressure, enthalpy, mass_fractions, SHORTEST_RESIDENCE)
    longest = LONGEST_RESIDENCE / SHORTEST_RESIDENCE
    followed = follow(zone, longest, FINEST_RESIDENCE_RATIO)
    if followed.state is None:
        return None
    residence_time = followed.factor * SHORTEST_RESIDENCE
    masses = np.maximum(followed.state.moles[0] * gas.rates.molar_masses, 0.0)
    state = GasState(float(followed.state.temperatures[0]), pressure, masses, enthalpy)
    density = gas.density(state.temperature, pressure, masses)
    return Blowout(residence_time, state, density / residence_time, followed.iterations)


@dataclass(frozen=True)
class FuelBlowout:
    """The least fuel with which a primary zone burns, air, pressure and temperatures held.

    Parameters
    ----------
    fuel_flow : float
        The least found to burn, within 1 % of blow-out unless asked otherwise [kg/s]
    reached : bool
        False where the zone still burnt with the least fuel tried, 1 % of what was given.
    iterations : int
        Newton iterations spent.
    share : float
        That fuel over what was given.
    state : ZoneState or None
        The last burning state, for a neighbouring search to start from.
    """

    fuel_flow: float
    reached: bool
    iterations: int
    share: float = 1.0
    state: ZoneState | None = None


def blowout_fuel_flow(
    gas: Gas,
    pressure: float,
    primary: PrimaryZone,
    heat_loss: float = 0.0,
    warm: ZoneState | None = None,
    boldest: float = BOLDEST_FUEL_RATIO,
    finest: float = FINEST_FUEL_RATIO,
    near: FuelBlowout | None = None,
) -> FuelBlowout | None:
    """Reduce the fuel of a burning primary zone until it blows out.

    Parameters
    ----------
    gas : Gas
    pressure : float
        [Pa]
    primary : PrimaryZone
        At its operating fuel flow.
    heat_loss : float
        At the operating fuel flow; falls with it [W]
    warm : ZoneState, optional
        Its solution, to save time.
    boldest, finest : float
        Fuel of one step over that of the step before, at the start and where the branch ends.
    near : FuelBlowout, optional
        Of a neighbouring zone: the search begins where that one ended, if this one burns there
        too, and ends within the same step of blow-out.

    Returns
    -------
    FuelBlowout or None
        None where the zone does not burn with the fuel given.
    """

    def zone_at(share: float) -> Zone:
        leaner = with_fuel(primary, share)
        fresh = fresh_bundle(gas, leaner, distribution_of(leaner))
        return primary_zone(gas, pressure, leaner, fresh, heat_loss * share)

    begun = None if near is None else _where_it_ended(zone_at, near, finest)
    if begun is not None:
        state, start, spent = begun
        boldest = finest
    else:
        operating = hold(zone_at(1.0), warm)
        if operating.status != "burning":
            return None
        state, start, spent = operating.state, 1.0, operating.iterations
    followed = descend(zone_at, state, start, LEAST_FUEL_SHARE, boldest, finest)
    return FuelBlowout(
        fuel_flow=primary.fuel.mass_flow * followed.factor,
        reached=followed.factor > LEAST_FUEL_SHARE,
        iterations=spent + followed.iterations,
        share=followed.factor,
        state=followed.state,
    )


def _where_it_ended(
    zone_at: Callable[[float], Zone], near: FuelBlowout, finest: float
) -> tuple[ZoneState, float, int] | None:
    """Return a burning state with about the fuel a neighbour goes out with; None if none is near.

    Streams that have gone out in the neighbour are taken to be out here as well.
    """
    if near.state is None or not near.reached:
        return None
    spent = 0
    for steps in range(NEIGHBOUR_STEPS):
        share = near.share / finest**steps
        if share >= 1.0:
            break
        zone = zone_at(share)
        if zone.streams != len(near.state.moles):
            break
        outcome = newton(zone, at_rate_of(zone, near.state), STEP_ITERATIONS)
        spent += outcome.iterations
        steady = outcome.converged and outcome.stable
        if steady and mean_temperature(zone, outcome.state) > burning_temperature(zone):
            return outcome.state, share, spent
    return None


def rich_blowout_fuel_flow(
    gas: Gas, pressure: float, primary: PrimaryZone, heat_loss: float = 0.0
) -> FuelBlowout | None:
    """Raise the fuel of a primary zone, taken as perfectly mixed, until it blows out.

    Parameters
    ----------
    gas, pressure, primary, heat_loss
        As for :func:`blowout_fuel_flow`.

    Returns
    -------
    FuelBlowout or None
        The most fuel found to burn, within 1 %; not ``reached`` where twelve times the
        operating fuel still burns. None where the mixed zone does not burn with the fuel given.
    """
    mixed = replace(primary, unmixedness=0.0, distribution=None)

    def zone_at(inverse: float) -> Zone:
        richer = with_fuel(mixed, 1.0 / inverse)
        fresh = fresh_bundle(gas, richer, distribution_of(richer))
        return primary_zone(gas, pressure, richer, fresh, heat_loss)

    operating = hold(zone_at(1.0), None)
    if operating.status != "burning":
        return None
    least = 1.0 / RICHEST_FUEL_RATIO
    followed = descend(zone_at, operating.state, 1.0, least, BOLDEST_FUEL_RATIO, FINEST_FUEL_RATIO)
    return FuelBlowout(
        fuel_flow=primary.fuel.mass_flow / followed.factor,
        reached=followed.factor > least,
        iterations=operating.iterations + followed.iterations,
    )


def with_fuel(primary: PrimaryZone, share: float) -> PrimaryZone:
    """Return the primary zone with its fuel multiplied by a share.

    Streams as several injectors make them each keep their air and lose the same share of fuel.
    """
    fuel = replace(primary.fuel, mass_flow=primary.fuel.mass_flow * share)
    streams = primary.distribution
    if streams is None:
        return replace(primary, fuel=fuel)
    left = 1.0 + (share - 1.0) * streams.mixture_fractions
    shares = streams.shares * left
    leaner = Distribution(streams.mixture_fractions * share / left, shares / shares.sum())
    return replace(primary, fuel=fuel, distribution=leaner)
