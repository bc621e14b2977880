"""The fire of one operating point: the solved air split fed into the chain of reactors."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from combustor.airflow.result import AirSplit, LinerGas, OpeningFlow
from combustor.fuel.gas import Gas, GasState
from combustor.hardware.metal import AxialProfile, Hardware
from combustor.kinetics.chain import burn
from combustor.kinetics.near_wall import NO_EXCHANGE
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.record import Cell, Chain
from combustor.kinetics.streams import Stream
from combustor.rating.entry import Entry, Stretch, entry_of, primary_end, stretches_of
from combustor.rating.injectors import injectors_of, streams_of, width_of
from combustor.rating.near_wall import Beside, beside_of, core_only
from combustor.rating.operating import Operating
from combustor.rating.settings import (
    JET_VELOCITY_SHARE,
    MIXING_LENGTH_SHARE,
    Settings,
)
from combustor.sizing.exit_pattern import JET_ROLES

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Layout:
    """The chain as the metal lays it out: stretches, and where each opening's air goes."""

    stretches: tuple[Stretch, ...]
    entries: tuple[Entry, ...]
    primary_end: float
    primary_volume: float


@dataclass(frozen=True)
class Fire:
    """One pass through the chain.

    Parameters
    ----------
    chain : Chain
    exit : GasState or None
        Everything mixed in, leakage and what is left of the films included.
    fuel_flow : float
        kg/s.
    exit_flow : float
        kg/s.
    mixing : float
        Exchange rate used, 1/s.
    beside : Beside
        What passed between the core and the stream beside the wall.
    """

    chain: Chain
    exit: GasState | None
    fuel_flow: float
    exit_flow: float
    mixing: float
    beside: Beside
    vapour: tuple[float, ...] | None = None

    @property
    def primary_vapour(self) -> float:
        """Share of the fuel that is vapour in the primary zone."""
        return 1.0 if self.vapour is None else self.vapour[0]


def layout_of(hardware: Hardware, settings: Settings) -> Layout:
    """Lay the chain out along the metal."""
    stretches = stretches_of(hardware, settings)
    end = primary_end(hardware)
    entries = tuple(entry_of(o, hardware, stretches, settings) for o in hardware.openings)
    return Layout(stretches, entries, end, hardware.volume(0.0, end))


def light(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    layout: Layout,
    split: AirSplit,
    fuel_flow: float,
    settings: Settings,
    warm: Chain | None,
    heat_losses: Sequence[float] | None,
    films: Mapping[str, AxialProfile] | None = None,
    quenches: bool = True,
    vapour: Sequence[float] | None = None,
) -> Fire:
    """Burn the fuel in the air as it splits.

    Parameters
    ----------
    films : mapping of str to AxialProfile or None
        Share of each film's air still at the wall, from the wall march before.
    quenches : bool
        Core gas reacts beside the wall with the film air. Otherwise the film air mixes into
        the core at the same rate and takes in nothing: what quenching adds is the difference.
    heat_losses : sequence of float or None
        Through the wall, of the primary zone and of each stretch, W.
    vapour : sequence of float or None
        Share of a liquid fuel that evaporates in the primary zone and in each stretch.

    Returns
    -------
    Fire
    """
    pressure = chain_pressure(split)
    mixing = settings.mixing
    if mixing is None:
        mixing = mixing_rate(split, hardware.liner_height)
    inflows = [_air(operating, flow) for flow in split.openings]
    ready = fuel_flow if vapour is None else fuel_flow * vapour[0]
    primary = primary_of(operating, hardware, layout, split, ready, settings)
    late = _late_vapour(operating, fuel_flow, vapour, len(layout.stretches))
    side = [
        _joined(operating, inflows, [entry.stretches[place] for entry in layout.entries])
        for place in range(len(layout.stretches))
    ]
    core_flow = primary.fuel.mass_flow + primary.air.mass_flow
    core_flows = core_flow + np.cumsum(
        [0.0, *(a.mass_flow + f.mass_flow for a, f in zip(side[:-1], late[:-1], strict=True))]
    )
    beside = beside_of(
        hardware, layout.stretches, layout.entries, inflows, core_flows.tolist(), films
    )
    cells = [
        Cell(
            s.zone,
            s.volume,
            s.start,
            s.end,
            _present(air) + _present(fuel),
            mixing,
            beside=exchange,
        )
        for s, air, fuel, exchange in zip(
            layout.stretches, side, late, beside.exchanges, strict=True
        )
    ]
    if not quenches:
        cells = _with_film_air_mixed(operating, cells, beside)
    chain = burn(gas, pressure, primary, cells, warm, heat_losses)
    last = _joined(operating, inflows, [entry.exit for entry in layout.entries])
    mixed = None if chain.exit is None else _mixed(gas, chain, last)
    exit_flow = operating.inlet.mass_flow + fuel_flow + operating.water_flow
    shares = None if vapour is None else tuple(vapour)
    return Fire(chain, mixed, fuel_flow, exit_flow, mixing, beside, shares)


def primary_of(
    operating: Operating,
    hardware: Hardware,
    layout: Layout,
    split: AirSplit,
    fuel_flow: float,
    settings: Settings,
) -> PrimaryZone:
    """Return where fuel meets air, as the air splits."""
    inflows = [_air(operating, flow) for flow in split.openings]
    injectors = injectors_of(operating, hardware, split, layout.entries, fuel_flow, settings)
    mixture = streams_of(injectors, fuel_flow, operating.water_flow, settings.streams)
    return PrimaryZone(
        fuel=_injected(operating, fuel_flow),
        air=_joined(operating, inflows, [entry.primary for entry in layout.entries]),
        volume=layout.primary_volume,
        unmixedness=mixture.unmixedness if mixture else width_of(injectors, settings),
        recirculation=settings.recirculation,
        streams=settings.streams,
        end=layout.primary_end,
        distribution=mixture,
    )


def chain_pressure(split: AirSplit) -> float:
    """Return the mean static pressure inside the liner, Pa."""
    liner = split.liner
    length = liner.station[-1] - liner.station[0]
    return float(np.trapezoid(liner.static_pressure, liner.station) / length)


def mixing_rate(split: AirSplit, liner_height: float) -> float:
    """Return the exchange rate from jet velocity and liner height, 1/s."""
    jets = [o for o in split.openings if o.role in JET_ROLES and o.mass_flow > 0.0]
    jets = jets or [o for o in split.openings if o.mass_flow > 0.0 and o.role != "leak"]
    flow = sum(jet.mass_flow for jet in jets)
    velocity = sum(jet.mass_flow * jet.jet_velocity for jet in jets) / flow
    return JET_VELOCITY_SHARE * velocity / (MIXING_LENGTH_SHARE * liner_height)


def air_enthalpy(operating: Operating, temperature: float) -> float:
    """Return the enthalpy of inlet air warmed in the annulus, J/kg.

    With the heat capacity the air split warms it by, so that the heat is the same on both sides.
    """
    inlet = operating.inlet
    return operating.air_enthalpy + inlet.heat_capacity * (temperature - inlet.temperature)


def liner_gas_of(gas: Gas, operating: Operating, split: AirSplit, fire: Fire) -> LinerGas:
    """Return what the fire does to the gas the air split sees: all that is inside the liner.

    What is inside before the chain takes it up counts at the inlet temperature.
    """
    chain = fire.chain
    liner_end = float(split.liner.station[-1])
    inside = [s for s in chain.stations if s.end <= liner_end * (1.0 + 1e-9)]
    x = np.array([0.0, *(station.end for station in inside)])
    core = [inside[0], *inside]
    flow = np.array([station.mass_flow for station in core])
    entered = np.interp(x, split.liner.station, split.liner.mass_flow)
    apart = np.maximum(entered - flow, 0.0) / np.maximum(entered, flow)
    capacity = np.array(
        [gas.heat_capacity(s.temperature, chain_pressure(split), s.mass_fractions) for s in core]
    )
    constant = np.array([gas.gas_constant(s.mass_fractions) for s in core])
    inlet = operating.inlet
    heat = (1.0 - apart) * capacity + apart * inlet.heat_capacity
    hot = np.array([s.temperature for s in core])
    temperature = (
        (1.0 - apart) * capacity * hot + apart * inlet.heat_capacity * inlet.temperature
    ) / heat
    mean_constant = (1.0 - apart) * constant + apart * inlet.gas_constant
    return LinerGas(
        station=x,
        temperature=temperature,
        gas_constant=mean_constant,
        heat_capacity_ratio=heat / (heat - mean_constant),
        fuel_flow=fire.fuel_flow + operating.water_flow,
        fuel_station=0.0,
    )


def _injected(operating: Operating, fuel_flow: float) -> Stream:
    """Return the fuel with the water that goes in with it."""
    water = operating.water_flow / (fuel_flow + operating.water_flow)
    return Stream(
        fuel_flow + operating.water_flow,
        (1.0 - water) * operating.fuel_enthalpy + water * operating.water_enthalpy,
        (1.0 - water) * operating.fuel + water * operating.water,
    )


def _air(operating: Operating, flow: OpeningFlow) -> Stream:
    return Stream(flow.mass_flow, air_enthalpy(operating, flow.air_temperature), operating.air)


def _joined(operating: Operating, inflows: Sequence[Stream], shares: Sequence[float]) -> Stream:
    mass = sum(s.mass_flow * part for s, part in zip(inflows, shares, strict=True))
    heat = sum(s.mass_flow * s.enthalpy * part for s, part in zip(inflows, shares, strict=True))
    enthalpy = heat / mass if mass > 0.0 else operating.air_enthalpy
    return Stream(mass, enthalpy, operating.air)


def _late_vapour(
    operating: Operating, fuel_flow: float, vapour: Sequence[float] | None, stretches: int
) -> list[Stream]:
    """Return the fuel that evaporates in each stretch behind the primary zone."""
    shares = [0.0] * stretches if vapour is None else vapour[1:]
    return [Stream(fuel_flow * s, operating.fuel_enthalpy, operating.fuel) for s in shares]


def _present(air: Stream) -> tuple[Stream, ...]:
    return (air,) if air.mass_flow > 0.0 else ()


def _with_film_air_mixed(operating: Operating, cells: Sequence[Cell], beside: Beside) -> list[Cell]:
    """Return the cells with film air that mixes into the core as it leaves the wall, unreacted."""
    films = [stream for exchange in beside.exchanges for stream in exchange.air]
    mean = _joined(operating, films, [1.0] * len(films))
    return [
        replace(
            cell,
            air=cell.air + _present(replace(mean, mass_flow=mixed)),
            beside=NO_EXCHANGE,
        )
        for cell, mixed in zip(cells, core_only(beside), strict=True)
    ]


def _mixed(gas: Gas, chain: Chain, last: Stream) -> GasState:
    """Mix in what joins at the exit, without reaction."""
    assert chain.exit is not None
    state, flow = chain.exit, chain.stations[-1].mass_flow
    share = last.mass_flow / (flow + last.mass_flow)
    fractions = (1.0 - share) * state.mass_fractions + share * last.mass_fractions
    enthalpy = (1.0 - share) * state.enthalpy + share * last.enthalpy
    temperature = gas.temperature(enthalpy, state.pressure, fractions, state.temperature)
    return GasState(temperature, state.pressure, fractions, enthalpy)
