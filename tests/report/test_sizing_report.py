import json
import math
import re
from types import SimpleNamespace

import pytest

from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.base.method import Method
from combustor.report.json_out import dumps
from combustor.report.sizing_tables import (
    SIZING_TABLES,
    design_document,
    dimensions_table,
    sizing_data,
    sizing_report,
)
from combustor.report.terminal import Page, render
from combustor.sizing.record import Candidate, Design, Dimension, ZoneTarget

OPTIMUM = Method("k-opt", "optimum liner area ratio", "Some Author 1958", "from memory")
RULE = Method("k-rule", "fixed liner area ratio", "Another 1973", "from memory")
SPACING = Method("pitch", "holes by pitch", "rule of thumb", "common practice, no source")


@pytest.fixture
def design(ratings) -> Design:
    point = ratings.points[0]
    return Design(
        hardware=point.hardware,
        dimensions=(
            Dimension(
                "liner area ratio", 0.6712, "ratio", OPTIMUM, Candidate(0.7, RULE, "more loss")
            ),
            Dimension("liner diameter", 0.3897, "length", OPTIMUM, note="rounded to 0.1 mm"),
            Dimension("vane angle", math.pi / 4, "angle", RULE),
            Dimension("dil_2 holes", 8.0, "count", SPACING, Candidate(10.0, RULE, "too shallow")),
            Dimension("film air", 0.31, "fraction", RULE),
            Dimension("dil_2 hole area", 7.306e-4, "area", RULE),
        ),
        findings=(Finding("watch", "loading", 8.1, 7.3, "-", "raise the diameter", "theta"),),
        split=point.split,
        zones=(ZoneTarget("primary", 0.95, 0.951), ZoneTarget("secondary", 0.6, 0.588)),
        pressure_loss_target=0.045,
        fuel_flow=0.2451,
        convergence=Convergence(True, 1e-9, 7),
    )


@pytest.fixture
def case():
    targets = SimpleNamespace(design_point="full")
    point = SimpleNamespace(air_flow=14.2)
    return SimpleNamespace(
        title="Works can", sha256="cd" * 32, targets=targets, point=lambda name: point
    )


@pytest.mark.parametrize("width", [100, 80, 40])
def test_the_report_fits_and_says_method_source_and_what_lost(design, case, width):
    text = render(sizing_report(design, case, ("mind the gas",)), Page(width))
    assert max(map(len, text.split("\n"))) <= width
    words = " ".join(text.split())
    for part in ("Some", "1958", "from memory", "Another", "loading", "Mind the gas."):
        assert part in words


def test_each_dimension_has_its_unit_and_its_rival(design):
    lines = render([dimensions_table(design)], Page(100)).split("\n")

    def line(name):
        return next(text for text in lines if text.startswith(name))

    assert line("liner area ratio").split()[3:5] == ["0.671", "-"]
    assert lines[lines.index(line("liner area ratio")) + 1].split() == (
        ["not", "0.700", "by", "fixed", "liner", "area", "ratio", "[2]:", "more", "loss"]
    )
    assert line("liner diameter").split()[2:4] == ["389.70", "mm"]
    assert line("liner diameter").endswith("optimum liner area ratio [1]; rounded to 0.1 mm")
    assert line("vane angle").split()[2:4] == ["45.0", "deg"]
    assert line("dil_2 holes").split()[2] == "8"
    assert line("film air").split()[2:4] == ["31.00", "%"]
    assert line("dil_2 hole area").split()[3:5] == ["731", "mm2"]


def test_every_number_of_a_method_stands_in_the_list_of_methods(design, case):
    text = render(sizing_report(design, case, ()), Page(100))
    listed = text.split("Methods and their sources")[1].split("Zones")[0]
    for number in set(re.findall(r"\[\d+\]", text)):
        assert f"\n{number}  " in listed
    assert "common practice, no source" in listed


def test_the_document_holds_every_dimension_in_full(design, case):
    document = json.loads(dumps(design_document(design, case, "1")), parse_constant=pytest.fail)
    assert document["case_sha256"] == case.sha256
    first, second = document["dimensions"][:2]
    assert first == {
        "name": "liner area ratio",
        "value": 0.6712,
        "unit": "-",
        "method": "optimum liner area ratio",
        "source": "Some Author 1958",
        "reading": "from memory",
        "note": "",
        "candidate_value": 0.7,
        "candidate_method": "fixed liner area ratio",
        "candidate_source": "Another 1973 (from memory)",
        "candidate_reason": "more loss",
    }
    assert second["value"] == pytest.approx(389.7)
    assert second["candidate_value"] is None
    assert document["zones"][1] == {"name": "secondary", "wanted": 0.6, "reached": 0.588}
    assert document["pressure_loss_percent"] == pytest.approx(4.51)
    assert [line["name"] for line in document["split"]] == ["swirler", "dil_2", "seals"]


def test_the_tables_are_those_announced(design, case):
    assert tuple(table.name for table in sizing_data(design, case)) == SIZING_TABLES
