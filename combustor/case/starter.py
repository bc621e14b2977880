"""The case that ``combustor new`` writes: commented, and it runs as it is."""

from __future__ import annotations

import json
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem

_CASE = """\
# A case file: what the machine offers, what is wanted, at which loads.
# Quantities carry a unit ("9.8 bar", "325 degC", "60 mm", "5 %"); a bare number is SI.
# Pressures are total and absolute. `combustor size FILE -o SIZED` designs the flame tube and
# writes it to a [hardware] table; edit a row there and `combustor rate SIZED` again.
title = "@TITLE@"

[combustor]
@ENVELOPE@

[fuel]
# `combustor fuels` lists the names; blends by volume: "natural-gas+30%hydrogen"
name = @FUEL@
temperature = "15 degC"
# composition = { CH4 = "96 %", N2 = "4 %" }   # mole fractions, instead of a name

# One [[points]] table per load. air_flow is moist, after all bleed and turbine cooling air.
# State ONE of exit_temperature, fuel_flow, fuel_air_ratio.
@POINTS@

[targets]
design_point = "full"            # sizing aims at this point
pressure_loss = "@LOSS@"           # total to total: diffuser, liner and heat addition together
front_end = "diffusion"          # or "rich-lean", "lean-premixed"
equivalence_ratio = { primary = 0.95, secondary = 0.60 }   # at the end of each zone
pattern_factor = @PATTERN@            # (hottest - mean) / (mean - inlet) at the exit
wall_temperature = "850 degC"    # metal, gas side
# Sizing may be held to more: leakage, film_air, dome_air, liner_area_ratio, dilution_holes, ...

# [model]                        # reactor networks; left out: the tool's defaults
# unmixedness = 0.4              # standard deviation of mixture fraction over its mean
"""

_CAN = """\
layout = "can"
cans = 1
flow = "straight"                # or "reverse"
casing_diameter = "370 mm"       # bore: the most there is room for
casing_length = "1000 mm"        # compressor-exit flange to turbine-inlet flange
inlet_annulus = { inner = "364 mm", outer = "396 mm" }   # diameters at compressor exit
exit_annulus = { inner = "385 mm", outer = "456 mm" }    # diameters at turbine inlet
transition_length = "200 mm"     # duct from the flame tube to the turbine"""

_CAN_ANNULAR = """\
layout = "can-annular"
cans = 10                        # flame tubes in one casing, joined by cross-fire tubes
flow = "straight"                # or "reverse"
casing_outer_diameter = "960 mm" # the most there is room for; air passes between the cans
casing_inner_diameter = "520 mm"
casing_length = "1000 mm"        # compressor-exit flange to turbine-inlet flange
inlet_annulus = { inner = "610 mm", outer = "668 mm" }   # diameters at compressor exit
exit_annulus = { inner = "640 mm", outer = "760 mm" }    # diameters at turbine inlet
transition_length = "220 mm"     # duct from each flame tube to the turbine"""

_ANNULAR = """\
layout = "annular"
flow = "straight"                # or "reverse"
casing_outer_diameter = "700 mm" # the most there is room for
casing_inner_diameter = "400 mm"
casing_length = "520 mm"         # compressor-exit flange to turbine-inlet flange
inlet_annulus = { inner = "520 mm", outer = "566 mm" }   # diameters at compressor exit
exit_annulus = { inner = "500 mm", outer = "590 mm" }    # diameters at turbine inlet"""

_POINT = """\
[[points]]
name = "@NAME@"
kind = "@KIND@"
air_flow = "@AIR@ kg/s"
inlet_pressure = "@PRESSURE@ bar"
inlet_temperature = "@INLET@ degC"
exit_temperature = "@EXIT@ degC"
"""

_KINDS = "                   # rated, part, idle or relight"
_EXIT = "mean total temperature leaving the flame tube"

Load = tuple[str, str, float, float, float, float]


@dataclass(frozen=True)
class _Machine:
    """What differs from layout to layout; loads are name, kind, kg/s, bar, degC in and out."""

    title: str
    envelope: str
    loads: tuple[Load, ...]
    loss: str
    pattern: str


_MACHINES = {
    "can": _Machine(
        "Marrow Quay paper mill, generator 2",
        _CAN,
        (
            ("full", "rated", 7.5, 7.2, 280, 950),
            ("three-quarter", "part", 7.1, 6.5, 266, 865),
            ("half", "part", 6.5, 5.7, 246, 775),
            ("idle", "idle", 3.1, 2.6, 135, 545),
        ),
        "4.8 %",
        "0.15",
    ),
    "can-annular": _Machine(
        "Sellow Head power station, unit 4",
        _CAN_ANNULAR,
        (
            ("full", "rated", 42.0, 12.5, 360, 950),
            ("three-quarter", "part", 39.0, 11.2, 340, 870),
            ("half", "part", 35.0, 9.6, 315, 780),
            ("idle", "idle", 15.0, 4.0, 190, 600),
        ),
        "5.5 %",
        "0.15",
    ),
    "annular": _Machine(
        "Tern Bank gas compressor, driver C",
        _ANNULAR,
        (
            ("full", "rated", 24.0, 15.0, 390, 1060),
            ("three-quarter", "part", 22.0, 13.3, 370, 980),
            ("half", "part", 19.5, 11.3, 345, 890),
            ("idle", "idle", 8.5, 4.6, 215, 650),
        ),
        "5.5 %",
        "0.20",
    ),
}
LAYOUTS = tuple(_MACHINES)


def starter_text(layout: str = "can", fuel: str = "natural-gas") -> str:
    """Return a commented case for a layout and a fuel name.

    Raises
    ------
    InputError
        No starter for that layout; the fuel name is no text for one line.
    """
    if layout not in LAYOUTS:
        allowed = f"starter cases exist for {', '.join(LAYOUTS)}"
        raise InputError(Problem("no starter case for this layout", allowed, "layout", layout))
    if not fuel.strip() or not fuel.isprintable():
        raise InputError(Problem("is not a fuel name", "", "fuel", fuel))
    machine = _MACHINES[layout]
    text = _CASE.replace("@TITLE@", machine.title).replace("@ENVELOPE@", machine.envelope)
    text = text.replace("@LOSS@", machine.loss).replace("@PATTERN@", machine.pattern)
    text = text.replace("@POINTS@\n", "\n".join(_point(load) for load in machine.loads))
    # the quoting of JSON is a subset of TOML's for text that prints on one line
    return text.replace("@FUEL@", json.dumps(fuel.strip(), ensure_ascii=False))


def _point(load: Load) -> str:
    name, kind, air, pressure, inlet, leaving = load
    values = {
        "NAME": name,
        "KIND": kind,
        "AIR": f"{air:g}",
        "PRESSURE": f"{pressure:g}",
        "INLET": f"{inlet:g}",
        "EXIT": f"{leaving:g}",
    }
    text = _POINT
    for key, value in values.items():
        text = text.replace(f"@{key}@", value)
    if kind == "rated":
        text = text.replace('"rated"\n', f'"rated"{_KINDS}\n')
        text = text[:-1] + f"    # {_EXIT}\n"
    return text
