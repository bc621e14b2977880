"""Heat balance of the wall at every station: gas, sheet, annulus, casing."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from combustor.base.convergence import Convergence
from combustor.base.method import Method
from combustor.heat.enclosure import casing_temperature
from combustor.heat.gas_radiation import STEFAN_BOLTZMANN, flux_to_wall
from combustor.heat.sides import Casing, FloatArray

BALANCE = Method(
    key="wall-balance-lefebvre-herbert",
    quantity="wall temperature",
    source="Lefebvre and Herbert 1960; Lefebvre 1984: radiation and convection in = conduction "
    "= radiation and convection out",
    reading="from memory",
    scatter="simple wall-temperature methods are good to about 6 % (Kretschmer and Odgers, "
    "ASME 1978, abstract read)",
)

_CLOSURE = 1e-9


@dataclass(frozen=True)
class WallConditions:
    """What the wall sees, arrays along the axis.

    Parameters
    ----------
    gas_temperature, adiabatic_wall_temperature, air_temperature : array
        K. The gas radiates at its bulk temperature and convects at the adiabatic wall's.
    gas_emissivity : array
    gas_coefficient, air_coefficient : array
        W/m2/K.
    film_warming : array
        K of adiabatic wall temperature per K of metal above the air (effusion), below 1.
    hole_conductance : array
        Heat taken up inside effusion holes per wall area and K above air, W/m2/K.
    wall_emissivity : float
    sheet_resistance, coating_resistance : float
        m2 K/W.
    exchange_factor, casing_area_ratio : float
    casing : Casing
    """

    gas_temperature: FloatArray
    adiabatic_wall_temperature: FloatArray
    air_temperature: FloatArray
    gas_emissivity: FloatArray
    gas_coefficient: FloatArray
    air_coefficient: FloatArray
    film_warming: FloatArray
    hole_conductance: FloatArray
    wall_emissivity: float
    sheet_resistance: float
    coating_resistance: float
    exchange_factor: float
    casing_area_ratio: float
    casing: Casing


@dataclass(frozen=True)
class WallBalance:
    """Solved wall, arrays along the axis: temperatures in K, fluxes in W/m2 of wall.

    ``surface`` faces the gas (on top of any coating), ``hot_side`` and ``cold_side`` are
    metal. ``casing_to_air`` and ``casing_loss`` are per wall area and add up to
    ``radiation_out``; ``residual`` is the closure error over the flux through the wall plus a
    thousandth of the flux the coefficients could carry.
    """

    adiabatic_wall: FloatArray
    surface: FloatArray
    hot_side: FloatArray
    cold_side: FloatArray
    casing: FloatArray
    radiation_in: FloatArray
    convection_in: FloatArray
    conduction: FloatArray
    radiation_out: FloatArray
    convection_out: FloatArray
    hole_heat: FloatArray
    casing_to_air: FloatArray
    casing_loss: FloatArray
    residual: FloatArray
    convergence: Convergence


@dataclass(frozen=True)
class _Fluxes:
    adiabatic_wall: FloatArray
    surface: FloatArray
    casing: FloatArray
    radiation_in: FloatArray
    convection_in: FloatArray
    radiation_out: FloatArray
    convection_out: FloatArray
    hole_heat: FloatArray
    slope: FloatArray

    @property
    def into(self) -> FloatArray:
        return self.radiation_in + self.convection_in

    @property
    def out(self) -> FloatArray:
        return self.radiation_out + self.convection_out + self.hole_heat


def solve(conditions: WallConditions, max_iterations: int = 60) -> WallBalance:
    """Solve the wall temperature at every station.

    Newton on the cold-side temperature, all stations together; a step that leaves the
    bracket is replaced by bisection. Flux in falls and flux out rises with it, so there is
    always exactly one root between the coldest and the hottest temperature around the wall.

    Parameters
    ----------
    conditions : WallConditions
    max_iterations : int
        Newton or bisection steps before the solve gives up; the convergence record says so.

    Returns
    -------
    WallBalance
        Closed to 1e-9 of the flux at every station when converged.
    """
    c = conditions
    around = [c.gas_temperature, c.adiabatic_wall_temperature, c.air_temperature]
    if c.casing.loss_coefficient is not None:
        around.append(np.full_like(c.air_temperature, c.casing.ambient_temperature))
    low, high = np.minimum.reduce(around), np.maximum.reduce(around)
    T = 0.5 * (c.air_temperature + c.adiabatic_wall_temperature)
    # Where hardly any heat passes, closure is judged against a thousandth of what could.
    floor = 1e-3 * (c.gas_coefficient + c.air_coefficient) * high
    iterations = 0
    fluxes = _fluxes(c, T)
    while True:
        error = fluxes.into - fluxes.out
        scale = np.abs(fluxes.into) + floor
        pending = ~(np.abs(error) <= 1e-2 * _CLOSURE * scale)
        if not pending.any() or iterations >= max_iterations:
            break
        low, high = np.where(error > 0.0, T, low), np.where(error > 0.0, high, T)
        step = T - error / fluxes.slope
        step = np.where((step >= low) & (step <= high), step, 0.5 * (low + high))
        T = np.where(pending, step, T)
        iterations += 1
        fluxes = _fluxes(c, T)
    return _result(c, T, fluxes, scale, iterations)


def _fluxes(c: WallConditions, cold_side: FloatArray) -> _Fluxes:
    casing, casing_slope = casing_temperature(
        cold_side,
        c.air_temperature,
        c.air_coefficient,
        c.exchange_factor,
        c.casing_area_ratio,
        c.casing,
    )
    black = c.exchange_factor * STEFAN_BOLTZMANN
    radiation_out = black * (cold_side**4 - casing**4)
    convection_out = c.air_coefficient * (cold_side - c.air_temperature)
    hole_heat = c.hole_conductance * (cold_side - c.air_temperature)
    out_slope = 4.0 * black * (cold_side**3 - casing**3 * casing_slope)
    out_slope = out_slope + c.air_coefficient + c.hole_conductance
    resistance = c.sheet_resistance + c.coating_resistance
    surface = cold_side + resistance * (radiation_out + convection_out + hole_heat)
    radiation_in = flux_to_wall(c.gas_temperature, surface, c.gas_emissivity, c.wall_emissivity)
    warming = c.film_warming * (cold_side - c.air_temperature)
    adiabatic_wall = c.adiabatic_wall_temperature + warming
    convection_in = c.gas_coefficient * (adiabatic_wall - surface)
    facing = 1.25 * STEFAN_BOLTZMANN * (1.0 + c.wall_emissivity) * c.gas_emissivity
    in_slope = -facing * (c.gas_temperature * surface) ** 1.5 - c.gas_coefficient
    slope = in_slope * (1.0 + resistance * out_slope) - out_slope
    slope = slope + c.gas_coefficient * c.film_warming
    return _Fluxes(
        adiabatic_wall,
        surface,
        casing,
        radiation_in,
        convection_in,
        radiation_out,
        convection_out,
        hole_heat,
        slope,
    )


def _result(
    c: WallConditions, cold_side: FloatArray, f: _Fluxes, scale: FloatArray, iterations: int
) -> WallBalance:
    residual = np.abs(f.into - f.out) / scale
    worst = float(np.max(residual))
    good = worst <= _CLOSURE
    message = "" if good else "wall heat balance does not close at every station"
    loss = np.zeros_like(cold_side)
    if c.casing.loss_coefficient is not None:
        per_wall_area = c.casing.loss_coefficient / c.casing_area_ratio
        loss = per_wall_area * (f.casing - c.casing.ambient_temperature)
    return WallBalance(
        adiabatic_wall=f.adiabatic_wall,
        surface=f.surface,
        hot_side=cold_side + c.sheet_resistance * f.out,
        cold_side=cold_side,
        casing=f.casing,
        radiation_in=f.radiation_in,
        convection_in=f.convection_in,
        conduction=f.out,
        radiation_out=f.radiation_out,
        convection_out=f.convection_out,
        hole_heat=f.hole_heat,
        casing_to_air=f.radiation_out - loss,
        casing_loss=loss,
        residual=residual,
        convergence=Convergence(good, worst, iterations, message),
    )
