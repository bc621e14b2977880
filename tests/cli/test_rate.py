import contextlib
import csv
import json
import re

import pytest

import combustor
from combustor.case.starter import starter_text
from combustor.cli import main
from combustor.report.json_out import dumps
from combustor.report.rating_json import point_document

STARTER = starter_text()


@pytest.fixture(scope="module")
def folder(tmp_path_factory):
    return tmp_path_factory.mktemp("cases")


@pytest.fixture(scope="module")
def sized(folder):
    """A starter case with its metal, as ``size -o`` writes it."""
    case = folder / "my.toml"
    case.write_text(STARTER)
    path = folder / "sized.toml"
    assert main(["size", str(case), "-o", str(path), "--csv", str(folder / "sizing")]) == 0
    return path


@pytest.fixture(scope="module")
def rated(sized, folder):
    """Document and exit code of one rating of two points, its tables in files."""
    path = folder / "rated.json"
    points = ["--point", "idle", "--point", "full"]
    with path.open("w") as stream, contextlib.redirect_stdout(stream):
        code = main(["rate", str(sized), *points, "--json", "--csv", str(folder / "rating")])
    return json.loads(path.read_text(), parse_constant=pytest.fail), code


def test_sizing_shows_dimensions_methods_split_and_findings(capsys, folder, sized):
    assert main(["size", str(folder / "my.toml")]) == 0
    out = capsys.readouterr().out
    for title in ("Dimensions", "Methods and their sources", "Zones", "Air split", "Findings"):
        assert f"\n{title}" in out
    assert max(map(len, out.split("\n"))) <= 100


def test_sizing_again_replaces_nothing_unasked(capsys, folder, sized):
    before = sized.read_text()
    assert main(["size", str(folder / "my.toml"), "-o", str(sized)]) == 2
    assert "--force" in capsys.readouterr().err
    assert sized.read_text() == before


def test_the_sized_case_keeps_the_comments_and_gains_the_metal(sized):
    text = sized.read_text()
    assert "# A case file: what the machine offers" in text
    assert "[[hardware.openings]]" in text


def test_sizing_tables_go_to_csv(folder, sized):
    with (folder / "sizing" / "dimensions.csv").open() as stream:
        lines = list(csv.DictReader(stream))
    assert {"name", "value", "unit", "method", "source", "reading"} <= set(lines[0])
    assert all(line["source"] and line["reading"] for line in lines)


def test_rating_gives_what_sizing_promised(capsys, folder, rated):
    assert main(["size", str(folder / "my.toml"), "--json"]) == 0
    promised = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    full = rated[0]["points"][0]
    assert full["pressure_loss_percent"] == pytest.approx(
        promised["pressure_loss_percent"], abs=0.1
    )
    reached = {zone["name"]: zone["equivalence_ratio"] for zone in full["zones"]}
    for zone in promised["zones"]:
        assert reached[zone["name"]] == pytest.approx(zone["reached"], abs=0.03)
        assert reached[zone["name"]] == pytest.approx(zone["wanted"], abs=0.03)


def test_the_points_asked_for_are_rated_in_the_order_of_the_case(rated):
    document, code = rated
    assert code == 0
    assert [point["name"] for point in document["points"]] == ["full", "idle"]
    assert {point["status"] for point in document["points"]} == {"burning"}
    assert document["sized"] is False


def test_a_rated_point_is_complete_and_balanced(rated):
    for point in rated[0]["points"]:
        assert sum(line["percent"] for line in point["split"]) == pytest.approx(100.0, abs=1e-7)
        parts = point["pressure_loss_parts_percent"]
        assert sum(parts.values()) == pytest.approx(point["pressure_loss_percent"], abs=1e-9)
        assert [zone["name"] for zone in point["zones"]] == [
            "primary", "secondary", "dilution", "exit",
        ]  # fmt: skip
        assert point["balances"]["air"] < 1e-9
        assert point["balances"]["elements"] < 1e-10
        assert point["balances"]["enthalpy"] < 1e-8
        assert point["walls"] and {wall["side"] for wall in point["walls"]} == {"outer"}
        assert point["profile"] and point["findings"]
        assert all(line["count"] is not None for line in point["split"])
        primary = next(line for line in point["split"] if line["role"] == "primary")
        assert primary["diameter_mm"] > 0 and primary["penetration_mm"] > 0
        for key in ("nox_ppmvd_15", "co_ppmvd_15", "nox_mg_nm3_15", "ei_nox_g_kg"):
            assert point["emissions"][key] > 0


@pytest.mark.parametrize("width", [100, 80])
def test_the_terminal_shows_the_numbers_of_the_document(monkeypatch, capsys, sized, rated, width):
    monkeypatch.setenv("COLUMNS", str(width))
    assert main(["rate", str(sized), "--point", "full"]) == 0
    text = capsys.readouterr().out
    assert max(map(len, text.split("\n"))) <= width
    assert "\x1b" not in text
    full = rated[0]["points"][0]
    line = next(line for line in text.split("\n") if re.match(r"full +burning", line))
    assert f"{full['exit']['temperature_K']:.0f}" in line.split()
    assert f"{full['pressure_loss_percent']:.2f}" in line.split()
    for opening in full["split"]:
        assert re.search(rf"^{re.escape(opening['name'])} ", text, re.M)


def test_rating_tables_go_to_csv_with_the_numbers_of_the_document(folder, rated):
    with (folder / "rating" / "points.csv").open() as stream:
        lines = list(csv.DictReader(stream))
    full = rated[0]["points"][0]
    assert lines[0]["name"] == "full"
    assert float(lines[0]["nox_ppmvd_15"]) == full["emissions"]["nox_ppmvd_15"]


def test_a_point_that_is_not_there_is_refused(capsys, sized):
    assert main(["rate", str(sized), "--point", "ful"]) == 2
    err = capsys.readouterr().err
    assert "ful" in err and "full" in err


def test_another_fuel_burns_in_the_same_metal(capsys, sized, rated):
    assert main(["rate", str(sized), "--point", "full", "--fuel", "propane", "--json"]) in (0, 1)
    (point,) = json.loads(capsys.readouterr().out)["points"]
    assert point["fuel"] == "propane"
    gas = rated[0]["points"][0]
    assert point["exit"]["temperature_K"] == pytest.approx(gas["exit"]["temperature_K"], abs=0.5)
    assert [line["count"] for line in point["split"]] == [line["count"] for line in gas["split"]]


def test_an_unknown_fuel_is_refused(capsys, sized):
    assert main(["rate", str(sized), "--fuel", "propan"]) == 2
    assert "did you mean 'propane'" in capsys.readouterr().err


def test_a_point_that_cannot_burn_is_shown_and_exits_1(capsys, folder, sized):
    text = sized.read_text()
    idle = text.index('name = "idle"')
    starved = text[:idle] + text[idle:].replace('"545 degC"', '"150 degC"', 1)
    path = folder / "starved.toml"
    path.write_text(starved)
    arguments = ["rate", str(path), "--point", "idle", "--point", "full"]
    assert main(arguments) == 1
    out = capsys.readouterr().out
    assert re.search(r"^idle +! blown out", out, re.M)
    assert re.search(r"^full +burning", out, re.M)
    assert main([*arguments, "--json"]) == 1
    full, idle = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)["points"]
    assert (full["status"], idle["status"]) == ("burning", "blown_out")
    assert idle["fuel_flow_kg_s"] > 0
    assert idle["exit"]["temperature_K"] is None and idle["emissions"]["nox_ppmvd_15"] is None


def test_a_loss_no_area_gives_is_explained_and_exits_1(capsys, folder):
    path = folder / "tight.toml"
    path.write_text(STARTER.replace('"370 mm"', '"150 mm"'))
    assert main(["size", str(path)]) == 1
    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith("no design meets the targets")
    assert "therefore" in err
    assert "Traceback" not in err


def test_the_same_in_python(sized):
    case = combustor.load_case(sized)
    ratings = combustor.rate(case, points=["full"])
    assert isinstance(ratings, combustor.Ratings)
    frame = ratings.frame()
    assert list(frame["name"]) == ["full"]
    assert frame.loc[0, "exit_temperature_K"] == pytest.approx(950 + 273.15, abs=0.5)


def test_nothing_printed_depends_on_the_order_of_the_points(sized):
    case = combustor.load_case(sized)
    turned = case.model_copy(update={"points": tuple(reversed(case.points))})
    wanted = ["full", "half"]
    straight = [point_document(p) for p in combustor.rate(case, points=wanted).points]
    backwards = [point_document(p) for p in combustor.rate(turned, points=wanted).points]
    assert [point["name"] for point in straight] == wanted
    assert dumps({"points": straight}) == dumps({"points": backwards[::-1]})
