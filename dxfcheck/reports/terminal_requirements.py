"""What a mechanism is held against, on the terminal: one line for a check, each with its figures for a reviewer."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Sequence

from dxfcheck.reports.terminal_layout import figure, listed
from dxfcheck.reports.terminal_motion import turns_a_minute
from dxfcheck.requirements.verdict import Outcome, Verdict
from dxfcheck.tolerances.sheet import PLACES_NAMED

__all__ = ["requirement_facts", "requirements_line"]

UNCERTAIN: tuple[Outcome, ...] = ("not known", "not judged")


def requirements_line(verdicts: Sequence[Verdict]) -> str:
    """'3 of 4 kept; broken: pin-speed of C'; what gives way to something stated elsewhere is not counted."""
    held = [each for each in verdicts if not each.superseded]
    outcomes = Counter(each.outcome for each in held)
    line = f"{outcomes['kept']} of {len(held)} limits and expectations kept"
    broken = list(dict.fromkeys(_about(each) for each in held if each.outcome == "broken"))
    line += f"; broken: {listed(broken)}" if broken else ""
    return line + "".join(f"; {outcomes[each]} {each}" for each in UNCERTAIN if outcomes[each])


def requirement_facts(verdicts: Sequence[Verdict], unit: str) -> Iterator[tuple[str, str, list[str]]]:
    """Each stated text, where it stands, and of each part that it is about the figure found and what became of it."""
    by_text: dict[tuple[str, str], list[Verdict]] = {}
    for verdict in verdicts:
        by_text.setdefault((verdict.requirement.stated, verdict.requirement.where), []).append(verdict)
    for (stated, where), own in by_text.items():
        facts = [_fact(each, unit) for each in own[:PLACES_NAMED]]
        left = own[PLACES_NAMED:]
        outcomes = Counter(each.outcome for each in left)
        more = [f"{len(left)} more: {', '.join(f'{count} {outcome}' for outcome, count in outcomes.items())}"]
        yield stated, where, [*facts, *(more if left else [])]


def _fact(verdict: Verdict, unit: str) -> str:
    found = "?" if verdict.actual is None else _figure(verdict, verdict.actual, unit)
    bounds = verdict.bounds
    ends = [None if each is None else _figure(verdict, each, unit) for each in bounds]
    if verdict.quantity == "mobility":
        held = f"expected {ends[2]}"
    elif ends[0] is not None and ends[1] is not None:
        held = f"from {ends[0]} to {ends[1]}"
    else:
        held = f"at most {ends[1]}" if ends[1] is not None else f"at least {ends[0]}"
    why = f" ({verdict.why})" if verdict.why else ""
    return f"{_about(verdict)}: {found}, {held}: {verdict.outcome}{why}"


def _about(verdict: Verdict) -> str:
    """'pin-speed of C', 'speed-ratio of C-D to A-B'."""
    if verdict.quantity == "mobility":
        return "mobility"
    if verdict.quantity == "rubbing-speed":
        return f"rubbing-speed of {verdict.against} at {verdict.subject}"
    joined = " to " if verdict.quantity == "speed-ratio" else " against "
    return f"{verdict.quantity} of {verdict.subject}" + (f"{joined}{verdict.against}" if verdict.against else "")


def _figure(verdict: Verdict, value: float, unit: str) -> str:
    if verdict.quantity in {"mobility", "speed-ratio"}:
        return figure(value)
    if verdict.quantity == "link-speed":
        return f"{figure(value)} rad/s ({figure(turns_a_minute(value))} r/min)"
    return f"{figure(value)} {unit}/s"
