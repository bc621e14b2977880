import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.report.field import (
    MISSING,
    Field,
    aligned,
    number_text,
    pick,
    plain,
    printable,
    row,
    select,
)


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (256.31, "256"),
        (9.128, "9.13"),
        (0.012345, "0.0123"),
        (12345.6, "12346"),
        (9.996, "10.0"),
        (0.0, "0"),
        (3.1e-8, "3.10e-08"),
        (-4.5678, "-4.57"),
        (math.nan, MISSING),
        (math.inf, MISSING),
    ],
)
def test_significant_figures_keep_every_digit_before_the_point(value, text):
    assert number_text(value, figures=3) == text


def test_fixed_decimals_have_no_negative_zero():
    assert number_text(-0.0004, decimals=2) == "0.00"


@given(st.floats(min_value=1e-4, max_value=9.9e8))
@settings(derandomize=True, max_examples=200)
def test_significant_figures_stay_within_half_a_unit_of_the_third_figure(value):
    shown = float(number_text(value, figures=3))
    assert abs(shown - value) <= max(0.5 * 10 ** (math.floor(math.log10(value)) - 2), 0.5) * 1.001


def test_decimal_points_line_up_when_set_flush_right():
    texts = aligned(["256", "9.13", "0.0123", MISSING, "1e-09"])
    width = max(map(len, texts))
    places = {text.rjust(width).find(".") for text in texts if "." in text}
    assert len(places) == 1
    assert texts[0].rjust(width)[places.pop() - 1] == "6"
    assert texts[3] == MISSING


def test_a_missing_part_on_the_way_is_missing_not_an_error():
    assert pick({"a": None}, "a.b.c") is None
    assert pick({"a": {}}, "a.b") is None
    assert Field("k", "k", "a.b", scale=1e3).value({"a": None}) is None
    assert Field("k", "k", "a.b", "mm", 1e3).with_unit({"a": None}) == MISSING


def test_a_misspelt_attribute_is_an_error():
    with pytest.raises(AttributeError):
        pick(object(), "no_such_name")


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf, np.float64("nan")])
def test_what_is_not_finite_is_no_result(value):
    assert plain(value) is None


def test_array_scalars_become_python_numbers():
    assert type(plain(np.float64(1.5))) is float
    assert type(plain(np.int64(3))) is int
    assert plain(True) is True


def test_scale_makes_the_key_unit_and_shown_makes_the_terminal_unit():
    pressure = Field("pressure_Pa", "pressure", "p", "bar", 1.0, 1e-5, decimals=2)
    assert pressure.value({"p": 9.9e5}) == 9.9e5
    assert pressure.text({"p": 9.9e5}) == "9.90"


def test_control_characters_cannot_reach_the_terminal():
    assert "\x1b" not in printable("a\x1b[31mb\nc")
    assert printable("dil_2 ü") == "dil_2 ü"


def test_select_and_row_follow_the_given_order():
    fields = (Field("a", "a"), Field("b", "b"))
    assert [f.key for f in select(fields, "b", "a")] == ["b", "a"]
    assert row(fields, {"a": 1, "b": None}) == {"a": 1, "b": None}
    with pytest.raises(KeyError):
        select(fields, "c")
