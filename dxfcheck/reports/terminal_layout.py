"""Figures, columns and folded lines for the terminal.

rich lays out a table in milliseconds, which a sheet of a thousand mechanisms cannot afford; padding cells takes
microseconds. Everything here yields plain lines; ``terminal`` gives them to rich, which knows about colours.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from typing import NamedTuple

from dxfcheck.rules.wording import place

__all__ = [
    "GAP",
    "NOT_APPLICABLE",
    "UNKNOWN",
    "WIDTH",
    "Column",
    "Line",
    "count_of",
    "figure",
    "figure_column",
    "fold",
    "listed",
    "place",
    "table",
]

WIDTH = 80
"""Characters to a line where the terminal does not say."""
GAP = "  "
UNKNOWN = "?"
NOT_APPLICABLE = "-"
BREAK = re.compile(r"(?<![0-9]) +")
"""Where a line may be broken: not after a digit, so that a figure keeps its unit."""

_FIXED_FROM = 1e-4
_FIVE_DIGITS_TO = 99999.5
_FIXED_TO = 1e9


class Line(NamedTuple):
    """One line of a report; the style covers its first ``reach`` characters, or all where that is 0."""

    text: str
    style: str = ""
    reach: int = 0


class Column(NamedTuple):
    """One column: its heading, the unit below it, and its cells; figures are aligned at the decimal point."""

    heading: str
    unit: str
    cells: Sequence[str]
    numeric: bool = True


def figure(value: float, zero_below: float = 0.0) -> str:
    """A figure to five significant digits, in full up to 1e9; 0 where its size is at most ``zero_below``."""
    size = abs(value)
    if size <= zero_below:
        return "0"
    if _FIXED_FROM <= size < _FIVE_DIGITS_TO:
        return f"{value:.5g}"
    return f"{value:.0f}" if _FIVE_DIGITS_TO <= size < _FIXED_TO else f"{value:.4g}"


def figure_column(heading: str, unit: str, values: Iterable[float | str | None], zero_below: float = 0.0) -> Column:
    """A column of figures; None is unknown and shown as '?', a text stands as it is."""
    cells = []
    for value in values:
        if value is None:
            cells.append(UNKNOWN)
        elif isinstance(value, str):
            cells.append(value)
        elif -zero_below <= value <= zero_below:
            cells.append("0")
        else:
            text = f"{value:.5g}"
            cells.append(figure(value) if "e" in text else text)
    return Column(heading, unit, cells)


def count_of(number: int, noun: str, plural: str = "") -> str:
    """'1 pin', '2 pins'; the plural where it is not noun + s."""
    return f"{number} {noun if number == 1 else plural or noun + 's'}"


def listed(names: Sequence[str]) -> str:
    """'A', 'A and B', 'A, B and C'."""
    return " and ".join(filter(None, (", ".join(names[:-1]), names[-1]))) if names else ""


def fold(text: str, width: int, lead: str = "", indent: str = "") -> list[str]:
    """The text after ``lead``, broken at spaces so that lines keep to the width; later lines start with ``indent``.

    A word longer than a line (a path, a name) stays whole, so that it can be copied.
    """
    if len(lead) + len(text) <= width:
        return [lead + text]
    lines: list[str] = []
    line, bare = lead, True
    for word in BREAK.split(text):
        if bare:
            line, bare = line + word, False
        elif len(line) + 1 + len(word) <= width:
            line = f"{line} {word}"
        else:
            lines.append(line)
            line = indent + word
    lines.append(line)
    return lines


def table(columns: Sequence[Column], width: int, indent: str = GAP) -> list[Line]:
    """The columns side by side under two lines of heading, name above unit.

    Where the lines would grow too long, the decimal points are no longer aligned. Where that is not enough, a last
    column of text is folded below itself; else the widest text column gives way, and a cell that does not fit it
    stands on a line of its own, above the figures it belongs to.
    """
    bodies = [_pointed(column.cells) if column.numeric else column.cells for column in columns]
    sizes = _sizes(columns, bodies)
    room = width - len(indent) - len(GAP) * (len(columns) - 1)
    if sum(sizes) > room:
        bodies = [column.cells for column in columns]
        sizes = _sizes(columns, bodies)
        if sum(sizes) > room:
            narrow = _narrowed if columns[-1].numeric else _folded
            return narrow(columns, sizes, width, indent)
    pattern = _pattern(columns, sizes, indent)
    return _heading(columns, pattern) + [Line((pattern % row).rstrip()) for row in zip(*bodies, strict=True)]


def _pointed(cells: Sequence[str]) -> Sequence[str]:
    """Cells filled up so that their decimal points lie below one another; one without ends where it would stand."""
    if "." not in "".join(cells):
        return cells
    tails = [len(cell) - cell.index(".") if "." in cell else 0 for cell in cells]
    longest = max(tails)
    return [cell + " " * (longest - tail) for cell, tail in zip(cells, tails, strict=True)]


def _sizes(columns: Sequence[Column], bodies: Sequence[Sequence[str]]) -> list[int]:
    return [max(map(len, (column.heading, column.unit, *body))) for column, body in zip(columns, bodies, strict=True)]


def _pattern(columns: Sequence[Column], sizes: Sequence[int], indent: str) -> str:
    """A %-pattern for one row: figures to the right, text to the left."""
    return indent + GAP.join(
        [f"%{size}s" if column.numeric else f"%-{size}s" for column, size in zip(columns, sizes, strict=True)]
    )


def _heading(columns: Sequence[Column], pattern: str) -> list[Line]:
    names = (pattern % tuple([column.heading for column in columns])).rstrip()
    units = (pattern % tuple([column.unit for column in columns])).rstrip()
    return [Line(names, "dim"), Line(units, "dim")] if units else [Line(names, "dim")]


def _folded(columns: Sequence[Column], sizes: list[int], width: int, indent: str) -> list[Line]:
    """The table with the text of its last column folded below itself."""
    pattern = _pattern(columns[:-1], sizes[:-1], indent) + GAP
    hanging = " " * min(len(indent) + sum(sizes[:-1]) + len(GAP) * len(sizes[:-1]), width // 2)
    lines = _heading(columns, pattern + "%s")
    for row in zip(*(column.cells for column in columns), strict=True):
        lines += [Line(text.rstrip()) for text in fold(row[-1], width, pattern % row[:-1], hanging)]
    return lines


def _narrowed(columns: Sequence[Column], sizes: list[int], width: int, indent: str) -> list[Line]:
    """The table with the surplus taken from its widest text column."""
    too_much = len(indent) + sum(sizes) + len(GAP) * (len(columns) - 1) - width
    texts = [number for number, column in enumerate(columns) if not column.numeric]
    widest = max(texts, key=lambda number: sizes[number])
    sizes[widest] = max(len(columns[widest].heading), sizes[widest] - too_much)
    pattern = _pattern(columns, sizes, indent)
    lines = _heading(columns, pattern)
    for row in zip(*(column.cells for column in columns), strict=True):
        cells = row
        if len(row[widest]) > sizes[widest]:
            whole = GAP.join(row[number] for number in texts)
            lines += [Line(text) for text in fold(whole, width, indent, indent * 2)]
            cells = tuple("" if number in texts else cell for number, cell in enumerate(row))
        lines.append(Line((pattern % cells).rstrip()))
    return lines
