"""Every machine in `demo` rates with exit code 0; what was sized rates alike from its file."""

import json
from pathlib import Path

import pytest

from combustor.case import load_case
from combustor.cli import main

DEMOS = Path(__file__).parents[2] / "demo"
LAYOUT_DEMOS = [
    "reverse_can_annular",
    "compressor_drive_annular",
    "lean_premixed_can",
    "rich_lean_can",
    "digester_can",
    "existing_tube",
]


def rated(capsys, *arguments):
    code = main(["rate", *map(str, arguments), "--json"])
    return code, json.loads(capsys.readouterr().out)


@pytest.fixture(scope="module")
def known():
    return {}


def document(name, capsys, known):
    if name not in known:
        known[name] = rated(capsys, DEMOS / f"{name}.toml")
    return known[name]


@pytest.mark.parametrize("name", LAYOUT_DEMOS)
def test_demo_rates_with_exit_code_0(name, capsys, known):
    code, report = document(name, capsys, known)
    assert code == 0
    for point in report["points"]:
        assert point["status"] == "burning"
        assert point["balances"]["air"] <= 1e-9
        assert point["balances"]["elements"] <= 1e-9
        assert point["balances"]["enthalpy"] <= 1e-6


@pytest.mark.parametrize("name", LAYOUT_DEMOS[:-1])
def test_sized_file_rates_as_sizing_promised(name, capsys, tmp_path, known):
    case, sized = DEMOS / f"{name}.toml", tmp_path / "sized.toml"
    assert main(["size", str(case), "-o", str(sized)]) == 0
    capsys.readouterr()
    point = load_case(case).targets.design_point
    code, report = rated(capsys, sized, "--point", point)
    assert code == 0
    (again,) = report["points"]
    first = next(p for p in document(name, capsys, known)[1]["points"] if p["name"] == point)
    assert again["pressure_loss_percent"] == pytest.approx(first["pressure_loss_percent"], rel=1e-6)
    assert again["emissions"]["nox_ppmvd_15"] == pytest.approx(
        first["emissions"]["nox_ppmvd_15"], rel=1e-5
    )
    target = load_case(case).targets.pressure_loss
    assert again["pressure_loss_percent"] == pytest.approx(100.0 * target, abs=0.1)


def test_rich_lean_nox_carries_its_warning(capsys, known):
    _, report = document("rich_lean_can", capsys, known)
    for point in report["points"]:
        said = [finding for finding in point["findings"] if "rich flame" in finding["what"]]
        assert len(said) == 1 and said[0]["level"] == "watch"
        assert "trend" in said[0]["advice"]


def test_lean_premixed_burns_by_injector(capsys, known):
    _, report = document("lean_premixed_can", capsys, known)
    full, part = report["points"]
    for point, pilot_fuel in ((full, 10.0), (part, 14.0)):
        pilot, main_ = point["injectors"]
        assert pilot["fuel_percent"] == pytest.approx(pilot_fuel)
        flows = {row["name"]: row["flow_kg_s"] for row in point["split"]}
        assert pilot["air_kg_s"] == pytest.approx(flows["swirler"], rel=1e-9)
        assert main_["air_kg_s"] == pytest.approx(flows["premixer"], rel=1e-9)
        zone = point["zones"][0]["equivalence_ratio"]
        assert main_["primary_equivalence_ratio"] < zone < pilot["primary_equivalence_ratio"]
        assert point["emissions"]["nox_ppmvd_15"] < 25.0
        assert point["emissions"]["co_ppmvd_15"] < 25.0


def test_measured_rows_of_the_existing_tube_pass_what_the_bench_said(capsys, known):
    _, report = document("existing_tube", capsys, known)
    rows = {row["name"]: row for row in report["points"][0]["split"]}
    assert rows["dilution"]["effective_area_mm2"] == pytest.approx(2230.0)
    assert rows["slot 5"]["effective_area_mm2"] == pytest.approx(236.0)
    assert not [f for f in report["points"][0]["findings"] if "pressure pair" in f["what"]]


def test_a_bench_area_without_its_pressure_pair_is_asked_about(capsys, tmp_path):
    text = (DEMOS / "existing_tube.toml").read_text()
    unsaid = "\n".join(line for line in text.splitlines() if not line.startswith('feed = "static"'))
    path = tmp_path / "unsaid.toml"
    path.write_text(unsaid)
    _, report = rated(capsys, path, "--point", "full")
    (asked,) = [f for f in report["points"][0]["findings"] if "pressure pair" in f["what"]]
    assert "slot 5" in asked["advice"] and "dilution" not in asked["advice"]


def test_an_area_on_the_total_pressure_passes_more_than_on_the_static(capsys, tmp_path, known):
    """The same bench area on the other pair gains the head of the annulus, small this far back."""
    text = (DEMOS / "existing_tube.toml").read_text()
    path = tmp_path / "total.toml"
    path.write_text(text.replace('feed = "static" ', 'feed = "total" '))
    _, total = rated(capsys, path, "--point", "full")
    static = document("existing_tube", capsys, known)[1]
    flows = [
        {row["name"]: row["flow_kg_s"] for row in report["points"][0]["split"]}
        for report in (static, total)
    ]
    assert flows[1]["slot 5"] > flows[0]["slot 5"]
