import re
from dataclasses import replace

import pytest

from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.report.rating_rows import finding_rows, level_of, wall_digest
from combustor.report.rating_tables import rating_report
from combustor.report.terminal import Page, render


def text_of(ratings, width=100):
    return render(rating_report(ratings), Page(width))


def section(text, title):
    """Return the lines under a table's or heading's title up to the next blank line."""
    return re.search(rf"^{re.escape(title)}.*?(?=\n\n|\Z)", text, re.M | re.S).group()


@pytest.mark.parametrize("width", [100, 80, 60, 40])
def test_every_line_fits_the_width(ratings, width):
    assert max(map(len, text_of(ratings, width).split("\n"))) <= width


def test_order_is_duty_cycle_then_points_then_findings(ratings):
    text = text_of(ratings)
    titles = [
        "Duty cycle", "Point full", "Air split", "Zones", "Wall", "Emissions", "Operability",
        "Point idle", "Findings", "Before use",
    ]  # fmt: skip
    places = [text.index(f"\n{title}") for title in titles]
    assert places == sorted(places)


def test_duty_cycle_shows_each_point_with_words_for_status_and_verdict(ratings):
    full, idle = section(text_of(ratings), "Duty cycle").split("\n")[-2:]
    assert full.split() == [
        "full", "burning", "14.200", "0.2450", "0.291", "1273", "4.51", "99.987", "256", "6.12",
        "1150", "!", "act",
    ]  # fmt: skip
    assert idle.startswith("idle   ! blown out")
    assert idle.endswith("! act")


def test_a_blown_out_point_shows_dashes_and_the_rest_still_prints(ratings):
    idle = section(text_of(ratings), "Point idle")
    assert "! blown out" in idle
    assert "pressure loss  -" in idle
    assert "nan" not in text_of(ratings).lower()
    assert "None" not in text_of(ratings)


@pytest.mark.parametrize("width", [100, 80])
def test_split_shows_the_users_names_shares_and_metal(ratings, width):
    lines = section(text_of(ratings, width), "Air split").split("\n")
    row = next(line for line in lines if line.startswith("dil_2")).split()
    assert row == [
        "dil_2", "dilution", "12.496", "88.00", "8", "30.50", "3500", "0.623", "98.8", "60",
        "123.4",
    ]  # fmt: skip
    assert next(line for line in lines if line.startswith("seals")).split()[-1] == "-"


def test_pressure_loss_is_shown_with_its_parts(ratings):
    assert "4.51 % = diffuser 0.80 + liner 3.45 + hot 0.26" in text_of(ratings)


def test_emissions_stand_on_every_basis(ratings):
    block = section(text_of(ratings), "Emissions")
    nox = next(line for line in block.split("\n") if line.startswith("NOx as NO2"))
    assert nox.split()[3:] == ["11.4", "256", "526", "0.231"]
    for unit in ("g/kg fuel", "ppm", "mg/Nm3", "g/MJ LHV", "15 % O2"):
        assert unit in block
    assert "O2 dry 14.42 %, CO2 dry 3.61 %, H2O wet 7.19 %, NO in NOx 93.0 %" in block


def test_ammonia_has_a_line_only_where_it_is_known(ratings):
    assert "NH3" not in text_of(ratings)
    full = ratings.points[0]
    slipping = replace(full, emissions=replace(full.emissions, nh3_dry_15=3e-6))
    assert "NH3" in text_of(replace(ratings, points=(slipping,)))


def test_the_hottest_wall_station_is_marked_in_words(ratings):
    lines = [line for line in section(text_of(ratings), "Wall").split("\n") if "hottest" in line]
    assert len(lines) == 1
    assert lines[0].split()[:3] == ["300.0", "outer", "1150"]


def test_the_digest_keeps_both_ends_and_the_peak(good_point):
    walls = good_point.walls
    hot = replace(walls[7], temperature=1400.0)
    digest = wall_digest((*walls[:7], hot, *walls[8:]))
    assert digest[0] is walls[0] and digest[-1] is walls[-1]
    assert hot in digest
    assert len(digest) <= 13
    assert wall_digest(walls[:1]) == walls[:1]
    assert wall_digest(()) == ()


def test_findings_come_gravest_last_and_alike_ones_share_a_line(ratings):
    block = section(text_of(ratings), "Findings")
    rows = [line for line in block.split("\n") if line[:2] in ("+ ", "~ ", "! ")]
    assert [row.split()[1] for row in rows] == ["ok", "watch", "watch", "act", "act"]
    assert block.count("mind the low load (judgement)") == 1
    assert "~ watch  full, idle  CO " in block
    assert "case" in block


def test_grouped_findings_show_the_range_of_their_values():
    found = [(n, Finding("watch", "CO", v, 50.0, "ppm")) for n, v in (("a", 60.0), ("b", 71.25))]
    (row,) = finding_rows(found)
    assert (row.points, row.value, row.limit) == ("a, b", "60 to 71.25", 50.0)


def test_cautions_are_said_once(ratings):
    text = " ".join(text_of(ratings).split())
    for words in ("not an approval", "combustion dynamics, buckling, life", "burns unseen"):
        assert text.count(words) == 1
    for words in ("local codes", "type certification", "licensed engineer"):
        assert words in text


def test_sizing_first_is_said(ratings):
    assert "sized first" in text_of(ratings)
    assert "sized first" not in text_of(replace(ratings, sized=False))


def test_a_point_that_did_not_converge_is_act_whatever_its_findings(good_point):
    assert level_of(good_point) == "ok"
    stuck = replace(good_point, convergence=Convergence(False, 0.1, 25, "still moving"))
    assert level_of(stuck) == "act"
    assert level_of(replace(good_point, status="not_converged")) == "act"


def test_unknown_operability_keys_are_shown_under_their_own_name(ratings):
    point = replace(ratings.points[0], operability={"flash_margin": 3.0, "other": None})
    block = section(text_of(replace(ratings, points=(point,))), "Operability")
    assert "flash margin" in block
    assert block.split("\n")[-1].split() == ["other", "-"]


def test_hostile_names_neither_style_nor_break_the_report(ratings):
    point = replace(ratings.points[0], name="a\x1b[31m[bold]x[/bold]\nb")
    text = text_of(replace(ratings, points=(point,), title="t\x07itle"))
    assert "\x1b" not in text and "\x07" not in text
    assert "[bold]x[/bold]" in text
