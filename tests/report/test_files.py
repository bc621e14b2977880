import csv
import io
import json
import math
from dataclasses import replace

import numpy as np
import pytest

from combustor.base.errors import InputError
from combustor.report.csv_out import csv_text, write_csv
from combustor.report.frame import frame
from combustor.report.json_out import dumps, strict
from combustor.report.rating_data import RATING_TABLES, rating_data
from combustor.report.rating_json import ratings_document

POINT_KEYS = {
    "name", "fuel", "status", "converged", "inlet", "fuel_flow_kg_s", "fuel_air_ratio",
    "equivalence_ratio", "pressure_loss_percent", "pressure_loss_parts_percent", "split", "zones",
    "profile", "exit", "walls", "emissions", "operability", "balances", "findings",
}  # fmt: skip
NESTED_KEYS = {
    "inlet": {"air_flow_kg_s", "pressure_Pa", "temperature_K", "humidity_kg_kg"},
    "pressure_loss_parts_percent": {"diffuser", "liner", "hot"},
    "exit": {"temperature_K", "pressure_Pa", "combustion_efficiency", "pattern_factor"},
    "balances": {"air", "elements", "enthalpy"},
    "emissions": {
        "ei_nox_g_kg", "ei_co_g_kg", "ei_uhc_g_kg", "nox_ppmvd_15", "co_ppmvd_15", "n2o_ppmvd_15",
        "nox_mg_nm3_15", "co_mg_nm3_15", "nox_g_MJ", "o2_percent_dry", "co2_percent_dry",
        "h2o_percent_wet",
    },
}  # fmt: skip
LINE_KEYS = {
    "split": {
        "name", "role", "flow_kg_s", "percent", "count", "diameter_mm", "effective_area_mm2",
        "discharge_coefficient", "jet_velocity_m_s", "jet_angle_deg", "penetration_mm",
    },
    "zones": {
        "name", "equivalence_ratio", "temperature_K", "residence_time_ms", "air_percent",
    },
    "profile": {"x_mm", "temperature_K", "nox_ppmvd_15", "co_ppmvd_15"},
    "walls": {"x_mm", "side", "temperature_K", "film_effectiveness"},
    "findings": {"level", "what", "value", "limit", "unit", "advice", "source"},
}  # fmt: skip


@pytest.fixture
def document(ratings):
    return json.loads(dumps(ratings_document(ratings, "9.9")), parse_constant=pytest.fail)


def test_the_document_holds_the_keys_of_the_contract(document):
    assert {"title", "version", "case_sha256", "points"} <= set(document)
    for point in document["points"]:
        assert set(point) >= POINT_KEYS
        for key, wanted in NESTED_KEYS.items():
            assert set(point[key]) >= wanted
    full = document["points"][0]
    for key, wanted in LINE_KEYS.items():
        assert full[key] and all(set(line) >= wanted for line in full[key])
    assert {"blowout_fuel_air_ratio", "blowout_margin_percent"} <= set(full["operability"])


def test_values_carry_the_unit_their_key_says(document):
    full = document["points"][0]
    assert full["inlet"] == {
        "air_flow_kg_s": 14.2,
        "pressure_Pa": 9.9e5,
        "temperature_K": 598.15,
        "humidity_kg_kg": 0.00634,
    }
    assert full["pressure_loss_percent"] == pytest.approx(4.51)
    parts = full["pressure_loss_parts_percent"]
    assert sum(parts.values()) == pytest.approx(4.51)
    row = full["split"][1]
    assert row["percent"] == pytest.approx(88.0)
    assert (row["count"], row["diameter_mm"]) == (8, pytest.approx(30.5))
    assert row["effective_area_mm2"] == pytest.approx(3500.0)
    assert row["jet_angle_deg"] == pytest.approx(60.0)
    assert row["penetration_mm"] == pytest.approx(123.4)
    assert full["zones"][0]["residence_time_ms"] == pytest.approx(4.31)
    assert full["zones"][1]["air_percent"] == 100.0
    assert full["exit"]["combustion_efficiency"] == 0.99987
    emissions = full["emissions"]
    assert emissions["ei_nox_g_kg"] == pytest.approx(11.43)
    assert emissions["nox_ppmvd_15"] == pytest.approx(256.3)
    assert emissions["nox_mg_nm3_15"] == pytest.approx(526.2)
    assert emissions["nox_g_MJ"] == pytest.approx(0.231)
    assert emissions["o2_percent_dry"] == pytest.approx(14.42)
    assert full["walls"][30]["x_mm"] == pytest.approx(300.0)


def test_shares_of_the_split_sum_to_the_air(document):
    assert sum(line["percent"] for line in document["points"][0]["split"]) == pytest.approx(100.0)


def test_what_is_no_result_is_null(document):
    idle = document["points"][1]
    assert idle["status"] == "blown_out" and idle["converged"] is False
    assert idle["fuel_flow_kg_s"] == 0.0207
    assert idle["pressure_loss_percent"] is None
    for key in ("exit", "emissions", "balances", "pressure_loss_parts_percent"):
        assert set(idle[key].values()) == {None}
    assert idle["split"] == idle["zones"] == idle["walls"] == idle["profile"] == []


def test_undefined_stations_of_the_profile_are_null(document):
    first, second = document["points"][0]["profile"][:2]
    assert first["nox_ppmvd_15"] is None and first["temperature_K"] == 2200.0
    assert second["nox_ppmvd_15"] == pytest.approx(190.0)


def test_every_wall_station_is_in_the_document(document):
    assert len(document["points"][0]["walls"]) == 61


def test_strict_leaves_nothing_that_json_cannot_hold():
    value = {"a": np.array([1.0, math.nan]), "b": (math.inf, np.int64(2)), 3: None}
    assert strict(value) == {"a": [1.0, None], "b": [None, 2], "3": None}


def test_csv_files_hold_the_same_numbers_as_the_document(ratings, document, tmp_path):
    paths = write_csv(rating_data(ratings), tmp_path / "new" / "folder")
    assert [path.stem for path in paths] == list(RATING_TABLES)
    lines = list(csv.DictReader(io.StringIO(paths[0].read_text())))
    full = document["points"][0]
    assert float(lines[0]["nox_ppmvd_15"]) == full["emissions"]["nox_ppmvd_15"]
    assert float(lines[0]["inlet_pressure_Pa"]) == full["inlet"]["pressure_Pa"]
    assert float(lines[0]["exit_temperature_K"]) == full["exit"]["temperature_K"]
    assert lines[1]["exit_temperature_K"] == ""
    assert lines[1]["converged"] == "false"
    split = list(csv.DictReader(io.StringIO(paths[1].read_text())))
    assert [line["name"] for line in split] == ["swirler", "dil_2", "seals"]
    assert {line["point"] for line in split} == {"full"}
    assert float(split[1]["percent"]) == full["split"][1]["percent"]


def test_csv_replaces_nothing_unless_forced(ratings, tmp_path):
    (tmp_path / "zones.csv").write_text("mine")
    with pytest.raises(InputError, match=r"zones\.csv.*--force"):
        write_csv(rating_data(ratings), tmp_path)
    assert [path.name for path in tmp_path.iterdir()] == ["zones.csv"]
    assert (tmp_path / "zones.csv").read_text() == "mine"
    write_csv(rating_data(ratings), tmp_path, force=True)
    assert (tmp_path / "zones.csv").read_text().startswith("point,name,equivalence_ratio")
    assert sorted(path.stem for path in tmp_path.iterdir()) == sorted(RATING_TABLES)


def test_a_csv_folder_that_is_a_file_is_refused(ratings, tmp_path):
    (tmp_path / "taken").write_text("")
    with pytest.raises(InputError, match="cannot be written"):
        write_csv(rating_data(ratings), tmp_path / "taken")


def test_awkward_names_survive_the_csv(ratings):
    point = replace(ratings.points[0], name='a,"b"\nc')
    text = csv_text(rating_data(replace(ratings, points=(point,)))[0])
    assert next(iter(csv.DictReader(io.StringIO(text))))["name"] == 'a,"b"\nc'


def test_the_frame_has_one_row_a_point_under_the_csv_headers(ratings):
    made = frame(ratings)
    assert list(made["name"]) == ["full", "idle"]
    assert made.loc[0, "nox_ppmvd_15"] == pytest.approx(256.3)
    assert made["exit_temperature_K"].isna().tolist() == [False, True]
    header = csv_text(rating_data(ratings)[0]).split("\n")[0].split(",")
    assert list(made.columns) == header
