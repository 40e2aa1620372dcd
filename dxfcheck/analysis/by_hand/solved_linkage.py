"""A linkage with its solution, asked for the velocity of any place of any link."""

from __future__ import annotations

from collections import deque
from dataclasses import dataclass

from dxfcheck.analysis.results import Analysis
from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, JointKind, Linkage

__all__ = ["SolvedLinkage", "acts_as", "solved_linkage"]


@dataclass(frozen=True, slots=True)
class SolvedLinkage:
    """A linkage whose every link is settled, and its analysis.

    ``turns`` are rad/s; ``references`` a place of each link with its velocity; ``joints_of`` each link's joints
    (indices, in order); ``fastest`` the greatest speed of a pin or along a slide, length units a second; ``reach`` how
    far the furthest pin lies from the first.
    """

    linkage: Linkage
    analysis: Analysis
    turns: tuple[float, ...]
    references: tuple[tuple[Point, Point], ...]
    joints_of: tuple[tuple[int, ...], ...]
    fastest: float
    reach: float

    def velocity(self, link: int, place: Point) -> Point:
        """Velocity of the point of a link that lies at a place, length units a second."""
        at, velocity = self.references[link]
        return velocity + 1j * self.turns[link] * (place - at)

    def pole(self, link: int) -> Point | None:
        """The link's pole as solved; None where it rests or only translates."""
        return self.analysis.links[link].pole


def acts_as(joint: Joint) -> JointKind:
    """The kind that holds two links alike at the pose: a rolling contact that nothing else holds acts as a pin."""
    return "pin" if joint.kind == "rolling" and joint.full else joint.kind


def solved_linkage(linkage: Linkage, analysis: Analysis) -> SolvedLinkage:
    """The linkage ready to be asked; ValueError where the motion of a link is not settled. Cost linear."""
    turns = tuple([_settled(motion.angular_velocity) for motion in analysis.links])
    joints_of: list[list[int]] = [[] for _ in linkage.links]
    for number, joint in enumerate(linkage.joints):
        joints_of[joint.first].append(number)
        joints_of[joint.second].append(number)
    speeds = [abs(motion.velocity or 0j) for motion in analysis.pins]
    speeds += [abs(motion.slide_speed or 0.0) for motion in analysis.joints]
    return SolvedLinkage(
        linkage=linkage,
        analysis=analysis,
        turns=turns,
        references=_references(linkage, analysis, turns, joints_of),
        joints_of=tuple(map(tuple, joints_of)),
        fastest=max(speeds, default=0.0),
        reach=max([abs(pin.at - linkage.pins[0].at) for pin in linkage.pins], default=0.0),
    )


def _settled(value: float | None) -> float:
    if value is None:
        msg = "the motion of a link is not settled"
        raise ValueError(msg)
    return value


def _references(
    linkage: Linkage, analysis: Analysis, turns: tuple[float, ...], joints_of: list[list[int]]
) -> tuple[tuple[Point, Point], ...]:
    """A place of every link with its velocity: one of its pins, else its joint with a link that has one."""
    found: dict[int, tuple[Point, Point]] = {linkage.frame: (0j, 0j)}
    for pin, motion in zip(linkage.pins, analysis.pins, strict=True):
        for link in pin.links if motion.velocity is not None else ():
            found.setdefault(link, (pin.at, motion.velocity or 0j))
    waiting = deque(found)
    while waiting:
        link = waiting.popleft()
        for number in joints_of[link]:
            joint = linkage.joints[number]
            other, sign = (joint.second, 1.0) if joint.first == link else (joint.first, -1.0)
            if other not in found:
                at, velocity = found[link]
                slide = (analysis.joints[number].slide_speed or 0.0) * (joint.direction or 0j)
                found[other] = joint.at, velocity + 1j * turns[link] * (joint.at - at) + sign * slide
                waiting.append(other)
    return tuple([found.get(link, (0j, 0j)) for link in range(len(linkage.links))])
