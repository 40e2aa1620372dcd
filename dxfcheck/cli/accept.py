"""`dxfcheck accept`: findings of one drawing accepted, with a reason, in its settings file."""

from __future__ import annotations

import os
import sys
from collections.abc import Iterator, Sequence
from datetime import date
from pathlib import Path
from typing import NamedTuple

from dxfcheck.cli.accept_arguments import AcceptRequest
from dxfcheck.cli.accept_choice import Entry, chosen_findings, entries_for
from dxfcheck.cli.arguments import Request
from dxfcheck.cli.explain import unknown_rule
from dxfcheck.cli.messages import one_line, say
from dxfcheck.cli.output import drop_output
from dxfcheck.cli.paths import find_targets
from dxfcheck.cli.status import CLEAN, FAULT, UNUSABLE
from dxfcheck.cli.workers import inspect_one
from dxfcheck.configuration.accept_writer import OWN_TABLE, PROJECT_TABLE, add_acceptances
from dxfcheck.configuration.effective import settings_for, today
from dxfcheck.configuration.lookup import PROJECT_FILE, SETTINGS_FILE, find_settings_file, shown_path
from dxfcheck.configuration.path_patterns import relative_path
from dxfcheck.configuration.settings_file import read_settings_file
from dxfcheck.errors import OptionInvalid
from dxfcheck.reports.files import write_whole
from dxfcheck.reports.terminal_layout import count_of
from dxfcheck.rules.acceptances import STALE, acceptance_reach
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import find_rule
from dxfcheck.rules.wording import place

__all__ = ["run_accept"]

NEW_FILE = "# Settings of dxfcheck for the drawings in this folder and below.\n"


class _Place(NamedTuple):
    """Where the acceptances go: the settings file, and whether it is there already."""

    path: Path
    exists: bool


def run_accept(wanted: AcceptRequest, request: Request) -> int:
    """Check the drawing, write the entries, and say what was accepted.

    OptionInvalid where what was asked for is not there or the file cannot be written; SettingsInvalid for a settings
    file with mistakes. Nothing is written unless all is.
    """
    _refuse(wanted, today())
    file = _settings_place(wanted.path, request.settings_file)
    settings = request.settings
    if file.exists:
        settings = settings_for(Path(wanted.path), read_settings_file(file.path), settings).settings
    outcome = inspect_one(settings, find_targets([wanted.path])[0], with_evidence=False)
    report = outcome.report
    if outcome.fault is not None or report.status == "unreadable":
        say(outcome.fault or f"{report.path}: {report.error or 'not read'}")
        return UNUSABLE if outcome.fault is None else FAULT
    reach = acceptance_reach(report.diagonal, report.tolerance or 0.0)
    chosen = chosen_findings(report.findings, wanted, reach)
    if not chosen:
        _print([f"{wanted.path}: {_nothing(report.findings, wanted)}"])
        return CLEAN
    entries = entries_for(chosen, wanted, reach)
    lines = _write(file, wanted.path, entries)
    _print(_accepted_lines(file, wanted.path, entries, lines))
    return CLEAN


def _refuse(request: AcceptRequest, day: date) -> None:
    """Raise OptionInvalid for what can be told before the drawing is read."""
    if request.until is not None and request.until < day:
        msg = f"--until {request.until.isoformat()} is past; give a day to come"
        raise OptionInvalid(msg)
    if request.rule == STALE:
        msg = f"{STALE} cannot be accepted; remove or correct the entry that it names"
        raise OptionInvalid(msg)
    if request.rule is not None and find_rule(request.rule) is None:
        raise OptionInvalid(unknown_rule(request.rule))
    if os.path.isdir(request.path):  # noqa: PTH112 - Path.is_dir raises below a folder that is locked
        msg = f"{request.path}: is a folder; accept the findings of one drawing at a time"
        raise OptionInvalid(msg)


def _settings_place(drawing: str, named: str | None) -> _Place:
    """The settings file that was named, the nearest one, or a new one beside the drawing."""
    nearest = find_settings_file(Path(drawing)) if named is None else Path(named)
    if nearest is None:
        return _Place(Path(drawing).resolve().parent / SETTINGS_FILE, exists=False)
    return _Place(nearest, exists=True)


def _write(file: _Place, drawing: str, entries: Sequence[Entry]) -> tuple[int, ...]:
    """Add the entries to the settings file; the line of each."""
    text = file.path.read_bytes().decode("utf-8") if file.exists else NEW_FILE
    table = PROJECT_TABLE if file.path.name == PROJECT_FILE else OWN_TABLE
    folder = file.path.resolve().parent
    relative = relative_path(Path(drawing), folder)
    try:
        addition = add_acceptances(text, relative, [entry.acceptance for entry in entries], table, folder=folder)
    except OptionInvalid as error:
        msg = f"{shown_path(file.path.absolute())}: {error}"
        raise OptionInvalid(msg) from None
    write_whole(file.path, addition.text)
    return addition.lines


def _accepted_lines(file: _Place, drawing: str, entries: Sequence[Entry], lines: Sequence[int]) -> Iterator[str]:
    """One line a finding: what was accepted and where that is written."""
    shown = shown_path(file.path.absolute())
    for entry, line in zip(entries, lines, strict=True):
        for finding in entry.findings:
            at = "" if finding.at is None else f" at {place(finding.at)}"
            yield f"{drawing}: accepted {finding.severity} {finding.rule}{at}; written to {shown}:{line}"


def _nothing(findings: Sequence[Finding], request: AcceptRequest) -> str:
    """Why nothing is left to accept."""
    accepted = sum(finding.accepted is not None for finding in findings)
    stale = sum(finding.rule == STALE for finding in findings)
    narrowed = not (request.rule is None and request.at is None and request.handle is None)
    what = "what was named is accepted already" if narrowed else "no error and no warning that counts"
    already = f" ({accepted} accepted already)" if accepted and not narrowed else ""
    left = f"; {count_of(stale, 'entry', 'entries')} of {STALE} must be corrected by hand" if stale else ""
    return f"nothing to accept: {what}{already}{left}"


def _print(lines: Iterator[str] | Sequence[str]) -> None:
    try:
        for line in lines:
            sys.stdout.write(f"{one_line(line)}\n")
        sys.stdout.flush()
    except BrokenPipeError:
        drop_output()
    except OSError as error:
        drop_output()
        msg = f"what was done cannot be written to standard output: {error.strerror or error}"
        raise OptionInvalid(msg) from error
