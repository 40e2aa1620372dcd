"""What a screen shows of a sheet of very many mechanisms and findings: the first in full, the rest in short."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Sequence

from dxfcheck.inspection import MechanismReport
from dxfcheck.reports.terminal_layout import UNKNOWN, Column, Line, count_of, figure_column, fold, table
from dxfcheck.rules.finding import Finding

__all__ = ["FINDINGS_IN_FULL", "MECHANISMS_IN_FULL", "brief_mechanisms", "few_of_each_rule"]

MECHANISMS_IN_FULL = 40
"""Nobody reads the tables of more mechanisms than this from a screen."""

FINDINGS_IN_FULL = 20
"""So many findings of one rule and weight are shown in full."""


def brief_mechanisms(reports: Sequence[MechanismReport], unit: str, width: int) -> list[Line]:
    """One row a mechanism: where it lies, its count and freedom, and the speed of its fastest pin."""
    leftmost = [
        min((pin.at for pin in report.linkage.pins), key=lambda at: (at.real, at.imag), default=0j)
        for report in reports
    ]
    columns = [
        Column("mechanism", "", [report.linkage.name for report in reports], numeric=False),
        figure_column("x", unit, [at.real for at in leftmost], 0.0),
        figure_column("y", unit, [at.imag for at in leftmost], 0.0),
        Column("links", "", [str(len(report.linkage.links)) for report in reports]),
        Column("M", "", [str(report.analysis.mobility.count) for report in reports]),
        Column("freedoms", "", [str(report.analysis.mobility.at_pose) for report in reports]),
        figure_column("fastest pin", f"{unit}/s", [_fastest(report) for report in reports], 0.0),
    ]
    heading = f"{count_of(len(reports), 'more mechanism')} in short; all figures are in the JSON report (--json FILE)"
    return [*map(Line, fold(heading, width, "", "  ")), *table(columns, width)]


def _fastest(report: MechanismReport) -> float | str:
    """The greatest known pin speed; unknown where any pin's is."""
    speeds = [None if motion.velocity is None else abs(motion.velocity) for motion in report.analysis.pins]
    known = [speed for speed in speeds if speed is not None]
    return max(known) if known and len(known) == len(speeds) else UNKNOWN


def few_of_each_rule(findings: Sequence[Finding]) -> Iterator[Finding | str]:
    """The first findings of each rule and weight, then a line that says how many more there are."""
    total = Counter((finding.severity, finding.rule) for finding in findings)
    shown: Counter[tuple[str, str]] = Counter()
    for finding in findings:
        kind = finding.severity, finding.rule
        shown[kind] += 1
        if shown[kind] <= FINDINGS_IN_FULL:
            yield finding
        elif shown[kind] == total[kind]:
            more = count_of(total[kind] - FINDINGS_IN_FULL, f"more {finding.severity}")
            yield f"{finding.rule}: {more} of this kind; all are in the JSON report and with --quiet"
