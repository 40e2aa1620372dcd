"""Real drawings through both reports: what holds for every one of them."""

from __future__ import annotations

import io
import json
from importlib.resources import files
from pathlib import Path
from typing import Any

import pytest
from jsonschema import Draft202012Validator

from dxfcheck.inspection import inspect_drawing
from dxfcheck.reports.json_report import json_text, report_as_dict
from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.settings import Settings

FIXTURES = Path(__file__).parents[2] / "fixtures"
DRAWINGS = sorted(FIXTURES.rglob("*.dxf"))
SCHEMA = json.loads((files("dxfcheck") / "reports" / "report.schema.json").read_text(encoding="utf-8"))


@pytest.mark.parametrize("path", DRAWINGS, ids=lambda path: path.stem)
def test_every_fixture_is_reported_by_the_schema_and_on_80_columns(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(path.parent)
    report = inspect_drawing(path.name, Settings())
    Draft202012Validator(SCHEMA).validate(json.loads(json_text([report], with_evidence=True)))
    assert sum(line.count for line in report.account) == report.entities
    stream = io.StringIO()
    terminal = TerminalReport(stream)
    terminal.drawing(report)
    terminal.reading(report)
    terminal.quiet(report)
    terminal.end([report])
    folded = [line for line in stream.getvalue().splitlines() if not line.startswith(f"{path.name}: ")]
    assert max(map(len, folded)) <= 80


def shown(name: str) -> str:
    """The terminal report of a fixture, its folded lines joined."""
    stream = io.StringIO()
    TerminalReport(stream).drawing(inspect_drawing(str(FIXTURES / f"{name}.dxf"), Settings()))
    return " ".join(stream.getvalue().split())


def test_the_verdict_says_what_moves_for_an_instant_only() -> None:
    assert "moves with 1 freedom for an instant only" in shown("gate-stay")
    assert "for an instant only" not in shown("twin-shelf")


def test_pushes_within_a_locked_part_are_not_told() -> None:
    locked = shown("bench-brace")
    assert "pushes" not in locked
    assert "drive speed over output speed" not in locked
    assert "transmission angle" in shown("tray-tipper")


def test_json_names_who_is_locked_who_is_idle_and_what_would_settle_the_rest() -> None:
    def mechanism(name: str) -> dict[str, Any]:
        report = report_as_dict([inspect_drawing(str(FIXTURES / f"{name}.dxf"), Settings())])
        found: dict[str, Any] = report["drawings"][0]["mechanisms"][0]
        return found

    brace = mechanism("bench-brace")
    (part,) = brace["locked_parts"]
    assert (part["links"], part["with_frame"], part["redundant"]) == (["A-C", "A-D", "B-C", "B-D", "C-D"], True, 1)
    assert brace["idle_links"] == [{"link": "C-F", "freedoms": 1, "turns": True}]
    limit = mechanism("gripper-at-limit")["settling_drives"]
    assert {"link": "A-B", "against": "frame", "kind": "turn"} in limit
    assert mechanism("tray-tipper")["locked_parts"] == []
