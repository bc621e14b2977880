"""One operating point: air split, fire and wall solved in turn until they agree."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from combustor.airflow.result import AirSplit, LinerGas
from combustor.airflow.split import split
from combustor.base.convergence import Convergence
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.hardware.metal import AxialProfile, Hardware
from combustor.heat.wall import WallMarch
from combustor.kinetics.chain import Chain
from combustor.kinetics.extinction import FuelBlowout
from combustor.rating.fire import Fire, layout_of, light, liner_gas_of
from combustor.rating.fuel_demand import FuelDemand
from combustor.rating.near_wall import film_shares
from combustor.rating.operating import Operating
from combustor.rating.settings import Settings
from combustor.rating.spray import SETTLED, Evaporation, evaporation_of
from combustor.rating.walls import annulus_heat_of, heat_losses_of, walls_of
from combustor.sizing.profile import liner_profile

# Streams to try, over the number wanted, where an exit temperature falls between two states.
FINER_STREAMS = (1.25, 1.5, 1.8, 2.2, 2.7)
STATED_FUEL = "state fuel_flow instead of exit_temperature for this point"


@dataclass(frozen=True)
class Coupled:
    """What split, fire and wall agreed on.

    Parameters
    ----------
    split : AirSplit
    fire : Fire
        Fed by ``split``; blown out, it has no exit.
    walls : tuple of WallMarch
        Beside ``fire``; empty when blown out.
    convergence : Convergence
        Residual: the largest change of an opening's flow over the inlet air between the last
        two passes.
    fuel_correction : float
        Fuel flow over that of complete combustion to the exit temperature.
    blowout : FuelBlowout or None
        The search for lean blow-out, where one was made.
    between : bool
        No state has the exit temperature asked for: it jumps across it where one stream of the
        primary zone goes out.
    streams : int or None
        Number used where it is not the one in the settings.
    evaporation : Evaporation or None
        Of a liquid fuel's spray.
    """

    split: AirSplit
    fire: Fire
    walls: tuple[WallMarch, ...]
    convergence: Convergence
    fuel_correction: float = 1.0
    blowout: FuelBlowout | None = None
    between: bool = False
    streams: int | None = None
    evaporation: Evaporation | None = None

    def settings(self, wanted: Settings) -> Settings:
        """Return the settings this was solved with where ``wanted`` was asked for."""
        return wanted if self.streams is None else replace(wanted, streams=self.streams)


def couple(
    gas: Gas,
    fuel: Fuel,
    operating: Operating,
    hardware: Hardware,
    settings: Settings,
    near: Coupled | None = None,
) -> Coupled:
    """Solve one operating point.

    They agree when, from one pass to the next, no opening's flow changes by more than
    ``settings.tolerance`` of the inlet air, the exit temperature by more than
    ``settings.temperature_tolerance``, nor the heat through the wall by more than a
    millionth of the fuel's heat; where an exit temperature is asked for, it is met within
    the same temperature tolerance. In partial blow-out the exit temperature jumps by some
    kelvin where a stream goes out; one that falls into such a jump is met with more streams,
    whose jumps lie elsewhere, and the convergence record says so.

    Parameters
    ----------
    near : Coupled, optional
        A burning neighbour with the same openings. It saves time only: the answer is the same
        within those tolerances.
    """
    solved = _agreed(gas, fuel, operating, hardware, settings, near)
    if not solved.between or len(solved.fire.chain.distribution.shares) == 1:
        return solved
    for factor in FINER_STREAMS:
        streams = round(factor * settings.streams)
        finer = _agreed(gas, fuel, operating, hardware, replace(settings, streams=streams))
        if finer.convergence.converged:
            note = (
                f"exit temperature met with {streams} streams; with {settings.streams} it falls "
                "into the jump where one goes out"
            )
            noted = replace(finer.convergence, message=note)
            return replace(finer, convergence=noted, streams=streams)
    return solved


def _agreed(
    gas: Gas,
    fuel: Fuel,
    operating: Operating,
    hardware: Hardware,
    settings: Settings,
    near: Coupled | None = None,
) -> Coupled:
    """Solve with a given number of streams."""
    layout = layout_of(hardware, settings)
    fuel_flow = operating.fuel_flow
    wanted = operating.exit_temperature
    demand = None if wanted is None else FuelDemand(wanted)
    warm: Chain | None = None
    losses: list[float] | None = None
    walls: tuple[WallMarch, ...] = ()
    films: dict[str, AxialProfile] | None = None
    if near is not None and near.fire.exit is not None:
        hot = liner_gas_of(gas, operating, near.split, near.fire)
        solved = split(
            hardware, operating.inlet, hot, annulus_heat_of(near.walls), guess=near.split
        )
        # the neighbour's fire beside this machine's own air: films and heat start close
        walls = walls_of(gas, operating, hardware, solved, near.fire, fuel, settings)
        warm, losses = near.fire.chain, heat_losses_of(near.fire, walls)
        films = film_shares(walls)
        if wanted is not None:
            fuel_flow *= near.fuel_correction
    else:
        cold = split(hardware, operating.inlet)
        hot = _first_fire(operating, hardware, cold, settings)
        solved = split(hardware, operating.inlet, hot, guess=cold)
    spray: Evaporation | None = None
    if near is not None and near.evaporation is not None:
        spray = near.evaporation
    previous: Fire | None = None
    may_have_come_from_afar = near is not None or demand is not None
    message = ""
    change = np.inf
    for passes in range(1, settings.passes + 1):
        if not solved.convergence.converged:
            message = f"air split: {solved.convergence.message}"
            break
        fire = light(
            gas,
            operating,
            hardware,
            layout,
            solved,
            fuel_flow,
            settings,
            warm,
            losses,
            films,
            vapour=None if spray is None else spray.shares,
        )
        if fire.chain.status == "blown_out":
            out = Convergence(True, 0.0, passes)
            return Coupled(solved, fire, (), out, evaporation=spray)
        if fire.exit is None:
            message = f"chain of reactors: {fire.chain.convergence.message}"
            break
        walls = walls_of(gas, operating, hardware, solved, fire, fuel, settings)
        if not all(wall.convergence.converged for wall in walls):
            message = "wall: a heat balance did not close"
            break
        times = [station.residence_time for station in fire.chain.stations]
        new_spray = evaporation_of(operating, solved, hardware, fuel, fuel_flow, times)
        spray_settled = new_spray is None or new_spray.moved(spray) < SETTLED
        new_losses, films = heat_losses_of(fire, walls), film_shares(walls)
        following = split(
            hardware,
            operating.inlet,
            liner_gas_of(gas, operating, solved, fire),
            annulus_heat_of(walls),
            guess=solved,
        )
        change = _change(solved, following)
        next_fuel = _next_fuel_flow(demand, operating, gas, fire)
        if (
            losses is not None
            and previous is not None
            and previous.exit is not None
            and change < settings.tolerance
            and abs(fire.exit.temperature - previous.exit.temperature)
            < settings.temperature_tolerance
            and _films_moved(previous, fire) < settings.tolerance * operating.inlet.mass_flow
            and _heat_moved(losses, new_losses) < 1e-6 * fuel_flow * operating.lower_heating_value
            and spray_settled
            and _temperature_met(operating, fire, settings)
        ):
            if may_have_come_from_afar and not fire.chain.stations[0].burning.all():
                # streams that are out may only be out because those of the start were: ask
                # again from the fire without wall losses, where any that can burn does
                vapour = None if spray is None else spray.shares
                hottest = light(
                    gas,
                    operating,
                    hardware,
                    layout,
                    solved,
                    fuel_flow,
                    settings,
                    None,
                    None,
                    films,
                    vapour=vapour,
                )
                previous, warm, may_have_come_from_afar = fire, hottest.chain, False
                continue
            correction = fire.fuel_flow / operating.fuel_flow
            done = Convergence(True, change, passes)
            return Coupled(solved, fire, walls, done, correction, evaporation=spray)
        if demand is not None and demand.falls_into_a_jump:
            break
        previous, warm, losses, solved, fuel_flow, spray = (
            fire,
            fire.chain,
            new_losses,
            following,
            next_fuel,
            new_spray,
        )
    between = demand is not None and demand.falls_into_a_jump
    if between:
        assert wanted is not None
        message = f"no state has {wanted:.0f} K at the exit, it jumps across; {STATED_FUEL}"
    message = message or f"split, fire and wall still moved after {settings.passes} passes"
    end = Convergence(False, float(change), passes, message)
    return Coupled(solved, fire, walls, end, between=between)


def _first_fire(
    operating: Operating, hardware: Hardware, cold: AirSplit, settings: Settings
) -> LinerGas:
    total = cold.flow()
    shares = {flow.name: flow.mass_flow / total for flow in cold.openings}
    overall = operating.equivalence_ratio(operating.fuel_flow)
    profile = liner_profile(
        hardware, shares, overall, operating.products, settings.primary_jet_share
    )
    return profile.liner_gas(operating.fuel_flow)


def _change(before: AirSplit, after: AirSplit) -> float:
    total = before.flow()
    return max(
        abs(a.mass_flow - b.mass_flow) / total
        for a, b in zip(before.openings, after.openings, strict=True)
    )


def _films_moved(before: Fire, after: Fire) -> float:
    """Return the largest change of film air still unmixed anywhere along the liner, kg/s."""
    moved = np.subtract(before.beside.film_left, after.beside.film_left)
    return float(np.max(np.abs(moved), initial=0.0))


def _heat_moved(before: list[float], after: list[float]) -> float:
    return float(np.abs(np.subtract(before, after)).sum())


def _temperature_met(operating: Operating, fire: Fire, settings: Settings) -> bool:
    if operating.exit_temperature is None:
        return True
    assert fire.exit is not None
    miss = abs(fire.exit.temperature - operating.exit_temperature)
    return miss < settings.temperature_tolerance


def _next_fuel_flow(demand: FuelDemand | None, operating: Operating, gas: Gas, fire: Fire) -> float:
    """Return the fuel flow that closes the gap to the exit temperature asked for."""
    if demand is None:
        return fire.fuel_flow
    assert fire.exit is not None
    state = fire.exit
    capacity = gas.heat_capacity(state.temperature, state.pressure, state.mass_fractions)
    released = operating.lower_heating_value - capacity * demand.target
    slope = released / (fire.exit_flow * capacity)
    return demand.next_flow(fire.fuel_flow, state.temperature, slope)
