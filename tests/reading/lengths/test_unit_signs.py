from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Dimension, DimensionStyle, Text
from dxfcheck.reading.lengths.unit_signs import named_like, signs_of_styles, signs_of_texts, unit_shown
from tests.reading.lengths.dimensioned import dimensioned
from tests.sketches import Drawn, sketch, text


def said(*contents: str) -> list[str]:
    drawn = sketch(*(text(content, 0j) for content in contents))
    texts = [(each, drawn.handles(each)) for each in drawn.primitives if isinstance(each, Text)]
    return [sign.unit for sign in signs_of_texts(texts)]


@pytest.mark.parametrize(
    ("content", "unit"),
    [
        ("ALL DIMENSIONS IN mm", "mm"),
        ("DIMENSIONS ARE IN INCHES", "in"),
        ("UNLESS OTHERWISE SPECIFIED\nDIMENSIONS ARE IN MILLIMETERS", "mm"),
        ("dims in inch", "in"),
        ("Maße in mm", "mm"),
        ("Alle Maße in mm", "mm"),
        ("units: inch", "in"),
        ("UNIT = MM", "mm"),
        ("SCALE 1:2   DIMENSIONS IN mm", "mm"),
        ("cotes en mm", "mm"),
        ("lengths in cm", "cm"),
    ],
)
def test_a_note_on_the_unit_is_understood(content: str, unit: str) -> None:
    assert said(content) == [unit]


@pytest.mark.parametrize(
    "content",
    ["ALL DIMENSIONS IN mm [inch]", "mm", "DIMENSIONS", "3 mm SHEET", "see dimensions in table", "UNIT 4",
     "dimensions in minutes", "unit in the shed"],
)  # fmt: skip
def test_what_names_no_unit_or_two_says_nothing(content: str) -> None:
    assert said(content) == []


def shown(style: DimensionStyle, written: str = "", *, block: str = "", kind: str = "linear") -> list[str]:
    drawn = sketch(dimensioned(written, style=style, block=block, kind=kind))
    dimensions = [(each, drawn.handles(each)) for each in drawn.primitives if isinstance(each, Dimension)]
    return [sign.unit for sign in signs_of_styles(dimensions)]


@pytest.mark.parametrize(
    ("style", "unit"),
    [
        (DimensionStyle(suffix="<> mm"), "mm"),
        (DimensionStyle(suffix='<>"'), "in"),
        (DimensionStyle(suffix=" mm"), "mm"),
        (DimensionStyle(suffix="mm", factor=25.4), "in"),
        (DimensionStyle(suffix="cm", factor=0.1), "mm"),
        (DimensionStyle(alternate=25.4), "in"),
        (DimensionStyle(alternate=0.0394), "mm"),
        (DimensionStyle(alternate=0.03937, alternate_suffix="[]in"), "mm"),
        (DimensionStyle(feet=True), "in"),
    ],
)
def test_what_the_style_shows_tells_the_unit(style: DimensionStyle, unit: str) -> None:
    assert shown(style) == [unit]


@pytest.mark.parametrize("style", [DimensionStyle(), DimensionStyle(suffix="<> TYP"), DimensionStyle(alternate=2.0),
                                   DimensionStyle(suffix="mm", factor=2.0)])  # fmt: skip
def test_other_styles_say_nothing(style: DimensionStyle) -> None:
    assert shown(style) == []


def test_nor_does_a_style_that_is_not_shown() -> None:
    style = DimensionStyle(suffix="<> mm")
    assert shown(style, "120") == []
    assert shown(style, "2x <>") == ["mm"]
    assert shown(style, block="DETAIL") == []
    assert shown(style, kind="angular") == []


def test_one_style_says_it_once() -> None:
    style = DimensionStyle(suffix="<> mm")
    things: list[Drawn] = [dimensioned("", style=style), dimensioned("", style=style)]
    drawn = sketch(*things)
    dimensions = [(each, drawn.handles(each)) for each in drawn.primitives if isinstance(each, Dimension)]
    assert len(list(signs_of_styles(dimensions))) == 1


def test_a_unit_is_told_by_its_size() -> None:
    assert [named_like(metres) for metres in (0.001, 0.0254, 0.02541, 0.01, 1.0, 0.3048, 0.002)] == [
        "mm", "in", "in", "cm", "m", "ft", None,
    ]  # fmt: skip
    assert unit_shown(DimensionStyle(suffix="<> mm"))
    assert not unit_shown(DimensionStyle(suffix="<> H7"))
