from __future__ import annotations

from dxfcheck.drawing.cleaning import clean, clean_lines


def test_printable_text_is_left_alone() -> None:
    assert clean("Пресс Ø20 ω ☠") == "Пресс Ø20 ω ☠"


def test_controls_bidi_marks_and_lone_surrogates_are_replaced() -> None:
    assert clean("a\x1bb\x9bc\u202ed\udc80e\nf") == "a\ufffdb\ufffdc\ufffdd\ufffde\ufffdf"


def test_lines_are_kept_where_they_mean_something() -> None:
    assert clean_lines("a\r\nb\rc\td\xa0e\x1b") == "a\nb\nc d e\ufffd"
