"""One operating point in the terms the physics needs: moist air, fuel, and what is asked."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.airflow.result import Inlet
from combustor.base.method import Method
from combustor.case.schema import Atomiser, Case, Point
from combustor.fuel.gas import Gas
from combustor.fuel.liquids import supplied_enthalpy
from combustor.fuel.record import Fuel
from combustor.sizing.fire import HotGas, Supply, fuel_air_ratio_for, hot_gas

LIQUID_WATER = Method(
    key="liquid-water-enthalpy",
    quantity="enthalpy of injected water, liquid at 25 degC",
    source="CODATA 1989: enthalpy of formation of liquid water, -285.83 kJ/mol",
    reading="from memory",
    note="10 K of water temperature is 0.04 MJ/kg, a sixtieth of its latent heat",
)
LIQUID_WATER_ENTHALPY = -285.83e3 / 18.01528e-3


@dataclass(frozen=True)
class Operating:
    """Air and fuel of one operating point.

    Parameters
    ----------
    name, kind : str
    inlet : Inlet
    humidity : float
        kg water per kg dry air.
    air, fuel : ndarray
        Mass fractions of moist air and of the fuel.
    air_enthalpy : float
        At the inlet temperature, J/kg.
    fuel_enthalpy : float
        At the fuel's temperature, J/kg.
    fuel_flow : float
        As stated, or that of complete combustion to the exit temperature, kg/s.
    water : ndarray
        Mass fractions of pure water.
    water_flow, water_enthalpy : float
        Liquid water injected with the fuel, kg/s and J/kg.
    exit_temperature : float or None
        Asked for, K; None where the fuel flow is stated.
    lower_heating_value : float
        What the flame releases, J/kg.
    stoichiometric_fuel_air_ratio : float
        Per dry air.
    products : HotGas
        Equilibrium products by equivalence ratio, the first guess of the fire.
    fuel_split : mapping of str to float or None
        Share of the fuel by injector; None leaves it to the metal [-]
    atomiser : Atomiser or None
        Stated for a liquid fuel.
    """

    name: str
    kind: str
    inlet: Inlet
    humidity: float
    air: NDArray[np.float64]
    fuel: NDArray[np.float64]
    air_enthalpy: float
    fuel_enthalpy: float
    fuel_flow: float
    water: NDArray[np.float64]
    water_flow: float
    water_enthalpy: float
    exit_temperature: float | None
    lower_heating_value: float
    stoichiometric_fuel_air_ratio: float
    products: HotGas
    fuel_split: Mapping[str, float] | None = None
    atomiser: Atomiser | None = None

    @property
    def dry_air_flow(self) -> float:
        """Dry air, kg/s."""
        return self.inlet.mass_flow / (1.0 + self.humidity)

    def equivalence_ratio(self, fuel_flow: float, air_fraction: float = 1.0) -> float:
        """Return the equivalence ratio of the fuel in a share of all air."""
        fuel_air_ratio = fuel_flow / (self.dry_air_flow * air_fraction)
        return fuel_air_ratio / self.stoichiometric_fuel_air_ratio


def operating_of(case: Case, point: Point, fuel: Fuel, gas: Gas) -> Operating:
    """Return one point of a case as air and fuel.

    Raises
    ------
    InfeasibleError
        The exit temperature asked for lies above what the fuel can give.
    """
    air = gas.air(point.humidity)
    fuel_fractions = gas.fuel(fuel)
    pressure, temperature = point.inlet_pressure, point.inlet_temperature
    fuel_temperature = (
        case.fuel.temperature if point.fuel_temperature is None else point.fuel_temperature
    )
    supply = Supply(pressure, temperature, point.humidity, fuel_temperature)
    products = hot_gas(gas, fuel, supply)
    dry_air_flow = point.air_flow / (1.0 + point.humidity)
    if point.fuel_flow is not None:
        fuel_flow = point.fuel_flow
    elif point.fuel_air_ratio is not None:
        fuel_flow = point.fuel_air_ratio * dry_air_flow
    else:
        assert point.exit_temperature is not None
        fuel_flow = dry_air_flow * fuel_air_ratio_for(
            gas, fuel, supply, point.exit_temperature, products
        )
    return Operating(
        name=point.name,
        kind=point.kind,
        inlet=Inlet(
            mass_flow=point.air_flow,
            pressure=pressure,
            temperature=temperature,
            gas_constant=gas.gas_constant(air),
            heat_capacity_ratio=gas.heat_capacity_ratio(temperature, pressure, air),
        ),
        humidity=point.humidity,
        air=air,
        fuel=fuel_fractions,
        air_enthalpy=gas.enthalpy(temperature, pressure, air),
        fuel_enthalpy=supplied_enthalpy(gas, fuel, fuel_temperature, pressure),
        fuel_flow=fuel_flow,
        water=gas.from_mole_fractions({"H2O": 1.0}),
        water_flow=point.water_injection,
        water_enthalpy=LIQUID_WATER_ENTHALPY,
        exit_temperature=point.exit_temperature,
        lower_heating_value=fuel.lower_heating_value,
        stoichiometric_fuel_air_ratio=fuel.stoichiometric_fuel_air_ratio,
        products=products,
        atomiser=case.fuel.atomiser,
        fuel_split=point.fuel_split,
    )
