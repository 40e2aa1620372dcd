from __future__ import annotations

import logging
import os
from pathlib import Path

import ezdxf
import pytest
from ezdxf.filemanagement import dxf_file_info

from dxfcheck.drawing import load_sketch
from dxfcheck.drawing.load import open_drawing, stated_encoding
from dxfcheck.drawing.primitives import Sketch
from dxfcheck.errors import DrawingUnreadable
from dxfcheck.settings import Settings


def load(path: Path) -> Sketch:
    return load_sketch(path, Settings())


@pytest.fixture
def drawing(tmp_path: Path) -> Path:
    """A sound drawing of twenty lines and twenty rings."""
    document = ezdxf.new("R2010")
    for number in range(20):
        document.modelspace().add_line((0, number), (9, number))
        document.modelspace().add_circle((0, number), 0.2)
    path = tmp_path / "soil-press.dxf"
    document.saveas(path)
    return path


@pytest.mark.parametrize("version", ["R12", "R2000", "R2004", "R2007", "R2010", "R2013", "R2018"])
@pytest.mark.parametrize("form", ["asc", "bin"])
def test_every_version_loads_as_text_and_binary(tmp_path: Path, version: str, form: str) -> None:
    document = ezdxf.new(version)
    document.modelspace().add_circle((1, 2), 3)
    path = tmp_path / "seed shuttle #1 ☠.DXF"
    document.saveas(path, fmt=form)
    sketch = load(path)
    assert (len(sketch.primitives), sketch.notices) == (1, ())
    assert sketch.path == str(path)


@pytest.mark.parametrize(
    ("content", "reason"),
    [
        (b"", "it is empty"),
        (b"  \r\n \n", "it is empty"),
        (b"Dear all,\nthe drawing follows.\n0\n1\n", "it is a text file but no DXF drawing"),
        (b"AC1032\x00\x00\x00\x00\x7f" + bytes(200), "it is a DWG drawing, not a DXF"),
        (b"%PDF-1.7\n%\xe2\xe3", "it is a PDF document, not a DXF drawing"),
        (b"PK\x03\x04" + bytes(50), "it is a ZIP archive, not a DXF drawing"),
        (bytes(range(256)), "it is a binary file but no DXF drawing"),
        (b"AutoCAD Binary DXF\r\n\x1a\x00" + bytes(20), "it is damaged beyond repair"),
        ("  0\nSECTION\n".encode("utf-16"), "it is text in UTF-16"),
    ],
    ids=["empty", "blank", "text", "DWG", "PDF", "ZIP", "binary", "binary DXF cut", "UTF-16"],
)
def test_what_is_no_drawing_is_named(tmp_path: Path, content: bytes, reason: str) -> None:
    path = tmp_path / "lift-table.dxf"
    path.write_bytes(content)
    with pytest.raises(DrawingUnreadable) as caught:
        load(path)
    assert caught.value.path == str(path)
    assert caught.value.reason.startswith(reason)
    assert caught.value.remedy
    assert "\n" not in str(caught.value)


def test_a_missing_path_and_a_folder_are_told_apart(tmp_path: Path) -> None:
    with pytest.raises(DrawingUnreadable, match="there is no such file"):
        load(tmp_path / "none.dxf")
    with pytest.raises(DrawingUnreadable, match="it is a folder"):
        load(tmp_path)


def test_a_pipe_is_not_waited_for(tmp_path: Path) -> None:
    path = tmp_path / "pipe.dxf"
    os.mkfifo(path)
    with pytest.raises(DrawingUnreadable, match="not a regular file"):
        load(path)


def test_a_path_with_a_zero_byte_or_too_long_cannot_be_opened() -> None:
    for path in ("a\0b.dxf", "a" * 5000 + ".dxf"):
        with pytest.raises(DrawingUnreadable, match="it cannot be opened"):
            load_sketch(path, Settings())


def test_a_file_without_permission_says_so(drawing: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(*_: object, **__: object) -> None:
        raise PermissionError

    monkeypatch.setattr(Path, "open", refuse)  # a chmod would not stop the superuser who may run this
    with pytest.raises(DrawingUnreadable, match="it may not be read"):
        load(drawing)


def test_a_path_is_shown_without_control_characters(tmp_path: Path) -> None:
    with pytest.raises(DrawingUnreadable) as caught:
        load(tmp_path / "press\x1b[2J.dxf")
    assert caught.value.path.endswith("press\ufffd[2J.dxf")


def test_a_drawing_cut_off_in_its_entities_is_repaired_or_found_empty(drawing: Path) -> None:
    lines = drawing.read_text().split("\n")
    first = max(number for number, line in enumerate(lines) if line == "ENTITIES")
    drawing.write_text("\n".join(lines[: first + 120]))
    sketch = load(drawing)
    kinds = [notice.kind for notice in sketch.notices]
    assert kinds[0] == "recovered"
    assert ("emptied" in kinds) == (not sketch.primitives)


def test_a_drawing_cut_at_half_says_that_nothing_is_left(drawing: Path) -> None:
    lines = drawing.read_text().split("\n")
    first = max(number for number, line in enumerate(lines) if line == "ENTITIES")
    drawing.write_text("\n".join(lines[: first // 2]))
    sketch = load(drawing)
    assert [notice.kind for notice in sketch.notices] == ["recovered", "emptied"]
    assert sketch.entities == ()


def test_a_repair_is_counted_and_said(drawing: Path) -> None:
    drawing.write_text("  0\nENDSEC\n  9\n$EXTMIN\n" + drawing.read_text())
    sketch = load(drawing)
    assert len(sketch.primitives) == 40
    (notice,) = sketch.notices
    assert notice.kind == "recovered"
    assert notice.amount is not None
    assert notice.amount >= 1
    assert "ENDSEC" in notice.detail


def test_letters_in_a_coordinate_are_repaired_and_said(drawing: Path) -> None:
    drawing.write_text(drawing.read_text().replace("\nAcDbCircle\n 10\n", "\nAcDbCircle\n 10\nabc", 1))
    assert [notice.kind for notice in load(drawing).notices] == ["recovered"]


def test_a_group_code_that_is_no_number_is_damage_beyond_repair(drawing: Path) -> None:
    drawing.write_text(drawing.read_text().replace("\nAcDbCircle\n 10\n", "\nAcDbCircle\n ten\n", 1))
    with pytest.raises(DrawingUnreadable, match="damaged beyond repair"):
        load(drawing)


def test_the_library_s_log_does_not_reach_the_screen(
    drawing: Path, caplog: pytest.LogCaptureFixture, capfd: pytest.CaptureFixture[str]
) -> None:
    drawing.write_text("  0\nENDSEC\n" + drawing.read_text())
    load(drawing)
    assert caplog.records == []
    assert capfd.readouterr() == ("", "")
    assert not logging.getLogger("ezdxf").disabled


@pytest.mark.parametrize(
    "path", sorted((Path(__file__).parents[2] / "fixtures").glob("*.dxf")), ids=lambda path: path.stem
)
def test_the_encoding_found_at_the_beginning_is_the_one_that_the_library_finds(path: Path) -> None:
    with path.open("rb") as file:
        found = stated_encoding(file.read(4096))
    assert found in (None, dxf_file_info(path).encoding)


def test_text_of_an_old_drawing_is_read_in_its_code_page(tmp_path: Path) -> None:
    document = ezdxf.new("R2000")
    document.encoding = "cp1251"
    document.modelspace().add_text("Ножка")
    document.saveas(tmp_path / "old.dxf")
    read = open_drawing(tmp_path / "old.dxf").document
    assert [text.dxf.text for text in read.modelspace().query("TEXT")] == ["Ножка"]
