"""The case that ``combustor new`` writes: commented, and it runs as it is."""

from __future__ import annotations

import json

from combustor.base.errors import InputError, Problem

LAYOUTS = ("can",)

_CAN = """\
# A case file: what the machine offers, what is wanted, at which loads.
# Quantities carry a unit ("9.8 bar", "325 degC", "60 mm", "5 %"); a bare number is SI.
# Pressures are total and absolute. `combustor size FILE -o SIZED` designs the flame tube and
# writes it to a [hardware] table; edit a row there and `combustor rate SIZED` again.
title = "Marrow Quay paper mill, generator 2"

[combustor]
layout = "can"
cans = 1
flow = "straight"                # or "reverse"
casing_diameter = "370 mm"       # bore: the most there is room for
casing_length = "1000 mm"        # compressor-exit flange to turbine-inlet flange
inlet_annulus = { inner = "364 mm", outer = "396 mm" }   # diameters at compressor exit
exit_annulus = { inner = "385 mm", outer = "456 mm" }    # diameters at turbine inlet
transition_length = "200 mm"     # duct from the flame tube to the turbine

[fuel]
# `combustor fuels` lists the names; blends by volume: "natural-gas+30%hydrogen"
name = @FUEL@
temperature = "15 degC"
# composition = { CH4 = "96 %", N2 = "4 %" }   # mole fractions, instead of a name

# One [[points]] table per load. air_flow is moist, after all bleed and turbine cooling air.
# State ONE of exit_temperature, fuel_flow, fuel_air_ratio.
[[points]]
name = "full"
kind = "rated"                   # rated, part, idle or relight
air_flow = "7.5 kg/s"
inlet_pressure = "7.2 bar"
inlet_temperature = "280 degC"
exit_temperature = "950 degC"    # mean total temperature leaving the flame tube
output = "1.4 MW"

[[points]]
name = "three-quarter"
kind = "part"
air_flow = "7.1 kg/s"
inlet_pressure = "6.5 bar"
inlet_temperature = "266 degC"
exit_temperature = "865 degC"

[[points]]
name = "half"
kind = "part"
air_flow = "6.5 kg/s"
inlet_pressure = "5.7 bar"
inlet_temperature = "246 degC"
exit_temperature = "775 degC"

[[points]]
name = "idle"
kind = "idle"
air_flow = "3.1 kg/s"
inlet_pressure = "2.6 bar"
inlet_temperature = "135 degC"
exit_temperature = "545 degC"

[targets]
design_point = "full"            # sizing aims at this point
pressure_loss = "4.8 %"          # total to total: diffuser, liner and heat addition together
front_end = "diffusion"
equivalence_ratio = { primary = 0.95, secondary = 0.60 }   # at the end of each zone
pattern_factor = 0.15            # (hottest - mean) / (mean - inlet) at the exit
wall_temperature = "850 degC"    # metal, gas side
# Sizing may be held to more: leakage, film_air, dome_air, liner_area_ratio, dilution_holes, ...

# [model]                        # reactor networks; left out: the tool's defaults
# unmixedness = 0.4              # standard deviation of mixture fraction over its mean
"""


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
    # the quoting of JSON is a subset of TOML's for text that prints on one line
    return _CAN.replace("@FUEL@", json.dumps(fuel.strip(), ensure_ascii=False))
