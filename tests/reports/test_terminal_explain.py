from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.reports.terminal_explain import explain_all_lines, explain_lines
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import Rule
from dxfcheck.rules.subject import RuleSubject


def finds_nothing(_subject: RuleSubject) -> Iterator[Finding]:
    yield from ()


NEAR_MISS = Rule(
    name="near-miss",
    severity="error",
    family="linework",
    title="an end stops just short of a pin or a line",
    looks_for="ends that stop up to two ring diameters short of a rim.",
    matters="the link hangs on nothing and the count comes out wrong.",
    remedy="snap the end to the rim or the centre.",
    check=finds_nothing,
    also=("warning",),
    settings="reading.tolerance",
)
NO_MOTION = Rule(
    name="no-motion",
    severity="error",
    family="structure",
    title="the linkage cannot move",
    looks_for="a",
    matters="b",
    remedy="c",
    check=finds_nothing,
)


def test_a_rule_is_explained() -> None:
    assert [line.text for line in explain_lines(NEAR_MISS, 60)] == [
        "near-miss: an end stops just short of a pin or a line",
        "  severity   error, warning",
        "  family     linework",
        "  looks for  ends that stop up to two ring diameters short",
        "             of a rim.",
        "  matters    the link hangs on nothing and the count comes",
        "             out wrong.",
        "  to mend    snap the end to the rim or the centre.",
        "  settings   reading.tolerance; rules.near-miss (its",
        "             severity, or off)",
        "  source     common practice, no source",
    ]


def test_all_rules_are_listed_by_family() -> None:
    assert [line.text for line in explain_all_lines([NEAR_MISS, NO_MOTION], 60)] == [
        "linework",
        "  near-miss  error, warning  an end stops just short of a",
        "                             pin or a line",
        "",
        "structure",
        "  no-motion  error           the linkage cannot move",
    ]


def test_a_rule_without_settings_of_its_own_can_still_be_switched_off() -> None:
    lines = [line.text for line in explain_lines(NO_MOTION, 60)]
    assert lines[-2] == "  settings   rules.no-motion (its severity, or off)"
