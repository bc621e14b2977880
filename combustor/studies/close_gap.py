"""What would bring an emission inside its limit: the levers, two of them by rating again."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from math import log

from combustor.case.schema import Case, Point
from combustor.emissions.remedy import Flame, Remedy, remedies
from combustor.emissions.verdict import Verdict
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.rating.rate import rate_point
from combustor.rating.record import PointRating, Ratings
from combustor.rating.settings import Settings, settings_of

STEP = 0.9  # of the unmixedness, in the second rating
WATER = 0.3  # kg per kg fuel more, in the second rating


@dataclass(frozen=True)
class Gap:
    """The widest gap of one pollutant.

    Parameters
    ----------
    pollutant, point, rule, row : str
        Where it is widest.
    factor : float
        Limit over the high end of the band: what the emission must come down to.
    remedies : tuple of Remedy
    """

    pollutant: str
    point: str
    rule: str
    row: str
    factor: float
    remedies: tuple[Remedy, ...]


def gaps_of(case: Case, ratings: Ratings, verdicts: Iterable[Verdict]) -> tuple[Gap, ...]:
    """Return the widest gap of each pollutant, with what would close it.

    Options of one choice count by their nearest limit; rows that may bind count only where
    none does.
    """
    worst: dict[str, Verdict] = {}
    nearest = _nearest_options(verdicts)
    bound = {v.pollutant for v in nearest if v.verdict != "undecided"}
    for verdict in nearest:
        factor = _factor(verdict)
        if factor is None or factor >= 1.0:
            continue
        if verdict.verdict == "undecided" and verdict.pollutant in bound:
            continue
        known = worst.get(verdict.pollutant)
        if known is None or factor < (_factor(known) or 1.0):
            worst[verdict.pollutant] = verdict
    found = []
    for pollutant, verdict in worst.items():
        factor = _factor(verdict)
        rated = next((p for p in ratings.points if p.name == verdict.point), None)
        rated = rated or max(ratings.points, key=lambda p: p.fuel_flow or 0.0)
        flame = _flame(case, rated, pollutant)
        if factor is not None and flame is not None:
            found.append(
                Gap(
                    pollutant,
                    verdict.point,
                    verdict.rule,
                    verdict.row,
                    factor,
                    remedies(pollutant, factor, flame),
                )
            )
    return tuple(found)


def _factor(verdict: Verdict) -> float | None:
    if verdict.limit is None or not verdict.band_high:
        return None
    return verdict.limit / verdict.band_high


def _nearest_options(verdicts: Iterable[Verdict]) -> list[Verdict]:
    kept: dict[tuple[str, str, str], Verdict] = {}
    for verdict in verdicts:
        place = (
            verdict.point,
            verdict.choice or f"{verdict.rule}/{verdict.row}",
            verdict.pollutant,
        )
        known = kept.get(place)
        if known is None or (_factor(verdict) or 0.0) > (_factor(known) or 0.0):
            kept[place] = verdict
    return list(kept.values())


def _flame(case: Case, rated: PointRating, pollutant: str) -> Flame | None:
    primary = next((zone for zone in rated.zones if zone.temperature is not None), None)
    if primary is None or primary.temperature is None or primary.residence_time is None:
        return None
    unmixed = water = None
    if pollutant in ("NOx", "NO", "NO2"):
        unmixed, water = _unmixedness_slope(case, rated), _water_slope(case, rated)
    return Flame(
        primary.temperature,
        primary.residence_time,
        primary.equivalence_ratio,
        case.targets.front_end,
        unmixed,
        water,
    )


def _unmixedness_slope(case: Case, rated: PointRating) -> float | None:
    settings = settings_of(case.model)
    if settings.unmixedness <= 0.0:
        return None
    sharper = replace(settings, unmixedness=STEP * settings.unmixedness)
    ratio = _ratio(case, case.point(rated.name), sharper, rated)
    return None if ratio is None else log(ratio) / log(STEP)


def _water_slope(case: Case, rated: PointRating) -> float | None:
    if not rated.fuel_flow or case.targets.front_end != "diffusion":
        return None
    point = case.point(rated.name)
    more = point.water_injection + WATER * rated.fuel_flow
    wetter = point.model_copy(update={"water_injection": more})
    ratio = _ratio(case, wetter, settings_of(case.model), rated)
    return None if ratio is None else log(ratio) / WATER


def _ratio(case: Case, point: Point, settings: Settings, rated: PointRating) -> float | None:
    """Return NOx per fuel of the same metal after a change, over that of the rating."""
    if rated.hardware is None:
        return None
    fuel = fuel_of(case)
    again = rate_point(case, point, fuel, Gas.load(fuel.mechanism), rated.hardware, settings)
    before, after = rated.emissions, again.emissions
    if before is None or after is None or not before.ei_nox or not after.ei_nox:
        return None
    return after.ei_nox / before.ei_nox
