"""The poles of links as the crossing of two lines, as they are found on paper.

By Kennedy's theorem the pole of a link, that of a neighbour and the pole between the two (their common pin, a rolling
contact, for a slide infinitely far square to it) lie on one line (A.B.W. Kennedy, The Mechanics of Machinery, 1886;
J.J. Uicker, G.R. Pennock & J.E. Shigley, Theory of Machines and Mechanisms, ch. 3, from memory). Where too few
neighbours' poles are known by then, a line through a pin square to its velocity holds the pole as well.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from itertools import combinations
from typing import Literal

from dxfcheck.analysis.by_hand.solved_linkage import SolvedLinkage, acts_as
from dxfcheck.geometry import Point, cross, unit
from dxfcheck.linkage import Joint
from dxfcheck.tolerances.analysis import POLE_LINES_CROSS
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["PoleLine", "PoleWorking", "pole_workings"]

LINES_TRIED = 6
"""Of a link with more neighbours the first so many lines are looked at."""


@dataclass(frozen=True, slots=True, kw_only=True)
class PoleLine:
    """A line that holds a link's pole: through ``through`` along the unit vector ``direction``.

    'kennedy': through the pole of link ``link`` and their common place (pin ``pin``, or a rolling contact where that is
    None); 'slide': through that pole, square to their slide; 'translating': through the common place, square to the
    motion of ``link``, whose pole lies infinitely far; 'slot': through the pin, square to the slot on the frame;
    'contact': along the contact with the frame; 'velocity': through the pin, square to its velocity.
    """

    kind: Literal["kennedy", "slide", "translating", "slot", "contact", "velocity"]
    through: Point
    direction: Point
    link: int | None
    pin: int | None


@dataclass(frozen=True, slots=True, kw_only=True)
class PoleWorking:
    """How the pole of one link is found; links pinned to the frame have theirs there and are left out.

    ``case`` 'crossing': ``crossing`` is where the two ``lines`` meet, ``gap`` how far from the solution's pole. 'no
    crossing': too few lines cross clearly, and the pole lies a pin's speed over omega off it, square to its velocity.
    'resting pin': the link's ``pin`` has no speed. 'translates' and 'at rest': there is none.
    """

    link: int
    case: Literal["crossing", "no crossing", "resting pin", "translates", "at rest"]
    pole: Point | None
    pin: int | None = None
    lines: tuple[PoleLine, ...] = ()
    crossing: Point | None = None
    gap: float = 0.0


def pole_workings(solved: SolvedLinkage, links: Iterable[int], established: set[int]) -> Iterator[PoleWorking]:
    """The poles of these links; ``established`` are the links whose poles are known before, the frame among them.

    Links are taken in an order in which each one's neighbours come before it, as far as there is one. Cost the square
    of the number of links.
    """
    pinned = {link for link in links if _pinned_to_frame(solved, link)}
    known, waiting = established | pinned, [link for link in links if link not in pinned]
    while waiting:
        ready = (link for link in waiting if solved.pole(link) is None or _best(_kennedy_lines(solved, link, known)))
        link = next(ready, waiting[0])
        yield _pole_of(solved, link, list(_kennedy_lines(solved, link, known)))
        waiting.remove(link)
        known = known | {link}


def _pinned_to_frame(solved: SolvedLinkage, link: int) -> bool:
    joints = [solved.linkage.joints[number] for number in solved.joints_of[link]]
    return any(acts_as(joint) == "pin" and solved.linkage.frame in (joint.first, joint.second) for joint in joints)


def _pole_of(solved: SolvedLinkage, link: int, from_neighbours: list[PoleLine]) -> PoleWorking:
    pole = solved.pole(link)
    if pole is None:
        resting = abs(solved.references[link][1]) <= SHOWN_AS_ZERO * solved.fastest
        return PoleWorking(link=link, case="at rest" if resting else "translates", pole=None)
    resting_pin = _resting_pin(solved, link)
    if resting_pin is not None:
        return PoleWorking(link=link, case="resting pin", pole=pole, pin=resting_pin)
    lines = _best(from_neighbours) or _best([*from_neighbours, *_velocity_lines(solved, link, from_neighbours)])
    if lines is None:
        return PoleWorking(link=link, case="no crossing", pole=pole)
    crossing = _crossing(*lines)
    return PoleWorking(link=link, case="crossing", pole=pole, lines=lines, crossing=crossing, gap=abs(crossing - pole))


def _kennedy_lines(solved: SolvedLinkage, link: int, known: set[int]) -> Iterator[PoleLine]:
    """The lines that follow from neighbours whose poles are known."""
    for number in solved.joints_of[link]:
        joint = solved.linkage.joints[number]
        other = joint.second if joint.first == link else joint.first
        if other == solved.linkage.frame:
            yield from _line_on_frame(joint, other)
        elif other in known:
            yield from _line_from(solved, joint, other)


def _line_on_frame(joint: Joint, frame: int) -> Iterator[PoleLine]:
    """A pin in a slot of the frame moves along it; what rolls on the frame has no speed along the contact."""
    along = joint.direction or 0j
    if joint.kind == "pin in slot":
        yield PoleLine(kind="slot", through=joint.at, direction=1j * along, link=frame, pin=joint.pin)
    elif joint.kind == "rolling":
        yield PoleLine(kind="contact", through=joint.at, direction=along, link=frame, pin=None)


def _line_from(solved: SolvedLinkage, joint: Joint, other: int) -> Iterator[PoleLine]:
    """The line of a moving neighbour whose pole is known, or known to lie infinitely far."""
    kind, pole, noise = acts_as(joint), solved.pole(other), SHOWN_AS_ZERO * solved.reach
    if pole is None:
        velocity = solved.velocity(other, joint.at)
        if kind in ("pin", "rolling") and abs(velocity) > SHOWN_AS_ZERO * solved.fastest:
            square = 1j * unit(velocity)
            yield PoleLine(kind="translating", through=joint.at, direction=square, link=other, pin=joint.pin)
    elif kind == "slide":
        yield PoleLine(kind="slide", through=pole, direction=1j * (joint.direction or 0j), link=other, pin=None)
    elif kind in ("pin", "rolling") and abs(joint.at - pole) > noise:
        yield PoleLine(kind="kennedy", through=joint.at, direction=unit(joint.at - pole), link=other, pin=joint.pin)


def _resting_pin(solved: SolvedLinkage, link: int) -> int | None:
    """A pin of a turning link that has no speed: the pole is there."""
    noise = SHOWN_AS_ZERO * solved.fastest
    pins = solved.linkage.links[link].pins
    return next((pin for pin in pins if abs(solved.velocity(link, solved.linkage.pins[pin].at)) <= noise), None)


def _velocity_lines(solved: SolvedLinkage, link: int, found: list[PoleLine]) -> Iterator[PoleLine]:
    """The lines through a link's pins square to their velocities, but for pins that have a line already."""
    having = {line.pin for line in found}
    for pin in [pin for pin in solved.linkage.links[link].pins if pin not in having]:
        at = solved.linkage.pins[pin].at
        velocity = solved.velocity(link, at)
        if abs(velocity) > SHOWN_AS_ZERO * solved.fastest:
            yield PoleLine(kind="velocity", through=at, direction=1j * unit(velocity), link=None, pin=pin)


def _best(lines: Iterable[PoleLine]) -> tuple[PoleLine, PoleLine] | None:
    """The two lines that cross most squarely; None where none cross clearly."""
    pairs = combinations(list(lines)[:LINES_TRIED], 2)
    best = max(pairs, key=lambda pair: abs(cross(pair[0].direction, pair[1].direction)), default=None)
    if best is None or abs(cross(best[0].direction, best[1].direction)) < POLE_LINES_CROSS:
        return None
    return best


def _crossing(one: PoleLine, other: PoleLine) -> Point:
    """Where two lines cross: through + s direction, s by the cross product with the other's direction."""
    share = cross(other.through - one.through, other.direction) / cross(one.direction, other.direction)
    return one.through + share * one.direction
