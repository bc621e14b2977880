"""Limits held against each fuel, and the verdict that follows from them."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from combustor.case.schema import Case
from combustor.operability.injector import WOBBE_WINDOW
from combustor.rating.operability import STEADY_MARGIN
from combustor.rating.record import PointRating
from combustor.studies.switch_fuels import Properties
from combustor.studies.switch_record import Change, Limit, Verdict

FAR_TOO_HOT = 100.0  # K over the wall target that no slot brings back
FAR_TOO_DIRTY = 3.0  # times an emission target that no derate brings back
OTHER_PHASE = "a fuel nozzle for the other phase, gas or liquid"
NOZZLE = "fuel nozzle: temperature-corrected Wobbe index"


def limits_of(
    case: Case,
    properties: Properties,
    points: Sequence[PointRating],
    baseline: Properties | None,
    own_points: Sequence[PointRating] = (),
) -> tuple[Limit, ...]:
    """Return the limits of one fuel: every one that is broken or cannot be judged, and the rest.

    Parameters
    ----------
    baseline : Properties or None
        Of the case's own fuel; None for that fuel itself.
    own_points : sequence of PointRating
        The same points on it: what it already breaks is its own matter, and said there.
    """
    before = {
        (limit.what, limit.point)
        for p in own_points
        for limit in _of_point(case, p)
        if not limit.kept
    }
    found = [limit for point in points for limit in _of_point(case, point)]
    found = [limit for limit in found if limit.kept or (limit.what, limit.point) not in before]
    if baseline is not None:
        found += list(_nozzle(properties, baseline))
    return tuple(found)


def _of_point(case: Case, point: PointRating) -> Iterator[Limit]:
    if point.status == "not_converged":
        yield Limit("a converged solution", point.name, None, None, "", False, known=False)
        return
    burning = point.status == "burning"
    yield Limit("a flame that holds", point.name, None, None, "", burning)
    if not burning:
        return
    margin = point.operability.get("blowout_margin_percent")
    if margin is not None:
        kept = margin >= STEADY_MARGIN
        yield Limit("blow-out margin", point.name, margin, STEADY_MARGIN, "%", kept)
    peak = max((wall.temperature for wall in point.walls), default=None)
    if peak is not None:
        limit = case.targets.wall_temperature
        yield Limit(
            "peak wall temperature",
            point.name,
            peak,
            limit,
            "K",
            peak <= limit,
            by_change=peak <= limit + FAR_TOO_HOT,
        )
    yield from _emissions(case, point)
    yield from _premixer(point)
    judged = ("peak wall temperature", "blow-out margin", "NOx dry", "CO dry", "autoign", "flashb")
    for finding in point.findings:
        if finding.level == "act" and not finding.what.startswith(judged):
            yield Limit(
                finding.what,
                point.name,
                finding.value,
                finding.limit,
                finding.unit,
                False,
                by_change=finding.what in ("pattern factor", "pressure loss"),
            )


def _emissions(case: Case, point: PointRating) -> Iterator[Limit]:
    wanted, made = case.targets.emissions, point.emissions
    if made is None or point.kind not in ("rated", "part"):
        return
    for name, value, limit in (
        ("NOx", made.nox_dry_15, wanted.nox),
        ("CO", made.co_dry_15, wanted.co),
    ):
        if value is not None and limit is not None:
            yield Limit(
                f"{name} dry, 15 % O2",
                point.name,
                1e6 * value,
                1e6 * limit,
                "ppm",
                value <= limit,
                by_change=value <= FAR_TOO_DIRTY * limit,
            )


def _premixer(point: PointRating) -> Iterator[Limit]:
    for key, what in (
        ("autoignition_margin", "autoignition in the premixer: delay over what is asked"),
        ("flashback_core_margin", "flashback, core: velocity over what is asked"),
        ("flashback_wall_margin", "flashback, wall: gradient over what is asked"),
    ):
        value = point.operability.get(key)
        if value is not None:
            yield Limit(what, point.name, value, 1.0, "-", value >= 1.0)
    for finding in point.findings:
        if finding.what.endswith("cannot say"):
            yield Limit(finding.what, point.name, None, None, "", False, known=False)


def _nozzle(properties: Properties, baseline: Properties) -> Iterator[Limit]:
    new, old = properties.modified_wobbe, baseline.modified_wobbe
    if new is None and old is None:
        return
    if new is None or old is None:
        yield Limit(OTHER_PHASE, "", None, None, "", False, by_change=True)
        return
    low, high = (1.0 - WOBBE_WINDOW) * old, (1.0 + WOBBE_WINDOW) * old
    edge = low if new < old else high
    yield Limit(NOZZLE, "", new, edge, "Btu/scf/R^.5", low <= new <= high, by_change=True)


def verdict_of(limits: Sequence[Limit], changes: Sequence[Change]) -> Verdict:
    """Return the verdict: what is broken for good counts before what cannot be judged."""
    broken = [limit for limit in limits if not limit.kept]
    if any(limit.known and not limit.by_change for limit in broken):
        return "not on this metal"
    if any(not limit.known for limit in broken):
        return "cannot say"
    return "with changes" if broken or changes else "as it is"


def reason_words(limit: Limit) -> str:
    """Return one broken limit as a sentence part."""
    where = f" at {limit.point}" if limit.point else ""
    if limit.value is None or limit.limit is None:
        return f"{limit.what}{where}: {'not had' if limit.known else 'cannot be judged here'}"
    return f"{limit.what}{where}: {limit.value:.4g} against {limit.limit:.4g} {limit.unit}".rstrip(
        " -"
    )
