from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.linkage import Linkage
from dxfcheck.settings import Settings
from tests.reading.slides.sliders import (
    A,
    B,
    C,
    Slid,
    block,
    crank_and_rod,
    dibber,
    guide,
    loose_rectangle,
    named,
    slid,
    slides_in,
    strokes,
    turned_rectangle,
)
from tests.sketches import Drawn, fill, laid_out, line, linkage, links, observed, path, read, rectangle, ring, rod

ALONG_X = Slid("frame", "block at C", 1 + 0j)
BELOW, ABOVE = guide(90 - 10j, 210 - 10j), guide(90 + 10j, 210 + 10j, handle="other guide")


def loose(drawn: Drawn) -> Drawn:
    """The same off the frame layer."""
    return drawn._replace(layer="0")


# --- guides of all makes ---


@pytest.mark.parametrize(
    "guides",
    [
        pytest.param([guide()], id="through"),
        pytest.param([guide(90 + 0j, 134 + 0j), guide(167 + 0j, 210 + 0j)], id="interrupted"),
        pytest.param([BELOW, ABOVE], id="rails"),
        pytest.param([BELOW], id="beside"),
        pytest.param([guide(90 - 18j, 210 - 18j)], id="beside with a gap"),
        pytest.param(strokes(135 - 10j, 165 - 10j), id="strokes on the block"),
        pytest.param([fill(135 - 10j, 165 - 10j, 165 - 15j, 135 - 15j, solid=False)], id="hatch along the block"),
        pytest.param([loose(BELOW), *strokes(90 - 10j, 210 - 10j)], id="beside with strokes"),
        pytest.param([loose(guide()), *strokes(170 + 0j, 210 + 0j)], id="through with strokes"),
    ],
)
def test_a_block_slides_on_the_frame_whatever_its_guide_is_made_of(guides: list[Drawn]) -> None:
    assert slid(*dibber(*guides)) == [ALONG_X]
    reading = read(*dibber(*guides))
    assert reading.observations == ()
    assert len(reading.linkages[0].joints) == 4


def test_a_block_of_four_lines_is_one_link() -> None:
    drawn = (*crank_and_rod(), *loose_rectangle(C, 30, 20), guide())
    assert slid(*drawn) == [ALONG_X]
    assert len(linkage(*drawn).links) == 4


@pytest.mark.parametrize(
    ("degrees", "way"), [(30.0, 30.0), (100.0, -80.0), (-30.0, -30.0), (90.0, 90.0), (-90.0, 90.0)]
)
def test_a_slide_points_to_plus_x_or_straight_up(degrees: float, way: float) -> None:
    turn = math.radians(degrees)
    reach = cmath.rect(60, turn)
    (found,) = slid(*crank_and_rod(), turned_rectangle(C, 30, 20, turn), guide(C - reach, C + reach))
    assert found.direction == pytest.approx(cmath.rect(1, math.radians(way)), abs=1e-6)


def test_strokes_on_the_blocks_end_make_it_slide_upright() -> None:
    (found,) = slid(*dibber(*strokes(165 - 10j, 165 + 10j, away=4 - 4j)))
    assert found == Slid("frame", "block at C", 1j)


@pytest.mark.parametrize(
    "cylinder",
    [
        pytest.param([path(90 + 10j, 210 + 10j, 210 - 10j, 90 - 10j, layer="FRAME")], id="open at one end"),
        pytest.param([path(90 + 10j, 210 + 10j, 210 - 10j, 90 - 10j, closed=True, layer="FRAME")], id="closed"),
        pytest.param([BELOW, ABOVE, guide(210 - 10j, 210 + 10j, handle="end")], id="three lines"),
    ],
)
def test_a_piston_slides_in_its_cylinder(cylinder: list[Drawn]) -> None:
    assert slid(*dibber(*cylinder)) == [ALONG_X]
    assert read(*dibber(*cylinder)).observations == ()


def test_a_piston_at_the_end_of_its_cylinder_has_one_guide() -> None:
    """The wall that closes the cylinder runs along the piston's end."""
    cylinder = path(90 + 10j, 165 + 10j, 165 - 10j, 90 - 10j, layer="FRAME")
    assert slid(*dibber(cylinder)) == [ALONG_X]
    assert observed("two-guides", *dibber(cylinder)) == []


def test_a_cylinder_round_a_piston_is_no_block_of_its_own() -> None:
    """Neither pinned to the rod nor sliding: the piston has the smaller box."""
    found = linkage(*dibber(rectangle(150 + 0j, 120, 20, handle="cylinder")))
    assert [link.name for link in found.links] == ["frame", "A-B", "B-C", "block at C"]
    assert slides_in(found) == [ALONG_X]


# --- rods that stop at the block ---


def test_a_rod_trimmed_at_the_block_is_pinned_in_it() -> None:
    drawn = (*crank_and_rod(rod_end=135 + 5j), block(), BELOW)
    assert slid(*drawn) == [ALONG_X]
    assert "B-C" in links(*drawn)


def test_a_rod_that_points_past_the_pin_is_welded_to_the_block() -> None:
    drawn = (*crank_and_rod(rod_end=135 - 5j), block(), BELOW)
    names = links(*drawn)
    assert "B-C" in names
    assert "block at C" not in names


def test_a_stroke_that_stops_at_the_block_where_another_rod_ends_on_its_pin_is_part_of_the_block() -> None:
    drawn = dibber(
        BELOW, line(165 + 0j, 200 + 0j, handle="push rod"), ring(204 + 0j, handle="ring E"), *named(E=204 + 0j)
    )
    assert "block at C-E" not in links(*drawn)
    assert "C-E" in links(*drawn)


def test_a_mark_inside_a_block_is_part_of_it_and_not_pinned_in_it() -> None:
    """It ends at the block's side as a trimmed rod does, but from within: it points away from the pin."""
    found = linkage(*crank_and_rod(rod_end=135 + 5j), block(), BELOW, line(141 + 0j, 135 + 0j, handle="mark"))
    assert {link.name: set(link.handles) for link in found.links}["block at C"] == {"block", "mark"}


def test_a_line_along_a_block_beside_its_guide_is_not_welded_to_it() -> None:
    drawn = (*crank_and_rod(), *loose_rectangle(C, 30, 20), guide(), line(90 - 10j, 210 - 10j, handle="edge"))
    (held,) = [link for link in linkage(*drawn).links if link.name == "block at C"]
    assert set(held.handles) == {f"side {number}" for number in range(4)}


def test_a_ring_as_wide_as_its_block_touches_its_guide_without_being_pinned_to_it() -> None:
    """The guide is drawn in two lines that overlap."""
    halves = (guide(90 - 10j, 170 - 10j), guide(130 - 10j, 210 - 10j, handle="other half"))
    wide = (ring(A, layer="FRAME"), ring(B), ring(C, 10.0), rod(A, B), line(B, C), *named(A=A, B=B, C=C))
    found = linkage(*wide, block(), *halves)
    assert [pin.name for pin in found.pins if pin.fixed] == ["A"]
    assert slides_in(found) == [ALONG_X]


# --- guides on links, and links that are guides ---

FOOT, CRANK_END = -60j, 40 + 0j
WAY = (CRANK_END - FOOT) / abs(CRANK_END - FOOT)
TIP = FOOT + 140 * WAY


def shaper(*lever: Drawn) -> tuple[Drawn, ...]:
    """A crank with a block on its end, and a lever that the block slides on."""
    pins = {"A": 0j, "B": CRANK_END, "D": FOOT, "E": TIP}
    rings = [ring(at, layer="FRAME" if name in "AD" else "0", handle=f"ring {name}") for name, at in pins.items()]
    on_lever = turned_rectangle(CRANK_END, 24, 16, cmath.phase(WAY))
    return (*rings, rod(0j, CRANK_END, handle="crank"), on_lever, *named(**pins), *lever)


@pytest.mark.parametrize(
    "lever",
    [
        pytest.param([rod(FOOT, TIP)], id="through"),
        pytest.param([rod(FOOT, CRANK_END - 8 * WAY), rod(CRANK_END + 8 * WAY, TIP)], id="interrupted"),
        pytest.param(
            [rod(FOOT, TIP), *(line(p - 10j * WAY, q - 10j * WAY) for p, q in [(FOOT + 50 * WAY, TIP)])],
            id="and a line beside",
        ),
    ],
)
def test_a_block_slides_on_the_lever_that_runs_through_it(lever: list[Drawn]) -> None:
    (found,) = slid(*shaper(*lever))
    assert {found.first, found.second} == {"block at B", "D-E"}
    assert found.direction == pytest.approx(WAY, abs=1e-6)


def test_the_lever_is_not_pinned_where_the_block_is() -> None:
    (at_block,) = [pin for pin in linkage(*shaper(rod(FOOT, TIP))).pins if pin.name == "B"]
    assert len(at_block.links) == 2


# --- boxes without a pin ---

STEM = line(154 + 0j, 200 + 0j, handle="stem")
RAM = rectangle(215 + 0j, 30, 20, handle="ram")
RAM_RAILS = (guide(180 + 10j, 260 + 10j), guide(180 - 10j, 260 - 10j, handle="other guide"))


def test_a_ram_welded_to_its_rod_slides_as_part_of_it() -> None:
    found = linkage(*crank_and_rod(), STEM, RAM, *RAM_RAILS)
    assert slides_in(found) == [ALONG_X]
    (joint,) = [joint for joint in found.joints if joint.kind == "slide"]
    (carrier,) = [link for link in found.links if link.name == "block at C"]
    assert (joint.pin, joint.at) == (None, 215 + 0j)
    assert set(carrier.handles) == {"stem", "ram"}


def test_a_rectangle_without_a_pin_or_a_rod_slides_nowhere() -> None:
    assert slid(*dibber(guide()), rectangle(300 + 0j, 30, 20), guide(250 + 0j, 350 + 0j, handle="far")) == [ALONG_X]


def test_strokes_along_a_ram_are_the_frame_that_it_slides_on() -> None:
    assert slid(*crank_and_rod(), STEM, RAM, *strokes(200 - 10j, 230 - 10j)) == [ALONG_X]


def test_a_rectangle_round_a_rod_is_no_link_that_slides_on_it() -> None:
    collar = turned_rectangle((B + C) / 2, 20, 10, cmath.phase(C - B), handle="collar")
    drawn = (*dibber(guide()), collar)
    assert slid(*drawn) == [ALONG_X]
    assert links(*drawn) == ["frame", "A-B", "B-C", "block at C"]


def test_a_slat_with_a_pin_in_it_is_the_guide_beside_a_block_and_no_block_itself() -> None:
    slat = (rectangle(160 - 18j, 140, 6, handle="slat"), ring(222 - 18j, 2.0, layer="FRAME"), *named(F=222 - 18j))
    drawn = (*crank_and_rod(), rectangle(C, 34, 30, handle="block"), *slat)
    assert {*slid(*drawn)[0][:2]} == {"block at C", "F"}
    assert observed("block-without-guide", *drawn) == []


LONG_STEM = line(154 + 0j, 300 + 0j, handle="stem")


def sleeve(left: float, *, layer: str = "FRAME") -> Drawn:
    """A bush of 30 by 16 about the x axis."""
    corners = (left - 8j, left + 30 - 8j, left + 30 + 8j, left + 8j)
    return path(*corners, closed=True, layer=layer, handle=f"sleeve {left:g}")


@pytest.mark.parametrize(
    "bush",
    [
        pytest.param([sleeve(200)], id="by layer"),
        pytest.param([sleeve(200, layer="0"), *strokes(200 - 8j, 230 - 8j)], id="by strokes"),
        pytest.param(
            [sleeve(200, layer="0"), fill(200 - 8j, 230 - 8j, 230 - 14j, 200 - 14j, solid=False)], id="by a hatch"
        ),
    ],
)
def test_a_rod_slides_in_a_sleeve_on_the_frame(bush: list[Drawn]) -> None:
    drawn = (*crank_and_rod(), LONG_STEM, *bush)
    assert slid(*drawn) == [Slid("frame", "C", 1 + 0j)]
    assert read(*drawn).observations == ()


def test_two_sleeves_on_one_rod_are_one_joint() -> None:
    drawn = (*crank_and_rod(), LONG_STEM, sleeve(200), sleeve(250))
    assert slid(*drawn) == [Slid("frame", "C", 1 + 0j)]
    (why,) = [each.why for each in read(*drawn).evidence if "sleeve" in each.why and each.subject == "joint"]
    assert "one joint" in why


def test_a_rod_in_a_sleeve_runs_over_the_frame_pivots_in_its_way() -> None:
    pivot, knob = 260 + 0j, 260 + 60j
    arm = (ring(pivot, layer="FRAME"), ring(knob), rod(pivot, knob), *named(P=pivot, Q=knob))
    drawn = (*crank_and_rod(), LONG_STEM, sleeve(200), *arm)
    dibbing, turning = sorted(read(*drawn).linkages, key=lambda each: len(each.pins), reverse=True)
    assert slides_in(dibbing) == [Slid("frame", "C", 1 + 0j)]
    assert [link.name for link in turning.links] == ["frame", "P-Q"]
    (stem,) = [each for each in read(*drawn).evidence if (each.subject, each.name) == ("link", "C")]
    assert "lies over P without being pinned there" in stem.why


# --- telescopes ---

FRONT, ARM = 120 + 0j, 60 + 90j
BARREL = rectangle(30 + 0j, 80, 24, handle="barrel")
PISTON_ROD = line(40 + 0j, 116 + 0j, handle="piston rod")


def lift(*telescope: Drawn) -> Linkage:
    """A telescope between the frame pin A and the pin C of the arm CD."""
    pins = (ring(0j, layer="FRAME"), ring(FRONT), ring(ARM, layer="FRAME"), *named(A=0j, C=FRONT, D=ARM))
    return linkage(*pins, rod(FRONT, ARM, handle="arm"), *telescope)


@pytest.mark.parametrize(
    ("telescope", "barrel", "piston"),
    [
        pytest.param([BARREL, PISTON_ROD], ["barrel"], ["piston rod"], id="pin inside"),
        pytest.param(
            [BARREL, PISTON_ROD, line(40 - 12j, 40 + 12j, handle="piston")],
            ["barrel"],
            ["piston", "piston rod"],
            id="piston from wall to wall",
        ),
        pytest.param(
            [BARREL, PISTON_ROD, line(40 - 8j, 40 + 8j, handle="piston")],
            ["barrel"],
            ["piston", "piston rod"],
            id="piston clear of the walls",
        ),
        pytest.param(
            [rectangle(50 + 0j, 60, 24, handle="barrel"), line(4 + 0j, 20 + 0j, handle="clevis"), PISTON_ROD],
            ["barrel", "clevis"],
            ["piston rod"],
            id="clevis",
        ),
    ],
)
def test_a_rod_that_ends_in_a_barrel_slides_in_it(telescope: list[Drawn], barrel: list[str], piston: list[str]) -> None:
    found = lift(*telescope)
    assert slides_in(found) == [Slid("A", "C", 1 + 0j)]
    parts = {link.name: (link.kind, sorted(link.handles)) for link in found.links}
    assert (parts["A"], parts["C"]) == (("link", barrel), ("link", piston))
    assert len(found.joints) == 4


# --- guides on nothing ---

BESIDE_ALONE = loose(BELOW)


@pytest.mark.parametrize("unmarked", [loose(guide()), BESIDE_ALONE])
def test_a_guide_on_nothing_is_frame_where_the_rest_hangs_on_a_frame(unmarked: Drawn) -> None:
    assert slid(*dibber(unmarked)) == [ALONG_X]
    (note,) = observed("guide-taken-as-frame", *dibber(unmarked))
    assert (note.subject, note.mechanism, note.handles) == ("block at C", "M1", ("guide",))


def adrift() -> tuple[Drawn, ...]:
    """The dibber with no frame at all."""
    return tuple(each._replace(layer="0") for each in dibber(guide()))


def test_a_guide_on_nothing_is_a_link_where_there_is_no_frame() -> None:
    assert not linkage(*adrift()).grounded
    assert {*slid(*adrift())[0][:2]} == {"block at C", "guide"}
    assert observed("guide-taken-as-frame", *adrift()) == []


def test_a_guide_on_nothing_is_frame_where_the_user_states_a_frame_pin() -> None:
    stated = Settings(frame_pins=("A",))
    assert slid(*adrift(), settings=stated) == [ALONG_X]
    assert len(observed("guide-taken-as-frame", *adrift(), settings=stated)) == 1


# --- dead centres, and what is next to a slide without being part of it ---


def in_line(*guides: Drawn) -> tuple[Drawn, ...]:
    """A slider-crank stretched out."""
    pins = (ring(A, layer="FRAME"), ring(40 + 0j), ring(C), *named(A=A, B=40 + 0j, C=C))
    return (*pins, rod(A, 40 + 0j), rod(40 + 0j, C), block(), *guides)


@pytest.mark.parametrize("start", [100.0, 48.0])
@pytest.mark.parametrize("layer", ["FRAME", "0"])
def test_a_guide_that_ends_on_a_rod_in_line_with_it_is_not_welded_to_it(start: float, layer: str) -> None:
    extra = strokes(170 + 0j, 210 + 0j) if layer == "0" else ()
    drawn = in_line(guide(start + 0j, 210 + 0j, layer=layer), *extra)
    assert slid(*drawn) == [ALONG_X]
    assert links(*drawn) == ["frame", "A-B", "B-C", "block at C"]


def test_a_fixed_guide_that_stops_at_a_link_across_is_not_welded_to_it() -> None:
    """The crank, upright at this pose, stands where the guide begins."""
    pins = (ring(A, layer="FRAME"), ring(50j), ring(C), *named(A=A, B=50j, C=C))
    drawn = (*pins, rod(A, 50j), rod(50j, C), block(), guide(20j, 210 + 20j), guide(0 - 10j, 210 - 10j, handle="lower"))
    assert "A-B" in links(*drawn)


def test_what_the_slides_say_of_single_strands() -> None:
    """The first things drawn are strands 0 and 1: crank and rod; then block and guide."""
    _, parts = laid_out(*dibber(guide()))
    (slide,) = parts.slides.slides
    assert (slide.box.strands, slide.guide.strands) == ((2,), (3,))
    assert {(2, 3), (3, 2)} <= parts.slides.never
    assert {(2, 2), (3, 2)} <= parts.slides.dropped
    assert parts.slides.frame == {3: "guide of a slide on the frame"}
    assert parts.slides.strands == {2, 3}
    assert not slide.is_barrel


def test_the_piston_in_a_barrel_is_told_from_the_barrel() -> None:
    _, parts = laid_out(
        ring(0j, layer="FRAME"),
        ring(FRONT),
        ring(ARM, layer="FRAME"),
        rod(FRONT, ARM),
        BARREL,
        PISTON_ROD,
        line(40 - 12j, 40 + 12j),
    )
    assert parts.slides.inside == {3}
    assert [slide.is_barrel for slide in parts.slides.slides] == [True]
    assert parts.slides.frame == {}
