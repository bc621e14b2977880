"""The wall march: metal temperature and heat fluxes along one side of the liner."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from combustor.base.convergence import Convergence
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method, Notice
from combustor.hardware.film_decay import FAR_DECAY
from combustor.hardware.metal import LinerWall
from combustor.heat.balance import BALANCE, WallBalance, WallConditions, solve
from combustor.heat.coefficients import (
    annulus_coefficient,
    gas_emissivity,
    unfilmed_coefficient,
)
from combustor.heat.conduction import CONDUCTION, coating_resistance, sheet_resistance
from combustor.heat.convection import DUCT, FILM_CONVECTION
from combustor.heat.curtain import Curtain, curtain_of
from combustor.heat.effusion import EFFUSION, HOLE_CONVECTION, Effusion
from combustor.heat.enclosure import CASING_BALANCE, ENCLOSURE, exchange_factor_of
from combustor.heat.film import ENTRAINMENT, SLOT_FILM, SUPERPOSITION, WEAK_FILM, Regime
from combustor.heat.gas_radiation import EXCHANGE, LUMINOUS
from combustor.heat.grey_gas import GREY_GAS
from combustor.heat.grid import Grid, grid_of
from combustor.heat.join import JOIN
from combustor.heat.leckner import BROADENING
from combustor.heat.sides import AnnulusSide, Casing, Film, FloatArray, GasSide, Radiation
from combustor.heat.transport import TRANSPORT
from combustor.heat.validity import film_notices, gas_notices


@dataclass(frozen=True)
class WallPeak:
    """Hottest metal: station (m), its temperature (K, gas side, under any coating), index."""

    station: float
    temperature: float
    index: int


@dataclass(frozen=True)
class WallMarch:
    """One side of the liner along the axis.

    Temperatures in K, fluxes in W/m2 of wall, rates along the axis in W/m (whole machine).

    Parameters
    ----------
    side : str
    station, length : array
        Stations, m, and the stretch of axis each stands for, m: sums of rate x length are
        totals. Just before a slot stands one more station, so that no cell spans it.
    gas_temperature, air_temperature, adiabatic_wall_temperature : array
    temperature : array
        Metal, gas side, under any coating.
    surface_temperature, cold_side_temperature, casing_temperature : array
    film_effectiveness : array
        Of all films together.
    film_names : tuple of str
        Upstream first; rows of ``slot_effectiveness`` and ``entrainment``.
    slot_effectiveness : array
        Of each slot alone.
    entrainment : array
        Core gas each slot's film takes in, kg/s per m of axis.
    regime : tuple of str
        Regime of the nearest film upstream.
    gas_emissivity, gas_coefficient, air_coefficient : array
    radiation_in, convection_in, conduction, radiation_out, convection_out, hole_heat : array
        Fluxes: in = conduction = out, ``hole_heat`` (effusion only) counted as out.
    heat_from_gas, annulus_pick_up, casing_loss, hole_pick_up : array
        W/m; the first equals the sum of the others.
    convergence, notices, methods
    """

    side: str
    station: FloatArray
    length: FloatArray
    gas_temperature: FloatArray
    air_temperature: FloatArray
    adiabatic_wall_temperature: FloatArray
    temperature: FloatArray
    surface_temperature: FloatArray
    cold_side_temperature: FloatArray
    casing_temperature: FloatArray
    film_effectiveness: FloatArray
    film_names: tuple[str, ...]
    slot_effectiveness: FloatArray
    entrainment: FloatArray
    regime: tuple[Regime, ...]
    gas_emissivity: FloatArray
    gas_coefficient: FloatArray
    air_coefficient: FloatArray
    radiation_in: FloatArray
    convection_in: FloatArray
    conduction: FloatArray
    radiation_out: FloatArray
    convection_out: FloatArray
    hole_heat: FloatArray
    heat_from_gas: FloatArray
    annulus_pick_up: FloatArray
    casing_loss: FloatArray
    hole_pick_up: FloatArray
    residual: FloatArray
    convergence: Convergence
    notices: tuple[Notice, ...]
    methods: tuple[Method, ...]

    @property
    def peak(self) -> WallPeak:
        """The hottest metal."""
        index = int(np.argmax(self.temperature))
        return WallPeak(float(self.station[index]), float(self.temperature[index]), index)

    def total(self, rate: FloatArray) -> float:
        """Return the sum over the wall of a rate along the axis (W/m to W, kg/s/m to kg/s)."""
        return float(rate @ self.length)


def march(
    wall: LinerWall,
    gas: GasSide,
    films: Sequence[Film],
    air: AnnulusSide,
    radiation: Radiation,
    stations: int = 60,
    cans: int = 1,
    casing: Casing | None = None,
    effusion: Sequence[Effusion] = (),
) -> WallMarch:
    """March along one side of the liner and close the heat balance at every station.

    Parameters
    ----------
    wall : LinerWall
        Sheet, coating, perimeter and radiation path.
    gas, air : GasSide, AnnulusSide
        Either side of the wall.
    films : sequence of Film
        In any order. A film upstream of the first gas station acts; one beyond the last
        does not.
    radiation : Radiation
    stations : int
        At least so many over the wall.
    cans : int
        Walls of this kind in the machine: rates in W/m are for all of them.
    casing : Casing or None
        ``None``: casing at the air's temperature, no loss.
    effusion : sequence of Effusion
        Drilled patches of this wall.

    Returns
    -------
    WallMarch

    Raises
    ------
    InputError
        For inputs that are not physical.
    """
    _refuse_impossible(wall, gas, films, air, stations)
    films = sorted(films, key=lambda film: film.station)
    grid = grid_of(gas, films, air, effusion, stations)
    x = grid.station
    gas_temperature, air_temperature = gas.at("temperature", x), air.at("temperature", x)
    emissivity = gas_emissivity(gas, x, wall.beam_length, radiation)
    unfilmed = unfilmed_coefficient(gas, x, grid.recirculating)
    curtain = curtain_of(gas, films, effusion, x, unfilmed, wall, cans)
    conditions = WallConditions(
        gas_temperature=gas_temperature,
        adiabatic_wall_temperature=curtain.adiabatic_wall_temperature,
        air_temperature=air_temperature,
        gas_emissivity=emissivity,
        gas_coefficient=curtain.coefficient,
        air_coefficient=annulus_coefficient(air, x),
        film_warming=curtain.film_warming,
        hole_conductance=curtain.hole_conductance,
        wall_emissivity=wall.emissivity,
        sheet_resistance=sheet_resistance(wall),
        coating_resistance=coating_resistance(wall),
        exchange_factor=exchange_factor_of(wall),
        casing_area_ratio=wall.casing_area_ratio,
        casing=casing if casing is not None else Casing(),
    )
    balance = solve(conditions)
    notices = gas_notices(gas, air, x, wall.beam_length, radiation)
    notices += film_notices(films, curtain.blowing_ratios, effusion, float(x[-1]))
    methods = _methods(radiation, films, effusion, conditions.casing)
    return _gather(wall, cans, grid, conditions, curtain, balance, notices, methods)


def _gather(
    wall: LinerWall,
    cans: int,
    grid: Grid,
    conditions: WallConditions,
    curtain: Curtain,
    balance: WallBalance,
    notices: tuple[Notice, ...],
    methods: tuple[Method, ...],
) -> WallMarch:
    around = cans * wall.perimeter.at(grid.station)
    return WallMarch(
        side=wall.side,
        station=grid.station,
        length=grid.length,
        gas_temperature=conditions.gas_temperature,
        air_temperature=conditions.air_temperature,
        adiabatic_wall_temperature=balance.adiabatic_wall,
        temperature=balance.hot_side,
        surface_temperature=balance.surface,
        cold_side_temperature=balance.cold_side,
        casing_temperature=balance.casing,
        film_effectiveness=curtain.together,
        film_names=curtain.names,
        slot_effectiveness=curtain.effectiveness,
        entrainment=curtain.entrainment,
        regime=curtain.regime,
        gas_emissivity=conditions.gas_emissivity,
        gas_coefficient=conditions.gas_coefficient,
        air_coefficient=conditions.air_coefficient,
        radiation_in=balance.radiation_in,
        convection_in=balance.convection_in,
        conduction=balance.conduction,
        radiation_out=balance.radiation_out,
        convection_out=balance.convection_out,
        hole_heat=balance.hole_heat,
        heat_from_gas=around * (balance.radiation_in + balance.convection_in),
        annulus_pick_up=around * (balance.convection_out + balance.casing_to_air),
        casing_loss=around * balance.casing_loss,
        hole_pick_up=around * balance.hole_heat,
        residual=balance.residual,
        convergence=balance.convergence,
        notices=notices,
        methods=methods,
    )


def _methods(
    radiation: Radiation, films: Sequence[Film], effusion: Sequence[Effusion], casing: Casing
) -> tuple[Method, ...]:
    used = [BALANCE, EXCHANGE, DUCT, TRANSPORT, CONDUCTION, ENCLOSURE]
    if radiation.kind == "luminous":
        used.append(LUMINOUS)
    else:
        used += [GREY_GAS, BROADENING] if radiation.broadening else [GREY_GAS]
    if films:
        used += [SLOT_FILM, FAR_DECAY, WEAK_FILM, FILM_CONVECTION, JOIN]
        used += [SUPERPOSITION, ENTRAINMENT]
    if effusion:
        used += [EFFUSION, HOLE_CONVECTION]
    if casing.loss_coefficient is not None:
        used.append(CASING_BALANCE)
    return tuple(used)


def _refuse_impossible(
    wall: LinerWall, gas: GasSide, films: Sequence[Film], air: AnnulusSide, stations: int
) -> None:
    """Raise InputError, with every problem found, for inputs that are not physical."""
    problems = [
        *_not_positive("gas", gas, ("temperature", "mass_flow", "area", "hydraulic_diameter")),
        *_not_positive("annulus air", air, ("temperature", "area", "hydraulic_diameter")),
        *_not_positive("wall", wall, ("beam_length", "thickness", "conductivity")),
    ]
    problems += [
        problem
        for film in films
        for problem in _not_positive(
            f"film {film.name}",
            film,
            ("temperature", "density", "velocity", "slot_height", "lip_thickness"),
        )
    ]
    if gas.station[-1] <= gas.station[0]:
        problems.append(Problem("the wall has no length", "give gas stations that rise"))
    if stations < 2:
        problems.append(
            Problem("too few wall stations", "2 or more, 60 are usual", "stations", stations)
        )
    if problems:
        raise InputError(problems)


def _not_positive(owner: str, thing: object, names: Sequence[str]) -> list[Problem]:
    found = []
    for name in names:
        value = np.asarray(getattr(thing, name), dtype=float)
        worst = float(np.min(value)) if np.all(np.isfinite(value)) else float("nan")
        if not worst > 0.0:
            allowed = "must be a finite number above 0 all along the wall"
            found.append(Problem(f"{owner} cannot be marched", allowed, name, worst))
    return found
