"""The units in which emissions are stated and limited, read from their usual spellings."""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import Literal

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

Kind = Literal["volume", "mass", "index", "heat", "output", "rate", "year", "thrust", "fuel mass"]
Heat = Literal["LHV", "HHV"]

POUND = 0.45359237  # kg
BTU = 1055.05585262  # J, International Table
US_STANDARD = 293.15  # K, 68 degF

UNIT_FACTORS = Method(
    key="emission-unit-factors",
    quantity="factors between emission units",
    source="NIST Special Publication 811 (2008), appendix B; US standard cubic foot at 68 degF "
    "and 29.92 inHg",
    reading="from memory",
)

_MASS = {"kg": 1.0, "g": 1e-3, "mg": 1e-6, "ug": 1e-9, "ng": 1e-12, "lb": POUND, "t": 1e3}
_ENERGY = {
    "J": 1.0,
    "kJ": 1e3,
    "MJ": 1e6,
    "GJ": 1e9,
    "kWh": 3.6e6,
    "MWh": 3.6e9,
    "MMBtu": 1e6 * BTU,
}
_TIME = {"s": 1.0, "h": 3600.0, "hr": 3600.0}
_FIXED = {"N": 273.15, "S": 288.15, "ds": US_STANDARD}


@dataclass(frozen=True)
class EmissionUnit:
    """One unit.

    Parameters
    ----------
    text : str
        As printed.
    kind : str
        Of what: mole fraction, mass per m3, mass per fuel mass, per fuel heat, per output,
        per time, per year, per thrust, or share of the fuel's mass.
    factor : float
        SI value of one unit: mole fraction, kg/m3, kg/kg, kg/J, kg/J, kg/s, kg, kg/N.
    moisture : {"wet", "dry"}
    oxygen : float or None
        Reference O2 named in the unit, mole fraction.
    temperature : float or None
        At which the m3 is counted, K.
    heat : {"LHV", "HHV"} or None
        Heating value of a unit per heat; None where the unit does not say.
    """

    text: str
    kind: Kind
    factor: float
    moisture: Literal["wet", "dry"] = "dry"
    oxygen: float | None = None
    temperature: float | None = None
    heat: Heat | None = None

    @property
    def concentration(self) -> bool:
        """Whether it is a concentration, which hangs on the O2 of the gas."""
        return self.kind in ("volume", "mass")


_AT = re.compile(r"^(.*?)(?:\s*(?:@|\bat\b|_)\s*([0-9.]+)\s*%?(?:\s*O2)?)?$")
_PPM = re.compile(r"^(ppm|ppb|%)\s*(?:vol|v)?\s*(dry|wet|d|w)?$")
_CUBIC = re.compile(r"^(ug|mg|g|kg)/(N|S|ds)?(?:m3|cm)\s*(?:\(\s*(-?[0-9.]+)\s*(?:deg)?C\s*\))?$")
_PER = re.compile(r"^([a-z]+)/([A-Za-z]+)\s*(LHV|HHV|output|out|gross)?$")


def read_unit(text: str) -> EmissionUnit:
    """Return the unit that ``text`` names, e.g. ``"ppmvd@15"`` or ``"lb/MMBtu HHV"``.

    Raises
    ------
    InputError
        Not a unit of emission, or one that leaves open what it means.
    """
    plain = " ".join(text.split()).replace("³", "3").replace("Nm^3", "Nm3").replace("m^3", "m3")
    plain = re.sub(r"^(ppm(?:v)?(?:d|w)?)([0-9]{1,2})$", r"\1@\2", plain)
    split = _AT.match(plain)
    body, reference = (split[1], split[2]) if split else (plain, None)
    oxygen = None
    if reference is not None:
        oxygen = float(reference) / 100.0
        if not 0.0 <= oxygen < 0.2:
            raise _refused(text, "the reference O2 is in percent and below 20, as in ppmvd@15")
    found = _by_volume(body, oxygen) or _by_cubic_metre(text, body, oxygen)
    if found is not None:
        return found
    if oxygen is not None:
        raise _refused(text, "only a concentration has a reference O2")
    return _per_something(text, body)


def _by_volume(body: str, oxygen: float | None) -> EmissionUnit | None:
    match = _PPM.match(body)
    if match is None:
        return None
    factor = {"ppm": 1e-6, "ppb": 1e-9, "%": 1e-2}[match[1]]
    moisture: Literal["wet", "dry"] = "wet" if (match[2] or "d")[0] == "w" else "dry"
    name = "% vol " + moisture if match[1] == "%" else f"{match[1]}v{moisture[0]}"
    return EmissionUnit(name + _suffix(oxygen), "volume", factor, moisture, oxygen)


def _by_cubic_metre(text: str, body: str, oxygen: float | None) -> EmissionUnit | None:
    match = _CUBIC.match(body)
    if match is None:
        return None
    if match[2] is None and match[3] is None:
        raise _refused(
            text, "say at which temperature: mg/Nm3 (0 degC), mg/Sm3 (15 degC) or mg/m3(20C)"
        )
    kelvin = float(match[3]) + 273.15 if match[3] is not None else _FIXED[match[2]]
    cubic = "dscm" if match[2] == "ds" else f"{match[2] or ''}m3"
    stated = f"({match[3]}C)" if match[3] is not None else ""
    name = f"{match[1]}/{cubic}{stated}{_suffix(oxygen)}"
    return EmissionUnit(name, "mass", _MASS[match[1]], "dry", oxygen, kelvin)


def _per_something(text: str, body: str) -> EmissionUnit:
    if body in ("EI", "g/kg", "g/kg fuel"):
        return EmissionUnit("g/kg fuel", "index", 1e-3)
    if body in ("% mass", "wt%", "% wt"):
        return EmissionUnit("% mass of fuel", "fuel mass", 1e-2)
    if body in ("lb/1000 lb", "lb/klb"):
        return EmissionUnit("lb/1000 lb fuel", "index", 1e-3)
    match = _PER.match(body)
    if match is None or match[1] not in _MASS:
        raise _refused(text, _KNOWN)
    mass, per, tail = _MASS[match[1]], match[2], match[3]
    name = f"{match[1]}/{per}"
    if per in _TIME and tail is None:
        return EmissionUnit(name, "rate", mass / _TIME[per])
    if per in ("yr", "year", "a") and tail is None:
        return EmissionUnit(f"{match[1]}/yr", "year", mass)
    if per == "kN" and tail is None:
        return EmissionUnit(name, "thrust", mass / 1e3)
    if per not in _ENERGY:
        raise _refused(text, _KNOWN)
    factor = mass / _ENERGY[per]
    if tail in ("output", "out", "gross") or (per in ("kWh", "MWh") and tail is None):
        shown = name if per in ("kWh", "MWh") else f"{name} output"
        return EmissionUnit(shown, "output", factor)
    heat: Heat | None = "LHV" if tail == "LHV" else "HHV" if tail == "HHV" else None
    if heat is None and per == "MMBtu":
        heat = "HHV"
    shown = name if heat is None else f"{name} {heat}"
    return EmissionUnit(shown, "heat", factor, heat=heat)


_KNOWN = (
    "known: ppmvd@15, ppmvw, ppb, mg/Nm3@15, mg/m3(20C), g/kg, g/MJ LHV, ng/J HHV, lb/MMBtu, "
    "ng/J output, g/kWh, lb/MWh, kg/h, t/yr, g/kN, % vol, % mass"
)


def _suffix(oxygen: float | None) -> str:
    return "" if oxygen is None else f"@{100.0 * oxygen:.4g}"


def _refused(text: str, allowed: str) -> InputError:
    return InputError(Problem("not a unit of emission", allowed, "unit", text))
