"""The injector across fuels: its area from the baseline, then pressure ratio or area on each."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.base.errors import InputError
from combustor.base.method import Method
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.operability import injector
from combustor.operability.injector import Vapour
from combustor.rating.record import PointRating
from combustor.studies.switch_record import InjectorUse

DEFAULT_RATIO = Method(
    key="injector-pressure-ratio-default",
    quantity="pressure ratio of a gas injector at the design point",
    source="gas injectors of industrial turbines: 1.1 to 1.5 at full load; 1.3 taken",
    reading="judgement",
)
DEFAULT_PRESSURE_RATIO = 1.3


@dataclass(frozen=True)
class Nozzle:
    """The present injector: effective area [m2], fuel temperature [K]; area None for a liquid."""

    area: float | None
    temperature: float


def vapour_of(gas: Gas, fuel: Fuel, temperature: float, pressure: float) -> Vapour:
    """Return a gaseous fuel as the injector sees it."""
    masses = gas.fuel(fuel)
    return Vapour(
        temperature,
        gas.gas_constant(masses),
        gas.heat_capacity_ratio(temperature, pressure, masses),
    )


def nozzle_of(gas: Gas, fuel: Fuel, rated: PointRating, ratio: float, temperature: float) -> Nozzle:
    """Return the injector that passes the baseline's fuel at the ratio given."""
    if fuel.phase == "liquid" or rated.fuel_flow is None:
        return Nozzle(None, temperature)
    pressure = liner_pressure(rated)
    vapour = vapour_of(gas, fuel, temperature, pressure)
    area = injector.effective_area_for(vapour, rated.fuel_flow, ratio, pressure)
    return Nozzle(area, temperature)


def use_of(
    gas: Gas, fuel: Fuel, rated: PointRating, nozzle: Nozzle, baseline: InjectorUse | None
) -> InjectorUse:
    """Return what one fuel asks of the injector at one point.

    Parameters
    ----------
    baseline : InjectorUse or None
        At the same point on the case's own fuel; None for that fuel itself.
    """
    flow = rated.fuel_flow or 0.0
    volume = flow / fuel.density_15
    if fuel.phase == "liquid" or nozzle.area is None:
        return InjectorUse(rated.name, fuel.name, volume, None, None, None)
    pressure = liner_pressure(rated)
    vapour = vapour_of(gas, fuel, nozzle.temperature, pressure)
    ratio: float | None
    try:
        ratio = injector.pressure_ratio_for(vapour, flow, nozzle.area, pressure)
    except InputError:
        ratio = None
    area = None
    if baseline is None:
        area = 1.0
    elif baseline.pressure_ratio is not None and baseline.pressure_ratio > 1.0:
        area = (
            injector.effective_area_for(vapour, flow, baseline.pressure_ratio, pressure)
            / nozzle.area
        )
    choked = None if ratio is None else injector.is_choked(vapour, ratio)
    return InjectorUse(rated.name, fuel.name, volume, ratio, choked, area)


def valve_flow(
    gas: Gas, fuel: Fuel, baseline: PointRating, use: InjectorUse, nozzle: Nozzle
) -> float | None:
    """Return the flow of another fuel through the same injector from the same pressure, kg/s."""
    if fuel.phase == "liquid" or nozzle.area is None or use.pressure_ratio is None:
        return None
    pressure = liner_pressure(baseline)
    vapour = vapour_of(gas, fuel, nozzle.temperature, pressure)
    return injector.flow(vapour, nozzle.area, use.pressure_ratio, pressure)


def liner_pressure(rated: PointRating) -> float:
    """Return the pressure the injector discharges to: ahead of the first holes, Pa."""
    if rated.split is None:
        return rated.inlet.pressure
    return float(rated.split.liner.static_pressure[0])
