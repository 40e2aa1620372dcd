"""From what the reading observed to findings: the words that such rules have in common."""

from __future__ import annotations

import math
from collections.abc import Iterator

from dxfcheck.drawing.primitives import LengthUnit, Ring
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.roles import frame_reason
from dxfcheck.reading.reading import Observation
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length
from dxfcheck.tolerances.findings import SNAP_OF_COINCIDENCE

__all__ = ["at_pin", "figured", "finding", "moved", "observed", "of_linkages", "snap_place"]


def observed(subject: RuleSubject, kind: str) -> Iterator[Observation]:
    """The observations that are for the rule of that name."""
    return (each for each in subject.reading.observations if each.kind == kind)


def of_linkages(subject: RuleSubject, kind: str) -> Iterator[Observation]:
    """The same, but none on a sheet that neither holds a linkage nor shows that one was meant.

    House plans, cut parts and wiring hold rings, rectangles and tangent circles as well, and nothing there is meant to
    meet as links do; no-linkage says what of that was seen.
    """
    return observed(subject, kind) if subject.mechanisms or _is_meant(subject) else iter(())


def _is_meant(subject: RuleSubject) -> bool:
    """Whether drives, frame pins or requirements are stated, on the sheet or elsewhere, or a ring lies on the frame."""
    settings = subject.settings
    if settings.drives or settings.settings_drives or settings.frame_pins:
        return True
    if any(each.kind in SIGNS for each in subject.reading.observations):
        return True
    rings = (each for each in subject.sketch.primitives if isinstance(each, Ring))
    return any(frame_reason(ring.source, settings.layers) is not None for ring in rings)


SIGNS = frozenset({"unknown-drive", "unknown-frame-pin", "unknown-requirement"})
"""What is told of statements that fit nothing on the sheet."""


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


def snap_place(at: Point, tolerance: float) -> str:
    """Coordinates with as many decimals as it takes to meet within the tolerance when they are typed."""
    step = SNAP_OF_COINCIDENCE * tolerance
    decimals = max(0, math.ceil(-math.log10(step))) if step > 0.0 else 0
    return f"({_typed(at.real, decimals)}, {_typed(at.imag, decimals)})"


def _typed(figure: float, decimals: int) -> str:
    text = f"{figure:.{decimals}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return "0" if text == "-0" else text


def moved(seen: Observation, what: str, tolerance: float) -> str:
    """'move the end from (x, y) to (x, y)', or to where it ought to lie in words, where the place is not known."""
    if seen.at is None or seen.snap is None:
        return f"move {what} onto it"
    return f"move {what} from {snap_place(seen.at, tolerance)} to {snap_place(seen.snap, tolerance)}"
