from __future__ import annotations

from tests.reading.lengths.dimensioned import INCH, METRE, UNITLESS, dimensioned
from tests.rules.subjects import findings, only
from tests.sketches import A, C, D, line, text, tipper

SAYS_MM = text("ALL DIMENSIONS IN mm", 60 - 40j, handle="7A")


def test_a_unit_that_nothing_contradicts_is_not_doubted() -> None:
    assert findings("units-doubtful", *tipper()) == []
    assert findings("units-doubtful", *tipper(), SAYS_MM) == []
    assert findings("units-doubtful", *tipper(), unit=INCH) == []


def test_a_note_against_the_header_names_the_mix_up() -> None:
    found = only("units-doubtful", *tipper(), SAYS_MM, unit=INCH)
    assert found.severity == "warning"
    assert "the note 'ALL DIMENSIONS IN mm' says millimetres" in found.message
    assert "25.4" in found.message
    assert "--units mm" in found.remedy
    assert found.handles == ("7A",)


def test_dimension_texts_that_name_another_unit_are_doubts_of_the_unit_and_not_of_the_texts() -> None:
    sheet = (*tipper(), dimensioned("150 mm", A, D))
    assert "'150 mm' fits if the drawing is in millimetres" in only("units-doubtful", *sheet, unit=INCH).message
    assert findings("dimension-override", *sheet, unit=INCH) == []


def test_texts_that_are_all_25_times_the_drawn_figure_are_a_sign_of_inches() -> None:
    inch = (dimensioned(f"{150 * 25.4:.0f}", A, D), dimensioned(f"{abs(C - D) * 25.4:.0f}", C, D))
    assert "2 stated lengths, read as millimetres" in only("units-doubtful", *tipper(), *inch).message
    assert findings("units-doubtful", *tipper(), *inch, unit=INCH) == []


def test_a_link_a_hundred_metres_long_is_doubted() -> None:
    found = only("units-doubtful", *tipper(), unit=METRE)
    assert "B-C is 147.054 m long, longer than 100 m" in found.message
    assert found.mechanism == "M1"
    assert findings("units-doubtful", line(A, D), unit=METRE) == []


def test_where_no_unit_is_stated_the_remedy_names_the_one_that_the_sheet_says() -> None:
    found = only("units-missing", *tipper(), text("DIMENSIONS IN INCHES", 60 - 40j), unit=UNITLESS)
    assert found.remedy == "set the drawing's unit to in, or state it with --units in"
    assert "says inches" in found.message
    assert "--units mm" in only("units-missing", *tipper(), unit=UNITLESS).remedy
