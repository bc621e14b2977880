"""Names, blends, analyses and what is refused."""

from __future__ import annotations

import pickle

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.fuel import blend, catalogue
from combustor.fuel.entries import entries
from combustor.fuel.gas import Gas

PROMISED = {
    "methane": {"CH4": 1.0},
    "natural-gas": {"CH4": 0.92, "C2H6": 0.05, "C3H8": 0.01, "N2": 0.015, "CO2": 0.005},
    "propane": {"C3H8": 1.0},
    "hydrogen": {"H2": 1.0},
    "carbon-monoxide": {"CO": 1.0},
    "methanol": {"CH3OH": 1.0},
    "ammonia": {"NH3": 1.0},
    "syngas": {"H2": 0.4, "CO": 0.4, "N2": 0.2},
    "biogas": {"CH4": 0.6, "CO2": 0.4},
}


@pytest.mark.parametrize("name", PROMISED)
def test_named_fuels_hold_what_their_name_says(name):
    fuel = catalogue.find(name)
    assert fuel.composition == pytest.approx(PROMISED[name])
    assert fuel.name == name
    assert fuel.phase == ("liquid" if name == "methanol" else "gas")


@pytest.mark.parametrize("entry", entries(), ids=lambda entry: entry.name)
def test_every_entry_is_complete_and_can_be_loaded(entry):
    if entry.certificate is None:
        assert sum(entry.composition.values()) == pytest.approx(1.0, abs=1e-12)
    assert entry.source
    assert entry.reading
    fuel = catalogue.find(entry.name)
    gas = Gas.load(fuel.mechanism)
    assert gas.fuel(fuel).sum() == pytest.approx(1.0)
    assert fuel.lower_heating_value > 0.0
    assert fuel.mechanism_note


@pytest.mark.parametrize(
    ("written", "same"),
    [
        ("Natural Gas", "natural-gas"),
        ("natural_gas", "natural-gas"),
        ("ETHENE", "ethylene"),
        ("natural-gas + 30 % hydrogen", "natural-gas+30%hydrogen"),
        ("natural gas+30.0%hydrogen", "natural-gas+30%hydrogen"),
        ("(methane)", "methane"),
    ],
)
def test_spellings_of_one_fuel(written, same):
    assert catalogue.find(written).composition == pytest.approx(catalogue.find(same).composition)


def test_a_blend_is_named_without_spaces():
    assert catalogue.find("Natural gas + 30 % hydrogen").name == "natural-gas+30%hydrogen"


def test_shares_are_of_everything_up_to_there():
    assert catalogue.composition_of("methane+20%hydrogen+50%carbon-monoxide") == pytest.approx(
        {"CH4": 0.4, "H2": 0.1, "CO": 0.5}
    )


def test_blends_in_blends():
    assert catalogue.composition_of("methane+50%(hydrogen+10%carbon-monoxide)") == pytest.approx(
        {"CH4": 0.5, "H2": 0.45, "CO": 0.05}
    )


def test_a_share_of_nothing_leaves_no_trace_and_all_replaces():
    assert catalogue.composition_of("methane+0%hydrogen") == {"CH4": 1.0}
    assert catalogue.composition_of("methane+100%hydrogen") == {"H2": 1.0}


@settings(derandomize=True, max_examples=60, deadline=None)
@given(first=st.floats(0.0, 100.0), second=st.floats(0.0, 100.0))
def test_shares_of_any_blend_sum_to_one(first, second):
    parts = blend.parts(f"a+{first!r}%b+{second!r}%(a+{first!r}%c)")
    assert sum(part.share for part in parts) == pytest.approx(1.0, abs=1e-12)
    assert all(part.share >= 0.0 for part in parts)


@pytest.mark.parametrize(
    ("name", "said"),
    [
        ("metane", "did you mean 'methane'"),
        ("natural-gaz", "did you mean 'natural-gas'"),
        ("natural-gas+30%hydrogn", "did you mean 'hydrogen'"),
        ("kryptonite", "no such fuel"),
        ("natural-gas+30hydrogen", "volume percent of the second"),
        ("natural-gas+hydrogen", "volume percent of the second"),
        ("methane+130%hydrogen", "outside 0 to 100 %"),
        ("methane+-5%hydrogen", "outside 0 to 100 %"),
        ("methane+nan%hydrogen", "outside 0 to 100 %"),
        ("methane+", "cannot be read"),
        ("+30%methane", "cannot be read"),
        ("30%methane", "cannot be read"),
        ("(methane", "cannot be read"),
        ("methane)", "cannot be read"),
        ("methane(hydrogen)", "cannot be read"),
        ("", "cannot be read"),
        ("ammonia+30%methane", "no mechanism here burns CH4, NH3 together"),
    ],
)
def test_bad_names_are_refused_in_plain_words(name, said):
    with pytest.raises(InputError) as refused:
        catalogue.find(name)
    assert said in str(refused.value)


@pytest.mark.parametrize(
    ("composition", "said"),
    [
        ({"CH4": 0.9}, "do not sum to 1"),
        ({"CH4": 0.9, "H2": 0.11}, "do not sum to 1"),
        ({"CH4": 90.0, "H2": 10.0}, "divide by 100"),
        ({"CH4": -0.1, "H2": 1.1}, "composition.CH4"),
        ({"CH4": float("nan")}, "composition.CH4"),
        ({"CH4": float("inf")}, "composition.CH4"),
        ({}, "empty"),
        ({"N2": 1.0}, "cannot burn"),
        ({"CO2": 0.5, "H2O": 0.5}, "cannot burn"),
        ({"H2": 0.1, "O2": 0.9}, "cannot burn"),
        ({"CH4": 0.9, "NC9H20": 0.1}, "no mechanism here burns NC9H20"),
        ({"CH4": 0.99, "H2S": 0.01}, "no mechanism here burns H2S"),
        ({"CH4": 0.5, "NH3": 0.5}, "no mechanism here burns CH4, NH3 together"),
        ({"CH4": 0.9, "HE": 0.1}, "together"),
    ],
)
def test_bad_compositions_are_refused_in_plain_words(composition, said):
    with pytest.raises(InputError) as refused:
        catalogue.from_composition(composition)
    assert said in str(refused.value)


def test_all_bad_entries_are_named_at_once():
    with pytest.raises(InputError) as refused:
        catalogue.from_composition({"CH4": -0.2, "H2": 1.3, "CO": 0.2})
    assert len(refused.value.problems) == 3


def test_a_printed_analysis_may_miss_one_by_rounding_and_says_so():
    fuel = catalogue.from_composition({"CH4": 0.9195, "C2H6": 0.08})
    assert sum(fuel.composition.values()) == pytest.approx(1.0, abs=1e-12)
    assert any("scaled to 1" in caution for caution in fuel.cautions)
    assert not any("scaled" in caution for caution in catalogue.find("natural-gas").cautions)


def test_species_are_found_in_any_letter_case():
    fuel = catalogue.from_composition({"ch4": 0.9, "Ar": 0.1})
    assert dict(fuel.composition) == {"CH4": 0.9, "AR": 0.1}


def test_oxygen_in_the_fuel_is_pointed_out():
    fuel = catalogue.from_composition({"CH4": 0.97, "O2": 0.03})
    assert any("oxygen of its own" in caution for caution in fuel.cautions)


def test_a_fuel_travels_between_processes():
    fuel = catalogue.find("natural-gas+30%hydrogen")
    assert pickle.loads(pickle.dumps(fuel)) == fuel
