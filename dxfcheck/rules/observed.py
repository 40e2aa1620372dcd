"""From what the reading observed to findings: the words that such rules have in common."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.reading.reading import Observation
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length

__all__ = ["at_pin", "figured", "finding", "observed"]


def observed(subject: RuleSubject, kind: str) -> Iterator[Observation]:
    """The observations that are for the rule of that name."""
    return (each for each in subject.reading.observations if each.kind == kind)


def finding(seen: Observation, severity: Severity, message: str, remedy: str) -> Finding:
    """A finding at the place of an observation; the observation's own severity, if any, overrides the given one."""
    return Finding(
        rule=seen.kind,
        severity=seen.severity or severity,
        message=message,
        remedy=remedy,
        at=seen.at,
        handles=seen.handles,
        layer=seen.layer,
        mechanism=seen.mechanism,
    )


def figured(seen: Observation, unit: LengthUnit) -> str:
    """The detail with its figure filled in, and behind it the limit that it is beyond.

    The figure has no sign: the words say which way it lies.
    """
    amount = abs(seen.amount or 0.0)
    limit = f" (limit {length(seen.limit, unit)})" if seen.limit is not None and amount > seen.limit else ""
    return seen.detail.replace("{amount}", f"{length(amount, unit)}{limit}")


def at_pin(seen: Observation) -> str:
    """What begins a message about a pin; nothing where the pin has no name."""
    return f"at pin {seen.subject}: " if seen.subject else ""
