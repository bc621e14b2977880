"""The operating points that could heat the wall most, as film sizing needs them."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.airflow.result import Inlet
from combustor.case.schema import Case, Point
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.heat.gas_radiation import luminosity_hydrogen
from combustor.heat.sides import Radiation
from combustor.sizing.duty import Duty
from combustor.sizing.fire import HotGas, Supply, fuel_air_ratio_for, hot_gas


@dataclass(frozen=True)
class WallDuty:
    """Air and fire of one operating point.

    Parameters
    ----------
    name : str
    inlet : Inlet
    fuel_flow : float
        [kg/s]
    overall : float
        Equivalence ratio of all fuel with all air [-]
    stoichiometric : float
        Fuel per dry air [-]
    table : HotGas
        Products at equilibrium.
    """

    name: str
    inlet: Inlet
    fuel_flow: float
    overall: float
    stoichiometric: float
    table: HotGas


def radiation_of(fuel: Fuel) -> Radiation:
    """Return how this fuel's flame radiates: clear for gases, luminous for liquids."""
    if fuel.liquid is None:
        return Radiation("grey-gas")
    return Radiation("luminous", luminosity_hydrogen(fuel.hydrogen_mass_fraction))


def wall_duties(case: Case, fuel: Fuel, gas: Gas, duty: Duty) -> tuple[WallDuty, ...]:
    """Return the design point and every other point that may heat the wall more somewhere.

    A point with colder air, lower pressure and less fuel per air than another cannot: all
    three raise the wall.
    """
    design = WallDuty(
        duty.name, duty.inlet, duty.fuel_flow, duty.overall, duty.stoichiometric, duty.table
    )
    harsh = [
        point
        for point in case.points
        if point.name != duty.name
        and not any(_spares(other, point, fuel) for other in case.points if other is not point)
    ]
    return (design, *(_duty_of(case, fuel, gas, point) for point in harsh))


def _spares(other: Point, point: Point, fuel: Fuel) -> bool:
    """Say whether ``other`` is harder on the wall than ``point`` in every respect."""
    theirs, own = _harshness(other, fuel), _harshness(point, fuel)
    return theirs != own and all(a >= b for a, b in zip(theirs, own, strict=True))


def _harshness(point: Point, fuel: Fuel) -> tuple[float, float, float]:
    if point.fuel_air_ratio is not None:
        ratio = point.fuel_air_ratio
    elif point.fuel_flow is not None:
        ratio = point.fuel_flow / point.air_flow
    else:
        assert point.exit_temperature is not None
        # only to compare points: a mean heat capacity does
        rise = point.exit_temperature - point.inlet_temperature
        ratio = 1150.0 * rise / fuel.lower_heating_value
    return point.inlet_temperature, point.inlet_pressure, ratio


def _duty_of(case: Case, fuel: Fuel, gas: Gas, point: Point) -> WallDuty:
    supply = Supply(
        point.inlet_pressure,
        point.inlet_temperature,
        point.humidity,
        case.fuel.temperature if point.fuel_temperature is None else point.fuel_temperature,
    )
    table = hot_gas(gas, fuel, supply)
    dry = point.air_flow / (1.0 + point.humidity)
    if point.fuel_air_ratio is not None:
        ratio = point.fuel_air_ratio
    elif point.fuel_flow is not None:
        ratio = point.fuel_flow / dry
    else:
        assert point.exit_temperature is not None
        ratio = fuel_air_ratio_for(gas, fuel, supply, point.exit_temperature, table)
    air = gas.air(point.humidity)
    inlet = Inlet(
        point.air_flow,
        point.inlet_pressure,
        point.inlet_temperature,
        gas.gas_constant(air),
        gas.heat_capacity_ratio(point.inlet_temperature, point.inlet_pressure, air),
    )
    stoichiometric = fuel.stoichiometric_fuel_air_ratio
    return WallDuty(point.name, inlet, ratio * dry, ratio / stoichiometric, stoichiometric, table)
