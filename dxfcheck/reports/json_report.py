"""The JSON report, version 1: for hooks and other programs. Its form is reports/report.schema.json.

Lengths in the drawing's unit, angles in degrees, angular speeds in rad/s, speeds in that unit a second. What is not
known is null, never 0. Keys are only ever added.
"""

from __future__ import annotations

import json
from collections import Counter
from collections.abc import Iterator, Sequence
from typing import Any

from dxfcheck import __version__
from dxfcheck.analysis.results import Analysis
from dxfcheck.collector import collector_paused
from dxfcheck.geometry import Point
from dxfcheck.inspection import DrawingReport, MechanismReport
from dxfcheck.linkage import Linkage
from dxfcheck.reading.reading import AccountLine, Evidence
from dxfcheck.reports.caution import CAUTION
from dxfcheck.rules.finding import SEVERITIES, Finding

__all__ = ["json_text", "report_as_dict"]

Item = dict[str, Any]

_encoder = json.JSONEncoder(allow_nan=False)


def report_as_dict(reports: Sequence[DrawingReport], *, with_evidence: bool = False) -> Item:
    """All drawings as one JSON-ready dict; ``with_evidence`` adds to each how its parts were read."""
    return {
        "tool": {"name": "dxfcheck", "version": __version__},
        "report_version": 1,
        "caution": CAUTION,
        "drawings": [_drawing(report, with_evidence=with_evidence) for report in reports],
        "totals": _totals(reports),
    }


def json_text(reports: Sequence[DrawingReport], *, with_evidence: bool = False) -> str:
    """The report as text: one line for each link, pin, joint, finding, so that two reports compare line by line.

    ValueError if a figure is not finite, which no stage lets through.
    """
    with collector_paused():
        return "".join(_lines(report_as_dict(reports, with_evidence=with_evidence), "")) + "\n"


_OPEN = frozenset({"drawings", "account", "mechanisms", "links", "pins", "joints", "findings", "evidence"})
"""The lists that are laid out one item a line; everything else stays on its line."""


def _lines(item: Item, indent: str) -> Iterator[str]:
    """One dict laid out over lines: json's own indenting is in Python and ten times slower than its compact encoder."""
    inner = indent + "  "
    separator = "{\n"
    for key, value in item.items():
        yield f"{separator}{inner}{_encoder.encode(key)}: "
        separator = ",\n"
        if key in _OPEN and value:
            yield from _items(value, inner)
        else:
            yield _encoder.encode(value)
    yield f"\n{indent}}}"


def _items(values: list[Item], indent: str) -> Iterator[str]:
    """A list, one item a line; a drawing or mechanism is laid out further."""
    inner = indent + "  "
    separator = "[\n" + inner
    for value in values:
        yield separator
        separator = ",\n" + inner
        if "findings" in value or "joints" in value:
            yield from _lines(value, inner)
        else:
            yield _encoder.encode(value)
    yield f"\n{indent}]"


def _drawing(report: DrawingReport, *, with_evidence: bool) -> Item:
    unit = report.unit
    item: Item = {
        "path": _clean(report.path),
        "status": report.status,
        "error": report.error and _clean(report.error),
        "units": {"length": unit and unit.name, "source": unit and unit.source},
        "tolerance": report.tolerance,
        "account": [_account_line(line) for line in report.account],
        "entities": report.entities,
        "mechanisms": [_mechanism(mechanism) for mechanism in report.mechanisms],
        "findings": [_finding(finding) for finding in report.findings],
    }
    if with_evidence:
        item["evidence"] = [_evidence(evidence) for evidence in report.evidence]
    return item


def _clean(text: str) -> str:
    """The text without lone surrogates, which stand for undecodable bytes of a file's name and are no Unicode."""
    return text.encode("utf-8", "replace").decode("utf-8")


def _account_line(line: AccountLine) -> Item:
    return {"type": line.type, "layer": line.layer, "read_as": line.read_as, "why": line.why, "count": line.count}


def _mechanism(report: MechanismReport) -> Item:
    linkage, analysis = report.linkage, report.analysis
    mobility = analysis.mobility
    names = [link.name for link in linkage.links]
    return {
        "name": linkage.name,
        "links": _links(linkage, analysis),
        "pins": _pins(linkage, analysis, names),
        "joints": _joints(linkage, analysis, names),
        "mobility": {
            "count": mobility.count,
            "links": mobility.links,
            "full_joints": mobility.full_joints,
            "half_joints": mobility.half_joints,
            "at_pose": mobility.at_pose,
            "redundant": mobility.redundant,
        },
        "loops": [[names[link] for link in loop] for loop in analysis.loops],
        "drives": _drives(linkage, analysis, names),
        "solved": analysis.solved,
        "disagreement": analysis.disagreement,
        "grounded": linkage.grounded,
    }


def _links(linkage: Linkage, analysis: Analysis) -> list[Item]:
    pins = [pin.name for pin in linkage.pins]
    return [
        {
            "name": link.name,
            "kind": link.kind,
            "pins": [pins[pin] for pin in link.pins],
            "handles": list(link.handles),
            "angular_velocity": _figure(motion.angular_velocity),
            "pole": _pair(motion.pole),
            "determined": motion.determined,
        }
        for link, motion in zip(linkage.links, analysis.links, strict=True)
    ]


def _pins(linkage: Linkage, analysis: Analysis, names: list[str]) -> list[Item]:
    return [
        {
            "name": pin.name,
            "at": _pair(pin.at),
            "radius": pin.radius,
            "links": [names[link] for link in pin.links],
            "fixed": pin.fixed,
            "velocity": _pair(motion.velocity),
            "speed": None if motion.velocity is None else abs(motion.velocity),
            "handles": list(pin.handles),
        }
        for pin, motion in zip(linkage.pins, analysis.pins, strict=True)
    ]


def _joints(linkage: Linkage, analysis: Analysis, names: list[str]) -> list[Item]:
    return [
        {
            "kind": joint.kind,
            "links": [names[joint.first], names[joint.second]],
            "pin": None if joint.pin is None else linkage.pins[joint.pin].name,
            "at": _pair(joint.at),
            "direction": _pair(joint.direction),
            "relative_angular_velocity": _figure(motion.relative_angular_velocity),
            "slide_speed": _figure(motion.slide_speed),
            "rubbing_speed": _figure(motion.rubbing_speed),
            **({"full": joint.full} if joint.kind == "rolling" else {}),
        }
        for joint, motion in zip(linkage.joints, analysis.joints, strict=True)
    ]


def _drives(linkage: Linkage, analysis: Analysis, names: list[str]) -> list[Item]:
    return [
        {
            "link": names[drive.link],
            "against": names[drive.against],
            "rate": drive.rate,
            "kind": drive.kind,
            "source": drive.source,
            "stated": drive.stated,
            "outcome": verdict.outcome,
            "implied": _figure(verdict.implied),
        }
        for drive, verdict in zip(linkage.drives, analysis.drives, strict=True)
    ]


def _finding(finding: Finding) -> Item:
    return {
        "rule": finding.rule,
        "severity": finding.severity,
        "message": finding.message,
        "remedy": finding.remedy,
        "at": _pair(finding.at),
        "handles": list(finding.handles),
        "layer": finding.layer,
        "mechanism": finding.mechanism,
    }


def _evidence(evidence: Evidence) -> Item:
    return {
        "subject": evidence.subject,
        "name": evidence.name,
        "rule": evidence.rule,
        "why": evidence.why,
        "handles": list(evidence.handles),
        "at": _pair(evidence.at),
        "mechanism": evidence.mechanism,
    }


def _pair(point: Point | None) -> list[float] | None:
    """A point as [x, y]; adding 0 makes a negative zero a plain one."""
    return None if point is None else [point.real + 0.0, point.imag + 0.0]


def _figure(value: float | None) -> float | None:
    """A figure as it is, a negative zero as a plain one."""
    return None if value is None else value + 0.0


def _totals(reports: Sequence[DrawingReport]) -> Item:
    found = Counter(finding.severity for report in reports for finding in report.findings)
    return {
        "drawings": len(reports),
        "unreadable": sum(report.status == "unreadable" for report in reports),
        **{severity: found[severity] for severity in SEVERITIES},
    }
