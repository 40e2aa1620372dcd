from __future__ import annotations

import re
from pathlib import Path

import pytest

from dxfcheck.configuration.settings_keys import ACCEPT_KEYS, SETTINGS, Key
from dxfcheck.rules.registry import all_rules
from tests.configuration.files import settings_file

README = Path(__file__).parents[2] / "README.md"


def test_the_readme_lists_exactly_the_keys_there_are() -> None:
    section = README.read_text(encoding="utf-8").partition("\n## Settings\n")[2].partition("\n## ")[0]
    rows = re.findall(r"^\| `([^`]+)` \| (.+) \| `(.+)` \|$", section, re.MULTILINE)
    names = {"expect.speeds.*": "expect.speeds.NAME", "expect.ratios.*": "expect.ratios.NAME", "rules.*": "rules.RULE"}
    settings = [(names.get(key.name, key.name), key.does, key.example) for key in SETTINGS]
    accepted = [(f"accept.{key.word}", key.does, key.example) for key in ACCEPT_KEYS]
    assert rows == settings + accepted


@pytest.mark.parametrize("key", SETTINGS, ids=lambda key: key.name)
def test_every_example_can_be_used(tmp_path: Path, key: Key) -> None:
    named = {"expect.speeds.*": "C", "expect.ratios.*": '"C-D / A-B"', "rules.*": "empty-pin"}
    line = f"{named.get(key.name, key.word)} = {key.example}"
    file = settings_file(tmp_path, f"[{key.table}]\n{line}" if key.table else line)
    assert [each.key for each in file.statements] == [key.name]


def test_the_example_of_an_accepted_finding_can_be_used(tmp_path: Path) -> None:
    lines = "\n".join(f"{key.word} = {key.example}" for key in ACCEPT_KEYS)
    assert len(settings_file(tmp_path, f"[[accept]]\n{lines}").accepted) == 1


def test_the_settings_that_rules_tell_of_are_there() -> None:
    known = {key.name.removesuffix(".*") for key in SETTINGS}
    told = [word for entered in all_rules() for word in re.findall(r"\b[a-z]+(?:\.[a-z-]+)+", entered.settings)]
    assert {word for word in told if not word.startswith("rules.")} <= known
