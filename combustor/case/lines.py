"""Where each key of a TOML text stands: path to line number.

Neither TOML reader tells the line of a key, so this scanner walks a text that is already
known to be valid and notes where every table, key and array element begins.
"""

from __future__ import annotations

import tomllib
from collections.abc import Mapping

Path = tuple[str | int, ...]

_DEEPEST = 40


def line_index(text: str) -> dict[Path, int]:
    """Return the 1-based line of every path in a valid TOML text.

    Tables in ``[[arrays]]`` and array elements carry their index, from 0. A table that only
    exists because a key below it does is placed at that key.
    """
    return _Scanner(text).run()


def line_of(lines: Mapping[Path, int], path: Path) -> int | None:
    """Return the line of ``path``, or of the nearest table around it that has one."""
    while path:
        if path in lines:
            return lines[path]
        path = path[:-1]
    return None


class _Scanner:
    def __init__(self, text: str) -> None:
        self.text = text
        self.at = 0
        self.line = 1
        self.lines: dict[Path, int] = {}
        self.last: dict[Path, int] = {}

    def run(self) -> dict[Path, int]:
        table: Path = ()
        while self._skip_blank():
            table = self._statement(table)
        return self.lines

    def _statement(self, table: Path) -> Path:
        """Read one header or one ``key = value``; return the table now open."""
        line = self.line
        if self._looking_at("[["):
            table = self._header(2, line)
        elif self._looking_at("["):
            table = self._header(1, line)
        else:
            self._pair(table, 0)
        return table

    def _header(self, brackets: int, line: int) -> Path:
        self._advance(brackets)
        names = self._key()
        self._advance(brackets)
        path: Path = ()
        for depth, name in enumerate(names):
            path += (name,)
            final = depth == len(names) - 1
            if final and brackets == 2:
                self.lines.setdefault(path, line)
                self.last[path] = self.last.get(path, -1) + 1
            if path in self.last:
                path += (self.last[path],)
            self.lines.setdefault(path, line)
        return path

    def _pair(self, table: Path, depth: int) -> None:
        line = self.line
        path = table
        for name in self._key():
            path += (name,)
            self.lines.setdefault(path, line)
        self._advance(1)
        self._value(path, depth)

    def _value(self, path: Path, depth: int) -> None:
        self._skip_spaces()
        if depth > _DEEPEST:
            raise RecursionError
        if self._looking_at("["):
            self._array(path, depth)
        elif self._looking_at("{"):
            self._inline_table(path, depth)
        elif self._looking_at('"') or self._looking_at("'"):
            self._string()
        else:
            while self.at < len(self.text) and self.text[self.at] not in ",]}#\n":
                self._advance(1)

    def _array(self, path: Path, depth: int) -> None:
        self._advance(1)
        index = 0
        while self._skip_blank() and not self._looking_at("]"):
            self.lines[(*path, index)] = self.line
            self._value((*path, index), depth + 1)
            index += 1
            self._skip_blank()
            if self._looking_at(","):
                self._advance(1)
        self._advance(1)

    def _inline_table(self, path: Path, depth: int) -> None:
        self._advance(1)
        while self._skip_blank() and not self._looking_at("}"):
            self._pair(path, depth + 1)
            self._skip_blank()
            if self._looking_at(","):
                self._advance(1)
        self._advance(1)

    def _key(self) -> tuple[str, ...]:
        names: list[str] = []
        while True:
            self._skip_spaces()
            names.append(self._key_part())
            self._skip_spaces()
            if not self._looking_at("."):
                return tuple(names)
            self._advance(1)

    def _key_part(self) -> str:
        start = self.at
        if self._looking_at('"') or self._looking_at("'"):
            self._string()
            return str(tomllib.loads(f"k = {self.text[start : self.at]}")["k"])
        while self.at < len(self.text) and (
            self.text[self.at].isalnum() or self._looking_at("_", "-")
        ):
            self._advance(1)
        return self.text[start : self.at]

    def _string(self) -> None:
        quote = self.text[self.at]
        delimiter = quote * 3 if self._looking_at(quote * 3) else quote
        self._advance(len(delimiter))
        while not self._looking_at(delimiter):
            escaped = quote == '"' and self._looking_at("\\")
            self._advance(2 if escaped else 1)
        self._advance(len(delimiter))
        # a long string may end in up to two quotes of its own
        while len(delimiter) == 3 and self._looking_at(quote):
            self._advance(1)

    def _skip_blank(self) -> bool:
        """Skip spaces, line ends and comments; return whether anything is left."""
        while self.at < len(self.text):
            if self._looking_at("#"):
                while self.at < len(self.text) and self.text[self.at] != "\n":
                    self.at += 1
            elif self.text[self.at] in " \t\r\n":
                self._advance(1)
            else:
                return True
        return False

    def _skip_spaces(self) -> None:
        while self._looking_at(" ", "\t"):
            self.at += 1

    def _looking_at(self, *texts: str) -> bool:
        return self.text.startswith(texts, self.at)

    def _advance(self, count: int) -> None:
        if self.at >= len(self.text):
            raise IndexError("text ended inside a value")
        self.line += self.text.count("\n", self.at, self.at + count)
        self.at += count
