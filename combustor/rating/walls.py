"""The wall beside the fire: both sides handed to the wall march, its heat handed back."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from combustor.airflow.result import AirSplit, AnnulusHeat
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.hardware.metal import Hardware, LinerWall
from combustor.heat.sides import AnnulusSide, Casing, Film, GasSide
from combustor.heat.wall import WallMarch, march
from combustor.rating.fire import Fire, chain_pressure
from combustor.rating.operating import Operating
from combustor.rating.settings import Settings
from combustor.sizing.wall_duty import radiation_of


def walls_of(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    split: AirSplit,
    fire: Fire,
    fuel: Fuel,
    settings: Settings,
) -> tuple[WallMarch, ...]:
    """March along every side of the liner."""
    hot = gas_side_of(gas, operating, hardware, split, fire)
    return tuple(
        march(
            wall,
            hot,
            films_of(hardware, split, wall),
            annulus_side_of(hardware, split, wall),
            radiation_of(fuel),
            settings.wall_stations,
            hardware.cans,
            Casing(settings.casing_loss_coefficient),
        )
        for wall in hardware.walls
    )


def gas_side_of(
    gas: Gas, operating: Operating, hardware: Hardware, split: AirSplit, fire: Fire
) -> GasSide:
    """Return the core gas along the liner; uniform in the primary zone."""
    end = hardware.liner_length
    inside = [s for s in fire.chain.stations if s.end <= end * (1.0 + 1e-9)]
    x = np.array([0.0, *(s.end for s in inside)])
    core = [inside[0], *inside]
    # what is beside the wall flows at the core's velocity but not at its density
    flow = np.array([s.mass_flow * s.core.density / s.density for s in core])
    left = np.array([0.0, 0.0, *fire.beside.film_left])[: len(core)]
    air = np.array([s.mass_flow for s in core]) - left - fire.fuel_flow - operating.water_flow
    moles = [gas.mole_fractions(s.core.mass_fractions) for s in core]
    carbon_dioxide = gas.index("CO2") if gas.has("CO2") else None
    return GasSide(
        station=x,
        temperature=np.array([s.core.temperature for s in core]),
        mass_flow=flow,
        area=hardware.liner.area.at(x) * hardware.cans,
        hydraulic_diameter=hardware.liner.hydraulic_diameter.at(x),
        fuel_air_ratio=fire.fuel_flow * (1.0 + operating.humidity) / air,
        pressure=chain_pressure(split),
        x_h2o=np.array([m[gas.index("H2O")] for m in moles]),
        x_co2=np.array([0.0 if carbon_dioxide is None else m[carbon_dioxide] for m in moles]),
        recirculation_end=inside[0].end,
    )


def annulus_side_of(hardware: Hardware, split: AirSplit, wall: LinerWall) -> AnnulusSide:
    """Return the air behind one wall."""
    passage = next(a for a in hardware.annuli if a.side == wall.side)
    air = next(a for a in split.annuli if a.side == wall.side)
    return AnnulusSide(
        station=air.station,
        mass_flow=air.mass_flow,
        temperature=air.temperature,
        area=passage.area.at(air.station) * hardware.cans,
        hydraulic_diameter=passage.hydraulic_diameter.at(air.station),
    )


def films_of(hardware: Hardware, split: AirSplit, wall: LinerWall) -> tuple[Film, ...]:
    """Return the films that leave slots of one wall and flow."""
    films = []
    for opening, flow in zip(hardware.openings, split.openings, strict=True):
        if opening.slot is None or opening.side != wall.side or flow.mass_flow <= 0.0:
            continue
        films.append(
            Film.from_slot(
                opening.name,
                opening.station,
                flow.mass_flow,
                flow.air_temperature,
                flow.jet_density,
                opening.slot.height,
                opening.slot.lip_thickness,
                opening.slot.length,
                hardware.cans,
            )
        )
    return tuple(films)


def annulus_heat_of(walls: Sequence[WallMarch]) -> tuple[AnnulusHeat, ...]:
    """Return the heat each annulus takes up."""
    return tuple(
        AnnulusHeat("inner" if w.side == "inner" else "outer", w.station, w.annulus_pick_up)
        for w in walls
    )


def heat_losses_of(fire: Fire, walls: Sequence[WallMarch]) -> list[float]:
    """Return the heat the core gives to the walls, cell by cell of the chain, W."""
    ends = fire.chain.x
    losses = np.zeros(len(ends))
    for wall in walls:
        place = np.minimum(np.searchsorted(ends, wall.station - 1e-12), len(ends) - 1)
        np.add.at(losses, place, wall.heat_from_gas * wall.length)
    return [float(loss) for loss in losses]


def casing_loss_of(walls: Sequence[WallMarch]) -> float:
    """Return the heat the casing loses to its surroundings, W."""
    return sum(wall.total(wall.casing_loss) for wall in walls)
