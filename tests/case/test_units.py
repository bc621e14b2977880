"""Units against the primary definitions, and against an independent unit library."""

import math
import re

import pint
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.case import kinds as k
from combustor.case.quantity import Quantity, QuantityError
from combustor.case.text import area, length, vane_angle
from combustor.case.units import SI_UNIT, UNITS, UnitError, find_unit

NIST = "NIST SP 811 appendix B, from memory"


@pytest.mark.parametrize(
    ("text", "value", "half_digit"),
    [
        pytest.param("1 lb/s", 0.45359237, 0.5e-8, id=f"{NIST}: pound"),
        pytest.param("1 lb/h", 1.259979e-4, 0.5e-10, id=f"{NIST}: pound per hour"),
        pytest.param("1 psi", 6.894757e3, 0.5e-3, id=f"{NIST}: psi"),
        pytest.param("1 atm", 1.01325e5, 0.0, id=f"{NIST}: standard atmosphere"),
        pytest.param("1 inHg", 3.386389e3, 0.5e-3, id=f"{NIST}: conventional inch of mercury"),
        pytest.param("1 in", 0.0254, 0.0, id=f"{NIST}: inch"),
        pytest.param("1 mil", 2.54e-5, 0.0, id=f"{NIST}: mil"),
        pytest.param("1 ft", 0.3048, 0.0, id=f"{NIST}: foot"),
        pytest.param("1 in2", 6.4516e-4, 0.0, id=f"{NIST}: square inch"),
        pytest.param("1 hp", 7.456999e2, 0.5e-4, id=f"{NIST}: horsepower 550 ft lbf/s"),
        pytest.param("1 lbf", 4.4482216152605, 0.0, id=f"{NIST}: pound-force"),
        pytest.param("212 degF", 373.15, 1e-12, id=f"{NIST}: boiling water, degF"),
        pytest.param("-40 degF", 233.15, 1e-12, id=f"{NIST}: -40 degF is -40 degC"),
        pytest.param("491.67 degR", 273.15, 1e-12, id=f"{NIST}: ice point, degR"),
        pytest.param("1 Btu/h", 2.930711e-1, 0.5e-7, id=f"{NIST}: Btu (IT) per hour"),
        pytest.param("180 deg", math.pi, 0.0, id="definition: half a turn"),
    ],
)
def test_factor(text: str, value: float, half_digit: float) -> None:
    number, unit = text.split()
    found = find_unit(unit)
    assert float((float(number) + found.offset) * found.factor) == pytest.approx(
        value, abs=max(half_digit, 1e-15 * value), rel=0.0
    )


PINT_SPELLING = {
    "Pas": "Pa*s", "mPas": "mPa*s", "Pa.s": "Pa*s", "mPa.s": "mPa*s", "dyn/cm": "dyne/cm",
    "J/(kg.K)": "J/kg/K", "kJ/(kg.K)": "kJ/kg/K",
    "kPaa": "kPa", "MPaa": "MPa", "bara": "bar", "mbara": "mbar", "psia": "psi", "lbf/in2": "psi",
    "pps": "lb/s", "pph": "lb/h", "kg/hr": "kg/h", "t/hr": "t/h", "lb/hr": "lb/h",
    "lbm/s": "lb/s", "lbm/min": "lb/min", "lbm/h": "lb/h", "lbm/hr": "lb/h",
    "metres": "m", "metre": "m", "thou": "thou", "mil": "thou", "m2": "m**2", "cm2": "cm**2",
    "mm2": "mm**2", "in2": "in**2", "ft2": "ft**2", "hp": "horsepower", "Btu/hr": "Btu/h",
    "MMBtu/h": "MBtu/h", "MMBtu/hr": "MBtu/h", "s-1": "1/s", "sec": "s", "feet": "ft",
    "W/m-K": "W/m/K", "W/(m.K)": "W/m/K", "W/(m*K)": "W/m/K", "W/mK": "W/m/K", "°": "deg",
    "vol%": "percent", "mol%": "percent", "ppmv": "ppm", "ppmvd": "ppm",
    "°C": "degC", "C": "degC", "celsius": "degC", "°F": "degF", "F": "degF",
    "fahrenheit": "degF", "°R": "degR", "R": "degR", "rankine": "degR", "t/h": "metric_ton/h",
}  # fmt: skip


# pint carries the Btu of ISO 31-4 rounded to seven digits, this table the IT Btu itself
ROUNDED_IN_PINT = {"Btu/lb", "Btu/h", "Btu/hr", "MMBtu/h", "MMBtu/hr"}


def powers(name: str) -> str:
    """Return a unit's name with its powers as pint writes them."""
    return re.sub(r"(?<=m)([23])", r"**\1", name)


@pytest.fixture(scope="module")
def registry() -> pint.UnitRegistry:
    return pint.UnitRegistry()


@pytest.mark.parametrize("name", sorted(set(UNITS) - {"ppb"}))  # pint has no ppb
def test_every_unit_agrees_with_pint(name: str, registry: pint.UnitRegistry) -> None:
    unit = UNITS[name]
    si = powers(SI_UNIT[unit.dimension]).replace("Pa.s", "Pa*s") or "dimensionless"
    other = registry.Quantity(7.25, registry.parse_units(PINT_SPELLING.get(name, powers(name))))
    ours = float((7.25 + float(unit.offset)) * float(unit.factor))
    tolerance = 2e-7 if name in ROUNDED_IN_PINT else 1e-12
    assert ours == pytest.approx(other.to(si).magnitude, rel=tolerance, abs=0.0)


@pytest.mark.parametrize(
    "text",
    [
        "barg", "bar g", "bar(g)", "bar (g)", "bar gauge", "bar(gauge)", "bar-g", "psig", "psi g",
        "kPag", "kPa(g)", "MPag", "MPa gauge", "mbarg", "PSIG", "BARG", "atg", "gauge",
    ],
)  # fmt: skip
def test_gauge_units_are_refused_with_the_reason(text: str) -> None:
    with pytest.raises(UnitError) as caught:
        find_unit(text)
    assert "gauge" in caught.value.what
    assert "absolute" in caught.value.allowed


@pytest.mark.parametrize("text", ["bara", "bar(a)", "bar (abs)", "bar abs", "bar absolute"])
def test_absolute_spellings_are_the_plain_unit(text: str) -> None:
    assert find_unit(text) == find_unit("bar")


@pytest.mark.parametrize("text", ["delta_degC", "Δ°C", "delta_degF"])
def test_temperature_differences_are_no_temperatures(text: str) -> None:
    with pytest.raises(UnitError, match="difference"):
        find_unit(text)


def test_million_or_thousand_btu_is_not_guessed() -> None:
    with pytest.raises(UnitError, match="thousand or a million"):
        find_unit("MBtu/h")


@pytest.mark.parametrize("spelling", ["mm^2", "mm**2", "mm²", "sq mm", "mm ^2"])
def test_spellings_of_a_square(spelling: str) -> None:
    assert find_unit(spelling) == find_unit("mm2")


@pytest.mark.parametrize(
    ("kind", "text", "fact"),
    [
        (k.INLET_PRESSURE, "9.8 kg/s", "unit of mass flow"),
        (k.AIR_FLOW, "9.8 bar", "unit of pressure"),
        (k.ENVELOPE, "3 kg", "unit of mass"),
        (k.INLET_TEMPERATURE, "9 mm", "unit of length"),
        (k.PRESSURE_LOSS, "45 mbar", "unit of pressure"),
        (k.ENVELOPE, "3 furlongz", "unknown unit"),
        (k.ENVELOPE, "3,5 mm", "comma"),
        (k.ENVELOPE, "mm", "not a number"),
        (k.ENVELOPE, "", "not a number"),
        (k.ENVELOPE, "3", "no unit"),
        (k.ENVELOPE, "1 2 mm", "unknown unit"),
        (k.ENVELOPE, "9**9**9 m", "unknown unit"),
        (k.ENVELOPE, "3 m**99999999", "unknown unit"),
        (k.ENVELOPE, "3 " + "m" * 100, "not a number"),
        (k.ENVELOPE, "nan mm", "not a finite number"),
        (k.ENVELOPE, "inf mm", "not a finite number"),
        (k.ENVELOPE, "1e999 mm", "absurdly large"),
        (k.ENVELOPE, 10**400, "absurdly large"),
        (k.ENVELOPE, float("nan"), "not a finite number"),
        (k.ENVELOPE, float("inf"), "not a finite number"),
        (k.ENVELOPE, -3.0, "negative"),
        (k.ENVELOPE, "-3 mm", "negative"),
        (k.ENVELOPE, 0.0, "zero"),
        (k.ENVELOPE, 440.0, "bare numbers are m"),
        (k.ENVELOPE, "440 m", "outside the plausible range"),
        (k.ENVELOPE, True, "not a quantity"),
        (k.ENVELOPE, [1.0], "not a quantity"),
        (k.ENVELOPE, None, "not a quantity"),
        (k.PRESSURE_LOSS, 5, "not a fraction"),
        (k.PRESSURE_LOSS, "5", "not a fraction"),
        (k.PRESSURE_LOSS, "95 %", "outside the plausible range"),
        (k.LOAD, 0.8, "percent, or a fraction"),
        (k.INLET_TEMPERATURE, "-300 degC", "negative"),
    ],
)
def test_refusals(kind: Quantity, text: object, fact: str) -> None:
    with pytest.raises(QuantityError) as caught:
        kind.read(text)
    assert fact in caught.value.what


def test_a_bare_percentage_is_answered_with_how_to_write_it() -> None:
    with pytest.raises(QuantityError) as caught:
        k.PRESSURE_LOSS.read(5)
    assert caught.value.allowed == 'write "5 %" or 0.05'


def test_a_misspelt_unit_is_answered_with_the_nearest() -> None:
    with pytest.raises(QuantityError) as caught:
        k.INLET_PRESSURE.read("9.8 Bar")
    assert caught.value.nearest == "bar"


@pytest.mark.parametrize(
    ("kind", "text", "value"),
    [
        (k.INLET_PRESSURE, "9.8 bar", 980000.0),
        (k.INLET_PRESSURE, "9.8bar", 980000.0),
        (k.INLET_PRESSURE, 980000, 980000.0),
        (k.ENVELOPE, "60 mm", 0.06),
        (k.PRESSURE_LOSS, "4.5 %", 0.045),
        (k.PRESSURE_LOSS, 0.045, 0.045),
        (k.INLET_TEMPERATURE, "325 degC", 598.15),
        (k.INLET_TEMPERATURE, "325 °C", 598.15),
        (k.INLET_TEMPERATURE, "325 C", 598.15),
        (k.LOAD, "80 %", 80.0),
        (k.LOAD, 80, 80.0),
        (k.LOAD, 0, 0.0),
        (k.HUMIDITY, "6.34 g/kg", 0.00634),
        (k.CONCENTRATION, "25 ppm", 25e-6),
        (k.VANE_ANGLE, "45 deg", math.pi / 4),
        (k.CONDUCTIVITY, "15 Btu/h/ft/degF", 25.961),
    ],
)
def test_readings(kind: Quantity, text: object, value: float) -> None:
    assert kind.read(text) == pytest.approx(value, rel=1e-5 if "Btu" in str(text) else 0.0, abs=0.0)


@settings(derandomize=True, max_examples=200, deadline=None)
@given(st.floats(1e-4, 30.0))
def test_a_written_length_reads_back(value: float) -> None:
    assert k.DIAMETER.read(length(value)) == pytest.approx(value, rel=2e-15, abs=0.0)
    assert k.DIAMETER.read(length(value, "um")) == pytest.approx(value, rel=2e-15, abs=0.0)


@settings(derandomize=True, max_examples=200, deadline=None)
@given(st.floats(1e-10, 1e3))
def test_a_written_area_reads_back(value: float) -> None:
    assert k.AREA.read(area(value)) == pytest.approx(value, rel=2e-15, abs=0.0)


@settings(derandomize=True, max_examples=200, deadline=None)
@given(st.integers(1, 30_000_000))
def test_a_length_in_whole_micrometres_reads_back_to_the_last_bit(micrometres: int) -> None:
    value = float(f"{micrometres}e-6")
    assert k.STATION.read(length(value)) == value
    assert len(length(value)) <= len("30000.000 mm")


def test_the_noise_of_arithmetic_is_not_written() -> None:
    assert length(0.0315 * 1.1 / 1.1 * 0.3 / 0.3) == "31.5 mm"
    assert length(0.031499999999999986) == "31.5 mm"
    assert length(0.1 + 0.2) == "300 mm"


@settings(derandomize=True, max_examples=200, deadline=None)
@given(st.floats(0.0, 1.48))
def test_a_written_angle_reads_back_to_the_last_bit(value: float) -> None:
    assert k.VANE_ANGLE.read(vane_angle(value)) == value


@settings(derandomize=True, max_examples=300, deadline=None)
@given(st.one_of(st.text(), st.from_regex(r"[0-9.e+-]{1,8} ?[a-zA-Z°%/*^()]{0,8}", fullmatch=True)))
def test_no_text_breaks_a_quantity(text: str) -> None:
    for kind in (k.INLET_PRESSURE, k.INLET_TEMPERATURE, k.PRESSURE_LOSS, k.LOAD):
        try:
            value = kind.read(text)
        except QuantityError as error:
            assert error.what
        else:
            assert kind.low <= value <= kind.high
