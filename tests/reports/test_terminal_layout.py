from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.reports.terminal_layout import Column, count_of, figure, figure_column, fold, listed, place, table


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (0.0, "0"),
        (-0.0, "0"),
        (10.0, "10"),
        (95.492966, "95.493"),
        (-8.571428, "-8.5714"),
        (0.00012345678, "0.00012346"),
        (0.0000123456, "1.235e-05"),
        (99999.4, "99999"),
        (99999.6, "100000"),
        (123456.7, "123457"),
        (12345678.0, "12345678"),
        (2e9, "2e+09"),
    ],
)
def test_a_figure_has_five_digits_and_is_written_in_full(value: float, text: str) -> None:
    assert figure(value) == text
    assert figure_column("", "", [value]).cells == [text]


def test_a_figure_below_the_noise_is_zero() -> None:
    assert figure_column("", "", [1e-14, -1e-14, 1e-3], zero_below=1e-12).cells == ["0", "0", "0.001"]


def test_a_column_tells_unknown_from_what_does_not_apply() -> None:
    assert figure_column("speed", "mm/s", [None, "-", 0.0]).cells == ["?", "-", "0"]


@given(st.floats(-1e300, 1e300))
def test_a_figure_is_never_off_by_more_than_its_last_digit(value: float) -> None:
    assert float(figure(value)) == pytest.approx(value, rel=6e-4 if abs(value) >= 1e9 or abs(value) < 1e-4 else 6e-5)


def test_small_words() -> None:
    assert place(1.5 - 2j) == "(1.5, -2)"
    assert count_of(1, "pin") == "1 pin"
    assert count_of(2, "entity", "entities") == "2 entities"
    assert [listed(names) for names in ([], ["A"], ["A", "B"], ["A", "B", "C"])] == ["", "A", "A and B", "A, B and C"]


def test_text_is_folded_at_spaces_and_a_figure_keeps_its_unit() -> None:
    assert fold("the end stops 7.4 mm short", 16, "- ", "  ") == ["- the end stops", "  7.4 mm short"]
    assert fold("stops at 7.4 mm", 13) == ["stops at", "7.4 mm"]


def test_a_long_word_stays_whole() -> None:
    assert fold("in a-very-long-name-of-a-layer here", 12) == ["in", "a-very-long-name-of-a-layer", "here"]


@given(st.text(alphabet="ab 1", max_size=80), st.integers(5, 30))
def test_folding_loses_nothing(text: str, width: int) -> None:
    assert " ".join(fold(text, width)).split() == text.split()


def lines(columns: list[Column], width: int = 80) -> list[str]:
    return [line.text for line in table(columns, width)]


def test_decimal_points_stand_below_one_another() -> None:
    columns = [
        Column("link", "", ["A-B", "frame"], numeric=False),
        Column("omega", "rad/s", ["10", "-8.5714"]),
        Column("pole", "mm", ["?", "3"]),
    ]
    assert lines(columns) == [
        "  link     omega  pole",
        "           rad/s    mm",
        "  A-B    10          ?",
        "  frame  -8.5714     3",
    ]


def test_no_line_of_units_where_there_are_none() -> None:
    assert lines([Column("rule", "", ["x"], numeric=False)]) == ["  rule", "  x"]


def test_where_room_is_short_a_long_name_stands_above_its_figures() -> None:
    columns = [
        Column("link", "", ["A-B-C-D-E-F-G-H", "A-B"], numeric=False),
        Column("omega", "rad/s", ["1.25", "100"]),
    ]
    assert lines(columns, 17) == [
        "  link      omega",
        "            rad/s",
        "  A-B-C-D-E-F-G-H",
        "             1.25",
        "  A-B         100",
    ]


def test_where_room_is_short_a_last_column_of_text_is_folded_below_itself() -> None:
    columns = [
        Column("type", "", ["LINE", "SPLINE"], numeric=False),
        Column("count", "", ["3", "12"]),
        Column("why", "", ["a line that runs from pin to pin", "not read"], numeric=False),
    ]
    assert lines(columns, 36) == [
        "  type    count  why",
        "  LINE        3  a line that runs",
        "                 from pin to pin",
        "  SPLINE     12  not read",
    ]


def test_where_room_is_short_points_are_no_longer_aligned() -> None:
    columns = [Column("a", "", ["x"] * 2, numeric=False), Column("b", "", ["12345", "0.00012346"])]
    assert lines(columns, 15) == ["  a           b", "  x       12345", "  x  0.00012346"]


@given(st.lists(st.tuples(st.text("AB-", max_size=40), st.floats(-1e6, 1e6)), min_size=1, max_size=8))
def test_every_cell_of_a_table_is_shown_whole(rows: list[tuple[str, float]]) -> None:
    columns = [
        Column("link", "", [name for name, _ in rows], numeric=False),
        figure_column("x", "mm", [value for _, value in rows]),
    ]
    shown = "\n".join(lines(columns, 30))
    assert all(name in shown and figure(value) in shown for name, value in rows)
