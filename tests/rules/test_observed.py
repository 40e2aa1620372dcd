"""What the reading observes has a rule, and what the rules look for is observed."""

from __future__ import annotations

import ast
import re
from collections.abc import Iterator
from pathlib import Path

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.reading.reading import Observation
from dxfcheck.rules import all_rules
from dxfcheck.rules.finding import SEVERITIES
from dxfcheck.rules.observed import at_pin, figured, finding
from tests.sketches import MM

PACKAGE = Path(__file__).parents[2] / "dxfcheck"
KIND = re.compile(r"[a-z]+(-[a-z]+)+")
RULES = {rule.name: {rule.severity, *rule.also} for rule in all_rules()}


def calls(room: str) -> Iterator[tuple[set[str], set[str]]]:
    """For each call in a room, the kinds and the severities among its arguments."""
    for path in sorted((PACKAGE / room).rglob("*.py")):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.Call):
                given = [*node.args, *(keyword.value for keyword in node.keywords)]
                words = {word for each in given for word in _words(each)}
                yield {word for word in words if KIND.fullmatch(word)}, words & set(SEVERITIES)


def _words(argument: ast.expr) -> Iterator[str]:
    """The texts that an argument may be: itself, or either branch of a choice."""
    if isinstance(argument, ast.IfExp):
        yield from (*_words(argument.body), *_words(argument.orelse))
    elif isinstance(argument, ast.Constant) and isinstance(argument.value, str):
        yield argument.value


YIELDED = {kind for kinds, _ in calls("reading") for kind in kinds}


def test_every_kind_that_the_reading_observes_has_a_rule() -> None:
    assert {"near-miss", "no-linkage", "slot-pins", "off-tangency", "drive-unit-assumed"} <= YIELDED
    assert RULES.keys() >= YIELDED


def test_every_kind_that_a_rule_looks_for_is_observed() -> None:
    looked_for = {
        node.args[1].value
        for path in sorted((PACKAGE / "rules").rglob("*.py"))
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8")))
        if isinstance(node, ast.Call)
        and isinstance(node.func, ast.Name)
        and node.func.id in {"observed", "of_linkages"}
        if isinstance(node.args[1], ast.Constant)
    }
    assert "block-without-guide" in looked_for
    assert looked_for <= YIELDED


def test_a_severity_that_the_reading_gives_is_one_that_its_rule_declares() -> None:
    given = [(kind, weights) for kinds, weights in calls("reading") for kind in kinds if weights]
    assert ("loose-end", {"warning", "note"}) in given
    for kind, weights in given:
        assert weights <= RULES[kind], kind


def seen(**changes: object) -> Observation:
    given = {"kind": "off-tangency", "at": 1j, "subject": "C", "detail": "a gap of {amount}: {odd}", **changes}
    return Observation(**given)  # type: ignore[arg-type] # each test gives what it needs


@pytest.mark.parametrize(
    ("amount", "limit", "text"),
    [
        pytest.param(2.5, 0.5, "a gap of 2.5 mm (limit 0.5 mm): {odd}", id="beyond its limit"),
        pytest.param(-2.5, 0.5, "a gap of 2.5 mm (limit 0.5 mm): {odd}", id="the other way"),
        pytest.param(2.5, None, "a gap of 2.5 mm: {odd}", id="no limit"),
        pytest.param(2.5, 48.0, "a gap of 2.5 mm: {odd}", id="within the reach it was looked for in"),
    ],
)
def test_a_figure_stands_with_the_limit_that_it_is_beyond(amount: float, limit: float | None, text: str) -> None:
    assert figured(seen(amount=amount, limit=limit), MM) == text


def test_a_figure_is_bare_without_a_unit() -> None:
    unitless = LengthUnit("unitless", "assumed", None)
    assert figured(seen(amount=2.5, limit=0.5), unitless).startswith("a gap of 2.5 (limit 0.5):")


def test_a_pin_without_a_name_is_not_named() -> None:
    assert at_pin(seen()) == "at pin C: "
    assert at_pin(seen(subject="")) == ""


def test_a_finding_lies_where_it_was_seen_and_weighs_what_was_seen() -> None:
    found = finding(seen(handles=("2F",), layer="PITCH", mechanism="M1"), "warning", "what", "how")
    assert (found.rule, found.severity, found.at, found.message, found.remedy) == (
        "off-tangency",
        "warning",
        1j,
        "what",
        "how",
    )
    assert (found.handles, found.layer, found.mechanism) == (("2F",), "PITCH", "M1")
    assert finding(seen(severity="error"), "warning", "what", "how").severity == "error"
