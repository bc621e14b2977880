"""The chain against Cantera's own networks of the same reactors, through the benchmark itself."""

from __future__ import annotations

import importlib.util
import json
import sys
from pathlib import Path

import pytest

SCRIPT = Path(__file__).resolve().parents[1] / "benchmarks" / "chain.py"


@pytest.fixture(scope="module")
def benchmark():
    spec = importlib.util.spec_from_file_location("chain_benchmark", SCRIPT)
    module = importlib.util.module_from_spec(spec)
    sys.modules["chain_benchmark"] = module
    spec.loader.exec_module(module)
    yield module
    del sys.modules["chain_benchmark"]


def test_same_answer_as_plain_networks(benchmark, capsys):
    assert benchmark.main(["--reactors", "4", "--json"]) == 0
    report = json.loads(capsys.readouterr().out)
    assert report["reactors"] == 4
    assert report["max_temperature_difference_K"] < 0.1
    assert report["max_nox_difference_percent"] < 0.5
    for key in ("speedup", "speedup_marched", "speedup_preconditioned"):
        assert report[key] > 1.0
    for key in ("seconds", "seconds_marched", "seconds_preconditioned"):
        assert report[key] > 0.0


def test_too_few_reactors_are_refused(benchmark, capsys):
    with pytest.raises(SystemExit) as stop:
        benchmark.main(["--reactors", "2"])
    assert stop.value.code == 2
    assert "at least 3" in capsys.readouterr().err
