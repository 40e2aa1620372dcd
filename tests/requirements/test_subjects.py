from __future__ import annotations

from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.requirements.requirement_text import read_expected_speed, read_limit
from dxfcheck.requirements.subjects import Parts, Subject, is_pattern
from dxfcheck.settings import Requirement
from tests.drive_models import dibber, hoist, shuttle


def driven(linkage: Linkage, link: str, rate: float = 2.0) -> Parts:
    index = next(number for number, each in enumerate(linkage.links) if each.name == link)
    moving = replace(linkage, drives=(Drive(link=index, against=linkage.frame, rate=rate),))
    return Parts([(moving, analyse(moving))])


def subjects(parts: Parts, requirement: Requirement) -> list[Subject]:
    return parts.of(requirement, 0)


def slide(name: str) -> Requirement:
    return read_limit("slide-speed", name, "1 mm/s")


def test_a_block_is_named_by_itself_and_by_its_pin() -> None:
    parts = driven(dibber(), "B-O")
    (by_name,) = subjects(parts, slide("block at C"))
    assert (by_name.name, by_name.against) == ("block at C", "")
    assert subjects(parts, slide("C")) == [by_name]
    assert subjects(parts, slide("*")) == [by_name]


def test_a_slides_speed_is_the_blocks() -> None:
    parts = driven(dibber(), "B-O")
    (block,) = subjects(parts, slide("block at C"))
    (pin,) = subjects(parts, read_limit("pin-speed", "C", "1 mm/s"))
    assert block.actual is not None
    assert abs(block.actual) == pytest.approx(pin.actual)


def test_a_block_on_a_moving_link_slides_against_it() -> None:
    parts = driven(shuttle(), "B-O")
    (block,) = subjects(parts, slide("block at B"))
    assert block.against == "P-Q"
    assert subjects(parts, read_limit("slide-speed", "block at B against P-Q", "1 mm/s"))[0].key == block.key
    assert subjects(parts, read_limit("slide-speed", "block at B against frame", "1 mm/s")) == []


def test_a_telescope_is_named_by_its_pins_and_positive_is_apart() -> None:
    arm = "A-C"
    (closing,) = subjects(driven(hoist(), arm), read_expected_speed("C-D", "1 mm/s"))
    (opening,) = subjects(driven(hoist(), arm, -2.0), read_expected_speed("D-C", "1 mm/s"))
    assert closing.name == "C-D"
    assert closing.actual is not None
    assert opening.actual is not None
    # Turning the arm counter-clockwise swings C away from D, which lies to its right.
    assert closing.actual > 0.0
    assert opening.actual == pytest.approx(-closing.actual)


def test_links_are_named_by_two_of_their_pins_in_any_order() -> None:
    parts = driven(shuttle(), "B-O")
    for name in ("B-O", "O-B", "OB"):
        (link,) = subjects(parts, read_limit("link-speed", name, "1 rpm"))
        assert link.name == "B-O"
        assert link.actual == pytest.approx(2.0)


def test_a_link_against_itself_is_nothing() -> None:
    assert subjects(driven(shuttle(), "B-O"), read_limit("link-speed", "B-O against O-B", "1 rpm")) == []


def test_in_a_mechanism_without_a_frame_links_have_no_known_speed() -> None:
    loose = replace(shuttle(), grounded=False)
    parts = Parts([(loose, analyse(loose))])
    (link,) = subjects(parts, read_limit("link-speed", "B-O", "1 rpm"))
    assert link.actual is None


@pytest.mark.parametrize(("name", "pattern"), [("A-B", False), ("A-B (2)", False), ("A*", True), ("?-B", True)])
def test_patterns_are_told_from_names(name: str, pattern: bool) -> None:  # noqa: FBT001
    assert is_pattern(name) == pattern
