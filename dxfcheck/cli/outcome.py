"""What became of each drawing, and the exit status that follows, decided in this one place."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

from dxfcheck.cli.status import CLEAN, FAULT, FOUND, UNUSABLE
from dxfcheck.inspection import DrawingReport
from dxfcheck.rules.finding import SEVERITIES

__all__ = ["Outcome", "exit_status"]


class Outcome(NamedTuple):
    """What became of one drawing; ``fault`` is the one line about a fault of our own, None where there was none."""

    report: DrawingReport
    fault: str | None = None


def exit_status(outcomes: Iterable[Outcome], fail_on: str) -> int:
    """3 before 2 before 1: the status names the gravest of what happened; what was accepted does not count."""
    reports = []
    for outcome in outcomes:
        if outcome.fault is not None:
            return FAULT
        reports.append(outcome.report)
    if any(report.status == "unreadable" for report in reports):
        return UNUSABLE
    counted = () if fail_on == "never" else SEVERITIES[: SEVERITIES.index(fail_on) + 1]
    weighing = (finding.severity for report in reports for finding in report.findings if finding.accepted is None)
    return FOUND if any(severity in counted for severity in weighing) else CLEAN
