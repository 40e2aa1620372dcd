from __future__ import annotations

import pytest

from dxfcheck.configuration.key_lines import line_of, lines_of_keys

TEXT = '''# a comment with [brackets] and = signs
drives = [
  "A-B = [not a table]",  # comment, with a comma
  'C = 2 rad/s',
]
[reading]
units = "mm"
"frame-pins" = ["A", "D"]
layers.frame = ["BED"]

[limits]
slide-speed = { "*" = "1 m/s", "block at E" = "2 # m/s" }
note = """
[no.table]
key = 1
"""
after = 1.5e+3
[[accept]]
rule = "a"
until = 2027-03-31
[[accept]]
rule = "b"
[drawings."received/*.dxf".reading]
units = "in"
[drawings."received/*.dxf"]
drives = [ [1, 2], { x = 1 } ]
'''


@pytest.mark.parametrize(
    ("path", "line"),
    [
        (("drives",), 2),
        (("drives", 0), 3),
        (("drives", 1), 4),
        (("reading",), 6),
        (("reading", "units"), 7),
        (("reading", "frame-pins"), 8),
        (("reading", "frame-pins", 1), 8),
        (("reading", "layers"), 9),
        (("reading", "layers", "frame"), 9),
        (("limits", "slide-speed", "block at E"), 12),
        (("limits", "note"), 13),
        (("limits", "after"), 17),
        (("accept",), 18),
        (("accept", 0), 18),
        (("accept", 0, "until"), 20),
        (("accept", 1), 21),
        (("accept", 1, "rule"), 22),
        (("drawings",), 23),
        (("drawings", "received/*.dxf"), 23),
        (("drawings", "received/*.dxf", "reading", "units"), 24),
        (("drawings", "received/*.dxf", "drives", 0, 1), 26),
        (("drawings", "received/*.dxf", "drives", 1, "x"), 26),
    ],
)
def test_each_key_stands_on_its_line(path: tuple[str | int, ...], line: int) -> None:
    assert lines_of_keys(TEXT)[path] == line


def test_a_key_that_is_not_found_has_the_line_of_its_table() -> None:
    lines = lines_of_keys(TEXT)
    assert line_of(("accept", 1, "reason"), lines) == 21
    assert line_of(("nowhere",), lines) == 1


@pytest.mark.parametrize("ends", ["\n", "\r\n"])
def test_lines_end_as_on_either_system(ends: str) -> None:
    assert lines_of_keys(ends.join(["", "[rules]", "empty-pin = 'off'"]))["rules", "empty-pin"] == 3


def test_escapes_in_quoted_keys_are_understood() -> None:
    lines = lines_of_keys('[expect.speeds]\n"\\u0041 \\"x\\"" = 1\n\'a\\b\' = 2')
    assert lines["expect", "speeds", 'A "x"'] == 2
    assert lines["expect", "speeds", "a\\b"] == 3


def test_dotted_keys_with_spaces_and_a_table_within_an_array() -> None:
    lines = lines_of_keys("[[accept]]\n[accept.more]\nx=1\n[ a . b ]\nc . d = 1")
    assert lines["accept", 0, "more", "x"] == 3
    assert lines["a", "b", "c", "d"] == 5


def test_an_empty_text_has_no_keys() -> None:
    assert lines_of_keys("") == {}
