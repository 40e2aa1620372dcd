from __future__ import annotations

import os
from pathlib import Path

import pytest

from dxfcheck.cli.paths import find_targets


def make(path: Path) -> Path:
    path.parent.mkdir(parents=True, exist_ok=True)
    path.touch()
    return path


def found(*paths: Path) -> list[str]:
    return [target.path for target in find_targets([str(path) for path in paths])]


def test_files_keep_their_order_and_are_named_as_given(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    make(tmp_path / "b.dxf")
    make(tmp_path / "a.dxf")
    monkeypatch.chdir(tmp_path)
    assert found(Path("b.dxf"), Path("a.dxf")) == ["b.dxf", "a.dxf"]


def test_a_file_is_taken_whatever_its_name(tmp_path: Path) -> None:
    assert found(make(tmp_path / "tipper.txt")) == [str(tmp_path / "tipper.txt")]


def test_a_folder_means_every_drawing_below_it_in_order(tmp_path: Path) -> None:
    for name in ("z.dxf", "B.DXF", "sub/a.Dxf", "sub/deep/c.dxf", "notes.txt", "dxf", "sub/x.dxf.bak"):
        make(tmp_path / name)
    (tmp_path / "folder.dxf").mkdir()
    assert found(tmp_path) == [str(tmp_path / name) for name in ("B.DXF", "sub/a.Dxf", "sub/deep/c.dxf", "z.dxf")]


def test_a_drawing_reached_twice_is_checked_once(tmp_path: Path) -> None:
    drawing = make(tmp_path / "a.dxf")
    (tmp_path / "again.dxf").symlink_to(drawing)
    assert found(drawing, tmp_path, tmp_path / "." / "a.dxf") == [str(drawing)]


def test_linked_folders_are_followed_and_loops_end(tmp_path: Path) -> None:
    make(tmp_path / "sheets" / "a.dxf")
    make(tmp_path / "elsewhere" / "b.dxf")
    (tmp_path / "sheets" / "loop").symlink_to(tmp_path / "sheets")
    (tmp_path / "sheets" / "linked").symlink_to(tmp_path / "elsewhere")
    assert found(tmp_path / "sheets") == [str(tmp_path / "sheets" / name) for name in ("a.dxf", "linked/b.dxf")]


@pytest.mark.parametrize(
    ("make_path", "problem"),
    [
        (lambda folder: folder / "missing.dxf", "no such file"),
        (lambda folder: folder / "nul\0.dxf", "no such file"),
        (lambda folder: link_to_nothing(folder / "link.dxf"), "link to nothing"),
        (lambda folder: folder, "holds no DXF file"),
    ],
    ids=["missing", "nul", "dangling", "empty folder"],
)
def test_a_path_that_leads_to_no_drawing_says_why(tmp_path: Path, make_path: object, problem: str) -> None:
    assert callable(make_path)
    (target,) = find_targets([str(make_path(tmp_path))])
    assert target.problem is not None
    assert problem in target.problem


def link_to_nothing(path: Path) -> Path:
    path.symlink_to("nowhere")
    return path


def test_a_folder_that_cannot_be_opened_is_said_not_skipped(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    make(tmp_path / "a.dxf")
    make(tmp_path / "locked" / "b.dxf")
    scan = os.scandir

    def refuse(path: Path) -> object:
        if Path(path).name == "locked":
            raise PermissionError(13, "Permission denied")
        return scan(path)

    monkeypatch.setattr(os, "scandir", refuse)
    targets = find_targets([str(tmp_path)])
    assert [target.path for target in targets] == [str(tmp_path / "a.dxf"), str(tmp_path / "locked")]
    assert targets[1].problem == "the folder cannot be opened: Permission denied; check its permissions"
