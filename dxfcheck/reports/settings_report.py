"""The settings that hold for a drawing or a folder, on the terminal and as JSON: what holds, and who states it."""

from __future__ import annotations

import json
from collections.abc import Sequence
from dataclasses import dataclass

from dxfcheck import __version__
from dxfcheck.configuration.listing import BUILT_IN, OPTION, ListedSetting
from dxfcheck.reports.terminal_layout import Line, fold

__all__ = ["SettingsReport", "settings_as_json", "settings_lines"]

LABEL = "  {:<11}"
INDENT = " " * 13
FROM_COLUMN = 44
"""Where 'from' stands, unless all values are short; longer ones have it on the next line."""


@dataclass(frozen=True, slots=True, kw_only=True)
class SettingsReport:
    """The settings of one drawing, or of a folder where ``folder`` is True.

    ``file`` is the settings file that holds, None without one; ``hidden`` are those that it hides. ``used`` are the
    tables of single drawings that apply ('drawings "received/*.dxf" (line 30)'), ``unused`` those that do not; of a
    folder's, ``idle`` are those that no drawing below the folder of the settings file has the path for.
    """

    path: str
    folder: bool
    file: str | None
    hidden: tuple[str, ...]
    used: tuple[str, ...]
    unused: tuple[str, ...]
    settings: tuple[ListedSetting, ...]
    idle: tuple[str, ...] = ()


def settings_lines(report: SettingsReport, width: int) -> list[Line]:
    """What is stated first, with who states it, then what is built in."""
    lines = [Line(f"{report.path}: settings", "bold", len(report.path) + 1)]
    for label, text in _facts(report):
        lines += map(Line, fold(text, width, LABEL.format(label), INDENT))
    stated = [each for each in report.settings if each.where != BUILT_IN]
    built_in = [each for each in report.settings if each.where == BUILT_IN]
    lines += [Line(""), Line("Stated", "bold")]
    lines += _stated(stated, width) if stated else [Line("  nothing")]
    if built_in:
        lines += [Line(""), Line("Built in", "bold"), *_built_in(built_in, width)]
    return lines


def settings_as_json(report: SettingsReport) -> str:
    """The same for programs, one setting a line."""
    settings = [json.dumps({"key": key, "value": value, "from": where}) for key, value, where in report.settings]
    head = {
        "tool": {"name": "dxfcheck", "version": __version__},
        "path": report.path,
        "file": report.file,
        "hidden": report.hidden,
        "tables": report.used,
        "tables_that_fit_none": report.idle,
    }
    lines = [f"  {json.dumps(key)}: {json.dumps(value)}," for key, value in head.items()]
    return "\n".join(["{", *lines, '  "settings": [', ",\n".join(f"    {line}" for line in settings), "  ]", "}", ""])


def _facts(report: SettingsReport) -> list[tuple[str, str]]:
    """Which file holds, which of its tables, and which other files do not."""
    where = "this folder" if report.folder else "the folder of the drawing"
    facts = [("file", report.file or f"none: there is no dxfcheck.toml in {where} or above it")]
    if report.used:
        facts.append(("tables", ", ".join(report.used)))
    if report.unused:
        why = "they count for single drawings" if report.folder else "they are of other drawings"
        facts.append(("left aside", f"{', '.join(report.unused)}: {why}"))
    if report.idle:
        facts.append(("fit none", f"{', '.join(report.idle)}: no drawing has such a path; mend or remove"))
    if report.hidden:
        facts.append(("hidden", f"{', '.join(report.hidden)}: not used, as {report.file} is nearer"))
    return facts


def _stated(settings: Sequence[ListedSetting], width: int) -> list[Line]:
    """Key and value, and beside or below them who states it."""
    lines: list[Line] = []
    shown = [f"  {each.key} = {each.value}" for each in settings]
    column = max((len(text) for text in shown if len(text) <= FROM_COLUMN), default=0)
    for each, text in zip(settings, shown, strict=True):
        where = "from the option" if each.where == OPTION else f"from {each.where}"
        if len(text) <= column and column + 2 + len(where) <= width:
            lines.append(Line(f"{text:<{column}}  {where}"))
        else:
            lines += map(Line, fold(each.value, width, f"  {each.key} = ", "      "))
            lines += map(Line, fold(where, width, "      ", "      "))
    return lines


def _built_in(settings: Sequence[ListedSetting], width: int) -> list[Line]:
    longest = max(len(each.key) for each in settings)
    lead = f"  {{:<{longest}}}  "
    return [
        Line(text) for each in settings for text in fold(each.value, width, lead.format(each.key), " " * (longest + 4))
    ]
