"""The emissions record: what a gas becomes on every basis, and where a basis is undefined."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.emissions import bases
from combustor.emissions.exhaust import from_exhaust, from_gas
from combustor.emissions.profile import dry_15_along
from combustor.emissions.unburnt import efficiency_from_indices, methane_equivalent
from combustor.fuel import catalogue
from combustor.fuel.composition import atoms_of_formula
from combustor.fuel.gas import Gas
from combustor.fuel.heating_value import atoms_in

SETTINGS = settings(derandomize=True, max_examples=40, deadline=None)
METHANE = catalogue.find("methane")
GRI = Gas.load(METHANE.mechanism)
ATOMS = {name: atoms_in(GRI, name) for name in GRI.species_names}


def mixture(equivalence_ratio, humidity=0.0, fuel=METHANE, gas=GRI):
    """Return unburnt mass fractions and fuel per gas mass."""
    ratio = equivalence_ratio * fuel.stoichiometric_fuel_air_ratio / (1.0 + humidity)
    fractions = (ratio * gas.fuel(fuel) + gas.air(humidity)) / (1.0 + ratio)
    return fractions, ratio / (1.0 + ratio)


def burnt_completely(equivalence_ratio, added=None, humidity=0.0):
    """Return mole fractions of completely burnt lean methane with traces added, and fuel share."""
    fractions, share = mixture(equivalence_ratio, humidity)
    moles = dict(zip(GRI.species_names, fractions / GRI.molar_masses, strict=True))
    methane = moles.pop("CH4")
    moles["CO2"] += methane
    moles["H2O"] += 2.0 * methane
    moles["O2"] -= 2.0 * methane
    total = sum(moles.values())
    moles["CH4"] = 0.0
    for species, fraction in (added or {}).items():
        moles[species] = moles.get(species, 0.0) + fraction * total
    total = sum(moles.values())
    return {species: float(value / total) for species, value in moles.items()}, share


def molar_mass(mole_fractions):
    return sum(x * GRI.molar_masses[GRI.index(name)] for name, x in mole_fractions.items())


def emissions(mole_fractions, share):
    return from_exhaust(
        mole_fractions, 1.0, molar_mass(mole_fractions), share, METHANE.lower_heating_value, ATOMS
    )


@SETTINGS
@given(
    phi=st.floats(0.1, 0.95),
    nitric_oxide=st.floats(1e-8, 1e-5),
    dioxide=st.floats(1e-8, 1e-5),
)
def test_index_and_reference_fraction_agree_through_the_fuel(phi, nitric_oxide, dioxide):
    gas, share = burnt_completely(phi, {"NO": nitric_oxide, "NO2": dioxide})
    result = emissions(gas, share)
    exhaust = bases.dry_exhaust_per_fuel(2.0, 1.0)
    through_fuel = bases.index_of_reference_fraction(
        result.nox_dry_15, bases.NO2_MOLAR_MASS, METHANE.molar_mass, exhaust
    )
    # the traces were added on top, outside the fuel's own balance
    assert through_fuel == pytest.approx(result.ei_nox, rel=3e-4)
    assert result.no_share == pytest.approx(nitric_oxide / (nitric_oxide + dioxide))
    assert result.nox_per_energy == pytest.approx(result.ei_nox / METHANE.lower_heating_value)


@SETTINGS
@given(phi=st.floats(0.15, 0.9), humidity=st.floats(0.0, 0.03), more=st.floats(0.0, 0.1))
def test_water_and_air_added_change_nothing_at_the_reference(phi, humidity, more):
    gas, share = burnt_completely(phi, {"NO": 1e-5, "CO": 1e-5}, humidity)
    diluted = dict(gas)
    diluted["H2O"] += more
    for species, part in {"O2": 0.2095, "N2": 0.7808, "AR": 0.0093, "CO2": 0.0004}.items():
        diluted[species] += more * part
    total = sum(diluted.values())
    diluted = {species: value / total for species, value in diluted.items()}
    first = emissions(gas, share)
    gas_flow = total * molar_mass(diluted) / molar_mass(gas)
    second = from_exhaust(
        diluted, gas_flow, molar_mass(diluted), share, METHANE.lower_heating_value, ATOMS
    )
    for quantity in (
        "nox_dry_15",
        "co_dry_15",
        "nox_mass_15",
        "co_mass_15",
        "ei_nox",
        "ei_co",
        "ei_uhc",
        "combustion_efficiency",
    ):
        assert getattr(second, quantity) == pytest.approx(getattr(first, quantity), rel=1e-9)


@SETTINGS
@given(phi=st.floats(0.1, 0.9), carbon=st.floats(0.0, 0.01))
def test_emission_index_is_mass_out_per_fuel(phi, carbon):
    fractions, share = mixture(phi)
    fractions = fractions.copy()
    fractions[GRI.index("CO")] += carbon
    fractions /= fractions.sum()
    result = from_gas(GRI, fractions, 3.0, 3.0 * share, METHANE)
    assert result.ei_co * share == pytest.approx(fractions[GRI.index("CO")], rel=1e-4, abs=1e-15)
    assert result.ei_uhc * share == pytest.approx(fractions[GRI.index("CH4")], rel=1e-4)


@pytest.mark.parametrize("name", ["methane", "hydrogen", "ammonia", "carbon-monoxide", "syngas"])
def test_nothing_burnt_is_no_efficiency(name):
    fuel = catalogue.find(name)
    gas = Gas.load(fuel.mechanism)
    fractions, share = mixture(0.5, fuel=fuel, gas=gas)
    result = from_gas(gas, fractions, 1.0, share, fuel)
    assert result.combustion_efficiency == pytest.approx(0.0, abs=1e-10)


def test_all_burnt_is_full_efficiency():
    gas, share = burnt_completely(0.6)
    result = emissions(gas, share)
    assert result.combustion_efficiency == 1.0
    assert result.ei_co == result.ei_uhc == 0.0
    assert result.co_dry_15 == 0.0


@pytest.mark.parametrize(
    ("carbon_monoxide", "hydrocarbons", "expected"),
    [pytest.param(40e-3, 5e-3, 0.98565, id="worked by hand, hydrocarbons as fuel: EI 40 and 5")],
)
def test_efficiency_from_indices(carbon_monoxide, hydrocarbons, expected):
    heat = 43.2e6
    value = efficiency_from_indices(carbon_monoxide, hydrocarbons, heat, uhc_heating_value=heat)
    assert value == pytest.approx(expected, abs=6e-6)


@SETTINGS
@given(carbon_monoxide=st.floats(0.0, 5e-3), methane=st.floats(0.0, 5e-3))
def test_both_roads_to_efficiency_meet(carbon_monoxide, methane):
    gas, share = burnt_completely(0.5, {"CO": carbon_monoxide, "CH4": methane})
    result = emissions(gas, share)
    by_index = efficiency_from_indices(result.ei_co, result.ei_uhc, METHANE.lower_heating_value)
    assert by_index == pytest.approx(result.combustion_efficiency, abs=1e-6)


def test_hydrocarbons_count_by_carbon_and_nitriles_do_not():
    atoms = {name: atoms_of_formula(name) for name in ("C2H6", "CH2O", "HCN", "CO", "CO2", "N2")}
    gas = {"C2H6": 1e-3, "CH2O": 2e-3, "HCN": 5e-3, "CO": 0.01, "CO2": 0.05, "N2": 0.932}
    assert methane_equivalent(gas, atoms) == pytest.approx(2 * 1e-3 + 2e-3)


@pytest.mark.parametrize(
    ("phi", "defined"),
    [(0.02, False), (0.06, True), (0.5, True), (0.999, True), (1.02, False), (1.6, False)],
)
def test_reference_is_undefined_when_rich_or_almost_air(phi, defined):
    fractions, share = mixture(phi)
    enthalpy = GRI.enthalpy(800.0, 1e6, fractions)
    burnt = GRI.equilibrium(enthalpy, 1e6, fractions)
    result = from_gas(GRI, burnt.mass_fractions, 1.0, share, METHANE)
    corrected = (
        result.nox_dry_15,
        result.co_dry_15,
        result.n2o_dry_15,
        result.nh3_dry_15,
        result.nox_mass_15,
        result.co_mass_15,
    )
    assert all((value is not None) is defined for value in corrected)
    assert result.ei_nox is not None
    assert result.ei_co is not None


def test_without_fuel_there_is_no_index():
    air = GRI.air(0.0)
    result = from_gas(GRI, air, 1.0, 0.0, METHANE)
    assert result.ei_nox is result.ei_co is result.ei_uhc is None
    assert result.combustion_efficiency is None
    assert result.nox_dry_15 is None
    assert result.no_share is None
    assert result.o2_dry == pytest.approx(0.2095, rel=1e-9)


def test_a_mechanism_without_nitrogen_chemistry_gives_no_nox_rather_than_zero():
    fuel = catalogue.find("hydrogen", mechanism="h2o2.yaml")
    gas = Gas.load(fuel.mechanism)
    fractions, share = mixture(0.5, fuel=fuel, gas=gas)
    result = from_gas(gas, fractions, 1.0, share, fuel)
    assert result.ei_nox is result.nox_dry_15 is result.nox_per_energy is None
    assert result.n2o_dry_15 is result.nh3_dry_15 is None
    assert np.isnan(dry_15_along(gas, fractions).nox).all()


@pytest.mark.parametrize(
    ("phi", "ei_nox", "ei_co", "nox", "carbon_monoxide"),
    [
        pytest.param(*row, id=f"computed stirred-reactor table, methane 20 bar: {row[0]}")
        for row in [
            (0.50, 0.238, 13.85, 2.77, 264.0),
            (0.60, 1.734, 8.45, 20.1, 160.5),
            (0.80, 45.36, 26.7, 520.0, 503.0),
        ]
    ],
)
def test_bases_of_a_known_exhaust(phi, ei_nox, ei_co, nox, carbon_monoxide):
    fractions, share = mixture(phi)
    moles = dict(zip(GRI.species_names, (fractions / GRI.molar_masses).tolist(), strict=True))
    left = ei_co * 1e-3 * share / bases.CO_MOLAR_MASS
    formed = ei_nox * 1e-3 * share / bases.NO2_MOLAR_MASS
    methane = moles.pop("CH4")
    moles["CO"], moles["NO"] = left, formed
    moles["CO2"] += methane - left
    moles["H2O"] += 2.0 * methane
    moles["O2"] += 0.5 * left - 0.5 * formed - 2.0 * methane
    moles["N2"] -= 0.5 * formed
    total = sum(moles.values())
    result = emissions({species: value / total for species, value in moles.items()}, share)
    assert result.ei_nox * 1e3 == pytest.approx(ei_nox, rel=1e-3)
    assert result.ei_co * 1e3 == pytest.approx(ei_co, rel=1e-3)
    # H2, OH and O of the computed gas, left out here, move O2 by up to 1 % of its distance
    assert result.nox_dry_15 * 1e6 == pytest.approx(nox, rel=1e-2)
    assert result.co_dry_15 * 1e6 == pytest.approx(carbon_monoxide, rel=1e-2)


def test_profile_is_the_record_at_every_station():
    states = []
    for phi in (0.02, 0.3, 0.7, 0.98, 1.3):
        fractions, share = mixture(phi, humidity=0.00634)
        enthalpy = GRI.enthalpy(700.0, 1e6, fractions)
        states.append((GRI.equilibrium(enthalpy, 1e6, fractions).mass_fractions, share))
    profile = dry_15_along(GRI, np.array([state for state, _ in states]))
    for place, (state, share) in enumerate(states):
        one = from_gas(GRI, state, 1.0, share, METHANE)
        for value, expected in (
            (profile.nox[place], one.nox_dry_15),
            (profile.co[place], one.co_dry_15),
        ):
            if expected is None:
                assert np.isnan(value)
            else:
                assert value == pytest.approx(expected, rel=1e-12)
