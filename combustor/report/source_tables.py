"""The methods and where they were read: one line a method, or those behind one value."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

from combustor.report.behind import BEHIND, FROM_REACTIONS
from combustor.report.document import Block, Prose, Table
from combustor.report.field import Field, row
from combustor.studies.sources import Source, behind

SOURCE_TABLES = ("sources",)

_FIELDS = (
    Field("key", "method", "method.key"),
    Field("room", "room"),
    Field("used_in", "used in"),
    Field("quantity", "gives", "method.quantity"),
    Field("source", "source", "method.source"),
    Field("reading", "read", "method.reading"),
    Field("validity", "validity"),
    Field("scatter", "scatter", "method.scatter"),
    Field("note", "note", "method.note"),
)
_SHOWN = ("key", "quantity", "reading")


def sources_report(sources: Iterable[Source], case_title: str | None) -> tuple[Block, ...]:
    """Return the methods with source, range, scatter and note under each."""
    held = tuple(sources)
    title = "Methods and figures" if case_title is None else f"Methods behind {case_title}"
    table = Table(
        "sources",
        title,
        tuple(field for field in _FIELDS if field.key in _SHOWN),
        tuple(_record(one) for one in held),
        below=tuple(_beneath(one) for one in held),
    )
    memory = sum(one.method.reading == "from memory" for one in held)
    read = sum(one.method.reading in ("read", "as given in") for one in held)
    return (
        table,
        Prose(
            f"Methods: {len(held)}, of which {read} were read in a source and {memory} are from "
            "memory; the others are derived, computed, practice or judgement. Ranges are in SI "
            "units."
        ),
    )


def sources_data(sources: Iterable[Source]) -> tuple[Table, ...]:
    """Return the CSV table."""
    return (Table("sources", "Sources", _FIELDS, tuple(_record(one) for one in sources)),)


def sources_document(
    sources: Iterable[Source], version: str, case_title: str | None
) -> dict[str, Any]:
    """Return the document of ``sources --json``."""
    found = []
    for one in sources:
        document = row(_FIELDS, _record(one))
        document["used_in"] = list(one.used_in)
        document["validity"] = {
            name: {"low": low, "high": high} for name, (low, high) in one.method.validity.items()
        }
        found.append(document)
    return {"version": version, "case": case_title, "sources": found}


def behind_value(quantity: str, sources: Iterable[Source]) -> tuple[Source, ...]:
    """Return the methods behind one value of a table; see `combustor.studies.sources.behind`."""
    held = tuple(sources)
    mechanisms = tuple(one.method.key for one in held if one.room == "mechanisms")
    by_field = {
        name: keys + mechanisms if name.startswith(FROM_REACTIONS) else keys
        for name, keys in BEHIND.items()
    }
    return behind(quantity, held, by_field)


def _record(source: Source) -> dict[str, Any]:
    return {
        "method": source.method,
        "room": source.room,
        "used_in": ", ".join(source.used_in),
        "validity": _ranges(source),
    }


def _ranges(source: Source) -> str:
    return "; ".join(
        f"{name.replace('_', ' ')} {low:.6g} to {high:.6g}"
        for name, (low, high) in source.method.validity.items()
    )


def _beneath(source: Source) -> str:
    method = source.method
    parts = [method.source]
    if method.validity:
        parts.append(f"valid for {_ranges(source)}")
    if method.scatter:
        parts.append(f"scatter: {method.scatter}")
    if method.note:
        parts.append(method.note)
    if source.used_in:
        parts.append(f"used in {' and '.join(source.used_in)}")
    return ". ".join(part.rstrip(".") for part in parts)
