"""What a stranger with a checkout relies on: layout, set-up lines, an install that works."""

import os
import re
import subprocess
import sys
import tomllib
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
TOP_LEVEL = {
    "README.md",
    "DEVELOPERS.md",
    "pyproject.toml",
    "combustor",
    "tests",
    "mechanisms",
    "demo",
}


def test_top_level_is_fixed():
    found = {path.name for path in ROOT.iterdir() if not path.name.startswith(".")}
    assert found - {"build", "dist"} == TOP_LEVEL


def test_ci_runs_the_test_line_of_the_readme():
    line = ".venv/bin/pip install '.[test]' && .venv/bin/pytest"
    assert line in (ROOT / "README.md").read_text()
    assert line in (ROOT / ".ci" / "run").read_text().splitlines()


def test_licence_is_named():
    project = tomllib.loads((ROOT / "pyproject.toml").read_text())["project"]
    assert project["license"] == "Apache-2.0"
    assert "Apache-2.0" in (ROOT / "README.md").read_text()


def test_readme_fences_run():
    blocks = re.findall(r"```python\n(.*?)```", (ROOT / "README.md").read_text(), re.DOTALL)
    assert blocks
    for block in blocks:
        done = subprocess.run(
            [sys.executable, "-c", block], cwd=ROOT, capture_output=True, text=True, check=False
        )
        assert done.returncode == 0, done.stderr


DEMOS = sorted((ROOT / "demo").glob("*.toml"))


@pytest.mark.parametrize(
    "demo", [d for d in DEMOS if "[[points]]" in d.read_text()], ids=lambda p: p.stem
)
def test_demo_exits_0(demo, tmp_path):
    done = subprocess.run(
        [sys.executable, "-m", "combustor", "rate", str(demo)],
        cwd=tmp_path,
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stdout[-3000:] + done.stderr


@pytest.fixture(scope="module")
def wheel_install(tmp_path_factory):
    """A real wheel, installed into a folder of its own away from the checkout."""
    folder = tmp_path_factory.mktemp("wheel")
    build = [sys.executable, "-m", "pip", "wheel", "--no-deps", "-q", "-w", str(folder), str(ROOT)]
    subprocess.run(build, check=True, capture_output=True)
    (wheel,) = folder.glob("combustor-*.whl")
    site = folder / "site"
    install = [sys.executable, "-m", "pip", "install", "--no-deps", "-q", "--target", str(site)]
    subprocess.run([*install, str(wheel)], check=True, capture_output=True)
    return site


def run_installed(site, code, cwd):
    environment = {**os.environ, "PYTHONPATH": str(site)}
    return subprocess.run(
        [sys.executable, "-c", code],
        cwd=cwd,
        env=environment,
        capture_output=True,
        text=True,
        check=False,
    )


def test_mechanisms_reach_the_wheel(wheel_install, tmp_path):
    code = (
        "import combustor\n"
        "from combustor.fuel.mechanism import locate\n"
        "from combustor.fuel.choose_mechanism import catalogue\n"
        "print(combustor.__file__)\n"
        "print(len(catalogue()))\n"
        "print(combustor.find_fuel('natural-gas').mechanism)\n"
    )
    done = run_installed(wheel_install, code, tmp_path)
    assert done.returncode == 0, done.stderr
    home, known, _ = done.stdout.splitlines()
    assert Path(home).is_relative_to(wheel_install)
    assert int(known) >= 2


def test_installed_wheel_rates_a_new_case_in_another_folder(wheel_install, tmp_path):
    code = (
        "from combustor.cli import main\n"
        "assert main(['new', 'mine.toml']) == 0\n"
        "raise SystemExit(main(['rate', 'mine.toml', '--point', 'full']))\n"
    )
    done = run_installed(wheel_install, code, tmp_path)
    assert done.returncode == 0, done.stdout[-2000:] + done.stderr
    assert "burning" in done.stdout
