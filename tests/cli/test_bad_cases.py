import pytest

from combustor.case.starter import starter_text
from combustor.cli import main

STARTER = starter_text()


@pytest.fixture
def written(tmp_path):
    """Write a case, text or bytes, and return its path."""

    def write(content):
        path = tmp_path / "case.toml"
        path.write_bytes(content if isinstance(content, bytes) else content.encode())
        return str(path)

    return write


def edited(old, new):
    assert old in STARTER
    return STARTER.replace(old, new, 1)


@pytest.mark.parametrize("command", ["size", "rate"])
@pytest.mark.parametrize(
    ("content", "said"),
    [
        (edited("inlet_pressure", "inlet_presure"), "did you mean 'inlet_pressure'"),
        (edited('"7.2 bar"', '"7.2 barg"'), "gauge"),
        (edited('"7.2 bar"', '"7.2 kg"'), "inlet_pressure"),
        (edited('"7.5 kg/s"', '"-7.5 kg/s"'), "negative"),
        (edited('"7.5 kg/s"', "0"), "zero"),
        (edited('"7.5 kg/s"', "nan"), "not a finite number"),
        (edited('"7.5 kg/s"', "inf"), "not a finite number"),
        (edited('"7.5 kg/s"', '"7.5e9 kg/s"'), "air flow"),
        (edited('"4.8 %"', "5"), '"5 %"'),
        (edited('exit_temperature = "950 degC"', ""), "exit_temperature"),
        (
            edited('exit_temperature = "950 degC"', "exit_temperature = 1223\nfuel_flow = 0.1"),
            "fuel_flow",
        ),
        (edited('name = "natural-gas"', 'name = "nitrogen"'), "fuel"),
        (edited('name = "natural-gas"', "composition = { N2 = 1.0 }"), "burn"),
        (edited('name = "natural-gas"', "composition = { CH4 = 0.5, N2 = 0.4 }"), "sum"),
        (b"\x7fELF\x00\x01", "binary"),
        (b"", "empty"),
        ("[points\n", "case.toml:1"),
    ],
)
def test_bad_input_is_refused_with_plain_lines_and_code_2(capsys, written, command, content, said):
    assert main([command, written(content)]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert said in err
    assert err.endswith("nothing was computed\n")
    assert "Traceback" not in err and "internal error" not in err


@pytest.mark.parametrize("command", ["size", "rate"])
def test_a_folder_and_a_missing_file_are_refused(capsys, tmp_path, command):
    assert main([command, str(tmp_path)]) == 2
    assert "directory" in capsys.readouterr().err
    assert main([command, str(tmp_path / "none.toml")]) == 2
    assert "none.toml" in capsys.readouterr().err


def test_all_problems_are_shown_at_once_each_with_its_line(capsys, written):
    text = edited('"7.2 bar"', '"7.2 barg"').replace('"4.8 %"', "5").replace("kind =", "knid =")
    assert main(["rate", written(text)]) == 2
    lines = capsys.readouterr().err.strip().split("\n")
    assert len(lines) > 3
    assert all("case.toml:" in line for line in lines[:-1])


@pytest.mark.parametrize("command", ["size", "rate"])
@pytest.mark.parametrize(
    ("old", "new", "key"),
    [
        ('name = "natural-gas"', 'name = "natural-gaz"', "fuel.name"),
        ('name = "natural-gas"', 'name = "natural-gas+10%ammonia"', "fuel.name"),
        ('name = "natural-gas"', "composition = { N2 = 1.0 }", "fuel.composition"),
        ('name = "natural-gas"', "composition = { CH4 = 0.9, XYZ = 0.1 }", "fuel.composition"),
        ("# [model]  ", '[model]\nmechanism = "none.yaml"\n# ', "model.mechanism"),
    ],
)
def test_a_fuel_that_cannot_be_used_is_shown_with_its_line(capsys, written, command, old, new, key):
    text = edited(old, new)
    path = written(text)
    assert main([command, path]) == 2
    (first, *_) = capsys.readouterr().err.split("\n")
    stated = new.split("\n")[-2 if "mechanism" in new else -1]
    line = next(at for at, row in enumerate(text.split("\n"), 1) if row.startswith(stated))
    assert first.startswith(f"{path}:{line}: {key}: ")


def test_a_fuel_named_on_the_command_line_is_not_looked_for_in_the_file(capsys, written):
    assert main(["rate", written(STARTER), "--fuel", "natural-gaz"]) == 2
    err = capsys.readouterr().err
    assert err.startswith("fuel: no such fuel (got 'natural-gaz')")
    assert "case.toml" not in err
