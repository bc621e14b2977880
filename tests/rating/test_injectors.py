"""Injectors in the primary zone; a lean premixed tube against a plain reactor network."""

import math
from dataclasses import replace
from types import SimpleNamespace

import cantera as ct
import numpy as np
import pytest

from combustor.airflow.split import split
from combustor.base.errors import InputError
from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Hardware,
    Injector,
    LinerWall,
    Opening,
    Passage,
    Zone,
)
from combustor.rating.fire import chain_pressure, layout_of, light
from combustor.rating.injectors import InjectorAir, fuel_shares, streams_of, width_of
from combustor.rating.operating import operating_of

LENGTH, DIAMETER = 0.9, 0.30


def air_of(name, fuel, air, width=0.0, premixed=False):
    return InjectorAir(name, fuel, air, air, 0.5, 0.5, width, premixed)


def test_streams_keep_all_fuel_and_air():
    injectors = (air_of("pilot", 0.1, 0.6, 0.4), air_of("main", 0.9, 8.0, 0.06, True))
    mixture = streams_of(injectors, 0.28, 0.0, 9)
    assert mixture.shares.sum() == pytest.approx(1.0, abs=1e-14)
    assert mixture.mean == pytest.approx(0.28 / (0.28 + 8.6), rel=1e-12)
    assert np.all(np.diff(mixture.mixture_fractions) >= 0.0)


def test_two_injectors_alike_without_width_are_one_mixture():
    mixture = streams_of((air_of("a", 0.5, 2.0), air_of("b", 0.5, 2.0)), 0.2, 0.0, 9)
    assert mixture.unmixedness < 1e-12


def test_spread_between_injectors_by_hand():
    """A third of the fuel in a half of the air: two streams, no width of their own."""
    mixture = streams_of((air_of("a", 1 / 3, 5.0), air_of("b", 2 / 3, 5.0)), 0.3, 0.0, 9)
    lean, rich = 0.1 / 5.1, 0.2 / 5.2
    assert mixture.mixture_fractions == pytest.approx([lean, rich])
    assert mixture.shares == pytest.approx([5.1 / 10.3, 5.2 / 10.3])


def test_an_injector_without_fuel_is_a_stream_of_air():
    mixture = streams_of((air_of("off", 0.0, 3.0), air_of("on", 1.0, 3.0, 0.1)), 0.2, 0.0, 9)
    assert mixture.mixture_fractions[0] == 0.0
    assert mixture.shares[0] == pytest.approx(3.0 / 6.2)


def test_one_injector_leaves_its_width_to_the_zone():
    settings = SimpleNamespace(unmixedness=0.4)
    one = (air_of("main", 1.0, 8.0, 0.06, True),)
    assert streams_of(one, 0.3, 0.0, 9) is None
    assert width_of(one, settings) == 0.06
    assert width_of((), settings) == 0.4


def test_split_of_the_point_wins_over_the_metal_and_strange_names_are_refused():
    metal = (Injector("pilot", 0.1, ("swirler",)), Injector("main", 0.9, ("premixer",)))
    assert fuel_shares(metal, None, "full") == {"pilot": 0.1, "main": 0.9}
    assert fuel_shares(metal, {"main": 1.0}, "full") == {"pilot": 0.0, "main": 1.0}
    with pytest.raises(InputError, match="no such injector") as caught:
        fuel_shares(metal, {"mian": 1.0}, "full")
    assert "pilot, main" in str(caught.value)


def tube():
    """A tube that takes its air through one premixer."""
    area = math.pi / 4 * DIAMETER**2
    ring = math.pi / 4 * (0.40**2 - 0.304**2)
    premixer = Opening("burner", "premixer", "dome", 0.0, 1, 0.0125, "orifice", "total")
    # keeps the annulus in motion; joins behind the chain
    leak = Opening("seal", "leak", "outer", LENGTH, 1, 2e-4, "orifice", "static")
    return Hardware(
        layout="can",
        cans=1,
        flow="straight",
        reference_area=math.pi / 4 * 0.40**2,
        reference_height=0.40,
        liner_height=DIAMETER,
        liner=Passage("liner", AxialProfile.constant(area), AxialProfile.constant(DIAMETER)),
        liner_length=LENGTH,
        transition_length=0.0,
        exit_area=0.05,
        annuli=(Passage("outer", AxialProfile.constant(ring), AxialProfile.constant(0.096)),),
        walls=(
            LinerWall(
                "outer", AxialProfile.constant(math.pi * DIAMETER), 0.18, 1e-3, 26.0, 0.8, 0.7, 0.8
            ),
        ),
        diffuser=Diffuser("dump", 0.03, 0.05, 0.1, 0.4),
        openings=(replace(premixer, discharge_coefficient=0.8), leak),
        zones=(
            Zone("primary", 0.0, 0.2),
            Zone("secondary", 0.2, 0.5),
            Zone("dilution", 0.5, LENGTH),
        ),
        injectors=(Injector("main", 1.0, ("burner",), premix_length=0.1),),
    )


def test_lean_premixed_tube_is_a_stirred_reactor_and_plug_flow(bench):
    """No unmixedness, no dilution: against a reactor and a marched parcel of plain Cantera."""
    hardware = tube()
    point = bench.point(
        "full", air_flow=12.0, exit_temperature=None, fuel_air_ratio=0.5 * 0.0605, humidity=0.0
    )
    operating = operating_of(bench.case, point, bench.fuel, bench.gas)
    settings = replace(
        bench.settings, unmixedness=0.0, is_unmixedness_stated=True, recirculation=0.0,
        secondary_cells=60, dilution_cells=80,
    )  # fmt: skip
    solved = split(hardware, operating.inlet)
    layout = layout_of(hardware, settings)
    fire = light(
        bench.gas, operating, hardware, layout, solved, operating.fuel_flow, settings, None, None
    )
    assert fire.chain.status == "burning"
    chain, pressure = fire.chain, chain_pressure(solved)
    air = solved.opening("burner").mass_flow
    temperature, nitric, carbon = plain_network(
        bench, operating, air, operating.fuel_flow, pressure
    )
    assert chain.exit.temperature == pytest.approx(temperature, abs=1.0)
    fractions = chain.exit.mass_fractions
    index = bench.gas.index
    assert fractions[index("NO")] == pytest.approx(nitric, rel=0.01)
    assert fractions[index("CO")] == pytest.approx(carbon, rel=0.03)


def plain_network(bench, operating, air, fuel_flow, pressure):
    """Return exit temperature and mass fractions of NO and CO, from Cantera's own reactors."""
    solution = ct.Solution(bench.fuel.mechanism)
    flow = air + fuel_flow
    mixed = (air * operating.air + fuel_flow * operating.fuel) / flow
    heat = (air * operating.air_enthalpy + fuel_flow * operating.fuel_enthalpy) / flow
    area = math.pi / 4 * DIAMETER**2
    solution.Y = mixed
    solution.HP = heat, pressure
    entering = ct.Reservoir(solution, clone=True)
    solution.equilibrate("HP")
    stirred = ct.IdealGasReactor(solution, clone=True)
    stirred.volume = area * 0.2
    leaving = ct.Reservoir(stirred.phase, clone=True)
    inlet = ct.MassFlowController(entering, stirred, mdot=flow)
    ct.PressureController(stirred, leaving, primary=inlet, K=1e-6)
    network = ct.ReactorNet([stirred])
    network.rtol, network.atol = 1e-9, 1e-18
    network.advance(0.5)
    parcel = ct.IdealGasConstPressureReactor(stirred.phase, clone=True)
    march = ct.ReactorNet([parcel])
    march.rtol, march.atol = 1e-9, 1e-18
    travelled = 0.0
    step = 2e-5
    while travelled < LENGTH - 0.2:
        velocity = flow / (parcel.phase.density * area)
        step_now = min(step, (LENGTH - 0.2 - travelled) / velocity)
        march.advance(march.time + step_now)
        travelled += step_now * velocity
        if LENGTH - 0.2 - travelled < 1e-9:
            break
    fractions = parcel.phase["NO", "CO"].Y
    return parcel.phase.T, float(fractions[0]), float(fractions[1])
