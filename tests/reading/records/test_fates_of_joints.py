from __future__ import annotations

import pytest

from tests.reading.slides.sliders import C, crank_and_rod, dibber, guide, loose_rectangle, named, strokes
from tests.sketches import A, Drawn, fates, line, obround, path, read, rectangle, ring, rod

SECOND = -100 + 0j
SLOT = obround(130 + 0j, 180 + 0j, 4.5, handle="slot")
WIDE_SLOT = obround(120 + 0j, 180 + 0j, 8, handle="slot")._replace(layer="FRAME")
KEEPERS = (line(140 - 8j, 140 + 8j, handle="one end"), line(160 - 8j, 160 + 8j, handle="other end"))
STEM = line(154 + 0j, 300 + 0j, handle="stem")
SLEEVE = path(200 - 8j, 230 - 8j, 230 + 8j, 200 + 8j, closed=True, layer="FRAME", handle="sleeve")
WHEELS = (
    ring(SECOND, layer="FRAME"),
    rod(SECOND, SECOND + 50j),
    ring(SECOND + 50j),
    *named(E=SECOND, F=SECOND + 50j),
    ring(A, 40.0, layer="PITCH", handle="pinion"),
    ring(SECOND, 60.0, layer="PITCH", handle="wheel"),
    ring(SECOND, 20.0, layer="PITCH", handle="idle wheel"),
)


@pytest.mark.parametrize(
    ("things", "expected"),
    [
        pytest.param(
            dibber(guide()),
            {"block": ("slide", "a block, or a barrel"), "guide": ("frame", "frame by layer FRAME")},
            id="block on a frame layer's guide",
        ),
        pytest.param(
            dibber(guide(layer="0"), *strokes(170 + 0j, 210 + 0j)),
            {
                "guide": ("frame", "base line of a frame symbol with hatch strokes"),
                "stroke 0": ("frame", "hatch stroke of a frame symbol"),
            },
            id="guide with strokes",
        ),
        pytest.param(
            dibber(*strokes(135 - 10j, 165 - 10j)),
            {"block": ("slide", "a block, or a barrel"), "stroke 0": ("frame", "hatch stroke of a frame symbol")},
            id="strokes on the block",
        ),
        pytest.param(dibber(), {"block": ("slide", "a block without a guide")}, id="no guide"),
        pytest.param(
            (*crank_and_rod(), *loose_rectangle(C, 30, 20), guide()),
            {f"side {number}": ("slide", "a block, or a barrel") for number in range(4)},
            id="four lines",
        ),
        pytest.param(
            (*crank_and_rod(), STEM, SLEEVE),
            {"sleeve": ("slide", "a sleeve on the frame"), "stem": ("link", "part of a link")},
            id="sleeve",
        ),
        pytest.param(
            (*crank_and_rod(), SLOT),
            {"slot": ("slot", "a pin runs in it"), "rod": ("link", "part of a link")},
            id="slot",
        ),
        pytest.param(
            (*crank_and_rod(), WIDE_SLOT, *KEEPERS),
            {
                "slot": ("slot", "a pin runs in it"),
                "one end": ("slide", "a block in a slot"),
                "other end": ("slide", "a block in a slot"),
            },
            id="block in a slot",
        ),
        pytest.param(
            (*dibber(guide()), *WHEELS),
            {
                "pinion": ("pitch circle", "rolls on another or on a rack"),
                "wheel": ("pitch circle", "rolls on another or on a rack"),
                "idle wheel": ("skipped", "ring in a chain linetype or on a pitch layer that rolls on nothing"),
            },
            id="wheels",
        ),
    ],
)
def test_what_slides_and_rolls_was_read_as(things: tuple[Drawn, ...], expected: dict[str, tuple[str, str]]) -> None:
    found = fates(*things)
    assert {handle: tuple(found[handle]) for handle in expected} == expected


def test_a_guide_taken_as_frame_is_counted_as_frame() -> None:
    assert fates(*dibber(guide(layer="0")))["guide"].read_as == "frame"


def test_the_guide_on_a_link_is_part_of_that_link() -> None:
    swinging = (line(210 + 0j, 240 + 0j, handle="arm"), ring(244 + 0j, layer="FRAME"), *named(F=244 + 0j))
    found = fates(*dibber(guide(layer="0"), *swinging))
    assert found["guide"] == found["arm"] == ("link", "part of a link")


def test_the_accounts_words_for_them_sum_to_the_entities() -> None:
    things = (*dibber(guide(), *strokes(170 + 0j, 210 + 0j)), *WHEELS, rectangle(400 + 0j, 30, 20))
    account = read(*things).account
    assert sum(each.count for each in account) == len(things)
    words = {each.read_as: 0 for each in account}
    for each in account:
        words[each.read_as] += each.count
    assert (words["slide"], words["pitch circle"]) == (1, 2)
