"""One invented can, its fuel and its design, shared by the tests of sizing."""

from __future__ import annotations

import pytest

from combustor.case import loads_case
from combustor.case.schema import Case
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.sizing import Design, size
from combustor.sizing.size import task_of
from combustor.sizing.state import Task

CAN = """\
title = "Gravel works, fan drive"
[combustor]
layout = "can"
casing_diameter = "440 mm"
casing_length = "1150 mm"
inlet_annulus = { inner = "403 mm", outer = "445 mm" }
exit_annulus = { inner = "430 mm", outer = "520 mm" }
transition_length = "250 mm"
[fuel]
name = "natural-gas"
[[points]]
name = "full"
kind = "rated"
air_flow = "14.2 kg/s"
inlet_pressure = "9.9 bar"
inlet_temperature = "325 degC"
exit_temperature = "1000 degC"
[[points]]
name = "half"
kind = "part"
air_flow = "11.3 kg/s"
inlet_pressure = "7.2 bar"
inlet_temperature = "270 degC"
exit_temperature = "810 degC"
[[points]]
name = "idle"
kind = "idle"
air_flow = "5.35 kg/s"
inlet_pressure = "3.0 bar"
inlet_temperature = "150 degC"
fuel_flow = "0.0507 kg/s"
[targets]
design_point = "full"
pressure_loss = "4.5 %"
equivalence_ratio = { primary = 0.95, secondary = 0.60 }
pattern_factor = 0.15
wall_temperature = "850 degC"
"""


def can(*changes: tuple[str, str], targets: str = "", end: str = "") -> Case:
    """Return the can with lines replaced, lines added to [targets], and tables at the end."""
    text = CAN
    for old, new in changes:
        assert old in text
        text = text.replace(old, new)
    return loads_case(text + targets + "\n" + end, "can.toml")


@pytest.fixture(scope="session")
def case() -> Case:
    return can()


@pytest.fixture(scope="session")
def fuel() -> Fuel:
    return catalogue.find("natural-gas")


@pytest.fixture(scope="session")
def gas(fuel: Fuel) -> Gas:
    return Gas.load(fuel.mechanism)


@pytest.fixture(scope="session")
def task(case: Case, fuel: Fuel, gas: Gas) -> Task:
    return task_of(case, fuel, gas)


@pytest.fixture(scope="session")
def design(case: Case, fuel: Fuel, gas: Gas) -> Design:
    return size(case, fuel, gas)


@pytest.fixture(scope="session")
def make_can():
    return can
