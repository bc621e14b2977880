"""Stoichiometric fuel-air ratio, mixture properties and flame temperatures."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.fuel import catalogue
from combustor.fuel.composition import dry_air_molar_mass
from combustor.fuel.gas import Gas

SETTINGS = settings(derandomize=True, max_examples=40, deadline=None)
FRACTION = st.floats(0.01, 0.99)


@pytest.mark.parametrize(
    ("name", "ratio", "percent"),
    [
        pytest.param(name, ratio, percent, id=f"own balance with argon in air, 4 digits: {name}")
        for name, ratio, percent in [
            ("methane", 0.0580, 9.48),
            ("ethane", 0.0622, 5.65),
            ("propane", 0.0638, 4.02),
            ("ethylene", 0.0677, 6.53),
            ("hydrogen", 0.0292, 29.5),
            ("carbon-monoxide", 0.405, 29.5),
            ("ammonia", 0.1643, 21.8),
            ("methanol", 0.1545, 12.3),
        ]
    ],
)
def test_stoichiometric_ratio(name, ratio, percent):
    fuel = catalogue.find(name)
    last_digit = 10.0 ** -len(str(ratio).partition(".")[2])
    assert fuel.stoichiometric_fuel_air_ratio == pytest.approx(ratio, abs=last_digit)
    moles = fuel.stoichiometric_fuel_air_ratio / fuel.molar_mass * dry_air_molar_mass()
    assert 100.0 * moles / (1.0 + moles) == pytest.approx(percent, abs=0.06)


# name: molar mass kg/kmol, LHV MJ/kg, lower and higher Wobbe index MJ/m3, fuel-air ratio;
# the table stands on formation enthalpies, hence 0.1 to 0.15 % from ISO 6976
PROPERTIES = {
    "methane": (16.04, 50.01, 45.59, 50.60, 0.0580),
    "natural-gas": (17.34, 47.85, 45.36, 50.25, 0.0608),
    "methane+30%hydrogen": (11.84, 53.58, 41.96, 46.91, 0.0552),
    "methane+50%hydrogen": (9.03, 57.82, 39.55, 44.55, 0.0523),
    "hydrogen": (2.016, 119.96, 38.77, 45.82, 0.0292),
    "propane": (44.10, 46.33, 70.03, 76.07, 0.0638),
    "biogas": (27.23, 17.68, 21.00, 23.30, 0.1642),
    "syngas": (17.61, 11.92, 11.39, 12.34, 0.3185),
}


@pytest.mark.parametrize("name", PROPERTIES, ids=lambda name: f"computed property table: {name}")
def test_property_table(name):
    mass, heat, wobbe_lower, wobbe_higher, ratio = PROPERTIES[name]
    fuel = catalogue.find(name)
    assert fuel.molar_mass * 1e3 == pytest.approx(mass, rel=1e-3)
    assert fuel.lower_heating_value / 1e6 == pytest.approx(heat, rel=1e-3)
    assert fuel.wobbe_lower / 1e6 == pytest.approx(wobbe_lower, rel=1e-3)
    assert fuel.wobbe_higher / 1e6 == pytest.approx(wobbe_higher, rel=1.5e-3)
    assert fuel.stoichiometric_fuel_air_ratio == pytest.approx(ratio, rel=1.5e-3)


@pytest.mark.parametrize(
    ("share", "percent"),
    [
        pytest.param(share, percent, id=f"share of heat of {share} vol % hydrogen in methane")
        for share, percent in [(10, 3.2), (20, 7.0), (30, 11.4), (50, 23.2), (70, 41.3), (90, 73.1)]
    ],
)
def test_volume_share_is_not_heat_share(share, percent):
    blend = catalogue.find(f"methane+{share}%hydrogen")
    hydrogen = catalogue.find("hydrogen")
    part = share / 100.0 * hydrogen.lower_heat_per_volume / blend.lower_heat_per_volume
    assert 100.0 * part == pytest.approx(percent, abs=0.06)


@pytest.mark.parametrize(
    ("name", "temperature"),
    [
        pytest.param(name, value, id=f"handbook, from memory, dry air 298 K 1 atm: {name}")
        for name, value in [
            ("methane", 2226.0),
            ("propane", 2267.0),
            ("hydrogen", 2382.0),
            ("carbon-monoxide", 2385.0),
            ("ammonia", 2073.0),
            ("methanol", 2221.0),
            ("ethane", 2259.0),
            ("ethylene", 2369.0),
        ]
    ],
)
def test_flame_temperature(name, temperature):
    fuel = catalogue.find(name)
    gas = Gas.load(fuel.mechanism)
    ratio = fuel.stoichiometric_fuel_air_ratio
    mixture = (ratio * gas.fuel(fuel) + gas.air(humidity=0.0)) / (1.0 + ratio)
    enthalpy = gas.enthalpy(298.15, 101325.0, mixture)
    burnt = gas.equilibrium(enthalpy, 101325.0, mixture)
    assert burnt.temperature == pytest.approx(temperature, abs=12.0)


@pytest.mark.parametrize("name", catalogue.names())
def test_stoichiometric_mixture_burns_to_nothing_left(name):
    fuel = catalogue.find(name)
    gas = Gas.load(fuel.mechanism)
    ratio = fuel.stoichiometric_fuel_air_ratio
    mixture = (ratio * gas.fuel(fuel) + gas.air(humidity=0.0)) / (1.0 + ratio)
    moles = dict(zip(gas.element_names, gas.element_moles(mixture), strict=True))
    surplus = 0.5 * moles["O"] - moles["C"] - 0.25 * moles["H"]
    assert abs(surplus) < 2e-6 * moles["O"]


@SETTINGS
@given(share=FRACTION)
def test_blends_mix_by_volume(share):
    first, second = catalogue.find("natural-gas"), catalogue.find("hydrogen")
    blend = catalogue.find(f"natural-gas+{100.0 * share!r}%hydrogen")
    assert sum(blend.composition.values()) == pytest.approx(1.0, abs=1e-12)
    for quantity in ("molar_mass", "lower_heat_per_volume", "stoichiometric_oxygen", "density_15"):
        mean = (1.0 - share) * getattr(first, quantity) + share * getattr(second, quantity)
        assert getattr(blend, quantity) == pytest.approx(mean, rel=1e-12)


@SETTINGS
@given(share=st.floats(0.02, 0.98))
def test_inert_gas_lowers_heat_and_wobbe(share):
    pure = catalogue.find("methane")
    weak = catalogue.from_composition({"CH4": 1.0 - share, "CO2": share})
    assert weak.lower_heating_value < pure.lower_heating_value
    assert weak.wobbe_lower < pure.wobbe_lower
    assert weak.stoichiometric_fuel_air_ratio > pure.stoichiometric_fuel_air_ratio
    assert weak.stoichiometric_oxygen == pytest.approx(2.0 * (1.0 - share))


def test_hydrogen_fraction_and_carbon_ratio():
    methane, hydrogen = catalogue.find("methane"), catalogue.find("hydrogen")
    assert methane.hydrogen_mass_fraction == pytest.approx(4 * 1.008 / 16.043, rel=1e-6)
    assert methane.carbon_hydrogen_mass_ratio == pytest.approx(12.011 / 4.032, rel=1e-6)
    assert hydrogen.carbon_hydrogen_mass_ratio == 0.0
    assert hydrogen.hydrogen_mass_fraction == pytest.approx(1.0)
    assert catalogue.find("carbon-monoxide").carbon_hydrogen_mass_ratio is None
