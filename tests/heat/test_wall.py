"""The march: limits, balances, coating, grid, trends and what it refuses or notes."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.base.errors import InputError
from combustor.heat.conduction import coating_resistance, sheet_resistance
from combustor.heat.curtain import blowing_ratio
from combustor.heat.methods import METHODS
from combustor.heat.sides import Casing, Film, Radiation

PROPERTY = settings(max_examples=40, derandomize=True, deadline=None)
CASINGS = {"at air": None, "insulated": Casing(0.0), "losing": Casing(25.0, 300.0)}


def cooled(bench) -> tuple[Film, ...]:
    """Slots of every regime, the last ones over the slack of the first."""
    pairs = [(2.3, 0.0), (0.9, 0.03), (0.4, 0.055), (1.3, 0.08)]
    return tuple(bench.film(m, x, f"slot {i}") for i, (m, x) in enumerate(pairs))


def varied(bench) -> None:
    """Let gas and air change along the wall as in a liner, on clean gas."""
    x = np.linspace(0.0, 0.30, 31)
    bench.radiation = Radiation("grey-gas")
    bench.change(
        "gas",
        station=x,
        temperature=1500.0 + 700.0 * np.sin(np.pi * x / 0.45),
        mass_flow=np.linspace(60.0, 209.0, 31),
        area=np.ones(31),
        hydraulic_diameter=np.full(31, 0.0731),
        fuel_air_ratio=np.full(31, 0.03),
        x_h2o=np.linspace(0.18, 0.09, 31),
        x_co2=np.linspace(0.09, 0.045, 31),
        viscosity=None,
        conductivity=None,
        recirculation_end=0.11,
    )
    bench.change(
        "air",
        station=x,
        mass_flow=np.linspace(370.0, 90.0, 31),
        temperature=np.linspace(750.0, 765.0, 31),
        area=np.ones(31),
        hydraulic_diameter=np.full(31, 0.01565),
        viscosity=None,
        conductivity=None,
    )


@pytest.mark.parametrize("casing", CASINGS.values(), ids=CASINGS.keys())
def test_every_station_closes(bench, casing):
    varied(bench)
    result = bench.march(cooled(bench), casing=casing)
    into = result.radiation_in + result.convection_in
    out = result.radiation_out + result.convection_out
    assert result.convergence.converged
    assert np.abs(into - out).max() <= 1e-9 * np.abs(into).max()
    assert np.abs(into / out - 1.0).max() < 1e-3
    drop = result.temperature - result.cold_side_temperature
    assert result.conduction == pytest.approx(26.0 / 1.2e-3 * drop, rel=1e-6)


@pytest.mark.parametrize("casing", CASINGS.values(), ids=CASINGS.keys())
def test_wall_flux_is_annulus_pick_up_plus_casing_loss(bench, casing):
    varied(bench)
    result = bench.march(cooled(bench), casing=casing, cans=6)
    out = result.total(result.annulus_pick_up) + result.total(result.casing_loss)
    assert result.total(result.heat_from_gas) == pytest.approx(out, rel=1e-9)
    losing = casing is not None and casing.loss_coefficient
    assert (result.total(result.casing_loss) > 0.0) is bool(losing)


def test_rates_are_flux_times_perimeter_of_all_cans(bench):
    one, six = bench.march(), bench.march(cans=6)
    flux = one.radiation_in + one.convection_in
    assert one.heat_from_gas == pytest.approx(1.6 * flux)
    assert six.annulus_pick_up == pytest.approx(6.0 * one.annulus_pick_up)
    assert one.total(np.ones_like(one.station)) == pytest.approx(0.1)


def test_no_cooling_air_gives_the_unfilmed_wall(bench):
    trickle = replace(bench.film(1e-8), name="trickle")
    bare, filmed = bench.march(), bench.march((trickle,))
    # At the very mouth even a trickle is pure coolant.
    apart = filmed.station > 1e-3
    unfilmed = np.interp(filmed.station, bare.station, bare.temperature)
    assert filmed.temperature[apart] == pytest.approx(unfilmed[apart], abs=0.01)
    assert set(bare.regime) == {"no film"}
    assert bare.adiabatic_wall_temperature == pytest.approx(bare.gas_temperature)


def test_full_film_without_radiation_gives_the_coolant_temperature(bench):
    bench.radiation = Radiation("luminous", luminosity=0.0)
    result = bench.march((bench.film(2.3),))
    full = np.array(result.regime) == "potential core"
    assert full.sum() >= 2
    assert result.temperature[full] == pytest.approx(750.0, abs=1e-6)


def test_equal_temperatures_leave_nothing_to_pass(bench):
    bench.change("gas", temperature=np.full(2, 750.0))
    result = bench.march()
    assert result.temperature == pytest.approx(750.0)
    assert result.total(result.heat_from_gas) == pytest.approx(0.0, abs=1.0)
    assert result.convergence.converged


def test_still_annulus_air_cools_by_radiation_alone(bench):
    bench.change("air", mass_flow=np.zeros(2))
    result = bench.march()
    assert result.convergence.converged
    assert result.convection_out == pytest.approx(0.0)
    assert 1288.0 < result.peak.temperature < 2000.0


def test_reverse_flow_in_the_annulus_cools_like_forward_flow(bench):
    forward = bench.march()
    bench.change("air", mass_flow=np.full(2, -370.0))
    assert bench.march().temperature == pytest.approx(forward.temperature)


def test_slots_superpose_on_what_the_ones_before_left(bench):
    result = bench.march(cooled(bench))
    together = 1.0 - np.prod(1.0 - result.slot_effectiveness, axis=0)
    assert result.film_effectiveness == pytest.approx(together)
    seen = 2000.0 - together * 1250.0
    assert result.adiabatic_wall_temperature == pytest.approx(seen)


def test_slots_may_be_given_in_any_order(bench):
    films = cooled(bench)
    assert bench.march(films[::-1]).temperature == pytest.approx(bench.march(films).temperature)


def test_film_flow_and_entrainment_give_the_mean_entrainment(bench):
    result = bench.march((bench.film(2.311),), stations=4000)
    upto = result.station <= 0.040
    entrained = (result.entrainment[0] * result.length)[upto].sum()
    # 0.5 kg/s of film, effectiveness 0.7235 at 40 mm: 0.0143 per slot height over 26.67.
    assert entrained == pytest.approx(0.5 * 0.0143 * 26.67, rel=0.01)


def test_drops_at_half_a_megawatt(bench):
    """By hand: 150 K over 0.3 mm of coating at 1 W/m/K, 23 K over 1.2 mm of sheet at 26."""
    bench.change("wall", coating_thickness=0.3e-3, coating_conductivity=1.0)
    assert 500e3 * coating_resistance(bench.wall) == pytest.approx(150.0)
    assert 500e3 * sheet_resistance(bench.wall) == pytest.approx(23.0, abs=0.5)


def test_coating_carries_its_drop_and_spares_the_metal(bench):
    bare = bench.march()
    bench.change("wall", coating_thickness=0.3e-3, coating_conductivity=1.0)
    coated = bench.march()
    drop = coated.surface_temperature - coated.temperature
    assert drop == pytest.approx(coated.conduction * 0.3e-3)
    assert np.all(coated.temperature < bare.temperature - 30.0)
    assert np.all(coated.surface_temperature > bare.temperature)
    assert bare.surface_temperature == pytest.approx(bare.temperature)


def test_an_insulated_casing_makes_the_wall_warmer_and_a_losing_one_colder(bench):
    bench.change("air", mass_flow=np.full(2, 40.0))
    at_air, insulated = bench.march(), bench.march(casing=Casing(0.0))
    losing = bench.march(casing=Casing(400.0, 288.0))
    assert insulated.peak.temperature > at_air.peak.temperature
    assert losing.peak.temperature < insulated.peak.temperature
    assert np.all(insulated.casing_temperature > 750.0)


def test_a_losing_casing_under_a_cool_wall_takes_heat_from_the_air(bench):
    bench.change("gas", temperature=np.full(2, 780.0))
    result = bench.march(casing=Casing(400.0, 288.0))
    assert np.all(result.casing_temperature < 750.0)
    assert result.total(result.annulus_pick_up) < 0.0 < result.total(result.casing_loss)


def test_recirculating_gas_convects_less(bench):
    bench.change("gas", recirculation_end=0.05)
    result = bench.march()
    inside = result.station < 0.05
    ratio = result.gas_coefficient[inside][0] / result.gas_coefficient[~inside][0]
    assert ratio == pytest.approx(0.017 / 0.020)


def test_doubling_the_stations_moves_the_peak_by_less_than_5_kelvin(bench):
    varied(bench)
    films = cooled(bench)
    coarse, fine = bench.march(films, stations=60), bench.march(films, stations=120)
    assert coarse.station.size >= 60
    assert abs(coarse.peak.temperature - fine.peak.temperature) < 5.0
    assert coarse.total(coarse.heat_from_gas) == pytest.approx(
        fine.total(fine.heat_from_gas), rel=0.01
    )


def test_peak_is_found_just_before_a_slot(bench):
    result = bench.march((bench.film(0.9, 0.0, "first"), bench.film(0.9, 0.05, "second")))
    before = int(np.argmax(result.station >= 0.05)) - 1
    assert result.station[before] == pytest.approx(0.05)
    assert result.temperature[before + 1] < result.temperature[before]
    assert np.all(np.diff(result.station) > 0.0)


def test_a_step_in_annulus_flow_is_a_step_in_the_wall(bench):
    """Values given twice at one station: either side equals the uniform wall, at any grid."""
    fast = bench.march()
    bench.change("air", mass_flow=np.full(2, 100.0))
    slow = bench.march()
    four = {"temperature": np.full(4, 750.0), "area": np.ones(4)}
    four |= {"hydraulic_diameter": np.full(4, 0.01565), "viscosity": np.full(4, 3.56e-5)}
    bench.change("air", conductivity=np.full(4, 0.0548), **four)
    bench.change("air", station=np.array([0.0, 0.043, 0.043, 0.1]))
    bench.change("air", mass_flow=np.array([370.0, 370.0, 100.0, 100.0]))
    for stations in (7, 60):
        result = bench.march(stations=stations)
        before = result.station < 0.043
        assert result.temperature[before] == pytest.approx(fast.temperature[0], abs=0.01)
        assert result.temperature[~before] == pytest.approx(slow.temperature[0], abs=0.01)
        total = 0.43 * fast.total(fast.heat_from_gas) + 0.57 * slow.total(slow.heat_from_gas)
        assert result.total(result.heat_from_gas) == pytest.approx(total, rel=1e-6)


def test_blowing_ratio_is_on_the_gas_before_the_slot_feeds_it(bench):
    four = np.ones(4)
    bench.change("gas", station=np.array([0.0, 0.02, 0.02, 0.1]), temperature=2000.0 * four)
    bench.change("gas", mass_flow=np.array([100.0, 100.0, 209.0, 209.0]), area=four)
    assert blowing_ratio(bench.film(1.0, 0.02), bench.gas) == pytest.approx(2.09)
    assert blowing_ratio(bench.film(1.0, 0.05), bench.gas) == pytest.approx(1.0)


def test_films_off_the_wall(bench):
    beyond = bench.march((bench.film(1.0, 0.2),))
    assert beyond.temperature == pytest.approx(bench.march().temperature)
    upstream = bench.march((bench.film(1.0, -0.02),))
    assert np.all(upstream.film_effectiveness > 0.0)


def test_the_longer_path_of_the_outer_wall_radiates_more(bench):
    short = bench.march()
    bench.change("wall", beam_length=1.2 * 0.03655)
    assert np.all(bench.march().radiation_in > short.radiation_in)


def test_hydrogen_radiates_by_water_alone_on_the_grey_gas_road(bench):
    bench.radiation = Radiation("grey-gas")
    both = bench.march()
    bench.change("gas", x_co2=np.zeros(2))
    water = bench.march()
    assert np.all(water.gas_emissivity < both.gas_emissivity)
    assert np.all(water.gas_emissivity > 0.0)


@given(low=st.floats(1000.0, 2200.0), rise=st.floats(20.0, 300.0))
@PROPERTY
def test_wall_warms_with_the_gas_and_stays_between(new_bench, low, rise):
    bench = new_bench()
    bench.radiation = Radiation("luminous", luminosity=1.0)
    films = cooled(bench)
    bench.change("gas", temperature=np.full(2, low))
    cold = bench.march(films)
    bench.change("gas", temperature=np.full(2, low + rise))
    hot = bench.march(films)
    assert np.all(hot.temperature > cold.temperature)
    for result in (cold, hot):
        assert np.all(result.temperature >= 750.0)
        assert np.all(result.temperature < result.gas_temperature)


@given(flow=st.floats(5.0, 600.0), factor=st.floats(1.05, 3.0))
@PROPERTY
def test_wall_cools_with_annulus_flow(new_bench, flow, factor):
    bench = new_bench()
    bench.change("air", mass_flow=np.full(2, flow))
    slow = bench.march()
    bench.change("air", mass_flow=np.full(2, factor * flow))
    assert np.all(bench.march().temperature < slow.temperature)


@given(
    gas=st.floats(400.0, 2700.0),
    air=st.floats(260.0, 950.0),
    flux=st.floats(1.0, 600.0),
    pressure=st.floats(5e4, 5e6),
    coating=st.floats(0.0, 1e-3),
    loss=st.sampled_from([None, 0.0, 30.0, 500.0]),
)
@PROPERTY
def test_always_closes(new_bench, gas, air, flux, pressure, coating, loss):
    bench = new_bench()
    bench.radiation = Radiation("grey-gas")
    bench.change("gas", temperature=np.full(2, gas), pressure=pressure)
    bench.change("gas", viscosity=None, conductivity=None)
    bench.change("air", temperature=np.full(2, air), mass_flow=np.full(2, flux))
    bench.change("wall", coating_thickness=coating)
    result = bench.march((bench.film(1.0),), casing=Casing(loss))
    assert result.convergence.converged, result.convergence
    low, high = min(gas, air, 288.15, 750.0), max(gas, air, 750.0)
    assert np.all((result.temperature >= low - 1e-6) & (result.temperature <= high + 1e-6))


def test_uses_outside_validity_are_noted_once_with_their_place(bench):
    bench.radiation = Radiation("grey-gas")
    bench.change("gas", temperature=np.array([2500.0, 2000.0]), viscosity=None)
    thick_lip = replace(bench.film(5.0, 0.0, "strong"), lip_thickness=3e-3)
    result = bench.march((thick_lip, bench.film(0.9, 0.02, "fair")))
    noted = {(notice.method, notice.quantity): notice for notice in result.notices}
    assert len(noted) == len(result.notices)
    assert noted["grey-gas-smith", "temperature"].value == pytest.approx(2500.0)
    assert noted["slot-effectiveness-ballal-lefebvre", "blowing_ratio"].where == "film strong"
    assert noted["slot-effectiveness-ballal-lefebvre", "lip_ratio"].value == pytest.approx(2.0)


def test_water_alone_above_one_atmosphere_is_noted(bench):
    bench.radiation = Radiation("grey-gas")
    bench.change("gas", x_h2o=np.full(2, 0.2), x_co2=np.zeros(2))
    noted = {notice.quantity: notice.value for notice in bench.march().notices}
    assert noted["p_h2o"] == pytest.approx(0.2 * 1.6e6 / 101325.0)


def test_a_march_inside_all_ranges_notes_nothing(bench):
    assert bench.march((bench.film(1.0),)).notices == ()


def test_a_film_beyond_150_slot_heights_decays_faster_and_beyond_1000_is_noted(bench):
    bench.change("gas", station=np.array([0.0, 0.3]))
    near = bench.march((bench.film(1.0),))
    assert near.notices == ()
    at_150, at_200 = np.interp([0.225, 0.3], near.station, near.film_effectiveness)
    assert at_200 / at_150 == pytest.approx((150.0 / 200.0) ** 0.8, rel=2e-3)
    bench.change("gas", station=np.array([0.0, 1.8]))
    notices = bench.march((bench.film(1.0),)).notices
    assert [notice.quantity for notice in notices] == ["slot_heights"]
    assert notices[0].value == pytest.approx(1200.0)


def test_the_methods_used_are_told(bench):
    luminous = {method.key for method in bench.march().methods}
    bench.radiation = Radiation("grey-gas")
    clean = {method.key for method in bench.march(cooled(bench), casing=Casing(5.0)).methods}
    assert "luminous-emissivity-lefebvre" in luminous - clean
    assert {"grey-gas-smith", "film-superposition-sellers", "casing-balance"} <= clean - luminous
    everything = [method.key for method in METHODS]
    assert luminous | clean <= set(everything)
    assert len(everything) == len(set(everything))


def test_impossible_input_is_refused_with_every_problem(bench):
    bench.change("gas", temperature=np.array([2000.0, np.nan]))
    bench.change("air", area=np.array([1.0, 0.0]))
    with pytest.raises(InputError) as caught:
        bench.march((replace(bench.film(1.0, name="ring 2"), slot_height=0.0),))
    text = str(caught.value)
    assert len(caught.value.problems) == 3
    assert "temperature: gas cannot be marched (got nan)" in text
    assert "area: annulus air cannot be marched (got 0.0)" in text
    assert "slot_height: film ring 2 cannot be marched" in text
