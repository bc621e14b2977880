"""Reference area: the larger of pressure-loss sizing and chemical loading."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from combustor.base.method import Method
from combustor.sizing.section import Section

PRESSURE_LOSS_SIZING = Method(
    key="reference-area-pressure-loss",
    quantity="reference area from pressure loss",
    source="Lefebvre 1983, Gas Turbine Combustion: loss over reference dynamic head of 37 "
    "(can), 28 (can-annular), 20 (annular); identity loss = factor x q_ref",
    reading="from memory",
    validity={"pressure_loss": (0.02, 0.10)},
    note="published loss, factor and corrected flow of the three layouts agree within 2 %",
)
CHEMICAL_LOADING = Method(
    key="reference-area-chemical-loading",
    quantity="reference area from chemical loading",
    source="Greenhough & Lefebvre 1957, burning-velocity loading; 73e6 as design number from "
    "Melconian & Modak 1985",
    reading="from memory",
    validity={"temperature": (200.0, 1000.0)},
    note="temperature scale 300 K, constant",
)
RELIGHT_LOADING = Method(
    key="reference-area-relight-loading",
    quantity="chemical loading asked of a relight point",
    source="light-up and altitude relight seen between 1e6 and 5e6",
    reading="judgement",
    scatter="factor 2 either way: low confidence",
)

PRESSURE_LOSS_FACTOR: Mapping[str, float] = {"can": 37.0, "can-annular": 28.0, "annular": 20.0}
LOADING_TEMPERATURE = 300.0
REQUIRED_LOADING: Mapping[str, float] = {
    "rated": 73e6,
    "part": 73e6,
    "idle": 73e6,
    "relight": 3e6,
}


@dataclass(frozen=True)
class LoadingPoint:
    """Combustor inlet at one operating point, as chemical loading sees it: SI."""

    name: str
    kind: str
    air_flow: float
    pressure: float
    temperature: float


def corrected_loss(
    air_flow: float, temperature: float, pressure: float, area: float, gas_constant: float
) -> float:
    """Return reference dynamic head over inlet pressure.

    q_ref/P = R/2 (W sqrt(T) / (A P))^2, from q = W^2/(2 rho A^2) and rho = P/(R T).

    Parameters
    ----------
    air_flow : float
        All air [kg/s]
    temperature, pressure : float
        Inlet totals [K], [Pa]
    area : float
        Reference area [m2]
    gas_constant : float
        [J/(kg K)]

    Returns
    -------
    float
        [-]
    """
    return 0.5 * gas_constant * (air_flow * math.sqrt(temperature) / (area * pressure)) ** 2


def pressure_loss_area(
    air_flow: float,
    temperature: float,
    pressure: float,
    pressure_loss: float,
    loss_factor: float,
    gas_constant: float,
) -> float:
    """Return the reference area that gives a pressure loss at a loss factor.

    Parameters
    ----------
    air_flow : float
        [kg/s]
    temperature, pressure : float
        Inlet totals [K], [Pa]
    pressure_loss : float
        Over inlet total pressure [-]
    loss_factor : float
        Pressure loss over reference dynamic head [-]
    gas_constant : float
        [J/(kg K)]

    Returns
    -------
    float
        Whole machine [m2]
    """
    head = corrected_loss(air_flow, temperature, pressure, 1.0, gas_constant)
    return math.sqrt(head * loss_factor / pressure_loss)


def temperature_scale_kelvin(equivalence_ratio: float) -> float:
    """Return the temperature scale b that follows the primary zone's equivalence ratio [K].

    The design form is published for degrees Rankine, b = 382 (sqrt(2) +- ln(phi/1.03)); in
    kelvin the factor is 382/1.8. Kept as a sibling of the constant 300 K: it makes
    exp(T/b) larger away from stoichiometric, against what mixtures do.
    """
    lean = math.log(equivalence_ratio / 1.03)
    return 382.0 / 1.8 * (math.sqrt(2.0) - abs(lean))


def chemical_loading(
    pressure: float,
    area: float,
    height: float,
    temperature: float,
    air_flow: float,
    temperature_scale: float = LOADING_TEMPERATURE,
) -> float:
    """Return the burning-velocity loading P^1.75 A D^0.75 exp(T/b) / W.

    Parameters
    ----------
    pressure : float
        Inlet total [Pa]
    area : float
        Reference area, whole machine [m2]
    height : float
        Casing diameter (can) or casing height (ring) [m]
    temperature : float
        Inlet total [K]
    air_flow : float
        Whole machine [kg/s]
    temperature_scale : float
        b [K]

    Returns
    -------
    float
        SI units as in the formula.
    """
    return float(
        pressure**1.75 * area * height**0.75 * math.exp(temperature / temperature_scale) / air_flow
    )


def loading_area(point: LoadingPoint, section: Section) -> float:
    """Return the reference area that gives a point the loading its kind needs [m2]."""
    per_area = chemical_loading(point.pressure, 1.0, 1.0, point.temperature, point.air_flow)
    needed = REQUIRED_LOADING[point.kind] / per_area
    height = (needed / section.casing_coefficient) ** (1.0 / (section.casing_exponent + 0.75))
    return section.casing_area(height)


def governing_loading(
    points: Iterable[LoadingPoint], section: Section
) -> tuple[LoadingPoint, float] | None:
    """Return the point that asks for the largest area, and that area [m2]; None for no point."""
    asked = [(loading_area(point, section), point) for point in points]
    if not asked:
        return None
    area, point = max(asked, key=lambda pair: pair[0])
    return point, area
