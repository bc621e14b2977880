"""Dry air of the mechanisms against the ideal-gas part of Lemmon et al. 2000 in a library."""

import chemicals.air as library
import pytest

from combustor.fuel.gas import Gas

SOURCE = "Lemmon et al. 2000 ideal-gas air, chemicals 1.x"
REFERENCE = 298.15
MECHANISMS = ["gri30.yaml", "example_data/ammonia-CO-H2-Alzueta-2023.yaml"]
# Lemmon et al. state validity to 2000 K; N2 0.7812, O2 0.2096, Ar 0.0092 against N2 0.7808,
# O2 0.2095, Ar 0.0093, CO2 0.0004 here: 0.05 % at most. The polynomials of the newer mechanism
# join at 1200 K and lie up to 0.29 % low in heat capacity, 0.12 % in enthalpy there.
TEMPERATURES = [300.0, 600.0, 1000.0, 1500.0, 2000.0]


def heat_capacity(temperature):
    """Return J/kg/K: R (1 - tau^2 d2A0/dtau2) over the molar mass."""
    tau = library.lemmon2000_air_T_reducing / temperature
    curvature = library.lemmon2000_air_d2A0_dtau2(tau, 1.0)
    constant = library.lemmon2000_air_R / library.lemmon2000_air_MW * 1e3
    return constant * (1.0 - tau * tau * curvature)


def enthalpy(temperature):
    """Return J/kg over an arbitrary zero: R T (1 + tau dA0/dtau) over the molar mass."""
    tau = library.lemmon2000_air_T_reducing / temperature
    constant = library.lemmon2000_air_R / library.lemmon2000_air_MW * 1e3
    return constant * temperature * (1.0 + tau * library.lemmon2000_air_dA0_dtau(tau, 1.0))


@pytest.fixture(scope="module", params=MECHANISMS)
def dry_air(request):
    gas = Gas.load(request.param)
    return gas, gas.air(humidity=0.0)


@pytest.mark.parametrize("temperature", TEMPERATURES, ids=lambda t: f"{SOURCE}: {t:.0f} K")
def test_heat_capacity_of_dry_air(dry_air, temperature):
    gas, air = dry_air
    found = gas.heat_capacity(temperature, 101325.0, air)
    assert found == pytest.approx(heat_capacity(temperature), rel=3e-3)


@pytest.mark.parametrize("temperature", TEMPERATURES[1:], ids=lambda t: f"{SOURCE}: {t:.0f} K")
def test_enthalpy_rise_of_dry_air(dry_air, temperature):
    gas, air = dry_air
    rise = gas.enthalpy(temperature, 101325.0, air) - gas.enthalpy(REFERENCE, 101325.0, air)
    assert rise == pytest.approx(enthalpy(temperature) - enthalpy(REFERENCE), rel=1.5e-3)


def test_gas_constant_of_dry_air(dry_air):
    gas, air = dry_air
    library_constant = library.lemmon2000_air_R / library.lemmon2000_air_MW * 1e3
    assert gas.gas_constant(air) == pytest.approx(library_constant, rel=5e-4)
