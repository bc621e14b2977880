"""Which mechanism burns what, and what is said about it."""

from __future__ import annotations

from typing import get_args

import cantera as ct
import pytest

from combustor.base.errors import InputError
from combustor.base.method import Reading
from combustor.fuel import catalogue, choose_mechanism
from combustor.fuel.gas import Gas
from combustor.fuel.lumped import parted

NEWER, OLDER = "ammonia-CO-H2-Alzueta-2023.yaml", "gri30.yaml"
LUMPED = "lumped-base.yaml"


@pytest.mark.parametrize(
    ("name", "file"),
    [
        ("hydrogen", NEWER),
        ("carbon-monoxide", NEWER),
        ("syngas", NEWER),
        ("ammonia", NEWER),
        ("ammonia+30%hydrogen", NEWER),
        ("ammonia+50%cracked-ammonia", NEWER),
        ("blast-furnace-gas", NEWER),
        ("methane", OLDER),
        ("natural-gas", OLDER),
        ("natural-gas+30%hydrogen", OLDER),
        ("natural-gas+100%hydrogen", NEWER),
        ("syngas+5%methane", OLDER),
        ("propane", OLDER),
        ("methanol", OLDER),
        ("biogas", OLDER),
        ("natural-gas-rich", OLDER),
    ],
)
def test_the_mechanism_follows_the_fuel(name, file):
    assert catalogue.find(name).mechanism.endswith(file)


@pytest.mark.parametrize("name", ["jet-a", "lpg", "ethanol", "jet-a+30%hefa-spk"])
def test_lumped_fuels_stand_on_the_shipped_base(name):
    file, lumps = parted(catalogue.find(name).mechanism)
    assert file.endswith(LUMPED)
    assert lumps


def test_liquids_and_gases_compare_on_one_mechanism_that_holds_them_all():
    fuels = catalogue.together(["jet-a", "natural-gas", "hydrogen", "lpg"])
    assert len({fuel.mechanism for fuel in fuels}) == 1
    gas = Gas.load(fuels[0].mechanism)
    assert all(gas.has(species) for fuel in fuels for species in fuel.composition)
    with pytest.raises(InputError, match="NH3"):
        catalogue.together(["jet-a", "ammonia"])


def test_one_comparison_takes_one_mechanism():
    together = [catalogue.composition_of(name) for name in ("natural-gas", "hydrogen")]
    assert choose_mechanism.choose(together).file == OLDER
    with pytest.raises(InputError, match="together"):
        choose_mechanism.choose([{"CH4": 1.0}, {"NH3": 1.0}])


@pytest.mark.parametrize("mechanism", choose_mechanism.catalogue(), ids=lambda row: row.name)
def test_catalogue_of_mechanisms_is_true(mechanism):
    gas = Gas.load(mechanism.path)
    assert all(gas.has(species) for species in mechanism.burns | mechanism.carries)
    assert gas.has("NO") is mechanism.nitrogen_chemistry
    assert mechanism.reading in get_args(Reading)
    assert all((mechanism.source, mechanism.reading, mechanism.licence, mechanism.note))
    assert set(mechanism.species_cautions) <= mechanism.burns
    consumed = {species for r in gas.solution.reactions() for species in (r.reactants | r.products)}
    assert {gas.species_names[gas.index(species)] for species in mechanism.burns} <= consumed


def test_methanol_has_chemistry_of_its_own():
    gas = Gas.load(OLDER)
    attacks = [r for r in gas.solution.reactions() if "CH3OH" in (r.reactants | r.products)]
    assert len(attacks) >= 5


def test_a_file_of_the_same_name_nearby_is_not_taken(tmp_path, monkeypatch):
    (tmp_path / OLDER).write_text("phases: []\n", encoding="utf-8")
    monkeypatch.chdir(tmp_path)
    fuel = catalogue.find("methane")
    assert not fuel.mechanism.startswith(str(tmp_path))


def test_a_mechanism_of_the_users_own(tmp_path):
    file = tmp_path / "mine.yaml"
    ct.Solution(OLDER, transport_model=None).write_yaml(str(file))
    fuel = catalogue.find("methane", mechanism=str(file))
    assert fuel.mechanism == str(file)
    assert "your own" in fuel.mechanism_note
    assert fuel.lower_heating_value == catalogue.find("methane").lower_heating_value


def test_ammonia_with_methane_on_a_named_mechanism_is_allowed_and_qualified():
    fuel = catalogue.find("methane+20%ammonia", mechanism=OLDER)
    assert any("was not made to burn NH3" in caution for caution in fuel.cautions)


def test_a_mechanism_without_nitrogen_chemistry_says_so():
    fuel = catalogue.find("hydrogen", mechanism="h2o2.yaml")
    assert any("no nitrogen chemistry" in caution for caution in fuel.cautions)


def test_a_mechanism_that_lacks_the_fuel_is_refused():
    with pytest.raises(InputError, match="does not hold CH4"):
        catalogue.find("methane", mechanism="h2o2.yaml")


def test_a_mechanism_that_is_not_there_is_refused():
    with pytest.raises(InputError, match="mechanism"):
        catalogue.find("methane", mechanism="grii30.yaml")


@pytest.mark.parametrize(
    ("name", "word"),
    [
        ("propane", "propane"),
        ("methanol", "methanol"),
        ("ethylene", "ethylene"),
        ("hydrogen", "1.2 to 2.7 times"),
    ],
)
def test_weak_spots_are_said(name, word):
    assert any(word in caution for caution in catalogue.find(name).cautions)


def test_minor_propane_needs_no_caution():
    assert not any("propane" in caution for caution in catalogue.find("natural-gas").cautions)


def test_pressure_beyond_the_data_a_mechanism_was_fitted_to_is_noticed():
    method = choose_mechanism.method_of(catalogue.find("natural-gas").mechanism)
    assert not method.notices(pressure=8e5)
    assert len(method.notices("primary zone", pressure=20e5)) == 1
    assert "GRI-Mech 3.0" in method.source


def test_a_mechanism_of_the_users_own_stands_among_the_sources(tmp_path):
    method = choose_mechanism.method_of(tmp_path / "mine.yaml")
    assert "mine.yaml" in method.source
    assert not method.validity
