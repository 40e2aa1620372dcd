"""A sheet of very many mechanisms and findings on the screen."""

from __future__ import annotations

from dataclasses import replace

from dxfcheck.reports.terminal_brief import FINDINGS_IN_FULL, MECHANISMS_IN_FULL, few_of_each_rule
from dxfcheck.reports.terminal_drawing import drawing_lines
from dxfcheck.rules.finding import Finding
from tests.reports.samples import tipper


def note(number: int, rule: str = "assumed-drive") -> Finding:
    return Finding(rule=rule, severity="note", message=f"note {number}", remedy="state it")


def text_of(mechanisms: int, findings: int) -> str:
    one = tipper()
    report = replace(one, mechanisms=one.mechanisms * mechanisms, findings=tuple(map(note, range(findings))))
    return "\n".join(line.text for line in drawing_lines(report, 80))


def test_as_many_mechanisms_as_a_screen_bears_are_shown_in_full() -> None:
    text = text_of(MECHANISMS_IN_FULL, 0)
    assert text.count("mobility  M =") == MECHANISMS_IN_FULL
    assert "in short" not in text


def test_the_rest_get_a_row_each_and_the_way_to_all_figures() -> None:
    text = text_of(MECHANISMS_IN_FULL + 3, 0)
    assert text.count("mobility  M =") == MECHANISMS_IN_FULL
    short = text[text.index("3 more mechanisms in short") :]
    assert "--json" in short
    assert sum(line.split()[:1] == ["M1"] for line in short.splitlines()) == 3
    assert max(map(len, text.splitlines())) <= 80


def test_findings_of_one_kind_are_counted_from_the_twentieth_on() -> None:
    text = text_of(1, FINDINGS_IN_FULL + 5)
    assert text.count("To mend:") == FINDINGS_IN_FULL
    assert "assumed-drive: 5 more notes of this kind" in text


def test_kinds_are_counted_apart() -> None:
    findings = [note(number) for number in range(FINDINGS_IN_FULL)] + [note(0, "short-line")]
    assert list(few_of_each_rule(findings)) == findings
