import json

from combustor.cli import main
from combustor.fuel import catalogue


def test_the_catalogue_lists_every_fuel(capsys):
    assert main(["fuels"]) == 0
    out = capsys.readouterr().out
    for name in catalogue.names():
        assert f"\n{name} " in out


def test_one_fuel_is_shown_in_full(capsys):
    assert main(["fuels", "natural-gas+30%hydrogen"]) == 0
    out = capsys.readouterr().out
    assert "H2 30 %" in out
    for words in ("LHV", "Wobbe lower", "mechanism", "GRI-Mech 3.0"):
        assert words in out


def test_json_is_one_document_with_units_in_its_keys(capsys):
    assert main(["fuels", "methane", "--json"]) == 0
    (fuel,) = json.loads(capsys.readouterr().out)["fuels"]
    found = catalogue.find("methane")
    assert fuel["lower_heating_value_MJ_kg"] == found.lower_heating_value * 1e-6
    assert fuel["wobbe_higher_MJ_m3"] == found.wobbe_higher * 1e-6
    assert fuel["composition"] == {"CH4": 1.0}


def test_csv_goes_to_files_and_is_not_overwritten_unasked(capsys, tmp_path):
    arguments = ["fuels", "hydrogen", "--csv", str(tmp_path / "t")]
    assert main(arguments) == 0
    assert "wrote" in capsys.readouterr().err
    before = (tmp_path / "t" / "fuels.csv").read_text()
    assert before.startswith("name,phase,molar_mass_g_mol")
    assert main(arguments) == 2
    assert "--force" in capsys.readouterr().err
    assert main([*arguments, "--force"]) == 0
    assert (tmp_path / "t" / "fuels.csv").read_text() == before


def test_an_unknown_fuel_is_refused_with_the_nearest_spelling(capsys):
    assert main(["fuels", "hydrogan"]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "did you mean 'hydrogen'" in err
    assert err.endswith("nothing was computed\n")
