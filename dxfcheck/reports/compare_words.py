"""The words for a comparison that its reports share."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.result import Comparison
from dxfcheck.reports.terminal_layout import count_of, figure, place
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["motion_words", "verdict_words"]

UNCHANGED = "no change as a mechanism"


def verdict_words(comparison: Comparison) -> str:
    """One line: whether anything changed as a mechanism, and how much of what."""
    findings = list(_finding_counts(comparison))
    if not comparison.changed:
        elsewhere = sum(change.placed is not None for change in comparison.mechanisms)
        if elsewhere:
            findings.insert(0, f"{count_of(elsewhere, 'mechanism')} elsewhere on the sheet")
        neither = not (comparison.old.mechanisms or comparison.new.mechanisms)
        none = "; neither drawing holds a linkage" if neither else ""
        return "; ".join([UNCHANGED + (", but mirrored" if comparison.motion.mirrored else "") + none, *findings])
    counts = ", ".join(_counts(comparison))
    head = "changed as a mechanism"
    if not comparison.beyond:
        head += f", but no speed by more than {comparison.allow:g} %"
    return "; ".join([f"{head}: {counts}", *(["mirrored"] if comparison.motion.mirrored else []), *findings])


def _counts(comparison: Comparison) -> Iterator[str]:
    """What changed, counted over all mechanisms, the most telling first."""
    changes = comparison.mechanisms
    if comparison.motion.scale != 1.0:
        yield f"{figure(comparison.motion.scale)} times as large"
    yield from _counted("mechanism", [part.change for part in comparison.parts])
    several = sum(change.mobility_changed for change in changes)
    if several:
        yield "mobility" if several == 1 else f"mobility of {several} mechanisms"
    for what in ("link", "joint", "pin"):
        yield from _counted(what, [p.change for each in changes for p in each.parts if p.what == what])
    if any(change.turned_round for change in changes):
        yield "runs the other way"
    moved = [move for change in changes for move in change.moved]
    for noun, is_pin in (("pin", True), ("joint", False)):
        number = sum(move.is_pin == is_pin for move in moved)
        if number:
            yield f"{count_of(number, noun)} moved"
    if moved and all(change.other_pose for change in changes if change.moved):
        yield "drawn at another pose"
    for number, noun in (
        (sum(len(change.lengths) for change in changes), "length"),
        (sum(len(change.turned) for change in changes), "direction"),
        (sum(sum(drive.beyond for drive in change.drives) for change in changes), "drive"),
        (sum(len(change.speeds) for change in changes), "speed"),
    ):
        if number:
            yield count_of(number, noun)


def _counted(noun: str, how: Sequence[str]) -> Iterator[str]:
    """'1 link added', '2 joints gone'."""
    for change in ("added", "gone", "changed"):
        number = sum(each == change for each in how)
        if number:
            yield f"{count_of(number, noun)} {change}"


def _finding_counts(comparison: Comparison) -> Iterator[str]:
    if comparison.new_findings:
        yield f"{count_of(len(comparison.new_findings), 'new finding')}"
    if comparison.cured_findings:
        yield f"{count_of(len(comparison.cured_findings), 'finding')} cured"


def motion_words(motion: SheetMotion) -> str:
    """'turned by 30 deg and moved by (10, 0)': what was done to OLD to lay it on NEW, in that order."""
    angle = math.degrees(motion.angle)
    noise = SHOWN_AS_ZERO * 180.0
    parts = []
    if motion.mirrored:
        parts.append(f"mirrored in a line at {figure(angle / 2.0, noise)} deg")
    elif abs(angle) > noise:
        parts.append(f"turned by {figure(angle)} deg")
    if motion.shift:
        parts.append(f"moved by {place(motion.shift)}")
    return ", then ".join(parts) or "as it was"
