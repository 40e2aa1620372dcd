from __future__ import annotations

import io
from pathlib import Path

import ezdxf
import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing import load_sketch
from dxfcheck.drawing.sections import without_idle_sections
from dxfcheck.settings import Settings


def text_of(document: Drawing) -> str:
    stream = io.StringIO()
    document.write(stream)
    return stream.getvalue()


def drawing(version: str = "R2018") -> Drawing:
    document = ezdxf.new(version, units=4)
    document.modelspace().add_circle((10, 20), 3)
    document.layout("Layout1").add_line((0, 0), (5, 5))
    return document


@pytest.mark.parametrize("version", ["R2000", "R2018"])
def test_what_holds_no_geometry_is_left_out_and_all_geometry_is_read(version: str) -> None:
    text = text_of(drawing(version))
    cut = without_idle_sections(text)
    assert "OBJECTS" not in cut
    assert "CLASSES" not in cut
    assert len(cut) < 0.8 * len(text)
    read = ezdxf.read(io.StringIO(cut))
    assert [circle.dxf.center.xyz for circle in read.modelspace().query("CIRCLE")] == [(10, 20, 0)]
    assert len(read.layout("Layout1").query("LINE")) == 1
    assert read.header["$INSUNITS"] == 4


def test_an_old_file_without_such_sections_keeps_all_but_its_header() -> None:
    text = text_of(drawing("R12"))
    cut = without_idle_sections(text)
    assert cut[cut.index("TABLES") :] == text[text.index("TABLES") :]


def test_of_the_header_what_is_looked_at_stays() -> None:
    document = drawing()
    document.header["$MEASUREMENT"] = 1
    document.header["$LTSCALE"] = 9.0
    read = ezdxf.read(io.StringIO(without_idle_sections(text_of(document))))
    names = ("$ACADVER", "$INSUNITS", "$MEASUREMENT", "$HANDSEED")
    assert [read.header.get(name) for name in names] == [document.header.get(name) for name in names]
    assert read.header.get("$LTSCALE") is None


def test_objects_that_pictures_or_further_layouts_need_stay() -> None:
    pictured = drawing()
    picture = pictured.add_image_def("tray.png", size_in_pixel=(10, 10))
    pictured.modelspace().add_image(picture, insert=(0, 0), size_in_units=(5, 5))
    assert "IMAGEDEF" in without_idle_sections(text_of(pictured))
    sheets = drawing()
    sheets.layouts.new("Second sheet").add_line((0, 0), (1, 1))
    assert "Second sheet" in without_idle_sections(text_of(sheets))


def test_a_section_without_an_end_is_left_in() -> None:
    text = text_of(drawing())
    start = text.index("OBJECTS")
    cut_off = text[: start + 200]
    assert "OBJECTS" in without_idle_sections(cut_off)


def test_the_account_is_the_same_with_and_without(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "sheet.dxf"
    drawing().saveas(path)
    short = load_sketch(str(path), Settings())
    monkeypatch.setattr("dxfcheck.drawing.load._WORTH_CUTTING", 0)
    whole = load_sketch(str(path), Settings())
    assert short == whole
    assert len(short.entities) == 2
