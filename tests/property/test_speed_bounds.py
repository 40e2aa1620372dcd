"""What a speed may be off by, against linkages drawn a little otherwise: central differences, one place at a time."""

from __future__ import annotations

import cmath
from collections import defaultdict
from collections.abc import Callable, Iterator
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.freedom.constraints import bodies_of, constraint_matrix, freedom_of
from dxfcheck.analysis.pose.sensitivity import speed_bounds
from dxfcheck.analysis.results import Analysis, SpeedBounds
from dxfcheck.analysis.speeds.velocity import apply_drives
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Drive, Joint, Linkage
from tests.model import FRAME, Other, linkage
from tests.property.growing import FIXED, Model
from tests.property.random_linkages import random_linkage

RESOLUTION = 0.005
GUIDE = 80.0
STEP = 1e-4
"""So far places are moved, mm: the differences are then off by the order of its square, and by rounding over it."""

ROUNDING = 1e-10
"""What is left of a change that is none, over the fastest pin's speed."""


def model_of(drawn: Model) -> Linkage:
    """The random linkage as the reading would give it, with guides and slots of one length."""
    links: defaultdict[str, list[str]] = defaultdict(list)
    for pin in sorted(drawn.points):
        if pin in drawn.fixed:
            links[pin].append(FRAME)
        links[pin] += [f"L{number}" for number, pins in enumerate(drawn.links) if pin in pins]
    names = {FIXED: FRAME} | {number: f"L{number}" for number in range(len(drawn.links))}
    others: list[Other] = [
        (each.kind, each.at, names[each.links[0]], names[each.links[1]], each.along) for each in drawn.contacts
    ]
    pins = {pin: " ".join(at) for pin, at in links.items()}
    order = [names[number] for number in range(len(drawn.links))]
    model = linkage(drawn.points, pins, others=others, order=order)
    joints = tuple(joint if joint.kind == "pin" else replace(joint, drawn_length=GUIDE) for joint in model.joints)
    return replace(model, joints=joints, drives=(_drive(drawn, len(joints) - len(drawn.contacts)),))


def _drive(drawn: Model, first: int) -> Drive:
    if drawn.driven is None:
        return Drive(link=1, against=0, rate=drawn.rate)
    one, other = drawn.contacts[drawn.driven].links
    return Drive(link=other + 1, against=one + 1, rate=drawn.rate, kind="slide", joint=first + drawn.driven)


def bounds_of(model: Linkage) -> SpeedBounds:
    topology, bodies = topology_of(model), bodies_of(model)
    freedom = freedom_of(constraint_matrix(model, topology, bodies), lambda: 1e-9)
    motion, _ = apply_drives(model, topology, bodies, freedom.motions, ())
    found = speed_bounds(model, topology, motion, RESOLUTION)
    assert found is not None
    return found


def drawn_otherwise(model: Linkage) -> Iterator[tuple[Linkage, Linkage, float]]:
    """Each place moved a little one way and the other, and by how many steps it moves at the resolution."""
    for number in range(len(model.pins)):
        for way in (STEP, 1j * STEP):
            yield _pin_moved(model, number, way), _pin_moved(model, number, -way), RESOLUTION / STEP
    for number, joint in enumerate(model.joints):
        if joint.kind != "pin":
            turn = STEP * 2.0 / GUIDE
            yield _turned(model, number, turn), _turned(model, number, -turn), RESOLUTION / STEP


def _pin_moved(model: Linkage, number: int, way: complex) -> Linkage:
    place = model.pins[number].at

    def moved(joint: Joint) -> Joint:
        stays = joint.at != place or joint.kind == "slide"
        return joint if stays else replace(joint, at=joint.at + way)

    pins = tuple(replace(pin, at=pin.at + way) if index == number else pin for index, pin in enumerate(model.pins))
    return replace(model, pins=pins, joints=tuple(map(moved, model.joints)))


def _turned(model: Linkage, number: int, angle: float) -> Linkage:
    def turned(index: int, joint: Joint) -> Joint:
        if index != number or joint.direction is None:
            return joint
        return replace(joint, direction=joint.direction * cmath.rect(1.0, angle))

    return replace(model, joints=tuple(turned(index, joint) for index, joint in enumerate(model.joints)))


SPEEDS: dict[str, Callable[[Analysis], list[float]]] = {
    "links": lambda found: [each.angular_velocity or 0.0 for each in found.links],
    "pins": lambda found: [abs(each.velocity or 0.0) for each in found.pins],
    "turns": lambda found: [each.relative_angular_velocity or 0.0 for each in found.joints],
    "slides": lambda found: [each.slide_speed or 0.0 for each in found.joints],
}


@pytest.mark.parametrize("seed", range(50))
def test_bounds_are_what_the_worst_of_all_places_adds_up_to(seed: int) -> None:
    model = model_of(random_linkage(seed, lambda drawn: analyse(model_of(drawn.model)).solved).model)
    found = bounds_of(model)
    changes = {name: [0.0] * len(getattr(found, name)) for name in SPEEDS}
    for one, other, steps in drawn_otherwise(model):
        there, back = analyse(one), analyse(other)
        for name, speeds in SPEEDS.items():
            for index, (more, less) in enumerate(zip(speeds(there), speeds(back), strict=True)):
                changes[name][index] += abs(more - less) / 2.0 * steps
    fastest = max(SPEEDS["pins"](analyse(model)))
    for name in SPEEDS:
        given = list(getattr(found, name))
        assert given == pytest.approx(changes[name], rel=0.01, abs=ROUNDING * fastest), name
