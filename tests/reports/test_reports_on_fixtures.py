"""Real drawings through both reports: what holds for every one of them."""

from __future__ import annotations

import io
import json
from importlib.resources import files
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from dxfcheck.inspection import inspect_drawing
from dxfcheck.reports.json_report import json_text
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
