from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.freedom.constraints import bodies_of, constraint_matrix, freedom_of
from dxfcheck.analysis.pose.sensitivity import speed_bounds
from dxfcheck.analysis.results import SpeedBounds
from dxfcheck.analysis.speeds.velocity import apply_drives
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Drive, Linkage
from tests.analysis.pose.test_displacement import gears, in_slot
from tests.model import linkage

FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}
PLACES = {"A": 0j, "B": 30 + 40j, "C": 150 + 80j, "D": 100 + 0j}
STEP = 1e-4


def bounds(model: Linkage, resolution: float = 1.0) -> SpeedBounds | None:
    topology, bodies = topology_of(model), bodies_of(model)
    freedom = freedom_of(constraint_matrix(model, topology, bodies), lambda: 1e-9)
    motion, _ = apply_drives(model, topology, bodies, freedom.motions, ())
    return speed_bounds(model, topology, motion, resolution)


def known(model: Linkage) -> SpeedBounds:
    found = bounds(model)
    assert found is not None
    return found


def rate_of(link: int, model: Linkage) -> float:
    value = analyse(model).links[link].angular_velocity
    assert value is not None
    return value


def worst(make: Callable[[dict[str, complex]], Linkage], places: dict[str, complex], link: int) -> float:
    """What a link's speed changes by for a unit of every coordinate, by central differences."""
    total = 0.0
    for name, place in places.items():
        for way in (STEP, 1j * STEP):
            there, back = (rate_of(link, make({**places, name: place + step})) for step in (way, -way))
            total += abs(there - back) / (2.0 * STEP)
    return total


def test_a_pair_of_gears_is_off_by_its_centres() -> None:
    """The pitch point divides the line of centres in the ratio of the radii, 20 to 60, wherever they are drawn."""

    def pair(places: dict[str, complex]) -> Linkage:
        centre, other = places["A"], places["D"]
        at = centre + (other - centre) / 4.0
        model = gears()
        joints = (
            replace(model.joints[0], at=centre),
            replace(model.joints[1], at=other),
            replace(
                model.joints[2], at=at, direction=1j * (other - centre) / abs(other - centre), curves=(centre, other)
            ),
        )
        pins = (replace(model.pins[0], at=centre), replace(model.pins[1], at=other))
        return replace(model, pins=pins, joints=joints, drives=(Drive(link=1, against=0, rate=3.0),))

    places = {"A": 0j, "D": 80 + 0j}
    found = known(pair(places))
    assert found.links == pytest.approx((0.0, 0.0, worst(pair, places, 2)), abs=1e-9)


def test_a_pin_in_a_curved_slot_meets_it_in_another_direction() -> None:
    middle = 70 + 90j

    def slotted(places: dict[str, complex]) -> Linkage:
        model = in_slot("lever", middle)
        at = places["B"]
        along = 1j * (at - middle) / abs(at - middle)
        joints = [replace(joint, at=places[name]) for joint, name in zip(model.joints, "ADB", strict=True)]
        joints[2] = replace(joints[2], direction=along, pin=2)
        pins = tuple(replace(pin, at=places[pin.name]) for pin in model.pins)
        return replace(model, pins=pins, joints=tuple(joints), drives=(Drive(link=1, against=0, rate=3.0),))

    places = {"A": 0j, "B": 30 + 40j, "D": 100 + 0j}
    model = slotted(places)
    assert [pin.name for pin in model.pins] == ["A", "D", "B"]
    assert known(model).links[2] == pytest.approx(worst(slotted, places, 2), rel=1e-4)


def test_bounds_grow_with_the_resolution() -> None:
    model = linkage(PLACES, FOUR_BAR, turn={"crank": 1.0})
    one, ten = known(model), bounds(model, 10.0)
    assert ten is not None
    assert (one.resolution, ten.resolution) == (1.0, 10.0)
    assert ten.links == pytest.approx([10.0 * each for each in one.links])


def test_bounds_grow_towards_a_dead_centre() -> None:
    """Coupler and rocker at right angles, and then 3 degrees short of one line."""
    foot, crank_end = PLACES["D"], PLACES["B"]
    half = (foot + crank_end) / 2.0
    square = half + 1j * (foot - half)
    flat = half + 1j * (foot - half) * math.tan(math.radians(1.5))
    wide, narrow = (known(linkage({**PLACES, "C": at}, FOUR_BAR, turn={"crank": 1.0})) for at in (square, flat))
    assert narrow.links[3] > 100 * wide.links[3]


def test_what_the_drives_do_not_settle_has_no_bounds() -> None:
    assert bounds(linkage(PLACES, FOUR_BAR)) is None
