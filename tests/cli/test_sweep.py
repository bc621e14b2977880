import contextlib
import csv
import io
import json
import os
import pty
import re
import subprocess
import sys
from pathlib import Path

import pytest

import combustor
from combustor.case.starter import starter_text
from combustor.cli import main

ROOT = Path(__file__).parents[2]
COARSE = "\n[model]\nstreams = 2\ncells = 2\nwall_stations = 20\n"
DILUTION = "hardware.openings.dilution.diameter"


@pytest.fixture(scope="module")
def folder(tmp_path_factory):
    """A folder with a coarse case that has its metal."""
    folder = tmp_path_factory.mktemp("sweep")
    (folder / "my.toml").write_text(starter_text() + COARSE)
    with contextlib.redirect_stdout(io.StringIO()), contextlib.redirect_stderr(io.StringIO()):
        assert main(["size", str(folder / "my.toml"), "-o", str(folder / "sized.toml")]) == 0
    return folder


@pytest.fixture(autouse=True)
def here(folder, monkeypatch):
    monkeypatch.chdir(folder)


@pytest.fixture(scope="module")
def hole(folder):
    """Dilution holes as sized, mm."""
    case = combustor.load_case(folder / "sized.toml")
    return 1000 * next(o.diameter for o in case.hardware.openings if o.name == "dilution")


@pytest.fixture(scope="module")
def asked(hole):
    """Fifteen values at two points, NOx and CO limited."""
    return [
        *("sweep", "sized.toml", "--vary", f"{DILUTION}={0.95 * hole:.3f} mm:{hole:.3f} mm:15"),
        *("--point", "full", "--point", "half", "--workers", "1", "--no-margins"),
        *("--nox-limit", "150 ppm", "--co-limit", "500 ppm"),
    ]


@pytest.fixture(scope="module")
def swept(folder, asked):
    """Exit code, text, document and notes of one sweep: run once, then taken up from its file."""
    answers = []
    with contextlib.chdir(folder):
        for extra in (["--csv", "tables"], ["--json"]):
            out, err = io.StringIO(), io.StringIO()
            with contextlib.redirect_stdout(out), contextlib.redirect_stderr(err):
                code = main([*asked, *extra])
            answers.append((code, out.getvalue(), err.getvalue()))
    return answers


def test_the_report_has_trends_plots_window_and_sensitivities(swept):
    code, text, _ = swept[0]
    assert code in (0, 1)
    for title in ("Trend at full", "Trend at half", "NOx along the sweep", "CO along the sweep"):
        assert f"\n{title}" in text
    assert "\nCO against NOx" in text
    assert f"\nWindow of {DILUTION} with NOx 150 ppm, CO 500 ppm" in text
    assert "\nChange per +1 % of each entry" in text
    assert "36: 30 of the sweep, 6 about the case" in text
    assert "3 more values are in --csv and --json" in text
    assert max(map(len, text.split("\n"))) <= 100


def test_the_document_holds_the_same_point_objects_with_their_varied_values(swept, hole):
    document = json.loads(swept[1][1], parse_constant=pytest.fail)
    points = document["points"]
    assert [point["name"] for point in points] == ["full", "half"] * 15
    assert points[0]["varied"][DILUTION] == pytest.approx(0.95e-3 * hole, abs=1e-6)
    assert points[-1]["varied"][DILUTION] == pytest.approx(1e-3 * hole, abs=1e-6)
    assert {"emissions", "split", "zones", "walls", "profile", "exit"} <= set(points[0])
    assert points[0]["status"] == "burning" and points[0]["converged"] is True
    assert document["vary"][0]["unit"] == "mm"
    assert document["limits"] == {"nox_ppmvd_15": 150.0, "co_ppmvd_15": 500.0}
    assert [w["point"] for w in document["windows"]] == ["full", "half", None]


def test_the_case_itself_is_rated_as_rate_does(swept):
    document = json.loads(swept[1][1])
    with contextlib.redirect_stdout(io.StringIO()) as out:
        main(["rate", "sized.toml", "--point", "full", "--json"])
    (rated,) = json.loads(out.getvalue())["points"]
    last = document["points"][-2]
    nox = rated["emissions"]["nox_ppmvd_15"]
    assert last["emissions"]["nox_ppmvd_15"] == pytest.approx(nox, rel=2e-3)
    full = document["sensitivities"][0]
    assert full["value"]["nox_ppmvd_15"] == pytest.approx(nox, rel=1e-9)


def test_sensitivities_agree_with_the_trend(swept, hole):
    document = json.loads(swept[1][1])
    line = [p for p in document["points"] if p["name"] == "full"]
    (full,) = [s for s in document["sensitivities"] if s["point"] == "full"]
    before, last = line[-3], line[-1]
    step = 100 * (last["varied"][DILUTION] / before["varied"][DILUTION] - 1)
    change = last["emissions"]["nox_ppmvd_15"] - before["emissions"]["nox_ppmvd_15"]
    assert full["change_per_percent"]["nox_ppmvd_15"] == pytest.approx(change / step, rel=0.1)


def test_the_tables_hold_every_rating(folder, swept):
    with (folder / "tables" / "sweep.csv").open() as stream:
        lines = list(csv.DictReader(stream))
    document = json.loads(swept[1][1])
    assert len(lines) == 30
    assert f"{DILUTION}_mm" in lines[0]
    for line, point in zip(lines, document["points"], strict=True):
        assert float(line["nox_ppmvd_15"]) == point["emissions"]["nox_ppmvd_15"]
        assert float(line["wall_peak_K"]) == max(w["temperature_K"] for w in point["walls"])
    assert (folder / "tables" / "sensitivities.csv").exists()
    assert (folder / "tables" / "windows.csv").exists()


def test_the_same_command_goes_on_from_its_own_file(folder, swept, asked, capsys):
    document = json.loads(swept[1][1])
    file = folder / document["results_file"]
    assert file.name.startswith("sized.") and file.name.endswith(".sweep.jsonl")
    before = file.read_bytes()
    main(asked)
    out, err = capsys.readouterr()
    assert "36 were done before" in out and err == ""
    assert file.read_bytes() == before
    assert len(before.splitlines()) == 37


def test_plain_ascii_in_80_columns_when_asked(asked, capsys, monkeypatch):
    monkeypatch.setenv("COLUMNS", "80")
    main([*asked, "--ascii"])
    out = capsys.readouterr().out
    assert out.isascii()
    assert max(map(len, out.split("\n"))) <= 80
    assert "a full   b half" in out


def test_a_picture_is_drawn_where_the_library_is_there(folder, asked, capsys):
    pytest.importorskip("matplotlib")
    for name, magic in (("a.png", b"\x89PNG"), ("a.svg", b"<?xml"), ("a.pdf", b"%PDF")):
        main([*asked, "--picture", name])
        assert (folder / name).read_bytes().startswith(magic)
    capsys.readouterr()
    assert main([*asked, "--picture", "a.png"]) == 2
    assert "--force" in capsys.readouterr().err


def test_a_picture_without_the_library_is_refused_before_any_work(asked, capsys, monkeypatch):
    monkeypatch.setitem(sys.modules, "matplotlib.figure", None)
    assert main([*asked, "--picture", "b.png"]) == 2
    assert "pip install 'combustor[plots]'" in capsys.readouterr().err


def test_two_entries_vary_together(capsys):
    arguments = [
        "sweep",
        "sized.toml",
        "--point",
        "full",
        "--workers",
        "1",
        "--no-margins",
        "--json",
    ]
    arguments += ["--vary", "points.full.humidity=0:0.01:2", "--vary", "fuel.temperature=288:388:2"]
    main(arguments)
    points = json.loads(capsys.readouterr().out)["points"]
    varied = [tuple(p["varied"].values()) for p in points]
    assert varied == [(0.0, 288.0), (0.0, 388.0), (0.01, 288.0), (0.01, 388.0)]
    nox = [p["emissions"]["nox_ppmvd_15"] for p in points]
    assert nox[2] < nox[0] and nox[3] < nox[1]
    main(arguments[:-5] + arguments[-4:])
    text = capsys.readouterr().out
    assert "NOx along the sweep, at full" in text
    assert re.search(r"^a humidity 0 kg/kg|^a humidity 0 ", text, re.M)


def test_a_key_of_one_point_says_that_the_others_stand_still(capsys):
    arguments = ["sweep", "sized.toml", "--vary", "points.full.humidity=0:0.01:2"]
    main([*arguments, "--point", "full", "--point", "half", "--workers", "1", "--no-margins"])
    out = capsys.readouterr().out
    assert "Only full moves with points.full.humidity" in out
    assert "No limit on NOx or CO is stated" in out


def test_a_point_that_fails_exits_1_with_its_reason(capsys):
    arguments = ["sweep", "sized.toml", "--vary", "points.full.exit_temperature=1300:2990:2"]
    assert main([*arguments, "--point", "full", "--workers", "1", "--no-margins"]) == 1
    out = capsys.readouterr().out
    assert re.search(r"^No result\n", out, re.M)
    assert "1 without a result" in out
    assert "! not converged" in out


BAD = [
    (["--vary", "fuel.name=1:2:3"], "is not a number"),
    (["--vary", "points.full.air_fow=1:2:3"], "did you mean 'points.full.air_flow'"),
    (["--vary", "points.full.air_flow=1:2:0"], "no points in the span"),
    (["--vary", "points.full.air_flow=9:9:4"], "start and stop are the same"),
    (["--vary", "points.full.air_flow=9:10:10000000"], "10000000 values"),
    (["--vary", "points.full.air_flow=9:10:" + "9" * 5000], "not a whole number"),
    (["--vary", "points.full.air_flow=9:10"], "KEY=START:STOP:COUNT"),
    (["--vary", "points.full.air_flow"], "KEY=START:STOP:COUNT"),
    (["--vary", "=1:2:3"], "KEY=START:STOP:COUNT"),
    (["--vary", "points.full.air_flow=9:10:x"], "COUNT is not a whole number"),
    (["--vary", "points.full.air_flow=nan:10:3"], "not a number"),
    (["--vary", "points.full.air_flow=9 bar:10 bar:3"], "a unit of mass flow is needed"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--results", "no/folder/r.jsonl"], "cannot be written"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--results", "."], "is not a file"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--results", "sized.toml"], "something other"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--csv", "sized.toml/x"], "no such folder"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--picture", "x.bmp"], "end it in .png"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--picture", "no/x.png"], "no such folder"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--point", "ful"], "no such operating point"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--workers", "0"], "1 to 512"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--nox-limit", "25"], "not a fraction"),
    (["--vary", f"{DILUTION}=0.04:0.05:3", "--co-limit", "0 ppm"], "above zero"),
    (["--vary", f"{DILUTION}=0.04:0.05:3"] * 3, "at most two"),
]


@pytest.mark.parametrize(("extra", "said"), BAD, ids=[f"{e[-1][:40]}" for e, _ in BAD])
def test_bad_requests_are_refused_before_any_work(folder, capsys, monkeypatch, extra, said):
    pytest.importorskip("matplotlib") if "--picture" in extra else None
    monkeypatch.setattr("combustor.studies.sweep_run.rate_task", pytest.fail)
    before = sorted(folder.iterdir())
    assert main(["sweep", "sized.toml", *extra]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert said in err and "nothing was computed" in err
    assert "Traceback" not in err and len(err) < 1500
    assert sorted(folder.iterdir()) == before


def test_all_bad_keys_are_told_at_once(capsys):
    arguments = ["sweep", "sized.toml", "--vary", "fuel.name=1:2:3", "--vary", "points.x.y=1:2:3"]
    assert main(arguments) == 2
    err = capsys.readouterr().err
    assert "fuel.name" in err and "points.x.y" in err


def test_progress_goes_to_a_terminal_on_stderr_and_nowhere_else(folder, hole):
    leader, follower = pty.openpty()
    process = subprocess.Popen(
        [
            *(sys.executable, "-m", "combustor", "sweep", "sized.toml"),
            *("--vary", f"{DILUTION}={hole:.3f} mm:{hole + 1:.3f} mm:2", "--point", "full"),
            *("--workers", "1", "--no-margins", "--json"),
        ],
        cwd=folder,
        env={**os.environ, "PYTHONPATH": str(ROOT)},
        stdout=subprocess.PIPE,
        stderr=follower,
    )
    os.close(follower)
    out, _ = process.communicate()
    drawn = b""
    with contextlib.suppress(OSError):
        while chunk := os.read(leader, 4096):
            drawn += chunk
    os.close(leader)
    json.loads(out)
    assert b"5 of 5 ratings" in drawn and b"left" in drawn
    assert b"\n" not in drawn.strip()


def test_a_target_on_given_metal_says_that_the_metal_stays(capsys):
    arguments = ["sweep", "sized.toml", "--vary", "targets.wall_temperature=1000:1200:2"]
    main([*arguments, "--point", "full", "--workers", "1", "--json"])
    points = json.loads(capsys.readouterr().out)["points"]
    cool, hot = ([line["percent"] for line in point["split"]] for point in points)
    assert cool == pytest.approx(hot, abs=1e-4)
    limits = [f["limit"] for p in points for f in p["findings"] if "wall temp" in f["what"]]
    assert limits == [1000.0, 1200.0]
    main([*arguments, "--point", "full", "--workers", "1", "--no-margins"])
    assert "targets.wall_temperature moves what is judged" in capsys.readouterr().out
