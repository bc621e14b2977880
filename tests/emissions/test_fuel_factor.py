"""Fuel factors and stack-test arithmetic against the regulation's printed values."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.emissions import fuel_factor as ff
from combustor.emissions.bases import NO2_MOLAR_MASS, mass_concentration
from combustor.emissions.emission_unit import BTU, POUND, US_STANDARD, read_unit
from combustor.emissions.reference_day import iso_factor
from combustor.fuel import catalogue
from combustor.fuel.composition import atoms_of_formula, molar_mass
from combustor.fuel.heating_value import iso_heat_of

SETTINGS = settings(derandomize=True, max_examples=60, deadline=None)
BTU_PER_POUND = BTU / POUND  # J/kg
POUND_PER_MMBTU = read_unit("lb/MMBtu HHV").factor
ANALYSIS = {"C": 85.2, "H": 12.8, "N": 0.01, "S": 0.12, "O": 1.84}
K_NOX = 1.194e-7  # lb/scf per ppm, as the method prints it


def own(formula):
    atoms = atoms_of_formula(formula)
    return ff.factors_of_fuel(atoms, iso_heat_of(formula).higher / molar_mass(atoms))


class TestPublishedStackTest:
    """A published worked example: oil, 4.2 % O2, 43.2 ppm NOx, 70 degF, humidity 0.0156."""

    def test_dry_factor(self):
        factors = ff.factors_of_analysis(ANALYSIS, 19595.0 * BTU_PER_POUND)
        assert factors.in_scf()[0] == pytest.approx(8991.0, abs=0.5)

    def test_nox_at_15_percent(self):
        assert pytest.approx(15.3, abs=0.05) == 43.2 * (20.9 - 15.0) / (20.9 - 4.2)
        from combustor.emissions.concentration import measured

        found = measured(43.2e-6, "NOx", 0.042).at_oxygen(0.15, 0.209)
        assert found.value * 1e6 == pytest.approx(15.3, abs=0.05)

    def test_iso_factor_and_corrected_nox(self):
        factor = iso_factor(0.0156, (70.0 + 459.67) / 1.8, 29.92 / 30.18, "diffusion")
        assert factor == pytest.approx(1.15, abs=0.005)
        assert 43.2 * 5.9 / 16.7 * factor == pytest.approx(17.5, abs=0.05)

    def test_mass_per_heat(self):
        factors = ff.factors_of_analysis(ANALYSIS, 19595.0 * BTU_PER_POUND)
        rate = ff.per_heat(43.2 * K_NOX * ff.POUND_PER_SCF, factors.dry, 0.042)
        assert rate / POUND_PER_MMBTU == pytest.approx(0.0580, abs=5e-5)


@pytest.mark.parametrize(
    ("fuel", "us", "si"),
    [
        ("natural-gas", (8710, 10610, 1040), (2.34e-7, 2.85e-7, 0.279e-7)),
        ("propane", (8710, 10200, 1190), (2.34e-7, 2.74e-7, 0.319e-7)),
        ("butane", (8710, 10390, 1250), (2.34e-7, 2.79e-7, 0.335e-7)),
        ("oil", (9190, 10320, 1420), (2.47e-7, 2.77e-7, 0.381e-7)),
    ],
    ids=lambda v: v if isinstance(v, str) else "40 CFR 60 app. A method 19 table 19-2",
)
def test_metric_column_from_the_us_one(fuel, us, si):
    factors = ff.DEFAULTS[fuel]
    assert factors.in_scf() == pytest.approx(us, rel=1e-12)
    assert (factors.dry, factors.wet, factors.carbon_dioxide) == pytest.approx(si, rel=5e-3)


@pytest.mark.parametrize(
    ("formula", "dry"),
    [("CH4", 8601), ("C3H8", 8831), ("CO", 9143), ("H2", 5916), ("NH3", 7796)],
    ids=lambda v: f"{v}, element balance" if isinstance(v, str) else "",
)
def test_pure_species(formula, dry):
    assert own(formula).in_scf()[0] == pytest.approx(dry, rel=5e-3)


def test_methane_carbon_dioxide_factor():
    assert own("CH4").in_scf()[2] == pytest.approx(1006.0, rel=5e-3)


def test_hydrogen_is_far_from_the_default_of_natural_gas():
    assert own("H2").dry < 0.7 * ff.DEFAULTS["natural-gas"].dry


def test_own_factor_of_natural_gas_stands_beside_the_default():
    gas = catalogue.find("natural-gas")
    factors = ff.factors_of_fuel(gas.atoms, gas.higher_heating_value)
    assert factors.dry == pytest.approx(ff.DEFAULTS["natural-gas"].dry, rel=0.015)
    assert factors.wet == pytest.approx(ff.DEFAULTS["natural-gas"].wet, rel=0.015)


def test_analysis_and_element_balance_agree_on_methane():
    atoms = atoms_of_formula("CH4")
    mass = molar_mass(atoms)
    percent = {"C": 100 * 12.011e-3 / mass, "H": 100 * 4.032e-3 / mass}
    heat = iso_heat_of("CH4").higher / mass
    from_analysis = ff.factors_of_analysis(percent, heat)
    assert from_analysis.dry == pytest.approx(own("CH4").dry, rel=5e-3)
    assert from_analysis.wet == pytest.approx(own("CH4").wet, rel=5e-3)


TABLE = [
    (2, 4.1, 0.0074, 3.2, 0.0078, 3.3),
    (5, 10.3, 0.0184, 7.9, 0.0194, 8.4),
    (9, 18.5, 0.0332, 14.3, 0.0350, 15.0),
    (15, 30.8, 0.0553, 23.8, 0.0583, 25.1),
    (25, 51.3, 0.0921, 39.6, 0.0972, 41.8),
    (42, 86.2, 0.1547, 66.5, 0.1633, 70.2),
    (74, 151.9, 0.2726, 117.2, 0.2876, 123.7),
    (96, 197.0, 0.3537, 152.0, 0.3732, 160.4),
    (150, 307.9, 0.5526, 237.6, 0.5830, 250.7),
]


@pytest.mark.parametrize("line", TABLE, ids=lambda v: f"{v[0]} ppm NOx, k 1.194e-7, 20.9 %")
def test_reference_conversions_at_15_percent(line):
    ppm, normal, gas_lb, gas_ng, oil_lb, oil_ng = line
    assert mass_concentration(ppm * 1e-6, NO2_MOLAR_MASS) * 1e6 == pytest.approx(normal, abs=0.05)
    for factors, pounds, nanograms in (
        (ff.DEFAULTS["natural-gas"], gas_lb, gas_ng),
        (ff.DEFAULTS["oil"], oil_lb, oil_ng),
    ):
        rate = ff.per_heat(ppm * K_NOX * ff.POUND_PER_SCF, factors.dry, 0.15)
        assert rate / POUND_PER_MMBTU == pytest.approx(pounds, abs=5.1e-5)
        assert rate * 1e12 == pytest.approx(nanograms, abs=0.051)


def test_the_method_s_constant_is_the_molar_mass_at_68_fahrenheit():
    per_ppm = mass_concentration(1e-6, NO2_MOLAR_MASS, US_STANDARD) / ff.POUND_PER_SCF
    assert per_ppm == pytest.approx(K_NOX, rel=5e-4)


@SETTINGS
@given(value=st.floats(1e-9, 1e-3), dry=st.floats(1e-7, 5e-7), oxygen=st.floats(0.0, 0.19))
def test_mass_per_heat_and_back(value, dry, oxygen):
    there = ff.per_heat(value, dry, oxygen)
    assert ff.concentration_of_heat(there, dry, oxygen) == pytest.approx(value, rel=1e-12)


@SETTINGS
@given(oxygen=st.floats(0.0, 0.18), water=st.floats(0.0, 0.2))
def test_wet_and_dry_equations_agree(oxygen, water):
    dry = ff.per_heat(1e-5, 2.3e-7, oxygen)
    wet = ff.per_heat_wet(1e-5 * (1 - water), 2.3e-7, oxygen * (1 - water), water)
    assert wet == pytest.approx(dry, rel=1e-9)


def test_oxygen_and_carbon_dioxide_routes_agree_on_one_exhaust():
    factors = own("CH4")
    # dry products of CH4 with air at 15 % O2 in the exhaust, 20.95 % in air
    excess = 0.2095 / (0.2095 - 0.15)
    carbon_dioxide = factors.carbon_dioxide / (factors.dry * excess)
    by_oxygen = ff.per_heat(1e-5, factors.dry, 0.15, 0.2095)
    by_carbon = ff.per_heat_by_carbon_dioxide(1e-5, factors.carbon_dioxide, carbon_dioxide)
    assert by_carbon == pytest.approx(by_oxygen, rel=1e-12)


@pytest.mark.parametrize(
    ("fuel", "ratio"),
    [("natural-gas", 1.75), ("oil", 1.35), ("propane", 1.5)],
    ids=["gas, Fo about 1.75", "oil, Fo about 1.35", "propane, Fo about 1.5"],
)
def test_fuel_ratio(fuel, ratio):
    assert ff.fuel_ratio(ff.DEFAULTS[fuel]) == pytest.approx(ratio, abs=0.035)


def test_oxygen_as_percent_is_refused():
    with pytest.raises(InputError, match="mole fraction below"):
        ff.per_heat(1e-5, 2.3e-7, 4.2)


def test_an_unknown_part_of_an_analysis_is_refused():
    with pytest.raises(InputError, match="ultimate analysis"):
        ff.factors_of_analysis({"C": 80.0, "Ash": 5.0}, 4e7)


@pytest.mark.parametrize(
    ("name", "per_ppm"),
    [
        ("methane", 0.0863),
        ("propane", 0.0803),
        ("hydrogen", 0.1516),
        ("ammonia", 0.0317),
        ("carbon-monoxide", 0.0167),
    ],
    ids=lambda v: f"{v}, g/kg per ppmvd@15" if isinstance(v, str) else "",
)
def test_emission_index_per_ppm(name, per_ppm):
    """As computed from stoichiometry with 20.95 % O2, printed to the last digit."""
    fuel = catalogue.find(name)
    factors = ff.factors_of_fuel(fuel.atoms, fuel.higher_heating_value)
    mass = mass_concentration(1e-6, NO2_MOLAR_MASS, US_STANDARD)
    rate = ff.per_heat(mass, factors.dry, 0.15, 0.2095) * fuel.higher_heating_value
    assert rate * 1e3 == pytest.approx(per_ppm, abs=1.5e-4)


@pytest.mark.parametrize(
    ("pollutant", "ratio"),
    [("CO", 0.6088), ("SO2", 1.3925), ("UHC", 0.3487)],
    ids=["CO over NO2", "SO2 over NO2", "CH4 over NO2"],
)
def test_other_pollutants_by_molar_mass(pollutant, ratio):
    from combustor.emissions.pollutant import POLLUTANTS

    found = POLLUTANTS[pollutant].molar_mass / POLLUTANTS["NOx"].molar_mass
    assert found == pytest.approx(ratio, abs=2e-4)


def test_emission_index_per_ppm_of_average_jet_a():
    """13.8 % hydrogen, CH1.908: 0.0764 g/kg per ppmvd@15; heat cancels out."""
    atoms = {"C": 1.0, "H": 1.908}
    factors = ff.factors_of_fuel(atoms, 46e6)
    mass = mass_concentration(1e-6, NO2_MOLAR_MASS, US_STANDARD)
    rate = ff.per_heat(mass, factors.dry, 0.15, 0.2095) * 46e6
    assert rate * 1e3 == pytest.approx(0.0764, abs=5.1e-5)


@pytest.mark.parametrize(
    ("formula", "ratio"), [("CH4", 1.11), ("H2", 1.18)], ids=["CH4, 1.11", "H2, 1.18"]
)
def test_higher_for_lower_heating_value_is_told_apart(formula, ratio):
    heat = iso_heat_of(formula)
    assert heat.higher / heat.lower == pytest.approx(ratio, abs=0.005)
    from combustor.emissions.stack import Stack

    stack = Stack({"NO": 3e-5, "O2": 0.14, "H2O": 0.07}, 50.0, 1.0, 0.0285, heat.lower, heat.higher)
    lower, higher = (stack.express("NOx", read_unit(f"g/MJ {h}")) for h in ("LHV", "HHV"))
    assert lower / higher == pytest.approx(ratio, abs=0.005)
    with pytest.raises(InputError, match="leaves open which heat"):
        stack.express("NOx", read_unit("g/MJ"))
