"""Registry, explain, README and fixtures speak of the same rules, in the same words."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from dxfcheck.configuration.settings_keys import KEYS
from dxfcheck.reports.terminal_explain import explain_lines
from dxfcheck.rules.registry import Rule, all_rules

ROOT = Path(__file__).parent.parent
FOLDER = ROOT / "fixtures" / "rules"
RULES = all_rules()
TABLE_HEAD = "| rule | severity | what it points out |"
SETTING = re.compile(r"(?<![\w-])[a-z]+(?:\.[a-z-]+)+")
OPTION = re.compile(r"--[a-z-]+")

every_rule = pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.name)


def readme_rows() -> dict[str, tuple[str, str]]:
    """Severities and title by rule, as the README's table has them."""
    lines = (ROOT / "README.md").read_text(encoding="utf-8").splitlines()
    rows = {}
    for line in lines[lines.index(TABLE_HEAD) + 2 :]:
        if not line.startswith("|"):
            break
        name, severities, title = (cell.strip(" `") for cell in line.strip("|").split("|"))
        rows[name] = (severities, title)
    return rows


@every_rule
def test_explain_prints_every_field(rule: Rule) -> None:
    text = " ".join(" ".join(line.text for line in explain_lines(rule, 80)).split())
    fields = (rule.title, rule.family, rule.looks_for, rule.matters, rule.remedy, rule.settings, rule.source)
    assert [field for field in fields if " ".join(field.split()) not in text] == []
    assert rule.source
    assert re.findall(r" (severity|family|looks for|matters|to mend|settings|source) {2,3}", explained(rule)) == [
        "severity",
        "family",
        "looks for",
        "matters",
        "to mend",
        "settings",
        "source",
    ]


def explained(rule: Rule) -> str:
    return "\n".join(line.text for line in explain_lines(rule, 80))


@every_rule
def test_the_readme_has_its_row_in_the_same_words(rule: Rule) -> None:
    severities, title = readme_rows()[rule.name]
    assert severities == ", ".join((rule.severity, *rule.also))
    assert title[1:] == rule.title[1:]


def test_no_row_and_no_drawing_is_left_of_a_rule_that_is_gone() -> None:
    names = {rule.name for rule in RULES}
    assert readme_rows().keys() == names
    drawn = {path.stem for path in FOLDER.glob("*.dxf")}
    assert drawn == {f"{name}-{verdict}" for name in names for verdict in ("bad", "good")}


@every_rule
def test_the_settings_and_options_that_it_names_are_there(rule: Rule) -> None:
    assert [name for name in SETTING.findall(rule.settings) if not _is_key(name)] == []
    readme = (ROOT / "README.md").read_text(encoding="utf-8")
    assert [option for option in OPTION.findall(rule.settings) if f"`{option} " not in readme] == []


def _is_key(name: str) -> bool:
    """A key of the settings file, or one whose last word is free."""
    table = name.rpartition(".")[0]
    return name in KEYS or f"{table}.*" in KEYS or any(key.startswith(f"{name}.") for key in KEYS)
