"""The sizing report: each dimension, the method that decided it, and the rival that lost."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from combustor.case.schema import Case
from combustor.report import fields
from combustor.report.cautions import cautions
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, row, select
from combustor.report.json_out import findings_list
from combustor.report.rating_rows import SplitRow, rows_of_split
from combustor.report.rating_tables import findings_table, solve_words
from combustor.report.trade_tables import TRADES, trades_table
from combustor.sizing.record import Design, Dimension
from combustor.sizing.trades import Trade


def sizing_report(
    design: Design, case: Case, fuel_cautions: Sequence[str], trades: Sequence[Trade] = ()
) -> tuple[Block, ...]:
    """Return the whole report of a sized case."""
    missed = f"worst target missed by {100.0 * design.convergence.residual:.0f} % of its tolerance"
    facts = (
        ("pressure loss", _loss_words(design)),
        ("fuel flow", f"{design.fuel_flow:.4f} kg/s at the design point"),
        ("solve", solve_words(design.convergence, missed)),
    )
    return (
        Heading(f"{case.title}: sized" if case.title else "Sized"),
        Facts(facts),
        dimensions_table(design),
        methods_table(design),
        Table("zones", "Zones at the design point", fields.ZONE_TARGETS, design.zones),
        Table("split", "Air split at the design point", fields.SPLIT, _split(design, case)),
        *((trades_table(trades),) if trades else ()),
        findings_table([("", finding) for finding in design.findings]),
        Heading("Before use"),
        *(Prose(line) for line in cautions(fuel_cautions)),
    )


def dimensions_table(design: Design) -> Table:
    """Return one line a dimension: value, method by name and number, and what lost to it."""
    number = _numbers(design)
    records = tuple(
        {
            "line": dimension_values(dimension),
            "text": _value_text(dimension, dimension.value),
            "method": _method_words(dimension, number) + _rival_words(dimension, number),
        }
        for dimension in design.dimensions
    )
    name, value, unit = select(fields.DIMENSIONS, "name", "value", "unit")
    columns = (
        name.beneath("line"),
        Field("text", value.label, figures=4),
        unit.beneath("line"),
        Field("method", "method [number]; remark. What lost to it, and why", lines=True),
    )
    return Table("dimensions", "Dimensions", columns, records)


def methods_table(design: Design) -> Table:
    """Return the numbered methods: what each gives, its source, where that was read."""
    records = tuple(
        {"number": f"[{number}]", "method": method}
        for number, method in enumerate(design.methods, start=1)
    )
    columns = (
        Field("number", "no."),
        Field("quantity", "method").beneath("method"),
        Field("source", "source").beneath("method"),
        Field("reading", "where it was read").beneath("method"),
    )
    return Table("methods", "Methods and their sources", columns, records)


def sizing_data(design: Design, case: Case) -> tuple[Table, ...]:
    """Return every number of the design as tables, one CSV file each."""
    lines = tuple(dimension_values(dimension) for dimension in design.dimensions)
    return (
        Table("dimensions", "Dimensions", fields.DIMENSIONS, lines),
        Table("zones", "Zones", fields.ZONE_TARGETS, design.zones),
        Table("split", "Air split", fields.SPLIT, _split(design, case)),
        Table("findings", "Findings", fields.FINDINGS, design.findings),
    )


SIZING_TABLES = ("dimensions", "zones", "split", "findings")


def design_document(
    design: Design, case: Case, version: str, trades: Sequence[Trade] = ()
) -> dict[str, Any]:
    """Return the document of ``size --json``."""
    return {
        "title": case.title,
        "version": version,
        "case_sha256": case.sha256,
        "converged": design.converged,
        "pressure_loss_percent": 100.0 * design.split.pressure_loss,
        "pressure_loss_target_percent": 100.0 * design.pressure_loss_target,
        "fuel_flow_kg_s": design.fuel_flow,
        "dimensions": [dimension_values(dimension) for dimension in design.dimensions],
        "zones": [row(fields.ZONE_TARGETS, zone) for zone in design.zones],
        "trades": [row(TRADES, trade) for trade in trades],
        "split": [row(fields.SPLIT, line) for line in _split(design, case)],
        "findings": findings_list(design.findings),
    }


def dimension_values(dimension: Dimension) -> dict[str, Any]:
    """Return one dimension as plain values in the unit it is printed in."""
    kind = fields.UNIT_KINDS[dimension.unit]
    rival = dimension.candidate
    return {
        "name": dimension.name,
        "value": kind.value({"value": dimension.value}),
        "unit": kind.unit,
        "method": dimension.method.quantity,
        "source": dimension.method.source,
        "reading": dimension.method.reading,
        "note": dimension.note,
        "candidate_value": None if rival is None else kind.value({"value": rival.value}),
        "candidate_method": None if rival is None else rival.method.quantity,
        "candidate_source": None if rival is None else rival.method.citation,
        "candidate_reason": None if rival is None else rival.reason,
    }


def _split(design: Design, case: Case) -> tuple[SplitRow, ...]:
    air_flow = case.point(case.targets.design_point).air_flow
    return rows_of_split(design.split, design.hardware, air_flow)


def _value_text(dimension: Dimension, value: float) -> str:
    return fields.UNIT_KINDS[dimension.unit].text({"value": value})


def _numbers(design: Design) -> dict[str, int]:
    return {method.key: n for n, method in enumerate(design.methods, start=1)}


def _method_words(dimension: Dimension, number: dict[str, int]) -> str:
    words = f"{dimension.method.quantity} [{number[dimension.method.key]}]"
    return f"{words}; {dimension.note}" if dimension.note else words


def _rival_words(dimension: Dimension, number: dict[str, int]) -> str:
    rival = dimension.candidate
    if rival is None:
        return ""
    value = _value_text(dimension, rival.value)
    if rival.method.key == dimension.method.key:
        return f"\nnot {value}: {rival.reason}"
    return f"\nnot {value} by {rival.method.quantity} [{number[rival.method.key]}]: {rival.reason}"


def _loss_words(design: Design) -> str:
    reached, wanted = 100.0 * design.split.pressure_loss, 100.0 * design.pressure_loss_target
    return f"{reached:.2f} % at the design point, {wanted:.2f} % wanted"
