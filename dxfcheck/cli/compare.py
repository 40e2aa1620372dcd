"""`dxfcheck compare`: what changed between two drawings as a mechanism; also as the diff command of git."""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path

from dxfcheck.cli.arguments import Request
from dxfcheck.cli.compare_arguments import CompareRequest
from dxfcheck.cli.configured import with_settings
from dxfcheck.cli.messages import fault_text, one_line, say
from dxfcheck.cli.outcome import Outcome
from dxfcheck.cli.output import drop_output
from dxfcheck.cli.paths import Target, find_targets
from dxfcheck.cli.run import STANDARD_OUTPUT
from dxfcheck.cli.status import CLEAN, FAULT, FOUND, UNUSABLE
from dxfcheck.cli.workers import inspect_one
from dxfcheck.comparison.compare import compare_reports
from dxfcheck.errors import OptionInvalid
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.compare_json import comparison_text
from dxfcheck.reports.files import refuse_target, write_whole
from dxfcheck.reports.terminal_compare import CompareReport
from dxfcheck.reports.terminal_drawing import verdict

__all__ = ["run_compare"]

UNKNOWN_HASH = frozenset("0.")
"""What git names as the hash of a file that is not committed: zeros, or a dot."""


def run_compare(compare: CompareRequest, request: Request) -> int:
    """Compare two drawings, report, and return the exit status; OptionInvalid where the report cannot be written."""
    try:
        return _for_git(compare, request) if compare.git else _two_files(compare, request)
    except BrokenPipeError:
        drop_output()
        return CLEAN if compare.git else UNUSABLE
    except OSError as error:
        drop_output()
        msg = f"the report cannot be written to standard output: {error.strerror or error}"
        raise OptionInvalid(msg) from error


def _two_files(compare: CompareRequest, request: Request) -> int:
    if request.json is not None and request.json != STANDARD_OUTPUT:
        refuse_target(Path(request.json))
    paths = (compare.old, compare.new)
    outcomes = _inspected([_target(path) for path in paths], paths, request)
    for outcome in outcomes:
        if outcome.report.status == "unreadable":
            say(outcome.fault or _why_unread(outcome.report))
    if any(outcome.fault is not None for outcome in outcomes):
        return FAULT
    if any(outcome.report.status == "unreadable" for outcome in outcomes):
        return UNUSABLE
    comparison = compare_reports(outcomes[0].report, outcomes[1].report, allow=compare.allow)
    if request.json != STANDARD_OUTPUT:
        terminal = CompareReport(sys.stdout)
        terminal.comparison(comparison)
        terminal.caution()
    if request.json == STANDARD_OUTPUT:
        sys.stdout.write(comparison_text(comparison))
    elif request.json is not None:
        write_whole(Path(request.json), comparison_text(comparison))
    sys.stdout.flush()
    return FOUND if comparison.beyond else CLEAN


def _for_git(compare: CompareRequest, request: Request) -> int:
    """One changed file in git's list; whatever it holds, git goes on to the next with status 0."""
    terminal = CompareReport(sys.stdout)
    subject = one_line(compare.paths[1])
    if not (compare.old or compare.new):
        terminal.line(f"{subject}: not merged; compare the versions by hand")
        return CLEAN
    sides = zip(compare.paths, (compare.old, compare.new), compare.versions, strict=True)
    there = [(path, file, version) for path, file, version in sides if file]
    outcomes = _inspected([Target(path) for path, _, _ in there], [file for _, file, _ in there], request)
    reports = [
        replace(outcome.report, path=_versioned(path, version))
        for outcome, (path, _, version) in zip(outcomes, there, strict=True)
    ]
    unread = [report for report in reports if report.status == "unreadable"]
    if unread:
        for report in unread:
            terminal.line(_why_unread(report))
    elif len(reports) == 1:
        terminal.line(f"{subject}: {'added' if compare.new else 'deleted'}: {verdict(reports[0])}")
    else:
        try:
            terminal.comparison(compare_reports(reports[0], reports[1], allow=compare.allow), subject=subject)
        except OSError:
            raise
        except Exception as error:  # noqa: BLE001 - a fault of ours in one drawing must not end git's list
            terminal.line(fault_text(error, subject))
    terminal.line("")
    sys.stdout.flush()
    return CLEAN


def _target(path: str) -> Target:
    """The drawing at a path; a folder is no drawing."""
    if os.path.isdir(path):  # noqa: PTH112 - Path.is_dir raises below a folder that is locked
        return Target(path, "is a folder; compare takes two drawings")
    return find_targets([path])[0]


def _inspected(targets: Sequence[Target], files: Sequence[str], request: Request) -> list[Outcome]:
    """Each drawing with the settings that hold for its target, read from a file that may lie elsewhere.

    A settings file is read, and its warnings are given, once for both.
    """
    configured = with_settings(targets, request.settings, request.settings_file)
    return [
        inspect_one(request.settings, target._replace(path=file), with_evidence=False)
        for target, file in zip(configured, files, strict=True)
    ]


def _why_unread(report: DrawingReport) -> str:
    reason = (report.error or "not read").removeprefix(f"{report.path}: ")
    return f"{report.path}: {reason}"


def _versioned(path: str, version: str) -> str:
    """The path with git's hash of its content, as far as it has one."""
    return path if UNKNOWN_HASH.issuperset(version) else f"{path} ({version[:7]})"
