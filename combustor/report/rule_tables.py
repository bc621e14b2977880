"""The catalogue of rule sets: one line a set, or one set in full."""

from __future__ import annotations

from collections.abc import Iterable
from datetime import date
from typing import Any

from combustor.emissions.facts import shown_value
from combustor.emissions.rule_schema import UNVERIFIED, Range, Row, When
from combustor.emissions.rule_set import RuleSet
from combustor.report import permit_fields as fields
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import select

RULE_TABLES = ("rules", "rule_rows")


def rules_table(sets: Iterable[RuleSet], today: date) -> Table:
    """Return one line a rule set."""
    return Table("rules", "Rule sets", fields.RULE_SETS, tuple(_set(s, today) for s in sets))


def rule_report(rules: RuleSet, today: date) -> tuple[Block, ...]:
    """Return everything one rule set says."""
    table = rules.table
    overdue = "! overdue: " if table.review < today else ""
    pairs = [
        ("where", table.jurisdiction),
        ("reference", table.reference),
        ("edition", f"{table.edition} ({table.date.isoformat()})"),
        ("review", f"{overdue}by {table.review.isoformat()}"),
        ("binds", table.applies_to),
        (
            "basis",
            f"{100 * table.reference_oxygen:g} % O2 with {100 * table.oxygen_in_air:g} % O2 in air;"
            f" heat input on {table.heating_value}",
        ),
    ]
    pairs += [
        ("condition", f"{name}: {when_text(when)}") for name, when in table.conditions.items()
    ]
    pairs += [("exempt", f"{e.what} ({e.reading}: {e.read_in})") for e in table.exemptions]
    pairs += [("note", text) for text in table.notes]
    pairs += [("left out", text) for text in table.left_out]
    rows = tuple(_row(r) for r in table.limits)
    limits = Table(
        "rule_rows",
        "Limits",
        select(fields.RULE_ROWS, "row", "pollutant", "limit", "unit", "reading"),
        rows,
        below=tuple(_below(r) for r in rows),
    )
    memory = sum(r.reading in UNVERIFIED for r in table.limits)
    blocks: list[Block] = [Heading(f"{rules.name}: {table.title}"), Facts(tuple(pairs)), limits]
    if memory:
        blocks.append(
            Prose(
                f"{memory} of {len(rows)} figures are from memory or of an older edition: none of "
                "them gives the verdict inside before you have read the official text and named "
                "the row in [rules] confirmed."
            )
        )
    return tuple(blocks)


def rules_data(sets: Iterable[RuleSet], today: date) -> tuple[Table, ...]:
    """Return the CSV tables: sets, and their rows."""
    sets = tuple(sets)
    rows = tuple({"rule": s.name, **_row(r)} for s in sets for r in s.table.limits)
    columns = (fields.STANDINGS[0], *fields.RULE_ROWS)
    return rules_table(sets, today), Table("rule_rows", "Limits", columns, rows, lead=2)


def rules_document(sets: Iterable[RuleSet], version: str, today: date) -> dict[str, Any]:
    """Return the document of ``rules --json``."""
    return {
        "version": version,
        "rules": [
            {
                "name": s.name,
                "past_review": s.table.review < today,
                **s.table.model_dump(mode="json", exclude_none=True),
            }
            for s in sets
        ],
    }


def when_text(alternatives: Iterable[When]) -> str:
    """Return conditions in words."""
    return "; or ".join(_one(when) for when in alternatives) or "always"


def _one(when: When) -> str:
    parts = []
    for name in type(when).model_fields:
        wanted = getattr(when, name)
        if wanted is None:
            continue
        label = name.replace("_", " ")
        if isinstance(wanted, Range):
            bounds = [
                f"{words} {shown_value(name, getattr(wanted, key))}"
                for key, words in (
                    ("above", "above"),
                    ("at_least", "at least"),
                    ("below", "below"),
                    ("up_to", "up to"),
                )
                if getattr(wanted, key) is not None
            ]
            parts.append(f"{label} {' and '.join(bounds)}")
        else:
            parts.append(f"{label} {' or '.join(wanted)}")
    return ", ".join(parts)


def _set(rules: RuleSet, today: date) -> dict[str, Any]:
    table = rules.table
    overdue = "! " if table.review < today else ""
    return {
        "name": rules.name,
        "table": table,
        "rows": len(table.limits),
        "memory": sum(r.reading in UNVERIFIED for r in table.limits),
        "review": f"{overdue}{table.review.isoformat()}",
    }


def _row(row: Row) -> dict[str, Any]:
    return {
        "row": row.row,
        "pollutant": row.pollutant,
        "limit": limit_text(row),
        "unit": row.emission_unit.text,
        "when": _conditions(row),
        "reading": row.reading,
        "averaging": row.averaging or "",
        "read_in": row.read_in,
        "note": row.note or "",
        "choice": row.choice or "",
    }


def limit_text(row: Row) -> str:
    """Return a limit as the rule words it."""
    if row.terms is not None:
        parts = [
            f"{value:+g}{tail}"
            for value, tail in (
                (row.terms.pressure_ratio, " pi"),
                (row.terms.thrust, " F"),
                (row.terms.product, " pi F"),
            )
            if value
        ]
        return " ".join([f"{row.terms.constant:g}", *parts])
    text = f"{row.limit:g}"
    if row.scale is not None:
        cap = f", at most {row.scale.cap:g}" if row.scale.cap is not None else ""
        text += f" x efficiency/{100 * row.scale.reference:g} %{cap}"
    if row.nitrogen:
        text += " + fuel nitrogen"
    if row.hydrogen_factor is not None:
        text += f" x 1 to {row.hydrogen_factor:g} by hydrogen"
    return text


def _conditions(row: Row) -> str:
    parts = [when_text(row.when)] if row.when else []
    if row.given is not None:
        parts.append(f"under {row.given}")
    if row.unless is not None:
        parts.append(f"unless {row.unless}")
    return "; ".join(parts) or "always"


def _below(record: dict[str, Any]) -> str:
    parts = [record["when"]]
    if record["choice"]:
        parts.append(f"option of {record['choice']}")
    parts += [record[key] for key in ("averaging", "note") if record[key]]
    return "; ".join([*parts, f"({record['read_in']})"])
