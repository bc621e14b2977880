"""Areas from flows: the air split turned round, then whole holes and drills, then re-solved."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass

from combustor.airflow.discharge import (
    DOME_PLATE,
    METERING_STATIC,
    PLAIN_LIMIT,
    SHARP,
)
from combustor.airflow.result import AirSplit, Inlet, LinerGas
from combustor.airflow.split import split
from combustor.base.convergence import Convergence
from combustor.base.errors import InfeasibleError, NotConvergedError
from combustor.base.method import Method
from combustor.hardware.metal import Hardware
from combustor.sizing.metal import metal_of
from combustor.sizing.sketch import DOME, LEAK, PREMIXER, SWIRLER, Sketch

AREAS = Method(
    key="areas-by-air-split",
    quantity="area of every opening",
    source="the air split solved for area: each row scaled until its flow and the loss are met",
    reading="computed",
)

TOLERANCE = 1e-6
_FIRST_COEFFICIENT = {DOME: DOME_PLATE, LEAK: SHARP, SWIRLER: 0.6, PREMIXER: 0.6}
_LEAST_OPENING_SHARE = 0.15


@dataclass(frozen=True)
class Aim:
    """What the areas are to give.

    Parameters
    ----------
    shares : mapping of str to float
        Share of all air by opening [-]
    pressure_loss : float
        Over inlet total pressure [-]
    """

    shares: Mapping[str, float]
    pressure_loss: float


@dataclass(frozen=True)
class Fit:
    """Areas that meet an aim, before any rounding; ``areas`` are whole rows of one can, m2."""

    areas: dict[str, float]
    hardware: Hardware
    split: AirSplit
    convergence: Convergence


def first_areas(sketch: Sketch, aim: Aim, inlet: Inlet) -> dict[str, float]:
    """Return areas by usual discharge coefficients at four fifths of the loss [m2]."""
    density = inlet.pressure / (inlet.gas_constant * inlet.temperature)
    flux = math.sqrt(2.0 * density * 0.8 * aim.pressure_loss * inlet.pressure)
    areas = {}
    for name, share in aim.shares.items():
        coefficient = _FIRST_COEFFICIENT.get(name)
        if coefficient is None:
            coefficient = METERING_STATIC if name.startswith("film") else 0.9 * PLAIN_LIMIT
        areas[name] = share * inlet.mass_flow / (coefficient * flux * sketch.section.cans)
    return areas


def fit_areas(
    sketch: Sketch,
    aim: Aim,
    inlet: Inlet,
    gas: LinerGas,
    start: Mapping[str, float] | None = None,
    guess: AirSplit | None = None,
    passes: int = 30,
) -> Fit:
    """Return the areas that pass the wanted flows at the wanted loss.

    Each pass solves the air split, scales every row by wanted over solved flow and all rows
    by the square root of solved over wanted loss across the openings.

    Parameters
    ----------
    sketch : Sketch
    aim : Aim
    inlet : Inlet
    gas : LinerGas
    start : mapping of str to float or None
        Areas to start from [m2]
    guess : AirSplit or None
        A neighbouring split.
    passes : int

    Raises
    ------
    InfeasibleError
        Diffuser and heating leave the openings too little of the loss, or a row would have
        to draw from air that is too fast.
    """
    areas = dict(start) if start is not None else first_areas(sketch, aim, inlet)
    residual = math.inf
    for iteration in range(passes):
        hardware = metal_of(sketch, areas, drilled=False)
        solved = _solve(hardware, inlet, gas, guess)
        guess = solved
        ratios = {
            flow.name: aim.shares[flow.name] * inlet.mass_flow / max(flow.mass_flow, 1e-12)
            for flow in solved.openings
        }
        lost = solved.pressure_loss_parts["diffuser"] + solved.pressure_loss_parts["hot"]
        left = aim.pressure_loss - lost
        if left < _LEAST_OPENING_SHARE * aim.pressure_loss:
            _refuse_loss(aim, solved)
        scale = math.sqrt((solved.pressure_loss - lost) / left)
        residual = max(
            max(abs(ratio - 1.0) for ratio in ratios.values()),
            abs(solved.pressure_loss / aim.pressure_loss - 1.0),
        )
        if residual < TOLERANCE:
            return Fit(areas, hardware, solved, Convergence(True, residual, iteration + 1))
        areas = {
            name: area * min(max(ratios[name], 0.3), 3.0) * scale for name, area in areas.items()
        }
    _refuse_fast_annulus(solved)
    return Fit(
        areas,
        hardware,
        solved,
        Convergence(False, residual, passes, "areas do not settle on the wanted flows"),
    )


def _solve(hardware: Hardware, inlet: Inlet, gas: LinerGas, guess: AirSplit | None) -> AirSplit:
    solved = split(hardware, inlet, gas, guess=guess)
    if not solved.convergence.converged:
        raise NotConvergedError(
            "the air split of the sized metal was not found: " + solved.convergence.message
        )
    return solved


def _refuse_loss(aim: Aim, solved: AirSplit) -> None:
    parts = solved.pressure_loss_parts
    least = (parts["diffuser"] + parts["hot"]) / (1.0 - 2.0 * _LEAST_OPENING_SHARE)
    raise InfeasibleError(
        (
            f"the diffuser takes {100 * parts['diffuser']:.2f} % and the heating "
            f"{100 * parts['hot']:.2f} % of the inlet pressure",
            f"of the wanted loss of {100 * aim.pressure_loss:.2f} % the openings get "
            f"{100 * (aim.pressure_loss - parts['diffuser'] - parts['hot']):.2f} %",
            "the jets would be too weak to mix, whatever the area of the openings",
        ),
        f"Allow a pressure_loss of {100 * least:.1f} % or more, a wider inlet_annulus, or a "
        "diffuser with less loss.",
    )


def _refuse_fast_annulus(solved: AirSplit) -> None:
    for flow in solved.openings:
        if flow.head_ratio <= 1.05:
            raise InfeasibleError(
                (
                    f"the annulus passes {flow.name} so fast that its dynamic head is "
                    f"{100 / max(flow.head_ratio, 1e-9):.0f} % of the head across the liner",
                    f"hardly any air turns into {flow.name}, whatever its area",
                ),
                "Allow a higher pressure_loss, state a lower annulus_velocity or "
                "liner_area_ratio, or give the casing more room.",
            )
