"""How one step of the solution closes: nothing to find, one size along a line, a triangle, or equations at once.

Where two sizes are sought along known directions the vectors form a triangle, and the sine rule gives them; otherwise
the joints that close the chains give linear equations. Every figure is the solution's own, put into them.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from typing import Literal, NamedTuple

from dxfcheck.analysis.by_hand.closure import Chain, Hanging, Term
from dxfcheck.analysis.by_hand.solved_linkage import SolvedLinkage, acts_as
from dxfcheck.geometry import Point, cross, dot
from dxfcheck.linkage import Joint
from dxfcheck.tolerances.analysis import FLAT_TRIANGLE, WORKING_UNKNOWNS
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["Closing", "Equation", "StepForm", "Triangle", "Unknown", "close"]

StepForm = Literal["given", "line", "triangle", "equations"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Triangle:
    """Three velocities that sum to zero: the known side, then the two sought, length units a second.

    ``angles`` are those opposite to each, radians; ``ratios`` each side's size over the sine of its angle, equal by the
    sine rule. Both are None where the three lie along one line, or where a side has no length.
    """

    sides: tuple[Point, Point, Point]
    angles: tuple[float, float, float] | None
    ratios: tuple[float, float, float] | None


class Unknown(NamedTuple):
    """What is sought, and its value: 'turn' of a link (rad/s), 'slide' or 'normal' speed at a joint.

    ``link`` is the link that turns, or the one whose speed against the joint's other link it is.
    """

    kind: str
    number: int
    value: float
    link: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Equation:
    """The sum of ``cells`` times the unknowns equals ``right``; ``gap`` is by how much it does not.

    It states that two links agree at ``joint`` along ``axis`` (length units a second), or in their turning where that
    is None (rad/s); or, where ``joint`` is None, that ``drive`` holds.
    """

    joint: int | None
    drive: int | None
    axis: Point | None
    cells: tuple[float, ...]
    right: float
    gap: float


@dataclass(frozen=True, slots=True, kw_only=True)
class Closing:
    """What is sought in a step and what settles it.

    'given': drives and known links state all. 'line' and 'triangle': the two ``chains`` are equal where they meet, at
    ``joint``, with one or two unknowns. 'equations': in all other cases; of more unknowns than WORKING_UNKNOWNS they
    are not ``written_out``. ``gap`` is the greatest closing error, length units a second (a turning's taken at the
    linkage's own size).
    """

    form: StepForm
    unknowns: tuple[Unknown, ...]
    joint: int | None = None
    chains: tuple[Chain, Chain] | None = None
    triangle: Triangle | None = None
    equations: tuple[Equation, ...] = ()
    gap: float = 0.0
    written_out: bool = True


def close(hanging: Hanging) -> Closing:
    """The closing of a hung step. What lies below SHOWN_AS_ZERO of the greatest speed has no length."""
    unknowns = _unknowns(hanging)
    if len(hanging.closing) == 1 and not hanging.unused:
        simple = _simple(hanging, hanging.closing[0], unknowns, SHOWN_AS_ZERO * hanging.solved.fastest)
        if simple is not None:
            return simple
    if len(unknowns) > WORKING_UNKNOWNS:
        gap = max([_joint_gap(hanging.solved, number) for number in hanging.closing], default=0.0)
        return Closing(form="equations", unknowns=unknowns, gap=gap, written_out=False)
    equations = tuple(_equations(hanging, unknowns))
    gaps = [each.gap * (hanging.solved.reach if each.axis is None else 1.0) for each in equations]
    form: StepForm = "equations" if unknowns else "given"
    return Closing(form=form, unknowns=unknowns, equations=equations, gap=max(gaps, default=0.0))


def _joint_gap(solved: SolvedLinkage, number: int) -> float:
    """By how much the two links of a joint differ in what it holds."""
    joint = solved.linkage.joints[number]
    relative = solved.velocity(joint.second, joint.at) - solved.velocity(joint.first, joint.at)
    turning = abs(solved.turns[joint.second] - solved.turns[joint.first]) if acts_as(joint) == "slide" else 0.0
    return max([turning * solved.reach, *[abs(dot(relative, axis)) for axis in _axes(joint)]])


def _unknowns(hanging: Hanging) -> tuple[Unknown, ...]:
    """What the chains of the step hold that no drive states, link after link."""
    found: list[Unknown] = []
    for link, edge in sorted(hanging.edges.items()):
        joint = hanging.solved.linkage.joints[edge.joint]
        kind = acts_as(joint)
        if kind != "slide":
            found.append(Unknown("turn", link, hanging.solved.turns[link], link))
        if kind in ("slide", "pin in slot"):
            found.append(Unknown("slide", edge.joint, hanging.sliding(edge.joint, joint.at, onto=link).value, link))
        elif kind == "rolling":
            found.append(Unknown("normal", edge.joint, 0.0, link))
    return tuple([each for each in found if (each.kind, each.number) not in hanging.driven])


def _simple(hanging: Hanging, number: int, unknowns: tuple[Unknown, ...], noise: float) -> Closing | None:
    """The closing by one vector equation in at most two unknowns, each of which stands in it once; else None."""
    joint = hanging.solved.linkage.joints[number]
    kind = acts_as(joint)
    if kind not in ("pin", "pin in slot"):
        return None
    one, other = hanging.chain(joint.first, joint.at), hanging.chain(joint.second, joint.at)
    if kind == "pin in slot":
        slot = _has_slot(hanging, joint)
        onto = joint.second if slot == joint.first else joint.first
        slide = hanging.sliding(number, joint.at, onto=onto)
        one, other = ((*one, slide), other) if slot == joint.first else (one, (*other, slide))
        unknowns = (*unknowns, Unknown("slide", number, slide.value, onto))
    sought = [term for term in (*one, *other) if not term.given]
    named = {(term.kind, term.number) for term in sought}
    if not 1 <= len(sought) <= 2 or len(named) != len(sought) or named != {(u.kind, u.number) for u in unknowns}:
        return None
    known = _sum(term for term in one if term.given) - _sum(term for term in other if term.given)
    sides = [known, *[term.vector if term in one else -term.vector for term in sought]]
    gap = abs(sum(sides))
    triangle = triangle_of(sides[0], sides[1], sides[2], noise) if len(sides) == 3 else None
    form: StepForm = "line" if triangle is None else "triangle"
    return Closing(form=form, unknowns=unknowns, joint=number, chains=(one, other), triangle=triangle, gap=gap)


def _has_slot(hanging: Hanging, joint: Joint) -> int:
    """The link with the slot; where that is not stated, the one that the pin is no part of."""
    if joint.carrier is not None:
        return joint.carrier
    return joint.second if joint.pin in hanging.solved.linkage.links[joint.first].pins else joint.first


def _sum(terms: Iterable[Term]) -> Point:
    return sum([term.vector for term in terms], 0j)


def triangle_of(known: Point, one: Point, other: Point, noise: float) -> Triangle:
    """The triangle of three velocities that sum to zero; what is at most ``noise`` long has no direction.

    The angle opposite to a side is that between the other two, laid head to tail.
    """
    sides = known, one, other
    pairs = (one, other), (other, known), (known, one)
    if min(map(abs, sides)) <= noise:
        return Triangle(sides=sides, angles=None, ratios=None)
    sines = [abs(cross(a, b)) / (abs(a) * abs(b)) for a, b in pairs]
    if min(sines) < FLAT_TRIANGLE:
        return Triangle(sides=sides, angles=None, ratios=None)
    angles = [math.atan2(sine, -dot(a, b) / (abs(a) * abs(b))) for sine, (a, b) in zip(sines, pairs, strict=True)]
    ratios = [abs(side) / sine for side, sine in zip(sides, sines, strict=True)]
    return Triangle(sides=sides, angles=(angles[0], angles[1], angles[2]), ratios=(ratios[0], ratios[1], ratios[2]))


def _equations(hanging: Hanging, unknowns: tuple[Unknown, ...]) -> Iterator[Equation]:
    """What every closing joint, and every drive that is no plain value, asks of the unknowns.

    At a joint that is the first link's velocity less the second's; with its sign turned where no cell is positive.
    """
    place = {(each.kind, each.number): number for number, each in enumerate(unknowns)}
    values = [each.value for each in unknowns]
    for number in hanging.closing:
        joint = hanging.solved.linkage.joints[number]
        chains = hanging.chain(joint.first, joint.at), hanging.chain(joint.second, joint.at)
        if acts_as(joint) == "slide":
            cells, right = _turning(hanging, (joint.first, joint.second), place)
            yield _equation(values, cells, right, joint=number)
        for axis in _axes(joint):
            cells, right = _along(chains, axis, place)
            yield _equation(values, cells, right, joint=number, axis=axis)
    for number in hanging.unused:
        drive = hanging.solved.linkage.drives[number]
        slide = None if drive.joint is None else hanging.solved.linkage.joints[drive.joint]
        if drive.kind == "turn" or slide is None:
            cells, right = _turning(hanging, (drive.link, drive.against), place)
            yield _equation(values, cells, right + drive.rate, drive=number)
        else:
            ends = hanging.chain(slide.second, slide.at), hanging.chain(slide.first, slide.at)
            along = slide.direction or 0j
            cells, right = _along(ends, along, place)
            yield _equation(values, cells, right + drive.rate, drive=number, axis=along)


def _axes(joint: Joint) -> tuple[Point, ...]:
    """The directions along which two links agree: both at a pin, across a slide or slot, along a rolling contact."""
    kind, direction = acts_as(joint), joint.direction or 0j
    if kind == "pin":
        return 1 + 0j, 1j
    return (direction,) if kind == "rolling" else (1j * direction,)


def _equation(
    values: list[float],
    cells: list[float],
    right: float,
    *,
    joint: int | None = None,
    drive: int | None = None,
    axis: Point | None = None,
) -> Equation:
    if max(cells, default=0.0) <= 0.0:
        cells, right = [0.0 - cell for cell in cells], 0.0 - right
    left = math.fsum([cell * value for cell, value in zip(cells, values, strict=True)])
    return Equation(joint=joint, drive=drive, axis=axis, cells=tuple(cells), right=right, gap=abs(left - right))


def _along(chains: tuple[Chain, Chain], axis: Point, place: dict[tuple[str, int], int]) -> tuple[list[float], float]:
    """First chain less second along an axis: the cells of the unknowns, and what is known taken to the right."""
    cells, right = [0.0] * len(place), 0.0
    for chain, sign in zip(chains, (1.0, -1.0), strict=True):
        for term in chain:
            column = place.get((term.kind, term.number))
            if column is None:
                right -= sign * dot(term.vector, axis)
            else:
                cells[column] += sign * dot(term.factor, axis)
    return cells, right


def _turning(hanging: Hanging, links: tuple[int, int], place: dict[tuple[str, int], int]) -> tuple[list[float], float]:
    """The same for the turning of the first link less that of the second."""
    cells, right = [0.0] * len(place), 0.0
    for link, sign in zip(links, (1.0, -1.0), strict=True):
        carrier = hanging.carrier_of_turn(link)
        column = None if carrier is None else place.get(("turn", carrier))
        if column is None:
            right -= sign * hanging.solved.turns[link]
        else:
            cells[column] += sign
    return cells, right
