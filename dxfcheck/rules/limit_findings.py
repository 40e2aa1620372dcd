"""What is beyond the limits of a rule, and what could not be held against them, as findings."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.requirements.verdict import Verdict
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.limit_wording import beyond, figure_of, runs, stated_where
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import listed
from dxfcheck.tolerances.sheet import PLACES_NAMED

__all__ = ["limit_findings"]


def _rule_of(verdict: Verdict) -> str:
    """The rule that judges a verdict's requirement."""
    expects = verdict.requirement.expected is not None
    return "expected-speed" if expects and verdict.quantity not in {"mobility", "speed-ratio"} else verdict.quantity


def limit_findings(subject: RuleSubject, name: str) -> Iterator[Finding]:
    """What breaks the limits of a rule, and what could not be held against them."""
    unit = subject.sketch.unit
    broken: defaultdict[tuple[str, int], list[Verdict]] = defaultdict(list)
    unknown: defaultdict[tuple[str, int], list[Verdict]] = defaultdict(list)
    for verdict in subject.judged.verdicts:
        if verdict.outcome in {"broken", "not known"} and _rule_of(verdict) == name:
            group = broken if verdict.outcome == "broken" else unknown
            group[verdict.mechanism, id(verdict.requirement)].append(verdict)
    for verdicts in broken.values():
        worst = sorted(verdicts, key=lambda each: -abs(each.actual or 0.0))
        left = len(worst) - PLACES_NAMED
        for number, verdict in enumerate(worst[:PLACES_NAMED], 1):
            more = f"; {left} more are beyond it as well" if left > 0 and number == PLACES_NAMED else ""
            yield _beyond(verdict, name, _slower(subject, verdict), unit, more)
    for verdicts in unknown.values():
        yield _not_known(verdicts, name, unit)


def _beyond(verdict: Verdict, name: str, remedy: str, unit: LengthUnit, more: str) -> Finding:
    requirement = verdict.requirement
    return Finding(
        rule=name,
        severity="error",
        message=f"{runs(verdict, unit)}, {beyond(verdict, unit)}, {stated_where(requirement)}{more}",
        remedy=remedy,
        at=verdict.at if verdict.at is not None else requirement.at,
        handles=tuple(dict.fromkeys((*verdict.handles, *requirement.handles))),
        layer=verdict.layer,
        mechanism=verdict.mechanism,
    )


def _not_known(verdicts: Sequence[Verdict], name: str, unit: LengthUnit) -> Finding:
    first = verdicts[0]
    requirement = first.requirement
    figures = (first.bounds.expected, first.bounds.greatest, first.bounds.least)
    figure = figure_of(first, next(each for each in figures if each is not None), unit, size=not requirement.signed)
    about = listed([each.subject for each in verdicts]) + (f" / {first.against}" if name == "speed-ratio" else "")
    return Finding(
        rule=name,
        severity="warning",
        message=f"{about} of {first.mechanism}: not known at this pose, so {figure}, {stated_where(requirement)}, "
        f"could not be checked: {first.why}",
        remedy="see the findings on the mechanism's freedom and drives; draw another pose, or drive every freedom",
        at=first.at if first.at is not None else requirement.at,
        handles=tuple(dict.fromkeys((*first.handles, *requirement.handles))),
        layer=first.layer,
        mechanism=first.mechanism,
    )


def _slower(subject: RuleSubject, verdict: Verdict) -> str:
    """The remedy: the speed of the drive that would do, where there is one drive; all speeds go with it."""
    if verdict.quantity == "speed-ratio":
        return "look for a wrong length or pitch circle, or state another ratio"
    rubs = "make the pin thinner, or " if verdict.quantity == "rubbing-speed" else ""
    wanted = _wanted(verdict)
    linkage, analysis = next(each for each in subject.mechanisms if each[0].name == verdict.mechanism)
    taken = [drive for drive, became in zip(linkage.drives, analysis.drives, strict=True) if became.outcome == "taken"]
    if len(taken) != 1 or wanted is None or not verdict.actual:
        return f"{rubs}change the speeds of the drives or the lengths, or what is stated"
    drive = taken[0]
    rate = drive.rate * wanted / (verdict.actual if verdict.requirement.signed else abs(verdict.actual))
    unit = subject.sketch.unit
    if drive.kind == "turn":
        told = f"{abs(rate):.4g} rad/s {'cw' if rate < 0.0 else 'ccw'}"
    else:
        told = f"{rate:.4g} {'units' if unit.metres is None else unit.name}/s"
    return f"{rubs}run the drive {linkage.links[drive.link].name} at {told}, or change the lengths or what is stated"


def _wanted(verdict: Verdict) -> float | None:
    """The speed that would do: the expected one, else the bound that is passed."""
    bounds = verdict.bounds
    if bounds.expected is not None:
        return bounds.expected
    figure = (verdict.actual or 0.0) if verdict.requirement.signed else abs(verdict.actual or 0.0)
    return bounds.greatest if bounds.greatest is not None and figure > bounds.greatest else bounds.least
