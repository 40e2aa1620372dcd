"""One drawing through the whole house: sketch, reading, linkages, analysis, findings."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import Analysis
from dxfcheck.collector import collector_paused
from dxfcheck.drawing import load_sketch
from dxfcheck.drawing.primitives import LengthUnit, Sketch
from dxfcheck.errors import DrawingUnreadable
from dxfcheck.linkage import Linkage
from dxfcheck.reading.read import read_linkages
from dxfcheck.reading.reading import AccountLine, Evidence
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import run_rules
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Settings

__all__ = ["DrawingReport", "MechanismReport", "inspect_drawing"]


@dataclass(frozen=True, slots=True, kw_only=True)
class MechanismReport:
    """One mechanism of a drawing and what was worked out for it."""

    linkage: Linkage
    analysis: Analysis


@dataclass(frozen=True, slots=True, kw_only=True)
class DrawingReport:
    """All there is to say of one drawing; a drawing that could not be read has status 'unreadable' and an error.

    ``tolerance`` is the coincidence tolerance used, in the drawing's unit; None where nothing was read.
    The counts of ``account`` sum to ``entities``. ``evidence`` says how each pin, link and joint was read.
    """

    path: str
    status: Literal["checked", "unreadable"]
    error: str | None = None
    unit: LengthUnit | None = None
    tolerance: float | None = None
    account: tuple[AccountLine, ...] = ()
    entities: int = 0
    mechanisms: tuple[MechanismReport, ...] = ()
    evidence: tuple[Evidence, ...] = ()
    findings: tuple[Finding, ...] = ()


def inspect_drawing(path: str, settings: Settings, *, with_evidence: bool = True) -> DrawingReport:
    """Read, analyse and check one drawing; one that cannot be read gives a report of status 'unreadable'.

    ``with_evidence`` False leaves out how each thing was read, which only the reading's own report shows.
    OptionInvalid where an option or setting cannot be used. Cost near-linear in the entities of the drawing.
    """
    with collector_paused():
        try:
            sketch = load_sketch(path, settings)
        except DrawingUnreadable as fault:
            return DrawingReport(path=fault.path, status="unreadable", error=f"{fault.reason}; {fault.remedy}")
        return _inspect(sketch, settings, with_evidence=with_evidence)


def _inspect(sketch: Sketch, settings: Settings, *, with_evidence: bool) -> DrawingReport:
    reading = read_linkages(sketch, settings, with_evidence=with_evidence)
    mechanisms = tuple((linkage, analyse(linkage)) for linkage in reading.linkages)
    subject = RuleSubject(sketch=sketch, reading=reading, mechanisms=mechanisms, settings=settings)
    return DrawingReport(
        path=sketch.path,
        status="checked",
        unit=sketch.unit,
        tolerance=reading.tolerance,
        account=reading.account,
        entities=len(sketch.entities),
        mechanisms=tuple(MechanismReport(linkage=linkage, analysis=analysis) for linkage, analysis in mechanisms),
        evidence=reading.evidence,
        findings=run_rules(subject),
    )
