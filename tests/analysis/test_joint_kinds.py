"""Every kind of joint in both formulations: slides, slots, rolling, blocks on their pins, links without pins."""

from __future__ import annotations

import cmath
import math
from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.analysis import analyse
from dxfcheck.linkage import Drive, Linkage
from tests.closed_forms import slider_crank
from tests.model import Other, Solved, linkage

EXACT = 1e-9
places = st.complex_numbers(max_magnitude=1e4, allow_nan=False)


def agrees(case: Solved) -> Solved:
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    return case


def wheel_on_a_rod() -> tuple[Solved, float, float]:
    """A crank of 40 rolls a wheel of radius 15, centre on the level 10, by a rod of 120; with rod rate and speed."""
    pin, centre, rod, speed = slider_crank(40.0, 120.0, 10.0, 0.9, 5.0)
    points = {"O": 0j, "B": pin, "W": centre}
    pins = {"O": "ground crank", "B": "crank rod", "W": "rod wheel"}
    contact: list[Other] = [("full rolling", centre - 15j, "ground", "wheel", 1 + 0j)]
    return Solved(linkage(points, pins, others=contact, turn={"crank": 5.0})), rod, speed


def test_a_wheel_that_rolls_on_the_frame_turns_about_its_contact() -> None:
    case = agrees(Solved(linkage({"C": 50j}, {"C": "wheel"}, others=[ROLLING_AT_ZERO], turn={"wheel": -2.0})))
    assert case.counts == (1, 2, 1, 0, 1)
    assert case.velocity("C") == pytest.approx(100.0 + 0j, rel=EXACT)
    assert case.pole("wheel") == pytest.approx(0j, abs=EXACT)
    contact = case.analysis.joints[0]
    assert contact.relative_angular_velocity == pytest.approx(-2.0, rel=EXACT)
    assert (contact.slide_speed, contact.rubbing_speed) == (None, None)


ROLLING_AT_ZERO: Other = ("full rolling", 0j, "ground", "wheel", 1 + 0j)


def test_a_crank_rolls_a_wheel() -> None:
    case, rod, speed = wheel_on_a_rod()
    assert agrees(case).counts == (1, 4, 4, 0, 1)
    assert case.turn("rod") == pytest.approx(rod, rel=EXACT)
    assert case.velocity("W") == pytest.approx(speed, rel=EXACT)
    assert case.turn("wheel") == pytest.approx(-speed / 15.0, rel=EXACT)
    assert case.pole("wheel") == pytest.approx(case.model.pins[2].at - 15j, rel=EXACT)


def test_a_wheel_that_a_block_carries_too_rolls_as_a_half_joint() -> None:
    """The same wheel with its axle in a block that slides along: the block now holds it, the contact one freedom."""
    pin, centre, rod, speed = slider_crank(40.0, 120.0, 10.0, 0.9, 5.0)
    others: list[Other] = [
        ("slide", centre, "ground", "block", 1 + 0j),
        ("rolling", centre - 15j, "ground", "wheel", 1 + 0j),
    ]
    pins = {"O": "ground crank", "B": "crank rod", "W": "block rod wheel"}
    case = agrees(Solved(linkage({"O": 0j, "B": pin, "W": centre}, pins, others=others, turn={"crank": 5.0})))
    assert case.counts == (1, 5, 5, 1, 1)
    assert case.turn("rod") == pytest.approx(rod, rel=EXACT)
    assert case.turn("wheel") == pytest.approx(-speed / 15.0, rel=EXACT)


@pytest.mark.parametrize("kind", ["pin", "slide", "pin in slot"])
def test_full_means_nothing_for_other_kinds(kind: str) -> None:
    plain = slotted() if kind == "pin in slot" else yoke()
    marked = replace(plain, joints=tuple(replace(joint, full=joint.kind == kind) for joint in plain.joints))
    assert analyse(marked) == analyse(plain)


def yoke() -> Linkage:
    """Crank O-A with a block on its pin; the block slides in a yoke that slides on the frame and has no pin."""
    slides: list[Other] = [("slide", 30 + 40j, "die", "yoke", 1j), ("slide", 30 + 0j, "ground", "yoke", 1 + 0j)]
    return linkage({"O": 0j, "A": 30 + 40j}, {"O": "ground crank", "A": "crank die"}, others=slides, turn={"crank": 2})


def slotted() -> Linkage:
    """A pin of link AC runs in the slot of a lever about O."""
    slot: list[Other] = [("pin in slot", 225 - 225j, "lever", "AC", 1 - 1j)]
    pins = {"O": "ground lever", "C": "ground AC"}
    return linkage({"O": 0j, "C": 450 - 225j}, pins, others=slot, turn={"lever": 2.0})


def quick_return() -> Linkage:
    """A crank's block in a lever; the lever's end drives a ram by a rod."""
    d = 1300.0 * cmath.exp(1.2j)
    b = 800j + 300.0 * cmath.exp(1j * math.pi / 4.0)
    points = {"P": 800j, "Q": 0j, "B": b, "D": d * cmath.exp(1j * (cmath.phase(b) - 1.2)), "R": 900 + 1500j}
    pins = {"P": "ground crank", "B": "crank die", "Q": "ground lever", "D": "lever rod", "R": "rod ram"}
    slides: list[Other] = [("slide", b, "die", "lever", b), ("slide", 900 + 1500j, "ground", "ram", 1 + 0j)]
    return linkage(points, pins, others=slides, turn={"crank": 4.0})


def trammel() -> Linkage:
    """A bar between two blocks on crossed guides, one of them driven along its guide."""
    slides: list[Other] = [("slide", 60 + 0j, "ground", "one", 1 + 0j), ("slide", 80j, "ground", "other", 1j)]
    model = linkage({"A": 60 + 0j, "B": 80j}, {"A": "one bar", "B": "bar other"}, others=slides)
    return replace(model, drives=(Drive(link=1, against=0, rate=3.0, kind="slide", joint=2),))


def test_two_blocks_and_a_bar_between_crossed_guides() -> None:
    """With x = L cos t, y = L sin t: y' = - x x' / y, and the pole lies at (x, y)."""
    case = agrees(Solved(trammel()))
    assert case.counts == (1, 4, 4, 0, 1)
    assert case.velocity("B") == pytest.approx(-1j * 60.0 * 3.0 / 80.0, rel=EXACT)
    assert case.turn("bar") == pytest.approx(3.0 / 80.0, rel=EXACT)
    assert case.pole("bar") == pytest.approx(60 + 80j, rel=EXACT)
    assert case.slide("ground", "other") == pytest.approx(-2.25, rel=EXACT)
    assert [motion.pole for motion in case.analysis.links[:2]] == [None, None]
    assert case.turn("one") == pytest.approx(0.0, abs=1e-15)


def test_a_slide_driven_the_other_way_round_is_the_same_motion() -> None:
    """Stated as the guide's speed against the block, the figure changes its sign in both formulations."""
    model = trammel()
    backwards = replace(model, drives=(replace(model.drives[0], link=0, against=1, rate=-3.0),))
    one, other = agrees(Solved(model)), agrees(Solved(backwards))
    assert other.velocity("B") == pytest.approx(one.velocity("B"), rel=EXACT)
    assert other.slide("ground", "one") == pytest.approx(3.0, rel=EXACT)


def test_links_joined_by_slides_only() -> None:
    """A wedge: one part slides level, the next upright, and a slope of 30 degrees between them."""
    slides: list[Other] = [
        ("slide", 0j, "ground", "wedge", 1 + 0j),
        ("slide", 40 + 20j, "wedge", "riser", cmath.exp(1j * math.pi / 6.0)),
        ("slide", 40 + 90j, "ground", "riser", 1j),
    ]
    model = linkage({}, {}, others=slides)
    case = agrees(Solved(replace(model, drives=(Drive(link=1, against=0, rate=6.0, kind="slide", joint=0),))))
    # the count is 0: three slides in a loop share one turning constraint
    assert case.counts == (0, 3, 3, 0, 1)
    assert case.slide("ground", "riser") == pytest.approx(-6.0 * math.tan(math.pi / 6.0), rel=EXACT)
    assert case.slide("wedge", "riser") == pytest.approx(-6.0 / math.cos(math.pi / 6.0), rel=EXACT)


def test_two_telescopes_between_the_same_pins_repeat_one_another() -> None:
    """Barrels and rods side by side on common pins: counted 0, both extend together."""
    a, c = 0j, 60 + 80j
    pins = {"A": "ground b1 b2", "C": "arm r1 r2", "D": "ground arm"}
    slides: list[Other] = [("slide", 30 + 40j, "b1", "r1", c - a), ("slide", 30 + 40j, "b2", "r2", c - a)]
    case = Solved(linkage({"A": a, "C": c, "D": 100 + 0j}, pins, others=slides, turn={"arm": 1.0}))
    assert agrees(case).counts == (1, 6, 7, 0, 1)
    growth = ((1j * (c - 100)) * (c - a).conjugate()).real / abs(c - a)
    assert case.slide("b1", "r1") == pytest.approx(growth, rel=EXACT)
    assert case.slide("b2", "r2") == pytest.approx(growth, rel=EXACT)


@pytest.mark.parametrize("build", [yoke, quick_return, trammel])
@given(along=st.floats(-1e4, 1e4), off=st.floats(-1e4, 1e4))
def test_where_along_or_beside_its_guide_a_slide_is_drawn_changes_nothing(
    build: object, along: float, off: float
) -> None:
    assert callable(build)
    plain = build()
    assert isinstance(plain, Linkage)
    moved = replace(
        plain,
        joints=tuple(
            replace(joint, at=joint.at + (along + 1j * off) * (joint.direction or 0j))
            if joint.kind == "slide"
            else joint
            for joint in plain.joints
        ),
    )
    one, other = analyse(plain), analyse(moved)
    assert other.mobility == one.mobility
    assert other.rank_gap == one.rank_gap
    assert other.solved
    assert [link.pole is None for link in other.links] == [link.pole is None for link in one.links]
    for before, after in zip(one.links, other.links, strict=True):
        assert after.angular_velocity == pytest.approx(before.angular_velocity, rel=1e-11, abs=1e-12)
    for start, end in zip(one.pins, other.pins, strict=True):
        assert end.velocity == pytest.approx(start.velocity, rel=1e-11, abs=1e-11)
    assert other.disagreement is not None
    assert other.disagreement < EXACT
    for name in ("relative_angular_velocity", "rubbing_speed", "slide_speed"):
        was, now = ([getattr(joint, name) for joint in case.joints] for case in (one, other))
        assert [value is None for value in now] == [value is None for value in was]
        known = [value for value in was if value is not None]
        assert [value for value in now if value is not None] == pytest.approx(known, rel=EXACT, abs=1e-8)


@pytest.mark.parametrize("build", [yoke, quick_return, trammel, slotted])
@given(angle=st.floats(-math.pi, math.pi), shift=places, scale=st.floats(1e-3, 1e3))
def test_verdicts_move_with_the_sheet(build: object, angle: float, shift: complex, scale: float) -> None:
    assert callable(build)
    plain = build()
    assert isinstance(plain, Linkage)
    turned = scale * cmath.exp(1j * angle)
    moved = replace(
        plain,
        pins=tuple(replace(pin, at=turned * (pin.at + shift)) for pin in plain.pins),
        joints=tuple(
            replace(
                joint,
                at=turned * (joint.at + shift),
                direction=None if joint.direction is None else joint.direction * turned / abs(turned),
            )
            for joint in plain.joints
        ),
        drives=tuple(
            replace(drive, rate=drive.rate * (scale if drive.kind == "slide" else 1)) for drive in plain.drives
        ),
    )
    one, other = Solved(plain), agrees(Solved(moved))
    assert other.counts == one.counts
    for link in plain.links[1:]:
        assert other.turn(link.name) == pytest.approx(one.turn(link.name), rel=1e-8, abs=1e-9)
    for pin in plain.pins:
        assert other.velocity(pin.name) == pytest.approx(turned * one.velocity(pin.name), rel=1e-8, abs=1e-8 * scale)


def test_rubbing_is_for_pins_and_a_pin_in_a_slot_slides() -> None:
    case = agrees(Solved(slotted()))
    pin, slot = case.analysis.joints[0], case.analysis.joints[-1]
    assert pin.rubbing_speed == pytest.approx(2.0)
    assert pin.slide_speed is None
    assert slot.rubbing_speed is None
    assert abs(slot.slide_speed or 0.0) == pytest.approx(450.0 * math.sqrt(2.0), rel=EXACT)


def test_two_joints_at_one_place() -> None:
    """A slide and a slot at the pin that a crank's block and another link's roller share."""
    at = 30 + 40j
    others: list[Other] = [("slide", at, "ground", "die", 1 + 2j), ("pin in slot", at, "lever", "rod", 1 - 3j)]
    points = {"O": 0j, "A": at, "L": -100 + 10j, "B": 200 + 90j, "E": 260 + 0j}
    pins = {"A": "die rod", "L": "ground lever", "B": "rod arm", "E": "ground arm"}
    case = Solved(linkage(points, pins, others=others, turn={"arm": 1.0}))
    assert agrees(case).counts == (1, 5, 5, 1, 1)
    along = (1 + 2j) / abs(1 + 2j)
    velocity = case.velocity("A")
    assert (velocity * along.conjugate()).imag == pytest.approx(0.0, abs=EXACT)
    assert velocity - case.velocity("B") == pytest.approx(1j * case.turn("rod") * (at - points["B"]), rel=EXACT)
    across = 1j * (1 - 3j) / abs(1 - 3j)
    slot_side = 1j * case.turn("lever") * (at - points["L"])
    assert ((velocity - slot_side) * across.conjugate()).real == pytest.approx(0.0, abs=1e-8)
