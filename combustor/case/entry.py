"""Numeric entries of a case by dotted path: found, read and replaced."""

from __future__ import annotations

import difflib
import types
import typing
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from pydantic import BaseModel, BeforeValidator
from pydantic.fields import FieldInfo

from combustor.base.errors import InputError, Problem
from combustor.case.load import validate
from combustor.case.quantity import Quantity
from combustor.case.schema import Case

Path = tuple[str | int, ...]
EVERY = "*"
_MOST_CHOICES = 14


@dataclass(frozen=True)
class Entry:
    """One number of a case.

    Parameters
    ----------
    key : str
        Dotted path with the row's own name: ``points.full.air_flow``.
    path : tuple of str and int
        Where it stands in the document.
    value : float or None
        SI; None where the case leaves it out.
    quantity : Quantity or None
        What it may hold; None for a whole number.
    """

    key: str
    path: Path
    value: float | None
    quantity: Quantity | None

    @property
    def whole(self) -> bool:
        """Whether only whole numbers are taken."""
        return self.quantity is None


def entries(case: Case, key: str) -> tuple[Entry, ...]:
    """Return the numbers a dotted path points at; several for ``points.*.KEY``.

    Rows of a list go by their name, or by their side where they have none; values of a list by
    their place, from 0, and a list of one value by the name of the list.

    Raises
    ------
    InputError
        The path leads nowhere, or to something that is no number.
    """
    found = list(_walk(_Place(case.model_dump(), Case, (), ()), key.split("."), key))
    if not found:
        raise InputError(Problem("no such key in this case", "the list is empty", key))
    return tuple(found)


def with_entries(case: Case, changes: Iterable[tuple[Path, float]]) -> Case:
    """Return the case with numbers replaced, all at once.

    Parameters
    ----------
    changes : iterable of (path, value)
        Paths of entries of this case; SI.

    Raises
    ------
    InputError
        What the case would then say cannot be.
    """
    document = _plain(case.model_dump(exclude_none=True))
    for path, value in changes:
        node = document
        for part in path[:-1]:
            node = node[part]
        node[path[-1]] = value
    changed = validate(document)
    changed._text, changed._file, changed._sha256 = case._text, case._file, case._sha256
    return changed


@dataclass(frozen=True)
class _Place:
    """A node of the document, what the schema says of it, and the way there."""

    node: Any
    kind: Any
    path: Path
    names: tuple[str, ...]

    def below(self, part: str | int, name: str, kind: Any) -> _Place:
        return _Place(self.node[part], kind, (*self.path, part), (*self.names, name))


def _walk(place: _Place, parts: Sequence[str], key: str) -> Iterator[Entry]:
    node = place.node
    if isinstance(node, Mapping):
        yield from _in_table(place, parts, key)
    elif isinstance(node, list | tuple) and all(isinstance(row, Mapping) for row in node):
        yield from _in_rows(place, parts, key)
    elif isinstance(node, list | tuple):
        yield from _in_list(place, parts, key)
    elif parts and node is None:
        raise _no_key(place, parts[0], key, [])
    elif parts:
        raise InputError(Problem("nothing stands below a single value", _up_to(place), key))
    else:
        yield _entry(place, key)


def _in_table(place: _Place, parts: Sequence[str], key: str) -> Iterator[Entry]:
    if not parts:
        raise InputError(Problem("is a table, not a number", _add(place.node), key))
    name, *rest = parts
    if name not in place.node:
        raise _no_key(place, name, key, [str(choice) for choice in place.node])
    yield from _walk(place.below(name, name, _kind_below(place.kind, name)), rest, key)


def _in_rows(place: _Place, parts: Sequence[str], key: str) -> Iterator[Entry]:
    labels = [str(row.get("name", row.get("side", ""))) for row in place.node]
    kind = _kind_below(place.kind, 0)
    if not parts:
        raise InputError(
            Problem("is a list of tables, not a number", f"add .NAME.KEY: {', '.join(labels)}", key)
        )
    # a name may hold dots
    for length in range(1, len(parts) + 1):
        wanted = ".".join(parts[:length])
        chosen = [i for i, label in enumerate(labels) if wanted in (EVERY, label)]
        if chosen:
            for index in chosen:
                yield from _walk(place.below(index, labels[index], kind), parts[length:], key)
            return
    raise _no_key(place, parts[0], key, [EVERY, *labels])


def _in_list(place: _Place, parts: Sequence[str], key: str) -> Iterator[Entry]:
    kind = _kind_below(place.kind, 0)
    places = [str(index) for index in range(len(place.node))]
    if not parts and len(places) != 1:
        raise InputError(
            Problem(f"holds {len(places)} values", f"add .0 to .{len(places) - 1}", key)
        )
    wanted, *rest = parts or [EVERY]
    chosen = [i for i, name in enumerate(places) if wanted in (EVERY, name)]
    if not chosen:
        raise _no_key(place, wanted, key, places)
    for index in chosen:
        yield from _walk(place.below(index, str(index), kind), rest, key)


def _entry(place: _Place, key: str) -> Entry:
    base, quantity = _number_kind(place.kind)
    if base is None:
        given = None if place.node is None else place.node
        raise InputError(
            Problem("is not a number", "only numbers can be varied", key, _short(given))
        )
    value = None if place.node is None else place.node
    return Entry(".".join(place.names), place.path, value, quantity)


def _short(value: Any) -> Any:
    return value[:60] if isinstance(value, str) else value


def _number_kind(kind: Any) -> tuple[type | None, Quantity | None]:
    """Return int or float and the quantity behind it; None for anything else."""
    for option in _options(kind):
        base, validators = _taken_apart(option)
        if typing.get_origin(base) is tuple:
            base = typing.get_args(base)[0]
        if base is not float and base is not int:
            continue
        for validator in validators:
            owner = getattr(validator.func, "__self__", None)
            if isinstance(owner, Quantity):
                return float, owner
        return (int, None) if base is int else (None, None)
    return None, None


def _options(kind: Any) -> tuple[Any, ...]:
    if isinstance(kind, FieldInfo):
        if kind.metadata:
            return (kind,)
        return _options(kind.annotation)
    if typing.get_origin(kind) in (typing.Union, types.UnionType):
        return typing.get_args(kind)
    return (kind,)


def _taken_apart(option: Any) -> tuple[Any, list[BeforeValidator]]:
    if isinstance(option, FieldInfo):
        base, extras = option.annotation, option.metadata
    elif hasattr(option, "__metadata__"):
        base, extras = option.__origin__, list(option.__metadata__)
    else:
        return option, []
    return base, [extra for extra in extras if isinstance(extra, BeforeValidator)]


def _kind_below(kind: Any, part: str | int) -> Any:
    """Return what the schema says of a key of a table, or of a member of a list."""
    for option in _options(kind):
        base, validators = _taken_apart(option)
        if isinstance(base, type) and issubclass(base, BaseModel):
            return base.model_fields.get(str(part))
        origin, inner = typing.get_origin(base), typing.get_args(base)
        if origin is dict:
            return inner[1]
        if origin is tuple:
            # a list of numbers carries its quantity on the list
            return option if validators else inner[0]
    return None


def _no_key(place: _Place, name: str, key: str, choices: list[str]) -> InputError:
    where = ".".join(place.names)
    if place.node is None:
        advice = f"the case has no [{where}]"
        if where == "hardware":
            advice += ": `combustor size CASE -o FILE` adds the metal"
        return InputError(Problem("no such key in this case", advice, key))
    close = difflib.get_close_matches(name, choices, n=1, cutoff=0.6)
    shown = ", ".join(choices[:_MOST_CHOICES]) + (", ..." if len(choices) > _MOST_CHOICES else "")
    return InputError(
        Problem(
            f"no {name[:60]!r} in {where or 'this case'}",
            f"there are {shown}",
            key,
            nearest=".".join((*place.names, close[0])) if close else None,
        )
    )


def _add(node: Mapping[str, Any]) -> str:
    return f"add .KEY: {', '.join(list(map(str, node))[:_MOST_CHOICES])}"


def _up_to(place: _Place) -> str:
    return f"write {'.'.join(place.names)}"


def _plain(node: Any) -> Any:
    if isinstance(node, Mapping):
        return {key: _plain(value) for key, value in node.items()}
    if isinstance(node, list | tuple):
        return [_plain(item) for item in node]
    return node
