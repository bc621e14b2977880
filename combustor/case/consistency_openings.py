"""Checks across the keys of openings and injectors in the ``[hardware]`` table."""

from __future__ import annotations

import difflib
import math
from collections.abc import Iterator, Mapping
from typing import Any

from combustor.base.errors import Problem
from combustor.case import kinds as k
from combustor.case.problems import Reporter
from combustor.case.reading import as_list, named, number, stated, table, tables

Row = Mapping[str, Any]
Path = tuple[str | int, ...]

SHARE_TOLERANCE = 1e-6


def opening_problems(hardware: Row, report: Reporter) -> Iterator[Problem]:
    """Yield every contradiction in the rows of openings."""
    seen: dict[str, int] = {}
    length = number(hardware, "liner_length", k.LENGTH)
    for index, row in tables(hardware, "openings"):
        path: Path = ("hardware", "openings", index)
        name = row.get("name")
        if isinstance(name, str):
            if name.strip() in seen:
                yield report.problem(
                    (*path, "name"), "the same name twice", "every opening needs its own", name
                )
            seen.setdefault(name.strip(), index)
        yield from _size(path, row, report)
        yield from _parts(path, row, report)
        x = number(row, "x", k.STATION)
        if x is not None and length is not None and not 0.0 <= x <= length:
            yield report.problem(
                (*path, "x"), "not on the liner", "between 0 and liner_length", row["x"]
            )


def _size(path: Path, row: Row, report: Reporter) -> Iterator[Problem]:
    sizes = [key for key in ("diameter", "area") if stated(row, key)]
    if len(sizes) == 2:
        yield report.problem(
            (*path, "area"),
            "contradicts diameter",
            "the area of a round hole follows from it: state one of the two",
        )
    if stated(row, "diameter") and stated(row, "swirler"):
        yield report.problem(
            (*path, "diameter"), "contradicts swirler", "its size follows from tip and hub diameter"
        )
    if not sizes and not stated(row, "swirler") and not stated(row, "effective_area"):
        yield report.problem(
            path, "an opening without size", "state diameter, area, swirler or effective_area"
        )
    if stated(row, "effective_area") and stated(row, "discharge_coefficient"):
        yield report.problem(
            (*path, "discharge_coefficient"),
            "contradicts effective_area",
            "a measured effective area holds the coefficient already: state one of the two",
        )
    if stated(row, "effective_area") and not sizes and row.get("count") == 0:
        yield report.problem(
            (*path, "count"), "no holes, but an effective area", "leave one out", 0
        )


def _parts(path: Path, row: Row, report: Reporter) -> Iterator[Problem]:
    role = row.get("role")
    swirler = table(row, "swirler")
    if swirler is not None:
        if isinstance(role, str) and role not in ("swirler", "premixer"):
            yield report.problem(
                (*path, "swirler"), f"a vane pack on a {role} opening", "swirler or premixer only"
            )
        hub = number(swirler, "hub_diameter", k.HUB_DIAMETER)
        tip = number(swirler, "tip_diameter", k.DIAMETER)
        if hub is not None and tip is not None and hub >= tip:
            yield report.problem(
                (*path, "swirler", "hub_diameter"),
                "not smaller than tip_diameter",
                "",
                swirler["hub_diameter"],
            )
        else:
            yield from _vanes(path, swirler, report)
    if stated(row, "slot") and isinstance(role, str) and role != "film":
        yield report.problem((*path, "slot"), f"a film lip on a {role} opening", "film only")
    if row.get("edge") == "swirler" and swirler is None:
        yield report.problem(
            (*path, "edge"), "a swirler without vanes", "add swirler = { ... }", "swirler"
        )


def _vanes(path: Path, swirler: Row, report: Reporter) -> Iterator[Problem]:
    hub = number(swirler, "hub_diameter", k.HUB_DIAMETER)
    tip = number(swirler, "tip_diameter", k.DIAMETER)
    thickness = number(swirler, "vane_thickness", k.THICKNESS)
    count = swirler.get("vane_count")
    if hub is None or tip is None or thickness is None or not isinstance(count, int):
        return
    # the ring less the vanes: pi/4 (D^2 - d^2) - n t (D - d) / 2
    if math.pi / 2.0 * (tip + hub) <= count * thickness:
        yield report.problem(
            (*path, "swirler", "vane_count"),
            "the vanes fill the ring",
            "fewer or thinner vanes",
            count,
        )


def injector_problems(hardware: Row, report: Reporter) -> Iterator[Problem]:
    """Yield shares that do not sum and openings that are not there."""
    openings = [row["name"].strip() for _, row in named(hardware, "openings")]
    total, seen, readable = 0.0, set(), True
    rows = tables(hardware, "injectors")
    for index, row in rows:
        path: Path = ("hardware", "injectors", index)
        share = number(row, "share", k.SHARE) if stated(row, "share") else 1.0
        readable = readable and share is not None
        total += share or 0.0
        name = row.get("name")
        if isinstance(name, str) and name.strip() in seen:
            yield report.problem(
                (*path, "name"), "the same name twice", "every injector needs its own", name
            )
        seen.add(name.strip() if isinstance(name, str) else index)
        for place, opening in enumerate(as_list(row.get("openings"))):
            if isinstance(opening, str) and opening.strip() not in openings:
                close = difflib.get_close_matches(opening, openings, n=1)
                yield report.problem(
                    (*path, "openings", place),
                    "no such opening",
                    "name a row of hardware.openings",
                    opening,
                    close[0] if close else None,
                )
    if rows and readable and abs(total - 1.0) > SHARE_TOLERANCE:
        yield report.problem(
            ("hardware", "injectors"), f"the shares sum to {100 * total:.8g} %", "100 % is needed"
        )
