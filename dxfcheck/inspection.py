"""One drawing through the whole house: sketch, reading, linkages, analysis, findings."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import Analysis
from dxfcheck.collector import collector_paused
from dxfcheck.drawing import load_sketch
from dxfcheck.drawing.primitives import LengthUnit, Sketch
from dxfcheck.errors import DrawingUnreadable
from dxfcheck.linkage import Linkage
from dxfcheck.reading.reading import AccountLine, Evidence
from dxfcheck.requirements.verdict import Verdict
from dxfcheck.rules.acceptances import with_acceptances
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import run_rules
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Settings
from dxfcheck.tolerances.findings import BOUNDS_SHOWN_OF

__all__ = ["DrawingReport", "MechanismReport", "inspect_drawing"]


@dataclass(frozen=True, slots=True, kw_only=True)
class MechanismReport:
    """One mechanism of a drawing and what was worked out for it; ``requirements`` are what it was held against."""

    linkage: Linkage
    analysis: Analysis
    requirements: tuple[Verdict, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class DrawingReport:
    """All there is to say of one drawing; a drawing that could not be read has status 'unreadable' and an error.

    ``tolerance`` is the coincidence tolerance used, in the drawing's unit; None where nothing was read.
    The counts of ``account`` sum to ``entities``. ``evidence`` says how each pin, link and joint was read.
    ``diagonal`` is the sheet's, in the drawing's unit.
    ``settings_files`` are the settings files that had a say, ``rules_off`` the rules that they switch off.
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
    diagonal: float = 0.0
    settings_files: tuple[str, ...] = ()
    rules_off: tuple[str, ...] = ()


def inspect_drawing(
    path: str, settings: Settings, *, with_evidence: bool = True, with_bounds: bool = True
) -> DrawingReport:
    """Read, analyse and check one drawing; one that cannot be read gives a report of status 'unreadable'.

    ``with_evidence`` False leaves out how each thing was read, which only the reading's own report shows;
    ``with_bounds`` False what speeds may be off by, unless the drawing is so coarse that a finding may come of it.
    OptionInvalid where an option or setting cannot be used. Cost near-linear in the entities of the drawing.
    """
    with collector_paused():
        try:
            sketch = load_sketch(path, settings)
        except DrawingUnreadable as fault:
            return DrawingReport(path=fault.path, status="unreadable", error=f"{fault.reason}; {fault.remedy}")
        return _inspect(sketch, settings, with_evidence=with_evidence, with_bounds=with_bounds)


def _inspect(sketch: Sketch, settings: Settings, *, with_evidence: bool, with_bounds: bool) -> DrawingReport:
    # Loaded on use: they bring in numpy, and a process that only prints what others found must not wait for that.
    from dxfcheck.reading.read import read_linkages  # noqa: PLC0415
    from dxfcheck.requirements.judge import judge_requirements  # noqa: PLC0415

    reading = read_linkages(sketch, settings, with_evidence=with_evidence)
    shown = with_bounds and len(reading.linkages) <= BOUNDS_SHOWN_OF
    mechanisms = tuple((linkage, analyse(linkage, bounds_shown=shown)) for linkage in reading.linkages)
    judged = judge_requirements(mechanisms, settings, reading.requirements, sketch.unit)
    subject = RuleSubject(sketch=sketch, reading=reading, mechanisms=mechanisms, settings=settings, judged=judged)
    return DrawingReport(
        path=sketch.path,
        status="checked",
        unit=sketch.unit,
        tolerance=reading.tolerance,
        account=reading.account,
        entities=len(sketch.entities),
        mechanisms=_mechanism_reports(mechanisms, judged.verdicts),
        evidence=reading.evidence,
        findings=with_acceptances(run_rules(subject), subject),
        diagonal=sketch.diagonal,
        settings_files=settings.files,
        rules_off=tuple(rule for rule, weight in settings.rule_weights if weight == "off"),
    )


def _mechanism_reports(
    mechanisms: Sequence[tuple[Linkage, Analysis]], verdicts: Sequence[Verdict]
) -> tuple[MechanismReport, ...]:
    own: defaultdict[str, list[Verdict]] = defaultdict(list)
    for verdict in verdicts:
        own[verdict.mechanism].append(verdict)
    return tuple(
        MechanismReport(linkage=linkage, analysis=analysis, requirements=tuple(own.get(linkage.name, ())))
        for linkage, analysis in mechanisms
    )
