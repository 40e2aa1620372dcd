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
from dxfcheck.reports.json_pose import off_by, pose_items
from dxfcheck.requirements.verdict import Verdict
from dxfcheck.rules.finding import SEVERITIES, Finding
from dxfcheck.settings import Acceptance

__all__ = ["finding_as_dict", "json_text", "report_as_dict"]

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


_OPEN = frozenset(
    {"drawings", "account", "mechanisms", "links", "pins", "joints", "findings", "evidence", "requirements"}
)
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
        "settings": {"files": [_clean(file) for file in report.settings_files], "rules_off": [*report.rules_off]},
        "account": [_account_line(line) for line in report.account],
        "entities": report.entities,
        "mechanisms": [_mechanism(mechanism) for mechanism in report.mechanisms],
        "findings": [finding_as_dict(finding) for finding in report.findings],
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
        "requirements": [_requirement(verdict) for verdict in report.requirements],
        **pose_items(linkage, analysis),
    }


def _requirement(verdict: Verdict) -> Item:
    """One limit or expectation and what became of it; speeds as elsewhere, ratios and mobilities plain."""
    bounds, stated = verdict.bounds, verdict.requirement
    return {
        "stated": _clean(stated.stated),
        "source": stated.source,
        "where": _clean(stated.where),
        "quantity": verdict.quantity,
        "subject": verdict.subject,
        "against": verdict.against or None,
        "actual": _figure(verdict.actual),
        "least": bounds.least,
        "greatest": bounds.greatest,
        "expected": bounds.expected,
        "outcome": verdict.outcome,
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
            "plus_minus": off_by(analysis.bounds, "links", number),
        }
        for number, (link, motion) in enumerate(zip(linkage.links, analysis.links, strict=True))
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
            "plus_minus": off_by(analysis.bounds, "pins", number),
        }
        for number, (pin, motion) in enumerate(zip(linkage.pins, analysis.pins, strict=True))
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
            "turn_plus_minus": off_by(analysis.bounds, "turns", number),
            "slide_plus_minus": (None if motion.slide_speed is None else off_by(analysis.bounds, "slides", number)),
            **({"full": joint.full} if joint.kind == "rolling" else {}),
        }
        for number, (joint, motion) in enumerate(zip(linkage.joints, analysis.joints, strict=True))
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


def finding_as_dict(finding: Finding) -> Item:
    """One finding, as it stands in every JSON report."""
    return {
        "rule": finding.rule,
        "severity": finding.severity,
        "message": _clean(finding.message),
        "remedy": finding.remedy,
        "at": _pair(finding.at),
        "handles": list(finding.handles),
        "layer": finding.layer,
        "mechanism": finding.mechanism,
        "accepted": finding.accepted and _acceptance(finding.accepted),
    }


def _acceptance(acceptance: Acceptance) -> Item:
    """Why a finding was accepted, the last day that holds, and the line of the settings file that says so."""
    return {
        "reason": _clean(acceptance.reason),
        "until": acceptance.until and acceptance.until.isoformat(),
        "where": _clean(acceptance.where),
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
    """How many drawings and findings; what was accepted is counted by itself."""
    found = Counter(
        "accepted" if finding.accepted else finding.severity for report in reports for finding in report.findings
    )
    return {
        "drawings": len(reports),
        "unreadable": sum(report.status == "unreadable" for report in reports),
        **{counted: found[counted] for counted in (*SEVERITIES, "accepted")},
    }
