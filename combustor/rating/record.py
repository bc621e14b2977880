"""The record of one rated operating point. A value that is not a result is None."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from combustor.airflow.split import AirSplit
from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.base.method import Method
from combustor.emissions.exhaust import Emissions
from combustor.hardware.metal import Hardware
from combustor.rating.injectors import InjectorAir

Status = Literal["burning", "blown_out", "not_converged"]


@dataclass(frozen=True)
class InletRecord:
    """Air entering the combustor: kg/s moist, Pa total, K, kg water per kg dry air."""

    air_flow: float
    pressure: float
    temperature: float
    humidity: float


@dataclass(frozen=True)
class ZoneRecord:
    """One zone: temperature (K) is the enthalpy mean at its end, residence_time in s.

    ``air_fraction`` is cumulative share of air_flow mixed in by the zone's end.
    """

    name: str
    equivalence_ratio: float
    temperature: float | None
    residence_time: float | None
    air_fraction: float


@dataclass(frozen=True)
class Profile:
    """Mass mean over all streams along the axis.

    station (m), temperature (K), nox and co (mole fractions, dry, 15 % O2; nan where the
    reference is undefined).
    """

    station: NDArray[np.float64]
    temperature: NDArray[np.float64]
    nox: NDArray[np.float64]
    co: NDArray[np.float64]


@dataclass(frozen=True)
class ExitRecord:
    """Gas leaving the liner, everything mixed in: K, Pa, fractions."""

    temperature: float | None
    pressure: float | None
    combustion_efficiency: float | None
    pattern_factor: float | None


@dataclass(frozen=True)
class WallPoint:
    """Metal at one station: m, K (gas side of the metal, under any coating)."""

    station: float
    side: str
    temperature: float
    film_effectiveness: float
    cold_side_temperature: float
    radiation: float
    convection: float


@dataclass(frozen=True)
class PointRating:
    """What the metal does at one operating point on one fuel.

    Fractions are fractions (pressure_loss 0.045), SI throughout. ``balances`` holds "air",
    "elements" and "enthalpy" imbalances as defined for the JSON output. ``near_wall`` says how
    much of the CO leaves the liner beside the wall and how much of it was quenched there.
    ``methods`` are the published methods this result stands on, for the table of sources.
    ``hardware`` is the metal the split belongs to; ``injectors`` what each of its injectors
    burns; ``cautions`` are what the fuel asks the reader to mind.
    """

    name: str
    kind: str
    fuel: str
    status: Status
    inlet: InletRecord
    fuel_flow: float | None
    fuel_air_ratio: float | None
    equivalence_ratio: float | None
    pressure_loss: float | None = None
    pressure_loss_parts: Mapping[str, float] | None = None
    split: AirSplit | None = None
    zones: tuple[ZoneRecord, ...] = ()
    profile: Profile | None = None
    exit: ExitRecord = field(default_factory=lambda: ExitRecord(None, None, None, None))
    walls: tuple[WallPoint, ...] = ()
    emissions: Emissions | None = None
    operability: Mapping[str, float | None] = field(default_factory=dict)
    near_wall: Mapping[str, float | None] = field(default_factory=dict)
    balances: Mapping[str, float] | None = None
    findings: tuple[Finding, ...] = ()
    methods: tuple[Method, ...] = ()
    convergence: Convergence | None = None
    hardware: Hardware | None = None
    cautions: tuple[str, ...] = ()
    injectors: tuple[InjectorAir, ...] = ()

    @property
    def converged(self) -> bool:
        """Whether every number printed is a result."""
        return self.convergence is not None and self.convergence.converged


@dataclass(frozen=True)
class Ratings:
    """All operating points of a case, in the case's order.

    ``sized`` says that the case had no metal and was sized first.
    """

    title: str
    case_sha256: str
    points: tuple[PointRating, ...]
    sized: bool = False
    findings: tuple[Finding, ...] = ()
