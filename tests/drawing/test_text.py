from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest
from ezdxf.document import Drawing
from ezdxf.enums import TextEntityAlignment

from dxfcheck.drawing.primitives import Fate, Sketch, Text
from dxfcheck.drawing.text import decode_line, decode_paragraphs

Sketcher = Callable[..., Sketch]


def only_text(sketch: Sketch) -> Text:
    (text,) = sketch.primitives
    assert isinstance(text, Text)
    return text


def centre(text: Text) -> complex:
    return sum(text.box) / 4


@pytest.mark.parametrize(
    ("raw", "decoded"),
    [
        ("%%c20 %%d %%P5", "Ø20 ° ±5"),
        (r"\U+03C9 = 10 rad/s", "ω = 10 rad/s"),
        ("%%065%%u", "A"),
        ("100%", "100%"),
        ("a\x1bb\udcff", "a\ufffdb\ufffd"),
    ],
)
def test_codes_of_a_line_are_resolved(raw: str, decoded: str) -> None:
    assert decode_line(raw) == decoded


@pytest.mark.parametrize(
    ("raw", "decoded"),
    [
        (r"\A1;{\fArial|b0;\U+03C9_AB} = 4\Prad/s", "ω_AB = 4\nrad/s"),
        (r"20\U+00B0 tilt; done", "20° tilt; done"),
        (r"one\Ptwo", "one\ntwo"),
        (r"back\\Pslash", r"back\Pslash"),
        (r"a\~b", "a b"),
    ],
)
def test_codes_of_paragraphs_are_resolved(raw: str, decoded: str) -> None:
    assert decode_paragraphs(raw) == decoded


def test_a_plain_text_lies_right_of_and_above_its_point(sketch_of: Sketcher) -> None:
    text = only_text(sketch_of(lambda drawing: drawing.modelspace().add_text("AB", height=2).set_placement((10, 5))))
    assert (text.content, text.at, text.height) == ("AB", 10 + 5j, 2)
    assert min(corner.real for corner in text.box) == pytest.approx(10)
    assert 2 < max(corner.real for corner in text.box) - 10 < 3
    assert {round(corner.imag, 9) for corner in text.box} == {5, 7}


@pytest.mark.parametrize(
    ("align", "side"),
    [
        (TextEntityAlignment.MIDDLE_CENTER, 0),
        (TextEntityAlignment.MIDDLE, 0),
        (TextEntityAlignment.TOP_RIGHT, -1 - 1j),
        (TextEntityAlignment.BOTTOM_CENTER, 1j),
        (TextEntityAlignment.LEFT, 1 + 1j),
    ],
)
def test_the_box_lies_on_the_side_the_alignment_says(
    sketch_of: Sketcher, align: TextEntityAlignment, side: complex
) -> None:
    text = only_text(
        sketch_of(lambda drawing: drawing.modelspace().add_text("AB", height=2).set_placement((10, 5), align=align))
    )
    off = centre(text) - text.at
    assert text.at == 10 + 5j
    assert (round(off.real / 1.3, 6), round(off.imag, 6)) == (side.real, side.imag)


def test_a_fitted_text_spans_its_two_points(sketch_of: Sketcher) -> None:
    text = only_text(
        sketch_of(
            lambda drawing: (
                drawing.modelspace()
                .add_text("AB", height=2)
                .set_placement((0, 0), (0, 10), align=TextEntityAlignment.FIT)
            )
        )
    )
    assert text.box[1] == pytest.approx(10j)


def test_a_turned_text_has_a_turned_box(sketch_of: Sketcher) -> None:
    text = only_text(
        sketch_of(lambda drawing: drawing.modelspace().add_text("AB", height=2, rotation=90).set_placement((10, 5)))
    )
    assert centre(text) == pytest.approx(10 - 1 + (5 + 1.3) * 1j)


@pytest.mark.parametrize(("flag", "off"), [(2, -1.3 + 1j), (4, 1.3 - 1j)], ids=["backward", "upside down"])
def test_a_mirrored_text_has_a_mirrored_box(sketch_of: Sketcher, flag: int, off: complex) -> None:
    attributes = {"text_generation_flag": flag, "height": 2}
    text = only_text(sketch_of(lambda drawing: drawing.modelspace().add_text("AB", dxfattribs=attributes)))
    assert centre(text) == pytest.approx(off)


def test_a_text_drawn_from_behind_lies_mirrored(sketch_of: Sketcher) -> None:
    attributes = {"extrusion": (0, 0, -1), "insert": (10, 5), "height": 2}
    text = only_text(sketch_of(lambda drawing: drawing.modelspace().add_text("AB", dxfattribs=attributes)))
    assert text.at == -10 + 5j
    assert centre(text) == pytest.approx(-11.3 + 6j)


@pytest.mark.parametrize(
    ("point", "side"), [(1, 1 - 1j), (2, -1j), (3, -1 - 1j), (4, 1), (5, 0), (7, 1 + 1j), (9, -1 + 1j)]
)
def test_a_paragraph_hangs_on_its_attachment_point(sketch_of: Sketcher, point: int, side: complex) -> None:
    attributes: dict[str, Any] = {"char_height": 3, "attachment_point": point, "insert": (10, 5)}
    text = only_text(sketch_of(lambda drawing: drawing.modelspace().add_mtext(r"AB\PC", dxfattribs=attributes)))
    off = centre(text) - text.at
    assert text.content == "AB\nC"
    assert (round(off.real / 1.95, 6), round(off.imag / 4, 6)) == (side.real, side.imag)


def test_a_paragraph_turns_with_its_direction_and_wraps_to_its_column(sketch_of: Sketcher) -> None:
    attributes: dict[str, Any] = {"char_height": 2, "text_direction": (0, 1, 0), "width": 6.5}
    text = only_text(sketch_of(lambda drawing: drawing.modelspace().add_mtext("ABCDEFGHIJ", dxfattribs=attributes)))
    assert max(corner.imag for corner in text.box) == pytest.approx(6.5)
    assert max(corner.real for corner in text.box) == pytest.approx(2 * (1 + 5 / 3))


def test_a_blank_text_is_a_note(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_text("  "))
    assert sketch.entities[0].fate == Fate("note", "an empty text")


def attributed(drawing: Drawing) -> None:
    block = drawing.blocks.new("PIN")
    block.add_circle((0, 0), 1)
    block.add_attdef("NAME", (2, 2))
    reference = drawing.modelspace().add_blockref("PIN", (50, 0), dxfattribs={"xscale": 3, "yscale": 3})
    reference.add_attrib("NAME", "A", (52, 4), dxfattribs={"height": 2})
    reference.add_attrib("HIDDEN", "B", (52, 4)).is_invisible = True


def test_attributes_lie_where_they_stand_whatever_the_reference_scales(sketch_of: Sketcher) -> None:
    sketch = sketch_of(attributed)
    (text,) = [shape for shape in sketch.primitives if isinstance(shape, Text)]
    assert (text.content, text.at, text.height) == ("A", 52 + 4j, 2)
    assert text.source.entity == 0
    assert [use.name for use in text.source.blocks] == ["PIN"]
    assert len(sketch.entities) == 1
