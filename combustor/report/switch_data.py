"""Records behind the tables of a fuel switch study, for terminal, CSV and JSON alike."""

from __future__ import annotations

from typing import Any

from combustor.emissions.dew_point import acid_dew_point, water_dew_point
from combustor.emissions.exhaust import Emissions
from combustor.emissions.stack import stack_of
from combustor.rating.record import PointRating
from combustor.report import switch_fields as fields
from combustor.report import theme
from combustor.report.document import Table
from combustor.report.field import Field, row
from combustor.report.rating_data import point_fields
from combustor.report.rating_json import point_document
from combustor.studies.switch_fuels import Properties
from combustor.studies.switch_record import Limit, Rung, Switch, Switched
from combustor.studies.switch_verdict import reason_words

SWITCH_TABLES = (
    "switch_verdicts",
    "switch_properties",
    "switch_shares",
    "switch_points",
    "switch_more",
    "switch_changes",
    "switch_limits",
    "points",
)
ICE = 273.15


def all_of(switch: Switch) -> tuple[Switched, ...]:
    """Return the baseline and every fuel after it."""
    return (switch.baseline, *switch.fuels)


def property_records(switch: Switch) -> tuple[dict[str, Any], ...]:
    """Return one line a fuel."""
    base = switch.baseline.properties
    found = []
    for one in all_of(switch):
        p, fuel = one.properties, one.properties.fuel
        changed = None
        if p.modified_wobbe is not None and base.modified_wobbe is not None:
            changed = 100.0 * (p.modified_wobbe / base.modified_wobbe - 1.0)
        cut = None
        if base.carbon_dioxide > 0.0:
            cut = 100.0 * (1.0 - p.carbon_dioxide / base.carbon_dioxide)
        found.append(
            {
                "fuel": fuel.name,
                "lhv": fuel.lower_heating_value,
                "wobbe_lower": fuel.wobbe_lower,
                "wobbe_higher": fuel.wobbe_higher,
                "modified_wobbe": p.modified_wobbe,
                "modified_wobbe_change_percent": changed,
                "weaver": p.weaver,
                "far": fuel.stoichiometric_fuel_air_ratio,
                "flame": p.stoichiometric_temperature,
                "carbon_dioxide": p.carbon_dioxide,
                "co2_cut_percent": cut,
                "sulfur": p.sulfur,
            }
        )
    return tuple(found)


def share_records(switch: Switch) -> tuple[Any, ...]:
    """Return one line a fuel and part, where a fuel has several parts."""
    shares = [share for one in all_of(switch) for share in one.properties.shares]
    return tuple(shares)


def verdict_records(switch: Switch) -> tuple[dict[str, Any], ...]:
    """Return one line a fuel, the first broken limit beside the verdict."""
    found = []
    for one in all_of(switch):
        broken = one.broken
        words = reason_words(broken[0]) if broken else "every limit is kept"
        if len(broken) > 1:
            words += f"; {len(broken) - 1} more"
        name = one.properties.fuel.name
        if one is switch.baseline:
            words = f"the present fuel: {words}"
        found.append({"fuel": name, "verdict": one.verdict, "reason": words})
    found += [
        {"fuel": name, "verdict": "cannot say", "reason": why} for name, why in switch.refused
    ]
    return tuple(found)


def point_records(switch: Switch, point: str) -> tuple[dict[str, Any], ...]:
    """Return one line a fuel at one operating point."""
    place = next(i for i, p in enumerate(switch.baseline.points) if p.name == point)
    base = switch.baseline.points[place]
    return tuple(_point_record(one, place, base) for one in all_of(switch))


def _point_record(one: Switched, place: int, base: PointRating) -> dict[str, Any]:
    rated, use = one.points[place], one.injector[place]
    zones = {zone.name: zone for zone in rated.zones}
    primary, secondary = zones.get("primary"), zones.get("secondary")
    made, judged = rated.emissions, rated.operability
    carbon = one.properties.carbon_dioxide * one.properties.fuel.lower_heating_value
    return {
        "point": rated.name,
        "fuel": rated.fuel,
        "status": theme.status(rated.status),
        "fuel_flow": rated.fuel_flow,
        "volume_flow": use.volume_flow or None,
        "pressure_ratio": use.pressure_ratio,
        "choked": use.choked,
        "area_ratio": use.area_ratio,
        "phi": primary and primary.equivalence_ratio,
        "phi_secondary": secondary and secondary.equivalence_ratio,
        "primary": primary and primary.temperature,
        "exit": rated.exit.temperature,
        "nox": made and made.nox_dry_15,
        "nox_energy": made and made.nox_per_energy,
        "co": made and made.co_dry_15,
        "n2o": made and made.n2o_dry_15,
        "nh3": made and made.nh3_dry_15,
        "water": made and made.h2o_wet,
        "carbon_dioxide": None if rated.fuel_flow is None else carbon * rated.fuel_flow,
        "dew_point": made and _celsius(water_dew_point(made.h2o_wet)),
        "acid_dew_point": made and _celsius(_acid_dew_point(one.properties, made)),
        "efficiency": rated.exit.combustion_efficiency,
        "margin": judged.get("blowout_margin_percent"),
        "autoignition": judged.get("autoignition_margin"),
        "core": judged.get("flashback_core_margin"),
        "wall_layer": judged.get("flashback_wall_margin"),
        "wall": max((w.temperature for w in rated.walls), default=None),
        "loss": rated.pressure_loss,
        "split": _moved(base, rated),
        "pattern": rated.exit.pattern_factor,
    }


def _acid_dew_point(properties: Properties, made: Emissions) -> float | None:
    """Return the acid dew point of an exhaust at atmospheric pressure, K; None without sulfur."""
    fuel = properties.fuel
    heat = (fuel.lower_heating_value, fuel.higher_heating_value)
    stack = stack_of(made, *heat, fuel_sulfur=properties.sulfur)
    return acid_dew_point(made.h2o_wet, stack.wet.get("SO3", 0.0))


def _celsius(kelvin: float | None) -> float | None:
    return None if kelvin is None else kelvin - ICE


def _moved(base: PointRating, rated: PointRating) -> float | None:
    if base.split is None or rated.split is None:
        return None
    total = rated.inlet.air_flow
    pairs = zip(base.split.openings, rated.split.openings, strict=True)
    return max(abs(a.mass_flow - b.mass_flow) / total for a, b in pairs)


def change_records(switch: Switch) -> tuple[dict[str, Any], ...]:
    """Return one line a fuel and change."""
    return tuple(
        {"fuel": one.properties.fuel.name, "what": c.what, "amount": c.amount, "note": c.note}
        for one in switch.fuels
        for c in one.changes
    )


def limit_records(switch: Switch) -> tuple[dict[str, Any], ...]:
    """Return one line a fuel and limit."""
    return tuple(
        {"fuel": one.properties.fuel.name, **_limit(limit)}
        for one in all_of(switch)
        for limit in one.limits
    )


def _limit(limit: Limit) -> dict[str, Any]:
    keys = ("what", "point", "value", "limit", "unit", "kept", "known", "by_change")
    return {key: getattr(limit, key) for key in keys}


def switch_data(switch: Switch) -> tuple[Table, ...]:
    """Return the CSV tables."""
    names = [point.name for point in switch.baseline.points]
    records = tuple(line for name in names for line in point_records(switch, name))
    point = (Field("point", "point"),)
    rated = tuple(p for one in all_of(switch) for p in one.points)
    return (
        Table("switch_verdicts", "Verdicts", fields.VERDICTS, verdict_records(switch)),
        Table("switch_properties", "Fuels", fields.PROPERTIES, property_records(switch)),
        Table("switch_shares", "Shares", fields.SHARES, share_records(switch), lead=2),
        Table("switch_points", "Side by side", point + fields.POINTS, records, lead=2),
        Table("switch_more", "Side by side", point + fields.MORE, records, lead=2),
        Table("switch_changes", "Changes", fields.CHANGES, change_records(switch)),
        Table("switch_limits", "Limits", fields.LIMITS, limit_records(switch), lead=2),
        Table("points", "Operating points", point_fields(rated), rated, lead=3),
    )


def switch_document(switch: Switch, version: str) -> dict[str, Any]:
    """Return the document of ``switch --json``."""
    properties = {line["fuel"]: line for line in property_records(switch)}
    names = [point.name for point in switch.baseline.points]
    beside = [line for name in names for line in point_records(switch, name)]
    return {
        "title": switch.title,
        "version": version,
        "case_sha256": switch.case_sha256,
        "hold": switch.hold,
        "sized": switch.sized,
        "mechanism": switch.mechanism_note,
        "injector_pressure_ratio": switch.injector_ratio,
        "injector_pressure_ratio_source": switch.injector_ratio_source,
        "baseline": switch.baseline.properties.fuel.name,
        "fuels": [
            {
                **row(fields.PROPERTIES, properties[one.properties.fuel.name]),
                "shares": [row(fields.SHARES, share) for share in one.properties.shares],
                "verdict": one.verdict,
                "reasons": list(one.reasons),
                "changes": [
                    {k: getattr(c, k) for k in ("what", "amount", "note")} for c in one.changes
                ],
                "limits": [_limit(limit) for limit in one.limits],
                "own_mechanism": one.own_mechanism or None,
                "own_mechanism_nox_ppmvd_15": None
                if one.own_mechanism_nox is None
                else 1e6 * one.own_mechanism_nox,
            }
            for one in all_of(switch)
        ],
        "refused": [{"fuel": name, "reason": why} for name, why in switch.refused],
        "ladder": _ladder(switch.ladder),
        "side_by_side": [
            {"point": line["point"], **row(fields.POINTS, line), **row(fields.MORE, line)}
            for line in beside
        ],
        "points": [point_document(p) for one in all_of(switch) for p in one.points],
    }


def _ladder(rung: Rung | None) -> dict[str, Any] | None:
    if rung is None:
        return None
    return {
        "added": rung.added,
        "largest_share_percent": None if rung.share is None else 100.0 * rung.share,
        "stopped_by": rung.stopped_by and _limit(rung.stopped_by),
        "largest_share_with_own_nozzle_percent": None
        if rung.with_nozzle is None
        else 100.0 * rung.with_nozzle,
        "then_stopped_by": rung.then_stopped_by and _limit(rung.then_stopped_by),
    }
