import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.case import loads_case
from combustor.case.entry import entries, with_entries
from combustor.studies.sweep_axis import MOST_VALUES, axis, spaced
from combustor.studies.sweep_plan import CHUNK, MOST_RATINGS, plan

DILUTION = "hardware.openings.dilution.diameter"


def test_values_are_evenly_spaced_in_the_unit_they_were_given_in(metal_case):
    found = spaced(metal_case, DILUTION, "44 mm", "50 mm", 4)
    assert found.shown == (44.0, 46.0, 48.0, 50.0)
    assert found.values == (0.044, 0.046, 0.048, 0.05)
    assert found.unit == "mm"


def test_bare_numbers_are_si(metal_case):
    found = spaced(metal_case, "points.full.inlet_temperature", 590.0, 610.0, 3)
    assert found.values == (590.0, 600.0, 610.0)
    assert found.unit == "K"


def test_a_temperature_in_degrees_becomes_kelvin(metal_case):
    found = spaced(metal_case, "points.full.inlet_temperature", "300 degC", "340 degC", 3)
    assert found.shown == (300.0, 320.0, 340.0)
    assert found.values == pytest.approx((573.15, 593.15, 613.15))


def test_two_units_of_one_kind_are_spaced_in_si(metal_case):
    found = spaced(metal_case, DILUTION, "4.4 cm", "50 mm", 4)
    assert found.values == pytest.approx((0.044, 0.046, 0.048, 0.05))
    assert found.unit == "m"


def test_a_span_may_fall(metal_case):
    assert spaced(metal_case, DILUTION, "50 mm", "44 mm", 3).shown == (50.0, 47.0, 44.0)


def test_a_star_stands_for_every_row(metal_case):
    found = spaced(metal_case, "points.*.humidity", 0.0, 0.01, 2)
    assert [e.key for e in found.entries] == [
        f"points.{p.name}.humidity" for p in metal_case.points
    ]
    changed = with_entries(metal_case, found.changes(1))
    assert {point.humidity for point in changed.points} == {0.01}


def test_counts_stay_whole(metal_case):
    found = spaced(metal_case, "hardware.openings.dilution.count", 4.0, 8.0, 3)
    assert found.values == (4, 6, 8)
    assert all(isinstance(value, int) for value in found.values)


@pytest.mark.parametrize(
    "key",
    [
        "targets.pressure_loss",
        "targets.equivalence_ratio.primary",
        "model.unmixedness",
        "combustor.inlet_annulus.outer",
        "fuel.temperature",
        "hardware.liner.diameter",
        "hardware.liner.diameter.0",
        "hardware.walls.outer.thickness",
        "hardware.openings.film-1.slot.height",
        "hardware.injectors.*.share",
        "points.p40.exit_temperature",
    ],
)
def test_any_number_of_the_case_can_be_varied(metal_case, key):
    (found, *_) = entries(metal_case, key)
    value = 0.5 if found.value is None else found.value
    assert with_entries(metal_case, [(found.path, value)]) is not metal_case


@pytest.mark.parametrize(
    ("key", "start", "stop", "count", "said"),
    [
        ("fuel.name", 1.0, 2.0, 3, "is not a number"),
        ("points.full.kind", 1.0, 2.0, 3, "is not a number"),
        ("hardware.liner.runs_to_exit", 0.0, 1.0, 2, "is not a number"),
        ("model.mechanism", 0.0, 1.0, 2, "is not a number"),
        ("points.full", 1.0, 2.0, 3, "is a table"),
        ("points", 1.0, 2.0, 3, "list of tables"),
        ("points.full.air_flow.x", 1.0, 2.0, 3, "below a single value"),
        ("points.full.airflow", 1.0, 2.0, 3, "did you mean 'points.full.air_flow'"),
        ("points.ful.air_flow", 1.0, 2.0, 3, "did you mean 'points.full'"),
        ("hardwear.liner_length", 1.0, 2.0, 3, "did you mean 'hardware'"),
        ("", 1.0, 2.0, 3, "no '' in this case"),
        (DILUTION, 0.04, 0.05, 0, "no points in the span"),
        (DILUTION, 0.04, 0.05, -3, "no points in the span"),
        (DILUTION, 0.04, 0.04, 3, "start and stop are the same"),
        (DILUTION, 0.04, 0.05, 1, "one point cannot span two values"),
        (DILUTION, 0.04, 0.05, 10_000_000, "10000000 values"),
        (DILUTION, "40 mm", 0.05, 3, "one end of the span only"),
        (DILUTION, "40 kg/s", "50 kg/s", 3, "a unit of length is needed"),
        (DILUTION, "nan", "50 mm", 3, "not a number"),
        (DILUTION, math.inf, 0.05, 3, "not a finite number"),
        (DILUTION, -0.1, 0.05, 3, "negative"),
        (DILUTION, "40 bar(g)", "50 bar(g)", 3, "gauge"),
        ("targets.pressure_loss", 3.0, 5.0, 3, "not a fraction"),
        ("hardware.openings.dilution.count", 4.0, 8.0, 4, "whole numbers"),
        ("hardware.openings.dilution.count", "4 mm", "8 mm", 5, "no unit"),
    ],
)
def test_bad_requests_are_refused_plainly(metal_case, key, start, stop, count, said):
    with pytest.raises(InputError) as refused:
        spaced(metal_case, key, start, stop, count)
    assert said in str(refused.value)
    assert "\n" not in str(refused.value)


def test_a_case_without_metal_says_how_to_get_it(metal_text):
    bare = loads_case(metal_text.split("# The metal")[0] + "[model]\nstreams = 2\n")
    with pytest.raises(InputError, match="combustor size CASE -o FILE"):
        entries(bare, DILUTION)


def test_values_of_ones_own_are_checked_too(metal_case):
    assert axis(metal_case, DILUTION, [0.05, 0.044]).values == (0.05, 0.044)
    with pytest.raises(InputError, match="at least one"):
        axis(metal_case, DILUTION, [])
    with pytest.raises(InputError, match="at most"):
        axis(metal_case, DILUTION, [0.05] * (MOST_VALUES + 1))


def test_too_many_ratings_are_refused_before_any_work(metal_case):
    axes = [
        spaced(metal_case, DILUTION, 0.04, 0.05, 5000),
        spaced(metal_case, "points.*.humidity", 0.0, 0.01, 5000),
    ]
    with pytest.raises(InputError, match=f"at most {MOST_RATINGS}"):
        plan(metal_case, axes)


def test_one_entry_cannot_be_varied_twice(metal_case):
    axes = [
        spaced(metal_case, "points.*.humidity", 0.0, 0.01, 3),
        spaced(metal_case, "points.full.humidity", 0.0, 0.01, 3),
    ]
    with pytest.raises(InputError, match="varied twice"):
        plan(metal_case, axes)
    with pytest.raises(InputError, match="at most two"):
        plan(metal_case, [*axes, axes[0]])
    with pytest.raises(InputError, match="nothing to vary"):
        plan(metal_case, [])


def test_a_corner_the_case_could_not_have_is_refused_with_the_reason(metal_case):
    hot = spaced(metal_case, "points.full.inlet_temperature", 600.0, 1400.0, 3)
    with pytest.raises(InputError) as refused:
        plan(metal_case, [hot])
    assert "cannot have points.full.inlet_temperature = 1400 K" in str(refused.value)
    assert "not above the inlet temperature" in str(refused.value)


def test_an_unknown_point_is_refused(metal_case):
    with pytest.raises(InputError, match="no such operating point"):
        plan(metal_case, [spaced(metal_case, DILUTION, 0.04, 0.05, 2)], ["ful"])


def test_the_case_and_a_percent_to_either_side_are_solved_too(metal_case, diameter):
    laid = plan(metal_case, [spaced(metal_case, DILUTION, 0.04, 0.05, 3)])
    labels = [row.label for row in laid.rows]
    assert labels == ["0", "1", "2", "case", "up 0", "down 0"]
    moved = {row.label: value for row in laid.rows for _, value in row.changes}
    assert moved["up 0"] == pytest.approx(1.01 * diameter)
    assert moved["down 0"] == pytest.approx(0.99 * diameter)
    assert laid.steps[0].percent == pytest.approx(1.0)


def test_a_count_steps_by_one_and_says_how_much_that_is(metal_case):
    key = "hardware.openings.dilution.count"
    count = entries(metal_case, key)[0].value
    laid = plan(metal_case, [spaced(metal_case, key, 4.0, 8.0, 5)])
    assert laid.steps[0].percent == pytest.approx(100.0 / count)


def test_an_entry_the_case_leaves_out_has_no_sensitivity(metal_case):
    laid = plan(metal_case, [spaced(metal_case, "model.unmixedness", 0.1, 0.4, 3)])
    assert laid.steps == ()
    assert all(row.indices for row in laid.rows)


@settings(derandomize=True, max_examples=40, deadline=None)
@given(first=st.integers(1, 45), second=st.integers(0, 12))
def test_every_rating_is_in_one_chunk_and_chunks_are_short_runs(metal_case, first, second):
    axes = [spaced(metal_case, DILUTION, 0.04, 0.05 if first > 1 else 0.04, first)]
    if second:
        stop = 0.01 if second > 1 else 0.0
        axes.append(spaced(metal_case, "points.*.humidity", 0.0, stop, second))
    laid = plan(metal_case, axes, ["full", "p40"])
    members = [(chunk.point, row) for chunk in laid.chunks for row in chunk.rows]
    assert len(members) == len(set(members)) == laid.ratings
    for chunk in laid.chunks:
        assert chunk.anchor in chunk.rows and len(chunk.rows) <= CHUNK
        grid = [laid.rows[r].indices for r in chunk.rows if laid.rows[r].indices]
        varying = [len(set(places)) for places in zip(*grid, strict=True)]
        assert sum(count > 1 for count in varying) <= 1


def test_the_digest_knows_what_results_depend_on(metal_text, metal_case):
    axes = [spaced(metal_case, DILUTION, 0.04, 0.05, 3)]
    laid = plan(metal_case, axes)
    commented = loads_case(metal_text + "\n# a remark\n")
    assert plan(commented, axes).digest == laid.digest
    finer = loads_case(metal_text.replace("wall_stations = 20", "wall_stations = 21"))
    assert plan(finer, axes).digest != laid.digest
    assert plan(metal_case, axes, ["full"]).digest != laid.digest
    assert plan(metal_case, axes, operability=False).digest != laid.digest
    other = [spaced(metal_case, DILUTION, 0.04, 0.05, 4)]
    assert plan(metal_case, other).digest != laid.digest
