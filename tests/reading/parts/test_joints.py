from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.linkage import Linkage
from dxfcheck.reading.parts.joints import Joints
from dxfcheck.settings import Settings
from tests.reading.slides.sliders import B, C, block, crank_and_rod, dibber, guide, named, slid, strokes
from tests.sketches import Drawn, arc, laid_out, line, linkage, obround, observed, path, read, rectangle, ring, rod

SLOT = obround(130 + 0j, 180 + 0j, 4.5, handle="slot")
FRAME_SLOT = SLOT._replace(layer="FRAME")
KEEPERS = (line(140 - 8j, 140 + 8j, handle="one end"), line(160 - 8j, 160 + 8j, handle="other end"))
"""Ends of a block in a slot."""


def kinds(found: Linkage) -> list[tuple[str, str, str]]:
    """Joints that are not pins."""
    names = [link.name for link in found.links]
    return [(joint.kind, names[joint.first], names[joint.second]) for joint in found.joints if joint.kind != "pin"]


# --- pins in slots ---


def test_a_pin_in_a_slot_of_the_frame_is_a_joint_of_its_link_and_the_frame() -> None:
    found = linkage(*crank_and_rod(), FRAME_SLOT)
    assert kinds(found) == [("pin in slot", "frame", "B-C")]
    (joint,) = [joint for joint in found.joints if joint.kind == "pin in slot"]
    assert (joint.at, joint.direction, joint.handles) == (C, 1 + 0j, ("slot",))
    assert found.pins[joint.pin or 0].name == "C"
    assert [found.links[link].name for link in found.pins[joint.pin or 0].links] == ["B-C"]


def test_a_block_in_a_slot_slides() -> None:
    drawn = (*crank_and_rod(), obround(120 + 0j, 180 + 0j, 8, handle="slot")._replace(layer="FRAME"), *KEEPERS)
    found = linkage(*drawn)
    assert kinds(found) == [("slide", "frame", "block at C")]
    assert {link.name: link.kind for link in found.links}["block at C"] == "block"
    assert len(found.joints) == 4


def test_a_slot_on_a_link() -> None:
    """The crank's pin B runs in the upright slotted lever DE."""
    pins = {"A": 0j, "B": 40 + 0j, "D": 40 - 80j, "E": 40 + 80j}
    rings = [ring(at, layer="FRAME" if name in "AD" else "0") for name, at in pins.items()]
    lever = (line(40 - 76j, 40 - 20j), obround(40 - 15j, 40 + 15j, 5, handle="slot"), line(40 + 20j, 40 + 76j))
    found = linkage(*rings, *named(**pins), rod(0j, 40 + 0j, handle="crank"), *lever)
    assert kinds(found) == [("pin in slot", "A-B", "D-E")]
    assert found.joints[-1].direction == 1j
    assert len(found.joints) == 3


def test_a_slotted_link_runs_over_a_ring_of_the_frame_that_holds_nothing_else() -> None:
    """A slotted bar on the crank pin B, guided by the fixed pin D."""
    pins = {"A": 0j, "B": 40 + 0j, "D": 140 + 0j}
    rings = [ring(at, layer="FRAME" if name in "AD" else "0") for name, at in pins.items()]
    bar = (line(44 + 0j, 115 + 0j), obround(120 + 0j, 160 + 0j, 5, handle="slot"))
    found = linkage(*rings, *named(**pins), rod(0j, 40 + 0j, handle="crank"), *bar)
    assert kinds(found) == [("pin in slot", "frame", "B")]
    slot = found.joints[-1]
    assert [(pin.name, pin.fixed) for pin in found.pins] == [("A", True), ("B", False), ("D", True)]
    assert (slot.pin, slot.carrier, len(found.joints)) == (2, 2, 3)


def test_a_joint_tells_whose_the_slot_is_and_on_which_circle_it_runs() -> None:
    on_frame = linkage(*crank_and_rod(), FRAME_SLOT).joints[-1]
    assert (on_frame.carrier, on_frame.curves) == (0, (None, None))
    middle, turn = C + 200j, 8.0
    ends = [middle + cmath.rect(200.0, math.radians(-90 + side)) for side in (-turn, turn)]
    slot = (
        arc(middle, 195.5, -90 - turn, 2 * turn, layer="FRAME"),
        arc(middle, 204.5, -90 - turn, 2 * turn, layer="FRAME"),
        arc(ends[0], 4.5, 90 - turn, 180, layer="FRAME"),
        arc(ends[1], 4.5, -90 + turn, 180, layer="FRAME"),
    )
    bent = linkage(*crank_and_rod(), *slot).joints[-1]
    assert (bent.kind, bent.carrier) == ("pin in slot", 0)
    assert bent.direction == pytest.approx(1 + 0j)
    assert bent.curves[0] == pytest.approx(middle)
    assert bent.curves[1] is None


def test_a_rolling_contact_tells_the_centres_of_its_wheels() -> None:
    pins = {"A": 0j, "D": 80 + 0j}
    rings = [ring(at, layer="FRAME") for at in pins.values()]
    wheels = [ring(0j, 20.0, layer="PITCH"), ring(80 + 0j, 60.0, layer="PITCH")]
    (mesh,) = [joint for joint in linkage(*rings, *named(**pins), *wheels).joints if joint.kind == "rolling"]
    assert mesh.curves == (0j, 80 + 0j)


def test_a_pin_past_the_end_of_its_slot_is_told() -> None:
    short = obround(152 + 0j, 200 + 0j, 4.5, handle="slot")._replace(layer="FRAME")
    (odd,) = observed("past-guide-end", *crank_and_rod(), short)
    assert odd.amount == pytest.approx(2.0)
    assert odd.limit == pytest.approx(0.08)
    assert (odd.subject, odd.handles) == ("C", ("slot",))
    assert "the pin stands {amount} past the end of its slot" in odd.detail
    long = obround(150.05 + 0j, 200 + 0j, 4.5)._replace(layer="FRAME")
    assert observed("past-guide-end", *crank_and_rod(), long) == []


# --- guides and slots on nothing ---


def test_a_slot_on_nothing_is_frame_where_the_rest_hangs_on_a_frame() -> None:
    drawn = (*crank_and_rod(), SLOT)
    assert kinds(linkage(*drawn)) == [("pin in slot", "frame", "B-C")]
    (note,) = observed("guide-taken-as-frame", *drawn)
    assert (note.subject, note.handles, note.at) == ("B-C", ("slot",), 130 - 4.5j)


def adrift(*things: Drawn) -> tuple[Drawn, ...]:
    return tuple(each._replace(layer="0") for each in things)


@pytest.mark.parametrize(
    ("things", "grounded"),
    [pytest.param((*crank_and_rod(), SLOT), [], id="slot"), pytest.param(dibber(guide()), [False], id="guide")],
)
def test_without_a_frame_it_is_none_unless_the_user_states_a_frame_pin(
    things: tuple[Drawn, ...], grounded: list[bool]
) -> None:
    loose = adrift(*things)
    assert [each.grounded for each in read(*loose).linkages] == grounded
    assert observed("guide-taken-as-frame", *loose) == []
    stated = Settings(frame_pins=("A",))
    assert kinds(linkage(*loose, settings=stated))[0][1] == "frame"
    assert len(observed("guide-taken-as-frame", *loose, settings=stated)) == 1


def test_a_chain_of_pins_ties_a_guided_link_to_the_frame() -> None:
    """Only the mechanism that hangs on a frame gets its guide for frame; the one beside it, on no frame, does not."""
    shifted = [
        *(ring(at + 500, handle=f"r{at}") for at in (0j, B, C)),
        rod(500 + 0j, B + 500),
        rod(B + 500, C + 500),
        block(C + 500)._replace(handle="far block"),
        line(590 + 0j, 710 + 0j, handle="far guide"),
    ]
    (note,) = observed("guide-taken-as-frame", *dibber(guide(layer="0")), *shifted)
    assert note.handles == ("guide",)


def test_a_guide_with_a_pin_or_another_slide_is_no_frame() -> None:
    swinging = (line(210 + 0j, 240 + 0j, handle="arm"), ring(244 + 0j, layer="FRAME"), *named(F=244 + 0j))
    drawn = dibber(guide(layer="0"), *swinging)
    assert {*slid(*drawn)[0][:2]} == {"block at C", "F"}
    assert observed("guide-taken-as-frame", *drawn) == []
    sliding = (
        line(120 + 0j, 120 - 60j, handle="stem"),
        rectangle(120 - 80j, 20, 40, handle="ram"),
        *(guide(x - 120j, x - 40j, handle=f"rail {x:g}") for x in (110.0, 130.0)),
    )
    cross = dibber(guide(layer="0"), *sliding)
    assert sorted(each.direction.imag for each in slid(*cross)) == [0.0, 1.0]
    assert observed("guide-taken-as-frame", *cross) == []


# --- what is called a block ---


def names(*things: Drawn) -> dict[str, str]:
    return {link.name: link.kind for link in linkage(*things).links}


@pytest.mark.parametrize(
    ("things", "name", "kind"),
    [
        pytest.param(dibber(guide()), "block at C", "block", id="round a pin"),
        pytest.param(dibber(), "block at C", "block", id="without a guide"),
        pytest.param(
            (
                *crank_and_rod(),
                line(154 + 0j, 200 + 0j),
                rectangle(215 + 0j, 30, 20),
                guide(180 + 10j, 260 + 10j),
                guide(180 - 10j, 260 - 10j),
            ),
            "block at C",
            "block",
            id="a ram on a link of one pin",
        ),
        pytest.param(
            (
                *crank_and_rod(),
                line(C, 200 + 60j),
                ring(200 + 60j),
                *named(E=200 + 60j),
                line(200 + 60j, 250 + 0j),
                line(C, 250 + 0j),
                rectangle(265 + 0j, 30, 20),
                guide(240 + 10j, 310 + 10j),
                guide(240 - 10j, 310 - 10j),
            ),
            "C-E",
            "link",
            id="a ram on a link of two pins",
        ),
    ],
)
def test_what_is_called_a_block(things: tuple[Drawn, ...], name: str, kind: str) -> None:
    assert names(*things)[name] == kind


# --- one joint or two ---


def test_parallel_slides_of_two_bodies_are_one_joint_and_slides_across_are_two() -> None:
    stem = line(154 + 0j, 300 + 0j, handle="stem")
    bushes = [path(x - 8j, x + 30 - 8j, x + 30 + 8j, x + 8j, closed=True, layer="FRAME") for x in (200, 250)]
    drawn = (*crank_and_rod(), stem, *bushes)
    assert len(slid(*drawn)) == 1
    branch = line(260 + 0j, 260 - 100j)
    upright = path(252 - 60j, 268 - 60j, 268 - 30j, 252 - 30j, closed=True, layer="FRAME", handle="upright")
    assert {each.direction for each in slid(*crank_and_rod(), stem, bushes[0], branch, upright)} == {1, 1j}


def test_a_merged_joint_has_no_ends() -> None:
    stem = line(154 + 0j, 300 + 0j)
    bushes = [path(x - 8j, x + 30 - 8j, x + 30 + 8j, x + 8j, closed=True, layer="FRAME") for x in (200, 250)]
    joints = [each.why for each in read(*crank_and_rod(), stem, *bushes).evidence if each.subject == "joint"]
    assert [why for why in joints if "one end of its guide" in why] == []


# --- what find_joints gives ---


def contacts(*things: Drawn) -> Joints:
    _, parts = laid_out(*things)
    return Joints(
        bodies=parts.bodies.bodies, contacts=parts.contacts, oddities=parts.oddities, idle_rings=parts.idle_rings
    )


def test_of_a_contact_with_the_frame_the_frame_comes_first() -> None:
    stem = line(154 + 0j, 300 + 0j)
    sleeve = path(200 - 8j, 230 - 8j, 230 + 8j, 200 + 8j, closed=True, layer="FRAME")
    for things in (dibber(guide()), (*crank_and_rod(), stem, sleeve), (*crank_and_rod(), FRAME_SLOT)):
        found = contacts(*things)
        (contact,) = found.contacts
        assert found.bodies[contact.bodies[0]].frame
        assert not found.bodies[contact.bodies[1]].frame


def test_bodies_with_neither_a_pin_nor_a_contact_are_left_out() -> None:
    drawn = dibber(guide(layer="0"))
    found = contacts(*drawn)
    assert [body.frame for body in found.bodies] == [True, False, False, False]
    assert all(body.strands for body in found.bodies)
    assert [oddity.body for oddity in found.oddities] == [found.contacts[0].bodies[1]]


def test_room_runs_against_and_along_the_direction() -> None:
    (contact,) = contacts(*dibber(guide(100 + 0j, 230 + 0j))).contacts
    assert contact.room == pytest.approx((35, 65))
    (turned,) = contacts(*dibber(guide(230 + 0j, 100 + 0j))).contacts
    assert turned.room == pytest.approx((35, 65))
    (in_slot,) = contacts(*crank_and_rod(), FRAME_SLOT).contacts
    assert in_slot.room == pytest.approx((20, 30))
    (endless,) = contacts(*dibber(*strokes(135 - 10j, 165 - 10j))).contacts
    assert endless.room is None


def test_pitch_circles_that_roll_on_nothing_are_told_apart() -> None:
    drawn = (*crank_and_rod(), ring(B, 20.0, layer="PITCH"))
    assert len(contacts(*drawn).idle_rings) == 1
    assert contacts(*drawn).contacts == ()
