"""On which line each key of a settings file stands, which the standard library's reader of TOML does not tell.

The grammar is that of TOML 1.0.0 (toml.io/en/v1.0.0). Only text that the standard library has read is looked at, so
that nothing needs to be refused here.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Iterator, Mapping
from typing import NamedTuple

__all__ = ["KeyPath", "line_of", "lines_of_keys"]

KeyPath = tuple[str | int, ...]
"""The keys that lead to a value; a whole number counts the items of a list or the tables of an array, from 0."""

_TOKEN = re.compile(
    r'"""(?:\\.|[^\\])*?"{3,5}'
    r"|'''.*?'{3,5}"
    r'|"(?:\\.|[^"\\])*"'
    r"|'[^']*'"
    r"|\#[^\n]*"
    r"|[A-Za-z0-9_+:-]+"
    r"|[^\S\n]+"
    r"|.",
    re.DOTALL,
)
_BARE = re.compile(r"[A-Za-z0-9_-]+")


class _Token(NamedTuple):
    text: str
    line: int


def line_of(path: KeyPath, lines: Mapping[KeyPath, int]) -> int:
    """The line of a key, of the table it stands in where its own is not known; 1 where nothing is."""
    while path and path not in lines:
        path = path[:-1]
    return lines.get(path, 1)


def lines_of_keys(text: str) -> dict[KeyPath, int]:
    """The line, from 1, of every table, key and item of a list in a TOML text; of a table the first that names it."""
    return _Index(text).lines


class _Index:
    """One way through the text, statement by statement."""

    def __init__(self, text: str) -> None:
        self.lines: dict[KeyPath, int] = {}
        self._tokens = list(_tokens(text))
        self._at = 0
        self._arrays: dict[KeyPath, int] = {}
        table: KeyPath = ()
        while self._at < len(self._tokens):
            if self._next() == "\n":
                self._at += 1
            elif self._next() == "[":
                table = self._header()
            else:
                self._pair(table)

    def _next(self) -> str:
        return self._tokens[self._at].text if self._at < len(self._tokens) else "\n"

    def _header(self) -> KeyPath:
        """[table] or [[array of tables]]: the path of the table that is opened."""
        line = self._tokens[self._at].line
        self._at += 1
        array = self._next() == "["
        self._at += array
        *parents, last = self._key()
        table: KeyPath = ()
        for part in parents:
            table = self._inner((*table, part), line)
        table = (*table, last)
        if array:
            self._arrays[table] = self._arrays.get(table, -1) + 1
            self.lines.setdefault(table, line)
            table = (*table, self._arrays[table])
        else:
            table = self._inner(table, line)
        self.lines.setdefault(table, line)
        self._at += 2 if array else 1
        return table

    def _inner(self, table: KeyPath, line: int) -> KeyPath:
        """The table itself, or the last one of an array of tables."""
        self.lines.setdefault(table, line)
        return (*table, self._arrays[table]) if table in self._arrays else table

    def _pair(self, table: KeyPath) -> None:
        """key = value, dotted keys among them."""
        line = self._tokens[self._at].line
        path = table
        for part in self._key():
            path = (*path, part)
            self.lines.setdefault(path, line)
        self._at += 1  # the equals sign
        self._value(path)

    def _key(self) -> list[str]:
        parts: list[str] = []
        while self._next() not in {"=", "]", "\n"}:
            text = self._next()
            if text != ".":
                parts.append(text if _BARE.fullmatch(text) else _unquoted(text))
            self._at += 1
        return parts

    def _value(self, path: KeyPath) -> None:
        if self._next() == "{":
            self._items("}", path)
        elif self._next() == "[":
            self._items("]", path)
        else:
            while self._next() not in {"\n", ",", "]", "}"}:
                self._at += 1

    def _items(self, close: str, path: KeyPath) -> None:
        """An inline table, or a list, which may run over several lines."""
        self._at += 1
        number = 0
        while self._at < len(self._tokens) and self._next() != close:
            if self._next() in {",", "\n"}:
                self._at += 1
            elif close == "}":
                self._pair(path)
            else:
                self.lines.setdefault((*path, number), self._tokens[self._at].line)
                self._value((*path, number))
                number += 1
        self._at += 1


def _tokens(text: str) -> Iterator[_Token]:
    """What the text is made of without spaces and comments, each with its line."""
    line = 1
    for match in _TOKEN.finditer(text):
        piece = match[0]
        if piece == "\n" or not (piece.isspace() or piece.startswith("#")):
            yield _Token(piece, line)
        line += piece.count("\n")


def _unquoted(token: str) -> str:
    return str(tomllib.loads(f"key = {token}")["key"])
