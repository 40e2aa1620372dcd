"""A settings file, read whole: what it states, or everything that is wrong with it."""

from __future__ import annotations

import os
import re
import tomllib
from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any, NamedTuple, NoReturn

from dxfcheck.configuration.accept_tables import AcceptTable, read_accept_tables
from dxfcheck.configuration.key_lines import KeyPath, lines_of_keys
from dxfcheck.configuration.lookup import PROJECT_FILE, SETTINGS_FILE, shown_path
from dxfcheck.configuration.path_patterns import trouble_with_pattern
from dxfcheck.configuration.problems import Problems, described, known_words, misplaced
from dxfcheck.configuration.settings_keys import ACCEPT, ANY_NAME, DRAWINGS, KEYS
from dxfcheck.configuration.stated_values import Statement, read_value
from dxfcheck.errors import SettingsInvalid

__all__ = ["DrawingTable", "SettingsFile", "read_settings_file"]

PROJECT_TABLE: KeyPath = ("tool", "dxfcheck")

_AT_LINE = re.compile(r"\s*\(at (?:line (?P<line>\d+), column (?P<column>\d+)|end of document)\)$")


class DrawingTable(NamedTuple):
    """What is stated for the drawings whose path a pattern fits, and the line of the pattern."""

    pattern: str
    statements: tuple[Statement, ...]
    line: int


@dataclass(frozen=True, slots=True, kw_only=True)
class SettingsFile:
    """A settings file without mistakes. ``folder`` is the one its patterns start from, ``shown`` its name in messages.

    ``tables`` are those of single drawings, in order; ``accepted`` the findings accepted, of whatever drawing, and
    ``accepted_on`` those of each drawing by its real path.
    """

    shown: str
    folder: Path
    statements: tuple[Statement, ...] = ()
    tables: tuple[DrawingTable, ...] = ()
    accepted: tuple[AcceptTable, ...] = ()
    accepted_on: Mapping[str, Sequence[AcceptTable]] = field(default_factory=dict)


def read_settings_file(path: Path) -> SettingsFile:
    """Read a settings file, of a pyproject.toml its table [tool.dxfcheck].

    SettingsInvalid carries all that is wrong with it, each with line, key and remedy.
    """
    shown = shown_path(path.absolute())
    text = _text_of(path, shown)
    document = _document(text, shown)
    inside: KeyPath = ()
    if path.name == PROJECT_FILE:
        inside, document = PROJECT_TABLE, _project_table(document, shown)
    problems = Problems(shown, lines_of_keys(text), inside)
    statements = tuple(_statements(document, (), "", problems))
    tables = tuple(_drawing_tables(document.get(DRAWINGS, {}), problems))
    folder = Path(os.path.realpath(path)).parent
    accepted = tuple(read_accept_tables(document.get(ACCEPT, []), problems, folder))
    if problems.found:
        raise SettingsInvalid(shown, problems.in_order())
    accepted_on: defaultdict[str, list[AcceptTable]] = defaultdict(list)
    for table in accepted:
        accepted_on[table.path].append(table)
    return SettingsFile(
        shown=shown,
        folder=folder,
        statements=statements,
        tables=tables,
        accepted=accepted,
        accepted_on=dict(accepted_on),
    )


def _text_of(path: Path, shown: str) -> str:
    try:
        content = path.read_bytes()
    except FileNotFoundError:
        if path.is_symlink():
            _refuse(shown, f"{shown}: the settings file is a link to nothing; check where it leads")
        _refuse(shown, f"{shown}: there is no such settings file; check the path")
    except IsADirectoryError:
        _refuse(shown, f"{shown}: is a folder, not a settings file; name a file, or rename the folder")
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or error
        _refuse(shown, f"{shown}: the settings file cannot be read: {reason}; check its permissions")
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = content.count(b"\n", 0, error.start) + 1
        _refuse(shown, f"{shown}:{line}: a character is not in UTF-8; save the file as UTF-8")


def _document(text: str, shown: str) -> dict[str, Any]:
    """The file as nested dicts; where it is no TOML that is the only problem, as nothing else can be told."""
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        said = str(error)
        match = _AT_LINE.search(said)
        what = said[: match.start()] if match else said
        line = match["line"] if match and match["line"] else str(text.rstrip("\n").count("\n") + 1)
        column = f", column {match['column']}" if match and match["column"] else ""
        _refuse(shown, f"{shown}:{line}: this is not TOML{column}: {what}; mend it to see whether there is more")
    except RecursionError:
        _refuse(shown, f"{shown}: its lists are nested too deeply; write them flat")


def _project_table(document: Mapping[str, Any], shown: str) -> dict[str, Any]:
    tool = document.get("tool")
    table = tool.get("dxfcheck") if isinstance(tool, dict) else None
    if not isinstance(table, dict):
        _refuse(shown, f"{shown}: it holds no table [tool.dxfcheck]; add one, or name another file")
    return table


def _refuse(shown: str, problem: str) -> NoReturn:
    raise SettingsInvalid(shown, (problem,))


def _statements(table: Mapping[str, Any], path: KeyPath, place: str, problems: Problems) -> Iterator[Statement]:
    """What a table states and the tables in it; ``place`` is its name in the list of keys, ``path`` where it stands."""
    words = known_words(place)
    for word, value in table.items():
        here = (*path, word)
        if not path and word in {DRAWINGS, ACCEPT}:
            continue
        name = f"{place}.{ANY_NAME if ANY_NAME in words else word}".removeprefix(".")
        if name in KEYS:
            yield from read_value(KEYS[name], value, here, problems)
        elif word not in words:
            problems.add(here, _unknown(here, words, value, problems))
        elif isinstance(value, dict):
            yield from _statements(value, here, name, problems)
        else:
            heading = problems.heading(*map(str, here))
            problems.add(here, f"it must be a table, not {described(value)}; write {heading} on a line of its own")


def _unknown(path: KeyPath, words: set[str], value: object, problems: Problems) -> str:
    """What to say of a key, or a table, that is not known where it stands."""
    *inside, word = map(str, path)
    if inside[:1] == [DRAWINGS] and word == ACCEPT:
        return f"accepted findings name their drawing themselves; write [{problems.heading(ACCEPT)}] with drawing = ..."
    if len(inside) == 2 and inside[0] == DRAWINGS and isinstance(value, dict) and word.lower() == "dxf":
        return f"a pattern with a dot stands in quotes; write {problems.heading(DRAWINGS, f'{inside[1]}.{word}')}"
    if not inside and word in {"tool", "dxfcheck"} and isinstance(value, dict):
        return f"in a {SETTINGS_FILE} tables stand at the top; write [reading] for [tool.dxfcheck.reading]"
    return misplaced(path, words if inside else words | {DRAWINGS, ACCEPT}, problems)


def _drawing_tables(value: object, problems: Problems) -> Iterator[DrawingTable]:
    if not isinstance(value, dict):
        example = problems.heading(DRAWINGS, "received/*.dxf", "reading")
        problems.add((DRAWINGS,), f"it must hold tables by pattern, not {described(value)}; write {example}")
        return
    for pattern, table in value.items():
        path = (DRAWINGS, pattern)
        trouble = trouble_with_pattern(pattern)
        if not isinstance(table, dict):
            example = problems.heading(DRAWINGS, "received/*.dxf", "reading")
            what = f"{DRAWINGS} holds tables by pattern, not {described(table)}"
            problems.add(path, f"{what}; write {example} for settings of some drawings")
            continue
        if trouble is not None:
            problems.add(path, "; ".join(trouble))
        statements = tuple(_statements(table, path, "", problems))
        yield DrawingTable(pattern, statements, problems.line(path))
