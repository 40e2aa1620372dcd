from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Evidence
from tests.reading.slides.sliders import C, block, crank_and_rod, dibber, guide, named, strokes
from tests.sketches import A, Drawn, line, obround, path, read, rectangle, ring, rod

STEM = line(154 + 0j, 300 + 0j, handle="stem")
PINS = (ring(0j, layer="FRAME"), ring(120 + 0j), ring(60 + 90j, layer="FRAME"), *named(A=0j, C=120 + 0j, D=60 + 90j))
TELESCOPE = (*PINS, rod(120 + 0j, 60 + 90j), rectangle(30 + 0j, 80, 24), line(40 + 0j, 116 + 0j))


def sleeve(left: float) -> Drawn:
    return path(left - 8j, left + 30 - 8j, left + 30 + 8j, left + 8j, closed=True, layer="FRAME")


def joints(*things: Drawn) -> list[Evidence]:
    """Evidence for joints other than pins."""
    return [each for each in read(*things).evidence if each.subject == "joint" and each.rule == 6]


SLOT = obround(130 + 0j, 180 + 0j, 4.5, handle="slot")._replace(layer="FRAME")


@pytest.mark.parametrize(
    ("things", "name", "why"),
    [
        pytest.param(
            dibber(guide()),
            "frame / block at C",
            "a rectangle round the pin (a block): its guide runs through it; 45 from one end of its guide, 45 from the "
            "other",
            id="through",
        ),
        pytest.param(
            dibber(guide(100 - 10j, 210.25 - 10j)),
            "frame / block at C",
            "a rectangle round the pin (a block): its guide runs beside it; 35 from one end of its guide, 45.25 from "
            "the other",
            id="beside",
        ),
        pytest.param(
            dibber(*strokes(135 - 10j, 165 - 10j)),
            "frame / block at C",
            "a rectangle round the pin (a block): its guide is hatched along it",
            id="strokes",
        ),
        pytest.param(
            dibber(guide(90 - 10j, 160 - 10j)),
            "frame / block at C",
            "a rectangle round the pin (a block): its guide runs beside it",
            id="past the end",
        ),
        pytest.param(
            (*crank_and_rod(), STEM, sleeve(200)),
            "frame / C",
            "a fixed sleeve: its guide runs through it; 46 from one end of its guide, 70 from the other",
            id="sleeve",
        ),
        pytest.param(
            (*crank_and_rod(), STEM, sleeve(200), sleeve(250)),
            "frame / C",
            "a fixed sleeve: its guide runs through it; guided in several places along one direction, which is one "
            "joint",
            id="two sleeves",
        ),
        pytest.param(TELESCOPE, "A / C", "a barrel and a rod that enters it: its guide ends inside it", id="telescope"),
        pytest.param(
            (*crank_and_rod(), SLOT),
            "frame / B-C",
            "a pin in a slot; 20 from one end of the slot, 30 from the other",
            id="slot",
        ),
        pytest.param(
            (
                *crank_and_rod(),
                obround(120 + 0j, 180 + 0j, 8)._replace(layer="FRAME"),
                line(140 - 8j, 140 + 8j),
                line(160 - 8j, 160 + 8j),
            ),
            "frame / block at C",
            "a block between the sides of a slot; 30 from one end of its guide, 30 from the other",
            id="block in a slot",
        ),
    ],
)
def test_why_two_links_slide_on_one_another(things: tuple[Drawn, ...], name: str, why: str) -> None:
    (joint,) = joints(*things)
    assert (joint.name, joint.why, joint.mechanism) == (name, why, "M1")


def test_it_names_the_place_and_the_linework() -> None:
    (joint,) = joints(*dibber(guide()))
    assert (joint.at, joint.handles) == (C, ("block", "guide"))


def wheels() -> tuple[Drawn, ...]:
    """Two gears on two cranks, the one of them with a slide as well."""
    second = -100 + 0j
    return (
        *dibber(guide()),
        ring(second, layer="FRAME"),
        rod(second, second + 50j),
        ring(second + 50j),
        *named(E=second, F=second + 50j),
        ring(A, 40.0, layer="PITCH", handle="pinion"),
        ring(second, 60.0, layer="PITCH", handle="wheel"),
    )


def test_every_joint_has_the_reason_of_its_own_contact() -> None:
    found = {joint.name: joint for joint in joints(*wheels())}
    assert found["A-B / E-F"].why.startswith("pitch circle of radius 40 rolls on that of radius 60")
    assert set(found["A-B / E-F"].handles) == {"pinion", "wheel"}
    assert found["frame / block at C"].why.startswith("a rectangle round the pin")


def test_a_pin_joint_at_a_block_is_told_by_its_pin() -> None:
    (joint,) = [each for each in read(*crank_and_rod(), block(), guide()).evidence if each.name == "B-C / block at C"]
    assert (joint.rule, joint.why) == (3, "both are pinned at C")


def test_a_block_is_told_by_its_outline() -> None:
    links = {each.name: each for each in read(*dibber(guide())).evidence if each.subject == "link"}
    assert links["block at C"].why == "1 outline: holds C"
    assert links["block at C"].handles == ("block",)
