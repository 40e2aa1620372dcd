"""Acceptances written into the text of a settings file; everything that stood in it stays as it was."""

from __future__ import annotations

import tomllib
from collections.abc import Sequence
from pathlib import Path
from typing import Any, NamedTuple

from dxfcheck.configuration.accept_tables import read_accept_tables
from dxfcheck.configuration.problems import Problems, quoted
from dxfcheck.errors import OptionInvalid
from dxfcheck.settings import Acceptance
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["OWN_TABLE", "PROJECT_TABLE", "Addition", "add_acceptances"]

OWN_TABLE = ("accept",)
"""Where acceptances stand in a dxfcheck.toml."""

PROJECT_TABLE = ("tool", "dxfcheck", "accept")
"""Where they stand in a pyproject.toml."""

_BYTE_ORDER_MARK = "\ufeff"


class Addition(NamedTuple):
    """The new text of a settings file, and the line, from 1, of each entry that was added."""

    text: str
    lines: tuple[int, ...]


def add_acceptances(
    text: str,
    drawing: str,
    acceptances: Sequence[Acceptance],
    table: Sequence[str] = OWN_TABLE,
    *,
    folder: Path = Path(),
) -> Addition:
    """The text of a settings file with an entry for each acceptance at its end.

    ``drawing`` is the path of the drawing from the settings file's ``folder``, with '/'. New lines end as the others
    do. Places are written to ten digits. OptionInvalid where the text is no TOML, where its entries stand in a form
    that cannot be added to, or where the drawing's name is no Unicode text.
    """
    _refuse_bytes(drawing, *(acceptance.reason for acceptance in acceptances))
    before = _parsed(text)
    ending = "\r\n" if "\r\n" in text else "\n"
    bare = not text.removeprefix(_BYTE_ORDER_MARK)
    lead = "" if bare else ending if text.endswith("\n") else 2 * ending
    line = (text + lead).count("\n") + 1
    entries, lines = [], []
    for acceptance in acceptances:
        entry = _entry(drawing, acceptance, table)
        entries.append("".join(written + ending for written in entry))
        lines.append(line)
        line += len(entry) + 1
    block = ending.join(entries)
    _refuse_unreadable(_inner(tomllib.loads(block), table[:-1])[table[-1]], folder)
    _confirm(before, text + lead + block, block, table)
    return Addition(text + lead + block, tuple(lines))


def _entry(drawing: str, acceptance: Acceptance, table: Sequence[str]) -> list[str]:
    """The lines of one entry."""
    lines = [
        f"[[{'.'.join(table)}]]",
        f"rule = {quoted(acceptance.rule)}",
        f"drawing = {quoted(drawing)}",
    ]
    if acceptance.at is not None:
        noise = SHOWN_AS_ZERO * abs(acceptance.at)
        coordinates = (_coordinate(value, noise) for value in (acceptance.at.real, acceptance.at.imag))
        lines.append(f"at = [{', '.join(coordinates)}]")
    if acceptance.handle is not None:
        lines.append(f"handle = {quoted(acceptance.handle)}")
    lines.append(f"reason = {quoted(acceptance.reason)}")
    if acceptance.until is not None:
        lines.append(f"until = {acceptance.until.isoformat()}")
    return lines


def _coordinate(value: float, noise: float) -> str:
    """A coordinate to ten digits as a TOML float; 0 where it is rounding noise beside the other."""
    text = "0" if abs(value) <= noise else f"{value:.10g}"
    return text if "." in text or "e" in text else f"{text}.0"


def _refuse_bytes(*texts: str) -> None:
    """Raise OptionInvalid for a text that is none: bytes of a file's name that are no UTF-8, which TOML cannot hold."""
    for text in texts:
        try:
            text.encode("utf-8")
        except UnicodeEncodeError:
            shown = text.encode("utf-8", "replace").decode("utf-8")
            msg = f"{shown}: is no Unicode text and cannot be written into a settings file; rename it first"
            raise OptionInvalid(msg) from None


def _confirm(before: dict[str, Any], text: str, block: str, table: Sequence[str]) -> None:
    """Read the new text back: what stood there must mean what it meant, and the entries must have come to it."""
    by_hand = f"write each acceptance as a table [[{'.'.join(table)}]] first"
    try:
        after = tomllib.loads(text.removeprefix(_BYTE_ORDER_MARK))
    except tomllib.TOMLDecodeError:
        msg = f"the acceptances in it, or the tables round them, stand in brackets or braces; {by_hand}"
        raise OptionInvalid(msg) from None
    added, holder = (_inner(document, table[:-1]) for document in (tomllib.loads(block), before))
    holder[table[-1]] = [*holder.get(table[-1], ()), *added[table[-1]]]
    if after != before:
        msg = f"nothing can be added at its end without changing what stands there; {by_hand}"
        raise OptionInvalid(msg)


def _inner(document: dict[str, Any], names: Sequence[str]) -> dict[str, Any]:
    """The table within tables of these names, made where it is not there."""
    for name in names:
        document = document.setdefault(name, {})
    return document


def _refuse_unreadable(entries: object, folder: Path) -> None:
    """Raise OptionInvalid for entries that the reader of settings files would refuse, such as a path '/a.dxf'."""
    problems = Problems("", {})
    tuple(read_accept_tables(entries, problems, folder))
    for problem in problems.in_order():
        msg = f"such an entry would not be understood: {problem.partition(': ')[2]}"
        raise OptionInvalid(msg)


def _parsed(text: str) -> dict[str, Any]:
    try:
        return tomllib.loads(text.removeprefix(_BYTE_ORDER_MARK))
    except tomllib.TOMLDecodeError as error:
        msg = f"is no TOML: {error}; mend it first"
        raise OptionInvalid(msg) from None
