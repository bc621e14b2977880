"""What the fire does, by equilibrium: fuel for an exit temperature, gas by local fuel-air ratio."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.fuel.gas import Gas, GasState
from combustor.fuel.liquids import supplied_enthalpy
from combustor.fuel.record import Fuel

Array = NDArray[np.float64]

FUEL_DEMAND = Method(
    key="fuel-for-exit-temperature",
    quantity="fuel flow for an exit temperature",
    source="enthalpy balance of air, fuel and products at chemical equilibrium",
    reading="computed",
)
FUEL_DEMAND_SIMPLE = Method(
    key="fuel-for-exit-temperature-simple",
    quantity="fuel flow for an exit temperature",
    source="heat capacity of the inlet air times temperature rise over lower heating value",
    reading="derived",
)

# fine where the temperature bends, so that a straight line between nodes is good to a few kelvin
_EQUIVALENCE_NODES = (
    *(0.0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 1.0, 1.05, 1.1, 1.2),
    *(1.4, 1.7, 2.2, 3.0),
)


@dataclass(frozen=True)
class Supply:
    """Air and fuel as they arrive.

    Parameters
    ----------
    pressure, temperature : float
        Of the air, totals [Pa], [K]
    humidity : float
        Water per dry air [-]
    fuel_temperature : float
        [K]
    """

    pressure: float
    temperature: float
    humidity: float
    fuel_temperature: float


@dataclass(frozen=True)
class HotGas:
    """Equilibrium products; arrays of equal length, or single values.

    Parameters
    ----------
    equivalence_ratio, temperature : ndarray
        [-], [K]
    gas_constant, heat_capacity_ratio : ndarray
        [J/(kg K)], [-]
    x_h2o, x_co2 : ndarray
        Mole fractions, wet [-]
    """

    equivalence_ratio: Array
    temperature: Array
    gas_constant: Array
    heat_capacity_ratio: Array
    x_h2o: Array
    x_co2: Array

    def at(self, equivalence_ratio: Array | float) -> HotGas:
        """Return the products at other equivalence ratios, linear between those known."""
        nodes = self.equivalence_ratio
        wanted = np.asarray(equivalence_ratio, dtype=float)
        columns = (
            self.temperature,
            self.gas_constant,
            self.heat_capacity_ratio,
            self.x_h2o,
            self.x_co2,
        )
        return HotGas(wanted, *(np.asarray(np.interp(wanted, nodes, y)) for y in columns))


def burn_to_equilibrium(gas: Gas, fuel: Fuel, supply: Supply, fuel_air_ratio: float) -> GasState:
    """Return the products of a mixture at equilibrium.

    Parameters
    ----------
    gas : Gas
    fuel : Fuel
    supply : Supply
    fuel_air_ratio : float
        Per dry air [-]
    """
    per_moist = fuel_air_ratio / (1.0 + supply.humidity)
    air, pure = gas.air(supply.humidity), gas.fuel(fuel)
    air_enthalpy = gas.enthalpy(supply.temperature, supply.pressure, air)
    fuel_enthalpy = supplied_enthalpy(gas, fuel, supply.fuel_temperature, supply.pressure)
    mixture = (air + per_moist * pure) / (1.0 + per_moist)
    enthalpy = (air_enthalpy + per_moist * fuel_enthalpy) / (1.0 + per_moist)
    return gas.equilibrium(enthalpy, supply.pressure, mixture)


def hot_gas(gas: Gas, fuel: Fuel, supply: Supply) -> HotGas:
    """Return the table of equilibrium products from pure air to three times stoichiometric."""
    stoichiometric = fuel.stoichiometric_fuel_air_ratio
    water, carbon_dioxide = gas.index("H2O"), gas.index("CO2") if gas.has("CO2") else None
    rows = []
    for node in _EQUIVALENCE_NODES:
        state = burn_to_equilibrium(gas, fuel, supply, node * stoichiometric)
        made = state.mass_fractions
        ratio = gas.heat_capacity_ratio(state.temperature, state.pressure, made)
        moles = gas.mole_fractions(made)
        carbon = 0.0 if carbon_dioxide is None else moles[carbon_dioxide]
        rows.append((state.temperature, gas.gas_constant(made), ratio, moles[water], carbon))
    return HotGas(np.array(_EQUIVALENCE_NODES), *np.array(rows).T)


def fuel_air_ratio_for(
    gas: Gas, fuel: Fuel, supply: Supply, exit_temperature: float, table: HotGas | None = None
) -> float:
    """Return the fuel per dry air that brings the exit to a temperature, lean side.

    Parameters
    ----------
    gas : Gas
    fuel : Fuel
    supply : Supply
    exit_temperature : float
        Mass-mean total, everything mixed in [K]
    table : HotGas or None
        Reused when already at hand.

    Returns
    -------
    float
        [-]

    Raises
    ------
    InfeasibleError
        The exit temperature lies above the fuel's flame, or below the inlet.
    """
    table = table if table is not None else hot_gas(gas, fuel, supply)
    hottest = int(np.argmax(table.temperature))
    if exit_temperature > table.temperature[hottest]:
        raise InfeasibleError(
            (
                f"{fuel.name} with air at {supply.temperature:.0f} K and "
                f"{supply.pressure / 1e5:.3g} bar burns at {table.temperature[hottest]:.0f} K "
                f"at most (equivalence ratio {table.equivalence_ratio[hottest]:.2f})",
                f"no fuel flow gives an exit temperature of {exit_temperature:.0f} K",
                "there is no air budget to size for",
            ),
            "Lower exit_temperature of the design point or choose another fuel.",
        )
    if exit_temperature <= table.temperature[0]:
        raise InfeasibleError(
            (
                f"the exit temperature of {exit_temperature:.0f} K does not exceed the inlet "
                f"temperature of {supply.temperature:.0f} K",
                "no fuel is burnt and there is nothing to size",
            ),
            "Raise exit_temperature of the design point above its inlet_temperature.",
        )
    lean = slice(0, hottest + 1)
    guess = float(
        np.interp(exit_temperature, table.temperature[lean], table.equivalence_ratio[lean])
    )
    slope = float(
        np.interp(guess + 0.01, table.equivalence_ratio, table.temperature)
        - np.interp(guess - 0.01, table.equivalence_ratio, table.temperature)
    )
    slope = max(slope / 0.02, 1.0)
    stoichiometric = fuel.stoichiometric_fuel_air_ratio
    for _ in range(30):
        state = burn_to_equilibrium(gas, fuel, supply, guess * stoichiometric)
        miss = exit_temperature - state.temperature
        if abs(miss) < 1e-6 * exit_temperature:
            break
        # steps stay short near the summit, where the slope vanishes
        guess += float(np.clip(miss / slope, -0.05, 0.05))
    return guess * stoichiometric
