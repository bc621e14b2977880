import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.studies.sweep_axis import axis, spaced
from combustor.studies.sweep_outcome import Outcome
from combustor.studies.sweep_plan import plan
from combustor.studies.sweep_trends import sensitivities, windows

DILUTION = "hardware.openings.dilution.diameter"


def burning(nox, co, **more):
    return Outcome("burning", True, "ok", nox=nox, co=co, **more)


OUT = Outcome("blown_out", True, "act", reason="no flame")


def laid_out(case, count, points=("full",)):
    return plan(case, [spaced(case, DILUTION, "40 mm", f"{39 + count} mm", count)], points)


def found(case, line, nox, co, points=("full",)):
    laid = laid_out(case, len(line), points)
    outcomes = {(str(i), point): o for i, o in enumerate(line) for point in points}
    return windows(laid, outcomes, nox, co)


def spans(window):
    return [
        (round(low.value, 9), low.by, round(high.value, 9), high.by) for low, high in window.spans
    ]


def test_the_window_lies_between_the_crossings_on_a_logarithmic_line(metal_case):
    # NOx rises tenfold a step, CO falls tenfold a step: exact crossings half a step on
    line = [burning(10.0 ** (i - 7), 10.0 ** (-3 - i)) for i in range(5)]
    (window,) = found(metal_case, line, 10**-4.5, 10**-4.5)
    assert spans(window) == [(41.5, "CO", 42.5, "NOx")]


def test_limits_that_always_hold_leave_the_whole_sweep(metal_case):
    line = [burning(1e-6, 1e-6)] * 3
    (window,) = found(metal_case, line, 2e-6, 2e-6)
    assert spans(window) == [(40.0, "end of the sweep", 42.0, "end of the sweep")]


def test_limits_that_never_hold_leave_nothing(metal_case):
    (window,) = found(metal_case, [burning(1e-6, 1e-6)] * 3, 1e-9, 1.0)
    assert window.spans == ()


def test_crossings_that_do_not_overlap_leave_nothing(metal_case):
    line = [burning(10.0 ** (i - 7), 10.0 ** (-3 - i)) for i in range(5)]
    (window,) = found(metal_case, line, 10**-6.0, 10**-6.0)
    assert window.spans == ()


def test_a_point_without_result_ends_the_window(metal_case):
    line = [burning(1e-6, 1e-6), burning(1e-6, 1e-6), OUT, burning(1e-6, 1e-6)]
    (window,) = found(metal_case, line, 2e-6, 2e-6)
    assert spans(window) == [
        (40.0, "end of the sweep", 41.0, "no result beyond"),
        (43.0, "no result beyond", 43.0, "end of the sweep"),
    ]


def test_one_limit_alone_is_enough_and_none_is_no_window(metal_case):
    line = [burning(10.0 ** (i - 7), 1.0) for i in range(4)]
    (window,) = found(metal_case, line, 10**-5.5, None)
    assert spans(window) == [(40.0, "end of the sweep", 41.5, "NOx")]
    assert found(metal_case, line, None, None) == ()


def test_all_points_together_are_the_overlap_of_each(metal_case):
    laid = laid_out(metal_case, 5, ("full", "p40"))
    outcomes = {}
    for i in range(5):
        outcomes[str(i), "full"] = burning(10.0 ** (i - 7), 1e-9)
        outcomes[str(i), "p40"] = burning(1e-9, 10.0 ** (-3 - i))
    full, part, both = windows(laid, outcomes, 10**-4.5, 10**-4.5)
    assert (full.point, part.point, both.point) == ("full", "p40", "")
    assert spans(full) == [(40.0, "end of the sweep", 42.5, "NOx")]
    assert spans(part) == [(41.5, "CO", 44.0, "end of the sweep")]
    assert spans(both) == [(41.5, "CO", 42.5, "NOx")]


def test_a_falling_span_gives_the_same_window(metal_case):
    values = [0.044, 0.043, 0.042, 0.041, 0.040]
    laid = plan(metal_case, [axis(metal_case, DILUTION, values)], ["full"])
    outcomes = {(str(i), "full"): burning(10.0 ** (3 - i - 6), 10.0 ** (i - 7)) for i in range(5)}
    (window,) = windows(laid, outcomes, 10**-4.5, 10**-4.5)
    assert [(low.by, high.by) for low, high in window.spans] == [("CO", "NOx")]
    assert window.spans[0][0].value < window.spans[0][1].value


@settings(derandomize=True, max_examples=80, deadline=None)
@given(
    st.lists(
        st.one_of(st.none(), st.tuples(st.floats(1e-9, 1e-2), st.floats(1e-9, 1e-2))),
        min_size=2,
        max_size=12,
    ),
    st.floats(1e-8, 1e-3),
    st.floats(1e-8, 1e-3),
)
def test_grid_values_are_inside_exactly_when_both_limits_hold(metal_case, values, nox, co):
    line = [OUT if v is None else burning(*v) for v in values]
    (window,) = found(metal_case, line, nox, co)
    for i, value in enumerate(values):
        place = 40.0 + i
        inside = any(low.value <= place <= high.value for low, high in window.spans)
        held = value is not None and value[0] <= nox and value[1] <= co
        if held:
            assert inside
        elif value is not None and not (
            math.isclose(value[0], nox, rel_tol=1e-9) or math.isclose(value[1], co, rel_tol=1e-9)
        ):
            # a value out of limits is at most touched by a window's end
            assert not any(low.value < place < high.value for low, high in window.spans)


def test_two_axes_give_a_window_for_each_value_of_the_first(metal_case):
    axes = [
        spaced(metal_case, "points.*.humidity", 0.0, 0.01, 2),
        spaced(metal_case, DILUTION, "40 mm", "42 mm", 3),
    ]
    laid = plan(metal_case, axes, ["full"])
    outcomes = {(str(n), "full"): burning(1e-6 if n < 3 else 1e-4, 1e-6) for n in range(6)}
    first, second = windows(laid, outcomes, 1e-5, None)
    assert (first.held, second.held) == (0.0, 0.01)
    assert spans(first) and not second.spans


def test_sensitivities_are_central_differences_per_percent(metal_case):
    laid = laid_out(metal_case, 2)
    outcomes = {
        ("case", "full"): burning(100e-6, 10e-6, exit_temperature=1200.0),
        ("up 0", "full"): burning(103e-6, 10e-6, exit_temperature=1200.0),
        ("down 0", "full"): burning(99e-6, 10e-6, exit_temperature=1202.0),
    }
    (line,) = sensitivities(laid, outcomes)
    assert line.change["nox"] == pytest.approx(2e-6)
    assert line.relative["nox"] == pytest.approx(2.0)
    assert line.change["exit_temperature"] == pytest.approx(-1.0)
    assert line.relative["co"] == 0.0
    assert line.change["wall_peak"] is None
    assert line.reason == ""


def test_a_step_that_blows_out_gives_no_sensitivity_but_its_reason(metal_case):
    laid = laid_out(metal_case, 2)
    good = burning(1e-4, 1e-5)
    outcomes = {("case", "full"): good, ("up 0", "full"): OUT, ("down 0", "full"): good}
    (line,) = sensitivities(laid, outcomes)
    assert line.reason == "no flame"
    assert set(line.change.values()) == {None}
