"""The velocity equations of one step of the solution, as sums of terms a person would write down.

Within a step every link hangs on the known ones by one chain of joints; the joints left over close the chains: there
the velocities along both must agree. Along a chain stand the known velocity it starts from, omega x r for each link
that turns (r from the pin where it joins to the next place) and a speed along each slide. All values are those of the
solution; nothing is solved here.
"""

from __future__ import annotations

from collections import deque
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal, NamedTuple

from dxfcheck.analysis.by_hand.solution_order import SolutionStep
from dxfcheck.analysis.by_hand.solved_linkage import SolvedLinkage, acts_as
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage

__all__ = ["Chain", "Hanging", "Term", "TermKind", "hang"]

TermKind = Literal["known", "turn", "slide", "normal"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Term:
    """One vector of a chain, length units a second: ``factor`` times ``value``.

    'known': the velocity at place ``end`` of known link ``number``. 'turn': omega (``value``, rad/s) of link ``number``
    times r from ``start`` to ``end``, turned by 90 degrees. 'slide': the speed ``value`` along joint ``number``.
    'normal': the speed across the contact of rolling joint ``number``, which its carriers keep at zero.
    ``given`` says that a drive states the value, or that it is known from before.
    """

    kind: TermKind
    number: int
    factor: Point
    value: float
    given: bool
    end: Point
    start: Point | None = None

    @property
    def vector(self) -> Point:
        """What it adds to the velocity."""
        return self.factor * self.value


Chain = tuple[Term, ...]
"""The terms from a known link to a place, in that order; their vectors sum to the velocity there."""


class _Edge(NamedTuple):
    """How a link hangs on another: the joint's number and the link nearer to the known ones."""

    joint: int
    parent: int


@dataclass(frozen=True, slots=True)
class Hanging:
    """A step's links, each hung on a known one; ``closing`` are the joints left over, ``driven`` what drives state.

    ``driven`` holds ('turn', link) and ('slide', joint).
    """

    solved: SolvedLinkage
    edges: dict[int, _Edge]
    closing: tuple[int, ...]
    driven: frozenset[tuple[str, int]]
    unused: tuple[int, ...]

    def carrier_of_turn(self, link: int) -> int | None:
        """The link of the step whose turning this one shares through slides; None where that is a known link's."""
        while link in self.edges:
            edge = self.edges[link]
            if acts_as(self.solved.linkage.joints[edge.joint]) != "slide":
                return link
            link = edge.parent
        return None

    def chain(self, link: int, place: Point) -> Chain:
        """The terms of the velocity that a link has at a place."""
        terms: list[Term] = []
        while link in self.edges:
            edge = self.edges[link]
            joint = self.solved.linkage.joints[edge.joint]
            kind = acts_as(joint)
            if kind != "slide":
                terms.append(self._turning(link, joint.at, place))
                place = joint.at
            if kind in ("slide", "pin in slot"):
                terms.append(self.sliding(edge.joint, place, onto=link))
            elif kind == "rolling":
                across = 1j * (joint.direction or 0j)
                terms.append(Term(kind="normal", number=edge.joint, factor=across, value=0.0, given=False, end=place))
            link = edge.parent
        velocity = self.solved.velocity(link, place)
        terms.append(Term(kind="known", number=link, factor=velocity, value=1.0, given=True, end=place))
        return tuple(reversed(terms))

    def _turning(self, link: int, start: Point, end: Point) -> Term:
        return Term(
            kind="turn",
            number=link,
            factor=1j * (end - start),
            value=self.solved.turns[link],
            given=("turn", link) in self.driven,
            end=end,
            start=start,
        )

    def sliding(self, number: int, place: Point, *, onto: int) -> Term:
        """The speed along a slide or slot of the link ``onto`` against the joint's other link."""
        joint = self.solved.linkage.joints[number]
        along = joint.direction or 0j
        return Term(
            kind="slide",
            number=number,
            factor=along if onto == joint.second else -along,
            value=self.solved.analysis.joints[number].slide_speed or 0.0,
            given=("slide", number) in self.driven,
            end=place,
        )


def hang(solved: SolvedLinkage, step: SolutionStep) -> Hanging:
    """The links of a step hung on the known ones.

    Slides come first, so that what slides shares a turning; then pins on the frame, pins on other known links, pins
    within the step; half joints last.
    """
    members, linkage = set(step.links), solved.linkage
    edges, closing = _tree(linkage, members, sorted(step.joints, key=lambda number: _rank(linkage, members, number)))
    hanging = Hanging(solved, edges, tuple(sorted(closing)), frozenset(), ())
    driven, unused = set(), []
    for number in step.drives:
        found = _driven(hanging, number)
        if found is None or found in driven:
            unused.append(number)
        else:
            driven.add(found)
    return Hanging(solved, edges, hanging.closing, frozenset(driven), tuple(unused))


def _rank(linkage: Linkage, members: set[int], number: int) -> tuple[int, int]:
    joint = linkage.joints[number]
    kind = acts_as(joint)
    if kind != "pin":
        return {"slide": 0, "pin in slot": 4, "rolling": 5}[kind], number
    if linkage.frame in (joint.first, joint.second):
        return 1, number
    return 3 if joint.first in members and joint.second in members else 2, number


def _tree(linkage: Linkage, members: set[int], order: Sequence[int]) -> tuple[dict[int, _Edge], list[int]]:
    """Each member's joint towards the known links, and the joints that are not needed for it."""
    known = -1
    root = {link: link for link in members} | {known: known}

    def top(link: int) -> int:
        while root[link] != link:
            root[link] = root[root[link]]
            link = root[link]
        return link

    chosen: dict[int, list[tuple[int, int]]] = {}
    closing = []
    for number in order:
        ends = linkage.joints[number].first, linkage.joints[number].second
        tops = [top(link if link in members else known) for link in ends]
        if tops[0] == tops[1]:
            closing.append(number)
            continue
        root[tops[0]] = tops[1]
        for link, other in (ends, ends[::-1]):
            chosen.setdefault(link, []).append((number, other))
    return dict(_outward(members, chosen)), closing


def _outward(members: set[int], chosen: dict[int, list[tuple[int, int]]]) -> Iterator[tuple[int, _Edge]]:
    """The edges of the tree, from the known links outward."""
    waiting = deque(link for link in chosen if link not in members)
    seen = set(waiting)
    while waiting:
        link = waiting.popleft()
        for number, other in chosen[link]:
            if other in members and other not in seen:
                seen.add(other)
                waiting.append(other)
                yield other, _Edge(number, link)


def _driven(hanging: Hanging, number: int) -> tuple[str, int] | None:
    """The unknown whose value a drive states outright; None where it only relates two of the step's unknowns."""
    drive = hanging.solved.linkage.drives[number]
    if drive.kind == "slide":
        used = any(edge.joint == drive.joint for edge in hanging.edges.values())
        return ("slide", drive.joint) if used and drive.joint is not None else None
    carriers = [hanging.carrier_of_turn(link) for link in (drive.link, drive.against)]
    if carriers.count(None) != 1:
        return None
    return "turn", next(carrier for carrier in carriers if carrier is not None)
