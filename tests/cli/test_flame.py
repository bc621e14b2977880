import csv
import json

import pytest

import combustor
from combustor.cli import main

LEAN = ["flame", "methane", "--phi", "0.5", "--temperature", "700 K", "--pressure", "20 bar"]


def test_the_document_holds_the_keys_of_the_contract(capsys):
    assert main([*LEAN, "--time", "5 ms", "--json"]) == 0
    flame = json.loads(capsys.readouterr().out, parse_constant=pytest.fail)
    assert {"fuel", "equivalence_ratio", "fuel_air_ratio", "equilibrium", "stirred"} <= set(flame)
    assert {
        "status", "temperature_K", "nox_ppmvd_15", "co_ppmvd_15", "ei_nox_g_kg", "ei_co_g_kg",
    } <= set(flame["stirred"])  # fmt: skip
    assert flame["stirred"]["status"] == "burning"
    direct = combustor.flame(
        "methane",
        equivalence_ratio=0.5,
        temperature=700.0,
        pressure=20e5,
        residence_time=5e-3,
    )
    assert flame["equilibrium"]["temperature_K"] == direct.equilibrium_temperature
    assert flame["stirred"]["temperature_K"] == direct.stirred.temperature
    assert flame["stirred"]["ei_nox_g_kg"] == direct.stirred.emissions.ei_nox * 1e3


def test_bare_numbers_are_si(capsys):
    assert main([*LEAN, "--json"]) == 0
    with_units = capsys.readouterr().out
    bare = ["flame", "methane", "--phi", "0.5", "--temperature", "700", "--pressure", "2e6"]
    assert main([*bare, "--json"]) == 0
    assert capsys.readouterr().out == with_units


def test_without_a_time_there_is_no_stirred_reactor(capsys):
    assert main([*LEAN, "--json"]) == 0
    assert json.loads(capsys.readouterr().out)["stirred"] is None


def test_a_flame_that_blows_out_exits_1_and_says_so(capsys):
    assert main([*LEAN, "--time", "1 us"]) == 1
    assert "! blown out" in capsys.readouterr().out
    assert main([*LEAN, "--time", "1 us", "--json"]) == 1
    stirred = json.loads(capsys.readouterr().out)["stirred"]
    assert stirred["status"] == "blown_out"
    assert {value for key, value in stirred.items() if key != "status"} == {None}


def test_a_rich_flame_says_why_ppm_is_missing(capsys):
    rich = ["flame", "methane", "--phi", "1.4", "--temperature", "700", "--pressure", "20 bar"]
    assert main(rich) == 0
    out = capsys.readouterr().out
    assert "undefined where the gas is rich" in " ".join(out.split())
    assert main([*rich, "--json"]) == 0
    assert json.loads(capsys.readouterr().out)["equilibrium"]["nox_ppmvd_15"] is None


def test_cold_fuel_and_damp_air_cool_the_flame(capsys):
    temperatures = []
    for extra in ([], ["--fuel-temperature", "15 degC"], ["--humidity", "20 g/kg"]):
        assert main([*LEAN, *extra, "--json"]) == 0
        temperatures.append(json.loads(capsys.readouterr().out)["equilibrium"]["temperature_K"])
    assert temperatures[1] < temperatures[0] and temperatures[2] < temperatures[0]


def test_the_table_goes_to_csv(capsys, tmp_path):
    assert main([*LEAN, "--time", "5 ms", "--csv", str(tmp_path)]) == 0
    with (tmp_path / "flame.csv").open() as stream:
        lines = list(csv.DictReader(stream))
    assert [line["reactor"] for line in lines] == ["equilibrium", "stirred"]
    assert lines[0]["given_pressure_Pa"] == "2000000.0"
    assert float(lines[1]["nox_ppmvd_15"]) > 0.0


@pytest.mark.parametrize(
    ("option", "value", "said"),
    [
        ("--pressure", "20 barg", "gauge"),
        ("--pressure", "20 K", "unit of temperature"),
        ("--temperature", "-5", "negative"),
        ("--temperature", "nan", "finite"),
        ("--phi", "0", "zero"),
        ("--phi", "x", "--phi"),
        ("--time", "5 bar", "unit of pressure"),
        ("--humidity", "1e9", "--humidity"),
        ("--mechanism", "no-such-file.yaml", "no-such-file.yaml"),
    ],
)
def test_quantities_that_cannot_be_are_refused(capsys, option, value, said):
    assert main([*LEAN, option, value]) == 2
    out, err = capsys.readouterr()
    assert out == "" and said in err
    assert err.endswith("nothing was computed\n")
    assert "internal" not in err


def test_every_wrong_quantity_is_named_at_once(capsys):
    wrong = ["flame", "methane", "--phi", "-1", "--temperature", "700 bar", "--pressure", "0"]
    assert main(wrong) == 2
    assert len(capsys.readouterr().err.strip().split("\n")) == 4


def test_burning_velocity_on_request(capsys):
    given = ["--phi", "1", "--temperature", "298 K", "--pressure", "1 atm", "--burning-velocity"]
    assert main(["flame", "hydrogen", *given, "--humidity", "0", "--json"]) == 0
    flame = json.loads(capsys.readouterr().out)
    assert 2.1 <= flame["burning_velocity_m_s"] <= 2.4
    assert flame["burning_velocity_method"] == "burning-velocity-kinetic"
    assert main(["flame", "ammonia", *given]) == 2
    assert "no burning velocity of NH3" in capsys.readouterr().err
