"""Conversions of measured emissions: published arithmetic, both ways, and slips refused."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.emissions.reference_day import AmbientAir
from combustor.fuel import catalogue
from combustor.studies.convert import convert
from combustor.studies.convert_reading import read_value
from combustor.studies.convert_record import Plant, Sample

METHANE = catalogue.find("methane")
HYDROGEN = catalogue.find("hydrogen")
SETTINGS = settings(derandomize=True, max_examples=25, deadline=None)
PLANT = Plant(heat_input=10e6, output=3e6, hours=4000.0)


def one(value, to, fuel=METHANE, sample=None, plant=None, species="NOx"):
    return convert([value], species, fuel, [to], sample, plant).results[0].value


def test_published_stack_test_reading():
    """43.2 ppm at 4.2 % O2 with 20.9 % in air is 15.3 ppm at 15 %; at the ISO day 17.5."""
    ambient = AmbientAir((70.0 + 459.67) / 1.8, 101.3e3 * 30.18 / 29.92, 0.0156)
    done = convert(
        ["43.2"],
        "NOx",
        METHANE,
        ["ppmvd@15"],
        Sample(oxygen=(0.042,), oxygen_in_air=0.209),
        Plant(ambient=ambient),
    )
    plain, iso = done.results
    assert plain.value == pytest.approx(15.3, abs=0.05)
    assert iso.value == pytest.approx(17.5, abs=0.05)
    assert iso.value / plain.value == pytest.approx(1.15, abs=0.005)
    assert "ISO day" in iso.note


def test_wet_reading_by_hand():
    """20 ppm and 14 % O2 wet, 8 % water: 21.74 ppm dry, 15.22 % O2 dry, 22.57 at 15 %."""
    sample = Sample((0.14,), "wet", "wet", 0.08, 0.209)
    done = convert(["20"], "NOx", METHANE, ["ppmvd@15", "ppmvd"], sample)
    steps = {step.what: step.value for step in done.runs[0]}
    assert steps["dried"] == pytest.approx(21.74, abs=0.005)
    assert steps["O2, dry"] == pytest.approx(15.22, abs=0.005)
    assert done.results[0].value == pytest.approx(22.57, abs=0.005)


def test_each_run_is_corrected_before_the_mean():
    sample = Sample((0.12, 0.17), oxygen_in_air=0.209)
    found = convert(["30", "20"], "NOx", METHANE, ["ppmvd@15"], sample).results[0].value
    assert found == pytest.approx((30 * 5.9 / 8.9 + 20 * 5.9 / 3.9) / 2, rel=1e-12)


@pytest.mark.parametrize(
    ("unit", "value"),
    [("g/kg", 2.16), ("g/MJ LHV", 0.0431), ("mg/Nm3@15", 51.3)],
    ids=["computed: 25 ppm on CH4 is 2.16 g/kg", "43.1 mg/MJ", "51.3 mg/Nm3"],
)
def test_25_ppm_on_methane(unit, value):
    digits = {"g/kg": 0.005, "g/MJ LHV": 5e-5, "mg/Nm3@15": 0.05}[unit]
    assert one("25 ppmvd@15", unit) == pytest.approx(value, abs=digits)


UNITS = [
    "ppmvd@15",
    "ppmvd@3",
    "mg/Nm3@15",
    "mg/m3(20C)@15",
    "g/kg",
    "g/MJ LHV",
    "ng/J HHV",
    "lb/MMBtu HHV",
    "g/kWh",
    "lb/MWh",
    "kg/h",
    "t/yr",
]


@SETTINGS
@given(value=st.floats(0.01, 1e4), start=st.sampled_from(UNITS), to=st.sampled_from(UNITS))
def test_every_conversion_and_its_inverse_return_the_start(value, start, to):
    there = one(f"{value!r} {start}", to, plant=PLANT)
    back = one(f"{there!r} {to}", start, plant=PLANT)
    assert back == pytest.approx(value, rel=1e-12)


def test_default_and_own_fuel_factor_stand_side_by_side():
    done = convert(["25 ppmvd@15"], "NOx", METHANE, ["lb/MMBtu"], Sample(oxygen_in_air=0.209))
    own, default = done.results
    assert "own Fd" in own.note and "default Fd 8710" in default.note
    assert default.value == pytest.approx(0.0921, abs=6e-5)
    assert own.value / default.value == pytest.approx(8592.0 / 8710.0, rel=1e-3)


def test_hydrogen_has_no_default_factor_and_says_what_ppm_hides():
    done = convert(["25 ppmvd@15"], "NOx", HYDROGEN, ["lb/MMBtu"])
    assert len(done.results) == 1 and done.default is None
    assert any("no default" in note for note in done.notes)
    assert any("1.364 times" in note for note in done.notes)


def test_equal_ppm_is_less_mass_per_heat_on_hydrogen():
    ratio = one("25 ppmvd@15", "g/MJ LHV") / one("25 ppmvd@15", "g/MJ LHV", HYDROGEN)
    assert ratio == pytest.approx(1.365, rel=3e-3)


def test_a_heat_of_no_basis_is_given_on_both():
    done = convert(["25 ppmvd@15"], "NOx", METHANE, ["g/MJ"])
    assert [r.unit for r in done.results][:2] == ["g/MJ LHV", "g/MJ HHV"]
    ratio = done.results[0].value / done.results[1].value
    assert ratio == pytest.approx(1.11, abs=0.005)


def test_wet_target_needs_the_water_and_is_the_inverse_of_drying():
    with pytest.raises(InputError, match="--moisture"):
        one("25 ppmvd@15", "ppmvw@15")
    sample = Sample((0.15,), water=0.07)
    assert one("25", "ppmvw@15", sample=sample) == pytest.approx(25.0 * 0.93, rel=1e-12)


@pytest.mark.parametrize(
    ("values", "to", "sample", "said"),
    [
        (["25"], ["ppmvd@15"], Sample(), "--o2"),
        (["25"], ["ppmvd@15"], Sample((0.14,), "wet", "wet"), "moisture"),
        (["25 ppmvd"], ["ppmvd@15"], Sample((0.14,), "wet", "wet", 0.08), "leave out --wet"),
        (["25", "26"], ["ppmvd@15"], Sample((0.14, 0.141, 0.142)), "one O2 for all"),
        (["25"], ["kg/h"], Sample((0.14,)), "--heat-input"),
        (["25"], ["lb/MWh"], Sample((0.14,)), "--heat-input"),
        (["25"], ["g/kN"], Sample((0.14,)), "landing and take-off"),
        (["25"], ["bar", "mg/m3"], Sample((0.14,)), "at which temperature"),
        (["25 g/MJ"], ["ppmvd@15"], Sample(), "LHV or HHV"),
        (["2.5e-5"], ["ppmvd@15"], Sample((0.14,)), "mole fraction meant"),
        (["-3"], ["ppmvd@15"], Sample((0.14,)), "zero or above"),
        (["a lot"], ["ppmvd@15"], Sample((0.14,)), "not a number"),
        (["25"], ["ppmvd@15"], Sample((0.2095,)), "at or above that of air"),
    ],
)
def test_what_cannot_be_converted_is_refused(values, to, sample, said):
    with pytest.raises(InputError) as refused:
        convert(values, "NOx", METHANE, to, sample)
    assert said in str(refused.value)


def test_iso_day_is_refused_for_lean_premix():
    ambient = AmbientAir(300.0, 100e3, 0.01)
    with pytest.raises(InputError, match="diffusion flames"):
        one("25 ppmvd@15", "ppmvd@15", plant=Plant(ambient=ambient, front_end="lean-premixed"))


def test_a_bare_number_is_ppm_as_sampled():
    assert read_value("43.2", "dry")[1].text == "ppmvd"
    assert read_value("43.2", "wet")[1].text == "ppmvw"
    assert read_value("25 ppmvd@15", "dry")[1].oxygen == 0.15


def test_no_by_itself_is_told_apart_from_nox():
    done = convert(["25 ppmvd@15"], "NO", METHANE, ["mg/Nm3@15"])
    assert done.results[0].value == pytest.approx(33.5, abs=0.05)
    assert any("as NO2" in note for note in done.notes)
