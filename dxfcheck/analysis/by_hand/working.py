"""The velocities of a solved linkage as a person would work them out by hand, step by step: the figures, no words.

Relative velocities: v_C = v_B + omega x r_C/B, closed by a triangle where two sizes are sought along known directions
(J.J. Uicker, G.R. Pennock & J.E. Shigley, Theory of Machines and Mechanisms, ch. 3, from memory). Every figure is the
solution's own; a gap says by how much what is written down fails to close.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from dxfcheck.analysis.by_hand.closing import Closing, close
from dxfcheck.analysis.by_hand.closure import Hanging, hang
from dxfcheck.analysis.by_hand.kennedy import PoleWorking, pole_workings
from dxfcheck.analysis.by_hand.solution_order import SolutionStep, solution_order
from dxfcheck.analysis.by_hand.solved_linkage import SolvedLinkage, acts_as, solved_linkage
from dxfcheck.analysis.results import Analysis
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage

__all__ = ["PointVelocity", "StepWorking", "Working", "work_out"]


@dataclass(frozen=True, slots=True, kw_only=True)
class PointVelocity:
    """Velocity of a pin from that of another pin ``base`` of ``link``: v = base_velocity + omega x arm.

    ``gap`` is by how much that differs from the solution's velocity of the pin, length units a second.
    """

    pin: int
    link: int
    base: int
    base_velocity: Point
    arm: Point
    omega: float
    velocity: Point
    gap: float


@dataclass(frozen=True, slots=True, kw_only=True)
class StepWorking:
    """One step: how it closes, and what follows for pins and poles.

    ``shared`` are links that turn as another one does (link, other), as they slide on it. ``points`` are the pins that
    were not known before. A step whose equations are not written out has neither points nor poles. ``gap`` is the
    greatest closing error, length units a second.
    """

    step: SolutionStep
    closing: Closing
    shared: tuple[tuple[int, int], ...]
    points: tuple[PointVelocity, ...]
    poles: tuple[PoleWorking, ...]
    gap: float


@dataclass(frozen=True, slots=True, kw_only=True)
class Working:
    """All steps in order. ``closing`` is the greatest closing error over the greatest speed, 0.0 where all rests."""

    solved: SolvedLinkage
    steps: tuple[StepWorking, ...]
    closing: float


def work_out(linkage: Linkage, analysis: Analysis) -> Working | None:
    """The working of a solved linkage; None where not all is settled. Cost near-linear where few links go together."""
    if not (linkage.grounded and analysis.solved):
        return None
    solved = solved_linkage(linkage, analysis)
    taken = [number for number, verdict in enumerate(analysis.drives) if verdict.outcome == "taken"]
    told = {number for number, pin in enumerate(linkage.pins) if pin.fixed}
    established = {linkage.frame}
    steps: list[StepWorking] = []
    for step in solution_order(linkage, taken):
        steps.append(_step(hang(solved, step), step, told, established))
        told.update(pin for link in step.links for pin in linkage.links[link].pins)
        established.update(step.links)
    greatest = max([each.gap for each in steps], default=0.0)
    return Working(solved=solved, steps=tuple(steps), closing=greatest / solved.fastest if solved.fastest else greatest)


def _step(hanging: Hanging, step: SolutionStep, told: set[int], established: set[int]) -> StepWorking:
    closing = close(hanging)
    points = tuple(_points(hanging.solved, step, told)) if closing.written_out else ()
    poles = tuple(pole_workings(hanging.solved, step.links, established)) if closing.written_out else ()
    return StepWorking(
        step=step,
        closing=closing,
        shared=tuple(_shared(hanging, step)),
        points=points,
        poles=poles,
        gap=max([closing.gap, *[point.gap for point in points]]),
    )


def _shared(hanging: Hanging, step: SolutionStep) -> Iterator[tuple[int, int]]:
    for link in step.links:
        edge = hanging.edges.get(link)
        if edge is not None and acts_as(hanging.solved.linkage.joints[edge.joint]) == "slide":
            yield link, edge.parent


def _points(solved: SolvedLinkage, step: SolutionStep, told: set[int]) -> Iterator[PointVelocity]:
    """Every pin of these links not told before, each from a pin of its link that is; one at rest where there is one."""
    known, linkage = set(told), solved.linkage
    waiting = list(dict.fromkeys((link, pin) for link in step.links for pin in linkage.links[link].pins))
    progress = True
    while progress:
        progress = False
        for link, pin in waiting:
            bases = [base for base in linkage.links[link].pins if base in known]
            if pin not in known and bases:
                base = next((base for base in bases if linkage.pins[base].fixed), bases[0])
                known.add(pin)
                progress = True
                yield _point(solved, link, pin, base)


def _point(solved: SolvedLinkage, link: int, pin: int, base: int) -> PointVelocity:
    arm = solved.linkage.pins[pin].at - solved.linkage.pins[base].at
    start, velocity = (solved.analysis.pins[each].velocity or 0j for each in (base, pin))
    omega = solved.turns[link]
    return PointVelocity(
        pin=pin,
        link=link,
        base=base,
        base_velocity=start,
        arm=arm,
        omega=omega,
        velocity=velocity,
        gap=abs(start + 1j * omega * arm - velocity),
    )
