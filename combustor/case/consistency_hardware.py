"""Checks across the keys of the ``[hardware]`` table."""

from __future__ import annotations

import difflib
import itertools
from collections.abc import Iterator, Mapping
from typing import Any

from combustor.base.errors import Problem
from combustor.case import kinds as k
from combustor.case.problems import Reporter
from combustor.case.reading import named, number, stated, table, tables

Row = Mapping[str, Any]
Path = tuple[str | int, ...]

SHARE_TOLERANCE = 1e-6
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
    yield from _openings(hardware, report)
    yield from _injectors(hardware, report)
    yield from _underivable(table(document, "combustor") or {}, hardware, report)


def _passages(hardware: Row, report: Reporter) -> Iterator[Problem]:
    liner = table(hardware, "liner")
    if liner is not None:
        yield from _passage(("hardware", "liner"), liner, report)
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


def _rings(path: Path, passage: Row, report: Reporter) -> Iterator[Problem]:
    for large, small in zip(
        _as_list(passage["outer_diameter"]), _as_list(passage["inner_diameter"]), strict=False
    ):
        ring = {"outer": large, "inner": small}
        outer = number(ring, "outer", k.DIAMETER)
        inner = number(ring, "inner", k.INNER_DIAMETER)
        if outer is not None and inner is not None and inner >= outer:
            yield report.problem(
                (*path, "inner_diameter"), "not smaller than the outer diameter", "", small
            )


def _stations(path: Path, node: Row, keys: tuple[str, ...], report: Reporter) -> Iterator[Problem]:
    stations = _as_list(node.get("station"))
    values = [number({"x": x}, "x", k.STATION) for x in stations]
    known = [x for x in values if x is not None]
    if any(b <= a for a, b in itertools.pairwise(known)):
        yield report.problem((*path, "station"), "stations do not rise", "each above the last")
    for key in keys:
        count = len(_as_list(node.get(key)))
        wanted = len(stations) if stated(node, "station") else 1
        if stated(node, key) and count != wanted:
            yield report.problem(
                (*path, key),
                f"{count} values for {wanted} station{'s' if wanted > 1 else ''}",
                "state one value for each station"
                if stated(node, "station")
                else "add station = [ ... ], or give one value",
            )


def _as_list(value: object) -> list[Any]:
    if value is None:
        return []
    return list(value) if isinstance(value, list | tuple) else [value]


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


def _openings(hardware: Row, report: Reporter) -> Iterator[Problem]:
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
    if 3.141592653589793 / 2.0 * (tip + hub) <= count * thickness:
        yield report.problem(
            (*path, "swirler", "vane_count"),
            "the vanes fill the ring",
            "fewer or thinner vanes",
            count,
        )


def _injectors(hardware: Row, report: Reporter) -> Iterator[Problem]:
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
        for place, opening in enumerate(_as_list(row.get("openings"))):
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
