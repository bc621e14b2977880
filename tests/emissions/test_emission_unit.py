"""Units of emission: spellings, factors against published ones, and what is refused."""

from __future__ import annotations

import pytest

from combustor.base.errors import InputError
from combustor.emissions.emission_unit import read_unit


@pytest.mark.parametrize(
    ("text", "shown", "kind"),
    [
        ("ppmvd@15", "ppmvd@15", "volume"),
        ("ppmvd15", "ppmvd@15", "volume"),
        ("ppmvd @ 15 % O2", "ppmvd@15", "volume"),
        ("ppm", "ppmvd", "volume"),
        ("ppmvw", "ppmvw", "volume"),
        ("mg/Nm3@15", "mg/Nm3@15", "mass"),
        ("mg/Nm³", "mg/Nm3", "mass"),
        ("mg/m3(20C)@3", "mg/m3(20C)@3", "mass"),
        ("mg/dscm", "mg/dscm", "mass"),
        ("g/kg", "g/kg fuel", "index"),
        ("lb/MMBtu", "lb/MMBtu HHV", "heat"),
        ("g/MJ LHV", "g/MJ LHV", "heat"),
        ("ng/J output", "ng/J output", "output"),
        ("g/kWh", "g/kWh", "output"),
        ("lb/MWh", "lb/MWh", "output"),
        ("kg/h", "kg/h", "rate"),
        ("t/yr", "t/yr", "year"),
        ("g/kN", "g/kN", "thrust"),
        ("% vol@15", "% vol dry@15", "volume"),
    ],
)
def test_spellings(text, shown, kind):
    unit = read_unit(text)
    assert (unit.text, unit.kind) == (shown, kind)
    assert read_unit(unit.text) == unit


@pytest.mark.parametrize(
    ("one", "other", "ratio", "digits"),
    [
        ("lb/MMBtu HHV", "ng/J HHV", 429.92, 0.005),
        ("lb/MWh", "ng/J output", 126.00, 0.005),
        ("lb/MWh", "kg/MWh", 0.45359, 5e-6),
    ],
    ids=["NIST SP 811: 1 lb/MMBtu", "NIST SP 811: 1 lb/MWh", "NIST SP 811: 1 lb"],
)
def test_factors(one, other, ratio, digits):
    assert read_unit(one).factor / read_unit(other).factor == pytest.approx(ratio, abs=digits)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("mg/m3", "at which temperature"),
        ("ppmvd@25", "below 20"),
        ("g/MJ@15", "only a concentration"),
        ("bar", "known:"),
        ("kg", "known:"),
        ("g/parsec", "known:"),
        ("", "known:"),
    ],
)
def test_what_leaves_open_what_it_means_is_refused(text, said):
    with pytest.raises(InputError, match=said):
        read_unit(text)
