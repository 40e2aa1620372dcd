"""Each rule has a drawing that triggers it and a near miss that does not, in fixtures/rules."""

from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.configuration.effective import settings_for
from dxfcheck.configuration.settings_file import read_settings_file
from dxfcheck.inspection import inspect_drawing
from dxfcheck.rules import all_rules
from dxfcheck.rules.finding import Finding
from dxfcheck.settings import Settings

FOLDER = Path(__file__).parent.parent / "fixtures" / "rules"
SETTINGS = {
    "expected-mobility": Settings(expected_mobility=2),
    "unknown-frame-pin": Settings(frame_pins=("E",)),
}
"""Rules that look for what the user stated need it stated; what needs a settings file has one beside the drawings."""
SETTINGS_FILE = read_settings_file(FOLDER / "dxfcheck.toml")
WEIGHTS = {rule.name: {rule.severity, *rule.also} for rule in all_rules()}
NAMES = sorted(rule.name for rule in all_rules())


JOINTS = [
    rule.name
    for rule in all_rules()
    if rule.check.__module__.endswith((".slides", ".gears")) or rule.name == "drive-unit-assumed"
]
"""Rules on joints other than pins: their good drawings are sound in every way."""


def findings(name: str, verdict: str) -> tuple[Finding, ...]:
    path = FOLDER / f"{name}-{verdict}.dxf"
    settings = settings_for(path, SETTINGS_FILE, SETTINGS.get(name, Settings())).settings
    return inspect_drawing(str(path), settings).findings


@pytest.mark.parametrize("name", NAMES)
def test_the_bad_drawing_triggers_its_rule(name: str) -> None:
    assert name in {finding.rule for finding in findings(name, "bad")}


@pytest.mark.parametrize("name", NAMES)
def test_the_near_miss_does_not_trigger_the_rule(name: str) -> None:
    assert name not in {finding.rule for finding in findings(name, "good")}


@pytest.mark.parametrize("name", JOINTS)
def test_the_near_miss_of_a_joint_gives_no_error_and_no_warning(name: str) -> None:
    assert [each.message for each in findings(name, "good") if each.severity != "note"] == []


@pytest.mark.parametrize("name", JOINTS)
def test_the_bad_drawing_of_a_joint_shows_nothing_else_but_what_follows_from_it(name: str) -> None:
    others = {each.rule for each in findings(name, "bad") if each.severity != "note"} - {name}
    assert others <= {"undriven-freedom", "units-missing"}


@pytest.mark.parametrize("name", NAMES)
def test_findings_weigh_what_their_rules_declare(name: str) -> None:
    for found in findings(name, "bad"):
        assert found.severity in WEIGHTS[found.rule]
