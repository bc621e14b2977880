"""Certificates: what they become, what is refused, what lies between neighbours."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.fuel import catalogue
from combustor.fuel.certificate import (
    LATENT_DEFAULT,
    Certificate,
    hydrogen_of_ratio,
    molar_mass_riazi_daubert,
)
from combustor.fuel.composition import ATOMIC_MASS
from combustor.fuel.gas import Gas
from combustor.fuel.liquids import supplied_enthalpy
from combustor.fuel.lumped import parted
from combustor.fuel.lumped_thermo import pure

JET = Certificate(net_heating_value=43.15e6, density=804.0, hydrogen=0.138, molar_mass=0.1586)
LIQUIDS = [row.name for row in catalogue.entries() if row.certificate is not None]


@pytest.mark.parametrize("name", LIQUIDS)
def test_the_lumped_species_releases_the_stated_heat(name):
    fuel = catalogue.find(name)
    row = catalogue.entry(name)
    gas = Gas.load(fuel.mechanism)
    vapour = gas.lower_heating_value(gas.fuel(fuel))
    stated = row.certificate["net_heating_value"]
    assert vapour - fuel.liquid.latent_heat == pytest.approx(stated, rel=1e-6)
    assert fuel.lower_heating_value == stated
    sulfur = row.certificate.get("sulfur", 0.0)
    assert fuel.hydrogen_mass_fraction * (1.0 - sulfur) == pytest.approx(
        row.certificate["hydrogen"], rel=1e-4
    )


@settings(derandomize=True, max_examples=25, deadline=None)
@given(
    hydrogen=st.floats(0.125, 0.155),
    molar_mass=st.floats(0.10, 0.22),
    oxygen=st.floats(0.0, 0.1),
    aromatics=st.floats(0.0, 0.5),
)
def test_every_step_balances_for_any_formula(hydrogen, molar_mass, oxygen, aromatics):
    certificate = replace(
        JET,
        hydrogen=hydrogen * (1.0 - oxygen),
        molar_mass=molar_mass,
        oxygen=oxygen,
        aromatics=aromatics,
        nitrogen=1e-3,
    )
    try:
        fuel = catalogue.from_certificate(
            replace(certificate, net_heating_value=certificate.expected_heat)
        )
    except InputError as refused:
        assert "more hydrogen than the carbon can bind" in str(refused)
        return
    gas = Gas.load(fuel.mechanism)
    net = gas.solution.product_stoich_coeffs - gas.solution.reactant_stoich_coeffs
    assert np.abs(gas.element_matrix @ net).max() < 1e-11
    _, (lump,) = parted(fuel.mechanism)
    assert all(r.products[s] > 0.0 for r in lump.reactions() for s in r.products)


def test_vapour_is_near_the_nasa_kerosene_from_300_to_3000_kelvin():
    _, (lump,) = parted(catalogue.find("jet-a").mechanism)
    atoms, nasa = pure("Jet-A(g)")
    its_mass = sum(n * ATOMIC_MASS[e] for e, n in atoms.items())
    mass = sum(n * ATOMIC_MASS[e] for e, n in lump.atoms.items())
    thermo = lump.species().thermo
    for temperature in np.linspace(300.0, 3000.0, 28):
        reference = nasa.heat_capacity(temperature) / its_mass
        assert thermo.cp(temperature) / 1e3 / mass == pytest.approx(reference, rel=0.01)
    rise = (nasa.enthalpy(1000.0) - nasa.enthalpy(300.0)) / its_mass
    mine = (thermo.h(1000.0) - thermo.h(300.0)) / 1e3 / mass
    assert mine == pytest.approx(rise, rel=0.01)


def test_latent_heat_default_is_the_difference_of_the_nasa_liquid_and_vapour():
    import cantera as ct

    liquid = next(
        s for s in ct.Species.list_from_file("nasa_condensed.yaml") if s.name == "Jet-A(L)"
    )
    _, vapour = pure("Jet-A(g)")
    difference = vapour.enthalpy(298.15) - liquid.thermo.h(298.15) / 1e3
    assert pytest.approx(difference / 167.31e-3, rel=2e-3) == LATENT_DEFAULT


def test_the_air_provides_the_latent_heat():
    fuel = catalogue.find("jet-a")
    gas = Gas.load(fuel.mechanism)
    vapour = gas.enthalpy(288.15, 1e6, gas.fuel(fuel))
    assert vapour - supplied_enthalpy(gas, fuel, 288.15, 1e6) == pytest.approx(0.321e6)
    warm = supplied_enthalpy(gas, fuel, 338.15, 1e6) - supplied_enthalpy(gas, fuel, 288.15, 1e6)
    assert warm == pytest.approx(50.0 * 2000.0)
    with pytest.raises(InputError, match="not a liquid"):
        supplied_enthalpy(gas, fuel, 900.0, 1e6)


@pytest.mark.parametrize(
    ("change", "said"),
    [
        ({"hydrogen": 0.25}, "more hydrogen than the carbon can bind"),
        ({"net_heating_value": 20e6}, "no fuel of these elements has this heating value"),
        ({"hydrogen": 0.03}, "fuel.certificate.hydrogen"),
        ({"density": 80.4}, "fuel.certificate.density"),
        ({"molar_mass": None}, "neither molar mass nor mid-boiling point"),
        ({"oxygen": 0.5, "nitrogen": 0.02, "sulfur": 0.05, "hydrogen": 0.2}, "% carbon"),
    ],
)
def test_impossible_certificates_are_refused_with_the_reason(change, said):
    with pytest.raises(InputError) as refused:
        catalogue.from_certificate(replace(JET, **change))
    assert said in str(refused.value)


def test_estimates_and_doubts_are_said():
    fuel = catalogue.from_certificate(
        replace(JET, molar_mass=None, mid_boiling_point=480.0, net_heating_value=41.0e6)
    )
    said = " ".join(fuel.cautions)
    for word in (
        "Riazi",
        "latent heat not stated",
        "aromatics not stated",
        "check the certificate",
    ):
        assert word in said


def test_molar_mass_of_a_kerosene_cut():
    # average Jet A: mid-boiling point about 205 to 215 degC, 804 kg/m3, 152 to 167 g/mol
    assert 0.150 < molar_mass_riazi_daubert(480.0, 804.0) < 0.172


def test_hydrogen_from_the_atomic_ratio():
    assert hydrogen_of_ratio(1.908, 0.0, 0.0, 0.0) == pytest.approx(0.138, abs=2e-4)


def test_liquids_blend_by_volume_of_the_liquid():
    jet, spk = catalogue.find("jet-a"), catalogue.find("hefa-spk")
    half = catalogue.find("jet-a+50%hefa-spk")
    assert half.liquid.density == pytest.approx(0.5 * (803.0 + 757.0))
    share = 757.0 / (803.0 + 757.0)
    expected = (1.0 - share) * jet.lower_heating_value + share * spk.lower_heating_value
    assert half.lower_heating_value == pytest.approx(expected)
    for other in ("jet-a+50%methane", "methane+5%jet-a", "methanol+10%hydrogen"):
        with pytest.raises(InputError, match="cannot stand in this blend"):
            catalogue.find(other)


def test_a_certificate_between_two_fuels_gives_answers_between_theirs():
    def flame(fuel):
        gas = Gas.load(fuel.mechanism)
        share = 0.6 * fuel.stoichiometric_fuel_air_ratio
        share /= 1.0 + share
        heat = share * supplied_enthalpy(gas, fuel, 288.15, 1e6)
        air = gas.air(0.0)
        heat += (1.0 - share) * gas.enthalpy(700.0, 1e6, air)
        burnt = gas.equilibrium(heat, 1e6, share * gas.fuel(fuel) + (1.0 - share) * air)
        return burnt.temperature

    low, high = catalogue.find("diesel"), catalogue.find("hefa-spk")
    between = catalogue.from_certificate(
        Certificate(
            net_heating_value=43.5e6, density=790.0, hydrogen=0.144, molar_mass=0.178,
            latent_heat=0.35e6, aromatics=0.10,
        )
    )  # fmt: skip
    for value in (
        flame,
        lambda f: f.stoichiometric_fuel_air_ratio,
        lambda f: f.lower_heating_value,
    ):
        ends = sorted((value(low), value(high)))
        assert ends[0] < value(between) < ends[1]


def test_bound_nitrogen_is_in_the_molecule():
    atoms = catalogue.find("diesel").atoms
    assert atoms["N"] * ATOMIC_MASS["N"] / catalogue.find("diesel").molar_mass == pytest.approx(
        1e-4, rel=1e-3
    )


def test_a_degree_of_cracking_is_part_of_the_name():
    fuel = catalogue.find("cracked-ammonia-60")
    assert fuel.composition == pytest.approx({"NH3": 0.25, "H2": 0.5625, "N2": 0.1875})
    with pytest.raises(InputError):
        catalogue.find("cracked-ammonia-160")


def test_a_mechanism_of_ones_own_is_checked_on_loading(tmp_path):
    fuel = catalogue.find("methane", "gri30.yaml")
    assert "file of your own" not in fuel.mechanism_note
    hydrogen = catalogue.find("hydrogen", "h2o2.yaml")
    assert any("cannot give NOx" in caution for caution in hydrogen.cautions)
    with pytest.raises(InputError, match="given by certificate"):
        catalogue.find("jet-a", "h2o2.yaml")
    bare = tmp_path / "bare.yaml"
    bare.write_text(
        "phases:\n- name: gas\n  thermo: ideal-gas\n  kinetics: gas\n"
        "  species: [{h2o2.yaml/species: [H2, O2, H2O, N2, H, O, OH]}]\n"
        "  reactions: [{h2o2.yaml/reactions: declared-species}]\n"
        "  skip-undeclared-third-bodies: true\n",
        encoding="utf-8",
    )
    with pytest.raises(InputError, match="lacks the species HO2"):
        catalogue.find("hydrogen", str(bare))
