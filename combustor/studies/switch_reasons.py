"""Why a fuel's figures move as they do, in sentences a fuel engineer reads."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from combustor.rating.record import PointRating
from combustor.studies.switch_fuels import Properties
from combustor.studies.switch_record import InjectorUse, Limit
from combustor.studies.switch_verdict import reason_words

NOTEWORTHY = 0.02


def reasons_of(
    own: Properties | None,
    properties: Properties,
    own_points: Sequence[PointRating],
    points: Sequence[PointRating],
    uses: Sequence[InjectorUse],
    limits: Sequence[Limit],
    hold: str,
) -> Iterator[str]:
    """Yield the broken limits first, then what moved and why."""
    yield from (reason_words(limit) for limit in limits if not limit.kept)
    if own is None:
        return
    pairs = [
        (before, after)
        for before, after in zip(own_points, points, strict=True)
        if before.status == after.status == "burning"
    ]
    if not pairs:
        return
    before, after = pairs[0]
    yield _flame(own, properties)
    yield from _emissions(before, after)
    yield from _heat(own, properties, before, after, hold)
    yield from _radiation(own, properties, before, after)
    yield from _atomiser(own, properties, before, after)
    yield from _unknown_edges(properties, uses)


def _flame(own: Properties, new: Properties) -> str:
    rise = new.stoichiometric_temperature - own.stoichiometric_temperature
    return (
        f"stoichiometric flame {rise:+.0f} K against the present fuel; carbon dioxide per heat "
        f"{_percent(new.carbon_dioxide, own.carbon_dioxide)}"
    )


def _emissions(before: PointRating, after: PointRating) -> Iterator[str]:
    old, new = before.emissions, after.emissions
    if old is None or new is None:
        return
    if old.nox_dry_15 and new.nox_dry_15 and old.nox_per_energy and new.nox_per_energy:
        in_ppm, on_heat = new.nox_dry_15 / old.nox_dry_15, new.nox_per_energy / old.nox_per_energy
        words = (
            f"NOx at {after.name} {_percent(in_ppm, 1.0)} in ppm at 15 % O2, "
            f"{_percent(on_heat, 1.0)} per heat"
        )
        if in_ppm > (1.0 + NOTEWORTHY) * on_heat:
            words += ": drying and the O2 reference make ppm dearer for a fuel with more hydrogen"
        yield words


def _heat(
    own: Properties, new: Properties, before: PointRating, after: PointRating, hold: str
) -> Iterator[str]:
    if before.fuel_flow is None or after.fuel_flow is None:
        return
    heat = (after.fuel_flow * new.fuel.lower_heating_value) / (
        before.fuel_flow * own.fuel.lower_heating_value
    )
    if abs(heat - 1.0) > NOTEWORTHY / 2:
        held = hold.replace("-", " ")
        yield (
            f"{100.0 * (heat - 1.0):+.1f} % heat at the same {held}: the products' heat capacity, "
            "and the fuel itself to be heated"
            if hold != "valve"
            else f"{100.0 * (heat - 1.0):+.1f} % heat through the same injector"
        )


def _radiation(
    own: Properties, new: Properties, before: PointRating, after: PointRating
) -> Iterator[str]:
    peaks = [max((w.temperature for w in p.walls), default=None) for p in (before, after)]
    if peaks[0] is None or peaks[1] is None:
        return
    why = "hotter or cooler gas beside the wall"
    if own.fuel.phase == "liquid":
        why = "less soot radiates from a fuel with more hydrogen"
    elif new.fuel.atoms.get("C", 0.0) == 0.0 < own.fuel.atoms.get("C", 0.0):
        why = "no carbon dioxide radiates, more water does, and the gas beside the wall differs"
    yield f"peak wall at {after.name} {peaks[1] - peaks[0]:+.0f} K: {why}"


def _atomiser(
    own: Properties, new: Properties, before: PointRating, after: PointRating
) -> Iterator[str]:
    """Yield the pressure drop of the same atomiser: flow squared over density."""
    if own.fuel.phase != "liquid" or new.fuel.phase != "liquid":
        return
    if before.fuel_flow is None or after.fuel_flow is None:
        return
    flow = after.fuel_flow / before.fuel_flow
    drop = flow**2 * own.fuel.density_15 / new.fuel.density_15
    yield f"pressure drop of the same atomiser {_percent(drop, 1.0)}, volume flow " + _percent(
        flow * own.fuel.density_15 / new.fuel.density_15, 1.0
    )


def _unknown_edges(new: Properties, uses: Sequence[InjectorUse]) -> Iterator[str]:
    if any(use.choked for use in uses):
        yield "the present nozzle chokes on this fuel at some point: flow follows its supply alone"
    if new.fuel.composition.get("H2", 0.0) > 0.3:
        yield (
            "hydrogen: burns in leaner and faster mixtures than any correlation here was made "
            "for, and the flame sits nearer to the dome; metal temperature of nozzle and swirler "
            "is not assessed"
        )


def _percent(new: float, old: float) -> str:
    return f"{100.0 * (new / old - 1.0):+.1f} %" if old else "not defined"
