"""What a user or an office states: how drawings are to be read, what they are held against, what was accepted.

Settings come from options, from a settings file, or from Python. The program's own limits are in ``tolerances``.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date
from typing import Literal, NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.tolerances.findings import DOUBTFUL_SPEED_RELATIVE, LOW_TRANSMISSION_DEGREES
from dxfcheck.tolerances.linework import CONSTRUCTION_LAYERS, FRAME_NAMES, PITCH_LAYERS

__all__ = ["Acceptance", "Figure", "LayerRoles", "Quantity", "Requirement", "RuleWeight", "Settings"]

Quantity = Literal["pin-speed", "slide-speed", "rubbing-speed", "link-speed", "speed-ratio", "mobility"]
"""What a requirement is about. A limit on one of them is judged by the rule of that name."""

RuleWeight = Literal["error", "warning", "note", "off"]
"""What findings of a rule shall weigh, or that the rule is not applied."""


class Figure(NamedTuple):
    """A stated figure: m/s for a speed along, rad/s (counter-clockwise positive) for turning, a plain number else.

    ``written`` is the figure a second as it stands in the text, for a drawing that has no length unit.
    """

    amount: float
    written: float


@dataclass(frozen=True, slots=True, kw_only=True)
class Requirement:
    """One thing a mechanism is held against: a limit, an expected speed or ratio, an expected mobility.

    ``subject`` is the name of a pin, link or block, or a pattern of names ('*' for every one); '' for the mobility.
    ``against`` names the link that a ratio or a relative speed is taken to, '' for the frame. ``least`` and
    ``greatest`` bound it, None where it is not bounded. ``expected`` is the figure that was stated, where there is
    one; the bounds then are how far off it may be. Where ``signed`` is False the size is held against the bounds.
    One without any figure lifts what others state of its subject.
    ``stated`` is the text as written, ``where`` the file and line it stands in ('' for an option or a note).
    ``mechanism`` is the one that a note belongs to; '' for every one that has such a subject.
    """

    quantity: Quantity
    subject: str = ""
    against: str = ""
    least: Figure | None = None
    greatest: Figure | None = None
    expected: Figure | None = None
    signed: bool = False
    stated: str = ""
    source: Literal["option", "settings", "note"] = "settings"
    where: str = ""
    at: Point | None = None
    handles: tuple[str, ...] = ()
    mechanism: str = ""

    @property
    def lifts(self) -> bool:
        """Whether it bounds nothing, and so takes back what others state of its subject."""
        return self.least is None and self.greatest is None and self.expected is None


@dataclass(frozen=True, slots=True, kw_only=True)
class Acceptance:
    """A finding that an office accepts: it is shown as such and fails no run.

    ``at`` is the finding's place in the drawing's unit and ``handle`` one of its entities; where neither is stated,
    only findings that have neither match. ``until`` is the last day it holds; ``expired`` says that this day is past.
    ``where`` is the file and line it stands in.
    """

    rule: str
    reason: str
    at: Point | None = None
    handle: str | None = None
    until: date | None = None
    expired: bool = False
    where: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class LayerRoles:
    """Patterns (globs, without case) of the layers that say what is on them: reading rules 1, 5 and 6.

    ``frame`` names blocks as well.
    """

    frame: tuple[str, ...] = FRAME_NAMES
    pitch: tuple[str, ...] = PITCH_LAYERS
    construction: tuple[str, ...] = CONSTRUCTION_LAYERS


@dataclass(frozen=True, slots=True, kw_only=True)
class Settings:
    """What the user stated; the defaults state nothing. Lengths are in the drawing's unit.

    ``unit`` overrides the drawing's own unit. ``tolerance`` is the coincidence tolerance t; None takes
    COINCIDENCE_OF_DIAGONAL of the sketch's diagonal. ``drives`` are texts such as 'A-B = 10 rad/s ccw' of options,
    ``settings_drives`` those of a settings file, which stand behind them; ``frame_pins`` pin names that are fixed.
    ``part_blocks`` are patterns (globs, without case) of names of blocks: each reference to one is one rigid link.
    ``transmission_angle`` is the least transmission angle that is not pointed out, degrees; ``doubtful_speed`` the part
    of a speed beyond which what it may be off by is pointed out. ``rule_weights`` are rules with the weight they shall
    have. ``files`` are the settings files that had a say.
    """

    unit: str | None = None
    unit_source: Literal["option", "settings"] = "option"
    tolerance: float | None = None
    drives: tuple[str, ...] = ()
    settings_drives: tuple[str, ...] = ()
    frame_pins: tuple[str, ...] = ()
    part_blocks: tuple[str, ...] = ()
    layers: LayerRoles = field(default_factory=LayerRoles)
    expected_mobility: int | None = None
    requirements: tuple[Requirement, ...] = ()
    transmission_angle: float = LOW_TRANSMISSION_DEGREES
    doubtful_speed: float = DOUBTFUL_SPEED_RELATIVE
    rule_weights: tuple[tuple[str, RuleWeight], ...] = ()
    acceptances: tuple[Acceptance, ...] = ()
    files: tuple[str, ...] = ()
