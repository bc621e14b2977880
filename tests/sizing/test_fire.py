"""Fuel for an exit temperature, and the table of products."""

import numpy as np
import pytest

from combustor.base.errors import InfeasibleError
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.sizing.fire import Supply, burn_to_equilibrium, fuel_air_ratio_for, hot_gas

DRY = Supply(pressure=20e5, temperature=700.0, humidity=0.0, fuel_temperature=298.0)


@pytest.mark.parametrize(
    ("name", "expected"),
    [
        pytest.param("methane", 0.02345, id="computed-equilibrium-gri30-methane"),
        pytest.param("natural-gas", 0.02452, id="computed-equilibrium-gri30-natural-gas"),
        pytest.param("propane", 0.02500, id="computed-equilibrium-gri30-propane"),
        pytest.param("biogas", 0.07078, id="computed-equilibrium-gri30-biogas"),
    ],
)
def test_fuel_for_1600_kelvin(name, expected, gas):
    """700 K, 20 bar, dry air, fuel at 298 K; computed apart with the same mechanism."""
    fuel = catalogue.find(name)
    assert fuel_air_ratio_for(gas, fuel, DRY, 1600.0) == pytest.approx(expected, rel=5e-3)


def test_fuel_brings_the_exit_to_the_temperature(gas: Gas, fuel):
    supply = Supply(9.9e5, 598.15, 0.00634, 288.15)
    for wanted in (700.0, 1100.0, 1800.0, 2380.0):
        ratio = fuel_air_ratio_for(gas, fuel, supply, wanted)
        reached = burn_to_equilibrium(gas, fuel, supply, ratio).temperature
        assert reached == pytest.approx(wanted, abs=0.01)
        assert ratio < 1.1 * fuel.stoichiometric_fuel_air_ratio


def test_table_is_good_to_a_few_kelvin(gas: Gas, fuel):
    table = hot_gas(gas, fuel, DRY)
    for ratio in (0.27, 0.44, 0.62, 0.97, 1.15):
        stoichiometric = fuel.stoichiometric_fuel_air_ratio
        exact = burn_to_equilibrium(gas, fuel, DRY, ratio * stoichiometric).temperature
        assert float(table.at(ratio).temperature) == pytest.approx(exact, abs=12.0)


def test_pure_air_stays_air(gas: Gas, fuel):
    table = hot_gas(gas, fuel, DRY)
    assert table.temperature[0] == pytest.approx(700.0, abs=0.1)
    assert np.argmax(table.temperature) == pytest.approx(
        np.argmin(np.abs(table.equivalence_ratio - 1.05)), abs=1
    )


@pytest.mark.parametrize(("wanted", "said"), [(2900.0, "at most"), (650.0, "does not exceed")])
def test_impossible_exit_temperatures(wanted, said, gas: Gas, fuel):
    with pytest.raises(InfeasibleError, match=said) as caught:
        fuel_air_ratio_for(gas, fuel, DRY, wanted)
    assert len(caught.value.chain) >= 2
