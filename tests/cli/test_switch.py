"""``combustor switch`` as a user runs it."""

import csv
import json

import pytest

from combustor.cli import main
from combustor.report.switch_data import SWITCH_TABLES

DEMO = "demo/industrial_can.toml"


@pytest.mark.parametrize(
    ("options", "said"),
    [
        (["--to", "hydrogn"], "did you mean 'hydrogen'?"),
        (["--to", "natural-gas+130%hydrogen"], "0 to 100 %"),
        (["--ladder", "hydrogen", "--shares", "0:100:0"], "ladder of 0 rungs"),
        (["--shares", "0:100:3"], "give --ladder FUEL as well"),
        ([], "no other fuel is named"),
        (["--to", "biogas", "--hold", "heatt"], "invalid choice"),
        (["--to", "biogas", "--injector-ratio", "x"], "not a number"),
    ],
)
def test_bad_requests_are_refused_plainly(capsys, options, said):
    assert main(["switch", DEMO, *options]) == 2
    seen = capsys.readouterr()
    assert said in seen.err and seen.out == ""


@pytest.fixture(scope="module")
def case_file(tmp_path_factory, request):
    """The demo with one coarse point, sized in a moment."""
    path = tmp_path_factory.mktemp("switch") / "one.toml"
    text = (request.config.rootpath / DEMO).read_text()
    head, *points = text.split("[[points]]")
    last, targets = points[-1].split("[targets]")
    del last
    model = "\n[model]\nstreams = 3\ncells = 2\nwall_stations = 20\n"
    path.write_text(f"{head}[[points]]{points[0]}[targets]{targets}{model}")
    return path


def test_one_document_and_its_tables(case_file, tmp_path, capsys):
    code = main(["switch", str(case_file), "--to", "biogas", "--json", "--csv", str(tmp_path)])
    assert code == 1  # biogas asks for changes
    document = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    assert document["hold"] == "exit-temperature"
    assert [p["fuel"] for p in document["points"]] == ["natural-gas", "biogas"]
    assert {"co2_g_MJ", "verdict", "changes", "limits"} <= set(document["fuels"][1])
    assert {path.stem for path in tmp_path.iterdir()} == set(SWITCH_TABLES)
    lines = list(csv.DictReader((tmp_path / "switch_points.csv").read_text().splitlines()))
    assert float(lines[1]["injector_pressure_ratio"]) > 2.0
    assert main(["switch", str(case_file), "--to", "biogas", "--csv", str(tmp_path)]) == 2
