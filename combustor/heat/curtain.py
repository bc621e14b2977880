"""All cooling air along a wall together: what temperature and coefficient the wall sees."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from combustor.hardware.metal import LinerWall
from combustor.heat import transport
from combustor.heat.coefficients import gas_viscosity
from combustor.heat.convection import film_coefficient
from combustor.heat.effusion import Effusion, hole_conductance, hole_uptake, patch_film
from combustor.heat.film import (
    MIXING_CONSTANT,
    Regime,
    SlotFilm,
    entrainment_rate,
    regime_of,
    slot_film,
    superpose,
)
from combustor.heat.sides import Film, FloatArray, GasSide

_HAIR = 1e-9  # m


@dataclass(frozen=True)
class Curtain:
    """Films and drilled patches along one wall.

    Parameters
    ----------
    names : tuple of str
        Films and patches, upstream first; rows of the arrays below.
    effectiveness, entrainment : array
        Of each alone; kg/s per m.
    together : array
        Effectiveness of all.
    adiabatic_wall_temperature : array
        K, with air leaving effusion holes as cold as it entered.
    film_warming : array
        K of adiabatic wall temperature per K of metal above the air: effusion air warms.
    coefficient, hole_conductance : array
        W/m2/K.
    regime : tuple of str
    blowing_ratios : tuple of float
        One a slot film, upstream first.
    """

    names: tuple[str, ...]
    effectiveness: FloatArray
    entrainment: FloatArray
    together: FloatArray
    adiabatic_wall_temperature: FloatArray
    film_warming: FloatArray
    coefficient: FloatArray
    hole_conductance: FloatArray
    regime: tuple[Regime, ...]
    blowing_ratios: tuple[float, ...]


def blowing_ratio(film: Film, gas: GasSide) -> float:
    """Film mass flux over the gas mass flux just before the slot, its own air left out."""
    before = film.station - _HAIR
    flux = gas.at("mass_flow", before) / gas.at("area", before)
    return float(film.density * film.velocity / flux)


def curtain_of(
    gas: GasSide,
    films: Sequence[Film],
    effusion: Sequence[Effusion],
    x: FloatArray,
    unfilmed: FloatArray,
    wall: LinerWall,
    cans: int,
) -> Curtain:
    """Lay the films and patches over each other, upstream first.

    Parameters
    ----------
    gas : GasSide
    films : sequence of Film
    effusion : sequence of Effusion
    x : array
        Stations, m.
    unfilmed : array
        Gas-side coefficient without film, W/m2/K.
    wall : LinerWall
    cans : int
    """
    seen, warming = gas.at("temperature", x), np.zeros_like(x)
    coefficient, holes = unfilmed.copy(), np.zeros_like(x)
    viscosity = gas_viscosity(gas, x)
    regime = np.full(x.shape, "no film", dtype=object)
    etas, rates, ratios = [], [], []
    sources: list[Film | Effusion] = sorted([*films, *effusion], key=_start)
    for source in sources:
        behind = x >= _start(source)
        if isinstance(source, Film):
            ratio = blowing_ratio(source, gas)
            layer = _slot(source, ratio, viscosity, x)
            under = _slot_coefficient(source, ratio, x, unfilmed)
            coefficient = np.where(behind, under, coefficient)
            regime[behind] = regime_of(ratio)
            regime[behind & (layer.effectiveness >= 1.0)] = "potential core"
            ratios.append(ratio)
            uptake = 0.0
        else:
            layer = _patch(source, gas, wall, cans, x)
            uptake = hole_uptake(source, cans)
            area = cans * _wall_area(wall, source)
            inside = behind & (x < source.end)
            holes = holes + np.where(inside, hole_conductance(source, area, uptake), 0.0)
            coefficient = np.where(behind, unfilmed, coefficient)
            regime[behind] = "effusion"
        eta = layer.effectiveness
        seen = seen - eta * (seen - source.temperature)
        warming = warming * (1.0 - eta) + eta * uptake
        etas.append(eta)
        rates.append(entrainment_rate(source.mass_flow, layer))
    shape = (len(sources), x.size)
    effectiveness = np.array(etas).reshape(shape)
    return Curtain(
        names=tuple(source.name for source in sources),
        effectiveness=effectiveness,
        entrainment=np.array(rates).reshape(shape),
        together=superpose(effectiveness),
        adiabatic_wall_temperature=seen,
        film_warming=warming,
        coefficient=coefficient,
        hole_conductance=holes,
        regime=tuple(regime),
        blowing_ratios=tuple(ratios),
    )


def _start(source: Film | Effusion) -> float:
    return source.station if isinstance(source, Film) else source.start


def _slot(film: Film, ratio: float, gas_viscosity: FloatArray, x: FloatArray) -> SlotFilm:
    mu = film.viscosity if film.viscosity is not None else transport.viscosity(film.temperature)
    distance = x - film.station
    return slot_film(ratio, mu / gas_viscosity, distance, film.slot_height, film.lip_thickness)


def _slot_coefficient(film: Film, ratio: float, x: FloatArray, unfilmed: FloatArray) -> FloatArray:
    mu, k = film.viscosity, film.conductivity
    return film_coefficient(
        ratio,
        float(transport.conductivity(film.temperature)) if k is None else k,
        film.density * film.velocity,
        float(transport.viscosity(film.temperature)) if mu is None else mu,
        x - film.station,
        film.slot_height,
        unfilmed,
    )


def _patch(patch: Effusion, gas: GasSide, wall: LinerWall, cans: int, x: FloatArray) -> SlotFilm:
    around = cans * _wall_area(wall, patch) / (patch.end - patch.start)
    gas_flux = float(gas.at("mass_flow", patch.end) / gas.at("area", patch.end))
    return patch_film(patch, x, patch.mass_flow / around, gas_flux, MIXING_CONSTANT)


def _wall_area(wall: LinerWall, patch: Effusion) -> float:
    """Return the wall area of one can's patch, m2."""
    inner = [x for x in wall.perimeter.station if patch.start < x < patch.end]
    x = np.array([patch.start, *inner, patch.end])
    return float(np.trapezoid(wall.perimeter.at(x), x))
