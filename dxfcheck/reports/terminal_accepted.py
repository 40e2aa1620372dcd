"""What an office accepted, on the terminal: each finding in short, after those that count."""

from __future__ import annotations

from collections.abc import Sequence

from dxfcheck.reports.terminal_layout import Line, count_of, fold
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.wording import place

__all__ = ["ACCEPTED_SHOWN", "accepted_lines"]

ACCEPTED_SHOWN = 40
"""Nobody reads more accepted findings than this from a screen."""

INDENT = " " * 11


def accepted_lines(accepted: Sequence[Finding], width: int) -> list[Line]:
    """Rule, place, last day and reason of each; nothing where nothing was accepted."""
    if not accepted:
        return []
    lines = [Line(""), Line("Accepted", "bold")]
    for finding in accepted[:ACCEPTED_SHOWN]:
        lines += map(Line, fold(_in_short(finding), width, f"  {finding.severity:<9}", INDENT))
    more = len(accepted) - ACCEPTED_SHOWN
    if more > 0:
        lines.append(Line(f"{INDENT}and {count_of(more, 'more finding')}; all are in the JSON report"))
    return lines


def _in_short(finding: Finding) -> str:
    where = "" if finding.at is None else f" at {place(finding.at)}"
    acceptance = finding.accepted
    if acceptance is None:  # not given by whoever calls this; the finding itself still says enough
        return f"{finding.rule}{where}"
    until = "" if acceptance.until is None else f", until {acceptance.until.isoformat()}"
    return f"{finding.rule}{where}{until}: {acceptance.reason}"
