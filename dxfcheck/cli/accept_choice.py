"""Which findings of a drawing a user means to accept, and the entries of a settings file that accept them."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from dxfcheck.cli.accept_arguments import AcceptRequest
from dxfcheck.errors import OptionInvalid
from dxfcheck.reports.terminal_layout import listed
from dxfcheck.rules.acceptance_index import AcceptanceIndex
from dxfcheck.rules.acceptances import STALE
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.wording import place
from dxfcheck.settings import Acceptance

__all__ = ["Entry", "chosen_findings", "entries_for"]


class Entry(NamedTuple):
    """One acceptance to be written, and the findings it is for."""

    acceptance: Acceptance
    findings: tuple[Finding, ...]


def chosen_findings(findings: Sequence[Finding], request: AcceptRequest, reach: float) -> tuple[Finding, ...]:
    """The findings that the request means and that nobody accepted yet.

    Without a rule, place or handle every error and warning; a note only where its rule is named. ``reach`` is how far
    from a stated place they may lie, in the drawing's unit. OptionInvalid where what was named is not there.
    """
    acceptable = [finding for finding in findings if finding.rule != STALE]
    named = [finding for finding in acceptable if _is_named(finding, request, reach)]
    narrowed = not (request.rule is None and request.at is None and request.handle is None)
    if narrowed and not named:
        msg = f"{request.path}: {_not_there(acceptable, request)}"
        raise OptionInvalid(msg)
    meant = [finding for finding in named if request.rule is not None or finding.severity != "note"]
    if narrowed and not meant:
        rules = listed(sorted({finding.rule for finding in named}))
        msg = f"{request.path}: only notes are there ({rules}); name the rule with --rule to accept one"
        raise OptionInvalid(msg)
    return tuple(finding for finding in meant if finding.accepted is None)


def _is_named(finding: Finding, request: AcceptRequest, reach: float) -> bool:
    if request.rule is not None and finding.rule != request.rule:
        return False
    if request.at is not None and not _is_at(finding, request.at, reach):
        return False
    return request.handle is None or request.handle in [handle.upper() for handle in finding.handles]


def _is_at(finding: Finding, at: complex, reach: float) -> bool:
    """Whether a finding lies at a place, or the report shows it there."""
    return finding.at is not None and (abs(finding.at - at) <= reach or place(finding.at) == place(at))


def _not_there(findings: Sequence[Finding], request: AcceptRequest) -> str:
    """What was looked for in vain, and what there is instead."""
    rule = request.rule or "finding"
    handle = "" if request.handle is None else f" of handle {request.handle}"
    at = request.at
    if at is None:
        return f"there is no {rule}{handle}; 'dxfcheck check' shows what there is"
    others = [finding for finding in findings if request.rule is None or finding.rule == request.rule]
    placed = [(abs(finding.at - at), finding.at, finding.rule) for finding in others if finding.at is not None]
    missing = f"there is no {rule}{handle} at {place(at)}"
    if not placed:
        return f"{missing}; 'dxfcheck check' shows what there is"
    _, nearest, name = min(placed, key=lambda each: each[0])
    return f"{missing}; the nearest {name} is at ({nearest.real:.10g}, {nearest.imag:.10g})"


def entries_for(findings: Sequence[Finding], request: AcceptRequest, reach: float) -> tuple[Entry, ...]:
    """The entries that accept these findings: one for those of a rule at one place, in the order of the findings."""
    index = AcceptanceIndex((), reach)
    entries: list[tuple[Acceptance, list[Finding]]] = []
    for finding in findings:
        about = index.about(finding)
        if about:
            entries[about[0]][1].append(finding)
        else:
            acceptance = _acceptance(finding, request)
            index.add(acceptance)
            entries.append((acceptance, [finding]))
    return tuple(Entry(acceptance, tuple(covered)) for acceptance, covered in entries)


def _acceptance(finding: Finding, request: AcceptRequest) -> Acceptance:
    """By the place, which outlives a new export; else by the first entity, which has the same handle in most."""
    by_handle = finding.at is None and finding.handles
    return Acceptance(
        rule=finding.rule,
        reason=request.reason,
        at=finding.at,
        handle=finding.handles[0] if by_handle else None,
        until=request.until,
    )
