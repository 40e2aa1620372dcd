"""Each rule has a drawing that triggers it and a near miss that does not, in fixtures/rules."""

from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.inspection import inspect_drawing
from dxfcheck.rules import all_rules
from dxfcheck.settings import Settings

FOLDER = Path(__file__).parent.parent / "fixtures" / "rules"
SETTINGS = {
    "expected-mobility": Settings(expected_mobility=2),
    "unknown-frame-pin": Settings(frame_pins=("E",)),
}
"""Rules that look for what the user stated need it stated."""
NAMES = sorted(rule.name for rule in all_rules())


def findings(name: str, verdict: str) -> set[str]:
    report = inspect_drawing(str(FOLDER / f"{name}-{verdict}.dxf"), SETTINGS.get(name, Settings()))
    return {finding.rule for finding in report.findings}


@pytest.mark.parametrize("name", NAMES)
def test_the_bad_drawing_triggers_its_rule(name: str) -> None:
    assert name in findings(name, "bad")


@pytest.mark.parametrize("name", NAMES)
def test_the_near_miss_does_not_trigger_the_rule(name: str) -> None:
    assert name not in findings(name, "good")
