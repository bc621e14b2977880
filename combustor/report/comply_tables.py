"""The report of a compliance pre-check: verdicts last but one, the caution last."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import asdict
from typing import Any

from combustor.emissions.facts import shown_value
from combustor.emissions.verdict import Verdict
from combustor.report import permit_fields as fields
from combustor.report.cautions import sentence
from combustor.report.comply_data import (
    SMOKE_TITLE,
    concentrations,
    dew_points,
    fuel_factors,
    gap_records,
    masses,
    smoke_trend,
)
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, row, select
from combustor.report.permit_theme import CAUTION, MARKS, WORDS
from combustor.studies.comply_record import ComplyCheck

_DECIDED = (
    Field("words", "verdict"),
    *select(
        fields.VERDICTS,
        "point",
        "pollutant",
        "predicted",
        "predicted_rounded",
        "band_low",
        "band_high",
        "limit",
        "unit",
        "margin",
        "margin_percent",
        "probability_of_exceeding",
    ),
)
_MAIN = ("NOx", "CO", "UHC", "N2O", "NH3", "SO2")
_HIDDEN_FACTS = ("fuel_nitrogen",)
_LEAST_PPM = 0.1


def comply_report(check: ComplyCheck) -> tuple[Block, ...]:
    """Return everything about one pre-check."""
    blocks: list[Block] = [
        Heading(f"Compliance pre-check of {check.title}"),
        Facts(_facts(check)),
        *_rule_sets(check),
        _applicability(check),
        *_bases(check),
        *_verdicts(check),
        *_gaps(check),
        Heading("Before use"),
        Prose(CAUTION),
    ]
    blocks += [Prose(sentence(note)) for note in (*check.notes, *check.cautions)]
    return tuple(blocks)


def comply_document(check: ComplyCheck, version: str) -> dict[str, Any]:
    """Return the document of ``comply --json``."""
    return {
        "title": check.title,
        "version": version,
        "case_sha256": check.case_sha256,
        "fuel": check.fuel,
        "inside": check.inside,
        "verdicts": [_verdict_document(verdict) for verdict in check.verdicts],
        "applicability": [asdict(standing) for standing in check.standings],
        "gaps": [asdict(gap) for gap in check.gaps],
        "concentrations": list(concentrations(check)),
        "masses": list(masses(check)),
        "dew_points": list(dew_points(check)),
        "smoke_trend": list(smoke_trend(check)),
        "fuel_factors": list(fuel_factors(check)),
        "rules": [
            {
                "name": rules.name,
                "title": rules.table.title,
                "reference": rules.table.reference,
                "edition": rules.table.edition,
                "date": rules.table.date.isoformat(),
                "review": rules.table.review.isoformat(),
                "past_review": rules.name in check.overdue,
                "oxygen_in_air_percent": 100.0 * rules.table.oxygen_in_air,
                "left_out": list(rules.table.left_out),
            }
            for rules in check.rules
        ],
        "notes": list(check.notes),
        "caution": CAUTION,
    }


def _verdict_document(verdict: Verdict) -> dict[str, Any]:
    return {**row(fields.VERDICTS, verdict), "missing": list(verdict.missing)}


def _facts(check: ComplyCheck) -> tuple[tuple[str, str], ...]:
    facts = check.facts
    pairs = [("fuel", check.fuel)]
    if facts.heat_input is not None:
        basis = facts.heat_input_basis or "LHV or HHV not stated"
        pairs.append(("heat input", f"{shown_value('heat_input', facts.heat_input)} {basis}"))
    for name, value in facts.values.items():
        if name not in _HIDDEN_FACTS:
            label = "fuel class" if name == "fuel" else name.replace("_", " ")
            pairs.append((label, shown_value(name, value)))
    return tuple(pairs)


def _rule_sets(check: ComplyCheck) -> list[Block]:
    blocks: list[Block] = []
    for rules in check.rules:
        if any(s.rule == rules.name and s.row == "" and s.binds is False for s in check.standings):
            continue
        table = rules.table
        review = "! review overdue since " if rules.name in check.overdue else "review by "
        pairs = [
            ("rule set", f"{rules.name}: {table.title}"),
            ("reference", table.reference),
            ("edition", f"{table.edition}; {review}{table.review.isoformat()}"),
            (
                "basis",
                f"{100 * table.reference_oxygen:g} % O2 with {100 * table.oxygen_in_air:g} % O2 in "
                f"air; heat on {table.heating_value}",
            ),
        ]
        pairs += [("left out", text) for text in table.left_out]
        blocks += [Heading(table.title), Facts(tuple(pairs))]
    return blocks


def _applicability(check: ComplyCheck) -> Table:
    groups: dict[tuple[str, bool | None, str, tuple[str, ...]], list[str]] = {}
    for s in check.standings:
        shown = _family(check, s.rule, s.row) if s.row else "the set as a whole"
        rows = groups.setdefault((s.rule, s.binds, s.why, s.points), [])
        if shown not in rows:
            rows.append(shown)
    words = {True: "+ binds", None: "? cannot tell", False: "- no"}
    order = list(words)
    groups = dict(sorted(groups.items(), key=lambda item: order.index(item[0][1])))
    records = tuple(
        {
            "binds": words[binds],
            "rule": rule,
            "rows": ", ".join(rows),
            "points": ", ".join(points) or "all",
            "why": why,
        }
        for (rule, binds, why, points), rows in groups.items()
    )
    columns = (
        Field("binds", "binds"),
        Field("rule", "rule set"),
        Field("rows", "rows"),
        Field("points", "points"),
    )
    return Table(
        "applicability",
        "What binds, what does not, and why",
        columns,
        records,
        below=tuple(record["why"] for record in records),
    )


def _family(check: ComplyCheck, rule: str, name: str) -> str:
    for rules in check.rules:
        if rules.name == rule:
            return rules.row(name).choice or name
    return name


def _bases(check: ComplyCheck) -> list[Block]:
    if not check.stacks:
        return []
    shown = _worth_showing(check)
    smoke = smoke_trend(check)
    volumes = tuple(line for line in concentrations(check) if line["pollutant"] in shown)
    weights = tuple(line for line in masses(check) if line["pollutant"] in (*shown, "CO2"))
    return [
        Table(
            "concentrations",
            "Concentrations (20.95 % O2 in air; NOx as NO2, UHC as CH4)",
            fields.CONCENTRATIONS,
            volumes,
            lead=2,
        ),
        Table(
            "masses",
            "Masses (NOx as NO2, UHC as CH4)",
            _filled(fields.MASSES, weights),
            weights,
            lead=2,
        ),
        Table(
            "fuel_factors",
            "Fuel factors (68 degF, 29.92 inHg, HHV)",
            select(fields.FUEL_FACTORS, "factor", "dry", "wet", "carbon_dioxide"),
            fuel_factors(check),
        ),
        Table(
            "dew_points",
            "Dew points at 101.325 kPa",
            _filled(fields.DEW_POINTS, dew_points(check)),
            dew_points(check),
        ),
        *([Table("smoke", SMOKE_TITLE, fields.SMOKE, smoke)] if smoke else []),
    ]


def _worth_showing(check: ComplyCheck) -> set[str]:
    """Return the pollutants that reach a tenth of a ppm somewhere; the files hold all."""
    return {
        line["pollutant"]
        for line in concentrations(check)
        if line["pollutant"] in _MAIN and (line["ppmvd"] or 0.0) >= _LEAST_PPM
    }


def _filled(columns: tuple[Field, ...], records: Iterable[Any]) -> tuple[Field, ...]:
    """Return the columns in which some record has a value."""
    records = tuple(records)
    return tuple(f for f in columns if any(f.value(record) is not None for record in records))


def _verdicts(check: ComplyCheck) -> list[Block]:
    blocks: list[Block] = [Heading("Verdicts")]
    for rules in check.rules:
        mine = [v for v in check.verdicts if v.rule == rules.name]
        decided = [v for v in mine if v.verdict != "undecided"]
        if decided:
            blocks.append(_decided(rules.name, decided))
        undecided = [v for v in mine if v.verdict == "undecided"]
        if undecided:
            blocks.append(_undecided(check, rules.name, undecided))
    if not check.verdicts:
        blocks.append(Prose("No limit of the rule sets named binds this machine."))
    return blocks


def _decided(name: str, verdicts: list[Verdict]) -> Table:
    records = tuple({**asdict(v), "words": WORDS[v.verdict]} for v in verdicts)
    return Table(
        "verdicts",
        f"{name}: predicted against limit",
        _DECIDED,
        records,
        {i: MARKS[v.verdict] for i, v in enumerate(verdicts)},
        below=tuple(_remark(v) for v in verdicts),
        lead=2,
    )


def _remark(verdict: Verdict) -> str:
    parts = [f"{verdict.row} ({verdict.limit_status})"]
    if verdict.choice:
        parts.append(f"an option of {verdict.choice.partition('/')[2]}")
    if verdict.averaging:
        parts.append(verdict.averaging)
    parts += [text for text in (verdict.reason, verdict.beside) if text]
    return "; ".join(parts)


def _undecided(check: ComplyCheck, name: str, verdicts: list[Verdict]) -> Table:
    groups: dict[tuple[str, str], tuple[list[str], list[str], list[str]]] = {}
    for v in verdicts:
        points, rows, pollutants = groups.setdefault((v.reason, v.choice), ([], [], []))
        shown = _family(check, name, v.row) if v.row else "the set as a whole"
        for known, new in ((points, v.point), (rows, shown), (pollutants, v.pollutant)):
            if new not in known:
                known.append(new)
    merged: dict[tuple[str, tuple[str, ...]], tuple[list[str], list[str]]] = {}
    for (reason, _), (points, rows, pollutants) in groups.items():
        all_rows, all_pollutants = merged.setdefault((reason, tuple(points)), ([], []))
        all_rows += [r for r in rows if r not in all_rows]
        all_pollutants += [p for p in pollutants if p not in all_pollutants]
    records = tuple(
        {
            "words": WORDS["undecided"],
            "points": ", ".join(points),
            "pollutants": ", ".join(pollutants),
            "rows": ", ".join(rows),
            "reason": reason,
        }
        for (reason, points), (rows, pollutants) in merged.items()
    )
    columns = (
        Field("words", "verdict"),
        Field("points", "points"),
        Field("pollutants", "pollutant"),
        Field("rows", "rows"),
    )
    return Table(
        "undecided",
        f"{name}: undecided, facts missing",
        columns,
        records,
        dict.fromkeys(range(len(records)), "watch"),
        below=tuple(record["reason"] for record in records),
    )


def _gaps(check: ComplyCheck) -> list[Block]:
    blocks: list[Block] = []
    for gap in check.gaps:
        records = tuple(line for line in gap_records(check) if line["pollutant"] == gap.pollutant)
        blocks.append(
            Table(
                "gaps",
                f"What would bring {gap.pollutant} of {gap.point}, band and all, inside "
                f"{gap.rule}/{gap.row}: down to {gap.factor:.2f} of the band's high end",
                select(fields.GAPS, "what", "change", "note"),
                records,
            )
        )
    return blocks
