"""Checks across keys: contradictions, sums, names that must exist or differ.

They read the document as it was written, so that they speak even when other keys are wrong:
a value that cannot be read is left to the schema, which has already said so.
"""

from __future__ import annotations

import difflib
from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from combustor.base.errors import Problem
from combustor.case import kinds as k
from combustor.case.consistency_hardware import hardware_problems
from combustor.case.flight import INLET_KEYS
from combustor.case.problems import Reporter
from combustor.case.quantity import Quantity, QuantityError
from combustor.case.reading import named, number, stated, table, tables

SUM_TOLERANCE = 1e-3
"""How far stated fractions may be from summing to one: printed digits of an analysis."""

FUEL_BY = ("exit_temperature", "fuel_flow", "fuel_air_ratio")


def consistency_problems(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    """Yield every problem that lies between keys rather than in one."""
    yield from _combustor(document, report)
    yield from _fuel(document, report)
    yield from _points(document, report)
    yield from _targets(document, report)
    yield from hardware_problems(document, report)


def _combustor(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    combustor = table(document, "combustor")
    if combustor is None:
        return
    yield from _layout(combustor, "hardware" in document, report)
    for name in ("inlet_annulus", "exit_annulus"):
        ring = table(combustor, name)
        if ring is not None:
            yield from _ring(("combustor", name), ring, "inner", "outer", report)
    yield from _ring(
        ("combustor",), combustor, "casing_inner_diameter", "casing_outer_diameter", report
    )


def _layout(
    combustor: Mapping[str, Any], has_hardware: bool, report: Reporter
) -> Iterator[Problem]:
    layout = combustor.get("layout")
    ring: tuple[str, ...] = ("casing_outer_diameter", "casing_inner_diameter")
    wanted: tuple[str, ...]
    foreign: tuple[str, ...]
    if layout == "can":
        wanted, foreign = ("casing_diameter",), ring
    elif layout in ("can-annular", "annular"):
        wanted, foreign = ring, ("casing_diameter",)
    else:
        return
    for key in foreign:
        if stated(combustor, key):
            yield report.problem(
                ("combustor", key),
                f'does not go with layout = "{layout}"',
                f"state {' and '.join(wanted)} instead",
            )
    if not has_hardware:
        for key in (*wanted, "casing_length", "inlet_annulus", "exit_annulus"):
            if not stated(combustor, key) and ("combustor", key) not in report.misspelt:
                yield report.problem(
                    ("combustor", key),
                    "missing",
                    f'sizing a case with layout = "{layout}" needs it; '
                    "only a case with a [hardware] table can leave it out",
                )
    cans = combustor.get("cans", 1)
    if layout == "can-annular" and cans == 1:
        yield report.problem(
            ("combustor", "cans"),
            "a can-annular machine has several cans",
            "state cans = 2 or more",
            cans,
        )
    if layout == "annular" and isinstance(cans, int) and cans > 1:
        yield report.problem(
            ("combustor", "cans"), "an annular machine has one flame tube", "leave cans out", cans
        )


def _ring(
    path: tuple[str, ...], ring: Mapping[str, Any], inner: str, outer: str, report: Reporter
) -> Iterator[Problem]:
    small = number(ring, inner, k.INNER_DIAMETER)
    large = number(ring, outer, k.DIAMETER)
    if small is not None and large is not None and small >= large:
        yield report.problem(
            (*path, inner), "not smaller than the outer diameter", f"below {outer}", ring[inner]
        )


def _fuel(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    fuel = table(document, "fuel")
    if fuel is None:
        return
    ways = ("name", "composition", "certificate")
    given = [key for key in ways if stated(fuel, key)]
    for key in given[1:]:
        yield report.problem(
            ("fuel", key),
            f"contradicts fuel.{given[0]}",
            "state name, composition or certificate, only one of them",
        )
    if not given and not {("fuel", key) for key in ways} & report.misspelt:
        yield report.problem(
            ("fuel",),
            "no fuel stated",
            'add name = "natural-gas", composition = { CH4 = "96 %", N2 = "4 %" }, or a table '
            "[fuel.certificate] for a liquid",
        )
    yield from _certificate(fuel, report)
    composition = table(fuel, "composition")
    if composition is not None:
        yield from _sum(("fuel", "composition"), composition, k.MOLE_FRACTION, report)


def _certificate(fuel: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    certificate = table(fuel, "certificate")
    if certificate is None:
        return
    for first, second in (
        ("hydrogen", "hydrogen_carbon_ratio"),
        ("molar_mass", "mid_boiling_point"),
    ):
        path = ("fuel", "certificate", second)
        both = [key for key in (first, second) if stated(certificate, key)]
        if len(both) == 2:
            yield report.problem(path, f"contradicts {first}", f"state {first} or {second}")
        misspelt = {("fuel", "certificate", key) for key in (first, second)} & report.misspelt
        if not both and not misspelt:
            yield report.problem(path[:2], f"neither {first} nor {second}", "state one of them")


def _sum(
    path: tuple[str | int, ...], shares: Mapping[str, Any], kind: Quantity, report: Reporter
) -> Iterator[Problem]:
    try:
        total = sum(kind.read(share) for share in shares.values())
    except QuantityError:
        return
    if abs(total - 1.0) > SUM_TOLERANCE:
        yield report.problem(
            path,
            f"the fractions sum to {100 * total:.6g} %",
            f"100 % within {100 * SUM_TOLERANCE:g} % is needed",
        )


def _points(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    points = tables(document, "points")
    yield from unique("points", points, report)
    for index, point in points:
        yield from _point(("points", index), point, report)


def unique(
    key: str,
    rows: Sequence[tuple[int, Mapping[str, Any]]],
    report: Reporter,
    parent: tuple[str, ...] = (),
) -> Iterator[Problem]:
    """Yield a problem for every row that repeats an earlier row's name."""
    seen: dict[str, int] = {}
    for index, row in rows:
        name = row.get("name")
        if not isinstance(name, str):
            continue
        name = name.strip()
        if name in seen:
            yield report.problem(
                (*parent, key, index, "name"),
                "the same name twice",
                f"every name in {key} must differ; {key}[{seen[name]}] has it too",
                name,
            )
        seen.setdefault(name, index)


def _point(
    path: tuple[str | int, ...], point: Mapping[str, Any], report: Reporter
) -> Iterator[Problem]:
    given = [key for key in FUEL_BY if stated(point, key)]
    if not given and not any((*path, key) in report.misspelt for key in FUEL_BY):
        yield report.problem(path, "no fuel for this point", f"state one of {', '.join(FUEL_BY)}")
    if len(given) > 1:
        yield report.problem(
            (*path, given[1]),
            f"contradicts {given[0]}",
            f"state exactly one of {', '.join(FUEL_BY)}; here are {' and '.join(given)}",
        )
    yield from _flight(path, point, report)
    inlet = number(point, "inlet_temperature", k.INLET_TEMPERATURE)
    leaving = number(point, "exit_temperature", k.EXIT_TEMPERATURE)
    if inlet is not None and leaving is not None and leaving <= inlet:
        yield report.problem(
            (*path, "exit_temperature"),
            f"not above the inlet temperature, {inlet:.6g} K",
            "inlet_temperature is compressor exit (often called T3), exit_temperature is "
            "combustor exit (T4)",
            point["exit_temperature"],
        )
    split = table(point, "fuel_split")
    if split is not None:
        yield from _sum((*path, "fuel_split"), split, k.SHARE, report)
        yield from _split_names(path, split, report)


def _flight(
    path: tuple[str | int, ...], point: Mapping[str, Any], report: Reporter
) -> Iterator[Problem]:
    if stated(point, "altitude"):
        for key in INLET_KEYS:
            if stated(point, key):
                yield report.problem(
                    (*path, key),
                    "contradicts altitude",
                    "the flight gives the inlet: state altitude, flight_mach and ram_recovery, or "
                    "inlet_pressure and inlet_temperature",
                )
        return
    for key in ("flight_mach", "ram_recovery"):
        if stated(point, key):
            yield report.problem((*path, key), "no altitude stated", "add altitude", point[key])


def _split_names(
    path: tuple[str | int, ...], split: Mapping[str, Any], report: Reporter
) -> Iterator[Problem]:
    hardware = table(report.document, "hardware")
    injectors = [row["name"] for _, row in named(hardware or {}, "injectors")]
    if not injectors:
        return
    for name in split:
        if name not in injectors:
            close = difflib.get_close_matches(name, injectors, n=1)
            yield report.problem(
                (*path, "fuel_split", name),
                "no such injector",
                f"injectors: {', '.join(injectors)}",
                nearest=close[0] if close else None,
            )


def _targets(document: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    targets = table(document, "targets")
    if "targets" in document and targets is None:
        return
    targets = targets or {}
    names = [row["name"].strip() for _, row in named(document, "points")]
    wanted = targets.get("design_point")
    if isinstance(wanted, str) and wanted.strip() and wanted.strip() not in names:
        close = difflib.get_close_matches(wanted, names, n=1)
        yield report.problem(
            ("targets", "design_point"),
            "no such point",
            f"points: {', '.join(names)}" if names else "",
            wanted,
            close[0] if close else None,
        )
    loss = ("targets", "pressure_loss")
    has_loss = stated(targets, "pressure_loss") or loss in report.misspelt
    if "hardware" not in document and not has_loss:
        yield report.problem(
            ("targets", "pressure_loss"),
            "missing",
            "sizing needs it; only a case with a [hardware] table can leave it out",
        )
    yield from _zone_targets(targets, report)


def _zone_targets(targets: Mapping[str, Any], report: Reporter) -> Iterator[Problem]:
    zones = table(targets, "equivalence_ratio") or {}
    primary = number(zones, "primary", k.EQUIVALENCE_RATIO)
    secondary = number(zones, "secondary", k.EQUIVALENCE_RATIO)
    if primary is not None and secondary is not None and secondary >= primary:
        yield report.problem(
            ("targets", "equivalence_ratio", "secondary"),
            "not below the primary zone's",
            "air is added between the zones: state a lower value",
            zones["secondary"],
        )
