"""Random combustors to size: machines a compressor could feed, envelope left free.

A scrambled Sobol sequence over pressure, compression, flow, temperature rise, layout, front end
and fuel. What an engineer would choose by looking at the machine (zone equivalence ratios, wall
material, compressor-exit annulus, room) follows from it by the rules below.
"""

import math

from scipy.stats import qmc

from combustor.case import loads_case
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.sizing.fire import Supply, fuel_air_ratio_for
from combustor.sizing.reference_area import PRESSURE_LOSS_FACTOR, LoadingPoint, loading_area
from combustor.sizing.section import Section

SEED = 20260714
LAYOUTS = ("can", "can-annular", "annular")
FRONT_ENDS = ("diffusion", "rich-lean", "lean-premixed")
FUELS = ("natural-gas", "methane", "hydrogen", "propane")
MOST_PER_CAN = 15.0
LOSS = 0.05

_gases = {}


def fuel_and_gas(name):
    """Return fuel and loaded gas, each loaded once."""
    if name not in _gases:
        fuel = catalogue.find(name)
        _gases[name] = (fuel, Gas.load(fuel.mechanism))
    return _gases[name]


def points(count):
    """Return the machines as dictionaries, the first of the sequence."""
    whole = 1 << max(count - 1, 1).bit_length()
    sequence = qmc.Sobol(8, scramble=True, rng=SEED).random(whole)[:count]
    return [machine(row) for row in sequence.tolist()]


def machine(row):
    """Return pressure Pa, temperatures K, flow kg/s and the rest of one machine."""
    pressure = 1.5e5 * (45.0 / 1.5) ** row[0]
    efficiency = 0.80 + 0.12 * row[1]
    ratio = pressure / 101325.0
    inlet = 288.15 * ratio ** (0.4 / 1.4 / efficiency) * (0.85 + 0.30 * row[2])
    flow = 0.1 * 1200.0 ** row[3]
    rise = 300.0 + 1000.0 * row[4]
    return {
        "pressure": pressure,
        "inlet": inlet,
        "flow": flow,
        "exit": inlet + rise,
        "layout": LAYOUTS[int(3 * row[5])],
        "front_end": FRONT_ENDS[int(3 * row[6])],
        "fuel": FUELS[int(4 * row[7])],
    }


def cans_of(one):
    """Return the number of cans: 15 kg/s each at most, six at least round a ring."""
    if one["layout"] == "annular":
        return 1
    least = math.ceil(one["flow"] / MOST_PER_CAN)
    return least if one["layout"] == "can" else max(least, 6)


def overall_of(one):
    """Return the exit equivalence ratio, None where no flame reaches the exit temperature."""
    fuel, gas = fuel_and_gas(one["fuel"])
    supply = Supply(one["pressure"], one["inlet"], 0.00634, 288.15)
    return fuel_air_ratio_for(gas, fuel, supply, one["exit"]) / fuel.stoichiometric_fuel_air_ratio


def area_of(one, cans, overall):
    """Return about the casing area a machine needs: for its loss, its loading and its heat."""
    factor = PRESSURE_LOSS_FACTOR[one["layout"]]
    head = 143.8 * (one["flow"] * math.sqrt(one["inlet"]) / one["pressure"]) ** 2
    by_loss = area = math.sqrt(head * factor / LOSS)
    fuel, _ = fuel_and_gas(one["fuel"])
    heat = overall * fuel.stoichiometric_fuel_air_ratio * one["flow"] * fuel.lower_heating_value
    volume = heat / (60e6 * one["pressure"] / 101325.0)
    point = LoadingPoint("full", "rated", one["flow"], one["pressure"], one["inlet"])
    for _ in range(3):
        section = section_for(one, cans, area)
        liner = section.area((volume / (2.5 * section.area(1.0))) ** (1 / (2 + section.is_round)))
        area = max(by_loss, loading_area(point, section), liner / 0.66)
    return area


def section_for(one, cans, area):
    """Return the section whose ring has room for a casing area."""
    if one["layout"] == "can":
        return Section(cans)
    if one["layout"] == "annular":
        return Section(1, math.sqrt(area / (math.pi * 0.13)))
    can = math.sqrt(4.0 * 0.66 * area / (math.pi * cans))
    return Section(cans, 1.25 * cans * can / math.pi)


def case_of(one, overall):
    """Return the case of a machine."""
    cans = cans_of(one)
    density = one["pressure"] / (287.6 * one["inlet"])
    # compressor exit at about Mach 0.22, blades a tenth of the mean diameter long
    entry = one["flow"] / (density * 0.22 * math.sqrt(1.38 * 287.6 * one["inlet"]))
    entry_gap = math.sqrt(0.1 * entry / math.pi)
    area = area_of(one, cans, overall)
    leaving = entry * (one["exit"] / one["inlet"]) ** 0.5
    leaving_gap = math.sqrt(0.12 * leaving / math.pi)
    return loads_case(
        f"""
title = "random machine"
[combustor]
layout = "{one["layout"]}"
cans = {cans}
{_envelope(one, cans, area)}
casing_length = {_length(one, cans, area)}
inlet_annulus = {_ring(10.0 * entry_gap, entry_gap)}
exit_annulus = {_ring(leaving_gap / 0.12, leaving_gap)}
transition_length = {0.0 if one["layout"] == "annular" else 0.5 * math.sqrt(area / cans)}
[fuel]
name = "{one["fuel"]}"
[[points]]
name = "full"
kind = "rated"
air_flow = {one["flow"]}
inlet_pressure = {one["pressure"]}
inlet_temperature = {one["inlet"]}
exit_temperature = {one["exit"]}
[targets]
design_point = "full"
pressure_loss = {LOSS}
front_end = "{one["front_end"]}"
equivalence_ratio = {_ratios(one["front_end"], overall, one["inlet"])}
pattern_factor = 0.20
wall_temperature = {max(1150.0, one["inlet"] + 300.0)}
""",
        "random.toml",
    )


def _length(one, cans, area):
    """Return a casing length that never binds: twenty liner heights and a metre."""
    height = section_for(one, cans, area).casing_height(area)
    return min(20.0 * height + 1.0, 30.0)


def _ring(mean, gap):
    return f"{{ inner = {mean - gap}, outer = {mean + gap} }}"


def _envelope(one, cans, area):
    if one["layout"] == "can":
        return f"casing_diameter = {3.0 * math.sqrt(4.0 * area / (math.pi * cans))}"
    mean = section_for(one, cans, area).mean_diameter
    if one["layout"] == "annular":
        return _casing(mean, 0.45 * mean)
    can = math.sqrt(4.0 * 0.66 * area / (math.pi * cans))
    return _casing(mean, min(2.5 * can, 0.9 * mean))


def _casing(mean, room):
    return f"casing_outer_diameter = {mean + room}\ncasing_inner_diameter = {mean - room}"


def _ratios(front_end, overall, inlet):
    """Return the zone equivalence ratios an engineer would aim at for an exit."""
    if front_end == "lean-premixed":
        # a colder inlet needs a richer flame to hold
        least = 0.42 + 0.20 * max(0.0, (650.0 - inlet) / 350.0)
        return f"{{ primary = {min(max(overall / 0.64, least), 0.78):.3f} }}"
    rich = 0.95 if front_end == "diffusion" else 1.6
    return f"{{ primary = {rich}, secondary = {min(max(overall / 0.68, 0.45), 0.85):.3f} }}"
