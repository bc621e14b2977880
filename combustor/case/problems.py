"""Schema errors turned into plain lines: file, line, key, value, what is allowed."""

from __future__ import annotations

import difflib
import typing
from collections.abc import Iterator, Mapping
from functools import cached_property
from typing import Any

from pydantic import BaseModel, ValidationError
from pydantic_core import ErrorDetails

from combustor.base.errors import Problem
from combustor.case.lines import Path, line_index, line_of

_LONGEST_VALUE = 60


def key_text(path: Path, document: Mapping[str, Any] | None = None) -> str:
    """Return a dotted path such as ``points[2].inlet_pressure``, with the row's own name."""
    text = ""
    for part in path:
        text += (
            f"[{part}]" if isinstance(part, int) else f".{_shown(part)}" if text else _shown(part)
        )
    name = _row_name(path, document)
    return f'{text} ("{name}")' if name else text


def _shown(part: str) -> str:
    part = part[:_LONGEST_VALUE]
    bare = part.replace("_", "").replace("-", "")
    return part if bare.isalnum() and bare.isascii() else repr(part)


def _row_name(path: Path, document: Mapping[str, Any] | None) -> str | None:
    node: Any = document
    name = None
    for part in path:
        if isinstance(part, int):
            node = node[part] if isinstance(node, list | tuple) and part < len(node) else None
            if isinstance(node, Mapping) and isinstance(node.get("name"), str):
                name = node["name"]
        else:
            node = node.get(part) if isinstance(node, Mapping) else None
    return name[:_LONGEST_VALUE] if name and name.isprintable() else None


class Reporter:
    """Makes problems that know their place in one text, which is searched only then."""

    def __init__(self, file: str | None, text: str, document: Mapping[str, Any]) -> None:
        self.file = file
        self.text = text
        self.document = document
        self.misspelt: set[Path] = set()

    @cached_property
    def lines(self) -> Mapping[Path, int]:
        """Line of every path; empty where the text cannot be followed."""
        try:
            return line_index(self.text)
        except (RecursionError, IndexError):
            return {}

    def problem(
        self,
        path: Path,
        what: str,
        allowed: str = "",
        value: object | None = None,
        nearest: str | None = None,
    ) -> Problem:
        """Return a problem at ``path``."""
        return Problem(
            what=what,
            allowed=allowed,
            key=key_text(path, self.document) or None,
            value=_short(value),
            file=self.file,
            line=line_of(self.lines, path),
            nearest=nearest,
        )

    def from_schema(self, error: ValidationError, root: type[BaseModel]) -> Iterator[Problem]:
        """Yield a problem for every error the schema found.

        Notes which keys were meant by misspelt ones: those are not missing as well.
        """
        details = error.errors(include_url=False)
        problems = [
            (detail, self._from_detail(detail, root))
            for detail in details
            # a list whose rows all failed is not a list that is empty
            if not (detail["type"] == "too_short" and detail["input"])
        ]
        self.misspelt |= {
            (*detail["loc"][:-1], problem.nearest)
            for detail, problem in problems
            if detail["type"] == "extra_forbidden" and problem.nearest
        }
        for detail, problem in problems:
            if not (detail["type"] == "missing" and tuple(detail["loc"]) in self.misspelt):
                yield problem

    def _from_detail(self, detail: ErrorDetails, root: type[BaseModel]) -> Problem:
        path: Path = tuple(part for part in detail["loc"] if part != "[key]")
        kind = detail["type"]
        context = detail.get("ctx", {})
        value = detail["input"]
        if kind == "refused":
            return self.problem(
                path, context["what"], context["allowed"], value, context["nearest"]
            )
        if kind == "extra_forbidden":
            return self._unknown_key(path, root)
        if kind == "missing":
            return self.problem(path, "missing", _how_to_write(path))
        if kind == "literal_error":
            allowed = list(typing.get_args(_annotation(root, path)) or [])
            words = _words(context.get("expected", ""), allowed)
            given = value if isinstance(value, str) else ""
            close = difflib.get_close_matches(given, words, n=1)
            nearest = close[0] if close else None
            return self.problem(path, "not one of the choices", ", ".join(words), value, nearest)
        return self.problem(path, *_plain(kind, path, value, context))

    def _unknown_key(self, path: Path, root: type[BaseModel]) -> Problem:
        name = str(path[-1])
        model = _model_at(root, path[:-1])
        fields = list(model.model_fields) if model else []
        close = difflib.get_close_matches(name, fields, n=1, cutoff=0.6)
        if close:
            return self.problem(path, "unknown key", nearest=close[0])
        homes = [home for home in _homes(root) if home[-1] == name]
        if homes:
            home = ".".join(homes[0])
            return self.problem(path, "this key does not belong here", f"it belongs at {home}")
        shown = ", ".join(fields[:12]) + (", ..." if len(fields) > 12 else "")
        return self.problem(path, "unknown key", f"allowed here: {shown}" if shown else "")


def _words(expected: str, allowed: list[str]) -> list[str]:
    if allowed and all(isinstance(word, str) for word in allowed):
        return allowed
    return [word.strip().strip("'") for word in expected.replace(" or ", ", ").split(",") if word]


def _how_to_write(path: Path) -> str:
    if path == ("points",):
        return "at least one [[points]] table is needed"
    if len(path) == 1:
        return f"a [{path[0]}] table is needed"
    return f"add {path[-1]} = ..."


def _plain(kind: str, path: Path, value: object, context: Mapping[str, Any]) -> tuple[Any, ...]:
    if kind in {"tuple_type", "list_type"}:
        if isinstance(value, Mapping):
            return (
                "a single table where a list of tables is needed",
                f"write [[{key_text(path)}]]",
            )
        return ("not a list", "write [ ... ]", value)
    if kind in {"model_type", "dict_type"}:
        if isinstance(value, list):
            return ("a list where one table is needed", f"write [{key_text(path)}]")
        return ("not a table", f"write [{key_text(path)}] or {{ ... }}", value)
    if kind == "bool_type":
        return ("neither true nor false", "write true or false", value)
    if kind == "too_short":
        return ("empty list", f"at least {context.get('min_length', 1)} needed")
    if kind == "too_long":
        return ("too many entries", f"at most {context.get('max_length')} allowed")
    return (kind.replace("_", " "), "", value)


def _short(value: object) -> object | None:
    if value is None or isinstance(value, Mapping | list | tuple):
        return None
    if isinstance(value, str) and len(value) > _LONGEST_VALUE:
        return value[: _LONGEST_VALUE - 3] + "..."
    if isinstance(value, bool | int | float | str):
        huge = isinstance(value, int) and abs(value) >= 10**20
        return "a number too large to show" if huge else value
    return str(value)[:_LONGEST_VALUE]


def _annotation(root: type[BaseModel], path: Path) -> Any:
    model = _model_at(root, path[:-1])
    field = model.model_fields.get(str(path[-1])) if model and path else None
    if field is None:
        return None
    for option in (field.annotation, *typing.get_args(field.annotation)):
        if typing.get_origin(option) is typing.Literal:
            return option
    return None


def _model_at(root: type[BaseModel], path: Path) -> type[BaseModel] | None:
    model: type[BaseModel] | None = root
    for part in path:
        if isinstance(part, int) or model is None:
            continue
        field = model.model_fields.get(part)
        model = _model_in(field.annotation) if field else None
    return model


def _model_in(annotation: Any) -> type[BaseModel] | None:
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return annotation
    for part in typing.get_args(annotation):
        if (found := _model_in(part)) is not None:
            return found
    return None


def _homes(root: type[BaseModel], prefix: tuple[str, ...] = ()) -> Iterator[tuple[str, ...]]:
    for name, field in root.model_fields.items():
        yield (*prefix, name)
        inner = _model_in(field.annotation)
        if inner is not None:
            yield from _homes(inner, (*prefix, name))
