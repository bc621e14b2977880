import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from rich.cells import cell_len

from combustor.report.document import Facts, Heading, Prose, Table
from combustor.report.field import Field
from combustor.report.layout import fit
from combustor.report.terminal import Page, render

NUMBERS = tuple(Field(f"n{i}", f"value {i}", unit="kg/s", figures=4) for i in range(12))


def table(names, values, words="some words that can wrap"):
    records = tuple({"name": n, "words": words} | v for n, v in zip(names, values, strict=True))
    columns = (Field("name", "opening"), *NUMBERS, Field("words", "advice"))
    return Table("t", "A table", columns, records)


values = st.fixed_dictionaries(
    {f"n{i}": st.floats(-1e6, 1e6, allow_subnormal=False) for i in range(12)}
)


@given(
    st.lists(values, min_size=1, max_size=3),
    st.sampled_from([40, 60, 80, 100]),
    st.text(min_size=1, max_size=40),
)
@settings(derandomize=True, max_examples=60, deadline=None)
def test_no_line_is_too_long_and_no_number_is_cut(lines, width, name):
    made = table([name] * len(lines), lines)
    text = render([made], Page(width))
    assert max(cell_len(line) for line in text.split("\n")) <= width
    shown = text.split()
    for line in lines:
        for field in NUMBERS:
            assert field.text(line) in shown


def test_a_table_that_does_not_fit_continues_under_its_leading_column():
    parts = fit(table(["dil_2"], [{f"n{i}": 1234.5 for i in range(12)}]), 60)
    assert len(parts) > 1
    assert all(part.columns[0].heading == ("opening",) for part in parts)
    assert sum(len(part.columns) - 1 for part in parts) == 13


def test_words_wrap_before_a_table_is_parted():
    line = {f"n{i}": 1.0 for i in range(12)}
    only_words = Table(
        "t", "T", (Field("name", "n"), Field("words", "w")), ({"name": "a", "words": "word " * 60},)
    )
    assert len(fit(only_words, 40)) == 1
    assert len(fit(table(["a"], [line]), 200)) == 1


@pytest.mark.parametrize("ascii_only", [True, False])
def test_plain_pages_hold_no_escape_and_no_trailing_blanks(ascii_only):
    made = table(["a"], [{f"n{i}": 1.0 for i in range(12)}])
    text = render(
        [Heading("H"), made, Prose("p"), Facts((("a", "b"),))], Page(100, False, ascii_only)
    )
    assert "\x1b" not in text
    assert all(line == line.rstrip() for line in text.split("\n"))
    assert text.isascii() is ascii_only


def test_colour_changes_nothing_but_colour():
    import re

    made = Table("t", "T", (Field("name", "n"),), ({"name": "! act"},), {0: "act"})
    coloured, plain = render([made], Page(80, True)), render([made], Page(80))
    stripped = re.sub(r"\x1b\[[0-9;]*m", "", coloured)
    assert "\x1b[1;31m! act" in coloured
    assert [line.rstrip() for line in stripped.split("\n")] == plain.split("\n")


class Stream:
    def __init__(self, terminal, encoding="utf-8"):
        self.terminal, self.encoding = terminal, encoding

    def isatty(self):
        return self.terminal


@pytest.mark.parametrize(
    ("terminal", "environment", "colour"),
    [
        (True, {"TERM": "xterm-256color"}, True),
        (True, {"TERM": "xterm", "NO_COLOR": "1"}, False),
        (True, {"TERM": "xterm", "NO_COLOR": ""}, True),
        (True, {"TERM": "dumb"}, False),
        (False, {"TERM": "xterm"}, False),
    ],
)
def test_colour_only_on_a_terminal_that_wants_it(terminal, environment, colour):
    assert Page.of(Stream(terminal), environment).colour is colour


@pytest.mark.parametrize(("columns", "width"), [("80", 80), ("100", 100), ("250", 100), ("10", 40)])
def test_the_width_follows_the_terminal_up_to_a_hundred(monkeypatch, columns, width):
    monkeypatch.setenv("COLUMNS", columns)
    assert Page.of(Stream(False), {}).width == width


def test_an_ascii_stream_gets_an_ascii_page():
    assert Page.of(Stream(False, "ascii"), {}).ascii_only
    assert not Page.of(Stream(False, "UTF-8"), {}).ascii_only
