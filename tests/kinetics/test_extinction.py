"""Where the burning branch ends."""

from __future__ import annotations

import cantera as ct
import pytest

from combustor.kinetics.chain import burn
from combustor.kinetics.extinction import blowout_fuel_flow, blowout_residence_time
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.stirred import stirred
from combustor.kinetics.streams import Stream

SOURCE = "computed by 0.3 % continuation, GRI-3.0"
LOADINGS = [
    (1.0, 700.0, 1e5, 5120.0),
    (1.0, 700.0, 5e5, 6.84e4),
    (1.0, 700.0, 20e5, 3.89e5),
    (0.5, 700.0, 1e5, 1760.0),
    (0.5, 700.0, 5e5, 9600.0),
    (0.5, 700.0, 20e5, 2.37e4),
    (1.0, 300.0, 5e5, 2.36e4),
]


@pytest.mark.parametrize(
    ("equivalence_ratio", "inlet", "pressure", "loading"),
    [
        pytest.param(*row, id=f"{SOURCE}, methane, ratio {row[0]}, {row[1]} K, {row[2]:g} Pa")
        for row in LOADINGS
    ],
)
def test_blowout_loading(mixtures, equivalence_ratio, inlet, pressure, loading):
    fractions, _ = mixtures.of(equivalence_ratio)
    enthalpy = mixtures.gas.enthalpy(inlet, pressure, fractions)
    blowout = blowout_residence_time(mixtures.gas, pressure, enthalpy, fractions)
    assert blowout is not None
    assert blowout.loading == pytest.approx(loading, rel=0.05)


@pytest.mark.parametrize(
    ("pressure", "loading"),
    [
        pytest.param(1e5, 1.38e4, id=f"{SOURCE}, hydrogen, ratio 0.4, 700 K, 1 bar"),
        pytest.param(20e5, 5.94e5, id=f"{SOURCE}, hydrogen, ratio 0.4, 700 K, 20 bar"),
    ],
)
def test_blowout_loading_of_hydrogen(mixtures, pressure, loading):
    fractions, _ = mixtures.of(0.4, {"H2": 1.0}, 0.0292)
    enthalpy = mixtures.gas.enthalpy(700.0, pressure, fractions)
    blowout = blowout_residence_time(mixtures.gas, pressure, enthalpy, fractions)
    assert blowout is not None
    assert blowout.loading == pytest.approx(loading, rel=0.05)


@pytest.mark.parametrize(
    ("equivalence_ratio", "inlet", "pressure"), [(0.5, 700.0, 5e5), (1.0, 400.0, 1e5)]
)
def test_blowout_against_a_plain_march(mixtures, equivalence_ratio, inlet, pressure):
    """Two per cent above, a plain reactor started there stays alight; two below, it goes out."""
    gas = mixtures.gas
    fractions, _ = mixtures.of(equivalence_ratio)
    enthalpy = gas.enthalpy(inlet, pressure, fractions)
    blowout = blowout_residence_time(gas, pressure, enthalpy, fractions)
    assert blowout is not None
    for factor, burns in ((1.02, True), (0.98, False)):
        residence_time = factor * blowout.residence_time
        solution = ct.Solution("gri30.yaml", transport_model=None)
        solution.TPY = inlet, pressure, fractions
        inflow = ct.Reservoir(solution, clone=True)
        solution.TPY = blowout.state.temperature, pressure, blowout.state.mass_fractions
        reactor = ct.IdealGasConstPressureReactor(solution, clone=True)
        outflow = ct.Reservoir(solution, clone=True)

        def rate(_time, reactor=reactor, residence_time=residence_time):
            return reactor.mass / residence_time

        devices = [
            ct.MassFlowController(inflow, reactor, mdot=rate),
            ct.MassFlowController(reactor, outflow, mdot=rate),
        ]
        ct.ReactorNet([reactor]).advance(1000.0 * residence_time)
        assert len(devices) == 2
        middle = inlet + 0.35 * (blowout.state.temperature - inlet)
        burning = bool(middle < reactor.phase.T)
        assert burning is burns


def test_just_above_its_blowout_a_reactor_burns_and_just_below_it_does_not(mixtures):
    gas = mixtures.gas
    fractions, _ = mixtures.of(0.6)
    enthalpy = gas.enthalpy(600.0, 10e5, fractions)
    blowout = blowout_residence_time(gas, 10e5, enthalpy, fractions)
    assert blowout is not None
    for factor, status in ((1.01, "burning"), (0.99, "blown_out")):
        result = stirred(gas, 10e5, enthalpy, fractions, factor * blowout.residence_time)
        assert result.status == status


def test_air_has_no_blowout(mixtures):
    enthalpy = mixtures.gas.enthalpy(700.0, 1e5, mixtures.air)
    assert blowout_residence_time(mixtures.gas, 1e5, enthalpy, mixtures.air) is None


@pytest.mark.parametrize("unmixedness", [0.0, 0.3])
def test_blowout_fuel_is_where_the_zone_stops_burning(mixtures, unmixedness):
    gas = mixtures.gas
    fuel = Stream(0.058, gas.enthalpy(300.0, 10e5, mixtures.methane), mixtures.methane)
    air = Stream(1.0, gas.enthalpy(600.0, 10e5, mixtures.air), mixtures.air)
    primary = PrimaryZone(fuel, air, 1.2e-3, unmixedness, 1.0, 5)
    found = blowout_fuel_flow(gas, 10e5, primary)
    assert found is not None
    assert found.reached
    for factor, status in ((1.02, "burning"), (0.95, "blown_out")):
        flow = factor * found.fuel_flow
        leaner = PrimaryZone(
            Stream(flow, fuel.enthalpy, fuel.mass_fractions), air, 1.2e-3, unmixedness, 1.0, 5
        )
        assert burn(gas, 10e5, leaner, ()).status == status
