from __future__ import annotations

import pytest

from dxfcheck.cli import main
from dxfcheck.rules.registry import all_rules


def test_all_rules_are_listed(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["explain"]) == 0
    out = capsys.readouterr().out
    assert all(f"  {rule.name} " in out for rule in all_rules())


def test_each_rule_is_explained(capsys: pytest.CaptureFixture[str]) -> None:
    for rule in all_rules():
        assert main(["explain", rule.name]) == 0
        out = capsys.readouterr().out
        assert out.startswith(f"{rule.name}: ")
        assert "to mend" in out


def test_an_unknown_rule_is_refused(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["explain", "no-such-rule-at-all"]) == 2
    assert "there is no rule 'no-such-rule-at-all'" in capsys.readouterr().err
