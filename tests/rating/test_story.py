"""The hole-sizing engineer's afternoon: one dilution row from 8 x 9.0 to 8 x 9.5 mm, by file."""

import json
from pathlib import Path

import pytest

from combustor.case import load_case
from combustor.cli import main

CASE = """\
title = "Eel Pie pump, one can"
[combustor]
layout = "can"
casing_diameter = "440 mm"
casing_length = "1150 mm"
inlet_annulus = { inner = "120 mm", outer = "138 mm" }
exit_annulus = { inner = "100 mm", outer = "140 mm" }
transition_length = "60 mm"
[fuel]
name = "natural-gas"
[[points]]
name = "full"
kind = "rated"
air_flow = "0.335 kg/s"
inlet_pressure = "4.0 bar"
inlet_temperature = "190 degC"
exit_temperature = "850 degC"
[[points]]
name = "half"
kind = "part"
air_flow = "0.4 kg/s"
inlet_pressure = "3.1 bar"
inlet_temperature = "270 degC"
exit_temperature = "810 degC"
[[points]]
name = "idle"
kind = "idle"
air_flow = "0.25 kg/s"
inlet_pressure = "2.0 bar"
inlet_temperature = "150 degC"
fuel_flow = "0.0024 kg/s"
[targets]
design_point = "full"
pressure_loss = "4.5 %"
equivalence_ratio = { primary = 0.95, secondary = 0.50 }
pattern_factor = 0.15
wall_temperature = "850 degC"
dilution_holes = 8
"""


def rate(path, capsys):
    main(["rate", str(path), "--point", "full", "--json"])
    return json.loads(capsys.readouterr().out)["points"][0]


@pytest.fixture
def sized(tmp_path, capsys):
    case, path = tmp_path / "case.toml", tmp_path / "sized.toml"
    case.write_text(CASE)
    assert main(["size", str(case), "-o", str(path)]) == 0
    capsys.readouterr()
    return path


def with_row(path: Path, diameter: str) -> Path:
    """Edit the dilution row in the written file as a person would."""
    lines = path.read_text().splitlines()
    row = next(i for i, line in enumerate(lines) if 'name = "dilution"' in line)
    place = next(i for i in range(row, row + 8) if "diameter" in lines[i])
    assert "8" in next(line for line in lines[row : row + 8] if "count" in line)
    old = lines[place]
    value = old[old.index('"') :].split('"')[1]
    lines[place] = old.replace(value, diameter)
    changed = path.with_name(f"{diameter.replace(' ', '')}.toml")
    changed.write_text("\n".join(lines) + "\n")
    return changed


def test_half_a_millimetre_on_the_dilution_row_moves_every_zone(sized, capsys):
    hardware = load_case(sized).hardware
    row = next(row for row in hardware.openings if row.name == "dilution")
    assert (row.count, row.diameter) == (8, pytest.approx(9.0e-3, abs=1e-9))
    before = rate(sized, capsys)
    _promise_is_kept(before, load_case(sized))
    assert load_case(with_row(sized, "9.0 mm")).hardware == hardware
    after = rate(with_row(sized, "9.5 mm"), capsys)
    assert after["pressure_loss_percent"] < before["pressure_loss_percent"] - 0.1
    shares = [{one["name"]: one["percent"] for one in point["split"]} for point in (before, after)]
    assert shares[1]["dilution"] > shares[0]["dilution"]
    for name in ("swirler", "dome", "primary", "secondary"):
        assert shares[1][name] < 0.99 * shares[0][name]
    for old, new in zip(before["zones"][:-1], after["zones"][:-1], strict=True):
        assert new["name"] == old["name"]
        # richer up to the row, leaner behind it
        ratio = new["equivalence_ratio"] / old["equivalence_ratio"]
        assert ratio < 0.999 if old["name"] == "dilution" else ratio > 1.005
        assert abs(new["temperature_K"] - old["temperature_K"]) > 1.0
        assert new["residence_time_ms"] != old["residence_time_ms"]


def _promise_is_kept(point, case):
    """Rating the written table gives what sizing promised."""
    assert point["pressure_loss_percent"] == pytest.approx(
        100.0 * case.targets.pressure_loss, abs=0.1
    )
    zones = {zone["name"]: zone["equivalence_ratio"] for zone in point["zones"]}
    assert zones["primary"] == pytest.approx(case.targets.equivalence_ratio.primary, abs=0.03)
    assert zones["secondary"] == pytest.approx(case.targets.equivalence_ratio.secondary, abs=0.03)
