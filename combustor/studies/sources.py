"""Every published method and figure: all there are, those of a case, those behind one value."""

from __future__ import annotations

import pkgutil
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from difflib import get_close_matches
from importlib import import_module

import combustor
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.choose_mechanism import catalogue as mechanisms
from combustor.rating.record import Ratings
from combustor.sizing.record import Design

# Rooms that show results hold no methods of their own.
SHOWING_ROOMS = ("cli", "report", "__main__")


@dataclass(frozen=True)
class Source:
    """One method and what uses it: "sizing", "rating", both, or nothing asked of it."""

    method: Method
    room: str
    used_in: tuple[str, ...] = ()


def all_sources() -> tuple[Source, ...]:
    """Return every method of the package, once each, by room and key."""
    found: dict[str, Source] = {}
    for module in pkgutil.walk_packages(combustor.__path__, "combustor."):
        room = module.name.split(".")[1]
        if room in SHOWING_ROOMS:
            continue
        for value in vars(import_module(module.name)).values():
            for method in _methods_in(value):
                home = found.get(method.key)
                # what a room imports from another keeps the room it is written in
                if home is None or _floor(room) < _floor(home.room):
                    found[method.key] = Source(method, room)
    for mechanism in mechanisms():
        found.setdefault(mechanism.method.key, Source(mechanism.method, "mechanisms"))
    return tuple(sorted(found.values(), key=lambda one: (_floor(one.room), one.method.key)))


def sources_of(design: Design | None, ratings: Ratings) -> tuple[Source, ...]:
    """Return the methods a sized and rated case stands on.

    Parameters
    ----------
    design : Design or None
        None where the metal is stated.
    ratings : Ratings
    """
    homes = {one.method.key: one.room for one in all_sources()}
    used: dict[str, tuple[Method, list[str]]] = {}
    rated = [method for point in ratings.points for method in point.methods]
    groups = (("sizing", () if design is None else design.methods), ("rating", rated))
    for name, methods in groups:
        for method in methods:
            where = used.setdefault(method.key, (method, []))[1]
            if name not in where:
                where.append(name)
    return tuple(
        Source(method, homes.get(key, "mechanisms"), tuple(where))
        for key, (method, where) in used.items()
    )


def behind(
    quantity: str, sources: Iterable[Source], by_field: Mapping[str, tuple[str, ...]]
) -> tuple[Source, ...]:
    """Return the methods behind one value of a table.

    Parameters
    ----------
    quantity : str
        Key of a value as in JSON and CSV ("nox_ppmvd_15", "splits.penetration_mm"), the key of
        a method, or words of what a method gives.
    sources : iterable of Source
    by_field : mapping of str to tuple of str
        Keys of methods by "table.field".

    Raises
    ------
    InputError
        Nothing of that name.
    """
    held = tuple(sources)
    fields = [name for name in by_field if quantity in (name, name.partition(".")[2])]
    if fields:
        keys = {key for name in fields for key in by_field[name]}
        return tuple(one for one in held if one.method.key in keys)
    words = quantity.lower().replace("_", " ").replace("-", " ").split()
    found = tuple(
        one
        for one in held
        if all(w in f"{one.method.key} {one.method.quantity}".lower() for w in words)
    )
    if not found:
        names = sorted({name.partition(".")[2] for name in by_field})
        nearest = get_close_matches(quantity, names, n=1)
        raise InputError(
            Problem(
                "no value and no method goes by that name",
                "a key of the JSON output, or words of what a method gives",
                "--of",
                quantity,
                nearest=nearest[0] if nearest else None,
            )
        )
    return found


def _methods_in(value: object) -> tuple[Method, ...]:
    if isinstance(value, Method):
        return (value,)
    if isinstance(value, dict):
        value = tuple(value.values())
    if isinstance(value, tuple):
        return tuple(one for one in value if isinstance(one, Method))
    return ()


def _floor(room: str) -> int:
    floors = (
        ("base",),
        ("case", "gasdynamics", "atmosphere"),
        ("hardware", "fuel"),
        ("airflow", "kinetics", "heat", "spray", "emissions", "operability", "mechanisms"),
        ("sizing",),
        ("rating",),
        ("studies",),
    )
    return next((place for place, rooms in enumerate(floors) if room in rooms), len(floors))
