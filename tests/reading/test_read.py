from __future__ import annotations

from itertools import pairwise

import pytest

from dxfcheck.reading.read import read_linkages
from dxfcheck.settings import Settings
from tests.sketches import A, B, Drawn, line, links, path, read, ring, rod, sketch, text, tipper

NOTHING = sketch()


def test_the_tray_tipper_is_read_whole() -> None:
    reading = read(*tipper())
    (only,) = reading.linkages
    assert only.name == "M1"
    assert [link.name for link in only.links] == ["frame", "A-B", "B-C", "C-D"]
    assert [pin.name for pin in only.pins if pin.fixed] == ["A", "D"]
    assert reading.observations == ()
    assert reading.tolerance == pytest.approx(3e-6 * sketch(*tipper()).diagonal)


def test_an_empty_sheet_is_read_as_no_linkage() -> None:
    reading = read_linkages(NOTHING, Settings())
    assert (reading.linkages, reading.evidence, reading.account) == ((), (), ())
    assert [each.kind for each in reading.observations] == ["no-linkage"]


@pytest.mark.parametrize(
    "things",
    [
        pytest.param([ring(A)], id="one ring"),
        pytest.param([line(A, B)], id="one line"),
        pytest.param([line(A, A)], id="a line of no length"),
        pytest.param([ring(A), line(A, A)], id="... on a pin"),
        pytest.param([text("A", A)], id="a text"),
        pytest.param([path(A, B, A, closed=True), ring(A)], id="there and back"),
    ],
)
def test_hardly_anything_drawn_is_no_trouble(things: list[Drawn]) -> None:
    assert read(*things).linkages == ()


def test_without_evidence_all_else_is_the_same() -> None:
    drawn = sketch(*tipper())
    full, lean = (read_linkages(drawn, Settings(), with_evidence=wanted) for wanted in (True, False))
    assert lean.evidence == ()
    assert full.evidence
    assert (lean.linkages, lean.observations, lean.account) == (full.linkages, full.observations, full.account)


def test_a_wider_tolerance_joins_what_a_fine_one_leaves_apart() -> None:
    along = (B - A) / abs(B - A)
    arm = [line((A + B) / 2 + 0.5j * along, -60 + 60j), ring(-60 + 60j), text("E", -60 + 66j)]
    assert links(*tipper(), *arm, settings=Settings(tolerance=0.6)) == ["frame", "A-B-E", "B-C", "C-D"]
    assert links(*tipper(), *arm, settings=Settings(tolerance=0.4)) == ["frame", "A-B", "B-C", "C-D"]
    assert read(*tipper(), settings=Settings(tolerance=0.4)).tolerance == 0.4


def test_a_lone_line_between_rings_is_no_linkage() -> None:
    """Schematics of other trades look alike."""
    assert read(ring(A), ring(B), rod(A, B)).linkages == ()


def test_a_link_joined_to_the_frame_is_a_linkage() -> None:
    assert links(ring(A, layer="FRAME"), ring(B), rod(A, B)) == ["frame", "P1-P2"]


def test_a_link_with_two_shared_pins_is_a_linkage_without_a_frame() -> None:
    ends = [0j, 50 + 0j, 50 + 50j, 100 + 50j]
    rings = [ring(at) for at in ends]
    bars = [rod(start, end) for start, end in pairwise(ends)]
    assert len(links(*rings, *bars)) == 3
    assert read(*rings[:3], *bars[:2]).linkages == ()


def test_a_ring_with_one_link_is_a_tracing_point() -> None:
    tip = 90 + 120j
    reading = read(*tipper(), line((B + 160 + 80j) / 2, tip), ring(tip), text("E", tip + 5))
    (only,) = reading.linkages
    assert [pin.links for pin in only.pins if pin.name == "E"] == [(2,)]
    assert reading.observations == ()


def test_a_pin_may_be_read_the_same_in_any_order_of_drawing() -> None:
    forward, backward = links(*tipper()), links(*reversed(tipper()))
    assert forward == backward
