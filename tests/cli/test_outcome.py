from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest

from dxfcheck.cli.outcome import Outcome, exit_status
from dxfcheck.rules.finding import Finding, Severity
from tests.reports.samples import ACCEPTED, tipper, unreadable


def with_finding(severity: Severity) -> Outcome:
    return Outcome(tipper(findings=(Finding(rule="x", severity=severity, message="m", remedy="r"),)))


CLEAN = Outcome(tipper(findings=()))
ACCEPTED_ONLY = Outcome(tipper(findings=(ACCEPTED, replace(ACCEPTED, severity="error"))))
NOTE, WARNING, ERROR = with_finding("note"), with_finding("warning"), with_finding("error")
UNREADABLE = Outcome(unreadable())
FAULTY = Outcome(unreadable(), "a fault")


@pytest.mark.parametrize(
    ("outcomes", "fail_on", "status"),
    [
        ([], "error", 0),
        ([CLEAN], "note", 0),
        ([NOTE], "warning", 0),
        ([NOTE], "note", 1),
        ([WARNING], "error", 0),
        ([WARNING], "warning", 1),
        ([WARNING], "note", 1),
        ([CLEAN, ERROR], "error", 1),
        ([ERROR], "never", 0),
        ([ACCEPTED_ONLY], "note", 0),
        ([ACCEPTED_ONLY, WARNING], "warning", 1),
        ([ERROR, UNREADABLE], "error", 2),
        ([UNREADABLE], "never", 2),
        ([UNREADABLE, FAULTY, ERROR], "never", 3),
    ],
)
def test_the_status_names_the_gravest_of_what_happened(outcomes: list[Any], fail_on: str, status: int) -> None:
    assert exit_status(outcomes, fail_on) == status
