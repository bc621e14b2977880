"""`combustor sources` from the command line."""

from __future__ import annotations

import csv
import json
from pathlib import Path

import pytest

from combustor.cli.run import main

DEMO = Path(__file__).parents[2] / "demo" / "industrial_can.toml"


def test_all_methods_as_json(capsys):
    assert main(["sources", "--json"]) == 0
    document = json.loads(capsys.readouterr().out)
    keys = {one["key"] for one in document["sources"]}
    assert {"wall-balance-lefebvre-herbert", "near-wall-stream", "mechanism-gri30"} <= keys


def test_methods_of_a_case_to_csv(tmp_path, capsys):
    assert main(["sources", str(DEMO), "--csv", str(tmp_path)]) == 0
    shown = capsys.readouterr().out
    assert "Ostrelle" in shown and "used in sizing and rating" in shown
    with (tmp_path / "sources.csv").open() as file:
        rows = list(csv.DictReader(file))
    used = {row["key"]: row["used_in"] for row in rows}
    assert used["film-air-least"] == "sizing"
    assert used["grey-gas-smith"] == "rating"
    assert "luminous-emissivity-lefebvre" not in used
    assert main(["sources", str(DEMO), "--csv", str(tmp_path)]) == 2
    assert "sources.csv" in capsys.readouterr().err


@pytest.mark.parametrize("quantity", ["discharge_coefficient", "walls.temperature_K"])
def test_methods_behind_one_value(quantity, capsys):
    assert main(["sources", "--of", quantity, "--json"]) == 0
    few = json.loads(capsys.readouterr().out)["sources"]
    assert 1 <= len(few) < 30


def test_unknown_value_is_bad_input(capsys):
    assert main(["sources", "--of", "no_such_thing_at_all"]) == 2
    assert "no value and no method" in capsys.readouterr().err
