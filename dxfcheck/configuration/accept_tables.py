"""The [[accept]] tables of a settings file: findings that an office accepts, each with its reason."""

from __future__ import annotations

import datetime as dt
import math
import os
from collections.abc import Callable, Iterator, Mapping
from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

from dxfcheck.configuration.key_lines import KeyPath
from dxfcheck.configuration.path_patterns import is_pattern, trouble_with_pattern
from dxfcheck.configuration.problems import Problems, described, near_name, quoted
from dxfcheck.configuration.settings_keys import ACCEPT, ACCEPT_KEYS, KEYS
from dxfcheck.configuration.stated_values import rule_trouble
from dxfcheck.settings import Acceptance

__all__ = ["AcceptTable", "read_accept_tables"]

COORDINATES = 2


class AcceptTable(NamedTuple):
    """One [[accept]] table: the drawing by its path as stated and by its real one, and what is accepted on it."""

    drawing: str
    path: str
    acceptance: Acceptance
    line: int


def read_accept_tables(value: object, problems: Problems, folder: Path = Path()) -> Iterator[AcceptTable]:
    """Every table that can be used, of a file in that folder; the problems of the others are kept."""
    if not isinstance(value, list) or not all(isinstance(each, dict) for each in value):
        problems.add((ACCEPT,), f"it must be an array of tables, not {described(value)}; write [[accept]] for each")
        return
    real_path = cache(os.path.realpath)
    for number, table in enumerate(value):
        path: KeyPath = (ACCEPT, number)
        before = len(problems.found)
        stated = {word: _CHECKS[word](table[word], (*path, word), problems) for word in table if word in _CHECKS}
        if "drawing" in table:
            stated["drawing"] = _drawing(table["drawing"], (*path, "drawing"), problems, folder)
        _unknown(table, path, problems)
        _missing(table, path, problems)
        if len(problems.found) == before:
            yield _accept_table(stated, real_path(folder / stated["drawing"]), path, problems)


def _accept_table(stated: Mapping[str, Any], real: str, path: KeyPath, problems: Problems) -> AcceptTable:
    acceptance = Acceptance(
        rule=stated["rule"],
        reason=stated["reason"],
        at=stated.get("at"),
        handle=stated.get("handle"),
        until=stated.get("until"),
        where=problems.where(path),
    )
    return AcceptTable(stated["drawing"], real, acceptance, problems.line(path))


def _unknown(table: Mapping[str, object], path: KeyPath, problems: Problems) -> None:
    words = [key.word for key in ACCEPT_KEYS]
    for word in table.keys() - set(words):
        near = near_name(word, words)
        home = next((key.table for key in KEYS.values() if key.word == word), None)
        if home is None and near is not None:
            hint = f"did you mean {near}?"
        elif home is not None:
            hint = f"put {word} " + (
                f"below {problems.heading(*home.split('.'))}" if home else "at the top of the file"
            )
        else:
            hint = f"use one of {', '.join(words)}"
        problems.add((*path, word), f"there is no such key here; {hint}")


def _missing(table: Mapping[str, object], path: KeyPath, problems: Problems) -> None:
    for key in ACCEPT_KEYS:
        if key.word in {"rule", "drawing", "reason"} and key.word not in table:
            problems.add((*path, key.word), f"it is missing: {key.does}; write {key.word} = {key.example}")


def _text(word: str) -> Callable[[object, KeyPath, Problems], str | None]:
    """What checks a key whose value is a text with something in it."""
    example = next(key.example for key in ACCEPT_KEYS if key.word == word)

    def check(value: object, path: KeyPath, problems: Problems) -> str | None:
        if isinstance(value, str) and value.strip():
            return " ".join(value.split())
        what = "it is empty" if isinstance(value, str) else f"it must be a text, not {described(value)}"
        problems.add(path, f"{what}; write {word} = {example}")
        return None

    return check


def _rule(value: object, path: KeyPath, problems: Problems) -> str | None:
    name = _text("rule")(value, path, problems)
    trouble = None if name is None else rule_trouble(name)
    if trouble is not None:
        problems.add(path, trouble)
    return name


def _drawing(value: object, path: KeyPath, problems: Problems, folder: Path) -> str | None:
    if not isinstance(value, str) or not value.strip():
        return _text("drawing")(value, path, problems)
    trouble = trouble_with_pattern(value)
    if (trouble is not None or is_pattern(value)) and _is_there(folder, value):
        return value
    if trouble is not None:
        problems.add(path, "; ".join(trouble).replace("pattern", "path"))
    elif "*" in value or "?" in value:
        problems.add(path, f"{quoted(value)} is a pattern; name one drawing, and write an [[accept]] table for each")
    return value


def _is_there(folder: Path, name: str) -> bool:
    """Whether a drawing below the folder is called so: a file's name may hold what patterns are made of."""
    try:
        return not name.startswith(("/", "./")) and (folder / name).is_file()
    except (OSError, ValueError):
        return False


def _at(value: object, path: KeyPath, problems: Problems) -> complex | None:
    if isinstance(value, list) and len(value) == COORDINATES and all(map(_is_coordinate, value)):
        return complex(value[0], value[1])
    problems.add(path, f"it must be two coordinates, not {described(value)}; write at = [120.5, 40.0]")
    return None


def _is_coordinate(value: object) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool) and math.isfinite(value)


def _until(value: object, path: KeyPath, problems: Problems) -> dt.date | None:
    if isinstance(value, dt.date) and not isinstance(value, dt.datetime):
        return value
    hint = "write the day without quotes, as until = 2027-03-31"
    problems.add(path, f"it must be a date, not {described(value)}; {hint}")
    return None


_CHECKS: Mapping[str, Callable[[Any, KeyPath, Problems], Any]] = {
    "rule": _rule,
    "at": _at,
    "handle": _text("handle"),
    "reason": _text("reason"),
    "until": _until,
}
