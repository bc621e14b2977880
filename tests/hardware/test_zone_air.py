"""Bookkeeping of the air by zone."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Hardware,
    LinerWall,
    Opening,
    Passage,
    Slot,
    Zone,
)
from combustor.hardware.zone_air import mixed_share, slot_height, zone_air

HEIGHT = 1.5e-3
SLOT = Slot(HEIGHT, 0.6e-3, 0.9)


def opening(name: str, role: str, station: float, slot: Slot | None = None) -> Opening:
    side = "dome" if role in ("swirler", "dome", "premixer") else "outer"
    return Opening(name, role, side, station, 10, 1e-5, "orifice", "total", slot=slot)


def metal(*openings: Opening) -> Hardware:
    constant = AxialProfile.constant
    wall = LinerWall("outer", constant(0.9), 0.17, 1.2e-3, 26.0, 0.8, 0.7, 0.8)
    return Hardware(
        layout="can",
        cans=1,
        flow="straight",
        reference_area=0.1,
        reference_height=0.36,
        liner_height=0.286,
        liner=Passage("liner", constant(0.064), constant(0.286)),
        liner_length=0.8,
        transition_length=0.0,
        exit_area=0.064,
        annuli=(Passage("outer", constant(0.035), constant(0.07)),),
        walls=(wall,),
        diffuser=Diffuser("faired", 0.02, 0.03, 0.05, 0.2),
        openings=tuple(sorted(openings, key=lambda one: one.station)),
        zones=(
            Zone("primary", 0.0, 0.2),
            Zone("secondary", 0.2, 0.35),
            Zone("dilution", 0.35, 0.8),
        ),
    )


CAN = metal(
    opening("swirler", "swirler", 0.0),
    opening("dome", "dome", 0.0),
    opening("film-1", "film", 0.0, SLOT),
    opening("primary", "primary", 0.19),
    opening("secondary", "secondary", 0.25),
    opening("dilution", "dilution", 0.37),
    opening("film-2", "film", 0.4, SLOT),
    opening("leakage", "leak", 0.8),
)
FLOWS = {
    "swirler": 10.0,
    "dome": 8.0,
    "film-1": 15.0,
    "primary": 20.0,
    "secondary": 6.0,
    "dilution": 24.0,
    "film-2": 15.0,
    "leakage": 2.0,
}


def film_share(distance: float) -> float:
    """Ballal and Lefebvre's wall jet to 150 slot heights, x^-0.8 beyond, written out apart."""
    heights = distance / HEIGHT
    decay = heights**-0.2 if heights < 150.0 else 150.0**-0.2 * (150.0 / heights) ** 0.8
    return 1.0 - 1.28 * 0.53**0.15 * 0.4**-0.2 * decay


def test_zones_by_hand():
    air = zone_air(CAN, FLOWS)
    assert air["primary"] == pytest.approx((10 + 8 + 0.5 * 20) / 100)
    mixed = 15 * film_share(0.35)
    assert air["secondary"] == pytest.approx((10 + 8 + 20 + 6 + mixed) / 100)
    mixed = 15 * film_share(0.8) + 15 * film_share(0.4)
    assert air["dilution"] == pytest.approx((10 + 8 + 20 + 6 + 24 + mixed) / 100)
    assert air["exit"] == 1.0
    assert list(air) == ["primary", "secondary", "dilution", "exit"]


@pytest.mark.parametrize(
    ("slot_heights", "effectiveness"),
    [
        pytest.param(13.333, 0.8311, id="ballal-lefebvre-from-memory-13.3"),
        pytest.param(26.667, 0.7235, id="ballal-lefebvre-from-memory-26.7"),
    ],
)
def test_film_has_mixed_as_far_as_it_has_decayed(slot_heights, effectiveness):
    film = CAN.opening("film-1")
    share = mixed_share(CAN, film, slot_heights * HEIGHT)
    assert share == pytest.approx(1.0 - effectiveness, abs=3e-3)


def test_whole_film_has_not_mixed():
    assert mixed_share(CAN, CAN.opening("film-1"), 5.0 * HEIGHT) == 0.0
    assert mixed_share(CAN, CAN.opening("film-2"), 0.3) == 0.0


def test_leakage_counts_at_the_exit_only():
    assert mixed_share(CAN, CAN.opening("leakage"), 0.8) == 0.0
    without = {**FLOWS, "leakage": 0.0}
    scale = sum(without.values()) / sum(FLOWS.values())
    assert zone_air(CAN, FLOWS)["dilution"] == pytest.approx(
        scale * zone_air(CAN, without)["dilution"]
    )


def test_share_of_the_primary_row_that_turns():
    for share in (0.0, 0.3, 1.0):
        air = zone_air(CAN, FLOWS, share)
        assert air["primary"] == pytest.approx((18 + 20 * share) / 100)
        assert air["secondary"] == pytest.approx(zone_air(CAN, FLOWS)["secondary"])


def test_row_on_a_boundary_feeds_the_zone_that_begins_there():
    moved = metal(
        *(o for o in CAN.openings if o.name != "dilution"), opening("dilution", "dilution", 0.35)
    )
    assert zone_air(moved, FLOWS) == pytest.approx(zone_air(CAN, FLOWS))


def test_two_half_rows_are_one_row():
    halves = metal(
        *(o for o in CAN.openings if o.name != "dilution"),
        opening("left", "dilution", 0.37),
        opening("right", "dilution", 0.37),
    )
    flows = {name: flow for name, flow in FLOWS.items() if name != "dilution"}
    flows |= {"left": 9.0, "right": 15.0}
    assert zone_air(halves, flows) == pytest.approx(zone_air(CAN, FLOWS))


def test_film_without_a_slot_is_spread_round_the_wall():
    film = opening("effusion", "effusion", 0.1)
    assert slot_height(metal(film), film) == pytest.approx(10 * 1e-5 / 0.9)


@settings(derandomize=True, max_examples=60)
@given(
    role=st.sampled_from(["swirler", "dome", "primary", "secondary", "dilution", "film", "leak"]),
    place=st.floats(0.0, 0.8),
    first=st.floats(0.0, 0.8),
    step=st.floats(0.0, 0.4),
)
def test_air_that_has_mixed_stays_mixed(role, place, first, step):
    one = opening("one", role, place, SLOT if role == "film" else None)
    # the primary row is shared out by the zone's end, where its whole air counts
    can = metal(one)
    before = mixed_share(can, one, first)
    after = mixed_share(can, one, first + step)
    assert 0.0 <= before <= 1.0
    if role != "primary" or place <= 0.2 < first or first + step <= 0.2:
        assert after >= before


@settings(derandomize=True, max_examples=40)
@given(flows=st.lists(st.floats(0.01, 10.0), min_size=8, max_size=8), factor=st.floats(0.1, 50.0))
def test_shares_rise_and_ignore_the_unit(flows, factor):
    named = dict(zip(FLOWS, flows, strict=True))
    air = zone_air(CAN, named)
    values = list(air.values())
    assert values == sorted(values)
    scaled = zone_air(CAN, {name: factor * flow for name, flow in named.items()})
    assert scaled == pytest.approx(air)
