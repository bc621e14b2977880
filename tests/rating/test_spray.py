"""Liquid fuel in the coupled rating: vapour by place, balances, and no spray for gases."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from combustor.base.errors import InputError
from combustor.case.load import load_case
from combustor.case.schema import Atomiser
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.rating.couple import couple
from combustor.rating.operating import operating_of
from combustor.rating.settings import settings_of
from combustor.rating.spray import SPRAY_WIDTH, evaporation_of, for_sprays
from combustor.sizing.size import size

DEMO = Path(__file__).parents[2] / "demo" / "aero_can_jet_a.toml"


@pytest.fixture(scope="module")
def machine():
    case = load_case(DEMO)
    fuel = fuel_of(case)
    gas = Gas.load(fuel.mechanism)
    hardware = size(case, fuel, gas).hardware
    return case, fuel, gas, hardware


def coupled_with(machine, **atomiser):
    case, fuel, gas, hardware = machine
    operating = operating_of(case, case.point("approach"), fuel, gas)
    operating = replace(operating, atomiser=Atomiser(**atomiser))
    coarse_chain = replace(
        settings_of(case.model), streams=3, secondary_cells=2, dilution_cells=2, wall_stations=20
    )
    return couple(gas, fuel, operating, hardware, for_sprays(coarse_chain, fuel))


@pytest.fixture(scope="module")
def fine(machine):
    return coupled_with(machine, drop_size=5e-6)


@pytest.fixture(scope="module")
def coarse(machine):
    return coupled_with(machine, drop_size=30e-6)


def test_all_fuel_turns_to_vapour_somewhere(fine, coarse):
    for solved in (fine, coarse):
        assert solved.convergence.converged
        assert sum(solved.evaporation.shares) == pytest.approx(1.0, abs=1e-12)
        assert all(share >= 0.0 for share in solved.evaporation.shares)
        assert solved.fire.chain.balances.elements < 1e-9
        assert solved.fire.chain.balances.enthalpy < 1e-9
    assert fine.evaporation.shares[0] > 0.999
    assert coarse.evaporation.shares[0] < 0.95


def test_poor_evaporation_cools_the_primary_zone_and_leaves_more_unburnt(machine, fine, coarse):
    gas = machine[2]

    def unburnt(solved):
        return solved.fire.exit.mass_fractions @ (gas.combustion_heats / gas.molar_masses)

    first = [solved.fire.chain.stations[0].temperature for solved in (fine, coarse)]
    assert first[1] < first[0] - 20.0
    assert unburnt(coarse) > unburnt(fine)


def test_the_width_of_sprays_is_a_default_only(machine):
    case, fuel, _, _ = machine
    plain = settings_of(case.model)
    assert for_sprays(plain, fuel).unmixedness == SPRAY_WIDTH
    stated = replace(plain, unmixedness=0.3, is_unmixedness_stated=True)
    assert for_sprays(stated, fuel).unmixedness == 0.3


def test_gases_have_no_spray(machine, fine):
    case, _, _, hardware = machine
    gaseous = catalogue.find("natural-gas")
    operating = operating_of(case, case.point("idle"), gaseous, Gas.load(gaseous.mechanism))
    assert evaporation_of(operating, fine.split, hardware, gaseous, 0.01, [1e-3]) is None
    settings = settings_of(case.model)
    assert for_sprays(settings, gaseous) is settings


def test_an_atomiser_that_lacks_what_its_law_needs_is_refused(machine, fine):
    case, fuel, gas, hardware = machine
    operating = operating_of(case, case.point("idle"), fuel, gas)
    operating = replace(operating, atomiser=Atomiser(kind="pressure-swirl"))
    with pytest.raises(InputError, match=r"fuel\.atomiser\.flow_number"):
        evaporation_of(operating, fine.split, hardware, fuel, 0.01, [1e-3])
    stated = replace(operating, atomiser=Atomiser(kind="pressure-swirl", flow_number=2.5e-7))
    spray = evaporation_of(stated, fine.split, hardware, fuel, 0.01, [2e-3, 1e-3])
    assert 20e-6 < spray.drop_size < 120e-6
    assert sum(spray.shares) == pytest.approx(1.0)
