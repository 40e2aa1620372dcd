"""A finding: one thing a person should look at, with its place, its size and the remedy."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from dxfcheck.geometry import Point
from dxfcheck.settings import Acceptance

__all__ = ["SEVERITIES", "Finding", "Severity"]

Severity = Literal["error", "warning", "note"]
SEVERITIES: tuple[Severity, ...] = ("error", "warning", "note")
"""From the gravest down; the words are SARIF's levels."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Finding:
    """One finding. ``message`` says what and how much in one or two lines, ``remedy`` how to mend it.

    ``accepted`` is what an office accepted it by; such a finding is shown, but fails no run. None where it counts.
    """

    rule: str
    severity: Severity
    message: str
    remedy: str
    at: Point | None = None
    handles: tuple[str, ...] = ()
    layer: str | None = None
    mechanism: str | None = None
    accepted: Acceptance | None = None
