"""Pattern factor of a liner whose air split is solved; shared with rating."""

from __future__ import annotations

from combustor.airflow.result import AirSplit, Inlet
from combustor.hardware.metal import Hardware
from combustor.sizing.reference_area import corrected_loss
from combustor.sizing.zones import law_area, pattern_factor

JET_ROLES = ("primary", "secondary", "dilution")


def liner_drop(split: AirSplit) -> float:
    """Return the mean drop across the liner wall that drives its jets, by their flow [Pa].

    Without any jets, that of all openings.
    """
    jets = [flow for flow in split.openings if flow.role in JET_ROLES and flow.mass_flow > 0.0]
    jets = jets or [flow for flow in split.openings if flow.mass_flow > 0.0]
    total = sum(flow.mass_flow for flow in jets)
    return sum(f.mass_flow * (f.driving_pressure - f.liner_pressure) for f in jets) / total


def liner_loss_factor(hardware: Hardware, inlet: Inlet, split: AirSplit) -> float:
    """Return the loss over the liner in reference dynamic heads, dP_L/q_ref [-]."""
    liner_area = float(hardware.liner.area.at(0.0)) * hardware.cans
    head = corrected_loss(
        inlet.mass_flow,
        inlet.temperature,
        inlet.pressure,
        law_area(hardware.reference_area, liner_area, hardware.layout == "can-annular"),
        inlet.gas_constant,
    )
    return liner_drop(split) / (head * inlet.pressure)


def pattern_factor_of(hardware: Hardware, inlet: Inlet, split: AirSplit) -> float:
    """Return the pattern factor by Lefebvre's law [-].

    The mixing length is that of the liner; the transition duct, where mixing goes on, is
    left out, so the estimate is on the high side where there is one.

    Parameters
    ----------
    hardware : Hardware
    inlet : Inlet
    split : AirSplit
    """
    factor = liner_loss_factor(hardware, inlet, split)
    length_ratio = hardware.liner_length / hardware.liner_height
    return pattern_factor(length_ratio, factor, hardware.layout != "annular")
