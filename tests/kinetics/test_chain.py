"""The chain: limits, balances, directions, and how little depends on how it was started."""

from __future__ import annotations

from dataclasses import replace

import cantera as ct
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from combustor.base.errors import InputError
from combustor.kinetics.chain import Cell, burn
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.stirred import stirred
from combustor.kinetics.streams import Stream

NATURAL_GAS = {"CH4": 0.92, "C2H6": 0.05, "C3H8": 0.01, "N2": 0.015, "CO2": 0.005}
NATURAL_GAS_RATIO = 0.0608  # stoichiometric, kg fuel per kg dry air
CHAIN = settings(max_examples=6, derandomize=True, deadline=None)


def front(
    gas,
    equivalence_ratio=0.95,
    inlet=600.0,
    pressure=10e5,
    unmixedness=0.4,
    recirculation=1.0,
    streams=9,
    residence_time=1.3e-3,
    fuel_fractions=None,
    ratio=NATURAL_GAS_RATIO,
):
    """Return a primary zone of about the wanted residence time, natural gas in dry air."""
    fuel = gas.from_mole_fractions(NATURAL_GAS) if fuel_fractions is None else fuel_fractions
    air = gas.air(humidity=0.0)
    air_flow = 0.3
    fuel_flow = equivalence_ratio * ratio * air_flow
    mixture = (fuel_flow * fuel + air_flow * air) / (fuel_flow + air_flow)
    enthalpy = gas.enthalpy(inlet, pressure, mixture)
    hot = gas.equilibrium(enthalpy, pressure, mixture)
    density = gas.density(hot.temperature, pressure, hot.mass_fractions)
    return PrimaryZone(
        fuel=Stream(fuel_flow, gas.enthalpy(inlet, pressure, fuel), fuel),
        air=Stream(air_flow, gas.enthalpy(inlet, pressure, air), air),
        volume=residence_time * (fuel_flow + air_flow) / density,
        unmixedness=unmixedness,
        recirculation=recirculation,
        streams=streams,
        end=0.06,
    )


def tail(gas, primary, inlet=600.0, pressure=10e5, cells=6, mixing=1000.0, dilution=0.5):
    """Return downstream cells with side air, each a third of the primary zone."""
    air = gas.air(humidity=0.0)
    side = Stream(dilution / cells, gas.enthalpy(inlet, pressure, air), air)
    return [
        Cell(
            name="secondary" if place < cells // 2 else "dilution",
            volume=primary.volume / 3.0,
            start=0.06 + 0.02 * place,
            end=0.08 + 0.02 * place,
            air=(side,),
            mixing=mixing,
        )
        for place in range(cells)
    ]


def nox_of(mixtures, primary, chain):
    """Return kg NOx as NO2 per kg fuel at the chain's exit."""
    flow = chain.mass_flows[-1]
    return mixtures.nox(chain.exit.mass_fractions) * flow / primary.fuel.mass_flow


def burnt(gas, mixtures, primary, cells=(), pressure=10e5):
    chain = burn(gas, pressure, primary, cells)
    assert chain.status == "burning"
    assert chain.convergence.converged
    return nox_of(mixtures, primary, chain)


# -- limits ----------------------------------------------------------------------------------


def test_one_stream_without_recirculation_is_a_stirred_reactor(gas):
    primary = front(gas, unmixedness=0.0, recirculation=0.0)
    chain = burn(gas, 10e5, primary, ())
    fuel, air = primary.fuel, primary.air
    flow = fuel.mass_flow + air.mass_flow
    alone = stirred(
        gas,
        10e5,
        (fuel.mass_flow * fuel.enthalpy + air.mass_flow * air.enthalpy) / flow,
        (fuel.mass_flow * fuel.mass_fractions + air.mass_flow * air.mass_fractions) / flow,
        volume=primary.volume,
        mass_flow=flow,
    )
    assert chain.temperatures[0] == pytest.approx(alone.state.temperature, abs=1e-6)
    assert chain.residence_times[0] == pytest.approx(alone.residence_time, rel=1e-9)
    np.testing.assert_allclose(
        chain.mass_fractions[0], alone.state.mass_fractions, rtol=1e-6, atol=1e-15
    )


@pytest.mark.parametrize("recirculation", [0.5, 3.0])
def test_recirculation_changes_nothing_where_all_is_mixed(gas, recirculation):
    plain = burn(gas, 10e5, front(gas, unmixedness=0.0, recirculation=0.0), ())
    fed = burn(gas, 10e5, front(gas, unmixedness=0.0, recirculation=recirculation), ())
    assert fed.temperatures[0] == pytest.approx(plain.temperatures[0], abs=1e-5)
    assert fed.residence_times[0] == pytest.approx(plain.residence_times[0], rel=1e-8)
    np.testing.assert_allclose(fed.mass_fractions, plain.mass_fractions, rtol=1e-6, atol=1e-14)


def test_unmixed_streams_without_recirculation_are_stirred_reactors_of_equal_time(gas):
    primary = front(gas, unmixedness=0.2, recirculation=0.0, streams=5)
    chain = burn(gas, 10e5, primary, ())
    state = chain.states[0]
    share = chain.distribution.mixture_fractions
    for place in (0, 2, 4):
        fractions = (
            share[place] * primary.fuel.mass_fractions
            + (1.0 - share[place]) * primary.air.mass_fractions
        )
        enthalpy = (
            share[place] * primary.fuel.enthalpy + (1.0 - share[place]) * primary.air.enthalpy
        )
        alone = stirred(gas, 10e5, enthalpy, fractions, chain.residence_times[0])
        assert state.temperatures[place] == pytest.approx(alone.state.temperature, abs=1e-4)
    specific = chain.distribution.shares @ [
        1.0 / gas.density(float(t), 10e5, n * gas.rates.molar_masses)
        for t, n in zip(state.temperatures, state.moles, strict=True)
    ]
    flow = primary.fuel.mass_flow + primary.air.mass_flow
    assert chain.residence_times[0] == pytest.approx(primary.volume / flow / specific, rel=1e-9)


def test_boundless_recirculation_is_one_stirred_reactor(gas):
    mixed = burn(gas, 10e5, front(gas, unmixedness=0.0), ())
    stirred_up = burn(gas, 10e5, front(gas, unmixedness=0.3, recirculation=3000.0), ())
    assert stirred_up.temperatures[0] == pytest.approx(mixed.temperatures[0], abs=0.5)
    spread = np.ptp(stirred_up.stations[0].stream_temperatures)
    assert spread < 5.0


def test_exchange_of_the_streams_is_the_exact_exponential(gas):
    primary = front(gas, unmixedness=0.2, streams=3)
    cold = Cell("still", 1e-9, 0.06, 0.07, (), 1e9)
    frozen = burn(gas, 10e5, primary, [replace(cold, mixing=0.0), replace(cold, mixing=1e7)])
    before = frozen.states[1].moles
    after = frozen.states[2].moles
    mean = frozen.stations[1].stream_shares @ before
    nitrogen = gas.index("N2")
    left = (after - mean)[:, nitrogen] / (before - mean)[:, nitrogen]
    expected = np.exp(-1e7 / frozen.states[2].rate)
    np.testing.assert_allclose(left, expected, rtol=1e-4)
    fast = burn(gas, 10e5, primary, [replace(cold, volume=1e-5, mixing=1e9)])
    assert np.ptp(fast.stations[1].stream_temperatures) < 1e-6


def test_many_small_cells_are_a_plug_flow_reactor(gas):
    primary = front(gas, equivalence_ratio=0.6, unmixedness=0.0, residence_time=1e-3)
    volume = 1.5 * primary.volume
    count = 60
    cells = [Cell("plug", volume / count, 0.0, 0.0)] * count
    chain = burn(gas, 10e5, primary, cells)
    solution = ct.Solution("gri30.yaml", transport_model=None)
    solution.TPY = chain.temperatures[0], 10e5, chain.mass_fractions[0]
    reactor = ct.IdealGasConstPressureReactor(solution, clone=True)
    ct.ReactorNet([reactor]).advance(float(chain.residence_times[1:].sum()))
    assert chain.temperatures[-1] == pytest.approx(reactor.phase.T, abs=1.0)
    carbon_monoxide = gas.index("CO")
    assert chain.mass_fractions[-1, carbon_monoxide] == pytest.approx(
        reactor.phase.Y[carbon_monoxide], rel=0.02
    )


def test_heat_lost_in_each_cell_leaves_the_exit(gas):
    primary = front(gas)
    cells = tail(gas, primary)
    losses = [4e3, *([1e3] * len(cells))]
    warm = burn(gas, 10e5, primary, cells)
    cooled = burn(gas, 10e5, primary, cells, heat_losses=losses)
    flow = warm.mass_flows[-1]
    drop = (warm.exit.enthalpy - cooled.exit.enthalpy) * flow
    assert drop == pytest.approx(sum(losses), rel=1e-8)
    assert cooled.balances.enthalpy < 1e-8
    assert np.all(cooled.temperatures < warm.temperatures)


# -- balances and starts ---------------------------------------------------------------------


@given(
    equivalence_ratio=st.floats(0.5, 1.4),
    unmixedness=st.floats(0.0, 0.6),
    recirculation=st.floats(0.2, 2.0),
    bars=st.floats(3.0, 30.0),
)
@CHAIN
def test_elements_and_enthalpy_close(gas, equivalence_ratio, unmixedness, recirculation, bars):
    pressure = bars * 1e5
    primary = front(
        gas,
        equivalence_ratio,
        650.0,
        pressure,
        unmixedness,
        recirculation,
        streams=5,
        residence_time=2.5e-3,
    )
    chain = burn(gas, pressure, primary, tail(gas, primary, 650.0, pressure))
    assert chain.status == "burning"
    assert chain.balances.elements < 1e-10
    assert chain.balances.enthalpy < 1e-8
    assert chain.unmixedness == pytest.approx(unmixedness, rel=1e-9)


def test_elements_close_where_trace_species_dip_on_the_way(gas):
    """A rich, hot, unmixed syngas: its iterates leave the positive orthant and must come back."""
    syngas = gas.from_mole_fractions({"H2": 0.4, "CO": 0.4, "N2": 0.2})
    primary = front(
        gas,
        3.46,
        913.0,
        1.26e5,
        unmixedness=0.58,
        recirculation=0.5,
        residence_time=4e-4,
        fuel_fractions=syngas,
        ratio=0.2,
    )
    chain = burn(gas, 1.26e5, primary, tail(gas, primary, 913.0, 1.26e5))
    assert chain.status == "burning"
    assert chain.balances.elements < 1e-11


@pytest.mark.parametrize("inlet", [600.0, 450.0])
def test_a_warm_start_changes_nothing(gas, inlet):
    primary = front(gas, 0.7, inlet)
    cells = tail(gas, primary, inlet)
    cold = burn(gas, 10e5, primary, cells)
    hotter = burn(gas, 10e5, front(gas, 0.8, inlet + 15.0), tail(gas, primary, inlet))
    warm = burn(gas, 10e5, primary, cells, warm=hotter)
    assert warm.status == cold.status == "burning"
    np.testing.assert_allclose(warm.temperatures, cold.temperatures, atol=1e-4)
    np.testing.assert_allclose(warm.mass_fractions, cold.mass_fractions, rtol=1e-5, atol=1e-12)
    again = burn(gas, 10e5, primary, cells, warm=cold)
    assert again.convergence.iterations <= 3 * len(again.stations)


def test_a_warm_start_from_a_dead_zone_does_not_keep_it_dead(gas):
    dead = burn(gas, 4e5, front(gas, 0.2, 450.0, 4e5), ())
    assert dead.status == "blown_out"
    primary = front(gas, 0.9, 450.0, 4e5)
    cold = burn(gas, 4e5, primary, ())
    warm = burn(gas, 4e5, primary, (), warm=dead)
    assert warm.status == cold.status == "burning"
    assert warm.temperatures[0] == pytest.approx(cold.temperatures[0], abs=1e-3)


def test_a_zone_that_cannot_burn_is_blown_out_and_says_nothing_further(gas):
    primary = front(gas, 0.25, 450.0, 4e5)
    chain = burn(gas, 4e5, primary, tail(gas, primary, 450.0, 4e5))
    assert chain.status == "blown_out"
    assert chain.convergence.converged
    assert chain.exit is None
    assert chain.balances is None
    assert len(chain.stations) == 1


def test_a_burning_zone_may_hold_cold_streams(gas):
    primary = front(gas, 0.6, 450.0, 4e5, unmixedness=0.6)
    chain = burn(gas, 4e5, primary, tail(gas, primary, 450.0, 4e5))
    assert chain.status == "burning"
    assert not chain.stations[0].burning.all()
    assert chain.balances.elements < 1e-10


def test_a_recirculation_over_two_cells_closes(gas):
    primary = front(gas, unmixedness=0.0, recirculation=0.0)
    cells = tail(gas, primary)
    drawn = [replace(cells[0], returned=0.2), *cells[1:]]
    chain = burn(gas, 10e5, primary, drawn)
    assert chain.status == "burning"
    assert chain.balances.elements < 1e-10
    assert chain.balances.enthalpy < 1e-8
    assert chain.mass_flows[0] == pytest.approx(
        primary.fuel.mass_flow + primary.air.mass_flow + 0.2
    )
    assert chain.temperatures[0] < burn(gas, 10e5, primary, cells).temperatures[0]
    warm = burn(gas, 10e5, primary, drawn, warm=chain)
    np.testing.assert_allclose(warm.temperatures, chain.temperatures, atol=1e-3)
    assert warm.convergence.iterations < chain.convergence.iterations


# -- outside check and directions ------------------------------------------------------------


@pytest.mark.parametrize("atmospheres", [1.0, 5.0, 30.0])
@pytest.mark.parametrize("residence_time", [10e-3, 20e-3])
def test_lean_premixed_methane_gives_few_ppm(gas, mixtures, atmospheres, residence_time):
    """Lean premixed flames near 1850 K are known for 4 to 13 ppm from 1 to 30 atm (memory)."""
    pressure = atmospheres * 101325.0
    methane = mixtures.methane

    def short_of_flame(equivalence_ratio):
        fractions, _ = mixtures.of(equivalence_ratio)
        enthalpy = gas.enthalpy(700.0, pressure, fractions)
        return gas.equilibrium(enthalpy, pressure, fractions).temperature - 1850.0

    equivalence_ratio = brentq(short_of_flame, 0.4, 0.7, xtol=1e-4)
    primary = front(
        gas,
        equivalence_ratio,
        700.0,
        pressure,
        unmixedness=0.0,
        residence_time=0.2 * residence_time,
        fuel_fractions=methane,
        ratio=mixtures.stoichiometric,
    )
    cells = [Cell("burnout", 0.5 * primary.volume, 0.0, 0.0)] * 8
    chain = burn(gas, pressure, primary, cells)
    ppm = mixtures.dry_15(chain.exit.mass_fractions, ("NO", "NO2"))
    assert 4.0 < ppm < 13.0
    assert chain.residence_times.sum() == pytest.approx(residence_time, rel=0.03)


@pytest.mark.parametrize(
    ("inlet", "pressure", "equivalence_ratio"),
    [(600.0, 10e5, 0.95), (700.0, 20e5, 0.5), (480.0, 4e5, 0.7)],
)
@pytest.mark.parametrize("unmixedness", [0.1, 0.3, 0.6])
def test_twice_the_streams_change_little(
    gas, mixtures, inlet, pressure, equivalence_ratio, unmixedness
):
    answers = []
    for streams in (9, 18):
        primary = front(gas, equivalence_ratio, inlet, pressure, unmixedness, streams=streams)
        chain = burn(gas, pressure, primary, tail(gas, primary, inlet, pressure))
        fractions = chain.exit.mass_fractions
        answers.append((mixtures.nox(fractions), mixtures.co(fractions)))
    assert answers[1] == pytest.approx(answers[0], rel=0.05)


@given(equivalence_ratio=st.floats(0.9, 1.0), inlet=st.floats(600.0, 800.0))
@CHAIN
def test_hotter_air_raises_nox_by_the_flame_temperature(gas, mixtures, equivalence_ratio, inlet):
    """At fixed composition 0.5 to 0.8 % per kelvin of flame temperature."""

    def at(temperature):
        primary = front(gas, equivalence_ratio, temperature, unmixedness=0.2)
        flame = front(gas, equivalence_ratio, temperature, unmixedness=0.0)
        chain = burn(gas, 10e5, flame, ())
        return burnt(gas, mixtures, primary), chain.temperatures[0]

    (low, cool), (high, hot) = at(inlet - 20.0), at(inlet + 20.0)
    assert 0.005 < np.log(high / low) / (hot - cool) < 0.008


@given(equivalence_ratio=st.floats(0.9, 1.0))
@CHAIN
def test_pressure_raises_nox(gas, mixtures, equivalence_ratio):
    values = []
    for pressure in (1e5, 5e5, 30e5):
        primary = front(gas, equivalence_ratio, 700.0, pressure, 0.2, residence_time=3e-3)
        values.append(burnt(gas, mixtures, primary, pressure=pressure))
    assert values == sorted(values)
    assert values[-1] > 1.2 * values[0]


@given(width=st.floats(0.05, 0.4), recirculation=st.floats(0.0, 1.5))
@CHAIN
def test_unmixedness_lowers_nox_near_stoichiometric_and_raises_it_lean(
    gas, mixtures, width, recirculation
):
    for equivalence_ratio, sign in ((0.9, -1.0), (0.55, 1.0)):
        values = []
        for unmixedness in (width, 1.25 * width):
            primary = front(
                gas,
                equivalence_ratio,
                700.0,
                unmixedness=unmixedness,
                recirculation=recirculation,
                residence_time=4e-3,
            )
            values.append(burnt(gas, mixtures, primary))
        assert sign * (values[1] - values[0]) > 0.0


@given(equivalence_ratio=st.floats(0.5, 0.9), milliseconds=st.floats(1.0, 10.0))
@CHAIN
def test_longer_residence_raises_nox_below_equilibrium(
    gas, mixtures, equivalence_ratio, milliseconds
):
    short, long = (
        burnt(
            gas,
            mixtures,
            front(
                gas,
                equivalence_ratio,
                700.0,
                unmixedness=0.2,
                residence_time=factor * milliseconds * 1e-3,
            ),
        )
        for factor in (1.0, 1.5)
    )
    assert long > short


# -- bad input -------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("change", "word"),
    [
        ({"volume": 0.0}, "volume"),
        ({"volume": float("nan")}, "volume"),
        ({"unmixedness": -0.1}, "unmixedness"),
        ({"recirculation": -1.0}, "recirculation"),
        ({"streams": 1}, "streams"),
    ],
)
def test_a_primary_zone_that_cannot_be_is_refused(gas, change, word):
    with pytest.raises(InputError, match=word):
        burn(gas, 10e5, replace(front(gas), **change), ())


def test_no_fuel_no_air_and_missing_heat_losses_are_refused(gas):
    primary = front(gas)
    none = Stream(0.0, 0.0, primary.fuel.mass_fractions)
    with pytest.raises(InputError, match="fuel flow"):
        burn(gas, 10e5, replace(primary, fuel=none), ())
    with pytest.raises(InputError, match="primary air"):
        burn(gas, 10e5, replace(primary, air=none), ())
    with pytest.raises(InputError, match="heat_losses"):
        burn(gas, 10e5, primary, tail(gas, primary), heat_losses=[0.0])
