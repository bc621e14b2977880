"""The landing and take-off cycle on measured engines, tiers at their joints, divisors."""

from __future__ import annotations

import csv
from math import sqrt
from pathlib import Path

import pytest

from combustor.base.errors import InputError
from combustor.emissions.aircraft_tier import TIERS, nox_limits, strictest_tier
from combustor.emissions.landing_takeoff import (
    TIME_IN_MODE,
    Mode,
    characteristic_factor,
    mass_per_thrust,
)

TABLE = Path(__file__).parent.parent / "reference" / "turbofan_nox.csv"
COLUMN = {"take-off": "to", "climb": "co", "approach": "app", "idle": "idle"}


def engines():
    lines = [line for line in TABLE.read_text().splitlines() if not line.startswith("#")]
    return list(csv.DictReader(lines))


def level(engine):
    modes = {
        mode: Mode(float(engine[f"ei_nox_{c}_g_kg"]) * 1e-3, float(engine[f"ff_{c}_kg_s"]))
        for mode, c in COLUMN.items()
    }
    return mass_per_thrust(modes, float(engine["rated_thrust_kN"]) * 1e3)


def test_the_cycle_lasts_32_9_minutes():
    assert sum(TIME_IN_MODE.values()) == pytest.approx(32.9 * 60.0)


def test_every_engine_is_recomputed_and_placed_by_tier():
    placed = {}
    for engine in engines():
        thrust, ratio = float(engine["rated_thrust_kN"]), float(engine["pressure_ratio"])
        minutes = {"to": 0.7, "co": 2.2, "app": 4.0, "idle": 26.0}
        grams = sum(
            float(engine[f"ei_nox_{c}_g_kg"]) * float(engine[f"ff_{c}_kg_s"]) * 60.0 * t
            for c, t in minutes.items()
        )
        found = level(engine)
        assert found * 1e6 == pytest.approx(grams / thrust, rel=1e-12)
        limits = nox_limits(ratio, thrust * 1e3)
        assert list(limits) == list(TIERS)
        values = [limits[tier] for tier in TIERS]
        assert values == sorted(values, reverse=True)
        placed[engine["engine_id"]] = strictest_tier(found, ratio, thrust * 1e3)
    assert len(placed) >= 200
    # engines in production meet the oldest limit as means, and staged or lean ones the newer
    assert all(tier is not None for tier in placed.values())
    staged = [placed[e["engine_id"]] for e in engines() if e["staged_or_lean"] == "yes"]
    assert len(staged) > 20
    assert all(tier in ("caep6", "caep8") for tier in staged)


def test_five_engines_by_hand():
    """mass = 42 s x take-off + 132 s x climb + 240 s x approach + 1560 s x idle, EI x flow."""
    found = {engine["engine_id"]: level(engine) * 1e6 for engine in engines()}
    # 4AL003, 33.73 kN: 42 x 0.377 x 20.54 + 132 x 0.315 x 17.47 + 240 x 0.117 x 7.79
    #   + 1560 x 0.049 x 3.83 = 325.23 + 726.40 + 218.74 + 292.77 = 1563.14 g; / 33.73 = 46.34
    assert found["4AL003"] == pytest.approx(46.34, abs=0.005)
    # 6AL008, 34.74 kN: 42 x 0.3805 x 19.57 + 132 x 0.3163 x 16.55 + 240 x 0.1125 x 7.07
    #   + 1560 x 0.0459 x 3.46 = 312.75 + 690.99 + 190.89 + 247.75 = 1442.38 g; / 34.74 = 41.52
    assert found["6AL008"] == pytest.approx(41.52, abs=0.005)
    # 6AL011, 33.05 kN: 42 x 0.3589 x 18.55 + 132 x 0.2999 x 15.81 + 240 x 0.1077 x 6.83
    #   + 1560 x 0.0449 x 3.39 = 279.62 + 625.87 + 176.54 + 237.45 = 1319.48 g; / 33.05 = 39.92
    assert found["6AL011"] == pytest.approx(39.92, abs=0.005)
    # 2CM016, 133.45 kN, staged: 42 x 1.345 x 27.75 + 132 x 1.104 x 14.91 + 240 x 0.369 x 7.02
    #   + 1560 x 0.129 x 4.73 = 1567.60 + 2172.80 + 621.69 + 951.87 = 5313.96 g; / 133.45 = 39.82
    assert found["2CM016"] == pytest.approx(39.82, abs=0.005)
    # 5GE085, 304.8 kN: 42 x 2.989 x 45.63 + 132 x 2.387 x 31.74 + 240 x 0.755 x 10.29
    #   + 1560 x 0.227 x 4.69 = 5728.30 + 10000.77 + 1864.55 + 1660.82 = 19254.44 g; / 304.8 = 63.17
    assert found["5GE085"] == pytest.approx(63.17, abs=0.005)


@pytest.mark.parametrize("ratio", [20.0, 30.0, 40.0])
@pytest.mark.parametrize("tier", ["caep4", "caep6", "caep8"])
def test_small_and_large_branches_meet_at_89_kilonewton(tier, ratio):
    small = nox_limits(ratio, 89.0e3)[tier]
    large = nox_limits(ratio, 89.0e3 * (1.0 + 1e-9))[tier]
    # half a unit in the last printed digit of the thrust coefficients
    printed = (0.5e-4 + 0.5e-5 * ratio) * 89.0
    assert small * 1e6 == pytest.approx(large * 1e6, abs=min(printed, 0.0065))


@pytest.mark.parametrize(
    ("tier", "ratio"), [("caep4", 30.0), ("caep6", 30.0), ("caep8", 30.0)], ids=str
)
def test_low_and_high_branches_meet_at_30(tier, ratio):
    for thrust in (27e3, 60e3, 89e3, 200e3):
        low = nox_limits(ratio, thrust)[tier]
        high = nox_limits(ratio + 1e-9, thrust)[tier]
        assert low * 1e6 == pytest.approx(high * 1e6, abs=0.01)


@pytest.mark.parametrize(
    ("tier", "ratio"), [("caep4", 62.5), ("caep6", 82.6), ("caep8", 104.7)], ids=str
)
def test_high_branches_meet_the_second_tier_line(tier, ratio):
    below = nox_limits(ratio - 1e-9, 200e3)[tier]
    at = nox_limits(ratio, 200e3)
    assert below * 1e6 == pytest.approx(at[tier] * 1e6, abs=0.01)
    assert at[tier] == pytest.approx(at["caep2"], rel=1e-12)


@pytest.mark.parametrize(("ratio", "value"), [(20.0, 64.0), (30.0, 80.0)])
@pytest.mark.parametrize("tier", ["caep4", "caep6"])
def test_at_26_7_kilonewton_small_engines_keep_the_second_tier(tier, ratio, value):
    found = nox_limits(ratio, 26.7e3 * (1.0 + 1e-12))[tier]
    assert found * 1e6 == pytest.approx(value, abs=0.01)


@pytest.mark.parametrize("engines_tested", range(3, 11))
@pytest.mark.parametrize(
    ("pollutant", "slope"), [("CO", 0.13059), ("UHC", 0.24724), ("NOx", 0.09678)]
)
def test_characteristic_rows_follow_their_closed_form(pollutant, slope, engines_tested):
    printed = characteristic_factor(pollutant, engines_tested)
    assert printed == pytest.approx(1.0 - slope / sqrt(engines_tested), abs=1.01e-4)


@pytest.mark.parametrize(
    ("pollutant", "one", "two", "many"),
    [
        ("CO", 0.8147, 0.8777, 0.97388),
        ("UHC", 0.6493, 0.7685, 0.95055),
        ("NOx", 0.8627, 0.9094, 0.98064),
    ],
    ids=lambda v: f"{v}, ICAO Annex 16 vol. II app. 6 (from memory)" if isinstance(v, str) else "",
)
def test_characteristic_factor(pollutant, one, two, many):
    assert characteristic_factor(pollutant, 1) == one
    assert characteristic_factor(pollutant, 2) == two
    assert characteristic_factor(pollutant, 25) == pytest.approx(many, abs=5e-6)
    factors = [characteristic_factor(pollutant, n) for n in range(1, 60)]
    assert factors == sorted(factors)


def test_a_missing_mode_is_named():
    with pytest.raises(InputError, match="missing: climb, take-off"):
        mass_per_thrust({"idle": Mode(0.004, 0.1), "approach": Mode(0.01, 0.2)}, 1e5)
    with pytest.raises(InputError, match="cruise"):
        modes = dict.fromkeys(TIME_IN_MODE, Mode(0.01, 0.2))
        mass_per_thrust({**modes, "cruise": Mode(0.01, 0.2)}, 1e5)
