"""How a drawing was read, on the terminal: for a reviewer who does not know the habits of the firm it comes from."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from dxfcheck.inspection import DrawingReport
from dxfcheck.linkage import Linkage
from dxfcheck.reading.reading import AccountLine, Evidence
from dxfcheck.reports.terminal_contacts import towards
from dxfcheck.reports.terminal_drawing import how_measured, reason, unit_name
from dxfcheck.reports.terminal_layout import Column, Line, count_of, figure, fold, listed, place, table
from dxfcheck.reports.terminal_requirements import requirement_facts

__all__ = ["reading_lines"]

INDENT = " " * 6

Key = tuple[str | None, str, str]


def reading_lines(report: DrawingReport, width: int) -> list[Line]:
    """Pins, links, joints and drives of each mechanism with what decided, then the account of all entities."""
    path = f"{report.path}:"
    if report.status == "unreadable":
        first, *more = fold(f"not read: {reason(report)}", width, f"{path} ", "  ")
        return [Line(first, "bold", len(path)), *map(Line, more)]
    found = count_of(len(report.mechanisms), "mechanism") if report.mechanisms else "holds no linkage"
    lines = [Line(f"{path} {found}", "bold", len(path))]
    lines += map(Line, fold(how_measured(report), width, "  ", "  "))
    reasons = _by_subject(report.evidence)
    for mechanism in report.mechanisms:
        lines += _mechanism_lines(mechanism.linkage, reasons, unit_name(report), width)
        for stated, where, facts in requirement_facts(mechanism.requirements, unit_name(report)):
            decided = reasons.pop((mechanism.linkage.name, "requirement", stated), [])
            lines += _entry(f"requirement '{stated}'", [where] if where else [], decided, width)
            lines += [Line(text) for fact in facts for text in fold(fact, width, "    ", INDENT)]
    left = [evidence for group in reasons.values() for evidence in group]
    if left:
        lines += [Line(""), Line("Also decided", "bold")]
        for evidence in left:
            where = "" if evidence.mechanism is None else f" in {evidence.mechanism}"
            lines += _entry(f"{evidence.subject} {evidence.name}".rstrip() + where, [], [evidence], width)
    return [*lines, *_account_lines(report.account, report.entities, width)]


def _by_subject(evidence: Sequence[Evidence]) -> dict[Key, list[Evidence]]:
    reasons: dict[Key, list[Evidence]] = {}
    for item in evidence:
        reasons.setdefault((item.mechanism, item.subject, item.name), []).append(item)
    return reasons


def _mechanism_lines(linkage: Linkage, reasons: dict[Key, list[Evidence]], unit: str, width: int) -> list[Line]:
    """The parts of one mechanism; takes from ``reasons`` what belongs to them."""
    lines = [Line(""), Line(linkage.name, "bold")]
    names = [link.name for link in linkage.links]
    for subject, name, other_names, facts, handles in _parts(linkage, names, unit):
        keys = [(linkage.name, subject, known) for known in (name, *other_names)]
        keys += [(linkage.name, "frame", name)] if subject == "pin" else []
        decided = [evidence for key in keys for evidence in reasons.pop(key, ())]
        named = handles and not any(evidence.handles for evidence in decided)
        stated = [*facts, _handles(handles)] if named else facts
        lines += _entry(f"{subject} {name}" if subject != name else name, stated, decided, width)
    return lines


Part = tuple[str, str, tuple[str, ...], list[str], tuple[str, ...]]
"""Subject, name, other names the evidence may use, facts, handles."""


def _parts(linkage: Linkage, names: list[str], unit: str) -> Iterator[Part]:
    """Pins, links, joints and drives in the order of the report."""
    for pin in linkage.pins:
        facts = [f"at {place(pin.at)}", f"joins {listed([names[link] for link in pin.links])}"]
        yield "pin", pin.name, (), [*facts, *(["on the frame"] if pin.fixed else [])], pin.handles
    for link in linkage.links:
        pins = listed([linkage.pins[pin].name for pin in link.pins])
        subject = "frame" if link.kind == "frame" else "link"
        pins += " (a block)" if link.kind == "block" else ""
        bare = "no pins" if subject == "frame" else "no pins, so it goes by a handle"
        yield subject, link.name, (), [f"pins {pins}" if pins else bare], link.handles
    for joint in linkage.joints:
        between = f"{names[joint.first]} and {names[joint.second]}"
        pin_name = () if joint.pin is None else (linkage.pins[joint.pin].name,)
        facts = [joint.kind, f"at {place(joint.at)}"]
        if joint.direction is not None:
            facts.append(f"{'tangent' if joint.kind == 'rolling' else 'along'} {towards(joint.direction)} deg")
        facts += ["nothing else holds it: a full joint"] if joint.kind == "rolling" and joint.full else []
        yield "joint", between, (f"{names[joint.first]} / {names[joint.second]}", *pin_name), facts, joint.handles
    for drive in linkage.drives:
        facts = [f"{figure(drive.rate)} {'rad/s' if drive.kind == 'turn' else f'{unit}/s'}", f"source: {drive.source}"]
        stated = [f"'{drive.stated}'"] if drive.stated else []
        driven = names[drive.link]
        driven += "" if drive.against == linkage.frame else f" against {names[drive.against]}"
        yield "drive", driven, (), [*facts, *stated], drive.handles


def _entry(head: str, facts: list[str], decided: Sequence[Evidence], width: int) -> list[Line]:
    """A part, then a line for each decision about it."""
    lines = [Line(text) for text in fold("; ".join([head, *facts]), width, "  ", INDENT)]
    for evidence in decided:
        handles = f"; {_handles(evidence.handles)}" if evidence.handles else ""
        at = "" if evidence.at is None or facts else f"; at {place(evidence.at)}"
        lines += [
            Line(text) for text in fold(f"rule {evidence.rule}: {evidence.why}{at}{handles}", width, "    ", INDENT)
        ]
    return lines


def _handles(handles: Sequence[str]) -> str:
    return f"{'handle' if len(handles) == 1 else 'handles'} {', '.join(handles)}"


def _account_lines(account: Sequence[AccountLine], entities: int, width: int) -> list[Line]:
    """Every entity of the file, counted once, with the sum that shows none is missing."""
    counted = sum(line.count for line in account)
    columns = [
        Column("type", "", [*(line.type for line in account), "sum"], numeric=False),
        Column("count", "", [*(str(line.count) for line in account), str(counted)]),
        Column("layer", "", [*(line.layer for line in account), ""], numeric=False),
        Column("read as", "", [*(line.read_as for line in account), ""], numeric=False),
        Column("why", "", [*(line.why for line in account), f"of {entities} in the drawing"], numeric=False),
    ]
    return [Line(""), Line("Account of the entities", "bold"), *table(columns, width)]
