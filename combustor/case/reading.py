"""Reading a document that may be wrong anywhere, without tripping over it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from combustor.case.quantity import Quantity, QuantityError


def stated(node: Mapping[str, Any], key: str) -> bool:
    """Return whether ``key`` has a value."""
    return node.get(key) is not None


def table(node: Mapping[str, Any], key: str) -> Mapping[str, Any] | None:
    """Return the table at ``key``; None when there is none."""
    value = node.get(key)
    return value if isinstance(value, Mapping) else None


def tables(node: Mapping[str, Any], key: str) -> list[tuple[int, Mapping[str, Any]]]:
    """Return the tables of the list at ``key``, each with its index."""
    value = node.get(key)
    if not isinstance(value, list | tuple):
        return []
    return [(index, row) for index, row in enumerate(value) if isinstance(row, Mapping)]


def named(node: Mapping[str, Any], key: str) -> list[tuple[int, Mapping[str, Any]]]:
    """Return those tables of the list at ``key`` that have a name."""
    return [(i, row) for i, row in tables(node, key) if isinstance(row.get("name"), str)]


def number(node: Mapping[str, Any], key: str, kind: Quantity) -> float | None:
    """Return the quantity at ``key``; None when it is not there or cannot be read."""
    if not stated(node, key):
        return None
    try:
        return kind.read(node[key])
    except QuantityError:
        return None


def as_list(value: object) -> list[Any]:
    """Return a list; a single value is a list of one, None an empty one."""
    if value is None:
        return []
    return list(value) if isinstance(value, list | tuple) else [value]
