from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import LengthUnit
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
    assert "within 0.08 mm" in found.remedy
    assert (found.handles, found.layer, found.mechanism) == (("coupler",), "0", "M1")
    assert found.at == pytest.approx(C - 7 * ALONG)


def test_an_end_past_a_pin_is_a_warning_and_read_as_pinned() -> None:
    found = only("near-miss", *tipper_with(line(B, C + 5 * ALONG)))
    assert found.severity == "warning"
    assert "link B-C runs 5 mm past the centre of pin C and is read as pinned there" in found.message
    assert "end the line at the pin's centre or rim" in found.remedy


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
    assert found.at == B


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
