from __future__ import annotations

import pytest

from dxfcheck.settings import Settings
from tests.rules.subjects import findings, only
from tests.sketches import A, B, C, D, Drawn, labels, line, ring, rod, rods, text, tipper

TWO_FRAMES = (ring(0j, layer="FRAME"), ring(100 + 0j, layer="FRAME"))


def truss() -> list[Drawn]:
    """Two links from two frame pins to one pin."""
    return [*TWO_FRAMES, ring(40 + 60j), rod(0j, 40 + 60j), rod(100 + 0j, 40 + 60j)]


def parallel_cranks(*xs: float) -> list[Drawn]:
    """A beam carried by upright cranks of equal length."""
    drawn = [line(complex(xs[0], 40), complex(xs[-1], 40))]
    for x in xs:
        drawn += [ring(complex(x, 0), layer="FRAME"), ring(complex(x, 40)), rod(complex(x, 0), complex(x, 40))]
    return drawn


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
    assert findings("over-constrained", *truss()) == []


def test_a_count_below_0_is_over_constrained_by_so_many() -> None:
    third = [*truss(), ring(70 - 30j, layer="FRAME"), rod(70 - 30j, 40 + 60j)]
    found = only("over-constrained", *third)
    assert found.severity == "error"
    assert "the count is -1, 1 constraint more" in found.message
    assert findings("no-motion", *third) == []


def test_equal_cranks_move_by_their_special_lengths() -> None:
    found = only("special-geometry", *parallel_cranks(0.0, 60.0, 150.0))
    assert found.severity == "warning"
    assert "1 freedom at the drawn pose where the count gives 0" in found.message
    assert findings("special-geometry", *parallel_cranks(0.0, 150.0)) == []


def test_freedoms_without_a_drive_are_counted_and_their_links_named() -> None:
    arm = [*tipper(), rod(C, 230 + 40j), ring(230 + 40j), text("E", 235 + 40j)]
    found = only("undriven-freedom", *arm)
    assert found.severity == "warning"
    assert found.message == "1 freedom of M1 not driven: C-E may move in any way"
    assert "1 further drive" in found.remedy


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
