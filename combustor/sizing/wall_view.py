"""The wall of one operating point without films, and what slots upstream make of it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from combustor.hardware.metal import AxialProfile, Hardware, LinerWall
from combustor.heat import transport
from combustor.heat.balance import WallConditions, solve
from combustor.heat.coefficients import (
    annulus_coefficient,
    gas_emissivity,
    gas_viscosity,
    unfilmed_coefficient,
)
from combustor.heat.conduction import coating_resistance, sheet_resistance
from combustor.heat.convection import film_coefficient
from combustor.heat.enclosure import exchange_factor_of
from combustor.heat.film import slot_film
from combustor.heat.sides import Casing, GasSide, Radiation
from combustor.sizing.fire import Array
from combustor.sizing.wall_duty import WallDuty
from combustor.sizing.wall_sides import air_along, annulus_side, gas_side

GRID = 2e-3  # m from station to station


@dataclass(frozen=True)
class Jet:
    """Film air of one slot: where, how high the slot, and its mass flux at the design air flow.

    ``flux`` is per share of all air, so that every operating point scales it, 1/m2.
    """

    station: float
    height: float
    lip_thickness: float
    flux: float


@dataclass(frozen=True)
class WallView:
    """One wall at one operating point, arrays over stations.

    Parameters
    ----------
    point, side : str
    station : ndarray
        [m]
    bare : WallConditions
        Without films.
    viscosity, mass_flux : ndarray
        Of the core gas [Pa s], [kg/(s m2)]
    air_flow, air_temperature : float
        Of the machine [kg/s], [K]
    """

    point: str
    side: str
    station: Array
    bare: WallConditions
    viscosity: Array
    mass_flux: Array
    air_flow: float
    air_temperature: float

    def part(self, start: float, end: float) -> WallView:
        """Return the wall from just behind ``start`` to ``end`` [m]."""
        here = (self.station > start) & (self.station <= end + 1e-9)
        bare = self.bare
        return replace(
            self,
            station=self.station[here],
            bare=replace(
                bare,
                gas_temperature=bare.gas_temperature[here],
                adiabatic_wall_temperature=bare.adiabatic_wall_temperature[here],
                air_temperature=bare.air_temperature[here],
                gas_emissivity=bare.gas_emissivity[here],
                gas_coefficient=bare.gas_coefficient[here],
                air_coefficient=bare.air_coefficient[here],
                film_warming=bare.film_warming[here],
                hole_conductance=bare.hole_conductance[here],
            ),
            viscosity=self.viscosity[here],
        )

    def blowing_ratio(self, jet: Jet, whole: WallView) -> float:
        """Return film over core mass flux at a slot; ``whole`` is the wall with every station."""
        core = float(np.interp(jet.station, whole.station, whole.mass_flux))
        return jet.flux * self.air_flow / core


def views_of(
    metal: Hardware,
    duties: Sequence[WallDuty],
    shares: Mapping[str, float],
    primary_jet_share: float,
    radiation: Radiation,
    films: Mapping[str, AxialProfile] | None = None,
) -> tuple[WallView, ...]:
    """Return every wall at every operating point, the design point's first."""
    end = metal.liner_length
    station = np.append(np.arange(0.0, end - 0.5 * GRID, GRID), end)
    air = air_along(metal, shares, station, primary_jet_share, films)
    return tuple(
        _view(metal, wall, duty, shares, air.station, gas_side(metal, air, duty), radiation)
        for duty in duties
        for wall in metal.walls
    )


def effectiveness(view: WallView, whole: WallView, jets: Sequence[Jet]) -> Array:
    """Return the effectiveness of every slot alone along the wall, slots by stations [-]."""
    viscosity = float(transport.viscosity(view.air_temperature))
    return np.array(
        [
            slot_film(
                view.blowing_ratio(jet, whole),
                viscosity / view.viscosity,
                view.station - jet.station,
                jet.height,
                jet.lip_thickness,
            ).effectiveness
            for jet in jets
        ]
    ).reshape(len(jets), view.station.size)


def metal_temperature(view: WallView, whole: WallView, jets: Sequence[Jet]) -> Array:
    """Return the metal's gas-side temperature along the wall under films laid over each other [K].

    Parameters
    ----------
    view : WallView
        Where it is wanted.
    whole : WallView
        The same wall with all its stations, for the gas at the slots.
    jets : sequence of Jet
        Upstream first.
    """
    alone = effectiveness(view, whole, jets)
    seen = view.bare.gas_temperature.copy()
    coefficient = view.bare.gas_coefficient.copy()
    mu, k = transport.viscosity(view.air_temperature), transport.conductivity(view.air_temperature)
    for eta, jet in zip(alone, jets, strict=True):
        seen -= eta * (seen - view.air_temperature)
        behind = view.station >= jet.station
        under = film_coefficient(
            view.blowing_ratio(jet, whole),
            float(k),
            jet.flux * view.air_flow,
            float(mu),
            view.station - jet.station,
            jet.height,
            view.bare.gas_coefficient,
        )
        coefficient = np.where(behind, under, coefficient)
    filmed = replace(view.bare, adiabatic_wall_temperature=seen, gas_coefficient=coefficient)
    return solve(filmed).hot_side


def _view(
    metal: Hardware,
    wall: LinerWall,
    duty: WallDuty,
    shares: Mapping[str, float],
    x: Array,
    gas: GasSide,
    radiation: Radiation,
) -> WallView:
    air = annulus_side(metal, wall, shares, x, duty.inlet)
    bare = WallConditions(
        gas_temperature=gas.at("temperature", x),
        adiabatic_wall_temperature=gas.at("temperature", x),
        air_temperature=air.at("temperature", x),
        gas_emissivity=gas_emissivity(gas, x, wall.beam_length, radiation),
        gas_coefficient=unfilmed_coefficient(gas, x, x < metal.zones[0].end),
        air_coefficient=annulus_coefficient(air, x),
        film_warming=np.zeros_like(x),
        hole_conductance=np.zeros_like(x),
        wall_emissivity=wall.emissivity,
        sheet_resistance=sheet_resistance(wall),
        coating_resistance=coating_resistance(wall),
        exchange_factor=exchange_factor_of(wall),
        casing_area_ratio=wall.casing_area_ratio,
        casing=Casing(),
    )
    return WallView(
        point=duty.name,
        side=wall.side,
        station=x,
        bare=bare,
        viscosity=gas_viscosity(gas, x),
        mass_flux=gas.mass_flow / gas.area,
        air_flow=duty.inlet.mass_flow,
        air_temperature=duty.inlet.temperature,
    )
