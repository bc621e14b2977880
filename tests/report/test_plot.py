import re
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.report.document import Curve, Plot
from combustor.report.plot import HEIGHT, WIDEST, drawn_plot
from combustor.report.terminal import Page, render


def plot(*curves, **more):
    return Plot("NOx", "diameter, mm", "NOx, ppm", tuple(curves), **more)


RISING = Curve("full", tuple((float(x), 10.0 * x) for x in range(1, 11)))
FALLING = Curve("idle", tuple((float(x), 110.0 - 10.0 * x) for x in range(1, 11)))


def canvas(lines):
    return [line[10:] for line in lines[1 : 1 + HEIGHT]]


def places(lines, letter):
    return [
        (column, row)
        for row, line in enumerate(canvas(lines))
        for column, character in enumerate(line)
        if character == letter
    ]


def test_points_stand_where_their_values_are():
    lines = drawn_plot(plot(RISING))
    found = sorted(places(lines, "a"))
    assert len(found) == 10
    assert found[0] == (0, HEIGHT - 1) and found[-1] == (WIDEST - 11, 0)
    rows = [row for _, row in found]
    assert rows == sorted(rows, reverse=True)


def test_curves_have_letters_and_meet_in_a_star():
    lines = drawn_plot(plot(RISING, FALLING))
    crossing = Curve("x", ((1.0, 100.0), (10.0, 10.0)))
    assert places(lines, "a") and places(lines, "b")
    assert lines[-1] == "a full   b idle   * several"
    assert places(drawn_plot(plot(FALLING, crossing)), "*")


def test_numbers_beside_the_axes_are_the_ends():
    lines = drawn_plot(plot(RISING))
    assert lines[1].split()[0] == "100" and lines[HEIGHT].split()[0] == "10"
    low, middle, high = lines[HEIGHT + 2].split()
    assert (low, high) == ("1", "10")
    assert float(middle) == pytest.approx(5.5, abs=0.1)


def test_a_logarithmic_axis_spaces_decades_evenly():
    decades = Curve("x", tuple((float(n), 10.0**n) for n in range(5)))
    found = sorted(places(drawn_plot(plot(decades, log_up=True)), "a"))
    steps = {a[1] - b[1] for a, b in pairwise(found)}
    assert steps == {(HEIGHT - 1) // 4}


def test_what_is_no_result_or_has_no_logarithm_is_left_out():
    broken = Curve("x", ((1.0, 1.0), (2.0, None), (3.0, 0.0), (4.0, 8.0)))
    assert len(places(drawn_plot(plot(broken, log_up=True)), "a")) == 2
    nothing = drawn_plot(plot(Curve("x", ((1.0, None),))))
    assert nothing == ["nothing to draw: no value is a result"]


def test_a_limit_is_a_line_unless_it_lies_far_outside():
    assert "┄" in "".join(drawn_plot(plot(RISING, limit_up=50.0)))
    assert "┊" in "".join(drawn_plot(plot(RISING, limit_across=5.0)))
    far = drawn_plot(plot(RISING, limit_up=1e6))
    assert "┄" not in "".join(far) and far[1].split()[0] == "100"


@pytest.mark.parametrize("width", [40, 60, 80, 100])
@pytest.mark.parametrize("ascii_only", [False, True])
def test_it_fits_the_page_without_colour_or_beyond_ascii_when_asked(width, ascii_only):
    long = Curve("a point with quite a long name " * 5, RISING.points)
    page = Page(width, colour=False, ascii_only=ascii_only)
    text = render([plot(long, FALLING, RISING, limit_up=50.0)], page)
    assert max(map(len, text.split("\n"))) <= min(width, 80)
    assert "\x1b" not in text
    assert text.isascii() or not ascii_only


@settings(derandomize=True, max_examples=120, deadline=None)
@given(
    st.lists(
        st.tuples(
            st.floats(-1e12, 1e12, allow_subnormal=False),
            st.one_of(st.none(), st.floats(-1e12, 1e12, allow_subnormal=False)),
        ),
        min_size=1,
        max_size=20,
    ),
    st.booleans(),
    st.booleans(),
    st.one_of(st.none(), st.floats(-1e6, 1e6)),
)
def test_any_values_make_a_plot_of_the_same_shape(points, log_across, log_up, limit):
    drawn = drawn_plot(
        plot(
            Curve("x", tuple(points)),
            log_across=log_across,
            log_up=log_up,
            limit_up=limit,
            limit_across=limit,
        )
    )
    if len(drawn) == 1:
        return
    assert len(drawn) == HEIGHT + 5
    assert max(map(len, drawn)) <= WIDEST
    assert "a" in "".join(canvas(drawn))


def test_control_characters_in_a_name_cannot_act():
    text = render([plot(Curve("a\x1b[31m", RISING.points))], Page())
    assert not re.search(r"\x1b", text)
