from __future__ import annotations

import math

import pytest

from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.drives.drive_text import DriveStatement, find_statements, parse_drive

RPM = math.tau / 60


def find_statement(note: str) -> DriveStatement | None:
    """The one statement of a note."""
    found = find_statements(note)
    assert len(found) <= 1
    return found[0] if found else None


@pytest.mark.parametrize(
    ("note", "rate"),
    [
        ("ω = 10 rad/s", 10.0),
        ("ω=10rad/s", 10.0),
        ("Ω = 10 rad/s", 10.0),
        ("omega = 10 rad/s", 10.0),
        ("w = 10 rad/sec", 10.0),
        ("n = 60 r/min", 60 * RPM),
        ("n = 120 rpm", 120 * RPM),
        ("N = 120 RPM", 120 * RPM),
        ("n = 120 rev/min", 120 * RPM),
        ("n = 120 1/min", 120 * RPM),
        ("n = 120 min-1", 120 * RPM),
        ("n = 120 min^-1", 120 * RPM),
        ("n = 120 min⁻¹", 120 * RPM),
        ("n = 120 U/min", 120 * RPM),
        ("ω = 90 deg/s", math.pi / 2),
        ("ω = 90°/s", math.pi / 2),
        ("ω = 3 1/s", 3.0),
        ("ω = 3 s⁻¹", 3.0),
        ("n = 3 1/s", 3 * math.tau),
        ("n = 3 s-1", 3 * math.tau),
        ("input: n = 30 rpm (see sheet 2)", 30 * RPM),
        ("ω\n= 10 rad/s", 10.0),
    ],
)
def test_a_turning_speed_as_people_write_it(note: str, rate: float) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert (statement.kind, statement.name, statement.doubt) == ("turn", None, None)
    assert statement.rate == pytest.approx(rate)


@pytest.mark.parametrize(
    ("number", "value"),
    [
        ("1.5", 1.5),
        ("1,5", 1.5),
        (".5", 0.5),
        (",5", 0.5),
        ("5.", 5.0),
        ("3e2", 300.0),
        ("2.5E-1", 0.25),
        ("+3", 3.0),
        ("-3", -3.0),
        ("- 3", -3.0),
        ("−3", -3.0),
        ("0", 0.0),
    ],
)
def test_numbers_with_decimal_comma_exponent_and_either_minus(number: str, value: float) -> None:
    statement = find_statement(f"ω = {number} rad/s")
    assert statement is not None
    assert statement.rate == pytest.approx(value)


@pytest.mark.parametrize("word", ["cw", "CW", "clockwise", "Clockwise", "↻", "(cw)", ", cw"])
def test_clockwise_is_negative(word: str) -> None:
    statement = find_statement(f"n = 120 rpm {word}")
    assert statement is not None
    assert statement.rate == pytest.approx(-120 * RPM)


@pytest.mark.parametrize(
    "word", ["", "ccw", "CCW", "counter-clockwise", "counterclockwise", "anticlockwise", "acw", "↺", "(ccw)"]
)
def test_counter_clockwise_is_positive_and_meant_where_nothing_is_said(word: str) -> None:
    statement = find_statement(f"n = 120 rpm {word}")
    assert statement is not None
    assert statement.rate == pytest.approx(120 * RPM)


@pytest.mark.parametrize(
    ("note", "name"),
    [
        ("ω_AB = 4 rad/s ccw", "AB"),
        ("ωAB = 4 rad/s", "AB"),
        ("ω AB = 4 rad/s", "AB"),
        ("ω_{AB} = 4 rad/s", "AB"),
        ("ω(AB) = 4 rad/s", "AB"),
        ("ω_A-B = 4 rad/s", "A-B"),
        ("ω_A–B = 4 rad/s", "A-B"),
        ("ω_O2A' = 4 rad/s", "O2A'"),
        ("n_2 = 4 rpm", "2"),
        ("n2 = 4 rpm", "2"),
    ],
)
def test_a_link_is_named_by_its_subscript(note: str, name: str) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert statement.name == name


@pytest.mark.parametrize(
    ("note", "rate"),
    [
        ("v = 0.2 m/s", 0.2),
        ("v = 20 mm/s", 0.02),
        ("v = 20 cm/s", 0.2),
        ("v = 3 m/min", 0.05),
        ("v = 10 in/s", 0.254),
        ("v = 1 ft/s", 0.3048),
        ("v = 600 mm/min", 0.01),
        ("v = 2 m/sec", 2.0),
    ],
)
def test_a_sliding_speed_comes_in_metres_a_second(note: str, rate: float) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert statement.kind == "slide"
    assert statement.rate == pytest.approx(rate)


@pytest.mark.parametrize(
    ("note", "doubt"),
    [
        ("ω = -4 rad/s cw", "minus sign"),
        ("n = −60 rpm ccw", "minus sign"),
        ("v = 3 rad/s", "does not go with that unit"),
        ("ω = 3 m/s", "does not go with that unit"),
        ("n = 3 mm/s", "does not go with that unit"),
        ("v = 20 mm/s cw", "has no sense"),
        ("v_AB/CD = 20 mm/s", "two points or two links"),
        ("ω_AB against BC = 3 rad/s against CD", "more than once"),
        ("ω = 1e308 rps", "beyond any"),
        ("ω = 1e61 rad/s", "beyond any"),
    ],
)
def test_a_note_that_contradicts_itself_is_in_doubt(note: str, doubt: str) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert statement.doubt is not None
    assert doubt in statement.doubt


@pytest.mark.parametrize(
    "text",
    [
        "",
        "A",
        "AB = 120",
        "AB = 120 mm",
        "scale 1:2",
        "n = 12",
        "ω = rad/s",
        "α = 3 rad/s2",
        "ω = 10 rad/s²",
        "ω = 10 rad/s^2",
        "v = 10 m/s^2",
        "M8 x 20",
        "n rpm",
        "\ufffd\ufffd",
    ],
)
def test_texts_that_state_no_drive(text: str) -> None:
    assert find_statement(text) is None


def test_the_statement_keeps_its_text_on_one_line() -> None:
    statement = find_statement("ω_AB\n  = 4  rad/s")
    assert statement is not None
    assert statement.text == "ω_AB = 4 rad/s"


@pytest.mark.parametrize(
    ("option", "name", "rate"),
    [
        ("A-B = 10 rad/s ccw", "A-B", 10.0),
        ("AB=10 rad/s", "AB", 10.0),
        ("A−B = 120 rpm cw", "A-B", -120 * RPM),
        ("B-C-E = 1,5 rad/s", "B-C-E", 1.5),
        ("A-B (2) = 3 1/s", "A-B (2)", 3.0),
    ],
)
def test_an_option_names_a_link_and_a_speed(option: str, name: str, rate: float) -> None:
    statement = parse_drive(option)
    assert (statement.name, statement.kind) == (name, "turn")
    assert statement.rate == pytest.approx(rate)


@pytest.mark.parametrize(
    ("option", "reason"),
    [
        ("A-B", "names no link"),
        ("= 3 rad/s", "names no link"),
        ("", "names no link"),
        ("A-B = 3", "no speed with a unit"),
        ("A-B = fast", "no speed with a unit"),
        ("A-B = 3 rad/s junk", "no speed with a unit"),
        ("A-B = 3 rad/s = 4 rad/s", "no speed with a unit"),
        ("A-B = -3 rad/s cw", "minus sign"),
        ("A-B = 1e999 rad/s", "beyond any"),
        ("against B-C = 3 rad/s", "one side of 'against'"),
        ("A-B against = 3 rad/s", "one side of 'against'"),
        ("A-B against B-C = 3 rad/s against C-D", "more than once"),
        ("block at C = 3 mm/s cw", "has no sense"),
        ("A-B = 3 rad/s against", "no speed with a unit"),
    ],
)
def test_an_option_that_cannot_be_used_says_why_and_shows_how(option: str, reason: str) -> None:
    with pytest.raises(OptionInvalid, match=reason) as caught:
        parse_drive(option)
    assert repr(option) in str(caught.value)
    assert "write for instance" in str(caught.value)


@pytest.mark.parametrize(
    ("option", "name", "against", "kind", "rate"),
    [
        ("A-B against B-C = 10 rad/s", "A-B", "B-C", "turn", 10.0),
        ("A-B = 10 rad/s cw against B-C", "A-B", "B-C", "turn", -10.0),
        ("Block  at C against D-E = 50 mm/s", "block at C", "D-E", "slide", 0.05),
        ("D-E = 50 mm/s", "D-E", None, "slide", 0.05),
        ("Wheel at O = 1 rps", "wheel at O", None, "turn", math.tau),
        ("A-B (2) against frame = 1 m/s", "A-B (2)", "frame", "slide", 1.0),
    ],
)
def test_an_option_may_name_blocks_wheels_and_what_a_link_runs_against(
    option: str, name: str, against: str | None, kind: str, rate: float
) -> None:
    statement = parse_drive(option)
    assert (statement.name, statement.against, statement.kind) == (name, against, kind)
    assert statement.rate == pytest.approx(rate)


@pytest.mark.parametrize(
    ("note", "name", "against"),
    [
        ("v_block at C = 5 mm/s", "block at C", None),
        ("v_C against DE = 5 mm/s", "C", "DE"),
        ("v = 5 mm/s against block at C", None, "block at C"),
        ("v against D-E (2) = 5 mm/s", None, "D-E (2)"),
        ("w/ v = 5 mm/s", None, None),
    ],
)
def test_a_note_may_name_blocks_and_what_a_link_runs_against(note: str, name: str | None, against: str | None) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert (statement.name, statement.against, statement.doubt) == (name, against, None)


@pytest.mark.parametrize(
    ("note", "written", "metres"),
    [("v = 50 mm/s", 50.0, 0.001), ("v = 3 m/min", 0.05, 1.0), ("v = -2 in/sec", -2.0, 0.0254)],
)
def test_a_sliding_speed_keeps_its_figure_a_second_and_its_unit(note: str, written: float, metres: float) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert statement.written == pytest.approx(written)
    assert statement.metres == metres


def test_several_drives_in_one_note() -> None:
    assert [each.name for each in find_statements("ω_AB = 3 rad/s, ω_CD = 99 rad/s")] == ["AB", "CD"]


@pytest.mark.parametrize("number", ["1,500", "12,000"])
def test_a_comma_before_three_digits_is_a_doubt(number: str) -> None:
    statement = find_statement(f"n = {number} rpm")
    assert statement is not None
    assert statement.doubt is not None
    assert "thousands" in statement.doubt


@pytest.mark.parametrize(
    ("note", "rate"), [("n = 1 200 rpm", 1200 * RPM), ("ω = – 3 rad/s", -3.0), ("n = 0,125 rpm", 0.125 * RPM)]
)
def test_thousands_apart_dashes_for_minus_and_small_decimals(note: str, rate: float) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert statement.doubt is None
    assert statement.rate == pytest.approx(rate)


def test_a_speed_without_a_unit_is_a_drive_that_is_not_understood() -> None:
    statement = find_statement("ω = 10")
    assert statement is not None
    assert statement.doubt is not None


@pytest.mark.parametrize("note", ["60 rpm", "Crank speed = 60 rpm", "Motor: 60 rpm"])
def test_a_mere_speed_is_a_drive_only_beside_a_link(note: str) -> None:
    statement = find_statement(note)
    assert statement is not None
    assert (statement.name, statement.explicit) == (None, False)
    assert statement.rate == pytest.approx(60 * RPM)
