from pathlib import Path

import pytest

from combustor.case import Case, load_case, loads_case
from combustor.case.write import complete
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.hardware.to_case import table_of
from combustor.sizing.size import size

DEMO = Path(__file__).parents[2] / "demo" / "industrial_can.toml"

# Coarse, so that a rating costs little; what is tested here does not depend on it.
COARSE = "\n[model]\nstreams = 2\ncells = 2\nwall_stations = 20\n"


@pytest.fixture(scope="session")
def metal_text() -> str:
    """The demo machine as a case file with its metal, solved coarsely."""
    case = load_case(DEMO)
    fuel = fuel_of(case)
    design = size(case, fuel, Gas.load(fuel.mechanism))
    return complete(case.text, table_of(design.hardware)) + COARSE


@pytest.fixture(scope="session")
def metal_case(metal_text: str) -> Case:
    return loads_case(metal_text)


@pytest.fixture(scope="session")
def diameter(metal_case: Case) -> float:
    """Dilution holes of that machine, m."""
    return next(o.diameter for o in metal_case.hardware.openings if o.name == "dilution")
