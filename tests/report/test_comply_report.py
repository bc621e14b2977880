"""Tables of the pre-check, conversions and rules at every width, plain and with their words."""

from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest

from combustor.case.load import loads_case
from combustor.emissions.rule_set import names, shipped
from combustor.fuel import catalogue
from combustor.report.comply_tables import comply_document, comply_report
from combustor.report.convert_tables import convert_report
from combustor.report.json_out import dumps
from combustor.report.permit_theme import WORDS
from combustor.report.rule_tables import rule_report, rules_table
from combustor.report.terminal import Page, render
from combustor.studies.comply import comply
from combustor.studies.convert import convert
from combustor.studies.convert_record import Sample

DEMO = Path(__file__).parents[2] / "demo"
RULES = """
[model]
streams = 2
cells = 2
wall_stations = 20

[rules]
names = ["permits/ostrelle_waterworks.toml", "us-40cfr60-kkkk"]
use = "mechanical-drive"
unit_state = "new"
site = "continental"
built = 2015-06-01
heat_input = "13 MW"
heat_input_basis = "LHV"
confirmed = ["us-40cfr60-kkkk/new-gas-mechanical-50-ppm: eCFR, table 1"]
"""


@pytest.fixture(scope="module")
def check():
    """A blend of hydrogen with too little known, so that every word and table comes up."""
    text = (DEMO / "pump_drive_permit.toml").read_text()
    text = text[: text.index("[rules]")].replace('"natural-gas"', '"natural-gas+10%hydrogen"')
    return comply(loads_case(text + RULES, str(DEMO / "case.toml")), points=["full", "idle"])


@pytest.mark.parametrize("width", [60, 80, 100])
@pytest.mark.parametrize("ascii_only", [False, True])
def test_the_report_fits(check, width, ascii_only):
    text = render(comply_report(check), Page(width, False, ascii_only))
    widest = max(text.split("\n"), key=len)
    assert len(widest) <= width, widest
    assert "\x1b" not in text
    if ascii_only:
        assert text.isascii()


def test_verdict_words_stand_in_plain_text_with_their_sign(check):
    text = render(comply_report(check), Page())
    for word in ("+ binds", "- no", "? cannot tell"):
        assert word in text
    for verdict in check.verdicts:
        assert verdict.row in text or verdict.choice.partition("/")[2] in text
        # a narrow column may part the words of a verdict
        assert " ".join(WORDS[verdict.verdict].split()[:2]) in text
    assert len({verdict.verdict for verdict in check.verdicts}) >= 2


def test_colour_only_repeats_what_is_said(check):
    plain = render(comply_report(check), Page())
    coloured = render(comply_report(check), Page(colour=True))
    assert "\x1b" in coloured
    import re

    bare = re.sub(r"\x1b\[[0-9;]*m", "", coloured)
    assert "\n".join(line.rstrip() for line in bare.split("\n")) == plain


def test_a_hydrogen_blend_shows_the_penalty_and_the_figure_per_heat(check):
    flat = " ".join(render(comply_report(check), Page()).split())
    assert "10 % hydrogen by volume reads" in flat and "g/MJ LHV" in flat


def test_the_document_is_strict_json_with_every_contract_key(check):
    text = dumps(comply_document(check, "0"))
    assert "NaN" not in text and "Infinity" not in text
    for key in ("predicted_rounded", "probability_of_exceeding", "limit_status", "margin_percent"):
        assert f'"{key}"' in text


@pytest.mark.parametrize("width", [60, 80, 100])
def test_rules_fit(width):
    today = date(2026, 12, 1)
    sets = [shipped(name) for name in names()]
    blocks = [rules_table(sets, today)]
    for rules in sets:
        blocks += rule_report(rules, today)
    text = render(blocks, Page(width))
    widest = max(text.split("\n"), key=len)
    assert len(widest) <= width, widest


def test_an_overdue_set_is_flagged_in_words():
    text = render(rule_report(shipped("us-40cfr60-kkkk"), date(2040, 1, 1)), Page())
    assert "! overdue" in text
    assert "! 2027-01-15" in render(
        [rules_table([shipped("us-40cfr60-kkkk")], date(2040, 1, 1))], Page()
    )


def test_a_conversion_fits_and_shows_each_run():
    done = convert(
        ["20", "21"],
        "NOx",
        catalogue.find("natural-gas+30%hydrogen"),
        ["ppmvd@15", "mg/Nm3@15", "lb/MMBtu", "g/MJ"],
        Sample((0.14, 0.141), "wet", "wet", 0.08),
    )
    text = render(convert_report(done), Page(80))
    assert max(map(len, text.split("\n"))) <= 80
    assert text.count("O2 as measured, wet") == 2
    assert "no default fuel factor" in text
