from __future__ import annotations

from collections.abc import Sequence

import pytest

from dxfcheck.linkage import Linkage
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.mechanisms.assemble import Assembly, find_assemblies
from dxfcheck.reading.shapes.contact import Contact
from tests.reading.slides.sliders import B, C, Slid, block, crank_and_rod, dibber, guide, named, slid, slides_in
from tests.sketches import A, Drawn, line, linkage, obround, path, read, rectangle, ring, rod


def joints(found: Linkage) -> list[tuple[str, str, str, str | None]]:
    """Kind, links and pin of each joint, in order."""
    names = [link.name for link in found.links]
    return [
        (each.kind, names[each.first], names[each.second], None if each.pin is None else found.pins[each.pin].name)
        for each in found.joints
    ]


def test_a_slide_is_a_joint_at_the_pin_of_its_block_after_the_pins() -> None:
    found = linkage(*dibber(guide()))
    assert joints(found) == [
        ("pin", "frame", "A-B", "A"),
        ("pin", "A-B", "B-C", "B"),
        ("pin", "B-C", "block at C", "C"),
        ("slide", "frame", "block at C", "C"),
    ]
    slide = found.joints[-1]
    assert (slide.at, slide.direction, slide.handles, slide.full) == (C, 1 + 0j, ("block", "guide"), False)


def test_links_come_by_their_pins_then_by_name() -> None:
    found = linkage(*dibber(guide()))
    assert [(link.name, link.kind) for link in found.links] == [
        ("frame", "frame"),
        ("A-B", "link"),
        ("B-C", "link"),
        ("block at C", "block"),
    ]
    assert [[found.pins[pin].name for pin in link.pins] for link in found.links] == [
        ["A"],
        ["A", "B"],
        ["B", "C"],
        ["C"],
    ]


def test_the_guide_is_linework_of_the_frame_link() -> None:
    handles = linkage(*dibber(guide(), line(400j, 500j, layer="FRAME", handle="far"))).links[0].handles
    assert set(handles) == {"ring A", "guide"}


def test_a_link_without_a_pin_is_named_by_its_first_handle_and_comes_last() -> None:
    """A slotted yoke that slides on the frame: it has no pin of its own."""
    yoke = (
        obround(40 - 60j, 40 + 60j, 5, handle="yoke"),
        line(45 + 0j, 130 + 0j, handle="stem"),
        rectangle(145 + 0j, 30, 20, handle="ram"),
    )
    rails = (guide(100 + 10j, 210 + 10j), guide(100 - 10j, 210 - 10j, handle="lower"))
    crank = (ring(A, layer="FRAME"), ring(40 + 0j), line(4 + 0j, 36 + 0j), *named(A=A, B=40 + 0j))
    found = linkage(*crank, *yoke, *rails)
    assert [link.name for link in found.links] == ["frame", "A-B", "yoke"]
    assert joints(found)[1:] == [("slide", "frame", "yoke", None), ("pin in slot", "A-B", "yoke", "B")]
    assert found.joints[1].at == 145 + 0j


def test_a_pin_of_two_links_runs_in_its_slot_as_the_first_of_them() -> None:
    slot = obround(130 + 0j, 180 + 0j, 4.5, handle="slot")._replace(layer="FRAME")
    tail = (rod(C, C + 60j, handle="tail"), ring(C + 60j), *named(E=C + 60j))
    found = linkage(*crank_and_rod(), slot, *tail)
    assert joints(found)[2:] == [("pin", "B-C", "C-E", "C"), ("pin in slot", "frame", "B-C", "C")]


def test_slides_come_before_slots_and_slots_before_wheels() -> None:
    slot = obround(130 + 0j, 180 + 0j, 4.5, handle="slot")._replace(layer="FRAME")
    tip, second = C + 60j, -100 + 0j
    branch = (
        rod(C, tip, handle="tail"),
        ring(tip),
        *named(E=tip, F=second),
        rectangle(tip, 30, 20, handle="block"),
        line(tip - 60, tip + 60, layer="FRAME"),
    )
    wheels = (
        ring(second, layer="FRAME"),
        rod(second, second + 50j),
        ring(second + 50j),
        ring(A, 40.0, layer="PITCH"),
        ring(second, 60.0, layer="PITCH"),
    )
    kinds = [kind for kind, *_ in joints(linkage(*crank_and_rod(), slot, *branch, *wheels))]
    assert kinds == [*["pin"] * (len(kinds) - 3), "slide", "pin in slot", "rolling"]


def test_two_blocks_at_one_pin_are_numbered() -> None:
    """The smaller one slides along x, the greater one, drawn longer, upright: the shorter drawn is the first."""
    upright = rectangle(C, 44, 64, handle="great block")
    found = linkage(*dibber(guide(100 + 0j, 200 + 0j)), upright, line(C + 22 - 90j, C + 22 + 90j, layer="FRAME"))
    assert {link.name: link.handles for link in found.links if link.kind == "block"} == {
        "block at C": ("block",),
        "block at C (2)": ("great block",),
    }


def test_what_only_slides_on_the_frame_is_grounded_and_one_mechanism_with_what_it_carries() -> None:
    tip = C + 90j
    carriage = (ring(C), block(), guide(), ring(tip), rod(C, tip, handle="arm"), *named(C=C, E=tip))
    found = linkage(*carriage)
    assert found.grounded
    assert slides_in(found) == [Slid("frame", "block at C", 1 + 0j)]
    assert found.links[0].pins == ()


def test_two_mechanisms_that_slide_on_one_guide_are_two() -> None:
    far = 600 + 0j
    second = (
        ring(far, layer="FRAME"),
        ring(far + B),
        ring(far - 300),
        rod(far, far + B),
        rod(far + B, far - 300),
        *named(D=far, E=far + B, F=far - 300),
        rectangle(far - 300, 30, 20, handle="second block"),
    )
    found = read(*dibber(guide(90 + 0j, 400 + 0j)), *second).linkages
    assert [[each.second for each in slides_in(one)] for one in found] == [["block at C"], ["block at F"]]


def test_a_telescope_joins_two_mechanisms_into_one() -> None:
    """Without a common pin: barrel on one lever, rod on the other."""
    pins = {"A": 0j, "B": 60j, "C": 200 + 0j, "D": 200 + 60j}
    rings = [ring(at, layer="FRAME" if name in "AC" else "0") for name, at in pins.items()]
    levers = (rod(0j, 60j), rod(200 + 0j, 200 + 60j))
    ram = (rectangle(45 + 60j, 110, 24, handle="barrel"), line(70 + 60j, 196 + 60j, handle="rod"))
    assert slid(*rings, *named(**pins), *levers, *ram) == [Slid("B", "D", 1 + 0j)]
    assert len(read(*rings, *named(**pins), *levers).linkages) == 2


# --- assemblies ---


def bodies(*pins: Sequence[int]) -> list[Body]:
    """The frame, then moving bodies with these pins."""
    return [
        Body(strands=(number,), pins=tuple(each), frame=number == 0, block=False) for number, each in enumerate(pins)
    ]


def slide(one: int, other: int) -> Contact:
    return Contact("slide", (one, other), 0j, 1 + 0j, "told")


def test_contacts_hold_moving_bodies_together_but_not_through_the_frame() -> None:
    parts = bodies((), (1,), (2,), (3,))
    alone = find_assemblies(parts, frozenset(), (slide(0, 1), slide(0, 2)))
    assert [each.bodies for each in alone] == [(1,), (2,), (3,)]
    assert [each.grounded for each in alone] == [True, True, False]
    joined = find_assemblies(parts, frozenset(), (slide(0, 1), slide(1, 2)))
    assert [each.bodies for each in joined] == [(1, 2), (3,)]
    assert [len(each.contacts) for each in joined] == [2, 0]


@pytest.mark.parametrize(
    ("pins", "contacts", "is_linkage"),
    [
        pytest.param([(), (1,)], (slide(0, 1),), True, id="slides on the frame"),
        pytest.param([(), ()], (slide(0, 1),), False, id="slides on the frame without any pin"),
        pytest.param([(), (1,), (2,)], (slide(1, 2),), False, id="one slide and no frame"),
        pytest.param([(), (1,), (2,), (3,)], (slide(1, 2), slide(2, 3)), True, id="a chain of slides"),
        pytest.param([(), (1,), (1,), (2,)], (slide(2, 3),), True, id="a chain of a pin and a slide"),
        pytest.param([(), (1,), (1,), ()], (slide(2, 3),), False, id="a guide without a pin is no chain"),
    ],
)
def test_what_is_enough_for_a_linkage(
    pins: list[tuple[int, ...]], contacts: tuple[Contact, ...], *, is_linkage: bool
) -> None:
    found: list[Assembly] = find_assemblies(bodies(*pins), frozenset(), contacts)
    assert found[0].linkage == is_linkage


def test_mechanisms_that_slide_are_in_order_of_their_pins() -> None:
    bracket = path(-500 + 0j, -480 + 0j, layer="FRAME")
    first, second = read(bracket, *dibber(guide()), *lever(-300 + 0j)).linkages
    assert [first.name, second.name] == ["M1", "M2"]
    assert [pin.name for pin in first.pins] == ["S", "T"]


def lever(base: complex) -> tuple[Drawn, ...]:
    return (ring(base, layer="FRAME"), ring(base + 50j), rod(base, base + 50j), *named(S=base, T=base + 50j))
