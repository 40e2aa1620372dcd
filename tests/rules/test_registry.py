from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import replace
from pathlib import Path

import pytest

from dxfcheck.drawing.primitives import LengthUnit, Sketch
from dxfcheck.reading.reading import Reading
from dxfcheck.rules import registry
from dxfcheck.rules.finding import SEVERITIES, Finding, Severity
from dxfcheck.rules.registry import FAMILIES, Check, all_rules, find_rule, rule, run_rules
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Settings

README = Path(__file__).parents[2] / "README.md"
SUBJECT = RuleSubject(
    sketch=Sketch(path="", unit=LengthUnit("mm", "header", 1e-3), entities=(), primitives=(), notices=(), diagonal=0.0),
    reading=Reading(tolerance=1.0, linkages=(), evidence=(), observations=(), account=()),
    mechanisms=(),
    settings=Settings(),
)


@pytest.fixture
def empty_registry(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(registry, "_entered", {})
    monkeypatch.setattr(registry, "_families_loaded", [True])


def enter(name: str, severity: Severity = "note", family: registry.Family = "pose") -> Callable[[Check], Check]:
    return rule(name, severity, "title", family=family, looks_for="this", matters="so", remedy="thus")


def finds(*findings: Finding) -> Check:
    def check(_subject: RuleSubject) -> Iterator[Finding]:
        yield from findings

    return check


def found(name: str, severity: Severity, at: complex | None) -> Finding:
    return Finding(rule=name, severity=severity, message="m", remedy="r", at=at)


@pytest.mark.usefixtures("empty_registry")
def test_a_name_is_taken_once() -> None:
    enter("twice")(finds())
    with pytest.raises(ValueError, match="twice"):
        enter("twice")(finds())


@pytest.mark.usefixtures("empty_registry")
def test_a_rule_is_found_by_name_and_listed_by_family() -> None:
    enter("late", family="pose")(finds())
    enter("early", family="exchange")(finds())
    assert [entered.name for entered in all_rules()] == ["early", "late"]
    known = find_rule("late")
    assert known is not None
    assert known.looks_for == "this"
    assert find_rule("unheard-of") is None


@pytest.mark.usefixtures("empty_registry")
def test_findings_come_gravest_first_then_by_rule_then_by_place() -> None:
    enter("b-rule")(
        finds(found("b-rule", "warning", None), found("b-rule", "warning", 5 + 1j), found("b-rule", "warning", 5 + 0j))
    )
    enter("a-rule")(finds(found("a-rule", "warning", 9 + 0j), found("a-rule", "note", 0j)))
    enter("c-rule")(finds(found("c-rule", "error", None)))
    assert [(finding.rule, finding.severity, finding.at) for finding in run_rules(SUBJECT)] == [
        ("c-rule", "error", None),
        ("a-rule", "warning", 9 + 0j),
        ("b-rule", "warning", 5 + 0j),
        ("b-rule", "warning", 5 + 1j),
        ("b-rule", "warning", None),
        ("a-rule", "note", 0j),
    ]


@pytest.mark.usefixtures("empty_registry")
def test_settings_switch_rules_off_and_give_all_findings_of_a_rule_another_weight() -> None:
    enter("silent")(finds(found("silent", "error", 0j)))
    enter("graver")(finds(found("graver", "note", 0j), found("graver", "warning", 1j)))
    enter("other")(finds(found("other", "warning", 0j)))
    settings = Settings(rule_weights=(("silent", "off"), ("graver", "error")))
    findings = run_rules(replace(SUBJECT, settings=settings))
    assert [(each.rule, each.severity) for each in findings] == [
        ("graver", "error"),
        ("graver", "error"),
        ("other", "warning"),
    ]


def test_every_rule_is_explained_in_whole_sentences() -> None:
    for entered in all_rules():
        assert entered.name.replace("-", "").isalpha()
        assert entered.name.islower()
        assert entered.severity in SEVERITIES
        assert entered.family in FAMILIES
        for text in (entered.title, entered.looks_for, entered.matters, entered.remedy):
            assert text.strip() == text
            assert text


def test_the_readme_lists_exactly_the_rules_there_are() -> None:
    listed = rows_of_rule_table(README.read_text(encoding="utf-8").splitlines())
    assert listed == sorted(entered.name for entered in all_rules())


def rows_of_rule_table(lines: Sequence[str]) -> list[str]:
    """The names in the first column of the README's table of rules."""
    start = lines.index("| rule | severity | what it points out |")
    rows = []
    for line in lines[start + 2 :]:
        if not line.startswith("|"):
            break
        rows.append(line.split("|")[1].strip(" `"))
    return sorted(rows)
