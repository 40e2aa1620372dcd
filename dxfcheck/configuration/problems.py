"""What is wrong in a settings file: collected, so that all of it is shown at once, each with line, key and remedy."""

from __future__ import annotations

import datetime as dt
import difflib
import json
import re
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field

from dxfcheck.configuration.key_lines import KeyPath, line_of
from dxfcheck.configuration.settings_keys import ACCEPT, ACCEPT_KEYS, DRAWINGS, KEYS, SETTINGS, Key

__all__ = ["Problems", "described", "key_text", "known_words", "misplaced", "near_name", "quoted"]

_BARE = re.compile(r"[A-Za-z0-9_-]+")


@dataclass(frozen=True, slots=True)
class Problems:
    """The problems of one file, and where its keys stand. ``inside`` are the keys that lead to its settings."""

    shown: str
    lines: Mapping[KeyPath, int]
    inside: KeyPath = ()
    found: list[tuple[int, str]] = field(default_factory=list)

    def line(self, path: KeyPath) -> int:
        """The line of a key."""
        return line_of((*self.inside, *path), self.lines)

    def where(self, path: KeyPath) -> str:
        """'dxfcheck.toml:12'."""
        return f"{self.shown}:{self.line(path)}"

    def add(self, path: KeyPath, what: str) -> None:
        """Keep a problem: ``what`` says what is wrong and, after a semicolon, what to do."""
        message = f"{self.where(path)}: {key_text(path)}: {' '.join(what.split())}"
        self.found.append((self.line(path), message))

    def heading(self, *words: str) -> str:
        """The line that opens a table: '[reading.layers]', in a pyproject.toml '[tool.dxfcheck.reading.layers]'."""
        return f"[{key_text((*self.inside, *words))}]"

    def in_order(self) -> tuple[str, ...]:
        """The messages by line."""
        return tuple(message for _, message in sorted(self.found, key=lambda each: each[0]))


def quoted(text: str) -> str:
    """The text as TOML has it, in double quotes."""
    return json.dumps(text, ensure_ascii=False).replace("\x7f", "\\u007f")


def key_text(path: KeyPath) -> str:
    """'reading.units', 'drawings."received/*.dxf".reading'; the items of a list are not counted."""
    words = [part for part in path if isinstance(part, str)]
    return ".".join(word if _BARE.fullmatch(word) else quoted(word) for word in words)


def described(value: object) -> str:
    """A value of a settings file in words: 'the number 5', 'a list'."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, int | float):
        return f"the number {value}"
    if isinstance(value, str):
        return f"the text {quoted(value)}"
    if isinstance(value, dt.date | dt.time):
        return f"the date or time {value}"
    return "a table" if isinstance(value, dict) else "a list"


def near_name(name: str, names: Iterable[str]) -> str | None:
    """The name that was most likely meant, None where none is like it."""
    folded = {each.lower(): each for each in names}
    near = difflib.get_close_matches(name.lower().replace("_", "-"), folded, n=1)
    return folded[near[0]] if near else None


def misplaced(path: KeyPath, known: Iterable[str], problems: Problems) -> str:
    """What to say of a key that does not belong in its table; ``known`` are the keys that do."""
    *inside, word = (str(part) for part in path)
    choices = sorted(known)
    what = "there is no such key here"
    elsewhere = next((key for key in SETTINGS if key.word == word), None)
    if elsewhere is not None:
        return f"this key does not belong here; {_home(elsewhere, inside, problems)}"
    if word in {key.word for key in ACCEPT_KEYS}:
        return f"{what}; {word} belongs below [{problems.heading(ACCEPT)}]"
    near = near_name(word, choices)
    if near is not None:
        return f"{what}; did you mean {near}?"
    similar = near_name(word, {key.word for key in SETTINGS})
    if similar is not None and similar != "*":
        key = next(key for key in SETTINGS if key.word == similar)
        return f"{what}; did you mean {similar}? {_home(key, inside, problems)}"
    return f"{what}; use one of {', '.join(choices)}"


def _home(key: Key, inside: Sequence[str], problems: Problems) -> str:
    """Where a key belongs, within the drawings of a pattern where it stands among those."""
    drawings = inside[:2] if inside[:1] == [DRAWINGS] else []
    tables = [*drawings, *key.table.split(".")] if key.table else drawings
    if tables or problems.inside:
        return f"put {key.word} below {problems.heading(*tables)}"
    return f"put {key.word} at the top of the file, before the first table"


def known_words(table: str) -> set[str]:
    """The keys and tables that may stand in a table of settings, '' for the top of the file."""
    start = f"{table}." if table else ""
    return {name.removeprefix(start).partition(".")[0] for name in KEYS if name.startswith(start)}
