"""Sweeps carried out: the same bits however they run, and nothing finished lost."""

import importlib
import json
import os
import signal
import subprocess
import sys
import time
from concurrent.futures import ThreadPoolExecutor
from functools import partial
from itertools import pairwise
from pathlib import Path

import pytest

import combustor
from combustor.base.errors import InputError
from combustor.case import loads_case
from combustor.report.sweep_data import described
from combustor.studies.executor import WorkerProcesses
from combustor.studies.sweep import carried_out, results_name
from combustor.studies.sweep_axis import spaced
from combustor.studies.sweep_plan import plan
from combustor.studies.sweep_run import WorkersDiedError

ROOT = Path(__file__).parents[2]
DILUTION = "hardware.openings.dilution.diameter"
POINTS = ["full", "p40"]


def lines_of(path):
    """The whole lines of finished ratings in a results file, by row and point."""
    data = path.read_text()
    lines = data[: data.rfind("\n") + 1].splitlines()[1:]
    return sorted(lines, key=lambda line: (json.loads(line)["row"], json.loads(line)["point"]))


@pytest.fixture(scope="module")
def laid(metal_case):
    axes = [spaced(metal_case, DILUTION, "44 mm", "49 mm", 6)]
    return plan(metal_case, axes, POINTS, operability=False)


@pytest.fixture(scope="module")
def folder(tmp_path_factory):
    return tmp_path_factory.mktemp("sweeps")


@pytest.fixture(scope="module")
def alone(laid, folder):
    """The sweep in this process: what every other way must reproduce."""
    path = folder / "alone.jsonl"
    found = carried_out(laid, path, workers=1, describe=described)
    return found, path


def test_every_rating_is_there_in_the_order_of_the_plan(laid, alone):
    found, path = alone
    order = [(row.label, point) for row in laid.rows for point in POINTS]
    assert [(r.row, r.point) for r in found.results] == order
    assert len(lines_of(path)) == laid.ratings == 18
    assert all(result.outcome.burning for result in found.results)
    assert [r.point for _, r in found.grid] == POINTS * 6


def test_a_swept_rating_is_the_rating_of_that_case(metal_case, alone):
    case = combustor.case.override(metal_case, DILUTION, 0.044)
    rated = combustor.rate(case, points=["full"]).points[0]
    swept = alone[0].outcomes["0", "full"]
    assert swept.exit_temperature == pytest.approx(rated.exit.temperature, abs=0.1)
    assert swept.nox == pytest.approx(rated.emissions.nox_dry_15, rel=2e-3)
    assert swept.pressure_loss == pytest.approx(rated.pressure_loss, rel=1e-4)


def test_margins_are_those_of_a_rating_and_move_with_the_sweep(metal_case):
    axes = [spaced(metal_case, "points.p40.exit_temperature", 1000.0, 1100.0, 3)]
    laid = plan(metal_case, axes, ["p40"], sensitivities=False)
    found = carried_out(laid, workers=1)
    margins = [r.outcome.blowout_margin for _, r in found.grid]
    assert margins == sorted(margins) and margins[0] < margins[-1]
    case = combustor.case.override(metal_case, "points.p40.exit_temperature", 1050.0)
    rated = combustor.rate(case, points=["p40"]).points[0]
    assert margins[1] == rated.operability["blowout_margin_percent"]


def test_more_dilution_area_takes_air_from_the_front(alone):
    found = alone[0]
    for point in POINTS:
        line = [r.outcome for _, r in found.grid if r.point == point]
        for before, after in pairwise(line):
            assert after.primary_air < before.primary_air
            assert after.pressure_loss < before.pressure_loss
            assert after.primary_equivalence_ratio > before.primary_equivalence_ratio


@pytest.mark.parametrize("how", ["two processes", "threads"])
def test_bits_do_not_depend_on_workers_or_executor(laid, alone, folder, how):
    path = folder / f"{how}.jsonl"
    if how == "threads":
        with ThreadPoolExecutor(3) as threads:
            found = carried_out(laid, path, executor=threads, describe=described)
    else:
        found = carried_out(laid, path, workers=2, describe=described)
    assert lines_of(path) == lines_of(alone[1])
    assert found.results == alone[0].results


def test_a_cluster_of_another_library_fits_in_unchanged(laid, alone, folder):
    distributed = pytest.importorskip("distributed")
    path = folder / "cluster.jsonl"
    with (
        distributed.LocalCluster(
            n_workers=2, threads_per_worker=1, processes=True, dashboard_address=None
        ) as cluster,
        distributed.Client(cluster) as client,
    ):
        carried_out(laid, path, executor=client.get_executor(), describe=described)
    assert lines_of(path) == lines_of(alone[1])


def counting(tell):
    return lambda progress: tell.append(progress)


@pytest.mark.parametrize("share", [0.001, 0.4, 0.7, 0.999])
def test_a_file_cut_off_resumes_to_the_same_bits(laid, alone, folder, share):
    data = alone[1].read_bytes()
    path = folder / "cut.jsonl"
    path.write_bytes(data[: int(share * len(data))])
    kept = max(path.read_bytes().count(b"\n") - 1, 0)
    told = []
    found = carried_out(laid, path, workers=1, report=counting(told), describe=described)
    assert lines_of(path) == lines_of(alone[1])
    assert found.resumed == told[0].resumed == kept
    assert told[-1].finished == laid.ratings and told[-1].remaining == 0.0
    path.unlink()


def test_a_finished_file_is_only_read(laid, alone):
    before = alone[1].read_bytes()
    found = carried_out(laid, alone[1], workers=2, describe=described)
    assert found.resumed == laid.ratings
    assert found.results == alone[0].results
    assert alone[1].read_bytes() == before


def test_another_sweep_into_the_same_file_is_refused(metal_case, alone):
    axes = [spaced(metal_case, DILUTION, "44 mm", "49 mm", 5)]
    other = plan(metal_case, axes, POINTS, operability=False)
    with pytest.raises(InputError, match="varies other entries"):
        carried_out(other, alone[1], workers=1, describe=described)
    assert results_name(other, "x", True) != results_name(alone[0].plan, "x", True)


DYING = """
import os, signal
from pathlib import Path
from combustor.report.sweep_data import described

def once(marker, rated):
    try:
        Path(marker).touch(exist_ok=False)
    except FileExistsError:
        return described(rated)
    os.kill(os.getpid(), signal.SIGKILL)

def always(rated):
    os.kill(os.getpid(), signal.SIGKILL)
"""


@pytest.fixture
def dying(tmp_path, monkeypatch):
    """A module that workers can import, whose functions kill the worker that calls them."""
    (tmp_path / "dying_describe.py").write_text(DYING)
    monkeypatch.syspath_prepend(tmp_path)
    yield importlib.import_module("dying_describe")
    del sys.modules["dying_describe"]


def test_a_killed_worker_costs_nothing_but_time(laid, alone, folder, dying):
    path = folder / "killed.jsonl"
    kill = partial(dying.once, str(folder / "marker"))
    carried_out(laid, path, workers=2, describe=kill)
    assert (folder / "marker").exists()
    assert lines_of(path) == lines_of(alone[1])


def test_workers_that_die_again_and_again_end_the_sweep_with_what_is_done_kept(
    laid, alone, folder, dying
):
    path = folder / "dying.jsonl"
    half = alone[1].read_bytes().splitlines(keepends=True)[:6]
    path.write_bytes(b"".join(half))
    with pytest.raises(WorkersDiedError, match=r"13 of 18 ratings are left.*kept"):
        carried_out(laid, path, workers=2, describe=dying.always)
    assert path.read_bytes() == b"".join(half)


def test_a_fault_of_the_callers_is_told_and_no_result(laid, folder):
    path = folder / "fault.jsonl"
    with pytest.raises(WorkersDiedError, match=r"ZeroDivisionError.*18 of 18 ratings are left"):
        carried_out(laid, path, workers=1, describe=lambda rated: 1 / 0)
    assert lines_of(path) == []


def test_a_broken_executor_of_the_callers_ends_the_sweep_plainly(laid, folder, dying):
    with WorkerProcesses(1) as pool, pytest.raises(WorkersDiedError, match="kept"):
        carried_out(laid, folder / "broken.jsonl", executor=pool, describe=dying.always)


def test_a_point_that_fails_is_a_row_with_its_reason(metal_case):
    hot = spaced(metal_case, "points.full.exit_temperature", 1200.0, 2990.0, 2)
    starved = spaced(metal_case, "points.idle.fuel_flow", 1e-4, 0.05, 2)
    laid = plan(metal_case, [hot, starved], ["full", "idle"], False, False)
    found = carried_out(laid, workers=1, describe=described)
    rows = {(row.indices, r.point): r for row, r in found.grid}
    assert rows[(0, 0), "full"].outcome.burning
    assert rows[(1, 0), "full"].outcome.status == "not_converged"
    assert "exit" in rows[(1, 0), "full"].outcome.reason
    assert rows[(0, 0), "idle"].outcome.status == "blown_out"
    assert rows[(0, 1), "idle"].outcome.burning
    document = rows[(1, 0), "full"].document
    assert document["status"] == "not_converged" and document["converged"] is False
    assert document["emissions"]["nox_ppmvd_15"] is None
    assert document["findings"][0]["level"] == "act"


def test_a_case_without_metal_is_sized_anew_in_every_row(metal_text):
    bare = loads_case(metal_text.split("# The metal")[0] + "[model]\nstreams = 2\ncells = 1\n")
    assert bare.hardware is None
    axes = [spaced(bare, "targets.equivalence_ratio.primary", 0.85, 0.95, 2)]
    laid = plan(bare, axes, ["full", "p80"], sensitivities=False, operability=False)
    one = carried_out(laid, workers=1)
    two = carried_out(laid, workers=2)
    assert one.results == two.results
    reached = [one.outcomes[str(i), "full"].primary_equivalence_ratio for i in range(2)]
    assert reached == pytest.approx([0.85, 0.95], abs=0.03)


def test_a_row_that_cannot_be_sized_says_why(metal_text):
    bare = loads_case(metal_text.split("# The metal")[0] + "[model]\nstreams = 2\ncells = 1\n")
    axes = [spaced(bare, "combustor.casing_diameter", "150 mm", "440 mm", 2)]
    laid = plan(bare, axes, ["full"], sensitivities=False, operability=False)
    found = carried_out(laid, workers=1)
    small, large = (r.outcome for _, r in found.grid)
    assert large.burning
    assert small.status == "not_converged" and "sizing" in small.reason


@pytest.fixture
def command(metal_text, tmp_path):
    """A sweep as its own process, long enough to be stopped on the way."""
    (tmp_path / "case.toml").write_text(metal_text)
    arguments = ["sweep", "case.toml", "--vary", f"{DILUTION}=44 mm:49 mm:6", "--workers", "2"]
    arguments += ["--point", "full", "--point", "p40", "--results", "r.jsonl", "--no-margins"]
    environment = {**os.environ, "PYTHONPATH": str(ROOT)}
    started = []

    def start():
        process = subprocess.Popen(
            [sys.executable, "-m", "combustor", *arguments],
            cwd=tmp_path,
            env=environment,
            stdout=subprocess.PIPE,
            stderr=subprocess.PIPE,
            text=True,
        )
        started.append(process)
        return process

    yield start
    for process in started:
        if process.poll() is None:
            process.kill()
        process.communicate()


def wait_for_lines(process, path, count):
    while process.poll() is None:
        if path.exists() and path.read_bytes().count(b"\n") > count:
            return
        time.sleep(0.005)


def children_of(process):
    return [
        int(pid)
        for pid in Path(f"/proc/{process.pid}/task/{process.pid}/children").read_text().split()
    ]


def is_worker(pid):
    try:
        words = Path(f"/proc/{pid}/cmdline").read_bytes()
    except OSError:
        return False
    return b"spawn_main" in words


needs_proc = pytest.mark.skipif(
    not Path(f"/proc/self/task/{os.getpid()}/children").exists(), reason="needs /proc"
)


@needs_proc
def test_a_killed_sweep_loses_nothing_finished_leaves_no_worker_and_resumes(
    command, tmp_path, alone
):
    path = tmp_path / "r.jsonl"
    process = command()
    wait_for_lines(process, path, 3)
    workers = [pid for pid in children_of(process) if is_worker(pid)]
    assert workers
    process.send_signal(signal.SIGKILL)
    process.communicate()
    kept = lines_of(path)
    while any(is_worker(pid) for pid in workers):
        time.sleep(0.01)
    again = command()
    wait_for_lines(again, path, 1 + len(kept))
    second = command()
    out, err = second.communicate()
    # refused while the first still writes; a first that has just let go leaves it nothing to do
    if second.returncode == 2:
        assert out == "" and "another sweep is writing to it" in err
    else:
        assert second.returncode in (0, 1) and "were done before" in out
    out, err = again.communicate()
    assert again.returncode in (0, 1) and err == ""
    assert "were done before" in out
    assert lines_of(path) == lines_of(alone[1])
    assert set(kept) <= set(lines_of(path))


@needs_proc
def test_a_worker_killed_from_outside_is_replaced(command, tmp_path, alone):
    path = tmp_path / "r.jsonl"
    process = command()
    wait_for_lines(process, path, 2)
    for pid in children_of(process):
        if is_worker(pid):
            os.kill(pid, signal.SIGKILL)
            break
    _, err = process.communicate()
    assert process.returncode in (0, 1) and err == ""
    assert lines_of(path) == lines_of(alone[1])


def test_an_interrupt_keeps_what_is_done_and_says_how_to_go_on(command, tmp_path, alone):
    path = tmp_path / "r.jsonl"
    process = command()
    wait_for_lines(process, path, 3)
    process.send_signal(signal.SIGINT)
    out, err = process.communicate()
    assert process.returncode == 130
    assert out == ""
    assert "ratings are done and kept in r.jsonl; the same command goes on" in err
    assert "Traceback" not in err
    done = lines_of(path)
    assert len(done) >= 3
    assert set(done) <= set(lines_of(alone[1]))
