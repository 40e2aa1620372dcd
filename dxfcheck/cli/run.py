"""`dxfcheck check` and `dxfcheck read`: drawings in, reports out."""

from __future__ import annotations

import sys
from collections.abc import Iterator, Sequence
from pathlib import Path

from dxfcheck.cli.arguments import Request
from dxfcheck.cli.configured import with_settings
from dxfcheck.cli.messages import say
from dxfcheck.cli.outcome import Outcome, exit_status
from dxfcheck.cli.output import drop_output
from dxfcheck.cli.paths import find_targets
from dxfcheck.cli.progress import counted
from dxfcheck.cli.status import CLEAN, UNUSABLE
from dxfcheck.cli.workers import inspect_all
from dxfcheck.errors import OptionInvalid
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.files import refuse_target, write_whole
from dxfcheck.reports.json_report import json_text
from dxfcheck.reports.terminal import TerminalReport

__all__ = ["run_drawings"]

STANDARD_OUTPUT = "-"


def run_drawings(request: Request) -> int:
    """Check or read every drawing asked for, report, and return the exit status."""
    if request.json is not None and request.json != STANDARD_OUTPUT:
        refuse_target(Path(request.json))
    targets = with_settings(find_targets(request.paths), request.settings, request.settings_file)
    outcomes: list[Outcome] = []
    terminal = None if request.json == STANDARD_OUTPUT else TerminalReport(sys.stdout)
    try:
        work = inspect_all(
            targets,
            request.settings,
            request.jobs,
            with_evidence=request.command == "read",
            with_bounds=not request.quiet or request.json is not None,
        )
        for outcome in _with_progress(work, len(targets), request):
            outcomes.append(outcome)
            _tell_of_trouble(outcome)
            if terminal is not None:
                _print_one(terminal, outcome.report, request)
        _finish([outcome.report for outcome in outcomes], terminal, request)
    except BrokenPipeError:
        # The reader has what it wanted (| head); what was not looked at cannot be called clean.
        drop_output()
        return max(exit_status(outcomes, request.fail_on), UNUSABLE if len(outcomes) < len(targets) else CLEAN)
    except OSError as error:
        drop_output()
        msg = f"the report cannot be written to standard output: {error.strerror or error}"
        raise OptionInvalid(msg) from error
    return exit_status(outcomes, request.fail_on)


def _print_one(terminal: TerminalReport, report: DrawingReport, request: Request) -> None:
    if request.command == "read":
        terminal.reading(report)
    elif request.quiet:
        terminal.quiet(report)
    else:
        terminal.drawing(report, working=request.working)


def _finish(reports: Sequence[DrawingReport], terminal: TerminalReport | None, request: Request) -> None:
    """What comes after the last drawing: the summary, and the JSON report whole."""
    if terminal is not None and request.quiet:
        terminal.quiet_end(reports)
    elif terminal is not None and request.command == "check":
        terminal.end(reports)
    if request.json is not None:
        text = json_text(reports, with_evidence=request.command == "read")
        if request.json == STANDARD_OUTPUT:
            sys.stdout.write(text)
        else:
            write_whole(Path(request.json), text)
    sys.stdout.flush()


def _tell_of_trouble(outcome: Outcome) -> None:
    """Say on standard error what could not be done, unless the same terminal shows it anyway."""
    report = outcome.report
    if outcome.fault is not None:
        say(outcome.fault)
    elif report.status == "unreadable" and not (sys.stdout.isatty() and sys.stderr.isatty()):
        reason = (report.error or "not read").removeprefix(f"{report.path}: ")
        say(f"{report.path}: {reason}")


def _with_progress(outcomes: Iterator[Outcome], total: int, request: Request) -> Iterator[Outcome]:
    """The outcomes, counted on standard error where a person waits there and nothing else shows that work goes on."""
    reports_show = sys.stdout.isatty() and not request.quiet and request.json != STANDARD_OUTPUT
    waited_for = total > 1 and sys.stderr.isatty() and not reports_show
    return counted(outcomes, total, sys.stderr) if waited_for else outcomes
