"""The rating report: duty cycle, then each point in detail, findings last."""

from __future__ import annotations

from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.emissions.exhaust import Emissions
from combustor.rating.record import PointRating, Ratings
from combustor.report import fields, theme
from combustor.report.cautions import cautions
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, select
from combustor.report.rating_rows import (
    finding_rows,
    level_of,
    split_rows,
    summary_row,
    wall_digest,
)

_VERDICT = Field("verdict", "verdict")
_PEAK = Field("wall_peak_K", "wall\npeak", "wall_peak", "K", 1.0, decimals=0)

# Bases of the emissions table, then what stands in each line under them.
_BASES = (
    Field("ei", "mass", unit="g/kg fuel", figures=3),
    Field("ppm", "dry volume\n15 % O2", unit="ppm", figures=3),
    Field("mass", "dry mass\n15 % O2", unit="mg/Nm3", figures=3),
    Field("energy", "on heat", unit="g/MJ LHV", figures=3),
)
_SPECIES = (
    (
        "NOx as NO2",
        {
            "ei": "ei_nox_g_kg",
            "ppm": "nox_ppmvd_15",
            "mass": "nox_mg_nm3_15",
            "energy": "nox_g_MJ",
        },
    ),
    ("CO", {"ei": "ei_co_g_kg", "ppm": "co_ppmvd_15", "mass": "co_mg_nm3_15"}),
    ("UHC as CH4", {"ei": "ei_uhc_g_kg"}),
    ("N2O", {"ppm": "n2o_ppmvd_15"}),
    ("NH3", {"ppm": "nh3_ppmvd_15"}),
)


# Ammonia has its line where there is some: mole fraction, dry, 15 % O2.
LEAST_AMMONIA = 1e-8


def rating_report(ratings: Ratings) -> tuple[Block, ...]:
    """Return the whole report of a rated case."""
    blocks: list[Block] = [Heading(ratings.title or "Rating")]
    if ratings.sized:
        blocks.append(Prose("The case holds no metal: it was sized first, then rated."))
    blocks.append(duty_cycle(ratings))
    for point in ratings.points:
        blocks += point_blocks(point)
    blocks.append(findings_table(_all_findings(ratings)))
    said = [line for point in ratings.points for line in point.cautions]
    blocks.append(Heading("Before use"))
    blocks += [Prose(line) for line in cautions(said)]
    return tuple(blocks)


def duty_cycle(ratings: Ratings) -> Table:
    """Return the summary of all operating points."""
    lines = [summary_row(point) for point in ratings.points]
    rows = tuple(
        {"row": row, "verdict": theme.verdict(row.level), "status": theme.status(row.point.status)}
        for row in lines
    )
    point = [field.beneath("row.point") for field in select(fields.POINT, "name")]
    columns = (
        *point,
        Field("status", "status"),
        fields.INLET[0].beneath("row.point"),
        *(f.beneath("row.point") for f in fields.FUEL_AIR if f.key != "fuel_air_ratio"),
        fields.EXIT[0].beneath("row.point").labelled("exit"),
        fields.LOSS[0].beneath("row.point"),
        fields.EXIT[2].beneath("row.point"),
        *(
            f.beneath("row.point.emissions")
            for f in select(fields.EMISSIONS, "nox_ppmvd_15", "co_ppmvd_15")
        ),
        _PEAK.beneath("row"),
        _VERDICT,
    )
    marks = {i: line.level for i, line in enumerate(lines) if line.level != "ok"}
    return Table("summary", "Duty cycle (NOx, CO: dry, 15 % O2)", columns, rows, marks)


def point_blocks(point: PointRating) -> list[Block]:
    """Return everything about one operating point, its findings left to the end."""
    level = level_of(point)
    words = f"Point {point.name}: {point.kind}, {point.fuel}, {theme.status(point.status)}"
    blocks: list[Block] = [
        Heading(words, "" if level != "act" else "act"),
        Facts(tuple(_facts(point))),
    ]
    split = split_rows(point)
    if split:
        blocks.append(Table("split", "Air split", fields.SPLIT, split))
    if point.zones:
        blocks.append(Table("zones", "Zones", fields.ZONES, point.zones))
    if len(point.injectors) > 1:
        blocks.append(Table("injectors", "Injectors", fields.INJECTORS, point.injectors))
    if point.walls:
        blocks.append(walls_table(point))
    if point.emissions is not None:
        blocks.append(emissions_table(point.emissions))
        blocks.append(Facts((("exhaust", _joined(_exhaust_fields(), point.emissions)),)))
    if any(value is not None for value in point.operability.values()):
        blocks.append(operability_table(point))
    return blocks


def walls_table(point: PointRating) -> Table:
    """Return a digest of the wall with the hottest station of each side marked in words."""
    digest = wall_digest(point.walls)
    peak = {
        side: max((w for w in digest if w.side == side), key=lambda w: w.temperature)
        for side in {wall.side for wall in digest}
    }
    records = tuple(
        {"wall": wall, "mark": "< hottest" if wall is peak[wall.side] else ""} for wall in digest
    )
    columns = (*(f.beneath("wall") for f in fields.WALLS), Field("mark", ""))
    marks = {i: "title" for i, record in enumerate(records) if record["mark"]}
    return Table("walls", "Wall", columns, records, marks)


def emissions_table(emissions: Emissions) -> Table:
    """Return the emissions on every basis, one line a species."""
    known = {field.key: field for field in fields.EMISSIONS}
    records = []
    for species, bases in _SPECIES:
        texts = {basis: known[key].text(emissions) for basis, key in bases.items()}
        if species != "NH3" or (emissions.nh3_dry_15 or 0.0) >= LEAST_AMMONIA:
            records.append({"species": species, **texts})
    columns = (Field("species", "species"), *_BASES)
    return Table("emissions", "Emissions", columns, tuple(records))


def operability_table(point: PointRating) -> Table:
    """Return blow-out and what else was judged of stability, one line a quantity."""
    known = {field.key: field for field in fields.OPERABILITY}
    records = []
    for key, value in point.operability.items():
        if value is None and key in known:
            continue
        field = known.get(key, Field(key, key.replace("_", " "), figures=4))
        records.append(
            {"what": field.label, "value": field.text(point.operability), "unit": field.unit}
        )
    columns = (
        Field("what", "operability"),
        Field("value", "value", figures=4),
        Field("unit", "unit"),
    )
    return Table("operability", "Operability", columns, tuple(records))


def findings_table(found: list[tuple[str, Finding]]) -> Block:
    """Return the judgements, the gravest last, each with what to change and on what ground."""
    rows = finding_rows(found)
    if not rows:
        return Prose("Findings: none.")
    records = tuple({"row": row, "verdict": theme.verdict(row.level)} for row in rows)
    below = tuple(_advice(row.advice, row.source) for row in rows)
    points = (Field("points", "point").beneath("row"),) if any(row.points for row in rows) else ()
    columns = (
        _VERDICT,
        *points,
        *(
            field.beneath("row")
            for field in select(fields.FINDINGS, "what", "value", "limit", "unit")
        ),
    )
    marks = {i: row.level for i, row in enumerate(rows) if row.level != "ok"}
    return Table("findings", "Findings", columns, records, marks, below, lead=1 + len(points))


def _all_findings(ratings: Ratings) -> list[tuple[str, Finding]]:
    general = [("case", finding) for finding in ratings.findings]
    return general + [(point.name, f) for point in ratings.points for f in point.findings]


def solve_words(convergence: Convergence, measure: str = "") -> str:
    """Return in words how an iterative solve ended, its residual in the words of ``measure``."""
    done = "converged" if convergence.converged else "! not converged"
    count = convergence.iterations
    words = f"{done} in {count} {'pass' if count == 1 else 'passes'}"
    words += f", {measure or f'residual {convergence.residual:.1e}'}"
    return f"{words}: {convergence.message}" if convergence.message else words


def _facts(point: PointRating) -> list[tuple[str, str]]:
    loss = fields.LOSS[0].with_unit(point)
    if point.pressure_loss_parts is not None:
        parts = " + ".join(f"{f.label} {f.text(point)}" for f in fields.LOSS_PARTS)
        loss += f" = {parts}"
    facts = [
        ("air in", _joined(fields.INLET, point)),
        ("fuel in", _joined(fields.FUEL_AIR, point)),
        ("pressure loss", loss),
        ("exit", _joined(fields.EXIT, point)),
    ]
    if point.balances is not None:
        facts.append(("imbalance", _joined(fields.BALANCES, point.balances)))
    if point.convergence is not None:
        facts.append(("solve", solve_words(point.convergence)))
    return facts


def _exhaust_fields() -> tuple[Field, ...]:
    return select(
        fields.EMISSIONS,
        "o2_percent_dry",
        "co2_percent_dry",
        "h2o_percent_wet",
        "no_share_of_nox_percent",
    )


def _joined(group: tuple[Field, ...], record: object) -> str:
    return ", ".join(
        f"{_flat(field.label)} {field.with_unit(record).removesuffix(' -')}" for field in group
    )


def _flat(label: str) -> str:
    return label.replace("-\n", "").replace("\n", " ")


def _advice(advice: str, source: str) -> str:
    if not source:
        return advice
    return f"{advice} ({source})" if advice else f"({source})"
