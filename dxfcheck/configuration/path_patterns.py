"""Patterns of paths, as the tables of single drawings have them: 'received/*.dxf', '**/old/*.dxf'."""

from __future__ import annotations

import os
import re
from functools import cache
from pathlib import Path

__all__ = ["escaped_pattern", "is_pattern", "matches_path", "relative_path", "trouble_with_pattern"]

_PART = re.compile(
    r"(?P<folders>\*\*/)|(?P<all>\*\*)|(?P<name>\*)|(?P<one>\?)|\[(?P<no>!?)(?P<set>[^\]]+)\]|(?P<plain>.)"
)


def relative_path(drawing: Path, folder: Path) -> str:
    """The drawing's path from the folder, links followed, with '/' between its parts."""
    return Path(os.path.relpath(os.path.realpath(drawing), os.path.realpath(folder))).as_posix()


def is_pattern(pattern: str) -> bool:
    """Whether it may fit other paths than one that is written like it."""
    return re.search(r"[*?\[]", pattern) is not None


def matches_path(path: str, pattern: str) -> bool:
    """Whether a pattern fits a whole path: '*' and '?' within a name, '**' over folders; case as it stands."""
    return _compiled(pattern).fullmatch(path) is not None


def escaped_pattern(path: str) -> str:
    """A pattern that fits this path alone."""
    return re.sub(r"[*?\[]", r"[\g<0>]", path)


def trouble_with_pattern(pattern: str) -> tuple[str, str] | None:
    """What is wrong with a pattern and what to do about it, None where it can be used."""
    if not pattern.strip():
        return "the pattern is empty", 'name a drawing or write a pattern such as "received/*.dxf"'
    if "\\" in pattern:
        return "a path in a pattern has '/' between its parts", f'write "{pattern.replace(chr(92), "/")}"'
    if pattern.startswith(("/", "~")) or re.match("[A-Za-z]:", pattern):
        return "the pattern must start from the folder of this file", 'write for instance "received/*.dxf"'
    if pattern.startswith("./"):
        return "a pattern does not start with './'", f'write "{pattern.removeprefix("./")}"'
    if pattern.endswith("/"):
        return "the pattern names a folder and fits no drawing", f'write "{pattern}**" for all drawings below it'
    return None


@cache
def _compiled(pattern: str) -> re.Pattern[str]:
    return re.compile("".join(_expression(match) for match in _PART.finditer(pattern)), re.DOTALL)


def _expression(match: re.Match[str]) -> str:
    """One part of a pattern as a regular expression."""
    fixed = {"folders": "(?:.*/)?", "all": ".*", "name": "[^/]*", "one": "[^/]"}
    for group, expression in fixed.items():
        if match[group]:
            return expression
    if match["set"]:
        inner = match["set"].replace("^", r"\^").replace("[", r"\[").replace("&", r"\&").replace("~", r"\~")
        return f"[{'^' if match['no'] else ''}{inner}]"
    return re.escape(match["plain"])
