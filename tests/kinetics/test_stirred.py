"""One stirred reactor against a computed table, an independent march, and its own limits."""

from __future__ import annotations

import cantera as ct
import numpy as np
import pytest

from combustor.base.errors import InputError
from combustor.kinetics.stirred import stirred

SOURCE = "computed, GRI-3.0, dry air, 700 K, 20 bar, 5 ms"
PRESSURE = 20e5

# equivalence ratio, temperature [K], EI NOx [g/kg as NO2], EI CO [g/kg]
TABLE = [
    (0.40, 1603.0, 0.037, 50.8),
    (0.50, 1802.6, 0.238, 13.85),
    (0.60, 1983.0, 1.734, 8.45),
    (0.80, 2297.8, 45.36, 26.7),
    (1.00, 2507.8, 68.1, 201.0),
    (1.20, 2426.4, 9.51, 767.0),
]


def burn(mixtures, equivalence_ratio, residence_time=5e-3, **kwargs):
    fractions, share = mixtures.of(equivalence_ratio)
    pressure = kwargs.pop("pressure", PRESSURE)
    enthalpy = mixtures.gas.enthalpy(kwargs.pop("inlet", 700.0), pressure, fractions)
    return stirred(mixtures.gas, pressure, enthalpy, fractions, residence_time, **kwargs), share


@pytest.mark.parametrize(
    ("equivalence_ratio", "temperature", "ei_nox", "ei_co"),
    [pytest.param(*row, id=f"{SOURCE}, equivalence ratio {row[0]}") for row in TABLE],
)
def test_stirred_table(mixtures, equivalence_ratio, temperature, ei_nox, ei_co):
    result, share = burn(mixtures, equivalence_ratio)
    fractions = result.state.mass_fractions
    assert result.status == "burning"
    assert result.state.temperature == pytest.approx(temperature, abs=3.0)
    assert 1000.0 * mixtures.nox(fractions) / share == pytest.approx(ei_nox, rel=0.03)
    assert 1000.0 * mixtures.co(fractions) / share == pytest.approx(ei_co, rel=0.03)


def test_stirred_ppm(mixtures):
    # computed, GRI-3.0, dry air, 700 K, 20 bar, 5 ms: NOx 2.77 ppm, CO 264 ppm; 20 ms: 5.30, 83
    for time, nox, co in ((5e-3, 2.77, 264.0), (20e-3, 5.30, 83.0)):
        fractions = burn(mixtures, 0.5, time)[0].state.mass_fractions
        assert mixtures.dry_15(fractions, ("NO", "NO2")) == pytest.approx(nox, rel=0.03)
        assert mixtures.dry_15(fractions, ("CO",)) == pytest.approx(co, rel=0.03)


def test_too_lean_to_burn_is_blown_out_and_cold(mixtures):
    result, _ = burn(mixtures, 0.30)
    assert result.status == "blown_out"
    assert result.state.temperature == pytest.approx(700.0, abs=2.0)


def test_pure_air_is_blown_out_not_an_error(mixtures):
    gas = mixtures.gas
    enthalpy = gas.enthalpy(700.0, PRESSURE, mixtures.air)
    result = stirred(gas, PRESSURE, enthalpy, mixtures.air, 5e-3)
    assert result.status == "blown_out"
    assert result.state.temperature == pytest.approx(700.0, abs=0.5)


@pytest.mark.parametrize(
    ("equivalence_ratio", "inlet", "pressure", "residence_time"),
    [(0.45, 600.0, 5e5, 2e-3), (1.0, 300.0, 1e5, 1e-3), (1.5, 750.0, 30e5, 3e-3)],
)
def test_against_a_plain_march_in_time(
    mixtures, equivalence_ratio, inlet, pressure, residence_time
):
    result, _ = burn(mixtures, equivalence_ratio, residence_time, inlet=inlet, pressure=pressure)
    fractions, _ = mixtures.of(equivalence_ratio)
    solution = ct.Solution("gri30.yaml", transport_model=None)
    solution.TPY = inlet, pressure, fractions
    inflow = ct.Reservoir(solution, clone=True)
    solution.equilibrate("HP")
    reactor = ct.IdealGasConstPressureReactor(solution, clone=True)
    outflow = ct.Reservoir(solution, clone=True)
    feed = ct.MassFlowController(inflow, reactor, mdot=lambda _time: reactor.mass / residence_time)
    drain = ct.MassFlowController(
        reactor, outflow, mdot=lambda _time: reactor.mass / residence_time
    )
    network = ct.ReactorNet([reactor])
    network.advance(50.0 * residence_time)
    assert feed.mass_flow_rate == pytest.approx(drain.mass_flow_rate)
    assert result.state.temperature == pytest.approx(reactor.phase.T, abs=0.01)
    for species in ("NO", "CO", "OH", "CO2"):
        place = mixtures.gas.index(species)
        assert result.state.mass_fractions[place] == pytest.approx(reactor.phase.Y[place], rel=1e-4)


def test_volume_and_flow_say_the_same_as_the_residence_time(mixtures):
    by_time, _ = burn(mixtures, 0.6, 4e-3)
    gas = mixtures.gas
    density = gas.density(by_time.state.temperature, PRESSURE, by_time.state.mass_fractions)
    flow = 1.7
    fractions, _ = mixtures.of(0.6)
    by_volume = stirred(
        gas,
        PRESSURE,
        by_time.state.enthalpy,
        fractions,
        volume=4e-3 * flow / density,
        mass_flow=flow,
    )
    assert by_volume.residence_time == pytest.approx(4e-3, rel=1e-6)
    assert by_volume.state.temperature == pytest.approx(by_time.state.temperature, abs=1e-4)


@pytest.mark.parametrize("equivalence_ratio", [0.4, 0.3])
def test_a_guess_does_not_choose_the_answer(mixtures, equivalence_ratio):
    plain, _ = burn(mixtures, equivalence_ratio, 2e-3)
    fractions, _ = mixtures.of(equivalence_ratio)
    cold = mixtures.gas.state(700.0, PRESSURE, fractions)
    hot = burn(mixtures, 1.0)[0].state
    for guess in (cold, hot):
        guessed, _ = burn(mixtures, equivalence_ratio, 2e-3, guess=guess)
        assert guessed.status == plain.status
        assert guessed.state.temperature == pytest.approx(plain.state.temperature, abs=1e-3)


def test_elements_and_enthalpy_are_kept(mixtures):
    result, share = burn(mixtures, 0.9)
    gas = mixtures.gas
    fractions, _ = mixtures.of(0.9)
    before, after = (gas.element_moles(each) for each in (fractions, result.state.mass_fractions))
    present = before > 0.0
    np.testing.assert_allclose(after[present], before[present], rtol=1e-10)
    enthalpy = gas.enthalpy(result.state.temperature, PRESSURE, result.state.mass_fractions)
    assert abs(enthalpy - result.state.enthalpy) < 1e-8 * share * 50e6


def test_heat_loss_cools_by_its_heat_capacity(mixtures):
    adiabatic, _ = burn(mixtures, 0.6)
    cooled, _ = burn(mixtures, 0.6, heat_loss=20e3)
    capacity = mixtures.gas.heat_capacity(
        adiabatic.state.temperature, PRESSURE, adiabatic.state.mass_fractions
    )
    drop = adiabatic.state.temperature - cooled.state.temperature
    assert drop == pytest.approx(20e3 / capacity, rel=0.1)


def test_a_very_long_residence_time_is_equilibrium(mixtures):
    result, _ = burn(mixtures, 0.8, 100.0)
    gas = mixtures.gas
    fractions, _ = mixtures.of(0.8)
    state = gas.equilibrium(result.state.enthalpy, PRESSURE, fractions)
    assert result.state.temperature == pytest.approx(state.temperature, abs=0.1)


@pytest.mark.parametrize(
    "size",
    [
        {},
        {"residence_time": 1e-3, "volume": 1.0, "mass_flow": 1.0},
        {"volume": 1.0},
        {"mass_flow": 1.0},
        {"residence_time": 0.0},
        {"residence_time": float("nan")},
        {"volume": -1.0, "mass_flow": 1.0},
    ],
)
def test_a_size_that_cannot_be_is_refused(mixtures, size):
    fractions, _ = mixtures.of(0.5)
    with pytest.raises(InputError, match=r"residence|volume|size"):
        stirred(mixtures.gas, PRESSURE, 0.0, fractions, **size)
