from __future__ import annotations

import pytest

from dxfcheck.drawing.fates import UNDERLAY
from dxfcheck.drawing.primitives import Entity, Notice
from tests.rules.subjects import findings, only
from tests.sketches import line, path, tipper

STRETCHED = "block PIN scaled by 4 and 4.4"
ELLIPSE = path(90 + 4j, 94 + 8j, 90 + 12j, 86 + 8j, closed=True, curved=True)
AWAY = line(900j, 950j)


def about(kind: str, detail: str, entity: int, amount: float | None = None) -> Notice:
    return Notice(kind, detail, entity, 7 + 8j, amount)


def test_a_stretched_block_says_which_rings_became_ellipses() -> None:
    drawn = (*tipper(), ELLIPSE)
    found = only("uneven-scale", *drawn, notices=[about("uneven-scale", STRETCHED, len(drawn) - 1)])
    assert found.severity == "warning"
    assert found.message == f"{STRETCHED}; 1 ring in it is an ellipse and so no pin: at (90, 8)"


def test_a_stretched_block_that_links_are_drawn_with_is_a_warning() -> None:
    found = only("uneven-scale", *tipper(), notices=[about("uneven-scale", STRETCHED, 0)])
    assert found.severity == "warning"
    assert "are read as stretched" in found.message


def test_a_stretched_block_beside_the_linkage_is_a_note() -> None:
    drawn = (*tipper(), AWAY)
    found = only("uneven-scale", *drawn, notices=[about("uneven-scale", STRETCHED, len(drawn) - 1)])
    assert (found.severity, found.message) == ("note", STRETCHED)


@pytest.mark.parametrize(
    ("rule", "severity", "words"),
    [("block-array", "warning", "block ROW in 6 copies"), ("nested-block", "note", "block ROW holds blocks 6 deep")],
)
def test_an_array_or_a_deep_nest_is_told_where_the_linkage_comes_from_it(rule: str, severity: str, words: str) -> None:
    found = only(rule, *tipper(), notices=[about(rule, "block ROW", 0, 6.0)])
    assert found.severity == severity
    assert words in found.message
    drawn = (*tipper(), AWAY)
    assert findings(rule, *drawn, notices=[about(rule, "block ROW", len(drawn) - 1, 6.0)]) == []


def test_a_block_of_another_file_is_a_warning() -> None:
    found = only("outside-reference", *tipper(), notices=[about("outside-reference", "block BENCH", 0)])
    assert (found.severity, found.message, found.at) == ("warning", "block BENCH", 7 + 8j)


@pytest.mark.parametrize(
    ("at", "severity", "where"),
    [(80 + 40j, "warning", "among the links"), (900 + 900j, "note", "elsewhere on the sheet")],
)
def test_pictures_weigh_by_where_they_lie(at: complex, severity: str, where: str) -> None:
    pictures = [Entity("9", kind, "0", UNDERLAY, at) for kind in ("IMAGE", "PDFUNDERLAY")]
    found = only("outside-reference", *tipper(), entities=pictures)
    assert found.severity == severity
    assert found.message == f"2 references to other files {where} not read: a PDF underlay, a picture"
