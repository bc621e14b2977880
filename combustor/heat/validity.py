"""Notices of the wall march: the worst use of each method outside its range."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from combustor.base.method import Method, Notice
from combustor.hardware.film_decay import FAR_DECAY, FAR_START
from combustor.heat.convection import FILM_CONVECTION
from combustor.heat.effusion import EFFUSION, Effusion
from combustor.heat.film import SLOT_FILM, WEAK_FILM
from combustor.heat.grey_gas import ATMOSPHERE, GREY_GAS, pressure_path
from combustor.heat.leckner import BROADENING
from combustor.heat.sides import AnnulusSide, Film, FloatArray, GasSide, Radiation
from combustor.heat.transport import TRANSPORT


def gas_notices(
    gas: GasSide, air: AnnulusSide, x: FloatArray, beam_length: float, radiation: Radiation
) -> tuple[Notice, ...]:
    """Return notices on gas radiation and transport properties."""
    temperature, x_h2o, x_co2 = gas.at("temperature", x), gas.at("x_h2o", x), gas.at("x_co2", x)
    found: list[Notice] = []
    if radiation.kind == "grey-gas":
        path = pressure_path(gas.at("pressure", x), x_h2o, x_co2, beam_length)
        found += _worst(GREY_GAS, "temperature", temperature, x)
        found += _worst(GREY_GAS, "pressure_path", path, x)
        found += _worst(GREY_GAS, "p_h2o", _pure_water_pressure(gas, x), x)
        if radiation.broadening:
            found += _worst(BROADENING, "temperature", temperature, x)
    if gas.viscosity is None or gas.conductivity is None:
        found += _worst(TRANSPORT, "temperature", temperature, x)
        found += _worst(TRANSPORT, "x_h2o", x_h2o, x)
        found += _worst(TRANSPORT, "x_co2", x_co2, x)
    if air.viscosity is None or air.conductivity is None:
        found += _worst(TRANSPORT, "temperature", air.at("temperature", x), x, "annulus ")
    return tuple(found)


def film_notices(
    films: Sequence[Film],
    blowing_ratios: Sequence[float],
    effusion: Sequence[Effusion],
    end: float,
) -> tuple[Notice, ...]:
    """Return notices on films reaching to ``end`` (m) and on drilled patches."""
    found: list[Notice] = []
    attached = [
        (ratio, film) for ratio, film in zip(blowing_ratios, films, strict=True) if ratio >= 0.5
    ]
    weak = [(ratio, film) for ratio, film in zip(blowing_ratios, films, strict=True) if ratio < 0.5]
    found += _worst_film(SLOT_FILM, "blowing_ratio", attached)
    found += _worst_film(FILM_CONVECTION, "blowing_ratio", attached)
    found += _worst_film(WEAK_FILM, "blowing_ratio", weak)
    lips = [(film.lip_thickness / film.slot_height, film) for _, film in attached]
    found += _worst_film(SLOT_FILM, "lip_ratio", lips)
    reach = [((end - film.station) / film.slot_height, film) for _, film in attached]
    far = [pair for pair in reach if pair[0] > FAR_START]
    found += _worst_film(FAR_DECAY, "slot_heights", far)
    for patch in effusion:
        found += EFFUSION.notices(where=patch.name, row_effectiveness=patch.row_effectiveness)
    return tuple(found)


def _pure_water_pressure(gas: GasSide, x: FloatArray) -> FloatArray:
    """Water partial pressure, atm, where the tables for pure water decide; else 0."""
    x_h2o, x_co2 = gas.at("x_h2o", x), gas.at("x_co2", x)
    return np.where(x_h2o > 3.0 * x_co2, gas.at("pressure", x) * x_h2o / ATMOSPHERE, 0.0)


def _excess(method: Method, quantity: str, value: FloatArray) -> FloatArray:
    low, high = method.validity[quantity]
    return np.maximum(low - value, value - high)


def _worst(
    method: Method, quantity: str, value: FloatArray, x: FloatArray, prefix: str = ""
) -> tuple[Notice, ...]:
    index = int(np.argmax(_excess(method, quantity, value)))
    where = f"{prefix}x = {1000.0 * x[index]:.0f} mm"
    return method.notices(where=where, **{quantity: float(value[index])})


def _worst_film(
    method: Method, quantity: str, values: Sequence[tuple[float, Film]]
) -> tuple[Notice, ...]:
    if not values:
        return ()
    index = int(np.argmax(_excess(method, quantity, np.array([value for value, _ in values]))))
    value, film = values[index]
    return method.notices(where=f"film {film.name}", **{quantity: value})
