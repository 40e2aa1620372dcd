"""What became of a limit or an expectation."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.settings import Quantity, Requirement

__all__ = ["Bounds", "Judged", "Outcome", "Unmatched", "Verdict"]

Outcome = Literal["kept", "broken", "not known", "not judged"]
"""'not known': the speed is not settled at this pose; 'not judged': every speed is a ratio to an assumed drive, or
something stated elsewhere takes the place of the requirement."""


class Bounds(NamedTuple):
    """Least, greatest and expected figure, as ``Verdict.actual`` is given; None where nothing bounds it."""

    least: float | None
    greatest: float | None
    expected: float | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Verdict:
    """One requirement held against one part of a mechanism.

    ``subject`` is the part as the report names it ('C', 'C-D', 'block at C'); ``against`` the link that it is taken
    against, where that is not the frame. ``actual`` and ``bounds`` are in the drawing's unit a second, rad/s, or plain
    for a ratio or a mobility; ``actual`` is signed for turning, sliding and ratios, None where it is not known. ``why``
    says why it was not judged or is not known. ``unit_assumed`` marks figures taken as the drawing's own unit.
    ``superseded`` marks what gives way to something stated elsewhere.
    """

    requirement: Requirement
    mechanism: str
    quantity: Quantity
    subject: str
    outcome: Outcome
    bounds: Bounds
    against: str = ""
    actual: float | None = None
    why: str = ""
    at: Point | None = None
    handles: tuple[str, ...] = ()
    layer: str | None = None
    unit_assumed: bool = False
    superseded: bool = False


class Unmatched(NamedTuple):
    """A requirement of the settings that no part of any mechanism answers to, and why."""

    requirement: Requirement
    why: str
    is_pattern: bool


@dataclass(frozen=True, slots=True)
class Judged:
    """All verdicts of a drawing, by mechanism, and what answered to nothing."""

    verdicts: tuple[Verdict, ...] = ()
    unmatched: tuple[Unmatched, ...] = ()
