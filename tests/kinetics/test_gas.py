"""The gas wrapper: compositions, states, heating values, and how it refuses bad input."""

from __future__ import annotations

import numpy as np
import pytest

from combustor.base.errors import InputError, NotConvergedError
from combustor.fuel.gas import Gas
from combustor.fuel.mechanism import locate


def test_air_is_the_stated_dry_air_with_its_water(gas):
    moles = gas.mole_fractions(gas.air(humidity=0.0))
    for species, share in (("O2", 0.2095), ("N2", 0.7808), ("AR", 0.0093), ("CO2", 0.0004)):
        assert moles[gas.index(species)] == pytest.approx(share, rel=1e-12)
    moist = gas.air(humidity=0.01)
    water = moist[gas.index("H2O")]
    assert water / (1.0 - water) == pytest.approx(0.01, rel=1e-12)


def test_air_of_a_mechanism_without_carbon_dioxide_counts_it_as_nitrogen():
    hydrogen = Gas.load("h2o2.yaml")
    moles = hydrogen.mole_fractions(hydrogen.air(humidity=0.0))
    assert moles[hydrogen.index("N2")] == pytest.approx(0.7812, rel=1e-12)


@pytest.mark.parametrize(
    ("species", "kilojoules"),
    [
        pytest.param("CH4", 802.69, id="methane ISO 6976:2016 inferior 15 degC, from memory"),
        pytest.param("H2", 241.72, id="hydrogen ISO 6976:2016 inferior 15 degC, from memory"),
        pytest.param("CO", 282.91, id="carbon monoxide ISO 6976:2016 inferior 15 degC, memory"),
    ],
)
def test_lower_heating_value(gas, species, kilojoules):
    mass = gas.from_mole_fractions({species: 1.0})
    molar = gas.lower_heating_value(mass) * gas.molar_masses[gas.index(species)] / 1000.0
    assert molar == pytest.approx(kilojoules, rel=1e-3)


def test_burnt_gas_and_air_have_no_heating_value(gas):
    for species in ("CO2", "H2O", "N2", "O2", "AR"):
        mass = gas.from_mole_fractions({species: 1.0})
        assert gas.lower_heating_value(mass) == pytest.approx(0.0, abs=1.0)


@pytest.mark.parametrize("temperature", [250.0, 700.0, 1999.0, 3000.0])
def test_temperature_inverts_enthalpy(gas, temperature):
    air = gas.air()
    enthalpy = gas.enthalpy(temperature, 1e5, air)
    assert gas.temperature(enthalpy, 1e5, air) == pytest.approx(temperature, rel=1e-9)


def test_an_enthalpy_no_temperature_has_is_said(gas):
    with pytest.raises(NotConvergedError, match="no temperature"):
        gas.temperature(1e9, 1e5, gas.air())


@pytest.mark.parametrize(
    ("fuel", "ratio", "flame"),
    [
        pytest.param("CH4", 0.0580, 2226.0, id="methane handbook 298 K 1 atm, from memory"),
        pytest.param("H2", 0.0292, 2382.0, id="hydrogen handbook 298 K 1 atm, from memory"),
        pytest.param("CO", 0.4057, 2385.0, id="carbon monoxide handbook 298 K 1 atm, memory"),
    ],
)
def test_equilibrium_flame(gas, fuel, ratio, flame):
    share = ratio / (1.0 + ratio)
    mixture = share * gas.from_mole_fractions({fuel: 1.0}) + (1 - share) * gas.air(humidity=0.0)
    enthalpy = gas.enthalpy(298.15, 101325.0, mixture)
    state = gas.equilibrium(enthalpy, 101325.0, mixture)
    assert state.temperature == pytest.approx(flame, abs=12.0)
    assert gas.element_moles(state.mass_fractions) == pytest.approx(
        gas.element_moles(mixture), rel=1e-9
    )


def test_density_and_gas_constant_are_those_of_an_ideal_gas(gas):
    air = gas.air(humidity=0.0)
    assert gas.gas_constant(air) == pytest.approx(287.05, abs=0.05)
    assert gas.density(288.15, 101325.0, air) == pytest.approx(1.225, abs=5e-4)
    assert gas.heat_capacity_ratio(300.0, 1e5, air) == pytest.approx(1.400, abs=2e-3)


def test_unknown_species_is_refused_by_name(gas):
    with pytest.raises(InputError, match="C12H26"):
        gas.from_mole_fractions({"C12H26": 1.0})


@pytest.mark.parametrize("name", ["gri31.yaml", "gri31", "/no/such/file.yaml"])
def test_a_mechanism_that_is_not_there_is_refused_with_the_nearest_name(name):
    with pytest.raises(InputError, match=r"not found .*"):
        locate(name)
    with pytest.raises(InputError, match=r"gri30\.yaml"):
        locate("gri31.yaml")


def test_a_file_that_is_no_mechanism_is_refused(tmp_path):
    binary = tmp_path / "broken.yaml"
    binary.write_bytes(bytes(range(256)))
    with pytest.raises(InputError, match="Cantera cannot read"):
        Gas.load(binary)
    text = tmp_path / "text.yaml"
    text.write_text("phases: 3\n")
    with pytest.raises(InputError, match="Cantera cannot read"):
        Gas.load(text)


def test_a_users_own_file_is_taken_before_any_other(tmp_path):
    own = tmp_path / "own.yaml"
    own.write_bytes(locate("h2o2").read_bytes())
    assert Gas.load(own).n_species == Gas.load("h2o2").n_species
    assert locate(own) == own.resolve()


def test_a_call_does_not_depend_on_the_calls_before(gas):
    air = gas.air()
    first = gas.enthalpy(500.0, 3e5, air)
    gas.equilibrium(gas.enthalpy(900.0, 1e5, air), 1e5, air)
    assert gas.enthalpy(500.0, 3e5, air) == first
    assert np.all(gas.air() == air)
