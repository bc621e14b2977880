"""Rule files: those shipped hold what they should, and wrong ones are refused line by line."""

from __future__ import annotations

from datetime import date

import pytest

from combustor.base.errors import InputError
from combustor.emissions.emission_unit import read_unit
from combustor.emissions.rule_set import find_rules, loads_rules, names, shipped
from combustor.emissions.rule_template import template

VALID = template("permit.toml")
SHIPPED = (
    "de-13-bimschv",
    "de-44-bimschv",
    "eu-2010-75-annex-v",
    "eu-2015-2193",
    "icao-annex-16",
    "uk-hydrogen",
    "us-40cfr60-gg",
    "us-40cfr60-kkkk",
    "us-40cfr60-kkkka",
)


def test_the_shipped_sets():
    assert names() == SHIPPED


@pytest.mark.parametrize("name", SHIPPED)
def test_every_figure_says_where_it_was_read(name):
    table = shipped(name).table
    assert table.limits and table.review > table.date
    for row in table.limits:
        assert row.read_in
        assert row.emission_unit.factor > 0.0
        if "from memory" in row.read_in and "copy" not in row.read_in:
            memory_of_something_else = ("averaging from memory",)
            told = any(words in row.read_in for words in memory_of_something_else)
            assert row.reading == "from memory" or told


@pytest.mark.parametrize(
    ("name", "in_air", "heat"),
    [
        ("us-40cfr60-kkkk", 0.209, "HHV"),
        ("us-40cfr60-kkkka", 0.209, "HHV"),
        ("us-40cfr60-gg", 0.209, "LHV"),
        ("eu-2015-2193", 0.21, "LHV"),
        ("icao-annex-16", 0.2095, "LHV"),
    ],
)
def test_each_set_states_its_own_constants(name, in_air, heat):
    table = shipped(name).table
    assert (table.oxygen_in_air, table.heating_value) == (in_air, heat)


def rounded_interval(value, decimals=None, figures=None):
    if decimals is None:
        from math import floor, log10

        decimals = figures - 1 - floor(log10(value))
    half = 0.5 * 10.0**-decimals
    return value - half, value + half


def test_limits_per_output_agree_in_both_units_within_rounding():
    """40 CFR 60 subpart KKKK, table 1: ng/J is lb/MWh x 126.0 in every pair."""
    rows = {row.row: row for row in shipped("us-40cfr60-kkkk").table.limits}
    pairs = [name.removesuffix("-lb-per-MWh") for name in rows if name.endswith("-lb-per-MWh")]
    assert len(pairs) == 15
    for pair in pairs:
        tail = "-ng-per-J" if f"{pair}-ng-per-J" in rows else "-ng-per-J-output"
        metric, pounds = rows[f"{pair}{tail}"], rows[f"{pair}-lb-per-MWh"]
        factor = read_unit("lb/MWh").factor / read_unit("ng/J output").factor
        low, high = rounded_interval(pounds.limit, pounds.rounding.decimals)
        metric_low, metric_high = rounded_interval(metric.limit, figures=2)
        assert metric_low <= high * factor and low * factor <= metric_high, pair


@pytest.mark.parametrize(
    ("row", "limit"),
    [
        ("new-gas-electric-50", 42),
        ("new-gas-mechanical-50", 100),
        ("new-gas-850", 25),
        ("gas-above-850", 15),
        ("new-other-electric-50", 96),
        ("new-other-mechanical-50", 150),
        ("new-other-850", 74),
        ("other-above-850", 42),
        ("modified-50", 150),
        ("modified-gas-850", 42),
        ("modified-other-850", 96),
        ("relaxed-30MW", 150),
        ("relaxed-above-30MW", 96),
    ],
    ids=lambda v: f"{v}, KKKK table 1" if isinstance(v, str) else "",
)
def test_the_concentrations_of_the_2006_rule(row, limit):
    found = shipped("us-40cfr60-kkkk").row(f"{row}-ppm")
    assert (found.limit, found.unit, found.reading) == (limit, "ppmvd@15", "from memory")


def test_what_is_not_firm_in_the_2026_rule_is_left_out_and_said():
    table = shipped("us-40cfr60-kkkka").table
    nox = [row for row in table.limits if row.pollutant == "NOx"]
    assert [row.row for row in nox] == ["temporary-850"]
    assert any("table 1" in text for text in table.left_out)


def test_the_template_is_a_rule_file():
    table = loads_rules(VALID, "permit.toml")
    assert [row.row for row in table.limits] == ["nox", "co"]
    assert loads_rules(template("kkkka.toml", "us-40cfr60-kkkka")).title.startswith("Stationary")


@pytest.mark.parametrize(
    ("old", "new", "line", "said"),
    [
        ("jurisdiction =", "jurisdictoin =", 4, "did you mean 'jurisdiction'"),
        ('"20.9 %"', "20.9", 10, '"20.9 %"'),
        ('"LHV" ', '"lower"', 12, "LHV, HHV"),
        ("date = 2025-01-01", "date = 2031-01-01", 8, "review date lies before"),
        ("date = 2025-01-01", 'date = "soon"', 7, "not a day"),
        ('pollutant = "NOx"', 'pollutant = "NOX"', 18, "no such pollutant"),
        ("limit = 50", "limit = -50", 19, "above zero"),
        ("limit = 50", "limit = nan", 19, "not a number"),
        ("limit = 50", 'limit = "50 mg"', 19, "bare number in the row's own unit"),
        ('unit = "mg/Nm3@15"', 'unit = "mg/m3"', 20, "at which temperature"),
        ('"70 %"', '"70 MW"', 21, "unit of power"),
        ('"70 %"', "0.7", 21, "in percent, or a fraction?"),
        ('reading = "own permit"          #', 'reading = "heard"  #', 24, "from memory"),
        ('row = "co"', 'row = "nox"', 28, "two rows have this name"),
        ('row = "co"', 'row = "co/x"', 28, "letters, digits"),
        ("limit = 100", "", 27, "one of limit and terms"),
        ("limit = 100", 'limit = 100\ngiven = "cold"', 31, "no such condition"),
        ("limit = 100", 'limit = 100\nprorate_with = "x"', 31, "no such row"),
        ('title = "Permit of my machine"', "", None, "title: missing; add title = ..."),
    ],
)
def test_wrong_files_are_refused_with_their_line(old, new, line, said):
    assert old in VALID
    with pytest.raises(InputError) as refused:
        loads_rules(VALID.replace(old, new, 1), "permit.toml")
    text = str(refused.value)
    assert said in text
    place = f"permit.toml:{line}: " if line is not None else "permit.toml: "
    assert place in text


def test_every_problem_is_named_at_once():
    wrong = VALID.replace("limit = 50", "limit = 0").replace('"LHV"', '"x"').replace("NOx", "Nox")
    with pytest.raises(InputError) as refused:
        loads_rules(wrong)
    assert len(refused.value.problems) == 3


@pytest.mark.parametrize("text", ["", "[", "x", "limits = 3", 'limits = ["a"]', "conditions = 1"])
def test_what_is_no_rule_file_at_all_is_refused(text):
    with pytest.raises(InputError):
        loads_rules(text, "permit.toml")


def test_an_unknown_set_is_refused_with_the_nearest_name(tmp_path):
    with pytest.raises(InputError, match="did you mean 'us-40cfr60-kkkk'"):
        find_rules("us-40cfr60-kkk")
    with pytest.raises(InputError, match="no such file"):
        find_rules("permit.toml", tmp_path)
    with pytest.raises(InputError, match="no such rule set"):
        find_rules("permit", tmp_path)


def test_a_file_is_found_beside_the_case(tmp_path):
    (tmp_path / "permit.toml").write_text(VALID)
    found = find_rules("permit.toml", tmp_path)
    assert found.own and found.name == "permit"
    assert found.table.date == date(2025, 1, 1)
