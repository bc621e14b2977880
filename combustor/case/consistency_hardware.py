"""Checks across the keys of the ``[hardware]`` table."""

from __future__ import annotations

import itertools
from collections.abc import Iterator, Mapping
from typing import Any

from combustor.base.errors import Problem
from combustor.case import kinds as k
from combustor.case.consistency_openings import injector_problems, opening_problems
from combustor.case.problems import Reporter
from combustor.case.reading import as_list, number, stated, table, tables

Row = Mapping[str, Any]
Path = tuple[str | int, ...]

PASSAGE_FORMS = (
    ("diameter",),
    ("outer_diameter", "inner_diameter"),
    ("area", "hydraulic_diameter"),
)


def hardware_problems(document: Row, report: Reporter) -> Iterator[Problem]:
    """Yield every contradiction in the metal."""
    hardware = table(document, "hardware")
    if hardware is None:
        return
    yield from _passages(hardware, report)
    yield from _sides(document, hardware, report)
    yield from _zones(hardware, report)
    yield from opening_problems(hardware, report)
    yield from injector_problems(hardware, report)
    yield from _underivable(table(document, "combustor") or {}, hardware, report)


def _passages(hardware: Row, report: Reporter) -> Iterator[Problem]:
    liner = table(hardware, "liner")
    if liner is not None:
        yield from _passage(("hardware", "liner"), liner, report)
        yield from _duct(hardware, liner, report)
    for index, annulus in tables(hardware, "annuli"):
        yield from _passage(("hardware", "annuli", index), annulus, report)
    for index, wall in tables(hardware, "walls"):
        yield from _stations(("hardware", "walls", index), wall, ("perimeter",), report)


def _passage(path: Path, passage: Row, report: Reporter) -> Iterator[Problem]:
    given = {key for form in PASSAGE_FORMS for key in form if stated(passage, key)}
    forms = [form for form in PASSAGE_FORMS if given == set(form)]
    if not forms:
        yield report.problem(
            path,
            "the size of this passage is not clear",
            "state diameter, or outer_diameter and inner_diameter, or area and hydraulic_diameter"
            + (f"; here: {', '.join(sorted(given))}" if given else ""),
        )
        return
    yield from _stations(path, passage, forms[0], report)
    if forms[0] == PASSAGE_FORMS[1]:
        yield from _rings(path, passage, report)


def _duct(hardware: Row, liner: Row, report: Reporter) -> Iterator[Problem]:
    length = number(hardware, "liner_length", k.LENGTH)
    stations = [number({"x": x}, "x", k.STATION) for x in as_list(liner.get("station"))]
    if liner.get("runs_to_exit") is not True or length is None:
        return
    if any(x is not None and x >= length for x in stations):
        yield report.problem(
            ("hardware", "liner", "station"),
            "a station in the transition duct",
            "with runs_to_exit the liner is stated up to liner_length, the duct follows",
        )


def _rings(path: Path, passage: Row, report: Reporter) -> Iterator[Problem]:
    for large, small in zip(
        as_list(passage["outer_diameter"]), as_list(passage["inner_diameter"]), strict=False
    ):
        ring = {"outer": large, "inner": small}
        outer = number(ring, "outer", k.DIAMETER)
        inner = number(ring, "inner", k.INNER_DIAMETER)
        if outer is not None and inner is not None and inner >= outer:
            yield report.problem(
                (*path, "inner_diameter"), "not smaller than the outer diameter", "", small
            )


def _stations(path: Path, node: Row, keys: tuple[str, ...], report: Reporter) -> Iterator[Problem]:
    stations = as_list(node.get("station"))
    values = [number({"x": x}, "x", k.STATION) for x in stations]
    known = [x for x in values if x is not None]
    if any(b <= a for a, b in itertools.pairwise(known)):
        yield report.problem((*path, "station"), "stations do not rise", "each above the last")
    for key in keys:
        count = len(as_list(node.get(key)))
        wanted = len(stations) if stated(node, "station") else 1
        if stated(node, key) and count != wanted:
            yield report.problem(
                (*path, key),
                f"{count} values for {wanted} station{'s' if wanted > 1 else ''}",
                "state one value for each station"
                if stated(node, "station")
                else "add station = [ ... ], or give one value",
            )


def _sides(document: Row, hardware: Row, report: Reporter) -> Iterator[Problem]:
    annular = (table(document, "combustor") or {}).get("layout") == "annular"
    wanted = ["outer", "inner"] if annular else ["outer"]
    for key in ("annuli", "walls"):
        rows = tables(hardware, key)
        sides = [row.get("side", "outer") for _, row in rows]
        if rows and sides != wanted:
            yield report.problem(
                ("hardware", key),
                f"sides are {', '.join(map(str, sides))}",
                f"this layout has {' and '.join(wanted)}, in this order",
            )
    if not annular:
        for index, row in tables(hardware, "openings"):
            if row.get("side") == "inner":
                yield report.problem(
                    ("hardware", "openings", index, "side"),
                    "this layout has no inner annulus",
                    "dome or outer",
                    "inner",
                )


def _zones(hardware: Row, report: Reporter) -> Iterator[Problem]:
    zones = table(hardware, "zones") or {}
    length = number(hardware, "liner_length", k.LENGTH)
    primary = number(zones, "primary_end", k.STATION)
    secondary = number(zones, "secondary_end", k.STATION)
    path: Path = ("hardware", "zones")
    if primary is not None and primary <= 0.0:
        yield report.problem(
            (*path, "primary_end"), "not behind the dome face", "above 0", zones["primary_end"]
        )
    if primary is not None and secondary is not None and secondary <= primary:
        yield report.problem(
            (*path, "secondary_end"), "not behind primary_end", "", zones["secondary_end"]
        )
    if secondary is not None and length is not None and secondary >= length:
        yield report.problem(
            (*path, "secondary_end"),
            "not before the end of the liner",
            "below liner_length",
            zones["secondary_end"],
        )


def _underivable(combustor: Row, hardware: Row, report: Reporter) -> Iterator[Problem]:
    """What is left out must follow from diameters or from ``[combustor]``."""
    path: Path = ("hardware",)
    diffuser = table(hardware, "diffuser") or {"inlet_area": 0.0}
    if not stated(hardware, "exit_area") and not stated(combustor, "exit_annulus"):
        yield report.problem((*path, "exit_area"), "missing", "or state combustor.exit_annulus")
    if not stated(diffuser, "inlet_area") and not stated(combustor, "inlet_annulus"):
        yield report.problem(
            (*path, "diffuser", "inlet_area"), "missing", "or state combustor.inlet_annulus"
        )
    if _by_area(table(hardware, "liner") or {}):
        yield from _unstated(path, hardware, ("liner_height",), report)
        for index, wall in tables(hardware, "walls"):
            yield from _unstated((*path, "walls", index), wall, ("perimeter",), report)
    annuli = tables(hardware, "annuli")
    if any(_by_area(annulus) for _, annulus in annuli):
        has_ring = combustor.get("layout") == "can-annular" and all(
            stated(combustor, key) for key in ("casing_outer_diameter", "casing_inner_diameter")
        )
        if not has_ring:
            wanted = ("reference_area", "reference_height")
            yield from _unstated(path, hardware, wanted, report)
        for index, wall in tables(hardware, "walls"):
            yield from _unstated((*path, "walls", index), wall, ("casing_area_ratio",), report)


def _by_area(passage: Row) -> bool:
    diameters = ("diameter", "outer_diameter", "inner_diameter")
    return stated(passage, "area") and not any(stated(passage, key) for key in diameters)


def _unstated(path: Path, node: Row, keys: tuple[str, ...], report: Reporter) -> Iterator[Problem]:
    for key in keys:
        if not stated(node, key):
            yield report.problem(
                (*path, key), "missing", "it does not follow from areas: state it, or diameters"
            )
