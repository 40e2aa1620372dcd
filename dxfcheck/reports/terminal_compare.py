"""Two drawings compared, on the terminal: the verdict in one line, then what changed in each mechanism."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import TextIO

from dxfcheck.comparison.motion import UNMOVED
from dxfcheck.comparison.result import Comparison, MechanismChange, PartChange
from dxfcheck.reports.compare_words import motion_words, verdict_words
from dxfcheck.reports.terminal_brief import MECHANISMS_IN_FULL
from dxfcheck.reports.terminal_change import change_lines
from dxfcheck.reports.terminal_drawing import caution_lines
from dxfcheck.reports.terminal_layout import Line, count_of, figure, fold, place
from dxfcheck.reports.terminal_stream import LineStream
from dxfcheck.rules.finding import Finding

__all__ = ["CompareReport", "comparison_lines"]

INDENT = " " * 11
FINDINGS_SHOWN = 20
"""So many new findings, and so many cured ones, are shown."""


class CompareReport:
    """Prints comparisons to one stream; OSError where that cannot be written to."""

    def __init__(self, stream: TextIO) -> None:
        self._lines = LineStream(stream)

    def comparison(self, comparison: Comparison, *, subject: str = "") -> None:
        """One comparison in full; ``subject`` stands before the verdict."""
        self._lines.print(comparison_lines(comparison, self._lines.width, subject))

    def caution(self) -> None:
        """What no report says."""
        self._lines.block(caution_lines(self._lines.width))

    def line(self, text: str) -> None:
        """One line of prose."""
        self._lines.print([Line(part) for part in fold(text, self._lines.width, "", "  ")])


def comparison_lines(comparison: Comparison, width: int, subject: str = "") -> list[Line]:
    """Everything about one comparison."""
    lead = f"{subject}: " if subject else ""
    first, *more = fold(verdict_words(comparison), width, lead, "  ")
    lines = [Line(first, "bold"), *map(Line, more)]
    for text in _preliminaries(comparison):
        lines += map(Line, fold(text, width, "  ", "    "))
    if comparison.parts:
        lines.append(Line(""))
        for part in comparison.parts[:MECHANISMS_IN_FULL]:
            lines += map(Line, fold(_whole(part), width, "", "  "))
        lines += _and_more(len(comparison.parts) - MECHANISMS_IN_FULL, "mechanism")
    lines += _mechanisms(comparison, width)
    lines += _findings("New findings", "in NEW", comparison.new_findings, width)
    lines += _findings("Cured findings", "in OLD", comparison.cured_findings, width)
    return lines


def _preliminaries(comparison: Comparison) -> Iterator[str]:
    """Which drawings, in which unit, laid on one another how, and what counts as equal."""
    yield f"OLD {comparison.old.path}"
    yield f"NEW {comparison.new.path}"
    if comparison.unit_note:
        yield comparison.unit_note
    if not (comparison.old.mechanisms or comparison.new.mechanisms):
        return
    if comparison.motion != UNMOVED:
        yield f"sheet: {motion_words(comparison.motion)}"
    if comparison.motion.scale != 1.0:
        yield _size_words(comparison)
    unit = "units" if comparison.unit == "unitless" else comparison.unit
    rounded = f", as {comparison.rounded} is rounded to six digits" if comparison.rounded else ""
    yield (
        f"equal: places and lengths within {comparison.tolerance:.2g} {unit}{rounded}; "
        f"speeds within {comparison.allow:g} %"
    )


def _size_words(comparison: Comparison) -> str:
    """How much larger everything is drawn; whether only the unit in the header is another one."""
    scale = comparison.motion.scale
    words = f"size: everything is {figure(scale)} times as large"
    before, after = (report.unit.metres if report.unit else None for report in (comparison.old, comparison.new))
    if before and after and abs(scale * before / after - 1.0) < comparison.allow / 100.0:
        words += ": the figures are the same, only the unit is another one"
    return words


def _whole(part: PartChange) -> str:
    where = "NEW" if part.change == "added" else "OLD"
    at = "" if part.at is None else f", at {place(part.at)} in {where}"
    return f"{part.subject} {part.change}: {part.detail}{at}"


def _mechanisms(comparison: Comparison, width: int) -> list[Line]:
    """The mechanisms of which there is something to say, the first of them in full."""
    unit = "unit" if comparison.unit == "unitless" else comparison.unit
    several = max(len(comparison.old.mechanisms), len(comparison.new.mechanisms)) > 1
    told = [change for change in comparison.mechanisms if _worth_telling(change)]
    lines: list[Line] = []
    for change in told[:MECHANISMS_IN_FULL]:
        lines += [Line(""), *change_lines(change, unit, comparison.allow, width)]
    lines += _and_more(len(told) - MECHANISMS_IN_FULL, "changed mechanism")
    rest = len(comparison.mechanisms) - len(told)
    if several and rest:
        lines += [Line(""), Line(f"{count_of(rest, 'mechanism')} unchanged")]
    return lines


def _worth_telling(change: MechanismChange) -> bool:
    drawn = change.radii or change.drives or change.within or change.renamed or change.placed or change.reversed_motion
    return bool(change.changed or drawn)


def _and_more(count: int, noun: str) -> list[Line]:
    return [Line(""), Line(f"and {count_of(count, noun)} more; --json has them all")] if count > 0 else []


def _findings(title: str, where: str, findings: Sequence[Finding], width: int) -> list[Line]:
    if not findings:
        return []
    lines = [Line(""), Line(title, "bold")]
    for finding in findings[:FINDINGS_SHOWN]:
        at = "" if finding.at is None else f" at {place(finding.at)} {where}"
        lines += map(Line, fold(f"{finding.rule}{at}: {finding.message}", width, f"  {finding.severity:<9}", INDENT))
    lines += _and_more(len(findings) - FINDINGS_SHOWN, "finding")
    return lines
