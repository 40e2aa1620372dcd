"""Builds a Linkage from a few words, as the tests of the analysis and of the published values state theirs."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Literal

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import Analysis
from dxfcheck.linkage import Drive, Joint, JointKind, Link, Linkage, Pin

FRAME = "ground"

Other = tuple[JointKind | Literal["full rolling"], complex, str, str, complex]
"""kind, place, first link, second link, direction (of any length); 'full rolling' is held by nothing else."""


def linkage(
    points: Mapping[str, complex],
    pins: Mapping[str, str],
    *,
    others: Sequence[Other] = (),
    turn: Mapping[str, float] | None = None,
    drives: Sequence[Drive] = (),
    radius: Mapping[str, float] | None = None,
    tracing: Mapping[str, str] | None = None,
    order: Sequence[str] | None = None,
) -> Linkage:
    """``pins`` maps a point to its links, 'ground crank'; ``turn`` a link to its rate against the frame, rad/s.

    ``order`` is the order of the moving links, else that of their first mention. The frame is link 0.
    """
    places = {name: links.split() for name, links in {**pins, **(tracing or {})}.items()}
    mentioned = [link for links in places.values() for link in links] + [end for other in others for end in other[2:4]]
    names = [FRAME, *(order or [name for name in dict.fromkeys(mentioned) if name != FRAME])]
    number = {name: index for index, name in enumerate(names)}
    model_pins = [
        Pin(
            name=name,
            at=points[name],
            radius=(radius or {}).get(name, 1.0),
            links=tuple(sorted(number[link] for link in links)),
            fixed=FRAME in links,
        )
        for name, links in places.items()
    ]
    joints = [
        Joint(kind="pin", first=pin.links[0], second=link, at=pin.at, pin=index)
        for index, pin in enumerate(model_pins)
        for link in pin.links[1:]
    ]
    joints += [
        Joint(
            kind="rolling" if kind == "full rolling" else kind,
            first=number[first],
            second=number[second],
            at=at,
            direction=direction / abs(direction),
            full=kind == "full rolling",
        )
        for kind, at, first, second, direction in others
    ]
    links = [
        Link(
            name=name,
            kind="link" if index else "frame",
            pins=tuple(at for at, pin in enumerate(model_pins) if index in pin.links),
        )
        for index, name in enumerate(names)
    ]
    stated = [Drive(link=number[name], against=0, rate=rate) for name, rate in (turn or {}).items()]
    return Linkage(
        name="M1",
        links=tuple(links),
        pins=tuple(model_pins),
        joints=tuple(joints),
        drives=(*stated, *drives),
    )


class Solved:
    """An analysis asked by the names of links and pins; what is not known fails the test that asks."""

    def __init__(self, model: Linkage) -> None:
        self.model = model
        self.analysis: Analysis = analyse(model)
        self._links = {link.name: index for index, link in enumerate(model.links)}
        self._pins = {pin.name: index for index, pin in enumerate(model.pins)}

    def turn(self, link: str) -> float:
        value = self.analysis.links[self._links[link]].angular_velocity
        assert value is not None, f"{link} is not settled"
        return value

    def pole(self, link: str) -> complex:
        value = self.analysis.links[self._links[link]].pole
        assert value is not None, f"{link} has no pole"
        return value

    def velocity(self, pin: str) -> complex:
        value = self.analysis.pins[self._pins[pin]].velocity
        assert value is not None, f"{pin} is not settled"
        return value

    def rubbing(self, pin: str) -> float:
        joint = next(i for i, joint in enumerate(self.model.joints) if joint.pin == self._pins[pin])
        value = self.analysis.joints[joint].rubbing_speed
        assert value is not None, f"rubbing at {pin} is not settled"
        return value

    def slide(self, first: str, second: str) -> float:
        """Speed of the second link against the first along the direction of the slide or slot between them."""
        ends = (self._links[first], self._links[second])
        joint = next(
            number
            for number, joint in enumerate(self.model.joints)
            if (joint.first, joint.second) == ends and joint.kind in ("slide", "pin in slot")
        )
        value = self.analysis.joints[joint].slide_speed
        assert value is not None, f"the slide between {first} and {second} is not settled"
        return value

    @property
    def counts(self) -> tuple[int, int, int, int, int]:
        """Count, links, full joints, half joints, freedom at the pose."""
        mobility = self.analysis.mobility
        return mobility.count, mobility.links, mobility.full_joints, mobility.half_joints, mobility.at_pose
