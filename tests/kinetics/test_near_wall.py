"""The stream beside the wall: what it takes it has, and its two limits."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.kinetics.chain import Cell, burn
from combustor.kinetics.near_wall import WallExchange, entered, left, parted, together
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.streams import Bundle, Stream

PRESSURE = 5e5
INLET = 500.0
VOLUME = 4e-4


@pytest.fixture(scope="module")
def air(gas):
    fractions = gas.air(humidity=0.0)
    return lambda flow: Stream(flow, gas.enthalpy(INLET, PRESSURE, fractions), fractions)


@pytest.fixture(scope="module")
def primary(gas, air):
    fuel = gas.from_mole_fractions({"CH4": 1.0})
    enthalpy = gas.enthalpy(300.0, PRESSURE, fuel)
    return PrimaryZone(Stream(0.3 * 0.8 * 0.058, enthalpy, fuel), air(0.3), 1e-3, 0.3, 1.0, 5)


def chain(gas, primary, exchanges, side=(), volume=VOLUME):
    cells = [
        Cell("secondary", volume, 0.1 * k, 0.1 * (k + 1), side, 500.0, beside=exchange)
        for k, exchange in enumerate(exchanges)
    ]
    return burn(gas, PRESSURE, primary, cells)


def totals(bundles):
    """Mass, moles of every species and enthalpy carried by some bundles."""
    held = [b for b in bundles if b is not None]
    return np.array(
        [
            sum(b.total_flow for b in held),
            sum(b.total_flow * b.mean_enthalpy for b in held),
            *sum(b.total_flow * b.mean_moles for b in held),
        ]
    )


@settings(derandomize=True, max_examples=60, deadline=None)
@given(
    film=st.floats(0.0, 1.0),
    entrained=st.floats(0.0, 0.6),
    returned=st.floats(0.0, 0.9),
    seed=st.integers(0, 9),
)
def test_nothing_is_lost_between_core_and_wall(gas, air, film, entrained, returned, seed):
    random = np.random.default_rng(seed)
    moles = random.random((4, gas.n_species)) * 1e-3
    core = Bundle(np.full(4, 0.25), moles, random.random(4) * 1e6)
    wall = Bundle(np.array([0.4]), moles[:1] * 0.5, np.array([-2e5]))
    inflow = air(film)
    own = inflow.mass_fractions / gas.rates.molar_masses
    came = totals([core, wall])
    came += inflow.mass_flow * np.array([1.0, inflow.enthalpy, *own])
    exchange = WallExchange((inflow,), entrained)
    after, beside = entered(core, wall, exchange, gas.rates.molar_masses)
    assert totals([after, beside]) == pytest.approx(came, rel=1e-12, abs=1e-12)
    assert beside.total_flow == pytest.approx(0.4 + film + entrained)
    same, apart = parted(together(after, beside), 1)
    assert np.array_equal(same.moles, after.moles) and np.array_equal(apart.moles, beside.moles)
    behind = left(after, beside, returned * beside.total_flow)
    assert totals(behind) == pytest.approx(came, rel=1e-12, abs=1e-12)
    joined, none = entered(core, wall, replace(exchange, joins=True), gas.rates.molar_masses)
    assert none is None
    assert totals([joined]) == pytest.approx(came, rel=1e-12, abs=1e-12)


def test_elements_and_enthalpy_of_a_chain_with_films_close(gas, primary, air):
    exchanges = [
        WallExchange((air(0.05),), 0.03, 0.03),
        WallExchange((), 0.02, 0.02),
        WallExchange((air(0.04),), 0.05, 0.04),
        WallExchange((), joins=True),
    ]
    solved = chain(gas, primary, exchanges, side=(air(0.1),))
    assert solved.status == "burning"
    assert solved.balances.elements < 1e-10
    assert solved.balances.enthalpy < 1e-8
    assert [s.beside is None for s in solved.stations] == [True, False, False, False, True]
    flow = primary.fuel.mass_flow + primary.air.mass_flow + 4 * 0.1 + 0.09
    assert solved.mass_flows[-1] == pytest.approx(flow, rel=1e-12)


def test_a_film_that_never_mixes_leaves_the_core_as_it_was_without_it(gas, primary, air):
    never = chain(gas, primary, [WallExchange((air(0.08),)), WallExchange()])
    # the film takes its room from the core: the core without it gets what is left
    cells = []
    for k, station in enumerate(never.stations[1:]):
        specific = (station.core.mass_flow / station.core.density) + (
            station.beside.mass_flow / station.beside.density
        )
        volume = VOLUME * (station.core.mass_flow / station.core.density) / specific
        cells.append(Cell("secondary", volume, 0.1 * k, 0.1 * (k + 1), (), 500.0))
    alone = burn(gas, PRESSURE, primary, cells)
    for beside, without in zip(never.stations, alone.stations, strict=True):
        assert beside.core.mass_flow == pytest.approx(without.mass_flow, rel=1e-12)
        assert beside.core.temperature == pytest.approx(without.temperature, abs=1e-3)
        for name in ("CO", "NO", "CO2"):
            index = gas.index(name)
            assert beside.core.mass_fractions[index] == pytest.approx(
                without.mass_fractions[index], rel=1e-5
            )
    film = never.stations[-1].beside
    assert film.temperature == pytest.approx(INLET, abs=0.01)
    assert film.mass_fractions[gas.index("CO")] < 1e-20


def test_a_film_that_mixes_at_once_is_side_air(gas, primary, air):
    at_once = chain(gas, primary, [WallExchange((air(0.08),), joins=True), WallExchange()])
    cells = [
        Cell("secondary", VOLUME, 0.0, 0.1, (air(0.08),), 500.0),
        Cell("secondary", VOLUME, 0.1, 0.2, (), 500.0),
    ]
    mixed = burn(gas, PRESSURE, primary, cells)
    assert np.array_equal(at_once.temperatures, mixed.temperatures)
    assert np.array_equal(at_once.mass_fractions, mixed.mass_fractions)


def test_gas_taken_in_is_quenched_beside_a_cold_wall(gas, primary, air):
    cold = chain(gas, primary, [WallExchange((air(0.08),), 0.02, 0.0)] + [WallExchange()] * 3)
    index = gas.index("CO")
    wall = [s.beside.mass_fractions[index] for s in cold.stations[1:]]
    core = [s.core.mass_fractions[index] for s in cold.stations[1:]]
    assert cold.stations[1].beside.temperature < 1000.0
    # beside the wall hardly any of it burns while the core burns nearly all
    assert wall[-1] > 0.9 * wall[0]
    assert core[-1] < 0.7 * core[0]


@pytest.mark.parametrize(
    "exchange",
    [WallExchange((), 0.01), WallExchange((), entrained=-0.1), WallExchange((), 0.0, 0.2)],
    ids=["no film to take gas in", "negative", "more returned than there is"],
)
def test_exchanges_that_cannot_be_are_refused(gas, primary, air, exchange):
    film = WallExchange((air(0.05),)) if exchange.entrained != 0.01 else WallExchange()
    with pytest.raises(InputError):
        chain(gas, primary, [film, exchange])
