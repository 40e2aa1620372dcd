from __future__ import annotations

from dxfcheck.settings import Settings
from tests.sketches import RADIUS, A, B, C, D, Drawn, arc, line, linkage, links, read, ring, rod, text, tipper


def star(*tips: complex) -> list[Drawn]:
    """Links from one free pin at the origin, each to a frame pin."""
    drawn = [ring(0j), text("S", 5j)]
    for number, tip in enumerate(tips):
        drawn += [ring(tip, layer="FRAME"), rod(0j, tip), text(f"F{number}", tip + 5)]
    return drawn


def test_k_links_at_one_pin_are_k_less_one_joints() -> None:
    found = linkage(*star(60 + 0j, 60j, -60 + 0j))
    (at_star,) = [pin for pin in found.pins if pin.name == "S"]
    assert len(at_star.links) == 3
    joints = [joint for joint in found.joints if found.pins[joint.pin or 0].name == "S" and joint.pin is not None]
    assert len(joints) == 2
    assert {joint.first for joint in joints} == {at_star.links[0]}


def test_at_a_fixed_pin_joints_run_from_the_frame() -> None:
    below = 60 - 40j
    found = linkage(*tipper(), rod(A, below), ring(below), rod(below, C))
    at_a = [joint for joint in found.joints if joint.at == A]
    assert len(at_a) == 2
    assert {joint.first for joint in at_a} == {0}
    assert {joint.kind for joint in found.joints} == {"pin"}


def test_links_and_pins_come_in_natural_order() -> None:
    drawn = [
        ring(0j, layer="FRAME"),
        ring(60 + 0j),
        ring(120 + 0j, layer="FRAME"),
        rod(0j, 60 + 0j),
        rod(60 + 0j, 120 + 0j),
        text("A10", 5j),
        text("A9", 60 + 5j),
        text("A2", 120 + 5j),
    ]
    found = linkage(*drawn)
    assert [pin.name for pin in found.pins] == ["A2", "A9", "A10"]
    assert [link.name for link in found.links] == ["frame", "A2-A9", "A9-A10"]


def test_a_second_link_between_the_same_pins_is_numbered_the_shorter_first() -> None:
    found = linkage(*tipper(), arc((B + C) / 2, abs(C - B) / 2, 197.818889, 180, handle="bow"))
    assert {link.name: link.handles for link in found.links if link.name.startswith("B-C")} == {
        "B-C": ("coupler",),
        "B-C (2)": ("bow",),
    }


def test_pins_know_their_radius_place_and_handles() -> None:
    found = linkage(*tipper(), ring(B, 2.0, handle="inner"))
    (pin,) = [pin for pin in found.pins if pin.name == "B"]
    assert (pin.at, pin.radius, pin.fixed) == (B, 2.0, False)
    assert pin.handles == ("inner", "ring B")
    assert [pin.radius for pin in found.pins if pin.fixed] == [RADIUS, RADIUS]


def beside(shift: complex) -> list[Drawn]:
    """A lever on the frame."""
    return [ring(shift, layer="FRAME"), ring(shift + 50j), rod(shift, shift + 50j)]


def test_assemblies_that_hang_together_through_the_frame_alone_are_mechanisms_by_x() -> None:
    found = read(*beside(500 + 0j), *tipper(), *beside(-300 + 0j)).linkages
    assert [each.name for each in found] == ["M1", "M2", "M3"]
    assert [min(pin.at.real for pin in each.pins) for each in found] == [-300.0, 0.0, 500.0]
    assert all(each.links[0].name == "frame" for each in found)


def test_mechanisms_above_one_another_come_from_below() -> None:
    found = read(*beside(400j), *beside(0j)).linkages
    assert [each.pins[0].at.imag for each in found] == [0.0, 400.0]


def test_links_that_share_a_moving_pin_are_one_mechanism() -> None:
    assert len(read(*tipper(), rod(C, 200 + 120j), ring(200 + 120j)).linkages) == 1


def test_an_assembly_with_no_joint_to_the_frame_is_counted_with_its_longest_link_held() -> None:
    loose = [ring(at) for at in (A, B, C, D)]
    found = linkage(*loose, rod(A, B), rod(B, C), rod(C, D))
    assert not found.grounded
    assert found.links[found.frame].name == "P2-P4"
    assert found.drives == ()
    assert "frame" not in links(*loose, rod(A, B), rod(B, C), rod(C, D))


def test_frame_pins_that_are_stated_make_a_mechanism_grounded() -> None:
    loose = [ring(A), ring(B), rod(A, B), text("A", A + 5)]
    found = linkage(*loose, settings=Settings(frame_pins=("A",)))
    assert found.grounded
    assert [pin.name for pin in found.pins if pin.fixed] == ["A"]


def test_the_frame_link_has_the_fixed_pins_of_its_mechanism_and_their_linework() -> None:
    drawn = [*tipper(), line(A - 4j, A - 20j, layer="FRAME", handle="bracket"), *beside(500 + 0j)]
    first, second = read(*drawn).linkages
    assert [first.pins[pin].name for pin in first.links[0].pins] == ["A", "D"]
    assert set(first.links[0].handles) == {"bracket", "ring A", "ring D"}
    assert "bracket" not in second.links[0].handles
