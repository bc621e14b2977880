import json

import pytest

import combustor
from combustor.cli import main


def test_the_starter_is_written_and_reads_back(capsys, tmp_path):
    path = tmp_path / "my.toml"
    assert main(["new", str(path)]) == 0
    out, err = capsys.readouterr()
    assert str(path) in out and err == ""
    assert combustor.load_case(path).fuel.name == "natural-gas"


def test_the_fuel_asked_for_stands_in_the_case(capsys, tmp_path):
    path = tmp_path / "my.toml"
    assert main(["new", str(path), "--fuel", "natural-gas+30%hydrogen", "--json"]) == 0
    assert json.loads(capsys.readouterr().out)["file"] == str(path)
    assert combustor.load_case(path).fuel.name == "natural-gas+30%hydrogen"


def test_nothing_is_overwritten_unasked(capsys, tmp_path):
    path = tmp_path / "my.toml"
    path.write_text("mine")
    assert main(["new", str(path)]) == 2
    assert path.read_text() == "mine"
    assert "--force" in capsys.readouterr().err
    assert main(["new", str(path), "--force"]) == 0
    assert path.read_text() != "mine"


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["--fuel", "hydrogan"], "did you mean 'hydrogen'"),
        (["--layout", "square"], "no starter case for this layout"),
    ],
)
def test_what_cannot_be_started_leaves_no_file(capsys, tmp_path, arguments, said):
    assert main(["new", str(tmp_path / "x.toml"), *arguments]) == 2
    assert said in capsys.readouterr().err
    assert list(tmp_path.iterdir()) == []


def test_a_folder_that_is_not_there_is_named(capsys, tmp_path):
    assert main(["new", str(tmp_path / "no" / "x.toml")]) == 2
    assert "x.toml" in capsys.readouterr().err
