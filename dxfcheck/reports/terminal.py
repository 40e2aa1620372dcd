"""The terminal report of a run: each drawing as it is done, then what holds for all."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TextIO

from dxfcheck.collector import collector_paused
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.terminal_drawing import (
    caution_lines,
    drawing_lines,
    quiet_lines,
    quiet_summary,
    summary_lines,
)
from dxfcheck.reports.terminal_reading import reading_lines
from dxfcheck.reports.terminal_stream import LineStream

__all__ = ["TerminalReport"]


class TerminalReport:
    """Prints the reports of one run to one stream; OSError where that cannot be written to."""

    def __init__(self, stream: TextIO) -> None:
        self._lines = LineStream(stream)

    def drawing(self, report: DrawingReport, *, working: bool = False) -> None:
        """One drawing in full; ``working`` adds how the speeds are worked out by hand."""
        with collector_paused():
            self._lines.block(drawing_lines(report, self._lines.width, working=working))

    def reading(self, report: DrawingReport) -> None:
        """How one drawing was read."""
        self._lines.block(reading_lines(report, self._lines.width))

    def quiet(self, report: DrawingReport) -> None:
        """One line a finding."""
        self._lines.print(quiet_lines(report))

    def quiet_end(self, reports: Sequence[DrawingReport]) -> None:
        """The one line that ends a quiet run."""
        self._lines.print([quiet_summary(reports)])

    def end(self, reports: Sequence[DrawingReport]) -> None:
        """The summary of several drawings, and the caution."""
        if len(reports) > 1:
            self._lines.block(summary_lines(reports, self._lines.width))
        self._lines.block(caution_lines(self._lines.width))
