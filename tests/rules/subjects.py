"""What the rules find in a sketch built from plain shapes."""

from __future__ import annotations

from collections.abc import Sequence

from dxfcheck.analysis import analyse
from dxfcheck.drawing.primitives import Entity, LengthUnit, Notice
from dxfcheck.reading.read import read_linkages
from dxfcheck.requirements.judge import judge_requirements
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import run_rules
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Settings
from tests.sketches import MM, Drawn, sketch

__all__ = ["findings", "only"]


def findings(
    rule: str,
    *things: Drawn,
    entities: Sequence[Entity] = (),
    notices: Sequence[Notice] = (),
    unit: LengthUnit = MM,
    settings: Settings | None = None,
) -> list[Finding]:
    """The findings of one rule."""
    chosen = settings or Settings()
    drawn = sketch(*things, entities=entities, notices=notices, unit=unit)
    reading = read_linkages(drawn, chosen)
    mechanisms = tuple((linkage, analyse(linkage)) for linkage in reading.linkages)
    judged = judge_requirements(mechanisms, chosen, reading.requirements, unit)
    subject = RuleSubject(sketch=drawn, reading=reading, mechanisms=mechanisms, settings=chosen, judged=judged)
    return [finding for finding in run_rules(subject) if finding.rule == rule]


def only(
    rule: str,
    *things: Drawn,
    entities: Sequence[Entity] = (),
    notices: Sequence[Notice] = (),
    unit: LengthUnit = MM,
    settings: Settings | None = None,
) -> Finding:
    """The one finding of a rule; it has a remedy, whatever it is."""
    (found,) = findings(rule, *things, entities=entities, notices=notices, unit=unit, settings=settings)
    assert found.remedy
    assert not found.message.endswith(".")
    return found
