"""The report of a conversion: every step of every run, the mean, and the units asked for."""

from __future__ import annotations

from dataclasses import asdict
from typing import Any

from combustor.report import permit_fields as fields
from combustor.report.cautions import sentence
from combustor.report.comply_data import factor_records
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import select
from combustor.studies.convert_record import Conversion

CONVERT_TABLES = ("steps", "results", "fuel_factors")


def convert_report(done: Conversion) -> tuple[Block, ...]:
    """Return everything about one conversion."""
    steps, results, factors = convert_data(done)
    pairs = (
        ("species", done.species),
        ("fuel", done.fuel),
        ("O2 in air", f"{100 * done.oxygen_in_air:g} %"),
        ("runs", f"{len(done.runs)}, each corrected before the mean"),
        ("mean", f"{1e6 * done.mean:.5g} ppmvd@15"),
    )
    blocks: list[Block] = [
        Heading(f"{done.species} on other bases"),
        steps,
        Facts(pairs),
        Table(
            factors.name,
            factors.title,
            select(fields.FUEL_FACTORS, "factor", "dry", "wet", "carbon_dioxide"),
            factors.records,
        ),
        results,
    ]
    blocks += [Prose(sentence(note)) for note in done.notes]
    return tuple(blocks)


def convert_data(done: Conversion) -> tuple[Table, Table, Table]:
    """Return the CSV tables."""
    records = tuple(
        {"run": str(number), **asdict(step)}
        for number, run in enumerate(done.runs, 1)
        for step in run
    )
    return (
        Table("steps", "Steps", fields.STEPS, records),
        Table("results", "Results", fields.RESULTS, done.results),
        Table(
            "fuel_factors",
            "Fuel factors (68 degF, 29.92 inHg, HHV)",
            fields.FUEL_FACTORS,
            factor_records(done.own, done.default),
        ),
    )


def convert_document(done: Conversion, version: str) -> dict[str, Any]:
    """Return the document of ``convert --json``."""
    return {
        "version": version,
        "species": done.species,
        "fuel": done.fuel,
        "oxygen_in_air_percent": 100.0 * done.oxygen_in_air,
        "runs": [[asdict(step) for step in run] for run in done.runs],
        "mean_ppmvd_15": 1e6 * done.mean,
        "results": [asdict(result) for result in done.results],
        "fuel_factors": list(factor_records(done.own, done.default)),
        "notes": list(done.notes),
    }
