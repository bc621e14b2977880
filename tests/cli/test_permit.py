"""``comply``, ``convert`` and ``rules`` from the command line."""

from __future__ import annotations

import csv
import json
from pathlib import Path

import pytest

from combustor.cli import main
from combustor.emissions.rule_set import names

DEMO = Path(__file__).parents[2] / "demo"
CONVERT = ["convert", "43.2", "--species", "NOx", "--fuel", "natural-gas", "--to", "ppmvd@15"]
VERDICT_KEYS = {
    "point",
    "rule",
    "row",
    "pollutant",
    "predicted",
    "predicted_rounded",
    "band_low",
    "band_high",
    "limit",
    "unit",
    "margin",
    "margin_percent",
    "probability_of_exceeding",
    "verdict",
    "limit_status",
    "reason",
}
WORDS = {"inside", "too close to call", "outside", "undecided", "limit not verified"}


@pytest.fixture(scope="module")
def coarse(tmp_path_factory):
    """The demo's case, coarse, in a folder of its own with a permit beside it."""
    folder = tmp_path_factory.mktemp("permit")
    text = (DEMO / "pump_drive_permit.toml").read_text()
    text = text.replace("permits/ostrelle_waterworks.toml", "permit.toml")
    model = "[model]\nstreams = 2\ncells = 2\nwall_stations = 20\n\n[rules]"
    (folder / "case.toml").write_text(text.replace("[rules]", model))
    permit = (DEMO / "permits" / "ostrelle_waterworks.toml").read_text()
    (folder / "permit.toml").write_text(permit)
    return folder / "case.toml"


def test_the_shipped_demo_is_inside_its_own_permit(capsys):
    assert main(["comply", str(DEMO / "pump_drive_permit.toml"), "--json"]) == 0
    found = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    assert {v["verdict"] for v in found["verdicts"]} == {"inside"}
    assert {v["limit_status"] for v in found["verdicts"]} == {"stated in the user's own file"}


def test_the_document_holds_the_keys_of_the_contract(capsys, coarse):
    code = main(["comply", str(coarse), "--point", "full", "--json"])
    found = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    assert found["verdicts"]
    for verdict in found["verdicts"]:
        assert set(verdict) >= VERDICT_KEYS
        assert verdict["verdict"] in WORDS
    good = all(v["verdict"] == "inside" for v in found["verdicts"])
    assert code == (0 if good else 1)


def test_a_verdict_other_than_inside_exits_1(capsys, coarse):
    arguments = ["comply", str(coarse), "--point", "full", "--rules", "eu-2015-2193"]
    assert main(arguments) == 1
    out, err = capsys.readouterr()
    assert err == ""
    flat = " ".join(out.split("Verdicts")[1].split())
    assert "existing-natural-gas-nox (from memory)" in flat and "? limit not" in flat


def test_the_report_fits_100_columns_without_colour_and_says_the_caution(capsys, coarse):
    arguments = ["comply", str(coarse), "--rules", "us-40cfr60-kkkk", "--rules", "permit.toml"]
    main([*arguments, "--point", "full", "--point", "idle"])
    out = capsys.readouterr().out
    assert max(map(len, out.split("\n"))) <= 100
    assert "\x1b" not in out
    flat = " ".join(out.split())
    assert "not a measurement: the authority, a certified test and a licensed engineer" in flat
    assert "What binds, what does not, and why" in out
    for word in ("approved", "compliant", "certified "):
        assert word not in flat.replace("a certified test", "").lower()


def test_tables_go_to_csv(capsys, coarse, tmp_path):
    main(["comply", str(coarse), "--point", "full", "--csv", str(tmp_path / "t")])
    capsys.readouterr()
    with (tmp_path / "t" / "verdicts.csv").open() as stream:
        lines = list(csv.DictReader(stream))
    assert lines and set(lines[0]) >= VERDICT_KEYS
    assert float(lines[0]["predicted"]) > 0.0
    made = {path.name for path in (tmp_path / "t").iterdir()}
    assert {"applicability.csv", "masses.csv", "dew_points.csv", "fuel_factors.csv"} <= made
    assert main(["comply", str(coarse), "--csv", str(tmp_path / "t")]) == 2
    assert "--force" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("change", "said"),
    [
        (("limit = 250", "limit = -1"), "above zero"),
        (('"mg/Nm3@15"', '"mg/m3"'), "at which temperature"),
        (("heating_value", "heating_valeu"), "did you mean 'heating_value'"),
    ],
)
def test_a_wrong_permit_is_refused_like_a_wrong_case(capsys, coarse, tmp_path, change, said):
    permit = (DEMO / "permits" / "ostrelle_waterworks.toml").read_text()
    path = tmp_path / "mine.toml"
    path.write_text(permit.replace(*change, 1))
    assert main(["comply", str(coarse), "--rules", str(path)]) == 2
    out, err = capsys.readouterr()
    assert out == "" and said in err and f"{path}:" in err
    assert err.endswith("nothing was computed\n")


def test_an_unknown_rule_set_is_refused(capsys, coarse):
    assert main(["comply", str(coarse), "--rules", "us-40cfr60-kkk"]) == 2
    assert "did you mean 'us-40cfr60-kkkk'" in capsys.readouterr().err


def test_convert_prints_each_step(capsys):
    assert main([*CONVERT, "mg/Nm3@15", "lb/MMBtu", "--o2", "14.2 %"]) == 0
    out = capsys.readouterr().out
    assert max(map(len, out.split("\n"))) <= 100
    for words in ("as given", "O2, dry", "at 15 % O2, dry", "default Fd 8710", "own Fd"):
        assert words in out


def test_convert_takes_several_runs_measured_wet(capsys):
    arguments = [
        "convert",
        "20",
        "21 ppm",
        "--species",
        "NOx",
        "--o2",
        "14 %",
        "14.1 %",
        "--wet",
        "--moisture",
        "8 %",
        "--air-o2",
        "20.9 %",
        "--fuel",
        "methane",
        "--to",
        "ppmvd@15",
        "--json",
    ]
    assert main(arguments) == 0
    found = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    assert [len(run) for run in found["runs"]] == [5, 5]
    first, second = 22.5708, 24.1615  # by hand, each dried with its own O2
    assert found["results"][0]["value"] == pytest.approx((first + second) / 2, abs=1e-4)


@pytest.mark.parametrize(
    ("extra", "said"),
    [
        (["--o2", "14.2"], '"14.2 %"'),
        (["--o2", "14.2 %", "0.15"], "2 readings of O2"),
        (["--o2", "14.2 K"], "unit of temperature"),
        (["--o2", "25 %"], "0 to 21 %"),
        (["--o2", "14 %", "--wet"], "moisture"),
        ([], "--o2"),
        (["--o2", "14 %", "--humidity", "0.01"], "--ambient-temperature"),
        (["--o2", "14 %", "--air-o2", "15 %"], "--air-o2"),
    ],
)
def test_slips_of_the_tester_s_sheet_are_refused(capsys, extra, said):
    assert main([*CONVERT, *extra]) == 2
    out, err = capsys.readouterr()
    assert out == "" and said in err and "internal" not in err


def test_rules_lists_every_set_in_100_columns(capsys):
    assert main(["rules"]) == 0
    out = capsys.readouterr().out
    assert max(map(len, out.split("\n"))) <= 100
    for name in names():
        assert f"\n{name} " in out


@pytest.mark.parametrize("name", names())
def test_each_set_in_full_fits_and_says_where_figures_were_read(capsys, name):
    assert main(["rules", name]) == 0
    out = capsys.readouterr().out
    assert max(map(len, out.split("\n"))) <= 100
    assert "reference" in out and "review" in out and "Limits" in out
    assert "from memory" in out or "copy" in out


def test_rules_json_holds_the_data(capsys):
    assert main(["rules", "us-40cfr60-kkkk", "--json"]) == 0
    (found,) = json.loads(capsys.readouterr().out)["rules"]
    assert found["oxygen_in_air"] == 0.209 and len(found["limits"]) == 47


def test_the_template_is_written_once_and_can_be_used(capsys, coarse, tmp_path):
    path = tmp_path / "my_permit.toml"
    assert main(["rules", "--template", str(path)]) == 0
    assert "comply" in capsys.readouterr().out
    assert main(["rules", "--template", str(path)]) == 2
    assert "--force" in capsys.readouterr().err
    assert main(["comply", str(coarse), "--rules", str(path), "--point", "full", "--json"]) in (
        0,
        1,
    )
    found = json.loads(capsys.readouterr().out)
    assert {v["row"] for v in found["verdicts"]} == {"nox", "co"}
    assert main(["rules", "--template", str(tmp_path / "permit.txt")]) == 2
