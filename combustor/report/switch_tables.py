"""The report of a fuel switch: fuels, points side by side, changes, verdicts last."""

from __future__ import annotations

from combustor.report import switch_fields as fields
from combustor.report.cautions import cautions, sentence
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, select
from combustor.report.switch_data import (
    all_of,
    change_records,
    point_records,
    property_records,
    share_records,
    verdict_records,
)
from combustor.studies.switch_record import Hold, Limit, Rung, Switch, Switched
from combustor.studies.switch_verdict import reason_words

_HELD: dict[Hold, str] = {
    "exit-temperature": "the same exit temperature at every point",
    "heat": "the same heat input (LHV) at every point",
    "valve": "the same injector and pressure ahead of it at every point",
}
_MARKS = {
    "not on this metal": "act",
    "with changes": "watch",
    "cannot say": "watch",
    "as it is": "ok",
}
_SIGNS = {
    "not on this metal": "! not on this metal",
    "with changes": "~ with changes",
    "cannot say": "? cannot say",
    "as it is": "+ as it is",
}
HYDROGEN = (
    "Hydrogen burns with a flame nobody sees, leaks where natural gas does not, makes some steels "
    "brittle and ignites at a touch: purge, vent, detect, and have pipes and valves checked for it."
)
AMMONIA = (
    "Ammonia is toxic at a few hundred ppm: slip through a weak flame, leaks and purge gas count."
)
CARBON_MONOXIDE = "Fuels with carbon monoxide are toxic without smell: detect leaks."
LIQUID = "Liquid fuels: drains, false starts and hot restarts with pooled fuel are not looked at."
_TOXIC = 0.05


def switch_report(switch: Switch) -> tuple[Block, ...]:
    """Return the whole report."""
    blocks: list[Block] = [
        Heading(f"{switch.title}: fuel switch"),
        Facts(_facts(switch)),
        Table("switch_properties", "Fuels", fields.PROPERTIES, property_records(switch)),
    ]
    shares = share_records(switch)
    if len(shares) > len(all_of(switch)):
        blocks.append(
            Table("switch_shares", "Shares on every basis", fields.SHARES, shares, lead=2)
        )
    for point in switch.baseline.points:
        records = point_records(switch, point.name)
        marks = {i: "act" for i, line in enumerate(records) if line["status"] != "burning"}
        blocks.append(
            Table(
                "switch_points",
                f"Point {point.name}",
                _shown(fields.POINTS, records),
                records,
                marks,
            )
        )
        blocks.append(
            Table("switch_more", f"Point {point.name}, more", _shown(fields.MORE, records), records)
        )
    blocks += _other_mechanisms(switch)
    for one in switch.fuels:
        blocks.append(Heading(f"{one.properties.fuel.name}: {one.verdict}"))
        blocks += [Prose(f"- {sentence(reason)}") for reason in _unlike(one)]
    changes = change_records(switch)
    if changes:
        columns = select(fields.CHANGES, "fuel", "what", "amount")
        below = tuple(line["note"] for line in changes)
        blocks.append(Table("switch_changes", "Changes", columns, changes, {}, below, lead=2))
    if switch.ladder is not None:
        blocks += _ladder(switch.ladder)
    blocks.append(_verdicts(switch))
    blocks.append(Heading("Before use"))
    blocks += [Prose(line) for line in cautions((*_own_cautions(switch), *_said(switch)))]
    return tuple(blocks)


def _facts(switch: Switch) -> tuple[tuple[str, str], ...]:
    facts = [
        ("present fuel", switch.baseline.properties.fuel.name),
        ("held", _HELD[switch.hold]),
        ("mechanism", f"one for all: {switch.mechanism_note}"),
        (
            "nozzle",
            f"pressure ratio {switch.injector_ratio:.3f} at the design point on the present fuel: "
            f"{switch.injector_ratio_source}",
        ),
    ]
    unstated = [p.fuel.name for p in (s.properties for s in all_of(switch)) if p.sulfur is None]
    if unstated:
        facts.append(
            ("sulfur", f"not stated for {', '.join(unstated)}: acid dew point not worked out")
        )
    if switch.sized:
        facts.append(("metal", "none in the case: sized on the present fuel first"))
    return tuple(facts)


def _shown(columns: tuple[Field, ...], records: tuple[dict[str, object], ...]) -> tuple[Field, ...]:
    """Return the columns that hold anything."""
    return tuple(
        f for f in columns if any(record[f.path or f.key] is not None for record in records)
    )


def _unlike(one: Switched, most: int = 14) -> list[str]:
    """Return the reasons, like ones at several points in one line."""
    groups: dict[str, list[str]] = {}
    for limit in one.broken:
        groups.setdefault(limit.what, []).append(reason_words(limit))
    firsts = []
    for words in groups.values():
        more = f" (and at {len(words) - 1} more points)" if len(words) > 1 else ""
        firsts.append(words[0] + more)
    told = {reason for words in groups.values() for reason in words}
    rest = [reason for reason in one.reasons if reason not in told]
    return [*firsts, *rest][:most]


def _other_mechanisms(switch: Switch) -> list[Block]:
    lines = []
    design = {p.name: p for p in switch.baseline.points}
    for one in switch.fuels:
        if one.own_mechanism_nox is None:
            continue
        rated = next(p for p in one.points if p.kind == "rated" or p.name in design)
        shared = None if rated.emissions is None else rated.emissions.nox_dry_15
        beside = "" if shared is None else f" against {1e6 * shared:.3g} ppm here"
        lines.append(
            Prose(
                f"{one.properties.fuel.name}: {1e6 * one.own_mechanism_nox:.3g} ppm NOx at the "
                f"design point by {one.own_mechanism}, which it would be given alone{beside}."
            )
        )
    return [Heading("Beside the one mechanism"), *lines] if lines else []


def _ladder(rung: Rung) -> list[Block]:
    return [
        Heading(f"Ladder of {rung.added}"),
        Prose(_climbed("the present nozzle", rung.share, _stop(rung.stopped_by))),
        Prose(
            _climbed(
                "a nozzle made for each blend",
                rung.with_nozzle,
                _stop(rung.then_stopped_by),
            )
        ),
    ]


def _stop(limit: Limit | None) -> str | None:
    return None if limit is None else reason_words(limit)


def _climbed(metal: str, share: float | None, stopped: str | None) -> str:
    reached = (
        "not even the first rung keeps" if share is None else f"{100 * share:.4g} % by volume keeps"
    )
    words = f"With {metal}, {reached} every limit"
    return f"{words}; then {stopped}." if stopped else f"{words}, the last rung."


def _verdicts(switch: Switch) -> Table:
    records = verdict_records(switch)
    shown = tuple({**line, "verdict": _SIGNS[line["verdict"]]} for line in records)
    marks = {i: _MARKS[line["verdict"]] for i, line in enumerate(records)}
    columns = select(fields.VERDICTS, "verdict", "fuel")
    below = tuple(line["reason"] for line in shown)
    return Table("switch_verdicts", "Verdicts", columns, shown, marks, below, lead=2)


def _own_cautions(switch: Switch) -> list[str]:
    found: dict[str, None] = {}
    for one in switch.fuels:
        fuel = one.properties.fuel
        if fuel.composition.get("H2", 0.0) >= _TOXIC:
            found[HYDROGEN] = None
        if fuel.composition.get("NH3", 0.0) > 0.0:
            found[AMMONIA] = None
        if fuel.composition.get("CO", 0.0) >= _TOXIC:
            found[CARBON_MONOXIDE] = None
        if fuel.phase == "liquid":
            found[LIQUID] = None
    return list(found)


def _said(switch: Switch) -> list[str]:
    return [line for one in switch.fuels for line in one.properties.fuel.cautions]
