"""Fuel switch: requests, shares, limits, verdicts, and a machine on other fuels."""

from dataclasses import replace

import pytest

import combustor
from combustor.base.errors import InputError
from combustor.emissions.dew_point import acid_dew_point_okkes
from combustor.fuel.gas import Gas
from combustor.hardware.from_case import hardware_of
from combustor.rating.operating import operating_of
from combustor.rating.rate import rate_point
from combustor.rating.settings import settings_of
from combustor.report.switch_data import point_records, switch_data, switch_document
from combustor.report.switch_tables import switch_report
from combustor.report.terminal import Page, render
from combustor.studies.switch import switch_fuel
from combustor.studies.switch_fuels import properties_of, read_ladder, shares_of
from combustor.studies.switch_record import Change, Limit
from combustor.studies.switch_rows import open_rows, row_changes, with_diameter
from combustor.studies.switch_sulfur import sulfur_of
from combustor.studies.switch_verdict import verdict_of

GRI = "gri30.yaml"


@pytest.fixture(scope="module")
def short_case(metal_case):
    """Two loads of the demo's metal."""
    points = tuple(p for p in metal_case.points if p.name in ("full", "idle"))
    return metal_case.model_copy(update={"points": points})


@pytest.fixture(scope="module")
def switched(short_case):
    return switch_fuel(short_case, ["hydrogen", "biogas", "ammonia"])


# -- shares and carbon --------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("volume", "heat"), [(10, 3.2), (20, 7.0), (30, 11.4), (50, 23.2), (70, 41.3), (90, 73.1)]
)
def test_carbon_dioxide_cut_by_hydrogen_in_methane(metal_case, volume, heat):
    gas = Gas.load(GRI)
    plain = combustor.find_fuel("methane", GRI)
    blend = combustor.find_fuel(f"methane+{volume}%hydrogen", GRI)
    before, after = (properties_of(metal_case, fuel, gas).carbon_dioxide for fuel in (plain, blend))
    assert 100.0 * (1.0 - after / before) == pytest.approx(heat, abs=0.2)
    (_, hydrogen) = shares_of(blend)
    assert 100.0 * hydrogen.heat == pytest.approx(heat, abs=0.2)
    assert hydrogen.volume == pytest.approx(volume / 100.0)


def test_half_the_carbon_is_gone_at_77_percent_by_volume(metal_case):
    gas = Gas.load(GRI)
    plain = combustor.find_fuel("methane", GRI)
    blend = combustor.find_fuel("methane+77%hydrogen", GRI)
    before, after = (properties_of(metal_case, fuel, gas).carbon_dioxide for fuel in (plain, blend))
    assert after / before == pytest.approx(0.50, abs=0.005)


# -- requests -----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("added", "shares", "said"),
    [
        ("hydrogen", "0:100:0", "ladder of 0 rungs"),
        ("hydrogen", "0:120:4", "outside 0 to 100 %"),
        ("hydrogen", "60:20:4", "falling"),
        ("hydrogen", "0:100", "not understood"),
        ("hydrogen", "a:b:c", "not understood"),
        ("hydrogn", "0:100:11", "no such fuel"),
    ],
)
def test_bad_ladders_are_refused(added, shares, said):
    with pytest.raises(InputError, match=said):
        read_ladder(added, shares)


def test_a_ladder_has_its_ends():
    assert read_ladder("hydrogen", "0:100:5").shares == (0.0, 0.25, 0.5, 0.75, 1.0)
    assert read_ladder("hydrogen", "30:30:1").shares == (0.3,)


@pytest.mark.parametrize(
    ("fuels", "options", "said"),
    [
        (["natural-gas+130%hydrogen"], {}, "0 to 100 %"),
        (["hydrogn", "biogs"], {}, "biogs"),
        ([], {}, "no other fuel"),
        (["hydrogen"], {"hold": "mass"}, "not something to hold"),
        (["hydrogen"], {"injector_ratio": 0.9}, "outside its range"),
    ],
)
def test_bad_requests_are_refused_before_any_work(metal_case, monkeypatch, fuels, options, said):
    monkeypatch.setattr("combustor.studies.switch._Study", None)
    with pytest.raises(InputError, match=said):
        switch_fuel(metal_case, fuels, **options)


def test_a_ladder_needs_a_fuel_with_a_name(metal_case):
    stated = metal_case.fuel.model_copy(update={"name": None, "composition": {"CH4": 1.0}})
    with pytest.raises(InputError, match="by composition"):
        switch_fuel(
            metal_case.model_copy(update={"fuel": stated}),
            ladder=read_ladder("hydrogen", "0:50:2"),
        )


# -- a machine on other fuels -------------------------------------------------------------------


def by_name(switched, name):
    return next(one for one in switched.fuels if one.properties.fuel.name == name)


def test_exit_temperature_is_held_and_hydrogen_makes_more_nox(switched):
    for one in switched.fuels:
        for own, new in zip(switched.baseline.points, one.points, strict=True):
            assert new.exit.temperature == pytest.approx(own.exit.temperature, abs=0.2)
    own, new = switched.baseline.points[0], by_name(switched, "hydrogen").points[0]
    assert new.emissions.nox_per_energy > 1.3 * own.emissions.nox_per_energy
    assert new.emissions.nox_dry_15 / own.emissions.nox_dry_15 > (
        1.3 * new.emissions.nox_per_energy / own.emissions.nox_per_energy
    )
    margins = [p.operability["blowout_margin_percent"] for p in (own, new)]
    assert margins[1] > margins[0]


def test_what_no_common_mechanism_burns_cannot_be_said(switched):
    ((name, why),) = switched.refused
    assert name == "ammonia" and "no mechanism here burns" in why


def test_nozzles_are_sized_from_the_present_one(switched):
    own = switched.baseline.injector[0]
    assert own.pressure_ratio == pytest.approx(1.3, rel=1e-9) and own.area_ratio == 1.0
    hydrogen = by_name(switched, "hydrogen").injector[0]
    assert 1.38 < hydrogen.pressure_ratio < 1.45 and not hydrogen.choked
    biogas = by_name(switched, "biogas").injector[0]
    assert biogas.choked and biogas.area_ratio > 2.0
    changes = {change.what for change in by_name(switched, "hydrogen").changes}
    assert {"fuel nozzle", "row dilution", "NOx"} <= changes
    assert by_name(switched, "hydrogen").verdict == "with changes"


def test_the_end_fuel_is_shown_on_the_mechanism_it_would_have_alone(switched):
    hydrogen = by_name(switched, "hydrogen")
    assert hydrogen.own_mechanism == "Alzueta 2023" and hydrogen.own_mechanism_nox > 0.0
    assert by_name(switched, "biogas").own_mechanism_nox is None


def test_same_heat_and_same_valve(short_case):
    one_point = short_case.model_copy(update={"points": short_case.points[:1]})
    heat = switch_fuel(one_point, ["methane+20%hydrogen"], hold="heat")
    own, new = heat.baseline, heat.fuels[0]
    released = [
        one.points[0].fuel_flow * one.properties.fuel.lower_heating_value for one in (own, new)
    ]
    assert released[1] == pytest.approx(released[0], rel=1e-9)
    valve = switch_fuel(one_point, ["methane+20%hydrogen"], hold="valve")
    assert valve.fuels[0].injector[0].pressure_ratio == pytest.approx(1.3, rel=2e-3)
    through = [
        one.points[0].fuel_flow * one.properties.fuel.lower_heating_value
        for one in (valve.baseline, valve.fuels[0])
    ]
    wobbe = [one.properties.fuel.wobbe_lower for one in (valve.baseline, valve.fuels[0])]
    assert through[1] / through[0] == pytest.approx(wobbe[1] / wobbe[0], rel=0.01)


def test_opened_rows_bring_the_air_where_it_is_wanted(short_case, switched):
    metal = hardware_of(short_case)
    fuel = switched.baseline.properties.fuel
    inlet = operating_of(short_case, short_case.points[0], fuel, Gas.load(fuel.mechanism)).inlet
    less = open_rows(short_case, metal, inlet, 0.9)
    assert less.name == "dilution" and less.after > less.before
    assert less.share_ratio == pytest.approx(0.9, abs=0.02) and less.loss_ratio < 1.0
    more = open_rows(short_case, metal, inlet, 1.05)
    assert more.name == "primary" and more.share_ratio == pytest.approx(1.05, abs=0.02)
    assert open_rows(short_case, metal, inlet, 0.2) is None


def test_the_opened_row_is_verified_by_rating_the_opened_metal(short_case, switched):
    hydrogen = by_name(switched, "hydrogen")
    (change,) = (c for c in hydrogen.changes if c.what == "row dilution")
    diameter = 1e-3 * float(change.amount.split(" -> ")[1].split()[0])
    metal = hardware_of(short_case)
    fuel = hydrogen.properties.fuel
    point = short_case.points[0].model_copy(
        update={"exit_temperature": switched.baseline.points[0].exit.temperature}
    )
    opened = with_diameter(metal, metal.opening("dilution"), diameter)
    rated = rate_point(
        short_case, point, fuel, Gas.load(fuel.mechanism), opened, settings_of(short_case.model)
    )
    (reached,) = (zone.equivalence_ratio for zone in rated.zones if zone.name == "primary")
    (wanted,) = (
        zone.equivalence_ratio
        for zone in switched.baseline.points[0].zones
        if zone.name == "primary"
    )
    assert reached == pytest.approx(wanted, rel=0.02)
    assert f"rated again at full, it comes to {reached:.3f}" in change.note
    assert f"{100.0 * rated.pressure_loss:.2f} % pressure loss" in change.note


def rows_of(short_case, switched, rate):
    own, new = switched.baseline.points[0], by_name(switched, "hydrogen").points[0]
    fuel = switched.baseline.properties.fuel
    inlet = operating_of(short_case, short_case.points[0], fuel, Gas.load(fuel.mechanism)).inlet
    (change,) = row_changes(short_case, hardware_of(short_case), inlet, own, new, rate)
    return change, own


def with_primary(point, equivalence_ratio):
    zones = tuple(
        replace(zone, equivalence_ratio=equivalence_ratio) if zone.name == "primary" else zone
        for zone in point.zones
    )
    return replace(point, zones=zones)


def test_an_opened_row_that_cannot_be_rated_is_said_to_be_an_estimate(short_case, switched):
    change, _ = rows_of(short_case, switched, lambda metal: None)
    assert "by the cold air split alone" in change.note


def test_a_row_that_misses_is_drilled_once_more(short_case, switched):
    cold, own = rows_of(short_case, switched, lambda metal: None)
    (wanted,) = (zone.equivalence_ratio for zone in own.zones if zone.name == "primary")
    tried = []

    def rate(metal):
        tried.append(metal.opening("dilution").diameter)
        return with_primary(own, wanted * (0.95 if len(tried) == 1 else 0.99))

    again, _ = rows_of(short_case, switched, rate)
    # too lean: more air is to be drawn from the primary zone, so the row opens further
    assert len(tried) == 2 and tried[1] > tried[0]
    assert f"-> {1e3 * tried[0]:.2f} mm" in cold.amount
    assert f"-> {1e3 * tried[1]:.2f} mm" in again.amount


# -- verdicts and reports -----------------------------------------------------------------------

BROKEN = Limit("flame", "full", None, None, "", kept=False)
UNKNOWN = replace(BROKEN, known=False)
MENDABLE = replace(BROKEN, by_change=True)
NOZZLE = Change("fuel nozzle", "1.2 x", "")


@pytest.mark.parametrize(
    ("limits", "changes", "verdict"),
    [
        ((), (), "as it is"),
        ((replace(BROKEN, kept=True),), (), "as it is"),
        ((), (NOZZLE,), "with changes"),
        ((MENDABLE,), (), "with changes"),
        ((UNKNOWN, MENDABLE), (), "cannot say"),
        ((UNKNOWN, BROKEN), (NOZZLE,), "not on this metal"),
    ],
)
def test_verdicts(limits, changes, verdict):
    assert verdict_of(limits, changes) == verdict


def test_report_holds_verdicts_cautions_and_shares(switched):
    text = render(switch_report(switched), Page(width=100))
    for words in ("? cannot say", "~ with changes", "flame nobody sees", "Not assessed"):
        assert words in text
    assert text.index("Verdicts") < text.index("Before use")
    assert {table.name for table in switch_data(switched)} >= {"switch_verdicts", "points"}


def test_document_holds_points_of_every_fuel(switched):
    document = switch_document(switched, "1")
    assert [p["fuel"] for p in document["points"]] == [
        *["natural-gas"] * 2,
        *["hydrogen"] * 2,
        *["biogas"] * 2,
    ]
    assert document["points"][0]["operability"]["blowout_margin_percent"] > 0.0
    assert {line["fuel"]: line["verdict"] for line in document["fuels"]}[
        "hydrogen"
    ] == "with changes"
    assert document["refused"][0]["fuel"] == "ammonia"


def test_ladder_finds_the_share_and_what_stops_it(short_case):
    one_point = short_case.model_copy(update={"points": short_case.points[:1]})
    found = switch_fuel(one_point, ladder=read_ladder("hydrogen", "0:60:3")).ladder
    # the nozzle's window of 5 % of the corrected Wobbe index ends near 18 %
    assert found.share == 0.0
    assert found.stopped_by.what.startswith("fuel nozzle")
    assert found.with_nozzle == 0.6 and found.then_stopped_by is None


# -- dew points ---------------------------------------------------------------------------------


def with_sulfur(case, share):
    return case.model_copy(update={"rules": case.rules.model_copy(update={"fuel_sulfur": share})})


@pytest.mark.parametrize(
    ("stated", "name", "sulfur"),
    [
        (None, "natural-gas", None),
        (None, "hydrogen", 0.0),
        (None, "jet-a", 4e-4),
        (2e-5, "natural-gas", 2e-5),
        (2e-5, "biogas", None),
        (2e-5, "hydrogen", 0.0),
    ],
)
def test_sulfur_is_what_was_stated_of_each_fuel(metal_case, stated, name, sulfur):
    case = with_sulfur(metal_case, stated)
    assert sulfur_of(case, combustor.find_fuel(name), [(name, 1.0)]) == sulfur


def test_hydrogen_dilutes_the_sulfur_of_the_present_fuel(metal_case):
    case, blend = with_sulfur(metal_case, 2e-5), combustor.find_fuel("natural-gas+30%hydrogen", GRI)
    found = properties_of(case, blend, Gas.load(GRI))
    gas = next(share for share in found.shares if share.part == "natural-gas")
    assert found.sulfur == pytest.approx(2e-5 * gas.mass, rel=1e-12)


def test_acid_dew_point_lies_above_that_of_water_where_there_is_sulfur(switched):
    blend = by_name(switched, "biogas")
    sulfurous = replace(blend, properties=replace(blend.properties, sulfur=1e-3))
    mixed = replace(switched, fuels=(*switched.fuels[:1], sulfurous))
    own, hydrogen, biogas = point_records(mixed, "full")
    assert own["acid_dew_point"] is None and hydrogen["acid_dew_point"] is None
    assert all(20.0 < line["dew_point"] < 70.0 for line in (own, hydrogen, biogas))
    # 0.1 % of sulfur is 2.0 g SO2 per kg of fuel, 2 % of it as SO3
    made = blend.points[0].emissions
    so3 = 1e-3 / 32.06e-3 * 0.02 * made.fuel_flow * made.mean_molar_mass / made.gas_flow
    printed = acid_dew_point_okkes(101325.0 * made.h2o_wet, 101325.0 * so3) - 273.15
    assert biogas["acid_dew_point"] == pytest.approx(printed, abs=5.0)
    assert biogas["acid_dew_point"] > biogas["dew_point"] + 30.0
    beside = switch_document(mixed, "1")["side_by_side"]
    line = next(d for d in beside if (d["point"], d["fuel"]) == ("full", "biogas"))
    assert line["acid_dew_point_degC"] == pytest.approx(biogas["acid_dew_point"])
    text = render(switch_report(mixed), Page(width=120))
    assert "dew point" in text and "not stated for natural-gas:" in text
