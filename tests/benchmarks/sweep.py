"""A sweep on one core and on two, and its cost per rating against a lone ``rate``.

    python tests/benchmarks/sweep.py demo/industrial_can.toml --count 40 --repeat 3 --json

The case is sized first where it has no metal, so that the sweep rates one machine. Each way is
run as its user would: the command, from a cold start, into a fresh results file. The results of
all ways are compared to the last bit.
"""

from __future__ import annotations

import argparse
import json
import os
import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

from combustor.case import Case, load_case
from combustor.rating.rate import rate_case
from combustor.studies.sweep import sweep
from combustor.studies.sweep_axis import spaced

KEY = "hardware.openings.dilution.diameter"


def command(*words: str, folder: Path) -> float:
    """Run ``combustor`` and return the seconds it took."""
    begun = time.perf_counter()
    done = subprocess.run(
        [sys.executable, "-m", "combustor", *words],
        cwd=folder,
        env={**os.environ, "PYTHONPATH": str(Path(__file__).parents[2])},
        capture_output=True,
        text=True,
        check=False,
    )
    if done.returncode not in (0, 1) or done.stderr.startswith("combustor:"):
        raise SystemExit(done.stderr or done.stdout)
    return time.perf_counter() - begun


def sized(case: Path, folder: Path) -> Path:
    """Return the case with its metal."""
    if load_case(case).hardware is not None:
        return case
    command("size", str(case), "-o", str(folder / "sized.toml"), folder=folder)
    return folder / "sized.toml"


def lines(path: Path) -> list[str]:
    """Return the finished ratings of a results file in one order."""
    return sorted(path.read_text().splitlines()[1:])


def in_this_process(case: Case, count: int) -> float:
    """Return CPU time of a row of a sweep over that of rating the case, both warmed up."""
    rate_case(case)
    begun = time.process_time()
    rate_case(case)
    rate_case(case)
    alone = (time.process_time() - begun) / 2.0
    hole = hole_of(case)
    axes = [spaced(case, KEY, 0.95 * hole, 1.05 * hole, count)]
    begun = time.process_time()
    sweep(case, axes, workers=1)
    return (time.process_time() - begun) / (count + 3) / alone


def hole_of(case: Case) -> float:
    """Return the dilution holes of a case with metal, m."""
    assert case.hardware is not None
    found = next(o.diameter for o in case.hardware.openings if o.name == "dilution")
    assert found is not None
    return found


def measure(case: Path, count: int, repeat: int) -> dict[str, object]:
    """Return seconds of every way, their ratios and whether the bits agree."""
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        metal = sized(case.resolve(), folder)
        stated = load_case(metal)
        hole = hole_of(stated)
        points = len(stated.points)
        ratings = (count + 3) * points  # the case itself and a step to either side
        span = f"{KEY}={0.95 * hole!r}:{1.05 * hole!r}:{count}"
        seconds: dict[int, list[float]] = {1: [], 2: []}
        lone: list[float] = []
        bits = set()
        for turn in range(repeat):
            lone.append(command("rate", str(metal), folder=folder))
            for workers in (1, 2):
                results = folder / f"{workers}-{turn}.jsonl"
                words = ["sweep", str(metal), "--vary", span, "--results", str(results)]
                words += ["--workers", str(workers)]
                seconds[workers].append(command(*words, folder=folder))
                bits.add("\n".join(lines(results)))
        inside = in_this_process(stated, count)
    one, two = statistics.median(seconds[1]), statistics.median(seconds[2])
    alone = statistics.median(lone)
    return {
        "ratings": ratings,
        "seconds_one_core": seconds[1],
        "seconds_two_cores": seconds[2],
        "seconds_lone_rate": lone,
        "speedup_two_cores": one / two,
        "row_over_lone_rate_command": one / (count + 3) / alone,
        "row_over_rate_in_process_cpu": inside,
        "same_bits": len(bits) == 1,
    }


def main() -> None:
    """Print what was measured."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("case", type=Path)
    parser.add_argument("--count", type=int, default=40)
    parser.add_argument("--repeat", type=int, default=3)
    parser.add_argument("--json", action="store_true")
    arguments = parser.parse_args()
    found = measure(arguments.case, arguments.count, arguments.repeat)
    if arguments.json:
        print(json.dumps(found, indent=2))
        return
    for key, value in found.items():
        print(f"{key:28} {value}")


if __name__ == "__main__":
    main()
