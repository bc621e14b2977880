"""Law of every opening at once: discharge coefficient, flow, and the momentum of its jet.

All quantities are for the whole machine; the last axis is the opening.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from combustor.airflow.discharge import (
    PLAIN_LIMIT,
    PLUNGED_LIMIT,
    constant_coefficient,
    discharge_coefficient_crossflow,
    swirler_effective_area,
)
from combustor.airflow.result import Array, Inlet
from combustor.base.errors import InputError, Problem
from combustor.gasdynamics import jet_velocity, orifice_flux
from combustor.hardware.metal import Hardware, Opening

CROSSFLOW_EDGES = ("plain", "plunged")


@dataclass(frozen=True)
class OpeningLaws:
    """Constants of the openings that can flow (count above 0), in the metal's order.

    ``index`` points into the metal's openings. ``fixed_area`` is nan where the discharge
    coefficient follows the annulus flow. ``limit`` is the coefficient at rest of a hole with
    cross-flow, else nan. ``axial`` is the axial share of the jet velocity where it does not
    depend on the flow, else nan. ``lip_area`` is the film slot's, nan without one.
    """

    openings: tuple[Opening, ...]
    index: tuple[int, ...]
    area: Array
    fixed_area: Array
    limit: Array
    crossflow: Array
    varying: Array
    static_fed: Array
    axial: Array
    speed_share: Array
    lip_area: Array
    same_station: Array

    @property
    def count(self) -> int:
        """Number of openings that can flow."""
        return len(self.index)

    @property
    def area_at_rest(self) -> Array:
        """Effective areas with the annulus at rest, m2."""
        return np.where(self.varying, self.limit * self.area, self.fixed_area)


def opening_laws(hardware: Hardware) -> OpeningLaws:
    """Return the laws of every opening of the metal; InputError for one that has none."""
    flowing = [
        (index, opening) for index, opening in enumerate(hardware.openings) if opening.count > 0
    ]
    problems = [problem for _, opening in flowing for problem in _problems(opening, hardware)]
    if problems:
        raise InputError(problems)
    openings = tuple(opening for _, opening in flowing)
    cans = hardware.cans
    area = np.array([o.count * o.area * cans for o in openings], dtype=float)
    fixed = np.array([_fixed_area(o, hardware) for o in openings], dtype=float)
    crossflow = np.array(
        [o.edge in CROSSFLOW_EDGES and o.side != "dome" for o in openings], dtype=bool
    )
    limit = np.array([_limit(o) for o in openings], dtype=float)
    return OpeningLaws(
        openings=openings,
        index=tuple(index for index, _ in flowing),
        area=area,
        fixed_area=fixed,
        limit=limit,
        crossflow=crossflow,
        varying=np.isnan(fixed),
        static_fed=np.array([o.feed == "static" for o in openings], dtype=bool),
        axial=np.array([_axial_share(o) for o in openings], dtype=float),
        speed_share=np.array(
            [_speed_share(o, f, cans) for o, f in zip(openings, fixed, strict=True)], dtype=float
        ),
        lip_area=np.array(
            [o.slot.height * o.slot.length * cans if o.slot else math.nan for o in openings],
            dtype=float,
        ),
        same_station=np.array(
            [[_same_station(one, other) for other in openings] for one in openings], dtype=float
        ).reshape(len(openings), len(openings)),
    )


def _problems(opening: Opening, hardware: Hardware) -> list[Problem]:
    problems = []
    key = f"hardware opening {opening.name!r}"
    if opening.effective_area is None and not opening.area > 0.0:
        problems.append(
            Problem("area of one opening is not positive", "give a size above 0", key, opening.area)
        )
    if opening.effective_area is not None and not opening.effective_area > 0.0:
        problems.append(
            Problem(
                "measured effective area is not positive",
                "give an area above 0, or count = 0 for a closed row",
                key,
                opening.effective_area,
            )
        )
    if opening.side != "dome" and opening.side not in {passage.side for passage in hardware.annuli}:
        problems.append(
            Problem(
                "no annulus on this side",
                "use one of " + ", ".join(passage.side for passage in hardware.annuli),
                key,
                opening.side,
            )
        )
    if opening.station < 0.0:
        problems.append(
            Problem("station lies before the dome face", "0 m or more", key, opening.station)
        )
    if _has_own_law(opening):
        if opening.edge == "swirler" and opening.swirler is None:
            problems.append(
                Problem(
                    "a swirler without vanes",
                    "give the vane pack, a discharge coefficient or a measured effective area",
                    key,
                )
            )
        crossflow = opening.edge in CROSSFLOW_EDGES and opening.side != "dome"
        if crossflow and opening.feed == "static":
            problems.append(
                Problem(
                    "the discharge law of this edge refers to annulus total pressure",
                    "set feed total, or give a discharge coefficient",
                    key,
                    opening.feed,
                )
            )
    return problems


def _has_own_law(opening: Opening) -> bool:
    return opening.effective_area is None and opening.discharge_coefficient is None


def _fixed_area(opening: Opening, hardware: Hardware) -> float:
    if opening.effective_area is not None:
        return opening.effective_area * hardware.cans
    area = opening.count * opening.area * hardware.cans
    constant = constant_coefficient(opening)
    if constant is not None:
        return constant * area
    if opening.edge == "swirler":
        vanes = opening.swirler
        assert vanes is not None  # _problems() refuses a swirler without vanes
        liner_area = float(hardware.liner.area.at(opening.station)) * hardware.cans
        return swirler_effective_area(area, vanes.vane_angle, vanes.vane_loss, liner_area)
    if opening.side == "dome":
        return _limit(opening) * area
    return math.nan


def _limit(opening: Opening) -> float:
    return PLUNGED_LIMIT if opening.edge == "plunged" else PLAIN_LIMIT


def _axial_share(opening: Opening) -> float:
    """Cosine of the jet's angle from the axis; nan where it follows the annulus flow."""
    if opening.swirler is not None:
        return math.cos(opening.swirler.vane_angle)
    if opening.side == "dome" or opening.role == "film":
        return 1.0
    if opening.edge in CROSSFLOW_EDGES:
        return math.nan
    return 0.0


def _speed_share(opening: Opening, effective_area: float, cans: int) -> float:
    """Velocity leaving the opening over the ideal one: vanes lose head, holes only contract."""
    if opening.swirler is None:
        return 1.0
    throat = opening.count * opening.area * cans * math.cos(opening.swirler.vane_angle)
    return min(1.0, effective_area / throat)


def _same_station(one: Opening, other: Opening) -> bool:
    return one.side == other.side and abs(one.station - other.station) <= 1.0e-6


@dataclass
class OpeningState:
    """Every opening in the latest sweep; see :class:`OpeningFlow` for the meaning."""

    head_ratio: Array
    bleed_ratio: Array
    effective_area: Array
    law_flow: Array
    velocity: Array
    density: Array
    axial: Array
    driving_pressure: Array
    temperature: Array


def opening_state(
    laws: OpeningLaws,
    inlet: Inlet,
    *,
    mass_flow: Array,
    annulus_flow: Array,
    total_pressure: Array,
    static_pressure: Array,
    temperature: Array,
    liner_pressure: Array,
) -> OpeningState:
    """Return flow and jet of every opening for given pressures on both sides.

    Parameters
    ----------
    laws : OpeningLaws
    inlet : Inlet
        For the properties of air.
    mass_flow : ndarray
        Present estimate of the openings' flows, kg/s; sets the bleed ratios.
    annulus_flow, total_pressure, static_pressure, temperature : ndarray
        Just upstream of each opening; for the dome flow infinite, static equal to total.
    liner_pressure : ndarray
        Static, just upstream of each opening in the liner, Pa.
    """
    gas_constant, gamma = inlet.gas_constant, inlet.heat_capacity_ratio
    head: Array = total_pressure - liner_pressure
    annulus_head = total_pressure - static_pressure
    head_ratio = head / np.maximum(annulus_head, 1e-12 * total_pressure)
    station_flow = mass_flow @ laws.same_station
    bleed_ratio = np.clip(station_flow / np.maximum(annulus_flow, 1e-300), 0.0, 1.0)
    by_law = discharge_coefficient_crossflow(head_ratio, bleed_ratio, laws.limit)
    effective_area = np.where(laws.varying, by_law * laws.area, laws.fixed_area)
    driving = np.where(laws.static_fed, static_pressure, total_pressure)
    flux = orifice_flux(driving, temperature, liner_pressure, gas_constant, gamma)
    velocity = jet_velocity(driving, temperature, liner_pressure, gas_constant, gamma)
    heat_capacity = inlet.heat_capacity
    jet_temperature = temperature - velocity * velocity / (2.0 * heat_capacity)
    density = liner_pressure / (gas_constant * jet_temperature)
    turned = np.sqrt(np.maximum(1.0 - by_law / laws.limit, 0.0))
    return OpeningState(
        head_ratio=head_ratio,
        bleed_ratio=bleed_ratio,
        effective_area=effective_area,
        law_flow=effective_area * flux,
        velocity=np.where(
            np.isnan(laws.lip_area),
            velocity * laws.speed_share,
            mass_flow * gas_constant * temperature / (liner_pressure * laws.lip_area),
        ),
        density=density,
        axial=np.where(np.isnan(laws.axial), turned, laws.axial),
        driving_pressure=driving,
        temperature=temperature,
    )


def stations(laws: OpeningLaws, side: str) -> Sequence[tuple[int, float]]:
    """Return (position among the laws, station) of the openings on one side."""
    return [(i, o.station) for i, o in enumerate(laws.openings) if o.side == side]
