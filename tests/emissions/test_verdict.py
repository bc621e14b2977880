"""Verdicts: band, rounding, limits that depend on facts, and what a missing fact does."""

from __future__ import annotations

from dataclasses import replace
from math import exp

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.emissions.applicability import rows_binding
from combustor.emissions.band import COVERAGE, INTERIM_SCATTER, Band, band_of
from combustor.emissions.facts import Facts
from combustor.emissions.limit import FuelOfLimit, judged, limit_of, rounded
from combustor.emissions.reference_day import AmbientAir
from combustor.emissions.rule_schema import Rounding
from combustor.emissions.rule_set import RuleSet, loads_rules, shipped
from combustor.emissions.stack import FactMissing, Stack
from combustor.emissions.verdict import CONFIRMED, Subject, Verdict, verdict_on
from combustor.fuel import catalogue

SETTINGS = settings(derandomize=True, max_examples=60, deadline=None)
METHANE = FuelOfLimit({"C": 1.0, "H": 4.0}, 802.69e3)
HYDROGEN = FuelOfLimit({"H": 2.0}, 241.72e3)
FUEL = catalogue.find("methane")


def stack(nox_ppm=30.0, **changes):
    """A methane exhaust at 15 % O2 dry or so: 50 kg gas a kg fuel."""
    made = Stack(
        wet={
            "NO": 0.9e-6 * nox_ppm,
            "NO2": 0.1e-6 * nox_ppm,
            "CO": 10e-6,
            "UHC": 1e-6,
            "O2": 0.14,
            "H2O": 0.07,
            "CO2": 0.033,
        },
        gas_flow=50.0,
        fuel_flow=1.0,
        molar_mass=28.5e-3,
        lower_heating_value=FUEL.lower_heating_value,
        higher_heating_value=FUEL.higher_heating_value,
        output=18e6,
        hours=4000.0,
        fuel_sulfur=None,
    )
    return replace(made, **changes)


def rule_text(limits, head=""):
    return f"""
title = "t"
jurisdiction = "j"
reference = "r"
edition = "e"
date = 2020-01-01
review = 2030-01-01
applies_to = "a"
oxygen_in_air = 0.209
heating_value = "LHV"
{head}
{limits}
"""


def row_text(**keys):
    keys = {
        "row": "x",
        "pollutant": "NOx",
        "limit": 50,
        "unit": "ppmvd@15",
        "reading": "own permit",
        "read_in": "4.1",
        **keys,
    }
    lines = []
    for key, value in keys.items():
        shown = f'"{value}"' if isinstance(value, str) and value[:1] not in "[{" else value
        lines.append(f"{key} = {shown}")
    return "[[limits]]\n" + "\n".join(lines)


def rules(*rows):
    return RuleSet("own", loads_rules(rule_text("\n".join(rows))), own=True)


def verdict(rule_set, known=None, exhaust=None, confirmed=frozenset(), fuel=METHANE, **subject):
    known = known or Facts({"load": 100.0})
    made = Subject("full", exhaust or stack(), known, fuel, **subject)
    (binding,) = rows_binding(rule_set, known)
    return verdict_on(rule_set, binding, made, confirmed)


def test_the_three_words():
    """Predicted about 35 ppmvd@15: band 20 to 62 with ln scatter 0.35."""
    words = [verdict(rules(row_text(limit=limit))).verdict for limit in (15, 36, 80)]
    assert words == ["outside", "too close to call", "inside"]


def test_numbers_of_a_verdict():
    found = verdict(rules(row_text(limit=80, rounding="{ decimals = 0 }")))
    dry, oxygen = 30.0 / 0.93, 14.0 / 0.93
    expected = dry * (20.9 - 15.0) / (20.9 - oxygen)
    assert found.predicted == pytest.approx(expected, rel=1e-12)
    assert found.predicted_rounded == round(expected)
    assert found.band_high == pytest.approx(expected * exp(1.6448536 * 0.35), rel=1e-6)
    assert found.margin == pytest.approx(80.0 - expected)
    assert found.margin_percent == pytest.approx(100.0 * (80.0 - expected) / 80.0)
    assert 0.0 < found.probability_of_exceeding < 0.05


@pytest.mark.parametrize("unit", ["lb/MWh", "g/kWh", "t/yr", "g/kN"])
def test_a_unit_that_needs_a_fact_is_undecided_with_the_fact_named(unit):
    fact = {"lb/MWh": "output", "g/kWh": "output", "t/yr": "hours", "g/kN": "rated thrust"}[unit]
    bare = stack(output=None, hours=None)
    found = verdict(rules(row_text(unit=unit)), exhaust=bare)
    assert found.verdict == "undecided"
    assert fact in found.reason and found.missing


def test_sulfur_and_what_is_not_predicted_are_never_skipped():
    for pollutant, said in (
        ("SO2", "fuel_sulfur"),
        ("dust", "not predicted"),
        ("N2O", "mechanism"),
    ):
        found = verdict(rules(row_text(pollutant=pollutant)))
        assert found.verdict == "undecided" and said in found.reason


def test_units_agree_with_each_other():
    made = stack()
    value = {
        u: verdict(rules(row_text(unit=u))).predicted
        for u in (
            "g/kg",
            "g/MJ LHV",
            "ng/J HHV",
            "lb/MMBtu HHV",
            "ng/J output",
            "lb/MWh",
            "kg/h",
            "t/yr",
            "mg/Nm3@15",
            "ppmvd@15",
        )
    }
    assert value["g/MJ LHV"] == pytest.approx(value["g/kg"] / (FUEL.lower_heating_value * 1e-6))
    assert value["ng/J HHV"] == pytest.approx(
        1e3 * value["g/MJ LHV"] * FUEL.lower_heating_value / FUEL.higher_heating_value
    )
    assert value["ng/J HHV"] / value["lb/MMBtu HHV"] == pytest.approx(429.92, abs=0.005)
    assert value["ng/J output"] / value["lb/MWh"] == pytest.approx(126.0, abs=0.005)
    assert value["kg/h"] == pytest.approx(3.6 * value["g/kg"] * made.fuel_flow)
    assert value["t/yr"] == pytest.approx(4.0 * value["kg/h"])
    assert value["mg/Nm3@15"] / value["ppmvd@15"] == pytest.approx(2.0525, abs=5e-5)


def test_a_heat_of_no_basis_takes_that_of_the_rule_set():
    bare = verdict(rules(row_text(unit="g/MJ"))).predicted
    assert bare == verdict(rules(row_text(unit="g/MJ LHV"))).predicted


MEMORY = {"reading": "from memory", "read_in": "from memory"}


@pytest.mark.parametrize(("limit", "would_be"), [(500, "inside"), (5, "outside")])
def test_a_figure_from_memory_gives_no_verdict_before_it_is_confirmed(limit, would_be):
    rule_set = rules(row_text(limit=limit, **MEMORY))
    found = verdict(rule_set)
    assert found.verdict == "limit not verified"
    assert (found.would_be, found.limit_status) == (would_be, "from memory")
    assert f"would be {would_be}" in found.reason and "own/x" in found.reason
    found = verdict(rule_set, confirmed=frozenset({"own/x"}))
    assert (found.verdict, found.limit_status) == (would_be, CONFIRMED)


def test_a_figure_of_an_older_edition_is_not_verified_either():
    old = rules(row_text(limit=500, reading="older edition", read_in="edition of 2013"))
    found = verdict(old)
    assert found.verdict == "limit not verified" and "older edition" in found.reason
    copied = rules(row_text(limit=500, reading="copy", read_in="a copy"))
    assert verdict(copied).verdict == "inside"


def test_a_missing_fact_shows_what_it_would_be():
    rule_set = rules(row_text(limit=500, when='[{ load = { above = "70 %" } }]'))
    found = verdict(rule_set, Facts({}))
    assert found.verdict == "undecided"
    assert found.missing == ("load",) and "would be inside" in found.reason


def test_inside_is_withheld_where_the_row_rests_on_a_derived_fact():
    rule_set = rules(row_text(limit=500, when='[{ heat_input = { up_to = "50 MW" } }]'))
    derived = Facts({}, 11e6, "LHV", 1.11, {"heat_input": "11 MW of point full"})
    found = verdict(rule_set, derived)
    assert found.verdict == "undecided" and found.missing == ("heat_input",)
    assert "11 MW of point full" in found.reason
    assert verdict(rule_set, Facts({}, 11e6, "LHV", 1.11)).verdict == "inside"
    tight = rules(row_text(limit=5, when='[{ heat_input = { up_to = "50 MW" } }]'))
    assert verdict(tight, derived).verdict == "outside"


def test_no_result_is_undecided():
    known = Facts({"load": 100.0})
    rule_set = rules(row_text())
    (binding,) = rows_binding(rule_set, known)
    blown = Subject("idle", None, known, METHANE, no_result="no result at this point: blown out")
    found = verdict_on(rule_set, binding, blown)
    assert found.verdict == "undecided" and "blown out" in found.reason


def test_oxygen_above_20_percent_is_undecided():
    lean = stack(wet={**stack().wet, "O2": 0.199, "H2O": 0.01})
    found = verdict(rules(row_text()), exhaust=lean)
    assert found.verdict == "undecided" and "20 %" in found.reason


def test_a_hydrogen_blend_says_what_its_ppm_hides():
    known = Facts({"load": 100.0, "hydrogen_share": 1.0})
    found = verdict(rules(row_text()), known, fuel=HYDROGEN)
    assert "1.364 times" in found.beside and "g/MJ LHV" in found.beside
    assert verdict(rules(row_text(unit="g/MJ LHV")), known, fuel=HYDROGEN).beside == ""
    assert verdict(rules(row_text())).beside == ""


class TestIsoDay:
    rule_set = rules(row_text(limit=500, ambient_correction="diffusion-flame"))
    hot = AmbientAir(308.15, 100e3, 0.012)

    def test_it_is_applied(self):
        plain = verdict(rules(row_text(limit=500))).predicted
        found = verdict(self.rule_set, ambient=self.hot).predicted
        expected = (101.3 / 100.0) ** 0.5 * exp(19 * (0.012 - 0.00633)) * (288.0 / 308.15) ** 1.53
        assert found / plain == pytest.approx(expected, rel=1e-12)

    def test_it_is_refused_for_lean_premix_with_the_reason(self):
        found = verdict(self.rule_set, ambient=self.hot, front_end="lean-premixed")
        assert found.verdict == "undecided" and "diffusion flames" in found.reason

    def test_it_needs_the_ambient_air(self):
        found = verdict(self.rule_set)
        assert found.verdict == "undecided" and "ambient_temperature" in found.reason


class TestLimits:
    def test_efficiency_raises_a_limit_up_to_its_cap(self):
        row = shipped("de-13-bimschv").row("nox-daily-simple-cycle")
        for efficiency, limit in ((0.35, 50.0), (0.42, 60.0), (0.60, 75.0)):
            assert limit_of(row, Facts({"efficiency": efficiency}), METHANE) == pytest.approx(limit)

    def test_the_1979_rule_by_heat_rate_and_fuel_nitrogen(self):
        """0.0075 x 14.4/Y + F, Y = 11 kJ/Wh, 0.05 % nitrogen: F = 0.04 x 0.05."""
        row = shipped("us-40cfr60-gg").row("electric-utility-above-107GJ")
        known = Facts({"efficiency": 3.6 / 11.0, "fuel_nitrogen": 0.0005})
        expected = 0.0075 * 14.4 / 11.0 + 0.04 * 0.05
        assert limit_of(row, known, METHANE) == pytest.approx(expected, rel=1e-12)
        poor = Facts({"efficiency": 0.20, "fuel_nitrogen": 0.0})
        assert limit_of(row, poor, METHANE) == pytest.approx(0.0075)

    @pytest.mark.parametrize(
        ("nitrogen", "allowance"),
        [(0.01, 0.0), (0.1, 0.004), (0.2, 0.00467), (0.25, 0.005005), (0.3, 0.005)],
    )
    def test_nitrogen_allowance(self, nitrogen, allowance):
        row = shipped("us-40cfr60-gg").row("other-or-below-107GJ")
        known = Facts({"efficiency": 0.25, "fuel_nitrogen": nitrogen / 100.0})
        assert limit_of(row, known, METHANE) - 0.015 == pytest.approx(allowance, abs=1e-9)

    def test_a_limit_that_lacks_its_fact_names_it(self):
        row = shipped("us-40cfr60-gg").row("other-or-below-107GJ")
        with pytest.raises(FactMissing) as lack:
            limit_of(row, Facts({}), METHANE)
        assert lack.value.fact == "efficiency"

    def test_prorating_by_heat(self):
        rule_set = shipped("us-40cfr60-kkkk")
        row, other = rule_set.row("new-gas-850-ppm"), rule_set.row("new-other-850-ppm")
        found = limit_of(row, Facts({}), METHANE, other, 0.6)
        assert found == pytest.approx(0.6 * 25.0 + 0.4 * 74.0)

    def test_hydrogen_raises_the_british_limit(self):
        row = shipped("uk-hydrogen").row("new-nox-1-to-50MW")
        assert limit_of(row, Facts({}), HYDROGEN) == pytest.approx(68.5, abs=0.05)
        assert limit_of(row, Facts({}), METHANE) == pytest.approx(50.0)

    def test_the_characteristic_level_of_one_engine(self):
        rule_set = RuleSet("a", replace_rows("hc"))
        exhaust = stack(per_thrust={"UHC": 10e-6})
        known = Facts({"rated_thrust": 1e5, "pressure_ratio": 30.0, "type_date": None})
        row = rule_set.table.limits[0]
        from combustor.emissions.applicability import Binding
        from combustor.emissions.facts import YES

        subject = Subject("cycle", exhaust, known, METHANE)
        missing = verdict_on(rule_set, Binding(row, YES), subject)
        assert missing.missing == ("engines_tested",) and missing.verdict == "undecided"
        subject = replace(subject, facts=known.at(engines_tested=1))
        found = verdict_on(rule_set, Binding(row, YES), subject)
        assert found.predicted == pytest.approx(10.0 / 0.6493)


def replace_rows(*names):
    table = shipped("icao-annex-16").table
    rows = tuple(row for row in table.limits if row.row in names)
    return table.model_copy(update={"limits": rows})


@pytest.mark.parametrize(
    ("value", "rounding", "expected"),
    [
        (24.5, {"decimals": 0}, 24.0),
        (25.5, {"decimals": 0}, 26.0),
        (24.5001, {"decimals": 0}, 25.0),
        (1234.0, {"figures": 2}, 1200.0),
        (0.01749, {"figures": 2}, 0.017),
        (56.44, {"figures": 3, "decimals_above": 100.0}, 56.4),
        (123.44, {"figures": 3, "decimals_above": 100.0}, 123.4),
        (24.7, {}, 24.7),
    ],
)
def test_rounding_half_to_even(value, rounding, expected):
    assert rounded(value, Rounding(**rounding)) == expected


def test_rounding_comes_after_the_band_and_cannot_rescue_it():
    band = Band(25.4, 25.39, 25.41, 1e-4)
    assert rounded(25.4, Rounding(decimals=0)) == 25.0
    assert judged(band, 25.0, Rounding(decimals=0)) == "outside"


@SETTINGS
@given(value=st.floats(1e-3, 1e3), limit=st.floats(1e-3, 1e3), scatter=st.floats(0.02, 1.5))
def test_probability_and_band_say_the_same(value, limit, scatter):
    band = band_of(value, "NOx", {"NOx": scatter})
    chance = band.probability_above(limit)
    if band.high < limit:
        assert chance < 0.5 * (1.0 - COVERAGE) + 1e-9
    if band.low > limit:
        assert chance > 0.5 * (1.0 + COVERAGE) - 1e-9
    assert band.probability_above(value) == pytest.approx(0.5)


def test_the_interim_band_is_in_one_place_and_marked():
    from combustor.emissions.band import SCATTER

    assert SCATTER.reading == "judgement" and "not calibrated" in SCATTER.source
    assert band_of(10.0, "CO").scatter == INTERIM_SCATTER["CO"]
    assert band_of(10.0, "CO", {"CO": 0.2}).scatter == 0.2


FACTS = {
    "load": 60.0,
    "use": "electric",
    "unit_state": "new",
    "site": "continental",
    "ambient_temperature": 270.0,
    "efficiency": 0.4,
    "fuel": "natural-gas",
    "rated_output": 9e6,
}
ROWS = (
    row_text(row="a", limit=10, when='[{ load = { above = "50 %" } }]'),
    row_text(row="b", limit=300, when='[{ load = { up_to = "50 %" } }, { site = ["arctic"] }]'),
    row_text(row="c", limit=10, scale='{ reference = "35 %" }', when='[{ use = ["electric"] }]'),
    row_text(row="d", limit=900, unit="g/kWh", when='[{ unit_state = ["existing"] }]'),
    row_text(row="e", limit=0.001, unit="g/kWh"),
    row_text(
        row="f", limit=1, when='[{ fuel = ["natural-gas"], heat_input = { up_to = "50 MW" } }]'
    ),
    row_text(row="g", limit=900, when='[{ heat_input = { above = "50 MW" } }]'),
    row_text(row="h", limit=1, ambient_correction="diffusion-flame"),
)


def all_verdicts(rule_set, known, exhaust, ambient):
    subject = Subject("full", exhaust, known, METHANE, ambient=ambient)
    return {
        b.row.row: verdict_on(rule_set, b, subject).verdict
        for b in rows_binding(rule_set, known)
        if b.answer.holds is not False
    }


@SETTINGS
@given(
    removed=st.sets(
        st.sampled_from([*FACTS, "heat_input", "heat_input_basis", "output", "ambient"])
    ),
    nox=st.floats(0.05, 2000.0),
    heat=st.sampled_from([11e6, 48e6, 52e6, 300e6]),
)
def test_removing_a_fact_never_turns_outside_into_inside(removed, nox, heat):
    rule_set = rules(*ROWS)
    full = Facts(FACTS, heat, "LHV", 1.11)
    air = AmbientAir(270.0, 101e3, 0.003)
    before = all_verdicts(rule_set, full, stack(nox), air)
    values = {k: v for k, v in FACTS.items() if k not in removed}
    derived = {}
    kept_heat, basis = heat, None if "heat_input_basis" in removed else "LHV"
    if "heat_input" in removed:
        # then it is taken from the case, and may be smaller than what was stated
        kept_heat, basis, derived = 11e6, "LHV", {"heat_input": "fuel heat of a point"}
    less = Facts(values, kept_heat, basis, 1.11, derived)
    exhaust = stack(nox, output=None if "output" in removed else 18e6)
    after = all_verdicts(rule_set, less, exhaust, None if "ambient" in removed else air)
    for row, word in after.items():
        if word == "inside":
            assert before.get(row) == "inside"


def test_verdict_words_hold_no_approval():
    words = Verdict.__annotations__["verdict"], *("approved", "certified", "compliant")
    from combustor.report.permit_theme import WORDS

    assert not any(word in text for text in WORDS.values() for word in words[1:])
