from __future__ import annotations

from dataclasses import replace
from datetime import date

import pytest

from dxfcheck.cli.accept_arguments import AcceptRequest
from dxfcheck.cli.accept_choice import chosen_findings, entries_for
from dxfcheck.errors import OptionInvalid
from dxfcheck.rules.acceptances import STALE, accept_findings
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.wording import place
from dxfcheck.settings import Acceptance

REACH = 0.1
ASKED = AcceptRequest(path="tipper.dxf", reason="meant so")


def finding(rule: str, severity: Severity, at: complex | None = None, *handles: str) -> Finding:
    return Finding(rule=rule, severity=severity, message="m", remedy="r", at=at, handles=handles)


GAP = finding("near-miss", "error", 120.5 + 40j, "2F")
RING = finding("empty-pin", "warning", 10 + 5j, "30", "31")
DRIVE = finding("assumed-drive", "note", 0j)
UNIT = finding("units-missing", "warning")
BLOCK = finding("hidden-linework", "warning", None, "4A", "4B")
OLD = finding(STALE, "warning", 10 + 5j)
ALL = (GAP, RING, UNIT, BLOCK, DRIVE, OLD)


@pytest.mark.parametrize(
    ("request_", "chosen"),
    [
        (ASKED, [GAP, RING, UNIT, BLOCK]),
        (ASKED._replace(rule="near-miss"), [GAP]),
        (ASKED._replace(rule="assumed-drive"), [DRIVE]),
        (ASKED._replace(at=10.05 + 5j), [RING]),
        (ASKED._replace(handle="31"), [RING]),
        (ASKED._replace(rule="near-miss", at=120.5 + 40j, handle="2F"), [GAP]),
    ],
)
def test_every_error_and_warning_is_meant_unless_narrowed_and_a_note_only_by_name(
    request_: AcceptRequest, chosen: list[Finding]
) -> None:
    assert list(chosen_findings(ALL, request_, REACH)) == chosen


def test_a_place_as_the_report_shows_it_is_good_enough() -> None:
    at = 354123.4712345678 + 5120987.3123456789j
    far = finding("near-miss", "error", at)
    x, y = (float(part) for part in place(at).strip("()").split(","))
    assert complex(x, y) != at
    assert chosen_findings([far], ASKED._replace(at=complex(x, y)), 1e-9) == (far,)


def test_what_is_accepted_already_is_not_accepted_again() -> None:
    known = accept_findings(ALL, [Acceptance(rule="near-miss", reason="r", at=GAP.at)], REACH)
    assert chosen_findings(known, ASKED._replace(rule="near-miss"), REACH) == ()
    assert chosen_findings(known, ASKED, REACH) == (RING, UNIT, BLOCK)


@pytest.mark.parametrize(
    ("request_", "says"),
    [
        (ASKED._replace(rule="two-guides"), "tipper.dxf: there is no two-guides; 'dxfcheck check' shows"),
        (ASKED._replace(handle="99"), "there is no finding of handle 99"),
        (ASKED._replace(rule="near-miss", handle="30"), "there is no near-miss of handle 30"),
        (
            ASKED._replace(at=121 + 40j),
            r"there is no finding at \(121, 40\); the nearest near-miss is at \(120.5, 40\)",
        ),
        (ASKED._replace(rule="empty-pin", at=121 + 40j), r"the nearest empty-pin is at \(10, 5\)"),
        (ASKED._replace(rule="units-missing", at=121 + 40j), "there is no units-missing at"),
        (ASKED._replace(at=0j), r"only notes are there \(assumed-drive\); name the rule with --rule"),
    ],
)
def test_what_was_named_but_is_not_there_is_told(request_: AcceptRequest, says: str) -> None:
    with pytest.raises(OptionInvalid, match=says):
        chosen_findings(ALL, request_, REACH)


def test_an_entry_states_the_place_else_the_first_handle_else_neither() -> None:
    day = date(2027, 3, 31)
    entries = entries_for([GAP, BLOCK, UNIT], ASKED._replace(until=day), REACH)
    assert [entry.acceptance for entry in entries] == [
        Acceptance(rule="near-miss", reason="meant so", at=120.5 + 40j, until=day),
        Acceptance(rule="hidden-linework", reason="meant so", handle="4A", until=day),
        Acceptance(rule="units-missing", reason="meant so", until=day),
    ]


def test_findings_of_a_rule_at_one_place_share_an_entry() -> None:
    other = replace(GAP, handles=("30",))
    apart = replace(GAP, at=125 + 40j)
    entries = entries_for([GAP, other, apart, UNIT, UNIT], ASKED, REACH)
    assert [entry.findings for entry in entries] == [(GAP, other), (apart,), (UNIT, UNIT)]
