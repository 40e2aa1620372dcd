from __future__ import annotations

import pytest

from dxfcheck.settings import Settings
from tests.rules.subjects import findings, only
from tests.sketches import A, B, C, D, Drawn, labels, line, ring, rod, rods, text, tipper

TWO_FRAMES = (ring(0j, layer="FRAME"), ring(100 + 0j, layer="FRAME"))


def truss() -> list[Drawn]:
    """Two links from two frame pins to one pin."""
    return [*TWO_FRAMES, ring(40 + 60j), rod(0j, 40 + 60j), rod(100 + 0j, 40 + 60j)]


@pytest.mark.parametrize(
    "rule",
    [
        "no-linkage",
        "no-frame",
        "no-motion",
        "over-constrained",
        "special-geometry",
        "undriven-freedom",
        "floating-group",
    ],
)
def test_nothing_is_wrong_with_the_tray_tipper(rule: str) -> None:
    assert findings(rule, *tipper()) == []


def test_no_linkage_is_a_note_that_says_what_would_be_one() -> None:
    found = only("no-linkage", line(0j, 50j))
    assert found.severity == "note"
    assert "FRAME" in found.remedy


def test_no_frame_names_the_link_that_is_held_and_the_option() -> None:
    found = only("no-frame", *(ring(at) for at in (A, B, C, D)), *rods(), *labels())
    assert (found.severity, found.mechanism, found.at) == ("error", "M1", A)
    assert "B-C is held for the count" in found.message
    assert "--frame" in found.remedy


def test_a_frame_pin_that_is_not_there_lists_those_that_are() -> None:
    found = only("unknown-frame-pin", *tipper(), settings=Settings(frame_pins=("Z",)))
    assert found.severity == "error"
    assert found.message == "no pin is called Z; the pins are A, B, C, D"


def test_floating_linework_is_counted_and_placed() -> None:
    found = only("floating-group", *tipper(), line(300 + 0j, 320 + 0j), line(300 + 10j, 320 + 10j))
    assert found.severity == "warning"
    assert found.message.startswith("2 pieces of linework")
    assert "(300, 0), (300, 10)" in found.message
    assert found.at == 300 + 0j


def test_a_structure_of_count_0_cannot_move() -> None:
    found = only("no-motion", *truss())
    assert found.severity == "error"
    assert "the count is 0" in found.message
    assert "take out P1-P2 or P2-P3" in found.remedy
    assert findings("over-constrained", *truss()) == []


def test_a_count_below_0_is_over_constrained_by_so_many() -> None:
    third = [*truss(), ring(70 - 30j, layer="FRAME"), rod(70 - 30j, 40 + 60j)]
    found = only("over-constrained", *third)
    assert found.severity == "error"
    assert "the count is -1, 1 constraint more" in found.message
    assert "the constraints of P1, P2, P3, P4 depend on one another" in found.message
    assert found.remedy == "take out P1-P2, P2-P3 or P2-P4; 2 such let it move"
    assert findings("no-motion", *third) == []


@pytest.mark.parametrize(("expected", "told"), [(1, 0), (2, 1), (0, 1), (None, 0)])
def test_another_mobility_than_stated(expected: int | None, told: int) -> None:
    found = findings("expected-mobility", *tipper(), settings=Settings(expected_mobility=expected))
    assert [each.message for each in found] == [f"the count of M1 is 1, stated was {expected}"] * told
    assert all(each.severity == "error" for each in found)


def test_a_note_may_state_the_mobility_and_is_where_the_finding_points() -> None:
    found = only("expected-mobility", *tipper(), text("Laufgrad F = 2", 60 + 300j, handle="note"))
    assert found.message == "the count of M1 is 1, stated was 2 by the note 'Laufgrad F = 2' at (60, 300)"
    assert (found.at, found.handles) == (60 + 300j, ("note",))
    assert findings("expected-mobility", *tipper(), text("M = 1", 60 + 300j)) == []
