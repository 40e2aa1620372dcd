"""One mechanism on the terminal: how it hangs together, what it can do, and how fast each part runs."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.analysis.results import Analysis, Mobility
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reports.terminal_contacts import contact_sentences, joint_counts, sliding_words
from dxfcheck.reports.terminal_layout import Line, count_of, figure, fold, listed, place, table
from dxfcheck.reports.terminal_motion import joint_columns, link_columns, pin_columns, turns_a_minute
from dxfcheck.reports.terminal_pose import finite_words, push_sentences, trust_words, why_they_differ
from dxfcheck.reports.terminal_requirements import requirements_line
from dxfcheck.tolerances.findings import LARGE_DISAGREEMENT

__all__ = ["mechanism_lines"]

LABEL = "  {:<10}"
INDENT = " " * 12

SOURCES = {"option": "the option", "settings": "the settings", "note": "the note"}
OUTCOMES = {
    "repeats": "it repeats what the drives before it state",
    "conflict": "it contradicts the drives before it",
    "at limit": "the link cannot be driven from this pose",
}


def mechanism_lines(report: MechanismReport, unit: str, width: int) -> list[Line]:
    """Heading, mobility, loops, drives and the tables of links, pins and joints; ``unit`` is that of lengths."""
    linkage, analysis = report.linkage, report.analysis
    lines = [Line(text, "bold", len(linkage.name)) for text in fold(_heading(linkage), width, indent=INDENT)]
    for label, text in _facts(linkage, analysis, unit):
        lines += map(Line, fold(text, width, LABEL.format(label), INDENT))
    if report.requirements:
        text = requirements_line(report.requirements)
        lines += map(Line, fold(text, width, LABEL.format("held to"), INDENT))
    if not linkage.grounded:
        return lines
    for columns_of in (link_columns, pin_columns, joint_columns):
        columns = columns_of(linkage, analysis, unit)
        if columns[0].cells:
            lines += [Line(""), *table(columns, width)]
    sentences = list(contact_sentences(linkage, analysis, unit))
    lines += [Line("")] if sentences else []
    for label, text in sentences:
        lines += map(Line, fold(text, width, LABEL.format(label), INDENT))
    return lines


def _formula(counted: Mobility) -> str:
    """Gruebler's count with its numbers: M = 3 x (n - 1) - 2 x f - h."""
    return f"M = 3 x ({counted.links} - 1) - 2 x {counted.full_joints} - {counted.half_joints} = {counted.count}"


def _heading(linkage: Linkage) -> str:
    fixed = [pin.name for pin in linkage.pins if pin.fixed]
    held = linkage.links[linkage.frame].name
    if not linkage.grounded:
        tail = f"tied to no frame; {held} is held for the count, and no speeds are given"
    elif fixed:
        tail = f"frame at {listed(fixed)}"
    else:
        tail = "no pin on the frame"
    parts = [count_of(len(linkage.links), "link"), count_of(len(linkage.pins), "pin"), *joint_counts(linkage)]
    return f"{linkage.name}: {', '.join(parts)}; {tail}"


def _facts(linkage: Linkage, analysis: Analysis, unit: str) -> Iterator[tuple[str, str]]:
    """Label and text of each line above the tables."""
    yield "mobility", _formula(analysis.mobility)
    yield "at pose", _freedom_at_pose(analysis, unit)
    for number, loop in enumerate(analysis.loops):
        yield "" if number else "loops", " - ".join(linkage.links[link].name for link in loop)
    if not linkage.grounded:
        return
    for number, drive in enumerate(linkage.drives):
        outcome = OUTCOMES.get(analysis.drives[number].outcome)
        yield "" if number else "drive", _drive(linkage, drive, unit) + (f"; {outcome}" if outcome else "")
    if not linkage.drives:
        yield "drive", "none"
    yield "speeds", _how_sure(linkage, analysis)
    if analysis.solved and analysis.bounds is not None:
        words = trust_words(linkage, analysis, analysis.bounds, unit)
        yield from [("trust", words)] if words else []
    if analysis.mobility.at_pose:
        yield from push_sentences(linkage, analysis, unit)


def _freedom_at_pose(analysis: Analysis, unit: str) -> str:
    mobility = analysis.mobility
    freedoms = count_of(mobility.at_pose, "freedom")
    if mobility.at_pose == mobility.count:
        return f"{freedoms}, as counted"
    repeats = (
        f"{freedoms}, {mobility.redundant} more than counted: at this pose "
        f"{count_of(mobility.redundant, 'constraint')} only {'repeat' if mobility.redundant > 1 else 'repeats'} "
        "what the others already ask for"
    )
    return repeats if analysis.finite is None else f"{repeats}; {finite_words(analysis.finite, unit)}"


def _drive(linkage: Linkage, drive: Drive, unit: str) -> str:
    link = linkage.links[drive.link].name
    against = "" if drive.against == linkage.frame else f" against {linkage.links[drive.against].name}"
    if drive.kind == "slide" and drive.joint is not None:
        joint = linkage.joints[drive.joint]
        motion = sliding_words(linkage, joint, drive.rate if drive.link == joint.second else -drive.rate, unit)
    elif drive.kind == "slide":
        motion = f"{link} slides at {figure(drive.rate)} {unit}/s{against}"
    else:
        sense = "ccw" if drive.rate >= 0 else "cw"
        size = abs(drive.rate)
        motion = f"{link} turns at {figure(size)} rad/s {sense} ({figure(turns_a_minute(size))} r/min){against}"
    if drive.source == "assumed":
        return f"{motion}: assumed, as none is stated, so every speed is a ratio to it"
    stated = f" '{drive.stated}'" if drive.stated else ""
    at = f" at {place(drive.at)}" if drive.at is not None and drive.source == "note" else ""
    return f"{motion}: from {SOURCES[drive.source]}{stated}{at}"


def _how_sure(linkage: Linkage, analysis: Analysis) -> str:
    if analysis.mobility.at_pose == 0:
        return "none, as it cannot move"
    if not analysis.solved:
        loose = [
            link.name
            for number, (link, motion) in enumerate(zip(linkage.links, analysis.links, strict=True))
            if number != linkage.frame and not motion.determined
        ]
        return "not settled by the drives" + (f" for {listed(loose)}" if loose else "; see the findings")
    if analysis.disagreement is None:
        return "settled"
    return f"solved in two independent ways, which differ by {analysis.disagreement:.1g} of the greatest speed" + (
        f"; {why_they_differ(linkage, analysis)}" if analysis.disagreement > LARGE_DISAGREEMENT else ""
    )
