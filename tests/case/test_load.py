"""Good files load; every bad input is refused with its place, never with a traceback."""

import os
from pathlib import Path

import pytest
from case_samples import GOOD, HARDWARE, line_with, swap
from hypothesis import example, given, settings
from hypothesis import strategies as st

from combustor.base.errors import EXIT_INPUT, InputError
from combustor.case import Case, load_case, loads_case, override

DEMO = Path(__file__).parents[2] / "demo" / "industrial_can.toml"


def problems(text: str) -> list:
    with pytest.raises(InputError) as caught:
        loads_case(text, "rig.toml")
    assert caught.value.exit_code == EXIT_INPUT
    for problem in caught.value.problems:
        assert problem.file == "rig.toml"
        assert "\n" not in str(problem)
    return list(caught.value.problems)


def test_values_are_si() -> None:
    case = loads_case(GOOD)
    full, idle = case.points
    assert case.title == "test rig"
    assert (full.air_flow, full.inlet_pressure) == (14.2, 990000.0)
    assert (full.inlet_temperature, full.exit_temperature) == (598.15, 1273.15)
    assert (full.fuel_flow, idle.fuel_flow, idle.exit_temperature) == (None, 0.0507, None)
    assert full.humidity == 0.00634
    assert case.combustor.inlet_annulus is not None
    assert case.combustor.inlet_annulus.outer == 0.445
    assert case.targets.pressure_loss == 0.045
    assert case.point("idle") is idle
    assert case.design_point is full


def test_defaults_are_there_without_their_tables() -> None:
    case = loads_case(GOOD)
    assert case.hardware is None
    assert case.model.unmixedness is None
    assert case.model.primary_jet_share == 0.5
    assert case.rules.names == ()
    assert case.targets.equivalence_ratio.primary == 0.95
    assert case.fuel.temperature == 288.15


def test_the_design_point_left_out_is_the_rated_point() -> None:
    text = swap(GOOD, 'design_point = "full"\n', "")
    assert loads_case(text).targets.design_point == "full"
    assert loads_case(text.replace('"rated"', '"part"')).targets.design_point == "full"


def test_a_case_is_frozen_and_remembers_its_text() -> None:
    case = loads_case(GOOD, "rig.toml")
    assert (case.text, case.file) == (GOOD, "rig.toml")
    with pytest.raises(Exception, match="frozen"):
        case.title = "other"


def test_sha256_is_that_of_the_file() -> None:
    # digest of the four bytes "a=1\n" is fixed by FIPS 180-4; here the case's own bytes
    import hashlib

    assert load_case(DEMO).sha256 == hashlib.sha256(DEMO.read_bytes()).hexdigest()


def test_the_demo_loads_from_its_file() -> None:
    case = load_case(DEMO)
    assert [point.name for point in case.points] == ["full", "p80", "p60", "p40", "idle"]


def test_bare_numbers_say_the_same_as_units() -> None:
    bare = (
        GOOD.replace('"440 mm"', "0.44").replace('"9.9 bar"', "990000").replace('"4.5 %"', "0.045")
    )
    assert loads_case(bare) == loads_case(GOOD)


def test_order_of_tables_says_nothing() -> None:
    head, targets = GOOD.split("[targets]")
    title, rest = head.split("\n", 1)
    assert loads_case(f"{title}\n[targets]{targets}{rest}") == loads_case(GOOD)


def test_hardware_makes_the_envelope_and_targets_optional() -> None:
    text = GOOD.split("[targets]")[0] + HARDWARE
    text = swap(text, 'casing_length = "1150 mm"\n', "")
    assert loads_case(text).targets.pressure_loss is None


# (old, new, key, fact): one slip each, placed at the line that holds `new`
SLIPS = [
    ('title = "test rig"', 'titel = "x"', "titel", "unknown key"),
    ('title = "test rig"', "title = 3", "title", "not text"),
    ('title = "test rig"', 'title = " "', "title", "empty"),
    ('title = "test rig"', 'title = "a\\u0007b"', "title", "control characters"),
    ('layout = "can"', 'layout = "cann"', "combustor.layout", "not one of the choices"),
    ('layout = "can"', "layout = 1", "combustor.layout", "not one of the choices"),
    ('layout = "can"', 'layout = "can"\ncans = 0', "combustor.cans", "outside 1 to 100"),
    ('layout = "can"', 'layout = "can"\ncans = 1.5', "combustor.cans", "not a whole number"),
    ('layout = "can"', 'layout = "can"\ncans = true', "combustor.cans", "not a whole number"),
    ('"440 mm"', '"440 bar"', "combustor.casing_diameter", "unit of pressure"),
    ('"440 mm"', '"440"', "combustor.casing_diameter", "no unit"),
    ('"440 mm"', "440", "combustor.casing_diameter", "bare numbers are m"),
    ('"440 mm"', "[1, 2]", "combustor.casing_diameter", "not a quantity"),
    ('"440 mm"', "1979-05-27", "combustor.casing_diameter", "not a quantity"),
    ('"403 mm"', '"500 mm"', "combustor.inlet_annulus.inner", "not smaller"),
    ('inner = "403 mm"', 'iner = "403 mm"', "combustor.inlet_annulus.iner", "unknown key"),
    ('"natural-gas"', '""', "fuel.name", "empty"),
    ('"natural-gas"', "5", "fuel.name", "not text"),
    ('kind = "rated"', 'kind = "rate"', "points[0].kind", "not one of the choices"),
    ('"14.2 kg/s"', "-14.2", "points[0].air_flow", "negative"),
    ('"14.2 kg/s"', "0", "points[0].air_flow", "zero"),
    ('"14.2 kg/s"', "nan", "points[0].air_flow", "not a finite number"),
    ('"14.2 kg/s"', "inf", "points[0].air_flow", "not a finite number"),
    ('"14.2 kg/s"', '"nan kg/s"', "points[0].air_flow", "not a finite number"),
    ('"14.2 kg/s"', '"14200 kg/s"', "points[0].air_flow", "outside the plausible range"),
    ('"14.2 kg/s"', "1e300", "points[0].air_flow", "outside the plausible range"),
    ('"14.2 kg/s"', "true", "points[0].air_flow", "not a quantity"),
    ('"14.2 kg/s"', '"14.2 m3/s"', "points[0].air_flow", "unit of"),
    ('"9.9 bar"', '"9.9 barg"', "points[0].inlet_pressure", "gauge unit"),
    ('"9.9 bar"', '"129 psig"', "points[0].inlet_pressure", "gauge unit"),
    ('"9.9 bar"', "9.9", "points[0].inlet_pressure", "bare numbers are Pa"),
    ('"9.9 bar"', '"990 bar"', "points[0].inlet_pressure", "outside the plausible range"),
    ('"325 degC"', '"325 delta_degC"', "points[0].inlet_temperature", "difference"),
    ('"325 degC"', '"-274 degC"', "points[0].inlet_temperature", "negative"),
    ('"325 degC"', '"1100 degC"', "points[0].exit_temperature", "not above the inlet"),
    ('exit_temperature = "1000 degC"', 'exit_temprature = "1000 degC"',
     "points[0].exit_temprature", "unknown key"),
    ('fuel_flow = "0.0507 kg/s"', 'fuel_flow = "0.05 kg/s"\nfuel_air_ratio = 0.01',
     "points[1].fuel_air_ratio", "contradicts fuel_flow"),
    ('fuel_flow = "0.0507 kg/s"', 'fuel_flow = "0.05 kg/s"\nexit_temperature = 900',
     "points[1].fuel_flow", "contradicts exit_temperature"),
    ('name = "idle"', 'name = "full"', "points[1].name", "the same name twice"),
    ('name = "idle"', 'name = "a*"', "points[1].name", "holds '*'"),
    ('design_point = "full"', 'design_point = "ful"', "targets.design_point", "no such point"),
    ('design_point = "full"', "air_flow = 3", "targets.air_flow", "does not belong here"),
    ('"4.5 %"', "5", "targets.pressure_loss", "not a fraction"),
    ('"4.5 %"', '"5"', "targets.pressure_loss", "not a fraction"),
    ('"4.5 %"', '"450 %"', "targets.pressure_loss", "outside the plausible range"),
    ('"4.5 %"', '"4.5 %"\nequivalence_ratio = { primary = 0.5, secondary = 0.7 }',
     "targets.equivalence_ratio.secondary", "not below the primary"),
    ('"4.5 %"', '"4.5 %"\nequivalence_ratio = 0.5', "targets.equivalence_ratio", "not a table"),
    ('"4.5 %"', '"4.5 %"\nfront_end = "difusion"', "targets.front_end", "not one of the choices"),
]  # fmt: skip


@pytest.mark.parametrize(("old", "new", "key", "fact"), SLIPS, ids=[s[1] for s in SLIPS])
def test_a_slip_is_refused_at_its_place(old: str, new: str, key: str, fact: str) -> None:
    text = swap(GOOD, old, new)
    (problem,) = problems(text)
    assert problem.key.split(" ")[0] == key
    assert fact in problem.what
    last = key.split(".")[-1].split("[")[0]
    assert problem.line is not None
    assert last in text.split("\n")[problem.line - 1]


@pytest.mark.parametrize(
    ("old", "key"),
    [
        ("[combustor]\n" + GOOD.split("[combustor]\n")[1].split("[fuel]")[0], "combustor"),
        ('[fuel]\nname = "natural-gas"\n', "fuel"),
        ('name = "natural-gas"\n', "fuel"),
        ('layout = "can"\n', "combustor.layout"),
        ('casing_diameter = "440 mm"\n', "combustor.casing_diameter"),
        ('casing_length = "1150 mm"\n', "combustor.casing_length"),
        ('name = "full"\n', "points[0].name"),
        ('kind = "rated"\n', "points[0].kind"),
        ('air_flow = "14.2 kg/s"\n', "points[0].air_flow"),
        ('inlet_pressure = "9.9 bar"\n', "points[0].inlet_pressure"),
        ('inlet_temperature = "325 degC"\n', "points[0].inlet_temperature"),
        ('exit_temperature = "1000 degC"\n', "points[0]"),
        ('pressure_loss = "4.5 %"\n', "targets.pressure_loss"),
    ],
)
def test_what_is_missing_is_named(old: str, key: str) -> None:
    found = [problem.key.split(" ")[0] for problem in problems(swap(GOOD, old, ""))]
    assert key in found


def test_no_points() -> None:
    head = GOOD.split("[[points]]")[0] + '[targets]\npressure_loss = "4.5 %"\n'
    (problem,) = problems(head)
    assert problem.key == "points"
    (problem,) = problems("points = []\n" + head)
    assert problem.what == "empty list"


def test_points_as_a_single_table() -> None:
    text = GOOD.replace('[[points]]\nname = "idle"', '[point_two]\nname = "idle"')
    text = text.replace("[[points]]", "[points]")
    assert "write [[points]]" in {p.allowed for p in problems(text)}


def test_every_problem_is_reported_at_once_in_the_order_of_the_file() -> None:
    text = GOOD
    for old, new in (
        ('"440 mm"', '"440 kg"'),
        ('"14.2 kg/s"', "-1"),
        ('"9.9 bar"', '"9.9 barg"'),
        ('name = "idle"', 'name = "full"'),
        ('"4.5 %"', "4.5"),
    ):
        text = swap(text, old, new)
    lines = [problem.line for problem in problems(text)]
    assert lines == sorted(lines)
    assert lines == [
        line_with(text, '"440 kg"'),
        line_with(text, "= -1"),
        line_with(text, "barg"),
        text[: text.rindex('name = "full"')].count("\n") + 1,
        line_with(text, "= 4.5"),
    ]


def test_a_problem_reads_as_one_plain_line() -> None:
    text = swap(GOOD, 'inlet_pressure = "3.0 bar"', 'inlet_presure = "3.0 bar"')
    (problem,) = problems(text)
    line = line_with(text, "inlet_presure")
    assert str(problem) == (
        f'rig.toml:{line}: points[1].inlet_presure ("idle"): unknown key; '
        "did you mean 'inlet_pressure'?"
    )


@pytest.mark.parametrize(
    ("composition", "fact"),
    [
        ('{ CH4 = "90 %", N2 = "5 %" }', "sum to 95 %"),
        ("{ CH4 = 0.9, N2 = 0.2 }", "sum to 110 %"),
        ("{ CH4 = 90, N2 = 10 }", "not a fraction"),
        ("{ CH4 = -0.1, N2 = 1.1 }", "negative"),
        ("{}", "sum to 0 %"),
        ("[1]", "a list where one table is needed"),
        ("3", "not a table"),
    ],
)
def test_compositions_that_cannot_be(composition: str, fact: str) -> None:
    text = swap(GOOD, 'name = "natural-gas"', f"composition = {composition}")
    assert fact in " | ".join(problem.what for problem in problems(text))


def test_a_composition_within_printed_digits_is_kept_as_stated() -> None:
    text = swap(GOOD, 'name = "natural-gas"', 'composition = { CH4 = "96.02 %", N2 = "4 %" }')
    assert loads_case(text).fuel.composition == {"CH4": 0.9602, "N2": 0.04}


def test_name_and_composition_contradict() -> None:
    text = swap(GOOD, 'name = "natural-gas"', 'name = "methane"\ncomposition = { CH4 = 1.0 }')
    (problem,) = problems(text)
    assert problem.what == "contradicts fuel.name"


@pytest.mark.parametrize(
    ("layout", "key", "fact"),
    [
        ("annular", "combustor.casing_diameter", "does not go with"),
        ("annular", "combustor.casing_outer_diameter", "missing"),
        ("can-annular", "combustor.cans", "several cans"),
    ],
)
def test_layout_and_envelope_must_agree(layout: str, key: str, fact: str) -> None:
    text = swap(GOOD, 'layout = "can"', f'layout = "{layout}"')
    assert any(p.key == key and fact in p.what for p in problems(text))


def test_fuel_split_sums_and_names_injectors() -> None:
    base = GOOD + HARDWARE
    text = swap(base, 'name = "idle"', 'name = "idle"\nfuel_split = { main = "90 %" }')
    assert "sum to 90 %" in problems(text)[0].what
    text = swap(base, 'name = "idle"', 'name = "idle"\nfuel_split = { mian = 1 }')
    (problem,) = problems(text)
    assert (problem.what, problem.nearest) == ("no such injector", "main")


HUGE = "0x" + "f" * 5000


@pytest.mark.parametrize("old", ['"can"', '"full"', '"rated"', '"14.2 kg/s"', '"test rig"'])
def test_integers_of_any_length_are_refused(old: str) -> None:
    for problem in problems(GOOD.replace(f"= {old}", f"= {HUGE}", 1)):
        assert len(str(problem)) < 400


def test_a_key_of_any_length_is_refused_briefly() -> None:
    (problem,) = problems(GOOD + f"{'k' * 100_000} = 1\n")
    assert len(str(problem)) < 400


@pytest.mark.parametrize(
    "text",
    [
        "a = ", "[", "[[points]", "= 3", 'a = "x', "a = 1\na = 2", "[a]\n[a]", "{}", "\x00",
        "a = 1e", "<xml/>", "a = [1, 2", '{"json": 1}', "a = 2020-13-45", "[" * 5000,
        "a = " + "[" * 5000, "a = " + "9" * 5000, "\r", "\ufeff[[a]]", "a = '''",
    ],
)  # fmt: skip
def test_broken_toml_is_refused(text: str) -> None:
    assert problems(text)


def test_a_syntax_error_has_its_line() -> None:
    text = swap(GOOD, 'kind = "idle"', 'kind == "idle"')
    (problem,) = problems(text)
    assert problem.line == line_with(text, "==")


def test_files_that_are_no_case(tmp_path: Path) -> None:
    files = {
        "empty.toml": (b"", "is empty"),
        "blank.toml": (b" \n\t\n", "is empty"),
        "comment.toml": (b"# nothing\n", "nothing is stated"),
        "binary.toml": (bytes(range(256)) * 4, "is a binary file"),
        "latin.toml": ('title = "Gerät"'.encode("latin-1"), "is not UTF-8 text"),
        "utf16.toml": (GOOD.encode("utf-16"), "is a binary file"),
        "large.toml": (b"# x\n" * 1_100_000, "is too large"),
    }
    for name, (data, fact) in files.items():
        path = tmp_path / name
        path.write_bytes(data)
        with pytest.raises(InputError) as caught:
            load_case(path)
        (problem,) = caught.value.problems
        assert fact in problem.what
        assert problem.file == str(path)


def test_places_that_are_no_file(tmp_path: Path) -> None:
    loop = tmp_path / "loop.toml"
    loop.symlink_to(loop)
    (tmp_path / "case.toml").write_text(GOOD)
    dangling = tmp_path / "dangling.toml"
    dangling.symlink_to(tmp_path / "gone")
    for path, fact in (
        (tmp_path, "is a directory"),
        (tmp_path / "cse.toml", "there is no such file"),
        (tmp_path / "no" / "where.toml", "there is no such file"),
        (tmp_path / "case.toml" / "below", "cannot be read"),
        (loop, "cannot be read"),
        (dangling, "there is no such file"),
        ("a\0b", "is not a file name"),
        ("", "is a directory"),
        ("x" * 5000, "cannot be read"),
        (os.devnull, "is not a file"),
    ):
        with pytest.raises(InputError) as caught:
            load_case(path)
        assert fact in caught.value.problems[0].what, path
    with pytest.raises(InputError) as caught:
        load_case(tmp_path / "cse.toml")
    assert caught.value.problems[0].nearest == str(tmp_path / "case.toml")


def test_a_byte_order_mark_and_windows_lines_are_read(tmp_path: Path) -> None:
    path = tmp_path / "windows.toml"
    path.write_bytes(b"\xef\xbb\xbf" + GOOD.replace("\n", "\r\n").encode())
    assert load_case(path) == loads_case(GOOD)


def test_a_mechanism_beside_the_case_is_found(tmp_path: Path) -> None:
    (tmp_path / "own.yaml").write_text("x")
    (tmp_path / "case.toml").write_text(GOOD + '[model]\nmechanism = "own.yaml"\n')
    assert load_case(tmp_path / "case.toml").model.mechanism == str(tmp_path / "own.yaml")


@settings(derandomize=True, max_examples=150, deadline=None)
@given(st.text())
@example("[points]\n")
@example("[[points]]\n[[combustor]]\n[[fuel]]\n")
@example("points = [1, 'a', {}]\nhardware = 3\ntargets = []\nfuel = ''\n")
@example("[hardware]\nopenings = [3]\nwalls = {}\nliner = []\nannuli = 'x'\ninjectors = [{}]\n")
def test_no_text_gets_past_as_anything_but_an_input_error(text: str) -> None:
    with pytest.raises(InputError):
        loads_case(text)


TOKENS = [line for line in (GOOD + HARDWARE).split("\n") if line]


@settings(derandomize=True, max_examples=150, deadline=None)
@given(st.data())
def test_a_shuffled_or_spoilt_case_loads_or_is_refused(data: st.DataObject) -> None:
    lines = list(TOKENS)
    for _ in range(data.draw(st.integers(1, 6))):
        at = data.draw(st.integers(0, len(lines) - 1))
        change = data.draw(st.sampled_from(["drop", "double", "value", "move", "cut"]))
        line = lines[at]
        if change == "drop" and len(lines) > 1:
            del lines[at]
        elif change == "double":
            lines.insert(data.draw(st.integers(0, len(lines))), line)
        elif change == "value":
            junk = data.draw(st.sampled_from(["{}", "[]", "-1", "nan", "''", "true", "[[1]]"]))
            lines[at] = line.split("=")[0] + "= " + junk
        elif change == "move":
            lines.insert(data.draw(st.integers(0, len(lines) - 1)), lines.pop(at))
        else:
            lines[at] = line[: data.draw(st.integers(0, len(line)))]
    try:
        assert isinstance(loads_case("\n".join(lines)), Case)
    except InputError as error:
        assert error.problems


@settings(derandomize=True, max_examples=60, deadline=None)
@given(st.binary(max_size=200))
def test_no_bytes_get_past_as_anything_but_an_input_error(
    tmp_path_factory: pytest.TempPathFactory, data: bytes
) -> None:
    path = tmp_path_factory.getbasetemp() / "bytes.toml"
    path.write_bytes(data)
    with pytest.raises(InputError):
        load_case(path)


def test_override_one_point_all_points_and_nested_keys() -> None:
    case = loads_case(GOOD + HARDWARE)
    assert override(case, "points.idle.air_flow", 4.0).point("idle").air_flow == 4.0
    assert override(case, "points.idle.air_flow", "9 lb/s").points[0].air_flow == 14.2
    every = override(case, "points.*.humidity", 0.01)
    assert {point.humidity for point in every.points} == {0.01}
    zones = override(case, "targets.equivalence_ratio.primary", 1.1).targets.equivalence_ratio
    assert (zones.primary, zones.secondary) == (1.1, 0.6)
    metal = override(case, "hardware.openings.primary row.diameter", "19 mm").hardware
    assert metal is not None
    assert metal.openings[2].diameter == 0.019
    assert override(case, "model.unmixedness", 0.3).model.unmixedness == 0.3
    assert case == loads_case(GOOD + HARDWARE)


@pytest.mark.parametrize(
    ("key", "value", "fact"),
    [
        ("points.ful.air_flow", 1.0, "no such key"),
        ("points.full.airflow", 1.0, "unknown key"),
        ("point.full.air_flow", 1.0, "no such key"),
        ("targets.pressure_loss", 4.5, "not a fraction"),
        ("targets.pressure_loss", float("nan"), "not a finite number"),
        ("points.full.fuel_flow", 0.1, "contradicts"),
        ("points.full.exit_temperature", 500.0, "not above the inlet"),
        ("points", 1.0, "no such key"),
        ("", 1.0, "unknown key"),
        ("combustor.inlet_annulus", 1.0, "no such key"),
    ],
)
def test_override_takes_what_the_file_would(key: str, value: float, fact: str) -> None:
    with pytest.raises(InputError) as caught:
        override(loads_case(GOOD), key, value)
    assert fact in caught.value.problems[0].what
