from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import DimensionStyle
from dxfcheck.rules.finding import Finding
from tests.reading.lengths.dimensioned import dimensioned
from tests.rules.subjects import findings, only
from tests.sketches import A, B, C, D, line, text, tipper

AD, CD = abs(D - A), abs(D - C)
RULES = ("dimension-override", "dimension-off-geometry", "stated-length")


def override(*things: object) -> list[Finding]:
    return findings("dimension-override", *tipper(), *things)  # type: ignore[arg-type]


def test_a_sheet_whose_dimensions_measure_has_nothing_to_say() -> None:
    right = (dimensioned("", A, D), dimensioned(f"{CD:.1f}", C, D), text("AD = 150 mm", 60 - 30j))
    assert [found for rule in RULES for found in findings(rule, *tipper(), *right)] == []


def test_a_text_over_another_figure_says_both_and_how_far_apart() -> None:
    found = only("dimension-override", *tipper(), dimensioned("155", A, D, handle="5D"))
    assert found.severity == "warning"
    assert found.message == "text '155' over a measured 150 mm: 5 mm (3.33 %) more"
    assert (found.at, found.handles, found.layer) == ((A + D) / 2, ("5D",), "DIM")


def test_it_is_told_on_sheets_without_a_linkage_too() -> None:
    assert only("dimension-override", line(A, D), dimensioned("155", A, D)).severity == "warning"


def test_a_mix_up_of_inches_and_millimetres_is_named() -> None:
    (found,) = override(dimensioned("5.906", A, D))
    assert "25.4 times smaller: millimetres against inches?" in found.message


def test_texts_that_all_miss_by_one_factor_are_one_finding() -> None:
    (found,) = override(dimensioned("300", A, D, handle="1A"), dimensioned(f"{2 * CD:.1f}", C, D, handle="1B"))
    assert found.message == "all 2 dimension texts written by hand say 2 times what they measure: drawn at 1:2?"
    assert found.handles == ("1A", "1B")


def test_but_not_where_one_of_them_is_right() -> None:
    found = override(dimensioned("300", A, D), dimensioned(f"{2 * CD:.1f}", C, D), dimensioned("150", A, D))
    assert len(found) == 2


@pytest.mark.parametrize(("text_of", "underlined"), [("155", True), ("155 NTS", False)])
def test_a_text_marked_as_not_to_scale_is_a_note(text_of: str, *, underlined: bool) -> None:
    found = only("dimension-override", *tipper(), dimensioned(text_of, A, D, underlined=underlined))
    assert found.severity == "note"
    assert "150 mm" in found.message
    assert findings("dimension-override", line(A, D), dimensioned(text_of, A, D, underlined=underlined)) == []


def test_styles_that_show_a_multiple_of_what_is_drawn_are_a_note() -> None:
    double = DimensionStyle(factor=2.0)
    found = only("dimension-override", *tipper(), *(dimensioned("", A, D, style=double) for _ in range(2)))
    assert found.severity == "note"
    assert "all dimensions show 2 times" in found.message
    assert override(dimensioned("", A, D, style=double), dimensioned("", C, D)) == []
    assert override(dimensioned("", A, D, style=DimensionStyle(factor=25.4, suffix="<> mm"))) == []


def test_a_dimension_left_behind_says_where_it_belongs() -> None:
    found = only("dimension-off-geometry", *tipper(), dimensioned("", A, D + 5 + 3j, kind="aligned"))
    assert found.severity == "warning"
    assert found.at == D + 5 + 3j
    assert "5.83095 mm off at (150, 0)" in found.message


def test_a_dimension_on_nothing_is_a_note_and_only_on_the_sheet_of_a_linkage() -> None:
    nowhere = dimensioned("", A, 40 - 90j, kind="aligned")
    assert only("dimension-off-geometry", *tipper(), nowhere).severity == "note"
    assert findings("dimension-off-geometry", line(A, D), line(D, C), nowhere) == []


def test_one_left_behind_at_one_end_is_told_on_any_sheet_but_not_one_that_is_off_at_both() -> None:
    sheet = (line(A, D), line(D, C))
    one_end = dimensioned("", A, D + 5 - 3j, kind="aligned")
    assert only("dimension-off-geometry", *sheet, one_end).severity == "warning"
    assert findings("dimension-off-geometry", *sheet, dimensioned("", A - 3j, D + 5 - 3j, kind="aligned")) == []


def test_a_stated_length_says_what_is_drawn() -> None:
    found = only("stated-length", *tipper(), text("AD = 155", 60 - 30j, handle="5E"))
    assert found.severity == "warning"
    assert found.message == "'A-D = 155' is stated, but pins A-D are 150 mm apart: stated 5 mm (3.33 %) more"
    assert (found.mechanism, found.handles) == ("M1", ("5E",))


def test_stated_lengths_that_all_miss_by_one_factor_say_so() -> None:
    doubled = text(f"AD = 300, CD = {2 * CD:.1f}", 60 - 30j)
    found = findings("stated-length", *tipper(), doubled)
    assert len(found) == 2
    assert all(each.message.endswith("all stated lengths are 2 times the drawn ones: drawn at 1:2?") for each in found)


def test_a_stated_distance_of_pins_that_no_link_joins_says_so() -> None:
    found = only("stated-length", *tipper(), text("BD = 155", 60 - 30j))
    assert "(no single link joins them)" in found.message
    assert f"{abs(B - D):.6g} mm" in found.message
