"""The value of one key of a settings file, held against what that key may say."""

from __future__ import annotations

import math
import re
from collections.abc import Callable, Iterator, Mapping
from typing import Any, NamedTuple, cast

from dxfcheck.configuration.key_lines import KeyPath
from dxfcheck.configuration.problems import Problems, described, key_text, near_name, quoted
from dxfcheck.configuration.settings_keys import ANY_NAME, Key, Kind
from dxfcheck.drawing.units import LENGTH_UNITS, parse_unit
from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.drives.drive_text import parse_drive
from dxfcheck.reading.requirements.requirement_text import OFF, read_expected_speed, read_limit, read_ratio
from dxfcheck.rules.finding import SEVERITIES
from dxfcheck.rules.registry import all_rules
from dxfcheck.settings import Quantity

__all__ = ["Statement", "read_value", "rule_trouble", "toml_text"]

WEIGHTS = ("off", *reversed(SEVERITIES))

RIGHT_ANGLE = 90.0
_ANGLE = re.compile(r"\s*(\d+(?:[.,]\d+)?)\s*(?:deg|degrees|°)\s*", re.IGNORECASE)
_PER_CENT = re.compile(r"\s*(\d+(?:[.,]\d+)?)\s*%\s*")

SHAPES: dict[Kind, str] = {
    "unit": "the name of a length unit",
    "length": "a length above 0",
    "names": "a list of names",
    "drives": "a list of texts",
    "whole number": "a whole number",
    "speed": "a text",
    "ratio": "a text",
    "limit": "a text for all, or a table of texts by name",
    "angle": "an angle above 0 and up to 90 degrees as a text",
    "part": "a part above 0 in per cent as a text",
    "weight": "a text",
}


class Statement(NamedTuple):
    """One setting as a file states it: its key, the name it is for ('' where it needs none), its value and line.

    ``text`` is the value as it would be written in such a file. An expectation that is lifted has None as its value.
    """

    key: str
    name: str
    value: object
    text: str
    line: int


def read_value(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    """What a key states; where it cannot be used nothing, and the problem is kept."""
    yield from _READERS[key.kind](key, value, path, problems)


def toml_text(value: object) -> str:
    """A value as it is written in a settings file."""
    if isinstance(value, str):
        return quoted(value)
    if isinstance(value, list | tuple):
        return f"[{', '.join(toml_text(each) for each in value)}]"
    return f"{value:g}" if isinstance(value, float) else str(value)


def rule_trouble(name: str) -> str | None:
    """What to say where there is no rule of that name, with the nearest one there is; None where there is one."""
    names = [entered.name for entered in all_rules()]
    if name in names:
        return None
    near = near_name(name, names)
    return f"there is no rule {quoted(name)}; " + (f"did you mean {near}?" if near else "'dxfcheck explain' lists them")


def _statement(key: Key, value: object, path: KeyPath, problems: Problems, name: str = "") -> Statement:
    return Statement(key.name, name, value, toml_text(value), problems.line(path))


def _wrong(key: Key, value: object, path: KeyPath, problems: Problems) -> None:
    """The value has not the shape that its key asks for."""
    word = key_text(path[-1:]) if key.word == ANY_NAME else key.word
    what = f"it must be {SHAPES[key.kind]}, not {described(value)}"
    problems.add(path, f"{what}; write {word} = {key.example}")


def _unit(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    if not isinstance(value, str):
        _wrong(key, value, path, problems)
        return
    try:
        yield _statement(key, parse_unit(value).name, path, problems)
    except OptionInvalid:
        near = near_name(value, LENGTH_UNITS)
        hint = f'did you mean "{near}"?' if near else "write for instance mm, cm, m, in or ft"
        problems.add(path, f"length unit {quoted(value)} is not known; {hint}")


def _length(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    if isinstance(value, bool) or not isinstance(value, int | float) or not (math.isfinite(value) and value > 0):
        _wrong(key, value, path, problems)
    else:
        yield _statement(key, float(value), path, problems)


def _whole_number(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    if value == OFF:
        yield _statement(key, None, path, problems)._replace(text=quoted(OFF))
    elif isinstance(value, bool) or not isinstance(value, int):
        _wrong(key, value, path, problems)
    else:
        yield _statement(key, value, path, problems)


def _texts(key: Key, value: object, path: KeyPath, problems: Problems) -> tuple[str, ...] | None:
    """A list of texts, none of them empty; None where it is no such list."""
    if not isinstance(value, list):
        _wrong(key, value, path, problems)
        return None
    for number, each in enumerate(value):
        if not isinstance(each, str) or not each.strip():
            what = "an empty text names nothing" if isinstance(each, str) else described(each)
            problems.add((*path, number), f"it must be {SHAPES[key.kind]}: {what}; write {key.word} = {key.example}")
            return None
    return tuple(each.strip() for each in cast("list[str]", value))


def _names(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    texts = _texts(key, value, path, problems)
    if texts is not None:
        yield _statement(key, texts, path, problems)


def _drives(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    texts = _texts(key, value, path, problems)
    usable = texts is not None
    for number, text in enumerate(texts or ()):
        try:
            parse_drive(text)
        except OptionInvalid as fault:
            problems.add((*path, number), str(fault))
            usable = False
    if usable:
        yield _statement(key, texts, path, problems)


def _speed(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    yield from _expectation(key, value, path, problems, read_expected_speed)


def _ratio(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    yield from _expectation(key, value, path, problems, read_ratio)


def _expectation(
    key: Key, value: object, path: KeyPath, problems: Problems, read: Callable[..., object]
) -> Iterator[Statement]:
    """What is expected of the name in the key; None as its value where nothing is to be expected of it."""
    if value == OFF:
        yield Statement(key.name, str(path[-1]), None, quoted(OFF), problems.line(path))
    else:
        yield from _requirement(key, value, path, problems, read)


def _limit(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    quantity = cast("Quantity", key.word)

    def read(subject: str, text: str, *, where: str = "") -> object:
        return read_limit(quantity, subject, text, where=where)

    if isinstance(value, dict):
        for name, text in value.items():
            yield from _requirement(key, text, (*path, name), problems, read)
    else:
        yield from _requirement(key, value, path, problems, read, ANY_NAME)


def _requirement(
    key: Key,
    value: object,
    path: KeyPath,
    problems: Problems,
    read: Callable[..., object],
    subject: str | None = None,
) -> Iterator[Statement]:
    """A limit or an expectation for one name: that of the key, unless another subject is given."""
    name = str(path[-1]) if subject is None else subject
    if not isinstance(value, str):
        _wrong(key, value, path, problems)
        return
    try:
        required = read(name, value, where=problems.where(path))
    except OptionInvalid as fault:
        problems.add(path, str(fault))
        return
    yield Statement(key.name, name, required, quoted(value), problems.line(path))


def _angle(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    match = _ANGLE.fullmatch(value) if isinstance(value, str) else None
    degrees = _figure(match) if match else 0.0
    if not 0.0 < degrees <= RIGHT_ANGLE:
        _wrong(key, value, path, problems)
    else:
        yield _statement(key, degrees, path, problems)._replace(text=quoted(f"{degrees:g} deg"))


def _part(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    match = _PER_CENT.fullmatch(value) if isinstance(value, str) else None
    per_cent = _figure(match) if match else 0.0
    if not (math.isfinite(per_cent) and per_cent > 0.0):
        _wrong(key, value, path, problems)
    else:
        yield _statement(key, per_cent / 100, path, problems)._replace(text=quoted(f"{per_cent:g} %"))


def _figure(match: re.Match[str]) -> float:
    return float(match[1].replace(",", "."))


def _weight(key: Key, value: object, path: KeyPath, problems: Problems) -> Iterator[Statement]:
    name = str(path[-1])
    trouble = rule_trouble(name)
    if trouble is not None:
        problems.add(path, trouble)
        return
    if value not in WEIGHTS:
        choices = ", ".join(quoted(weight) for weight in WEIGHTS)
        problems.add(path, f"{described(value)} is no severity; write one of {choices}")
        return
    yield _statement(key, value, path, problems, name)


_READERS: Mapping[Kind, Callable[[Key, Any, KeyPath, Problems], Iterator[Statement]]] = {
    "unit": _unit,
    "length": _length,
    "names": _names,
    "drives": _drives,
    "whole number": _whole_number,
    "speed": _speed,
    "ratio": _ratio,
    "limit": _limit,
    "angle": _angle,
    "part": _part,
    "weight": _weight,
}
