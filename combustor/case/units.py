"""Units at the border: a unit's text in, an exact factor to SI out.

The trade's usual units stand in one table with exact factors, so that ``"9.8 bar"`` is
980000 Pa to the last bit and a written number reads back as itself. Anything else is looked
up with pint, which is imported only then: it costs more than the rest of reading a case.
"""

from __future__ import annotations

import difflib
import re
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction
from functools import lru_cache
from typing import Any

from combustor.base.method import Method

EXACT_FACTORS = Method(
    key="unit-factors",
    quantity="factors between units",
    source="NIST Special Publication 811 (2008), appendix B; international yard and pound (1959)",
    reading="from memory",
    note="checked against the pint unit library in the tests",
)


@dataclass(frozen=True)
class Unit:
    """A unit: SI value = (number + offset) x factor."""

    dimension: str
    factor: Fraction
    offset: Fraction = Fraction(0)


class UnitError(Exception):
    """A unit that cannot be used; ``what`` is the fact, ``allowed`` the way out."""

    def __init__(self, what: str, allowed: str = "", nearest: str | None = None) -> None:
        self.what = what
        self.allowed = allowed
        self.nearest = nearest
        super().__init__(what)


_INCH = Fraction("0.0254")
_FOOT = 12 * _INCH
_POUND = Fraction("0.45359237")
_POUND_FORCE = _POUND * Fraction("9.80665")
_BTU = Fraction("1055.05585262")
_HOUR = Fraction(3600)
# The only factor here that is not rational: kept to more digits than a float holds.
_DEGREE = Fraction("3.14159265358979323846264338327950288") / 180

SI_UNIT = {
    "pressure": "Pa",
    "temperature": "K",
    "mass flow": "kg/s",
    "length": "m",
    "area": "m2",
    "velocity": "m/s",
    "power": "W",
    "force": "N",
    "angle": "rad",
    "rate": "1/s",
    "time": "s",
    "conductivity": "W/m/K",
    "heat transfer": "W/m2/K",
    "specific energy": "J/kg",
    "specific heat": "J/kg/K",
    "density": "kg/m3",
    "molar mass": "kg/mol",
    "viscosity": "Pa.s",
    "surface tension": "N/m",
    "evaporation constant": "m2/s",
    "ratio": "",
}

_NAMES: dict[str, dict[Fraction | int | str, str]] = {
    "pressure": {
        1: "Pa pascal",
        100: "hPa mbar mbara",
        1000: "kPa kPaa",
        10**5: "bar bara",
        10**6: "MPa MPaa",
        101325: "atm",
        _POUND_FORCE / _INCH**2: "psi psia lbf/in2",
    },
    "mass flow": {
        1: "kg/s",
        Fraction(1, 1000): "g/s",
        Fraction(1, 60): "kg/min",
        1 / _HOUR: "kg/h kg/hr",
        1000 / _HOUR: "t/h t/hr",
        _POUND: "lb/s lbm/s pps",
        _POUND / 60: "lb/min lbm/min",
        _POUND / _HOUR: "lb/h lbm/h lb/hr lbm/hr pph",
    },
    "length": {
        1: "m metre metres meter meters",
        Fraction(1, 100): "cm",
        Fraction(1, 1000): "mm",
        Fraction(1, 10**6): "um micron",
        _INCH: "in inch inches",
        _INCH / 1000: "thou mil",
        _FOOT: "ft foot feet",
    },
    "area": {
        1: "m2",
        Fraction(1, 10**4): "cm2",
        Fraction(1, 10**6): "mm2",
        _INCH**2: "in2",
        _FOOT**2: "ft2",
    },
    "velocity": {1: "m/s", _FOOT: "ft/s"},
    "power": {
        1: "W",
        1000: "kW",
        10**6: "MW",
        10**9: "GW",
        550 * _FOOT * _POUND_FORCE: "hp",
        _BTU / _HOUR: "Btu/h Btu/hr",
        10**6 * _BTU / _HOUR: "MMBtu/h MMBtu/hr",
    },
    "force": {1: "N", 1000: "kN", _POUND_FORCE: "lbf"},
    "angle": {1: "rad", _DEGREE: "deg degree degrees °"},
    "rate": {1: "1/s s-1", 1000: "1/ms"},
    "time": {
        1: "s sec",
        Fraction(1, 1000): "ms",
        Fraction(1, 10**6): "us",
        60: "min",
        3600: "h",
    },
    "conductivity": {1: "W/m/K W/m-K W/(m.K) W/(m*K) W/mK"},
    "heat transfer": {1: "W/m2/K W/(m2.K) W/(m2*K)"},
    "specific energy": {1: "J/kg", 1000: "kJ/kg", 10**6: "MJ/kg", _BTU / _POUND: "Btu/lb"},
    "specific heat": {1: "J/kg/K J/(kg.K)", 1000: "kJ/kg/K kJ/(kg.K)"},
    "density": {1: "kg/m3", 1000: "kg/L kg/l g/cm3 g/mL g/ml"},
    "molar mass": {1: "kg/mol", Fraction(1, 1000): "g/mol kg/kmol"},
    "viscosity": {1: "Pa.s Pas", Fraction(1, 1000): "mPa.s mPas cP"},
    "surface tension": {1: "N/m", Fraction(1, 1000): "mN/m dyn/cm"},
    "evaporation constant": {1: "m2/s", Fraction(1, 10**6): "mm2/s"},
    "ratio": {
        1: "kg/kg lb/lb mol/mol",
        Fraction(1, 100): "% percent vol% mol%",
        Fraction(1, 1000): "g/kg",
        Fraction(1, 10**6): "ppm ppmv ppmvd mg/kg",
        Fraction(1, 10**9): "ppb",
    },
}


def _table() -> dict[str, Unit]:
    table = {
        name: Unit(dimension, Fraction(factor))
        for dimension, rows in _NAMES.items()
        for factor, names in rows.items()
        for name in names.split()
    }
    rankine = Fraction(5, 9)
    for names, factor, offset in (
        ("K kelvin", Fraction(1), Fraction(0)),
        ("degC °C C celsius", Fraction(1), Fraction("273.15")),
        ("degF °F F fahrenheit", rankine, Fraction("459.67")),
        ("degR °R R rankine", rankine, Fraction(0)),
    ):
        for name in names.split():
            table[name] = Unit("temperature", factor, offset)
    return table


UNITS = _table()

_GAUGE = re.compile(
    r"(?:(?:[mkhM]?Pa|m?bar|psi|at|atm|inHg|mmHg)\s*[-_]?\s*(?:\(\s*g(?:auge)?\s*\)|g(?:auge)?)"
    r"|atü|gauge.*|.*\bgauge)",
    re.IGNORECASE,
)
_ABSOLUTE = re.compile(r"^(.*?)\s*[-_]?\s*(?:\(\s*a(?:bs)?\s*\)|abs(?:olute)?)$")
_SPELLING = str.maketrans({"²": "2", "³": "3", "µ": "u", "μ": "u", "·": ".", "⋅": "."})
_FOR_PINT = re.compile(r"[A-Za-z%°][A-Za-z0-9 /*^().°_-]{0,39}")
# In the US gas trade MBtu is a thousand, elsewhere a million: nobody can be held to either.
_AMBIGUOUS = re.compile(r"MBtu.*", re.IGNORECASE)
_MANY_DIGITS = re.compile(r"[0-9]{2}|[0-9]\s*(?:\^|\*\*)|(?:\^|\*\*)\s*\(")


def plain(text: str) -> str:
    """Return a unit's text in this table's spelling: mm^2, mm**2 and mm² are mm2."""
    text = " ".join(text.translate(_SPELLING).split())
    text = re.sub(r"\s*(?:\^|\*\*)\s*(?=-?[0-9])", "", text)
    text = re.sub(r"\s*([/.*()])\s*", r"\1", text)
    text = re.sub(r"^deg ([CFR])$", r"deg\1", text)
    return re.sub(r"^sq\.? ?(mm|cm|m|in|ft)$", r"\g<1>2", text)


def find_unit(text: str) -> Unit:
    """Return the unit that ``text`` names.

    Raises
    ------
    UnitError
        Gauge units, temperature differences and unknown units, each with the reason.
    """
    if _GAUGE.fullmatch(text.strip()):
        raise UnitError(
            f"{text.strip()!r} is a gauge unit",
            "pressures are total and absolute: add the barometric pressure and write bar, kPa "
            "or psia",
        )
    name = plain(text)
    if name in UNITS:
        return UNITS[name]
    if absolute := _ABSOLUTE.match(name):
        unit = UNITS.get(absolute[1])
        if unit is not None and unit.dimension == "pressure":
            return unit
    if re.search(r"delta|Δ", name, re.IGNORECASE):
        raise UnitError(
            f"{name!r} is a temperature difference",
            "a temperature is needed: write K, degC, degF or degR",
        )
    if _AMBIGUOUS.fullmatch(name):
        raise UnitError(f"{name[:40]!r} can be a thousand or a million Btu", "write MMBtu/h or MW")
    found = _from_pint(name)
    if found is None:
        close = difflib.get_close_matches(name, UNITS, n=1, cutoff=0.6)
        raise UnitError(f"unknown unit {name[:40]!r}", "", close[0] if close else None)
    return found


@lru_cache(maxsize=1)
def _registry() -> Any:
    import pint

    return pint.UnitRegistry(cache_folder=None)


# Angles, ratios and rates are left out: pint holds them all for pure numbers, and a degree
# would pass for a fraction. Temperatures too: an offset or a difference must be told apart.
_BY_PINT = {
    "pressure": "Pa",
    "mass flow": "kg/s",
    "length": "m",
    "area": "m**2",
    "velocity": "m/s",
    "power": "W",
    "force": "N",
    "conductivity": "W/m/K",
}


@lru_cache(maxsize=256)
def _from_pint(name: str) -> Unit | None:
    if not _FOR_PINT.fullmatch(name) or _MANY_DIGITS.search(name):
        return None
    registry = _registry()
    expression = re.sub(r"(?<=[A-Za-z])(-?[1-9])(?![A-Za-z0-9])", r"**\1", name)
    try:
        unit = registry.parse_units(expression)
        for dimension, si in _BY_PINT.items():
            if unit.is_compatible_with(si):
                factor = registry.Quantity(1.0, unit).to(si).magnitude
                return Unit(dimension, Fraction(Decimal(repr(float(factor)))))
        kind = str(unit.dimensionality)
        return Unit(kind.strip("[]") if kind.count("[") == 1 else "another kind", Fraction(1))
    except Exception:
        # pint raises a different class for every way a text can fail to be a unit
        return None
