from __future__ import annotations

import os
import threading
from pathlib import Path

import pytest

from dxfcheck.errors import OptionInvalid
from dxfcheck.reports.files import refuse_target, write_whole


def test_a_file_is_written_and_replaced_whole(tmp_path: Path) -> None:
    target = tmp_path / "report.json"
    write_whole(target, "first ω\n")
    write_whole(target, "second\n")
    assert target.read_bytes() == b"second\n"
    assert list(tmp_path.iterdir()) == [target]


def test_a_new_file_has_the_usual_permissions_and_an_old_one_keeps_its_own(tmp_path: Path) -> None:
    plain = tmp_path / "plain"
    plain.write_text("", encoding="utf-8")
    target = tmp_path / "report.json"
    write_whole(target, "x")
    assert target.stat().st_mode == plain.stat().st_mode
    target.chmod(0o600)
    write_whole(target, "y")
    assert target.stat().st_mode & 0o777 == 0o600


def test_a_failed_write_leaves_the_old_file_and_nothing_else(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    target = tmp_path / "report.json"
    target.write_text("old", encoding="utf-8")

    def full(_path: Path, _target: Path) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(Path, "replace", full)
    with pytest.raises(OptionInvalid, match="No space left"):
        write_whole(target, "new")
    assert target.read_text(encoding="utf-8") == "old"
    assert list(tmp_path.iterdir()) == [target]


@pytest.mark.parametrize("name", ["tipper.dxf", "TIPPER.DXF"])
def test_a_drawing_is_never_written_over(tmp_path: Path, name: str) -> None:
    with pytest.raises(OptionInvalid, match="never written over a drawing"):
        write_whole(tmp_path / name, "x")
    assert not (tmp_path / name).exists()


def test_a_link_to_a_drawing_is_refused_too(tmp_path: Path) -> None:
    drawing = tmp_path / "tipper.dxf"
    drawing.write_text("drawing", encoding="utf-8")
    (tmp_path / "report.json").symlink_to(drawing)
    with pytest.raises(OptionInvalid, match="never written over a drawing"):
        write_whole(tmp_path / "report.json", "x")
    assert drawing.read_text(encoding="utf-8") == "drawing"


def test_a_link_is_followed(tmp_path: Path) -> None:
    (tmp_path / "real.json").write_text("old", encoding="utf-8")
    (tmp_path / "report.json").symlink_to("real.json")
    write_whole(tmp_path / "report.json", "new")
    assert (tmp_path / "report.json").is_symlink()
    assert (tmp_path / "real.json").read_text(encoding="utf-8") == "new"


def test_a_folder_that_is_missing_or_is_the_target_is_refused_before_any_work(tmp_path: Path) -> None:
    with pytest.raises(OptionInvalid, match="no folder"):
        refuse_target(tmp_path / "missing" / "report.json")
    with pytest.raises(OptionInvalid, match="is a folder"):
        refuse_target(tmp_path)


def test_a_pipe_is_written_to_as_it_stands(tmp_path: Path) -> None:
    pipe = tmp_path / "pipe"
    os.mkfifo(pipe)
    received: list[str] = []
    reader = threading.Thread(target=lambda: received.append(pipe.read_text(encoding="utf-8")))
    reader.start()
    write_whole(pipe, "through the pipe")
    reader.join()
    assert received == ["through the pipe"]
    assert pipe.is_fifo()
