"""What sizing returns: the metal, and how each dimension of it came about."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from combustor.airflow.result import AirSplit
from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.base.method import Method
from combustor.hardware.metal import Hardware

UnitKind = Literal[
    "length", "area", "angle", "count", "fraction", "velocity", "ratio", "temperature", "mass_flow"
]


@dataclass(frozen=True)
class Candidate:
    """A value another method would have given, and why it was not taken.

    Parameters
    ----------
    value : float
        In the SI unit of the dimension it lost to.
    method : Method
    reason : str
        Why it lost, in one short clause.
    """

    value: float
    method: Method
    reason: str


@dataclass(frozen=True)
class Dimension:
    """One sized quantity with the method behind it.

    Parameters
    ----------
    name : str
        In the trade's words, with the opening's name where it belongs to one.
    value : float
        SI.
    unit : UnitKind
        Kind of quantity; the report chooses the printed unit.
    method : Method
        What decided the value.
    candidate : Candidate or None
        The best rival that lost.
    note : str
        What bounded or rounded the value.
    """

    name: str
    value: float
    unit: UnitKind
    method: Method
    candidate: Candidate | None = None
    note: str = ""


@dataclass(frozen=True)
class ZoneTarget:
    """Equivalence ratio of one zone at the design point: wanted and re-solved."""

    name: str
    wanted: float
    reached: float


@dataclass(frozen=True)
class Design:
    """A sized combustor.

    Parameters
    ----------
    hardware : Hardware
        Whole holes, drillable diameters.
    dimensions : tuple of Dimension
        In the order they were found.
    findings : tuple of Finding
    split : AirSplit
        Of this metal at the design point.
    zones : tuple of ZoneTarget
        primary, secondary.
    pressure_loss_target : float
        Fraction of inlet total pressure.
    fuel_flow : float
        At the design point [kg/s].
    convergence : Convergence
        Passes between areas and air split; the residual is the largest miss of a target over
        its tolerance (0.03 in equivalence ratio, 0.1 points of pressure loss).
    """

    hardware: Hardware
    dimensions: tuple[Dimension, ...]
    findings: tuple[Finding, ...]
    split: AirSplit
    zones: tuple[ZoneTarget, ...]
    pressure_loss_target: float
    fuel_flow: float
    convergence: Convergence

    @property
    def converged(self) -> bool:
        """Whether the rounded metal meets its targets within the stated tolerances."""
        return self.convergence.converged

    @property
    def methods(self) -> tuple[Method, ...]:
        """Every method a dimension or its rival stands on, once each, in order."""
        found: dict[str, Method] = {}
        for dimension in self.dimensions:
            found.setdefault(dimension.method.key, dimension.method)
            if dimension.candidate is not None:
                found.setdefault(dimension.candidate.method.key, dimension.candidate.method)
        return tuple(found.values())
