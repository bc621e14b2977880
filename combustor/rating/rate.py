"""Rate a case: its metal, or the metal sized for it, at its operating points."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from difflib import get_close_matches

from combustor.base.errors import InputError, Problem
from combustor.base.finding import Finding
from combustor.case.schema import Case, Point
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.hardware.from_case import hardware_of
from combustor.hardware.metal import Hardware
from combustor.rating.assemble import rated, unrated
from combustor.rating.couple import Coupled, couple
from combustor.rating.judge import findings_of, gravest_first
from combustor.rating.operability import (
    NOTHING,
    deceleration,
    light_up_findings,
    operability_of,
)
from combustor.rating.operating import operating_of
from combustor.rating.record import PointRating, Ratings
from combustor.rating.settings import Settings, settings_of
from combustor.rating.spray import for_sprays
from combustor.sizing.size import size


def rate_case(
    case: Case,
    fuel_name: str | None = None,
    points: Sequence[str] | None = None,
    mechanism: str | None = None,
) -> Ratings:
    """Return what the metal of a case does at its operating points.

    Each point is solved for itself: nothing carries over from one to the next. A case without
    metal is sized first, on its own fuel.

    Parameters
    ----------
    case : Case
    fuel_name : str, optional
        Burnt in place of the case's own fuel.
    points : sequence of str, optional
        Names of the points wanted; all when left out.
    mechanism : str, optional
        In place of the case's own.

    Raises
    ------
    InputError
        A point that is not in the case, a fuel that is not known.
    InfeasibleError
        No metal meets the targets; an exit temperature no flame reaches.
    """
    wanted = _wanted(case, points)
    fuel = fuel_of(case, fuel_name, mechanism)
    gas = Gas.load(fuel.mechanism)
    findings: tuple[Finding, ...] = ()
    if case.hardware is None:
        own = fuel_of(case)
        design = size(
            case, own, gas if own.mechanism == fuel.mechanism else Gas.load(own.mechanism)
        )
        hardware, findings = design.hardware, design.findings
    else:
        hardware = hardware_of(case)
    settings = settings_of(case.model)
    rated = tuple(
        rate_point(case, p, fuel, gas, hardware, settings, operability=True) for p in wanted
    )
    return Ratings(
        title=case.title,
        case_sha256=case.sha256,
        points=rated,
        sized=case.hardware is None,
        findings=findings + deceleration(rated),
    )


def rate_point(
    case: Case,
    point: Point,
    fuel: Fuel,
    gas: Gas,
    hardware: Hardware,
    settings: Settings,
    operability: bool = False,
) -> PointRating:
    """Return what given metal does at one operating point.

    Parameters
    ----------
    operability : bool
        As in :func:`rate_near`.
    """
    return rate_near(case, point, fuel, gas, hardware, settings, None, operability)[0]


def rate_near(
    case: Case,
    point: Point,
    fuel: Fuel,
    gas: Gas,
    hardware: Hardware,
    settings: Settings,
    near: Coupled | None = None,
    operability: bool = False,
) -> tuple[PointRating, Coupled]:
    """Return a rated point and the solution behind it, started from a neighbour's if there is one.

    Parameters
    ----------
    near : Coupled, optional
        As in :func:`combustor.rating.couple.couple`.
    operability : bool
        Also follow the burning branch down to blow-out and judge light-up and premixers: costs
        about as much again as the rating itself.
    """
    operating = operating_of(case, point, fuel, gas)
    settings = for_sprays(settings, fuel)
    coupled = couple(gas, fuel, operating, hardware, settings, near)
    settings = coupled.settings(settings)
    if coupled.fire.exit is None or not coupled.convergence.converged:
        record = unrated(operating, hardware, fuel, coupled)
    else:
        record = rated(gas, operating, hardware, fuel, coupled, settings)
    findings = findings_of(case, point, record, coupled, fuel, settings)
    if not operability:
        return replace(record, findings=findings), coupled
    if record.status != "burning":
        findings += light_up_findings(operating, hardware, fuel, coupled)
        return replace(record, findings=findings, operability=NOTHING), coupled
    known = None if near is None else near.blowout
    judged = operability_of(gas, operating, hardware, fuel, coupled, settings, record, known)
    coupled = replace(coupled, blowout=judged.blowout)
    methods = {method.key: method for method in (*record.methods, *judged.methods)}
    record = replace(
        record,
        findings=gravest_first((*findings, *judged.findings)),
        operability=judged.values,
        methods=tuple(methods.values()),
    )
    return record, coupled


def _wanted(case: Case, points: Sequence[str] | None) -> tuple[Point, ...]:
    if points is None:
        return tuple(case.points)
    known = [point.name for point in case.points]
    problems = [
        Problem(
            "no such operating point",
            f"the case has {', '.join(known)}",
            "point",
            name,
            nearest=next(iter(get_close_matches(name, known, n=1)), None),
        )
        for name in points
        if name not in known
    ]
    if problems:
        raise InputError(problems)
    return tuple(point for point in case.points if point.name in points)
