"""How long a report of a hundred mechanisms takes; run with ``-n 0 --benchmark-enable`` to measure."""

from __future__ import annotations

import io
from dataclasses import replace

from pytest_benchmark.fixture import BenchmarkFixture

from dxfcheck.reports.json_report import json_text
from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.reports.terminal_brief import MECHANISMS_IN_FULL
from tests.reports.samples import tipper

SHEET = replace(tipper(), mechanisms=tipper().mechanisms * 100)


def test_terminal_report(benchmark: BenchmarkFixture) -> None:
    def report() -> str:
        stream = io.StringIO()
        TerminalReport(stream).drawing(SHEET)
        return stream.getvalue()

    assert benchmark(report).count("mobility  M =") == MECHANISMS_IN_FULL


def test_json_report(benchmark: BenchmarkFixture) -> None:
    assert benchmark(json_text, [SHEET]).count('"mobility"') == 100
