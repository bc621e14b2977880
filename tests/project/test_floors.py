"""Imports go downward only."""

import ast
from pathlib import Path

import pytest

import combustor

PACKAGE = Path(combustor.__file__).parent
FLOORS = {
    "base": 0,
    "case": 1,
    "gasdynamics": 1,
    "atmosphere": 1,
    "hardware": 2,
    "fuel": 2,
    "airflow": 3,
    "kinetics": 3,
    "heat": 3,
    "spray": 3,
    "emissions": 3,
    "operability": 3,
    "sizing": 4,
    "rating": 5,
    "studies": 6,
    "report": 7,
    "api": 8,
    "cli": 8,
}
PHYSICS = {room for room, floor in FLOORS.items() if floor == 3}
MODULES = sorted(p for p in PACKAGE.rglob("*.py") if p.parent != PACKAGE or p.stem in FLOORS)


def room_of(path):
    relative = path.relative_to(PACKAGE)
    return relative.parts[0].removesuffix(".py")


def imported_rooms(path):
    for node in ast.walk(ast.parse(path.read_text())):
        names = []
        if isinstance(node, ast.ImportFrom) and node.module and node.level == 0:
            names = [node.module]
            if node.module == "combustor":
                names = [f"combustor.{alias.name}" for alias in node.names]
        elif isinstance(node, ast.Import):
            names = [alias.name for alias in node.names]
        for name in names:
            parts = name.split(".")
            if parts[0] == "combustor" and len(parts) > 1 and parts[1] in FLOORS:
                yield parts[1]


@pytest.mark.parametrize("path", MODULES, ids=lambda p: str(p.relative_to(PACKAGE)))
def test_imports_go_downward_only(path):
    room = room_of(path)
    assert room in FLOORS, f"{room} has no floor yet"
    for other in imported_rooms(path):
        assert FLOORS[other] <= FLOORS[room], f"{room} imports {other} above it"
        if room in PHYSICS and other in PHYSICS:
            assert other == room, f"{room} and {other} are both physics"


def test_every_room_is_seen():
    assert {room_of(path) for path in MODULES} >= {"base", "case", "kinetics", "rating", "report"}
