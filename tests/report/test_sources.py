"""The table of methods: nothing missing, nothing twice, and a method behind every value."""

from __future__ import annotations

import pytest

from combustor.airflow import methods as airflow
from combustor.base.errors import InputError
from combustor.base.method import Method
from combustor.heat import methods as heat
from combustor.report import fields
from combustor.report.behind import BEHIND
from combustor.report.source_tables import (
    behind_value,
    sources_data,
    sources_document,
    sources_report,
)
from combustor.studies.sources import Source, all_sources, behind

# Names, what was stated, and counts and sizes of the metal stand on no method.
STATED = {
    "name",
    "kind",
    "fuel",
    "status",
    "converged",
    "role",
    "count",
    "diameter_mm",
    "x_mm",
    "side",
    "fuel_percent",
    "air_kg_s",
}
TABLES = {
    "point": (*fields.FUEL_AIR, *fields.LOSS, *fields.LOSS_PARTS),
    "exit": fields.EXIT,
    "split": fields.SPLIT,
    "zones": fields.ZONES,
    "injectors": fields.INJECTORS,
    "profile": fields.PROFILE,
    "walls": fields.WALLS,
    "emissions": fields.EMISSIONS,
    "operability": fields.OPERABILITY,
}


@pytest.fixture(scope="module")
def everything():
    return all_sources()


def test_no_two_methods_share_a_key(everything):
    keys = [one.method.key for one in everything]
    assert len(keys) == len(set(keys)) > 150


def test_every_method_says_what_it_gives_and_where_it_was_read(everything):
    for one in everything:
        method = one.method
        assert method.key and method.quantity and method.source and method.reading, method.key
        for low, high in method.validity.values():
            assert low < high, method.key


def test_rooms_own_tuples_are_all_there(everything):
    keys = {one.method.key: one.room for one in everything}
    assert {keys[method.key] for method in heat.METHODS} <= {"heat", "hardware"}
    assert {method.key for method in airflow.METHODS} <= set(keys)


@pytest.mark.parametrize("table", TABLES)
def test_every_value_of_a_rating_has_methods_behind_it(everything, table):
    keys = {one.method.key for one in everything}
    for field in TABLES[table]:
        if field.key in STATED:
            continue
        methods = BEHIND[f"{table}.{field.key}"]
        assert set(methods) & keys, field.key


def test_no_value_names_a_method_that_is_not_there(everything):
    keys = {one.method.key for one in everything}
    for name, methods in BEHIND.items():
        assert set(methods) <= keys, (name, set(methods) - keys)


def test_what_stands_behind_a_value(everything):
    def keys(quantity):
        return {one.method.key for one in behind_value(quantity, everything)}

    assert keys("penetration_mm") == {"penetration-can-row", "penetration-norster"}
    assert keys("split.penetration_mm") == keys("penetration_mm")
    assert "mechanism-gri30" in keys("nox_ppmvd_15")
    assert "mechanism-gri30" not in keys("pressure_loss_percent")
    assert keys("grey-gas-smith") == {"grey-gas-smith"}
    assert "film-superposition-sellers" in keys("effectiveness films")


def test_a_value_that_is_not_there_is_refused_with_the_nearest(everything):
    with pytest.raises(InputError, match="did you mean 'penetration_mm'"):
        behind_value("penetraton_mm", everything)


def test_words_find_methods_by_what_they_give():
    here = Source(Method("a", "height of a weir", "x", "derived"), "airflow")
    assert behind("weir height", [here], {}) == (here,)


def test_documents_hold_every_part(everything):
    document = sources_document(everything, "1", None)
    first = document["sources"][0]
    assert list(first) == [
        "key",
        "room",
        "used_in",
        "quantity",
        "source",
        "reading",
        "validity",
        "scatter",
        "note",
    ]
    smith = next(one for one in document["sources"] if one["key"] == "grey-gas-smith")
    assert smith["validity"]["pressure_path"]["low"] < smith["validity"]["pressure_path"]["high"]
    assert document["case"] is None
    table, closing = sources_report(everything, None)
    assert len(table.below) == len(table.records) == len(everything)
    assert f"Methods: {len(everything)}" in closing.text
    assert len(sources_data(everything)[0].records) == len(everything)
