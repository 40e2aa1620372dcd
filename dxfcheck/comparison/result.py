"""What changed between two drawings as a mechanism: frozen results.

Lengths and places are in the new drawing's unit, speeds in that unit a second or rad/s. Mechanisms, links and pins go
by their names in the new drawing, in the old one where they are gone. What is not known is None.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal, NamedTuple

from dxfcheck.analysis.results import Mobility
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.geometry import Point
from dxfcheck.inspection import DrawingReport
from dxfcheck.rules.finding import Finding

__all__ = [
    "Change",
    "Comparison",
    "DriveChange",
    "FigureChange",
    "MechanismChange",
    "PartChange",
    "PinMove",
    "SpeedChange",
    "SpeedQuantity",
    "StatedDrive",
]

Change = Literal["added", "gone", "changed"]
SpeedQuantity = Literal["turning", "pin speed", "sliding", "rubbing"]


class FigureChange(NamedTuple):
    """A length of a link (between two of its pins), or a ring's radius, in both drawings."""

    subject: str
    between: tuple[str, str]
    old: float
    new: float

    @property
    def difference(self) -> float:
        """New less old."""
        return self.new - self.old

    @property
    def percent(self) -> float | None:
        """The difference over the old figure; None where that is 0."""
        return 100.0 * self.difference / abs(self.old) if self.old else None


class PinMove(NamedTuple):
    """A pin, or a joint without one, that lies elsewhere once the motion of the sheet is taken out.

    ``old`` is where it would lie on the new sheet had it not moved. ``is_pin`` is False for a joint without a pin.
    """

    subject: str
    old: Point
    new: Point
    is_pin: bool = True

    @property
    def by(self) -> Point:
        """How far it moved, as dx + i dy on the new sheet."""
        return self.new - self.old


class SpeedChange(NamedTuple):
    """A speed in both drawings; None is not known in that one.

    Turning is rad/s and signed as on the new sheet, sliding signed along the joint's direction there, pin speed and
    rubbing are sizes. ``percent`` is of the old speed, None where that is 0 or either is not known. ``beyond`` says
    that the change is more than allowed.
    """

    quantity: SpeedQuantity
    subject: str
    old: float | None
    new: float | None
    beyond: bool
    old_velocity: Point | None = None
    new_velocity: Point | None = None

    @property
    def percent(self) -> float | None:
        """The change as a part of the old speed."""
        if self.old is None or self.new is None or self.old == 0:
            return None
        return 100.0 * (self.new - self.old) / abs(self.old)


class PartChange(NamedTuple):
    """Something added, gone or made otherwise: ``what`` is its kind, ``detail`` a phrase on what it is now."""

    what: Literal["link", "pin", "joint", "mechanism"]
    change: Change
    subject: str
    detail: str = ""
    at: Point | None = None


class StatedDrive(NamedTuple):
    """A drive as it stands in one drawing; ``rate`` in rad/s or the new drawing's unit a second."""

    rate: float
    source: str
    stated: str


class DriveChange(NamedTuple):
    """A drive that is otherwise; ``old`` or ``new`` is None where there is none.

    ``beyond`` says that its rate changed by more than allowed, or that it is there in one drawing only.
    """

    subject: str
    kind: Literal["turn", "slide"]
    old: StatedDrive | None
    new: StatedDrive | None
    beyond: bool


@dataclass(frozen=True, slots=True, kw_only=True)
class MechanismChange:
    """One mechanism that is in both drawings, and what changed in it; nothing did where ``changed`` is False.

    ``placed`` is its own motion where it lies elsewhere on the sheet than the others. ``reversed_motion``: it runs the
    other way; where the sheet is ``mirrored``, than its mirror image would. ``ratio_to`` names what the speeds are
    ratios to, where both drawings leave the drive to be assumed. ``renamed`` are pairs of old and new pin names.
    ``within`` are speeds that changed by no more than allowed, of ``speeds_compared``.
    """

    old_name: str
    new_name: str
    placed: SheetMotion | None
    old_mobility: Mobility
    new_mobility: Mobility
    parts: tuple[PartChange, ...] = ()
    moved: tuple[PinMove, ...] = ()
    lengths: tuple[FigureChange, ...] = ()
    radii: tuple[FigureChange, ...] = ()
    turned: tuple[FigureChange, ...] = ()
    drives: tuple[DriveChange, ...] = ()
    speeds: tuple[SpeedChange, ...] = ()
    within: tuple[SpeedChange, ...] = ()
    speeds_compared: int = 0
    reversed_motion: bool = False
    mirrored: bool = False
    ratio_to: str = ""
    renamed: tuple[tuple[str, str], ...] = ()

    @property
    def mobility_changed(self) -> bool:
        """Another count, or another freedom at the pose."""
        before, after = self.old_mobility, self.new_mobility
        return (before.count, before.at_pose) != (after.count, after.at_pose)

    @property
    def changed(self) -> bool:
        """Whether it is another mechanism than before, be it by less than what is allowed for speeds."""
        return bool(
            self.mobility_changed
            or self.parts
            or self.moved
            or self.lengths
            or self.turned
            or self.speeds
            or self.turned_round
            or any(drive.beyond for drive in self.drives)
        )

    @property
    def turned_round(self) -> bool:
        """It runs the other way, and not only because mirroring leaves the sense that a note states as it is."""
        return self.reversed_motion and not self.mirrored

    @property
    def other_pose(self) -> bool:
        """The same links, of the same lengths, drawn at another pose."""
        return bool(self.moved) and not (self.parts or self.lengths)

    @property
    def beyond(self) -> bool:
        """Whether mobility, structure or any speed changed by more than allowed."""
        return bool(
            self.mobility_changed
            or any(part.what != "pin" for part in self.parts)
            or self.speeds
            or self.turned_round
            or any(drive.beyond for drive in self.drives)
        )


@dataclass(frozen=True, slots=True, kw_only=True)
class Comparison:
    """Two drawings compared. ``allow`` is per cent of a speed.

    ``motion`` lays the old sheet on the new one. ``unit`` is the length unit of every figure, ``unit_note`` what has
    to be said of it ('' where both drawings have it). ``tolerance`` is how far apart places and lengths may be and
    still count as equal, and ``rounded`` names the drawing whose coordinates are rounded to COMPARED_DIGITS ('').
    """

    old: DrawingReport
    new: DrawingReport
    allow: float
    motion: SheetMotion
    unit: str
    unit_note: str = ""
    tolerance: float
    rounded: str = ""
    mechanisms: tuple[MechanismChange, ...] = ()
    parts: tuple[PartChange, ...] = ()
    new_findings: tuple[Finding, ...] = field(default=())
    cured_findings: tuple[Finding, ...] = field(default=())

    @property
    def changed(self) -> bool:
        """Whether anything changed as a mechanism; where and how it is drawn does not count."""
        return bool(self.parts) or self.motion.scale != 1.0 or any(each.changed for each in self.mechanisms)

    @property
    def beyond(self) -> bool:
        """Whether mobility, structure or any speed changed by more than allowed."""
        return bool(self.parts) or any(each.beyond for each in self.mechanisms)
