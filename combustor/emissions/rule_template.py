"""A rule file to fill in: the user's own permit, or a shipped set to complete."""

from __future__ import annotations

from combustor.base.errors import InputError, Problem
from combustor.emissions.rule_set import find_rules, names, shipped_text

_TEMPLATE = """\
# A permit as a rule set. Name this file in the case, [rules] names = ["{file}"], or after
# combustor comply CASE --rules. Quantities take a unit; every key is checked.
title = "Permit of my machine"
jurisdiction = "my authority"
reference = "permit no. ..., condition ..."
edition = "as issued"
date = 2025-01-01
review = 2030-01-01
applies_to = "this machine"
oxygen_in_air = "20.9 %"        # the rule's own constant: 20.9, 20.95 or 21 %
reference_oxygen = "15 %"
heating_value = "LHV"           # on which heat input and limits per heat are counted

# One [[limits]] table a limit. Units: ppmvd@15, mg/Nm3@15, mg/m3(20C)@15, g/kg, g/MJ LHV,
# ng/J HHV, lb/MMBtu HHV, g/kWh, lb/MWh, kg/h, t/yr (needs [rules] hours), % mass (fuel sulfur).
[[limits]]
row = "nox"
pollutant = "NOx"               # NOx NO NO2 CO UHC N2O NH3 SO2 SO3 CO2
limit = 50
unit = "mg/Nm3@15"
when = [{{ load = {{ at_least = "70 %" }} }}]   # leave out where it always binds
averaging = "daily mean"
rounding = {{ decimals = 0 }}
reading = "own permit"          # official text, copy, older edition, from memory, derived
read_in = "condition ..."

[[limits]]
row = "co"
pollutant = "CO"
limit = 100
unit = "mg/Nm3@15"
rounding = {{ decimals = 0 }}
reading = "own permit"
read_in = "condition ..."
"""


def template(file: str, name: str | None = None) -> str:
    """Return the text of a rule file to fill in.

    Parameters
    ----------
    file : str
        Its own name, for the comment that says how to use it.
    name : str, optional
        A shipped set to start from instead.

    Raises
    ------
    InputError
        No shipped set of that name.
    """
    if name is None:
        return _TEMPLATE.format(file=file)
    if name not in names():
        find_rules(name)
        raise InputError(Problem("is a file of your own already", "copy it", "rules", name))
    return shipped_text(name)
