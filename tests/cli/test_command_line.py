import os
import re
import subprocess
import sys
import tomllib
from pathlib import Path

import pytest

import combustor
from combustor.base.errors import InfeasibleError, InputError, NotConvergedError, Problem
from combustor.cli import commands, main
from combustor.cli.complaint import complaint

ROOT = Path(__file__).parents[2]
COMMANDS = ["new", "size", "rate", "sweep", "comply", "flame", "convert", "fuels", "rules"]


def run(*arguments, **options):
    """Run the command in a process of its own."""
    environment = {**os.environ, "PYTHONPATH": str(ROOT), **options.pop("env", {})}
    return subprocess.run(
        [sys.executable, "-m", "combustor", *arguments],
        capture_output=True,
        text=True,
        env=environment,
        check=False,
        **options,
    )


@pytest.mark.parametrize("command", [[], *([name] for name in COMMANDS)])
def test_every_help_ends_with_an_example(capsys, command):
    assert main([*command, "--help"]) == 0
    out, err = capsys.readouterr()
    example = out.split("example:\n")[1]
    assert example.startswith(f"  combustor {' '.join(command)}")
    assert "%%" not in out and err == ""


@pytest.mark.parametrize("command", COMMANDS)
def test_every_command_takes_json_and_force(capsys, command):
    main([command, "--help"])
    out = capsys.readouterr().out
    assert "--json" in out and "--force" in out


def test_help_imports_nothing_heavy():
    script = (
        "import sys\n"
        "from combustor.cli import main\n"
        "main(['--help'])\n"
        "heavy = {'numpy', 'cantera', 'rich', 'pydantic', 'pandas', 'scipy', 'pint', 'tomlkit'}\n"
        "sys.exit(', '.join(heavy & set(sys.modules)) or None)\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", script], cwd=ROOT, capture_output=True, text=True, check=False
    )
    assert (done.returncode, done.stderr) == (0, "")


def test_the_version_is_that_of_the_project(capsys):
    project = tomllib.loads((ROOT / "pyproject.toml").read_text())["project"]
    assert combustor.__version__ == project["version"]
    assert main(["--version"]) == 0
    assert capsys.readouterr().out == f"combustor {combustor.__version__}\n"


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        ([], "no command given"),
        (["raet", "x"], "did you mean 'rate'"),
        (["rate"], "CASE"),
        (["rate", "x", "--jsno"], "did you mean '--json'"),
        (["rate", "x", "y"], "'y' is not understood"),
        (["flame", "methane"], "--phi"),
        (["--frobnicate"], "combustor"),
    ],
)
def test_a_wrong_command_line_is_two_plain_lines_and_code_2(capsys, arguments, said):
    assert main(arguments) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert said in err
    assert len(err.strip().split("\n")) == 2
    assert "Traceback" not in err


def test_an_unknown_command_is_refused(capsys):
    assert main(["polish"]) == 2
    assert "no command 'polish'" in capsys.readouterr().err


def raising(error):
    def command(arguments):
        raise error

    return command


@pytest.mark.parametrize(
    ("error", "code", "lines"),
    [
        (
            InputError([Problem("unknown key", "known are b", "a"), Problem("zero", key="c")]),
            2,
            ["a: unknown key; known are b", "c: zero", "nothing was computed"],
        ),
        (
            InfeasibleError(["the casing is 200 mm wide", "the loss is 30 %"], "widen it"),
            1,
            [
                "no design meets the targets: the casing is 200 mm wide",
                "  therefore the loss is 30 %",
                "  to change: widen it",
            ],
        ),
        (NotConvergedError("point full: still moving"), 1, ["point full: still moving"]),
    ],
)
def test_errors_on_purpose_are_plain_lines_with_their_code(monkeypatch, capsys, error, code, lines):
    monkeypatch.setitem(commands._COMMANDS, "fuels", raising(error))
    assert main(["fuels"]) == code
    out, err = capsys.readouterr()
    assert out == ""
    assert err.rstrip("\n").split("\n") == lines


def test_an_error_nobody_meant_is_one_line_with_its_place(monkeypatch, capsys):
    monkeypatch.delenv("COMBUSTOR_DEBUG", raising=False)
    monkeypatch.setitem(commands._COMMANDS, "fuels", raising(KeyError("a\nb")))
    assert main(["fuels"]) == 1
    out, err = capsys.readouterr()
    assert out == ""
    assert re.fullmatch(r"combustor: internal error, KeyError: .* at test_\w+\.py:\d+; .*\n", err)


def test_debugging_shows_the_traceback(monkeypatch):
    monkeypatch.setenv("COMBUSTOR_DEBUG", "1")
    monkeypatch.setitem(commands._COMMANDS, "fuels", raising(KeyError("a")))
    with pytest.raises(KeyError):
        main(["fuels"])


def test_an_interrupt_is_quiet(monkeypatch, capsys):
    monkeypatch.setitem(commands._COMMANDS, "fuels", raising(KeyboardInterrupt()))
    assert main(["fuels"]) == 130
    assert capsys.readouterr() == ("", "")


def test_warnings_of_libraries_stay_inside(monkeypatch, capsys):
    import warnings

    def command(arguments):
        warnings.warn("look at me", UserWarning, stacklevel=1)
        return commands.Answer("done\n")

    monkeypatch.setitem(commands._COMMANDS, "fuels", command)
    assert main(["fuels"]) == 0
    assert capsys.readouterr() == ("done\n", "")


def test_control_characters_in_an_error_cannot_act():
    assert "\x1b" not in complaint(InputError(Problem("bad \x1b[31m name")))


def test_a_pipe_closed_early_is_quiet():
    process = subprocess.Popen(
        [sys.executable, "-m", "combustor", "fuels", "--json"],
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        cwd=ROOT,
    )
    process.stdout.close()
    err = process.stderr.read()
    process.stderr.close()
    assert (process.wait(), err) == (141, b"")


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="needs /dev/full")
def test_a_full_disk_is_one_plain_line():
    with Path("/dev/full").open("w") as full:
        done = subprocess.run(
            [sys.executable, "-m", "combustor", "fuels"],
            stdout=full,
            stderr=subprocess.PIPE,
            text=True,
            cwd=ROOT,
            check=False,
        )
    assert done.returncode == 1
    assert done.stderr.startswith("combustor: the result cannot be written")
    assert len(done.stderr.strip().split("\n")) == 1


def test_the_module_runs_as_a_process_and_pipes_are_plain():
    done = run("fuels", env={"TERM": "xterm-256color", "COLUMNS": "100"})
    assert (done.returncode, done.stderr) == (0, "")
    assert "\x1b" not in done.stdout
    assert "natural-gas" in done.stdout
    assert max(map(len, done.stdout.split("\n"))) <= 100


@pytest.mark.skipif(sys.platform == "win32", reason="needs a pseudo-terminal")
@pytest.mark.parametrize(
    ("environment", "coloured"),
    [
        ({"TERM": "xterm"}, True),
        ({"TERM": "xterm", "NO_COLOR": "1"}, False),
        ({"TERM": "dumb"}, False),
    ],
)
def test_colour_on_a_terminal_unless_it_is_not_wanted(environment, coloured):
    import pty

    inherited = {key: value for key, value in os.environ.items() if key != "NO_COLOR"}
    ours, theirs = pty.openpty()
    process = subprocess.Popen(
        [sys.executable, "-m", "combustor", "fuels"],
        stdout=theirs,
        stderr=theirs,
        cwd=ROOT,
        env={**inherited, "COLUMNS": "100", **environment},
    )
    os.close(theirs)
    shown = b""
    try:
        while chunk := os.read(ours, 65536):
            shown += chunk
    except OSError:  # how Linux says that the other end has closed
        pass
    os.close(ours)
    assert process.wait() == 0
    assert b"natural-gas" in shown
    assert (b"\x1b[" in shown) is coloured


def test_an_ascii_terminal_gets_ascii():
    done = run("fuels", env={"PYTHONIOENCODING": "ascii"})
    assert (done.returncode, done.stderr) == (0, "")
    assert done.stdout.isascii()


def test_public_names_are_about_fifteen_and_all_there():
    assert 12 <= len(combustor.__all__) <= 20
    assert set(combustor.__all__) <= set(dir(combustor))
    for name in combustor.__all__:
        assert getattr(combustor, name) is not None
    with pytest.raises(AttributeError):
        combustor.no_such_name  # noqa: B018
