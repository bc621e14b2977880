"""Casing: reference area from pressure loss and chemical loading, inside the envelope."""

from __future__ import annotations

import math
from dataclasses import dataclass

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.sizing.duty import Duty
from combustor.sizing.liner_ratio import ANNULUS_VELOCITY, LOWEST_RATIO, SIMPLE_RATIOS
from combustor.sizing.record import Candidate
from combustor.sizing.reference_area import (
    CHEMICAL_LOADING,
    PRESSURE_LOSS_FACTOR,
    PRESSURE_LOSS_SIZING,
    RELIGHT_LOADING,
    REQUIRED_LOADING,
    chemical_loading,
    corrected_loss,
    governing_loading,
    pressure_loss_area,
)
from combustor.sizing.section import CAN_CLEARANCE, Section

HEAT_RELEASE = Method(
    key="space-heating-rate",
    quantity="heat release over liner volume and pressure",
    source="Lefebvre 1983: industrial 10 to 25, aero 40 to 60 MW/m3/atm; the casing holds a liner "
    "of 2.5 heights at 60",
    reading="from memory",
)
HIGHEST_HEAT_RELEASE = 60.0e6
USUAL_LENGTH_RATIO = 2.5
MOST_LOSS = 0.15  # of inlet pressure: no machine gives away more, so none is advised to
ATMOSPHERE = 101325.0


@dataclass(frozen=True)
class Casing:
    """The casing taken.

    Parameters
    ----------
    area : float
        Reference area, whole machine [m2]
    height : float
        Casing diameter or ring height, rounded up to a millimetre [m]
    method : Method
        What decided.
    candidate : Candidate or None
        The criterion that lost.
    note : str
    room : float
        Height there was room for [m]
    """

    area: float
    height: float
    method: Method
    candidate: Candidate | None
    note: str = ""
    room: float = 0.0


def casing_of(
    duty: Duty,
    section: Section,
    layout: str,
    pressure_loss: float,
    room: float,
    annulus_velocity: float,
    annulus_share: float,
) -> Casing:
    """Return the casing.

    Parameters
    ----------
    duty : Duty
    section : Section
    layout : str
        For the usual loss factor.
    pressure_loss : float
        Target, over inlet total pressure [-]
    room : float
        Casing diameter or ring height there is room for [m]
    annulus_velocity : float
        Highest cold velocity allowed in the annulus [m/s]
    annulus_share : float
        Share of the air that passes the annulus [-]

    Raises
    ------
    InfeasibleError
        No casing inside the room meets the pressure loss or the chemical loading.
    """
    inlet = duty.inlet
    factor = PRESSURE_LOSS_FACTOR[layout]
    by_loss = pressure_loss_area(
        inlet.mass_flow,
        inlet.temperature,
        inlet.pressure,
        pressure_loss,
        factor,
        inlet.gas_constant,
    )
    most = section.casing_area(room)
    if by_loss > most:
        _refuse_loss(duty, section, layout, pressure_loss, by_loss, room)
    asked = [(by_loss, PRESSURE_LOSS_SIZING, f"loss factor {factor:.0f}")]
    asked += _loading_demands(duty, section, room)
    velocity_area = (
        annulus_share * inlet.mass_flow / (duty.density * annulus_velocity * (1.0 - LOWEST_RATIO))
    )
    asked.append(
        (
            min(velocity_area, most),
            ANNULUS_VELOCITY,
            f"annulus at {annulus_velocity:.0f} m/s beside the smallest liner",
        )
    )
    asked.append((min(_heat_area(duty, section, layout), most), HEAT_RELEASE, "liner volume"))
    asked.sort(key=lambda entry: entry[0], reverse=True)
    area, method, note = asked[0]
    rival = asked[1]
    lost = Candidate(rival[0], rival[1], f"smaller ({rival[2]})")
    height = min(math.ceil(section.casing_height(area) * 1e3 - 1e-6) / 1e3, room)
    around = section.height_around(section.height(SIMPLE_RATIOS[layout] * area))
    if around > height:
        lost = Candidate(area, method, f"its ring would not hold the cans ({note})")
        height = min(math.ceil(1e3 * around) / 1e3, room)
        method, note = CAN_CLEARANCE, f"ring round {section.cans} cans"
    return Casing(section.casing_area(height), height, method, lost, note, room)


def _heat_area(duty: Duty, section: Section, layout: str) -> float:
    """Return the casing area whose liner takes the heat at the highest usual rate [m2]."""
    heat = duty.fuel_flow * duty.lower_heating_value
    volume = heat / (HIGHEST_HEAT_RELEASE * duty.inlet.pressure / ATMOSPHERE)
    # liner area times a length of so many liner heights; both grow with the height
    power = 3.0 if section.is_round else 2.0
    per_height = USUAL_LENGTH_RATIO * section.area(1.0)
    liner = (volume / per_height) ** (1.0 / power)
    return section.area(liner) / SIMPLE_RATIOS[layout]


def loading_of(duty: Duty, section: Section, height: float) -> dict[str, float]:
    """Return the chemical loading of every operating point by name."""
    return {
        point.name: chemical_loading(
            point.pressure, section.casing_area(height), height, point.temperature, point.air_flow
        )
        for point in duty.points
    }


def _loading_demands(duty: Duty, section: Section, room: float) -> list[tuple[float, Method, str]]:
    most = section.casing_area(room)
    firm = governing_loading([p for p in duty.points if p.kind != "relight"], section)
    loose = governing_loading([p for p in duty.points if p.kind == "relight"], section)
    demands = []
    if firm is not None:
        point, area = firm
        if area > most:
            _refuse_loading(section, point.name, point.kind, area, room)
        demands.append((area, CHEMICAL_LOADING, f"point {point.name}"))
    if loose is not None:
        point, area = loose
        # too weak a rule to refuse a design; a finding says when the room cuts it
        demands.append((min(area, most), RELIGHT_LOADING, f"point {point.name}"))
    return demands


def _refuse_loss(
    duty: Duty, section: Section, layout: str, pressure_loss: float, area: float, room: float
) -> None:
    inlet = duty.inlet
    factor = PRESSURE_LOSS_FACTOR[layout]
    least = factor * corrected_loss(
        inlet.mass_flow,
        inlet.temperature,
        inlet.pressure,
        section.casing_area(room),
        inlet.gas_constant,
    )
    advice = "Give the casing more room."
    if least < MOST_LOSS:
        advice = (
            f"Allow a pressure_loss of {100 * least:.1f} % or more, or give the casing more room."
        )
    raise InfeasibleError(
        (
            f"the pressure loss at {duty.name} is limited to {100 * pressure_loss:.2f} % and a "
            f"{layout} needs about {factor:.0f} reference heads for swirl and jets",
            f"the reference velocity cannot exceed "
            f"{inlet.mass_flow / (duty.density * area):.1f} m/s and the reference area must be "
            f"at least {area * 1e4:.0f} cm2",
            f"the casing would have to be {1e3 * section.casing_height(area):.0f} mm where "
            f"there is room for {1e3 * room:.0f} mm",
            "no area inside the envelope gives this loss",
        ),
        advice,
    )


def _refuse_loading(section: Section, point: str, kind: str, area: float, room: float) -> None:
    raise InfeasibleError(
        (
            f"point {point} ({kind}) needs a chemical loading of "
            f"{REQUIRED_LOADING[kind] / 1e6:.0f}e6 to burn out",
            f"at its flow, pressure and temperature the reference area must be at least "
            f"{area * 1e4:.0f} cm2",
            f"the casing would have to be {1e3 * section.casing_height(area):.0f} mm where "
            f"there is room for {1e3 * room:.0f} mm",
        ),
        "Give the casing more room, or raise inlet pressure or temperature of that point.",
    )
