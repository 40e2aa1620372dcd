from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from datetime import date
from typing import Any

import pytest

from dxfcheck.drawing.primitives import Sketch
from dxfcheck.reading.reading import Reading
from dxfcheck.rules.acceptances import (
    STALE,
    accept_findings,
    acceptance_reach,
    stale_findings,
    with_acceptances,
)
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Acceptance, RuleWeight, Settings
from tests.sketches import MM

REACH = 0.1
MEANT = Acceptance(rule="near-miss", reason="stop face", at=120 + 40j, where="dxfcheck.toml:12")
EXPIRED = replace(MEANT, until=date(2026, 3, 31), expired=True)


def finding(at: complex | None, rule: str = "near-miss", severity: Severity = "error") -> Finding:
    return Finding(rule=rule, severity=severity, message="m", remedy="r", at=at)


def stale(findings: Sequence[Finding], *acceptances: Acceptance) -> list[Finding]:
    known = accept_findings(findings, acceptances, REACH)
    return list(stale_findings(known, acceptances, REACH, MM))


def only_stale(findings: Sequence[Finding], *acceptances: Acceptance) -> Finding:
    (found,) = stale(findings, *acceptances)
    assert found.rule == STALE
    assert found.severity == "warning"
    assert found.accepted is None
    return found


def test_one_acceptance_accepts_all_findings_of_its_rule_at_its_place_and_no_others() -> None:
    findings = (finding(120 + 40j), finding(120.05 + 40j), finding(125 + 40j), finding(120 + 40j, "empty-pin"))
    accepted = accept_findings(findings, [MEANT], REACH)
    assert [each.accepted for each in accepted] == [MEANT, MEANT, None, None]
    assert [replace(each, accepted=None) for each in accepted] == list(findings)


def test_the_first_of_two_acceptances_is_named_and_neither_is_stale() -> None:
    second = replace(MEANT, reason="another")
    (accepted,) = accept_findings([finding(120 + 40j)], [MEANT, second], REACH)
    assert accepted.accepted == MEANT
    assert stale([finding(120 + 40j)], MEANT, second) == []


def test_an_expired_acceptance_accepts_nothing() -> None:
    (counting,) = accept_findings([finding(120 + 40j)], [EXPIRED], REACH)
    assert counting.accepted is None


@pytest.mark.parametrize(
    ("findings", "acceptances", "says", "remedy"),
    [
        ([finding(120 + 40j)], [EXPIRED], "held until 2026-03-31; the finding counts again", "give it a later date"),
        ([], [EXPIRED], "held until 2026-03-31; there is nothing left to accept", "remove the entry"),
        ([finding(120 + 40j)], [EXPIRED, MEANT], "another entry accepts the finding now", "remove the entry"),
    ],
)
def test_an_expired_acceptance_is_reported_with_what_became_of_the_finding(
    findings: list[Finding], acceptances: list[Acceptance], says: str, remedy: str
) -> None:
    found = only_stale(findings, *acceptances)
    assert says in found.message
    assert remedy in found.remedy


def test_an_acceptance_that_matches_nothing_names_its_line_its_reason_and_the_nearest_finding() -> None:
    found = only_stale([finding(123.2 + 40j), finding(500 + 0j), finding(121 + 40j, "empty-pin")], MEANT)
    assert found.message == (
        "dxfcheck.toml:12: the acceptance of near-miss at (120, 40) ('stop face') matches nothing: "
        "the nearest near-miss is at (123.2, 40), 3.2 mm away"
    )
    assert found.remedy == "remove the entry, or correct it if that is what was meant"
    assert found.at == MEANT.at


def test_a_finding_that_another_entry_accepts_is_not_offered() -> None:
    there = replace(MEANT, at=123 + 40j)
    found = only_stale([finding(123 + 40j)], there, MEANT)
    assert found.message.endswith("matches nothing: there is no near-miss that counts")
    assert found.remedy == "remove the entry"


@pytest.mark.parametrize(
    ("acceptance", "left", "says"),
    [
        (
            Acceptance(rule="near-miss", reason="r", handle="2F"),
            finding(1 + 2j),
            "of handle 2F ('r') matches nothing: there is another near-miss at (1, 2)",
        ),
        (
            Acceptance(rule="near-miss", reason="r"),
            replace(finding(None), handles=("30",)),
            "the acceptance of near-miss ('r') matches nothing: there is another near-miss of handle 30",
        ),
        (MEANT, finding(None), "there is another near-miss that concerns the whole drawing"),
    ],
)
def test_where_no_distance_can_be_told_the_first_left_over_is_named(
    acceptance: Acceptance, left: Finding, says: str
) -> None:
    assert says in only_stale([left], acceptance).message


def test_a_stale_acceptance_cannot_be_accepted() -> None:
    silencer = Acceptance(rule=STALE, reason="quiet", at=120 + 40j)
    known = accept_findings([finding(120 + 40j, STALE)], [silencer], REACH)
    assert known[0].accepted is None
    assert "cannot be accepted" in only_stale([], silencer).message


def test_the_reach_follows_the_sheet_and_a_wider_tolerance_of_the_user() -> None:
    assert acceptance_reach(1000.0, 0.003) == pytest.approx(0.5)
    assert acceptance_reach(1000.0, 2.0) == 2.0
    assert acceptance_reach(0.0, 0.0) == 0.0


def subject(*acceptances: Acceptance, weights: dict[str, RuleWeight] | None = None) -> RuleSubject:
    settings = Settings(acceptances=acceptances, rule_weights=tuple((weights or {}).items()))
    nothing: dict[str, Any] = {"entities": (), "primitives": (), "notices": ()}
    return RuleSubject(
        sketch=Sketch(path="", unit=MM, diagonal=200.0, **nothing),
        reading=Reading(tolerance=0.001, linkages=(), evidence=(), observations=(), account=()),
        mechanisms=(),
        settings=settings,
    )


def test_without_acceptances_the_findings_are_handed_on_as_they_are() -> None:
    found = (finding(1j),)
    assert with_acceptances(found, subject()) is found


def test_stale_ones_take_their_place_among_the_findings() -> None:
    found = (finding(5 + 0j), finding(6 + 0j, "z-rule", "warning"), finding(7 + 0j, "a-rule", "note"))
    rules = [each.rule for each in with_acceptances(found, subject(MEANT))]
    assert rules == ["near-miss", STALE, "z-rule", "a-rule"]


def test_the_settings_weigh_the_rule_and_switch_it_off() -> None:
    (found,) = with_acceptances((), subject(MEANT, weights={STALE: "error"}))
    assert found.severity == "error"
    assert with_acceptances((), subject(MEANT, weights={STALE: "off"})) == ()


def test_entries_for_a_rule_that_is_off_are_left_aside() -> None:
    assert with_acceptances((), subject(MEANT, weights={"near-miss": "off"})) == ()
