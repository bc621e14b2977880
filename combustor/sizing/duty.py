"""The design point as sizing needs it: air in, fuel in, products by local mixture."""

from __future__ import annotations

import math
from dataclasses import dataclass

from combustor.airflow.result import Inlet
from combustor.case.schema import Case, Point
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.sizing.fire import HotGas, Supply, fuel_air_ratio_for, hot_gas
from combustor.sizing.reference_area import LoadingPoint


@dataclass(frozen=True)
class Duty:
    """What the metal has to do at the design point.

    Parameters
    ----------
    name : str
    inlet : Inlet
    fuel_flow : float
        [kg/s]
    overall : float
        Equivalence ratio of all fuel with all air [-]
    stoichiometric : float
        Stoichiometric fuel per dry air [-]
    table : HotGas
        Products at equilibrium.
    lower_heating_value : float
        [J/kg]
    points : tuple of LoadingPoint
        Every operating point, for chemical loading.
    supply : Supply
        Air and fuel as they arrive.
    """

    name: str
    inlet: Inlet
    fuel_flow: float
    overall: float
    stoichiometric: float
    table: HotGas
    lower_heating_value: float
    points: tuple[LoadingPoint, ...]
    supply: Supply

    @property
    def density(self) -> float:
        """Of the inlet air, totals [kg/m3]."""
        return self.inlet.pressure / (self.inlet.gas_constant * self.inlet.temperature)

    @property
    def speed_of_sound(self) -> float:
        """Of the inlet air [m/s]."""
        ratio, constant = self.inlet.heat_capacity_ratio, self.inlet.gas_constant
        return math.sqrt(ratio * constant * self.inlet.temperature)


def duty_of(case: Case, fuel: Fuel, gas: Gas) -> Duty:
    """Return the design point of a case.

    Raises
    ------
    InfeasibleError
        The exit temperature lies above the fuel's flame.
    """
    point = case.design_point
    supply = Supply(
        point.inlet_pressure,
        point.inlet_temperature,
        point.humidity,
        case.fuel.temperature if point.fuel_temperature is None else point.fuel_temperature,
    )
    table = hot_gas(gas, fuel, supply)
    ratio = _fuel_air_ratio(point, fuel, gas, supply, table)
    air = gas.air(point.humidity)
    inlet = Inlet(
        point.air_flow,
        point.inlet_pressure,
        point.inlet_temperature,
        gas.gas_constant(air),
        gas.heat_capacity_ratio(point.inlet_temperature, point.inlet_pressure, air),
    )
    return Duty(
        name=point.name,
        inlet=inlet,
        fuel_flow=ratio * point.air_flow / (1.0 + point.humidity),
        overall=ratio / fuel.stoichiometric_fuel_air_ratio,
        stoichiometric=fuel.stoichiometric_fuel_air_ratio,
        table=table,
        lower_heating_value=fuel.lower_heating_value,
        points=tuple(
            LoadingPoint(p.name, p.kind, p.air_flow, p.inlet_pressure, p.inlet_temperature)
            for p in case.points
        ),
        supply=supply,
    )


def _fuel_air_ratio(point: Point, fuel: Fuel, gas: Gas, supply: Supply, table: HotGas) -> float:
    if point.fuel_air_ratio is not None:
        return point.fuel_air_ratio
    if point.fuel_flow is not None:
        return point.fuel_flow / point.air_flow * (1.0 + point.humidity)
    assert point.exit_temperature is not None  # the case states exactly one of the three
    return fuel_air_ratio_for(gas, fuel, supply, point.exit_temperature, table)
