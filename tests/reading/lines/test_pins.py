from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.lines.pins import PinSites, find_pins
from tests.sketches import SOURCE, TOLERANCE, A, B, C, D, Drawn, arc, labels, laid_out, line, links, read_as, ring, rods

T = TOLERANCE.t
OTHERS = (ring(A, layer="FRAME"), ring(C), ring(D, layer="FRAME"), *rods(), *labels())
"""The tray tipper without its ring at B."""


def pins(*rings: tuple[complex, float]) -> PinSites:
    return find_pins([Ring(SOURCE, *each) for each in rings], TOLERANCE)


def sides(count: int, radius: float = 4.0, *, squeezed: float = 1.0) -> list[Drawn]:
    corners = [B + cmath.rect(radius, math.tau * number / count) for number in range(count)]
    corners = [complex(corner.real, B.imag + squeezed * (corner.imag - B.imag)) for corner in corners]
    return [line(corners[number - 1], corners[number], handle=f"side {number}") for number in range(count)]


def test_rings_on_one_centre_are_one_pin_whatever_their_radii() -> None:
    (pin,) = pins((0j, 6.0), (complex(0.9 * T, 0), 2.0), (0j, 4.0)).pins
    assert pin.radii == (2.0, 4.0, 6.0)
    assert pin.radius == 2.0
    assert pin.at == complex(0.9 * T, 0), "its place is the centre of its smallest ring"


def test_rings_further_apart_than_t_are_two_pins_stacked_on_one_another() -> None:
    sites = pins((0j, 4.0), (complex(1.1 * T, 0), 2.0))
    assert len(sites.pins) == 2
    ((one, other, distance),) = sites.stacked
    assert (one, other) == (0, 1)
    assert distance == pytest.approx(1.1 * T)
    assert sites.discs == ()


@pytest.mark.parametrize(
    ("apart", "stacked"),
    [pytest.param(5.9, 1, id="within one and a half times the greater radius"), pytest.param(6.1, 0, id="beyond")],
)
def test_how_near_two_pins_stand_on_one_another(apart: float, stacked: int) -> None:
    assert len(pins((0j, 4.0), (complex(apart, 0), 3.0)).stacked) == stacked


def test_a_ring_that_holds_another_pin_off_its_centre_is_a_disc() -> None:
    sites = pins((0j, 30.0), (20 + 0j, 3.0), (-20 + 0j, 3.0), (60 + 0j, 3.0))
    (disc,) = sites.discs
    assert disc.ring.radius == 30.0
    assert [sites.pins[index].at for index in disc.holds] == [20 + 0j, -20 + 0j]
    assert [pin.at for pin in sites.pins] == [20 + 0j, -20 + 0j, 60 + 0j]


def test_a_ring_about_the_centre_of_a_pitch_circle_is_the_rim_of_that_wheel() -> None:
    rings = [Ring(SOURCE, 0j, 70.0), Ring(SOURCE, 35 + 0j, 3.0), Ring(SOURCE, 0j, 3.0)]
    for centre, rim in ((0.5 + 0j, True), (35 + 0j, False)):
        (disc,) = find_pins(rings, TOLERANCE, [Ring(SOURCE, centre, 60.0)]).discs
        assert disc.rim is rim


@pytest.mark.parametrize(("off", "discs", "stacked"), [(7.4, 0, 1), (7.6, 1, 0)])
def test_rings_nearly_on_one_centre_were_meant_to_be_and_make_no_disc(off: float, discs: int, stacked: int) -> None:
    sites = pins((0j, 30.0), (complex(off, 0), 10.0))
    assert (len(sites.discs), len(sites.stacked)) == (discs, stacked)


def test_a_ring_that_holds_another_in_part_is_no_disc() -> None:
    assert pins((0j, 30.0), (28 + 0j, 3.0)).discs == ()


def test_a_pin_on_a_frame_layer_says_so() -> None:
    frame = Ring(SOURCE._replace(layer="Gestell"), 0j, 3.0)
    (one, other) = find_pins([frame, Ring(SOURCE, 50 + 0j, 3.0)], TOLERANCE).pins
    assert one.frame == "layer Gestell"
    assert other.frame is None


def test_no_rings_make_no_pins() -> None:
    assert pins() == PinSites(pins=(), discs=(), stacked=())


@pytest.mark.parametrize(
    "pieces",
    [
        pytest.param([(0, 180), (180, 180)], id="two halves"),
        pytest.param([(45, 180), (225, 180)], id="turned halves"),
        pytest.param([(10, 120), (250, 120), (130, 120)], id="three thirds"),
        pytest.param([(0, 270), (270, 90)], id="uneven"),
    ],
)
def test_arcs_that_make_a_full_turn_are_a_ring(pieces: list[tuple[float, float]]) -> None:
    arcs = [arc(B, 4.0, *piece, handle=f"arc {number}") for number, piece in enumerate(pieces)]
    assert links(*OTHERS, *arcs) == ["frame", "A-B", "B-C", "C-D"]
    assert {read_as(*OTHERS, *arcs)[f"arc {number}"] for number in range(len(pieces))} == {"pin"}


@pytest.mark.parametrize(
    "arcs",
    [
        pytest.param([arc(B, 4.0, 0, 180)], id="a half is missing"),
        pytest.param([arc(B, 4.0, 0, 180), arc(B, 4.0, 180, 170)], id="a gap"),
        pytest.param([arc(B, 4.0, 0, 180), arc(B, 4.0, 90, 180)], id="one over the other"),
        pytest.param([arc(B, 4.0, 0, 180), arc(B, 4.3, 180, 180)], id="other radius"),
        pytest.param([arc(B, 4.0, 0, 180), arc(B + 0.3, 4.0, 180, 180)], id="other centre"),
    ],
)
def test_arcs_that_make_no_full_turn_are_no_ring(arcs: list[Drawn]) -> None:
    sheet, _ = laid_out(*OTHERS, *arcs)
    assert len(sheet.pins) == 3
    assert not sheet.ring_strands


@pytest.mark.parametrize(("count", "rings"), [(10, 1), (16, 1), (36, 1), (9, 0)])
def test_a_closed_loop_of_many_short_lines_is_a_ring(count: int, rings: int) -> None:
    sheet, _ = laid_out(*OTHERS, *sides(count))
    assert len(sheet.pins) == 3 + rings
    assert len(sheet.ring_strands) == count * rings


def test_a_loop_that_is_open_or_not_round_is_no_ring() -> None:
    assert not laid_out(*OTHERS, *sides(16)[:-1])[0].ring_strands
    assert not laid_out(*OTHERS, *sides(16, squeezed=0.9))[0].ring_strands


def test_a_ring_of_lines_works_as_a_pin() -> None:
    drawn = [*OTHERS, *sides(24)]
    assert links(*drawn) == ["frame", "A-B", "B-C", "C-D"]
    assert read_as(*drawn)["side 0"] == "pin"
