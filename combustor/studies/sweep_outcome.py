"""What one rating of a sweep comes to: the numbers that trends are drawn of."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import asdict, dataclass, fields
from math import isfinite
from typing import Any

from combustor.base.errors import CombustorError, InfeasibleError, InputError
from combustor.base.finding import Finding
from combustor.case.schema import Point
from combustor.rating.record import InletRecord, PointRating, Status, ZoneRecord

_GRAVITY = ("ok", "watch", "act")


@dataclass(frozen=True)
class Outcome:
    """One operating point of one row; SI, fractions; None where it is not a result.

    Parameters
    ----------
    status : {"burning", "blown_out", "not_converged"}
    converged : bool
    level : {"ok", "watch", "act"}
        The gravest of its findings.
    gravest : str
        What that finding judges; empty where all is well.
    reason : str
        Why there is no result; empty where there is one.
    fuel_flow, fuel_air_ratio, equivalence_ratio :
        Of the whole combustor.
    pressure_loss : fraction of the inlet total pressure
    primary_air : fraction of air_flow in the primary zone
    primary_equivalence_ratio, primary_temperature, primary_residence_time :
        At the end of the primary zone.
    exit_temperature, combustion_efficiency, pattern_factor :
    wall_peak : float or None
        Hottest metal.
    nox, co, n2o : mole fractions, dry, 15 % O2
    ei_nox, ei_co, ei_uhc : kg per kg fuel
    blowout_margin : float or None
        Percent, as in the operability of a rating.
    """

    status: Status
    converged: bool
    level: str
    gravest: str = ""
    reason: str = ""
    fuel_flow: float | None = None
    fuel_air_ratio: float | None = None
    equivalence_ratio: float | None = None
    pressure_loss: float | None = None
    primary_air: float | None = None
    primary_equivalence_ratio: float | None = None
    primary_temperature: float | None = None
    primary_residence_time: float | None = None
    exit_temperature: float | None = None
    combustion_efficiency: float | None = None
    pattern_factor: float | None = None
    wall_peak: float | None = None
    nox: float | None = None
    co: float | None = None
    n2o: float | None = None
    ei_nox: float | None = None
    ei_co: float | None = None
    ei_uhc: float | None = None
    blowout_margin: float | None = None

    @property
    def burning(self) -> bool:
        """Whether its numbers are results."""
        return self.status == "burning" and self.converged

    def written(self) -> dict[str, Any]:
        """Return it as plain values for a results file."""
        return asdict(self)

    @classmethod
    def read(cls, written: Mapping[str, Any]) -> Outcome:
        """Return what :meth:`written` wrote; KeyError or TypeError when it is something else."""
        return cls(**{field.name: written[field.name] for field in fields(cls)})


def outcome_of(rated: PointRating) -> Outcome:
    """Return the outcome of a rated point."""
    status: Status = rated.status
    if status == "burning" and not rated.converged:
        status = "not_converged"
    levels = [finding.level for finding in rated.findings]
    level = max(levels, key=_GRAVITY.index, default="ok") if status == "burning" else "act"
    primary = next((zone for zone in rated.zones if zone.name == "primary"), None)
    made = rated.emissions
    return Outcome(
        status=status,
        converged=rated.converged,
        level=level,
        gravest="" if level == "ok" else _gravest(rated, level),
        reason="" if status == "burning" else _reason(rated),
        fuel_flow=_number(rated.fuel_flow),
        fuel_air_ratio=_number(rated.fuel_air_ratio),
        equivalence_ratio=_number(rated.equivalence_ratio),
        pressure_loss=_number(rated.pressure_loss),
        **_primary(primary),
        exit_temperature=_number(rated.exit.temperature),
        combustion_efficiency=_number(rated.exit.combustion_efficiency),
        pattern_factor=_number(rated.exit.pattern_factor),
        wall_peak=_number(max((wall.temperature for wall in rated.walls), default=None)),
        nox=None if made is None else _number(made.nox_dry_15),
        co=None if made is None else _number(made.co_dry_15),
        n2o=None if made is None else _number(made.n2o_dry_15),
        ei_nox=None if made is None else _number(made.ei_nox),
        ei_co=None if made is None else _number(made.ei_co),
        ei_uhc=None if made is None else _number(made.ei_uhc),
        blowout_margin=_number(rated.operability.get("blowout_margin_percent")),
    )


def failed(point: Point, fuel: str, reason: str) -> PointRating:
    """Return the record of a point that could not be rated, with the reason."""
    advice = f"No number of this point is a result: {reason}."
    return PointRating(
        name=point.name,
        kind=point.kind,
        fuel=fuel,
        status="not_converged",
        inlet=InletRecord(
            point.air_flow, point.inlet_pressure, point.inlet_temperature, point.humidity
        ),
        fuel_flow=point.fuel_flow,
        fuel_air_ratio=point.fuel_air_ratio,
        equivalence_ratio=None,
        findings=(Finding("act", "not rated", advice=advice, source="this variant of the case"),),
    )


def reason_of(error: Exception) -> str:
    """Return in one line why a rating was given up."""
    if isinstance(error, InputError):
        return "; ".join(str(problem) for problem in error.problems)
    if isinstance(error, InfeasibleError):
        return "; therefore ".join(error.chain)
    if isinstance(error, CombustorError):
        return " ".join(str(error).split())
    return f"internal error, {type(error).__name__}: {' '.join(str(error).split())[:200]}"


def _reason(rated: PointRating) -> str:
    act = next((finding for finding in rated.findings if finding.level == "act"), None)
    if act is None:
        return rated.status.replace("_", " ")
    return act.advice or act.what


def _primary(zone: ZoneRecord | None) -> dict[str, float | None]:
    if zone is None:
        return {}
    return {
        "primary_air": _number(zone.air_fraction),
        "primary_equivalence_ratio": _number(zone.equivalence_ratio),
        "primary_temperature": _number(zone.temperature),
        "primary_residence_time": _number(zone.residence_time),
    }


def _gravest(rated: PointRating, level: str) -> str:
    return next((finding.what for finding in rated.findings if finding.level == level), "")


def _number(value: Any) -> float | None:
    return float(value) if value is not None and isfinite(value) else None
