"""Which rows bind: size, fuel, load and place as the rule words them, and facts missing."""

from __future__ import annotations

from datetime import date

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.emissions.applicability import rows_binding, set_binds
from combustor.emissions.emission_unit import BTU
from combustor.emissions.facts import Answer, Facts, every, negated, some
from combustor.emissions.fuel_class import standing
from combustor.emissions.rule_set import shipped
from combustor.fuel import catalogue

MMBTU_PER_HOUR = 1e6 * BTU / 3600.0
KKKK = {
    "use": "electric",
    "unit_state": "new",
    "fuel": "natural-gas",
    "site": "continental",
    "built": date(2015, 6, 1),
    "rated_output": 20e6,
    "load": 100.0,
    "ambient_temperature": 288.15,
}


def facts(heat=40 * MMBTU_PER_HOUR, basis="HHV", ratio=1.11, share=1.0, **values):
    known = {k: v for k, v in {**KKKK, **values}.items() if v is not None}
    return Facts(known, heat, basis, ratio, {}, share)


def binding(rule, known, pollutant="NOx"):
    rules = shipped(rule)
    return {b.row.row: b for b in rows_binding(rules, known) if b.row.pollutant == pollutant}


def rows_that_bind(rule, known, pollutant="NOx"):
    return {n for n, b in binding(rule, known, pollutant).items() if b.answer.holds}


def families(rule, known):
    return {shipped(rule).row(name).choice or name for name in rows_that_bind(rule, known)}


@pytest.mark.parametrize(
    ("values", "family"),
    [
        ({}, "new-gas-electric-50"),
        ({"use": "heat-and-power"}, "new-gas-electric-50"),
        ({"use": "mechanical-drive"}, "new-gas-mechanical-50"),
        ({"heat": 50.0 * MMBTU_PER_HOUR}, "new-gas-electric-50"),
        ({"heat": 50.01 * MMBTU_PER_HOUR}, "new-gas-850"),
        ({"heat": 850.01 * MMBTU_PER_HOUR}, "gas-above-850"),
        ({"fuel": "gas-oil", "share": 0.0}, "new-other-electric-50"),
        ({"unit_state": "modified"}, "modified-50"),
        ({"load": 74.9}, "relaxed-30MW"),
        ({"load": 75.0}, "new-gas-electric-50"),
        ({"load": 60.0, "rated_output": 30.1e6}, "relaxed-above-30MW"),
        ({"ambient_temperature": 255.0}, "relaxed-30MW"),
        ({"site": "arctic"}, "relaxed-30MW"),
        ({"site": "offshore"}, "new-gas-electric-50"),
        ({"site": "offshore", "unit_state": "modified"}, "relaxed-30MW"),
    ],
    ids=str,
)
def test_one_family_of_rows_of_the_2006_rule_binds(values, family):
    known = facts(**values)
    assert set_binds(shipped("us-40cfr60-kkkk"), known).holds
    assert families("us-40cfr60-kkkk", known) == {family}


def test_heat_input_is_taken_on_the_heating_value_of_the_rule():
    # 46 MMBtu/h on LHV are 51 on HHV: above the 50 of the rule
    lower = facts(heat=46 * MMBTU_PER_HOUR, basis="LHV", ratio=1.11)
    assert families("us-40cfr60-kkkk", lower) == {"new-gas-850"}
    as_higher = facts(heat=46 * MMBTU_PER_HOUR, basis="HHV")
    assert families("us-40cfr60-kkkk", as_higher) == {"new-gas-electric-50"}


def test_a_heat_input_of_unknown_basis_matters_only_near_a_threshold():
    near = binding("us-40cfr60-kkkk", facts(heat=46 * MMBTU_PER_HOUR, basis=None))
    assert near["new-gas-850-ppm"].answer.missing == {"heat_input_basis"}
    far = facts(heat=30 * MMBTU_PER_HOUR, basis=None)
    assert families("us-40cfr60-kkkk", far) == {"new-gas-electric-50"}


def test_emergency_turbines_are_exempt_from_nox_only():
    known = facts(duty="emergency", fuel_sulfur=1e-5)
    assert rows_that_bind("us-40cfr60-kkkk", known) == set()
    assert len(rows_that_bind("us-40cfr60-kkkk", known, "SO2")) == 4


@pytest.mark.parametrize(
    ("values", "holds"),
    [
        ({"built": date(2005, 2, 18)}, False),
        ({"built": date(2005, 2, 19)}, True),
        ({"built": date(2024, 12, 14)}, False),
        ({"heat": 9.9 * MMBTU_PER_HOUR}, False),
        ({"use": "aircraft"}, False),
        ({"country": "DE"}, False),
        ({"country": "US"}, True),
        ({"built": None}, None),
        ({"built": None, "use": "aircraft"}, False),
    ],
    ids=str,
)
def test_whether_the_2006_rule_applies_at_all(values, holds):
    assert set_binds(shipped("us-40cfr60-kkkk"), facts(**values)).holds is holds


def test_missing_facts_are_named_and_only_those_that_matter():
    found = binding("us-40cfr60-kkkk", facts(load=None, site=None))
    assert found["new-gas-electric-50-ppm"].answer.missing == {"load", "site"}
    assert found["new-gas-850-ppm"].answer.holds is False


@pytest.mark.parametrize(
    ("share", "row", "prorated"),
    [
        (1.0, "new-gas-electric-50-ppm", None),
        (0.6, "new-gas-electric-50-ppm", 0.6),
        (0.5, "new-other-electric-50-ppm", None),
        (0.2, "new-other-electric-50-ppm", None),
    ],
)
def test_mixed_fuels(share, row, prorated):
    known = facts(fuel="natural-gas" if share == 1.0 else "other-gas", share=share)
    found = binding("us-40cfr60-kkkk", known)
    assert {n for n, b in found.items() if b.answer.holds and n.endswith("ppm")} == {row}
    assert found[row].natural_gas_share == prorated


EU = {"use": "electric", "permitted": date(2020, 1, 1), "cycle": "simple", "fuel": "natural-gas"}


@pytest.mark.parametrize(
    ("load", "rows"),
    [(70.0, set()), (70.1, {"new-gas-nox-simple-cycle"})],
)
def test_european_limits_hold_above_70_percent_load_only(load, rows):
    known = Facts({**EU, "load": load, "efficiency": 0.38}, 100e6, "LHV")
    assert set_binds(shipped("eu-2010-75-annex-v"), known).holds
    assert rows_that_bind("eu-2010-75-annex-v", known) == rows


@pytest.mark.parametrize(
    ("megawatt", "medium", "large"), [(0.9, False, False), (49.9, True, False), (50.0, False, True)]
)
def test_plant_size_parts_the_two_directives(megawatt, medium, large):
    known = Facts(EU, megawatt * 1e6, "LHV")
    assert set_binds(shipped("eu-2015-2193"), known).holds is medium
    assert set_binds(shipped("eu-2010-75-annex-v"), known).holds is large


def test_aircraft_tier_follows_the_date_and_the_engine():
    engine = {"use": "aircraft", "rated_thrust": 120e3, "pressure_ratio": 35.0}
    for year, row in (
        (1998, "caep2-nox"),
        (2005, "caep4-nox-large-high"),
        (2010, "caep6-nox-large-high"),
        (2016, "caep8-nox-large-high"),
    ):
        known = Facts({**engine, "type_date": date(year, 6, 1)})
        assert rows_that_bind("icao-annex-16", known) == {row}
    small = Facts({**engine, "rated_thrust": 26.7e3})
    assert set_binds(shipped("icao-annex-16"), small).holds is False


@pytest.mark.parametrize(
    ("name", "fuel_class", "share"),
    [
        ("natural-gas", "natural-gas", 1.0),
        ("methane", "natural-gas", 1.0),
        ("propane", "other-gas", 0.0),
        ("hydrogen", "other-gas", 0.0),
        ("methane+30%hydrogen", "other-gas", 0.886),
        ("methane+50%hydrogen", "other-gas", 0.768),
        ("methane+1%hydrogen", "natural-gas", 0.997),
        ("methanol", "other-liquid", 0.0),
    ],
)
def test_fuel_class(name, fuel_class, share):
    fuel = catalogue.find(name)
    found = standing(fuel.name, fuel.phase, fuel.composition)
    assert found.fuel_class == fuel_class
    assert found.natural_gas_share == pytest.approx(share, abs=6e-4)


ANSWERS = st.lists(
    st.sampled_from(
        [
            Answer(True, used=frozenset({"a"})),
            Answer(False, used=frozenset({"b"}), why_not=("b is not",)),
            Answer(None, frozenset({"c"})),
        ]
    ),
    min_size=1,
    max_size=5,
)


@settings(derandomize=True, max_examples=60, deadline=None)
@given(ANSWERS)
def test_three_valued_logic(answers):
    values = [answer.holds for answer in answers]
    all_of, one_of = every(answers).holds, some(answers).holds
    assert all_of is (False if False in values else None if None in values else True)
    assert one_of is (True if True in values else None if None in values else False)
    assert negated(every(answers), "").holds is (None if all_of is None else not all_of)
