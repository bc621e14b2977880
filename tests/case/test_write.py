"""Written cases: comments kept, the same case read back, no file lost or overwritten."""

import stat
import tomllib
from pathlib import Path

import pytest
from case_samples import GOOD, HARDWARE
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.case import load_case, loads_case, override
from combustor.case.starter import starter_text
from combustor.case.write import complete, text_of, write_case, write_text

COMMENTED = "# head\n" + GOOD.replace("[fuel]", "# about fuel\n[fuel] # beside").replace(
    'kind = "idle"', 'kind = "idle"   # spinning'
)
METAL = tomllib.loads(HARDWARE)["hardware"]


def comments(text: str) -> list[str]:
    return [line.split("#", 1)[1] for line in text.split("\n") if "#" in line]


def test_the_metal_is_added_below_and_comments_stay() -> None:
    text = complete(COMMENTED, METAL)
    assert text.startswith(COMMENTED)
    assert tomllib.loads(text) == tomllib.loads(COMMENTED) | {"hardware": METAL}
    assert loads_case(text).hardware == loads_case(GOOD + HARDWARE).hardware


def test_metal_that_is_there_is_replaced_and_its_comments_stay() -> None:
    text = complete(COMMENTED, METAL)
    text = text.replace("count = 8\n", "count = 8 # drilled twice\n")
    text += "\n[rules] # last\n"
    rows = [dict(row) for row in METAL["openings"]]
    rows[3] |= {"count": 12, "diameter": "27.5 mm"}
    again = complete(text, METAL | {"openings": rows})
    assert comments(again) == comments(text)
    metal = loads_case(again).hardware
    assert metal is not None
    assert (metal.openings[3].count, metal.openings[3].diameter) == (12, 0.0275)
    assert complete(text, METAL) == text


def test_fewer_and_renamed_rows_replace_the_old_ones() -> None:
    text = complete(COMMENTED, METAL)
    rows = [row for row in METAL["openings"] if row["name"] != "film 1"]
    rows[1] = rows[1] | {"name": "row A"}
    assert tomllib.loads(complete(text, METAL | {"openings": rows}))["hardware"]["openings"] == rows


@pytest.mark.parametrize("ending", ["", "\n", "\n\n\n", "\n# the end", "\r\n"])
def test_any_ending_of_the_text_takes_the_metal(ending: str) -> None:
    text = complete(GOOD.rstrip("\n") + ending, METAL)
    assert tomllib.loads(text)["hardware"] == METAL
    assert comments(text)[: len(comments(ending))] == comments(ending)


def test_an_unchanged_case_is_its_own_text() -> None:
    assert text_of(loads_case(COMMENTED)) == COMMENTED


@settings(derandomize=True, max_examples=60, deadline=None)
@given(
    st.floats(1.0, 50.0),
    st.floats(2e5, 4e6),
    st.floats(400.0, 900.0),
    st.floats(0.0, 0.03),
    st.floats(0.7, 1.4),
)
def test_read_write_read_is_the_same_case(
    flow: float, pressure: float, temperature: float, humidity: float, phi: float
) -> None:
    case = loads_case(COMMENTED)
    for key, value in (
        ("points.full.air_flow", flow),
        ("points.*.inlet_pressure", pressure),
        ("points.full.inlet_temperature", temperature),
        ("points.idle.humidity", humidity),
        ("targets.equivalence_ratio.primary", phi),
        ("model.unmixedness", 0.3),
    ):
        case = override(case, key, value)
    text = text_of(case)
    assert loads_case(text) == case
    assert comments(text) == comments(COMMENTED)


def test_a_case_without_text_is_written_whole() -> None:
    case = loads_case(GOOD + HARDWARE)
    bare = type(case).model_validate(case.model_dump())
    assert bare.text == ""
    assert loads_case(text_of(bare)) == case


def test_file_is_written_and_reads_back(tmp_path: Path) -> None:
    path = tmp_path / "out.toml"
    text = write_case(path, loads_case(COMMENTED), METAL)
    assert path.read_text() == text
    assert load_case(path).hardware is not None
    assert [entry.name for entry in tmp_path.iterdir()] == ["out.toml"]


def test_nothing_is_overwritten_unless_asked(tmp_path: Path) -> None:
    path = tmp_path / "out.toml"
    path.write_text("mine")
    with pytest.raises(InputError, match=r"there already.*--force"):
        write_case(path, GOOD)
    assert path.read_text() == "mine"
    write_case(path, GOOD, force=True)
    assert path.read_text() == GOOD


def test_a_link_stays_a_link_and_its_mode_stays(tmp_path: Path) -> None:
    real, link = tmp_path / "real.toml", tmp_path / "link.toml"
    real.write_text("x")
    real.chmod(0o640)
    link.symlink_to(real)
    write_text(link, "y", force=True)
    assert link.is_symlink()
    assert real.read_text() == "y"
    assert stat.S_IMODE(real.stat().st_mode) == 0o640


def test_a_failed_write_leaves_the_old_file_and_no_other(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    path = tmp_path / "out.toml"
    path.write_text("old")

    def fail(*_: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(Path, "replace", fail)
    with pytest.raises(InputError, match="no space left"):
        write_text(path, "new", force=True)
    assert path.read_text() == "old"
    assert [entry.name for entry in tmp_path.iterdir()] == ["out.toml"]


def test_places_that_take_no_file(tmp_path: Path) -> None:
    for path in (tmp_path, tmp_path / "no" / "where.toml", "a\0b"):
        with pytest.raises(InputError):
            write_text(path, "x", force=True)


@pytest.mark.parametrize("fuel", ["methane", 'od"d\\name', "natural-gas+30%hydrogen"])
def test_the_starter_loads_as_it_is(fuel: str) -> None:
    case = loads_case(starter_text(fuel=fuel))
    assert case.fuel.name == fuel
    assert [point.kind for point in case.points] == ["rated", "part", "part", "idle"]
    assert all(point.exit_temperature is not None for point in case.points)
    assert "#" in case.text


def test_a_starter_for_an_unknown_layout_is_refused() -> None:
    with pytest.raises(InputError, match="starter cases exist for can"):
        starter_text(layout="silo")
