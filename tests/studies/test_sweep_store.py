import json
import os

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.studies.sweep_outcome import Outcome
from combustor.studies.sweep_store import Result, ResultsFile

HEADER = {
    "version": "1",
    "title": "a machine",
    "digest": "d1",
    "vary": [{"key": "k", "unit": "mm", "values": [1.0, 2.0]}],
    "points": ["full"],
    "operability": True,
    "documents": True,
}
RESULTS = [
    Result(str(n), "full", Outcome("burning", True, "ok", nox=n * 1.1e-6), {"n": n, "é": "ü"})
    for n in range(4)
]


@pytest.fixture
def path(tmp_path):
    path = tmp_path / "x.jsonl"
    with ResultsFile(path, HEADER) as file:
        for result in RESULTS:
            file.append(result)
    return path


def test_what_was_written_is_read_back_to_the_last_bit(path):
    with ResultsFile(path, HEADER) as file:
        assert file.results == RESULTS
        assert file.dropped == 0


def test_every_line_is_json_of_its_own(path):
    header, *lines = [json.loads(line) for line in path.read_text().splitlines()]
    assert header["vary"] == HEADER["vary"]
    assert [line["row"] for line in lines] == ["0", "1", "2", "3"]


@settings(
    derandomize=True,
    max_examples=60,
    deadline=None,
    suppress_health_check=[HealthCheck.function_scoped_fixture],
)
@given(st.floats(0.0, 1.0))
def test_a_file_cut_anywhere_is_taken_up_and_completed(path, tmp_path, share):
    data = path.read_bytes()
    cut = tmp_path / "cut.jsonl"
    cut.write_bytes(data[: int(share * len(data))])
    with ResultsFile(cut, HEADER) as file:
        count = len(file.results)
        assert file.results == RESULTS[:count]
        for result in RESULTS[count:]:
            file.append(result)
    assert cut.read_bytes() == data


def test_a_spoilt_line_in_the_middle_is_left_aside(path):
    header, first, _, *rest = path.read_bytes().splitlines(keepends=True)
    path.write_bytes(b"".join([header, first, b'{"row": "1", "point"\n', *rest]))
    with ResultsFile(path, HEADER) as file:
        assert [result.row for result in file.results] == ["0", "2", "3"]
        assert file.dropped == 1
        file.append(RESULTS[1])
    with ResultsFile(path, HEADER) as file:
        assert sorted(result.row for result in file.results) == ["0", "1", "2", "3"]


def test_a_second_writer_is_refused_plainly_and_harms_nothing(path):
    with ResultsFile(path, HEADER) as file:
        before = path.read_bytes()
        for replace in (False, True):
            with pytest.raises(InputError, match="another sweep is writing to it"):
                ResultsFile(path, HEADER, replace)
        assert path.read_bytes() == before
        file.append(RESULTS[0])
    with ResultsFile(path, HEADER) as file:
        assert len(file.results) == 5


@pytest.mark.parametrize(
    ("change", "said"),
    [
        ({"version": "2"}, "another version"),
        ({"points": ["idle"]}, "other operating points"),
        ({"vary": []}, "varies other entries"),
        ({"documents": False}, "trends only"),
        ({"operability": False}, "without the margins"),
        ({"digest": "d2"}, "the case or its mechanism has changed"),
    ],
)
def test_the_file_of_another_sweep_is_refused_with_what_differs(path, change, said):
    before = path.read_bytes()
    with pytest.raises(InputError, match=said):
        ResultsFile(path, {**HEADER, **change})
    assert path.read_bytes() == before


def test_it_can_be_begun_anew(path):
    with ResultsFile(path, {**HEADER, "digest": "d2"}, replace=True) as file:
        assert file.results == []
    assert len(path.read_text().splitlines()) == 1


@pytest.mark.parametrize(
    "text", ["title = 'a case'\n", "no line end", '{"kind": "other"}\n', "[]\n"]
)
def test_a_file_of_something_else_is_left_alone(tmp_path, text):
    path = tmp_path / "case.toml"
    path.write_text(text)
    with pytest.raises(InputError, match="something other than the results of a sweep"):
        ResultsFile(path, HEADER)
    assert path.read_text() == text


@pytest.mark.parametrize("where", ["no/such/folder/x.jsonl", ".", "a\0b"])
def test_what_cannot_be_written_is_refused(tmp_path, where):
    with pytest.raises(InputError, match=r"cannot be written|is not a file"):
        ResultsFile(tmp_path / where, HEADER)


@pytest.mark.skipif(os.geteuid() == 0, reason="root may write anywhere")
def test_a_read_only_folder_is_refused(tmp_path):
    tmp_path.chmod(0o500)
    with pytest.raises(InputError, match="cannot be written: permission denied"):
        ResultsFile(tmp_path / "x.jsonl", HEADER)
    tmp_path.chmod(0o700)


def test_no_number_that_is_none_reaches_the_file(tmp_path):
    with ResultsFile(tmp_path / "x.jsonl", HEADER) as file, pytest.raises(ValueError, match="JSON"):
        file.append(Result("0", "full", Outcome("burning", True, "ok", nox=float("nan")), None))
