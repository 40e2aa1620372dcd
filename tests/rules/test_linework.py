from __future__ import annotations

import cmath
import math
from itertools import pairwise

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.settings import Settings
from tests.rules.subjects import findings, only
from tests.sketches import RADIUS, A, B, C, D, Drawn, arc, labels, line, pins, ring, rod, rods, text, tipper

ALONG = (C - B) / abs(C - B)
MIDDLE = (B + C) / 2
RULES = (
    "near-miss",
    "off-centre-end",
    "loose-end",
    "double-line",
    "short-line",
    "stacked-pins",
    "empty-pin",
    "duplicate-label",
    "unlabelled-pins",
    "weld-on-ring",
)


def tipper_with(coupler: Drawn) -> tuple[Drawn, ...]:
    return (*pins(), rod(A, B), coupler, rod(C, D), *labels())


@pytest.mark.parametrize("rule", RULES)
def test_nothing_is_wrong_with_the_tray_tipper(rule: str) -> None:
    assert findings(rule, *tipper()) == []


def test_an_end_short_of_a_rim_is_an_error_with_gap_pin_and_limit() -> None:
    found = only("near-miss", *tipper_with(line(B, C - 7 * ALONG, handle="coupler")))
    assert found.severity == "error"
    assert "stops 3 mm short of the rim of pin C" in found.message
    assert found.remedy == "move the end from (153.3358, 77.85794) to (160, 80) (within 0.08 mm it counts as meeting)"
    assert (found.handles, found.layer, found.mechanism) == (("coupler",), "0", "M1")
    assert found.at == pytest.approx(C - 7 * ALONG)


def test_an_end_past_a_pin_is_a_warning_and_read_as_pinned() -> None:
    found = only("near-miss", *tipper_with(line(B, C + 5 * ALONG)))
    assert found.severity == "warning"
    assert "link B-C runs 5 mm past the centre of pin C and is read as pinned there" in found.message
    assert found.remedy == "trim it by 5 mm to (160, 80), or let it run on further if it is meant to"


def test_an_end_short_of_a_weld_is_an_error_with_both_handles() -> None:
    brace = line(A + 0.4 * (B - A), MIDDLE - 0.01j * ALONG, handle="brace")
    found = only("near-miss", *tipper(), brace)
    assert found.severity == "error"
    assert "0.01 mm short of the line" in found.message
    assert found.handles == ("brace", "coupler")


def test_figures_are_bare_where_the_drawing_has_no_unit() -> None:
    unitless = LengthUnit("unitless", "assumed", None)
    found = only("near-miss", *tipper_with(line(B, C - 7 * ALONG)), unit=unitless)
    assert "stops 3 short of" in found.message


def test_an_end_that_aims_past_a_centre_says_by_how_much() -> None:
    found = only("off-centre-end", *tipper_with(line(B, C - ALONG + 1j * ALONG)))
    assert found.severity == "warning"
    assert "an end of link B-C points" in found.message
    assert "past the centre of pin C" in found.message


def test_a_line_inside_a_ring_off_its_centre_is_a_link_not_an_end() -> None:
    found = only("off-centre-end", *tipper_with(line(B, C + 60 * ALONG + 0.5j * ALONG)))
    assert found.message.startswith("link B runs past the centre of pin C by")
    assert found.message.endswith("is read as not pinned there")


@pytest.mark.parametrize(
    ("extra", "severity", "words"),
    [
        pytest.param(line(B - 4j, B - 60j), "warning", "fewer than two joints", id="one joint"),
        pytest.param(line(MIDDLE, 90 + 120j), "note", "free end of a lever", id="two joints"),
    ],
)
def test_a_loose_end_weighs_by_the_joints_of_its_link(extra: Drawn, severity: str, words: str) -> None:
    found = only("loose-end", *tipper(), extra)
    assert found.severity == severity
    assert words in found.message


def test_a_double_line_names_both_handles_in_its_remedy() -> None:
    found = only("double-line", *tipper(), rod(B, C, handle="twice"))
    assert (found.severity, found.message) == ("warning", "a line of link B-C is drawn twice; it is read once")
    assert "(twice, coupler)" in found.remedy


def test_a_weld_mark_at_a_ring_says_how_the_link_was_read() -> None:
    mark = arc(C - RADIUS * ALONG, 3.0, math.degrees(cmath.phase(-ALONG)), 112.02, handle="mark")
    found = only("weld-on-ring", *tipper(), mark)
    assert (found.severity, found.handles) == ("warning", ("coupler", "mark"))
    assert found.message.startswith("at pin C: a weld mark stands where the link ends on the ring")
    assert "one polyline through the pin" in found.remedy


def test_a_speck_is_a_note_with_its_length() -> None:
    found = only("short-line", *tipper(), line(B, B + 0.003))
    assert found.severity == "note"
    assert "only 0.003 mm long" in found.message
    assert found.at == B


def test_stacked_pins_are_told_with_their_distance() -> None:
    found = only("stacked-pins", *tipper(), ring(B + 0.01, 2.0))
    assert found.severity == "warning"
    assert "lie only 0.01 mm apart" in found.message
    assert found.at == B + 0.01
    assert found.remedy.startswith("move the ring from (20.01, 35) to (20, 35) if they are one pin")


def test_an_empty_pin_is_told_at_its_place() -> None:
    found = only("empty-pin", *tipper(), ring(100 + 20j, handle="empty"))
    assert (found.severity, found.at, found.handles) == ("warning", 100 + 20j, ("empty",))


def test_a_label_at_two_pins_tells_where_the_other_is() -> None:
    found = only("duplicate-label", *pins(), *rods(), text("A", A + 5), text("A", C + 5))
    assert found.severity == "warning"
    assert found.message == "the label A stands at 2 pins, also at (160, 80)"


def test_pins_without_a_label_are_listed_with_their_names_and_places() -> None:
    found = only("unlabelled-pins", *pins(), *rods(), text("A", A + 5), text("B", B + 5))
    assert found.severity == "note"
    assert found.message.startswith("2 of 4 pins have no label")
    assert "P1 at (150, 0), P2 at (160, 80)" in found.message
    assert (found.at, found.mechanism) == (D, "M1")


def test_a_pin_of_several_mechanisms_is_one_pin() -> None:
    mirrored = [-A.conjugate(), -B.conjugate(), -C.conjugate(), -D.conjugate()]
    rings = [ring(at) for at in mirrored if at != A]
    found = only("unlabelled-pins", *pins(), *rods(), *rings, *(rod(*pair) for pair in pairwise(mirrored)))
    assert found.message.startswith("7 of 7 pins have no label")


def test_an_end_past_a_weld_is_to_be_trimmed() -> None:
    along = (C - B) / abs(C - B)
    start = MIDDLE - 40j * along
    found = only("near-miss", *tipper(), ring(start), line(start, MIDDLE + 0.1j * along, handle="brace"))
    assert "runs 0.1 mm past the line" in found.message
    assert found.remedy == "trim it by 0.1 mm to (90, 57.5)"


def test_both_ends_at_one_gap_are_one_finding() -> None:
    gap = 0.05 * ALONG
    pieces = (rod(A, B), line(B, MIDDLE - gap), line(MIDDLE + gap, C), rod(C, D))
    found = only("near-miss", *pins(), *pieces, *labels())
    assert "stops 0.1 mm short" in found.message


def test_a_coupler_in_line_that_begins_on_its_crank_is_told_as_welded() -> None:
    straight = B + (B - A)
    pieces = (rod(A, B), line(B - 0.6 * (B - A), straight, handle="coupler"), rod(straight, D))
    found = only("near-miss", *(ring(at) for at in (B, straight)), *pins()[:1], *pins()[3:], *pieces)
    assert found.severity == "warning"
    assert "along another line and is welded to it: one rigid link" in found.message
    assert "trim it" in found.remedy


def test_an_end_that_aims_past_a_centre_says_where_to_move_it() -> None:
    found = only("off-centre-end", *tipper_with(line(B, C - ALONG + 1j * ALONG)))
    assert found.remedy.startswith("move the end from ")
    assert found.remedy.endswith(" to (160, 80), so that it aims at the centre")


def test_a_drawing_pasted_onto_itself_is_one_finding() -> None:
    again = [rod(*ends, handle=f"again {number}") for number, ends in enumerate(((A, B), (B, C), (C, D)))]
    found = only("double-line", *tipper(), *again)
    assert found.message == (
        "3 lines of links (A-B, B-C, C-D) are drawn twice; each is read once; "
        "the drawing seems to be pasted onto itself"
    )
    assert found.handles == ("again 0", "again 1", "again 2")


def test_two_doubles_are_told_one_by_one() -> None:
    assert len(findings("double-line", *tipper(), rod(A, B), rod(B, C))) == 2


def test_a_label_at_a_corner_says_where_the_ring_would_be() -> None:
    bend = MIDDLE + 20j
    coupler = (line(B, bend), line(bend, C))
    found = only("missing-ring", *pins(), rod(A, B), *coupler, rod(C, D), *labels(), text("E", bend + 3))
    assert found.severity == "warning"
    assert "two lines of link B-C meet without a ring where the label E stands" in found.message
    assert found.remedy.startswith("draw a ring at (90, 77.5) if E is a pin")


def short_rods() -> list[Drawn]:
    """Three rods that all stop 3 mm short of the rims they point at."""
    short = RADIUS + 3.0
    ends = [(one, other, (other - one) / abs(other - one)) for one, other in ((A, B), (B, C), (C, D))]
    return [line(one + short * way, other - short * way) for one, other, way in ends]


@pytest.mark.parametrize(
    ("things", "settings"),
    [
        pytest.param([*pins()], Settings(), id="a ring on the frame's layer"),
        pytest.param([ring(at) for at in (A, B, C, D)], Settings(frame_pins=("A",)), id="frame pins stated"),
        pytest.param([*(ring(at) for at in (A, B, C, D)), text("n = 60 rpm", A + 9j)], Settings(), id="a drive note"),
    ],
)
def test_where_a_linkage_is_meant_every_rod_that_misses_is_told_of(things: list[Drawn], settings: Settings) -> None:
    found = findings("near-miss", *things, *short_rods(), settings=settings)
    assert len(found) == 6
    assert all("stops 3 mm short of the rim" in each.message for each in found)


def test_rods_short_of_rings_are_let_be_where_nothing_says_that_a_linkage_is_meant() -> None:
    assert findings("near-miss", *(ring(at) for at in (A, B, C, D)), *short_rods()) == []
