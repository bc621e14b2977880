"""The standard day and ram air."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.atmosphere import ram_air, standard_air
from combustor.base.errors import InputError

# ICAO Doc 7488 / ISO 2533, geopotential height: K, Pa, kg/m3, m/s, 1e-6 Pa s, as printed.
TABLE = [
    (0, 288.15, 101325, 1.2250, 340.29, 17.894),
    (1000, 281.65, 89875, 1.1116, 336.43, 17.579),
    (5000, 255.65, 54020, 0.73612, 320.53, 16.281),
    (10000, 223.15, 26436, 0.41271, 299.46, 14.571),
    (11000, 216.65, 22632, 0.36392, 295.07, 14.216),
    (12000, 216.65, 19330, 0.31083, 295.07, 14.216),
    (15000, 216.65, 12044.6, 0.19367, 295.07, 14.216),
    (20000, 216.65, 5474.9, 0.08803, 295.07, 14.216),
]


def half_a_digit(value):
    digits = str(value).partition(".")[2]
    return 0.5001 * 10.0 ** -len(digits)


@pytest.mark.parametrize("row", TABLE, ids=lambda row: f"ISO 2533 at {row[0]} m")
def test_standard_atmosphere_to_its_digits(row):
    altitude, temperature, pressure, density, sound, viscosity = row
    air = standard_air(altitude)
    assert air.temperature == pytest.approx(temperature, abs=half_a_digit(temperature))
    assert air.pressure == pytest.approx(pressure, abs=half_a_digit(pressure))
    assert air.density == pytest.approx(density, abs=half_a_digit(density))
    assert air.speed_of_sound == pytest.approx(sound, abs=half_a_digit(sound))
    # Sutherland's constants are given to four digits: one unit of the last place
    assert 1e6 * air.viscosity == pytest.approx(viscosity, abs=2 * half_a_digit(viscosity))


# By hand: T (1 + 0.2 M^2), p (1 + r ((1 + 0.2 M^2)^3.5 - 1)).
#   0 m, 0.30: 288.15 x 1.018 = 293.34 K; 1.018^3.5 = 1.06443; r 1 -> 107853 Pa
#   9000 m, 0.80: 229.65 x 1.128 = 259.05 K; 30742 Pa x (1 + 0.9 x 0.52434) -> 45250 Pa
#   11000 m, 2.00: 216.65 x 1.8 = 389.97 K; 1.8^3.5 = 7.82445; 0.85 -> 22632 x 6.80078 = 153915 Pa
@pytest.mark.parametrize(
    ("altitude", "mach", "recovery", "temperature", "pressure"),
    [
        (0.0, 0.30, 1.0, 293.337, 107853.0),
        (9000.0, 0.80, 0.9, 259.045, 45250.0),
        (11000.0, 2.00, 0.85, 389.97, 153915.0),
    ],
)
def test_ram_air_by_hand(altitude, mach, recovery, temperature, pressure):
    air = ram_air(altitude, mach, recovery)
    assert air.temperature == pytest.approx(temperature, rel=2e-5)
    assert air.pressure == pytest.approx(pressure, rel=1e-4)


@settings(derandomize=True, max_examples=30)
@given(st.floats(-500.0, 19000.0), st.floats(1.0, 300.0))
def test_pressure_falls_with_height_and_obeys_hydrostatics(altitude, step):
    low, high = standard_air(altitude), standard_air(altitude + step)
    assert high.pressure < low.pressure
    mean = math.sqrt(low.density * high.density)
    assert low.pressure - high.pressure == pytest.approx(9.80665 * mean * step, rel=2e-3)


@pytest.mark.parametrize("altitude", [-501.0, 20001.0])
def test_outside_the_standard_atmosphere_is_refused(altitude):
    with pytest.raises(InputError, match="standard atmosphere"):
        standard_air(altitude)


def test_no_recovery_leaves_the_static_pressure():
    assert ram_air(5000.0, 0.7, 0.0).pressure == standard_air(5000.0).pressure
