from __future__ import annotations

import cmath
import math
from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.drawing.primitives import BlockUse, Ring, Source
from dxfcheck.reading.lines.linework import make_linework
from dxfcheck.reading.lines.pins import find_pins
from dxfcheck.reading.lines.touches import find_touches
from dxfcheck.reading.shapes.contours import Contour, find_contours
from dxfcheck.reading.shapes.holes import OutlineLinks, cut_slots, find_outline_links, owner_of_cut
from dxfcheck.reading.shapes.obrounds import Channel, Obround, find_obrounds
from dxfcheck.reading.shapes.slots import find_slots
from tests.sketches import SOURCE, TOLERANCE, Drawn, arc, laid_out, line, obround, path, ring, sketch

FAR = line(-200 + 150j, 200 + 150j)


def outlines(*things: Drawn, slots: bool = False) -> tuple[OutlineLinks, list[Contour], list[Obround]]:
    sheet, _ = laid_out(*things, FAR)
    cuts = find_obrounds(sheet.strands, sheet.touching) if slots else []
    apart = sheet.ring_strands | {strand for cut in cuts for strand in cut.strands}
    landings = sheet.landings.landings
    found = find_contours(sheet.linework, sheet.touching, sheet.tolerance, apart, sheet.pins, landings)
    voids: list[Channel] = list(cuts)
    return find_outline_links(found, sheet.strands, landings, sheet.pins, (), sheet.tolerance, voids), found, cuts


def held(links: OutlineLinks) -> dict[int, list[int]]:
    sites: dict[int, list[int]] = {}
    for landing in links.held:
        sites.setdefault(landing.strand, []).append(landing.pin)
    return sites


def bar(one: complex, other: complex, width: float = 10.0) -> list[Drawn]:
    """A bar of loose lines and arcs without its holes."""
    along = (other - one) / abs(other - one)
    side = width * along * 1j
    turn = math.degrees(cmath.phase(along))
    return [
        line(one - side, other - side),
        arc(other, width, turn - 90, 180),
        line(other + side, one + side),
        arc(one, width, turn + 90, 180),
    ]


def holes(*places: complex, radius: float = 4.0) -> list[Drawn]:
    return [ring(at, radius) for at in places]


P, Q, R, S = 0j, 100 + 0j, 160 + 60j, 60 + 60j


def test_a_pair_of_bars_with_two_rings_at_the_common_pin() -> None:
    """Sites by place: P is 0, Q is 1 (two rings), R is 2."""
    links, _, _ = outlines(*holes(P, Q), *bar(P, Q), *holes(Q, R), *bar(Q, R))
    assert held(links) == {0: [0, 1], 4: [1, 2]}
    assert links.groups == ((0, 1, 2, 3), (4, 5, 6, 7))
    assert links.oddities == ()
    assert links.borders == frozenset()


def test_a_common_ring_at_two_rounded_ends_is_a_hole_of_both() -> None:
    links, _, _ = outlines(*holes(P, Q, R), *bar(P, Q), *bar(Q, R))
    assert held(links) == {0: [0, 1], 4: [1, 2]}
    assert links.oddities == ()


def test_a_hole_that_another_bar_merely_passes_over_is_said_to_be_doubtful() -> None:
    under = bar(50 + 3j, 50 - 80j)
    links, _, _ = outlines(*holes(P, Q), *bar(P, Q), *holes(50 + 3j, 50 - 80j), *under)
    assert held(links) == {0: [0, 1], 4: [2, 3]}
    (odd,) = links.oddities
    assert odd.kind == "doubtful-hole"
    assert odd.site == 2
    assert odd.strands == (0, 1, 2, 3)
    assert (
        odd.detail == "an outline with holes on its axis lies over it, off that axis: read as no hole of that outline"
    )


def test_with_two_rings_drawn_there_both_have_it() -> None:
    links, _, _ = outlines(*holes(P, Q, 50 + 0j), *bar(P, Q), *holes(50 + 0j, 50 - 80j), *bar(50 + 0j, 50 - 80j))
    assert held(links) == {0: [0, 1, 2], 4: [2, 3]}
    assert links.oddities == ()


def test_with_nothing_to_tell_by_all_have_it_and_that_is_said() -> None:
    plates = [
        path(-10 - 10j, 60 - 10j, 60 + 10j, -10 + 10j, closed=True),
        path(20 - 30j, 20 + 50j, 40 + 50j, 40 - 30j, closed=True),
    ]
    links, _, _ = outlines(*holes(0j, 30 + 4j, 34 + 40j), *plates)
    assert held(links) == {0: [0, 1], 1: [1, 2]}
    (odd,) = links.oddities
    assert odd.detail.endswith("read as a hole of all of them")


def test_a_common_ring_on_the_axes_of_flat_bars_is_a_hole_of_both() -> None:
    """A flat bar and a rounded one that meet, and a rounded one with a third hole in its middle."""
    flat = path(-10 - 10j, 110 - 10j, 110 + 10j, -10 + 10j, closed=True)
    links, _, _ = outlines(*holes(P, Q, R), flat, *bar(Q, R))
    assert held(links) == {0: [0, 1], 1: [1, 2]}
    assert links.oddities == ()
    middle, end = 50 + 0j, 50 - 80j
    links, _, _ = outlines(*holes(P, Q, middle, end), *bar(P, Q), *bar(middle, end))
    assert held(links) == {0: [0, 1, 2], 4: [2, 3]}
    assert links.oddities == ()


def square(low: complex, high: complex) -> Contour:
    corners = (low, complex(high.real, low.imag), high, complex(low.real, high.imag))
    return Contour((), corners, ())


USE, OTHER = BlockUse("BAR", "A"), BlockUse("BAR", "B")


@pytest.mark.parametrize(
    ("ring_source", "sources", "owners"),
    [
        pytest.param(("0", USE), [("0", USE), ("0", OTHER)], [True, False], id="one block reference"),
        pytest.param(("A", None), [("B", None), ("A", None)], [False, True], id="one layer"),
        pytest.param(("A", None), [("A", None), ("A", None)], [True, True], id="all on one layer"),
        pytest.param(("A", None), [("B", None), ("C", None)], [True, True], id="a layer of its own"),
        pytest.param(("A", USE), [("A", OTHER), ("B", USE)], [False, True], id="its block says more than its layer"),
    ],
)
def test_the_source_of_a_ring_decides_where_its_outlines_differ(
    ring_source: tuple[str, BlockUse | None], sources: list[tuple[str, BlockUse | None]], owners: list[bool]
) -> None:
    def source(layer: str, use: BlockUse | None) -> Source:
        return Source(0, "1", layer, "CONTINUOUS", (use,) if use else ())

    corners = (-20 - 20j, 20 - 20j, 20 + 20j, -20 + 20j)
    wider = (-30 - 10j, 30 - 10j, 30 + 10j, -30 + 10j)
    drawn = sketch(path(*corners, closed=True), path(*wider, closed=True)).primitives
    shapes = [shape._replace(source=source(*each)) for shape, each in zip(drawn, sources, strict=True)]
    linework = make_linework(shapes, ())  # type: ignore[arg-type]
    pins = find_pins([Ring(source(*ring_source), 0j, 4.0), Ring(SOURCE, 90j, 4.0)], TOLERANCE).pins
    touching = find_touches(linework, TOLERANCE, TOLERANCE.close)
    found = find_contours(linework, touching, TOLERANCE, (), pins)
    links = find_outline_links(found, linework.strands, (), pins, (), TOLERANCE)
    assert [(strand in held(links)) for strand in range(len(found))] == owners
    assert [odd.kind for odd in links.oddities] == ["doubtful-hole"]


def test_a_nut_round_a_hole_is_no_holder_of_it() -> None:
    nut = path(*(Q + cmath.rect(7.0, math.radians(60 * number)) for number in range(6)), closed=True)
    links, _, _ = outlines(*holes(P, Q), *bar(P, Q), nut)
    assert held(links) == {0: [0, 1]}
    assert links.oddities == ()


def test_a_hole_lies_wholly_inside_where_any_does() -> None:
    links, _, _ = outlines(*holes(P, Q), *bar(P, Q), *holes(50 + 8j))
    assert held(links) == {0: [0, 1]}


def test_an_outline_smaller_than_its_rings_has_those_whose_centres_lie_inside() -> None:
    links, _, _ = outlines(*holes(P, Q, radius=14.0), *bar(P, Q))
    assert held(links) == {0: [0, 1]}


def test_sides_of_a_bar_that_pass_by_other_pins_do_not_land_on_them() -> None:
    """A side through the centre of one, touching the ring of another, and its end's corner inside a third."""
    others = holes(30 + 10j, 60 + 14j, 100 - 8j)
    links, _, _ = outlines(*holes(P, Q), *bar(P, Q), *others)
    assert held(links) == {0: [0, 1]}
    assert {pin for strand, pin in links.void if strand < 4} >= {2, 3}


def test_a_corner_inside_the_ring_of_another_bar_is_no_pin_where_its_side_passes_smoothly_into_its_end() -> None:
    links, _, _ = outlines(*holes(P, Q), obround(P, Q, 10.0), *holes(101 + 9j))
    assert held(links) == {0: [0, 1]}


def test_an_outline_with_pins_at_its_corners_has_those() -> None:
    links, contours, _ = outlines(*holes(P, Q, R, 90 + 20j), path(P, Q, R, closed=True))
    assert len(contours) == 1
    assert held(links) == {}
    assert links.void == frozenset()


BORDER = path(-150 - 100j, 190 - 100j, 190 + 120j, -150 + 120j, closed=True)


def test_an_outline_round_other_bars_is_a_border_even_of_loose_lines() -> None:
    drawn = [*holes(P, Q, R), *bar(P, Q), *bar(Q, R)]
    links, _, _ = outlines(*drawn, BORDER)
    assert links.borders == {8}
    assert held(links) == {0: [0, 1], 4: [1, 2]}
    corners = [-150 - 100j, 190 - 100j, 190 + 120j, -150 + 120j]
    loose = [line(*pair) for pair in pairwise([*corners, corners[0]])]
    links, _, _ = outlines(*drawn, *loose)
    assert links.borders == {8, 9, 10, 11}
    assert links.oddities == ()


def test_an_outline_round_a_rod_between_two_pins_is_a_border() -> None:
    links, _, _ = outlines(*holes(P, Q), line(P, Q), path(-30 - 30j, 130 - 30j, 130 + 30j, -30 + 30j, closed=True))
    assert links.borders == {1}
    assert links.held == ()


def test_what_slides_in_a_slot_cut_out_of_a_plate_is_no_hole_of_the_plate() -> None:
    plate = path(-20 - 20j, 120 - 20j, 120 + 20j, -20 + 20j, closed=True)
    slot = obround(30 + 0j, 70 + 0j, 5.0)
    links, contours, cuts = outlines(*holes(P, Q), plate, slot, *holes(50 + 0j), slots=True)
    assert held(links) == {0: [0, 1]}
    assert [owner_of_cut(cut, contours) for cut in cuts] == [0]


def test_a_slot_is_cut_out_of_the_smallest_outline_round_it_that_is_no_border() -> None:
    def contour(number: int, half: float) -> Contour:
        corners = (complex(-half, -half), complex(half, -half), complex(half, half), complex(-half, half))
        return Contour((number,), corners, ())

    slot = Obround((9,), (-10 + 0j, 10 + 0j), 4.0)
    nested = [contour(0, 80.0), contour(1, 40.0), contour(2, 12.0)]
    assert owner_of_cut(slot, nested) == 1
    assert owner_of_cut(slot, nested, borders={1}) == 0
    assert owner_of_cut(slot, nested[2:]) is None


@given(
    turns=st.lists(st.floats(0.3, 2.8), min_size=2, max_size=4),
    shared=st.booleans(),
    degrees=st.floats(0.0, 360.0),
)
def test_a_chain_of_bars_is_read_whatever_way_it_is_laid(turns: list[float], shared: bool, degrees: float) -> None:  # noqa: FBT001
    """Rounded bars end to end, each with its own holes or with common rings; the sheet turned by any angle."""
    places = [0j]
    heading = math.radians(degrees)
    for number, turn in enumerate(turns):
        heading += turn if number % 2 else -turn
        places.append(places[-1] + cmath.rect(40.0, heading))
    spans = list(pairwise(places))
    rings = holes(*places) if shared else [each for span in spans for each in holes(*span)]
    links, _, _ = outlines(*rings, *(piece for span in spans for piece in bar(*span)))
    for number in range(len(spans)):
        assert {number, number + 1} <= set(held(links)[4 * number])


def test_a_bar_has_its_two_pins_whatever_else_lies_inside() -> None:
    """Also where its outline is no contour."""
    sheet, _ = laid_out(*holes(P, Q, 50 + 5.5j), *bar(P, Q), *holes(50 + 60j), FAR)
    shapes = find_obrounds(sheet.strands, sheet.touching)
    bars = find_slots(shapes, sheet.pins, sheet.linework, sheet.tolerance).bars
    landings = sheet.landings.landings
    found = find_contours(sheet.linework, sheet.touching, sheet.tolerance, sheet.ring_strands, sheet.pins, landings)
    for contours in (found, []):
        links = find_outline_links(contours, sheet.strands, landings, sheet.pins, (), sheet.tolerance, bars=bars)
        assert sorted(landing.pin for landing in links.held) == [0, 1]
        assert [sorted(group) for group in links.groups] == [[0, 1, 2, 3]]


def test_an_assembly_in_which_a_hole_of_one_bar_slides_in_a_slot_of_another() -> None:
    """Bar P-Q with a slot, and a bar whose end hole lies in that slot."""
    slot = obround(30 + 0j, 70 + 0j, 5.0)
    drawn = [*holes(P, Q), *bar(P, Q), slot, *holes(45 + 0j, 45 - 80j), *bar(45 + 0j, 45 - 80j)]
    sheet, _ = laid_out(*drawn, FAR)
    landings = sheet.landings.landings
    found = find_contours(sheet.linework, sheet.touching, sheet.tolerance, (), sheet.pins, landings)
    shapes = find_obrounds(sheet.strands, sheet.touching)
    slots = find_slots(shapes, sheet.pins, sheet.linework, sheet.tolerance, carrying=(), outlines=found)
    assert [(each.strands, each.sites) for each in slots.slots] == [((4,), (2,))]
    assert [bar.sites for bar in slots.bars] == [(0, 1), (2, 3)]
    cut = slots.slots[0].shape
    rest = [contour for contour in found if 4 not in contour.strands]
    links = find_outline_links(rest, sheet.strands, landings, sheet.pins, (), sheet.tolerance, [cut], slots.bars)
    assert held(links) == {0: [0, 1], 5: [2, 3]}
    assert links.oddities == ()
    assert owner_of_cut(cut, rest) == 0


def test_bars_that_overhang_share_a_common_ring_without_doubt() -> None:
    up = 60j
    drawn = [*holes(P, Q, Q + up), obround(P - 12, Q + 12, 9.0), obround(Q - 12j, Q + up + 12j, 9.0)]
    sheet, _ = laid_out(*drawn, FAR)
    landings = sheet.landings.landings
    bars = find_slots(find_obrounds(sheet.strands, sheet.touching), sheet.pins, sheet.linework, sheet.tolerance).bars
    found = find_contours(sheet.linework, sheet.touching, sheet.tolerance, (), sheet.pins, landings)
    links = find_outline_links(found, sheet.strands, landings, sheet.pins, (), sheet.tolerance, bars=bars)
    assert held(links) == {0: [0, 1], 1: [1, 2]}
    assert links.oddities == ()


@pytest.mark.parametrize(
    ("extra", "cut"),
    [
        pytest.param([], True, id="bare"),
        pytest.param([line(50 + 4j, 50 + 60j)], True, id="a rod ends on its pin"),
        pytest.param([line(60 + 5j, 65 + 10j)], False, id="a stroke ends on its side"),
    ],
)
def test_which_slots_may_be_cut_out_of_an_outline(extra: list[Drawn], cut: bool) -> None:  # noqa: FBT001
    sheet, _ = laid_out(obround(30 + 0j, 70 + 0j, 5.0), *holes(50 + 0j), *extra, FAR)
    shapes = find_obrounds(sheet.strands, sheet.touching)
    slots = find_slots(shapes, sheet.pins, sheet.linework, sheet.tolerance).slots
    assert len(cut_slots(slots, sheet.touching, sheet.landings.landings)) == (1 if cut else 0)
