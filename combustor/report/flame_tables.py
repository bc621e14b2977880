"""The report of one flame: equilibrium, and the stirred reactor where a time was given."""

from __future__ import annotations

from typing import Any

from combustor.fuel.record import Fuel
from combustor.report import fields, theme
from combustor.report.cautions import sentence
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, row, select
from combustor.studies.flame import Flame

FLAME_TABLES = ("flame",)

_EMISSIONS = select(
    fields.EMISSIONS,
    "nox_ppmvd_15",
    "co_ppmvd_15",
    "n2o_ppmvd_15",
    "ei_nox_g_kg",
    "ei_co_g_kg",
    "o2_percent_dry",
)
_UNDEFINED = (
    "NOx and CO at 15 % O2 are undefined where the gas is rich or holds more than 20 % O2 dry."
)


def flame_report(flame: Flame, fuel: Fuel) -> tuple[Block, ...]:
    """Return everything about one flame."""
    given = [field for field in fields.FLAME if field.key not in ("fuel", "residence_time_ms")]
    if flame.fuel_temperature is None:
        given = [f for f in given if f.key not in ("fuel_temperature_K", "mixture_temperature_K")]
    blocks: list[Block] = [
        Heading(f"Flame of {flame.fuel}"),
        Facts(tuple((field.label, field.with_unit(flame)) for field in given)),
        _table(flame),
    ]
    if flame.equilibrium.nox_dry_15 is None:
        blocks.append(Prose(_UNDEFINED))
    blocks.append(Prose(sentence(f"mechanism {fuel.mechanism_note}")))
    blocks += [Prose(sentence(caution)) for caution in fuel.cautions]
    return tuple(blocks)


def flame_data(flame: Flame) -> tuple[Table, ...]:
    """Return the CSV table: one line a reactor, with the conditions in every line."""
    columns = (
        Field("reactor", "reactor"),
        Field("status", "status"),
        *(f.renamed(f"given_{f.key}").beneath("flame", f"given_{f.key}") for f in fields.FLAME),
        fields.FLAME_TEMPERATURE,
        *(field.beneath("emissions") for field in fields.EMISSIONS),
    )
    return (Table("flame", "Flame", columns, _reactors(flame)),)


def flame_document(flame: Flame) -> dict[str, Any]:
    """Return the document of ``flame --json``."""
    stirred = flame.stirred
    return {
        **row(fields.FLAME, flame),
        "equilibrium": {
            "temperature_K": flame.equilibrium_temperature,
            **row(fields.EMISSIONS, flame.equilibrium),
        },
        "stirred": None
        if stirred is None
        else {
            "status": stirred.status,
            **row((fields.FLAME_TEMPERATURE,), stirred),
            **row(fields.EMISSIONS, stirred.emissions),
        },
    }


def _reactors(flame: Flame) -> tuple[dict[str, Any], ...]:
    lines = [
        {
            "reactor": "equilibrium",
            "status": "burning",
            "temperature": flame.equilibrium_temperature,
            "emissions": flame.equilibrium,
            "flame": flame,
        }
    ]
    if flame.stirred is not None:
        lines.append(
            {
                "reactor": "stirred",
                "status": flame.stirred.status,
                "temperature": flame.stirred.temperature,
                "emissions": flame.stirred.emissions,
                "flame": flame,
            }
        )
    return tuple(lines)


def _table(flame: Flame) -> Table:
    time = next(field for field in fields.FLAME if field.key == "residence_time_ms")
    records = tuple(
        line
        | {
            "words": theme.status(line["status"]) if line["reactor"] == "stirred" else "burnt",
            "name": line["reactor"]
            if line["reactor"] == "equilibrium"
            else f"stirred, {time.with_unit(flame)}",
        }
        for line in _reactors(flame)
    )
    columns = (
        Field("name", "reactor"),
        Field("words", "status"),
        fields.FLAME_TEMPERATURE,
        *(field.beneath("emissions") for field in _EMISSIONS),
    )
    marks = {i: "act" for i, line in enumerate(records) if line["status"] != "burning"}
    return Table("flame", "Burnt gas (ppm: dry, 15 % O2)", columns, records, marks)
