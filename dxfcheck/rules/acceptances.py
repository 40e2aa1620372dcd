"""What an office accepts: findings matched with the acceptances of the settings, and the entries that match nothing."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import replace

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.rules.acceptance_index import AcceptanceIndex
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import in_order, rule
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length, place
from dxfcheck.settings import Acceptance
from dxfcheck.tolerances.findings import ACCEPTED_WITHIN_OF_DIAGONAL

__all__ = ["STALE", "accept_findings", "acceptance_reach", "stale_findings", "with_acceptances"]

STALE = "stale-acceptance"
"""The rule about acceptances; what it finds cannot be accepted itself."""


@rule(
    STALE,
    "warning",
    "An accepted finding that is not there any more",
    family="settings",
    looks_for="An [[accept]] entry of the settings file that matches no finding of this drawing, or whose last day "
    "is past. An entry matches findings of its rule at its place (within 5e-4 of the sheet's diagonal), with its "
    "handle or, where it states neither, those without place and entity. Rules that are switched off are left aside.",
    matters="The drawing changed after somebody accepted it: what was accepted may now be elsewhere or worse, and an "
    "entry left behind could hide the next mistake at that place.",
    remedy="Remove the entry, or correct its place or date after looking at the drawing again.",
    settings="accept",
)
def stale_acceptance(_subject: RuleSubject) -> Iterator[Finding]:
    """Nothing yet: what an acceptance matches is known only once every other rule has found what it finds."""
    return iter(())


def with_acceptances(found: tuple[Finding, ...], subject: RuleSubject) -> tuple[Finding, ...]:
    """What the rules found, with what the settings accept of it, and the entries that match nothing.

    Entries for rules that are switched off are neither used nor complained of.
    """
    settings = subject.settings
    if not settings.acceptances:
        return found
    weights = dict(settings.rule_weights)
    acceptances = [acceptance for acceptance in settings.acceptances if weights.get(acceptance.rule) != "off"]
    reach = acceptance_reach(subject.sketch.diagonal, subject.reading.tolerance)
    findings = accept_findings(found, acceptances, reach)
    weight = weights.get(STALE, "warning")
    if weight == "off":
        return findings
    stale = stale_findings(findings, acceptances, reach, subject.sketch.unit)
    return in_order((*findings, *(replace(finding, severity=weight) for finding in stale)))


def acceptance_reach(diagonal: float, tolerance: float) -> float:
    """How far from its stated place an accepted finding may lie, in the unit of the two lengths.

    ``diagonal`` is the sheet's; a coincidence ``tolerance`` that the user set wider counts instead.
    """
    return max(ACCEPTED_WITHIN_OF_DIAGONAL * diagonal, tolerance)


def accept_findings(
    findings: Sequence[Finding], acceptances: Iterable[Acceptance], reach: float
) -> tuple[Finding, ...]:
    """The findings in their order, each with the first acceptance that is about it and has not expired.

    Findings of ``stale-acceptance`` cannot be accepted. ``reach`` as from ``acceptance_reach``.
    """
    holding = [acceptance for acceptance in acceptances if not acceptance.expired and acceptance.rule != STALE]
    if not holding:
        return tuple(findings)
    index = AcceptanceIndex(holding, reach)
    return tuple(
        replace(finding, accepted=holding[about[0]]) if (about := index.about(finding)) else finding
        for finding in findings
    )


def stale_findings(
    findings: Sequence[Finding], acceptances: Sequence[Acceptance], reach: float, unit: LengthUnit
) -> Iterator[Finding]:
    """A finding for each acceptance that has expired, or is about none of these, which ``accept_findings`` returned."""
    index = AcceptanceIndex(acceptances, reach)
    met: dict[int, Finding] = {}
    left: dict[str, list[Finding]] = {}
    for finding in findings:
        met.update(dict.fromkeys(index.about(finding), finding))
        if finding.accepted is None:
            left.setdefault(finding.rule, []).append(finding)
    for number, acceptance in enumerate(acceptances):
        if acceptance.expired:
            yield _expired(acceptance, met.get(number))
        elif number not in met:
            yield _unmatched(acceptance, left.get(acceptance.rule, []), unit)


def _expired(acceptance: Acceptance, met: Finding | None) -> Finding:
    """``met`` is a finding that it was about, None where there is none any more."""
    day = "a day that is past" if acceptance.until is None else f"{acceptance.until:%Y-%m-%d}"
    remedy = "remove the entry"
    if met is None:
        now = "there is nothing left to accept"
    elif met.accepted is not None:
        now = "another entry accepts the finding now"
    else:
        now = "the finding counts again"
        remedy = "mend the drawing and remove the entry, or give it a later date"
    return _stale(acceptance, f"held until {day}; {now}", remedy)


def _unmatched(acceptance: Acceptance, left: Sequence[Finding], unit: LengthUnit) -> Finding:
    """``left`` are the findings of its rule that nobody accepted: one of them may have been meant."""
    if acceptance.rule == STALE:
        return _stale(
            acceptance,
            "has no effect: this rule cannot be accepted",
            "remove the entry, and correct the one it was to silence",
        )
    if not left:
        return _stale(acceptance, f"matches nothing: there is no {acceptance.rule} that counts", "remove the entry")
    remedy = "remove the entry, or correct it if that is what was meant"
    return _stale(acceptance, f"matches nothing: {_instead(acceptance, left, unit)}", remedy)


def _instead(acceptance: Acceptance, left: Sequence[Finding], unit: LengthUnit) -> str:
    """The finding that may have been meant: the nearest, or the first where a distance says nothing."""
    meant = acceptance.at
    placed = [finding.at for finding in left if finding.at is not None]
    if meant is not None and placed:
        nearest = min(placed, key=lambda at: abs(at - meant))
        return f"the nearest {acceptance.rule} is at {place(nearest)}, {length(abs(nearest - meant), unit)} away"
    return f"there is another {acceptance.rule}{_whereabouts(left[0])}"


def _whereabouts(finding: Finding) -> str:
    if finding.at is not None:
        return f" at {place(finding.at)}"
    return f" of handle {finding.handles[0]}" if finding.handles else " that concerns the whole drawing"


def _stale(acceptance: Acceptance, what: str, remedy: str) -> Finding:
    entry = f"{acceptance.where}: " if acceptance.where else ""
    return Finding(
        rule=STALE,
        severity="warning",
        message=f"{entry}the acceptance of {acceptance.rule}{_aim(acceptance.at, acceptance.handle)} "
        f"('{acceptance.reason}') {what}",
        remedy=remedy,
        at=acceptance.at,
    )


def _aim(at: Point | None, handle: str | None) -> str:
    """The place or the handle that an entry states."""
    if at is not None:
        return f" at {place(at)}"
    return f" of handle {handle}" if handle is not None else ""
