from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.configuration.lookup import find_settings_file, hidden_settings_files, shown_path


@pytest.fixture
def office(tmp_path: Path) -> Path:
    """A folder of drawings within another; pytest's own folder lies below no settings file."""
    (tmp_path / "drawings" / "line 2").mkdir(parents=True)
    return tmp_path / "drawings"


def test_without_a_file_there_is_none(office: Path) -> None:
    assert find_settings_file(office / "line 2" / "press.dxf") is None
    assert hidden_settings_files(office / "press.dxf") == ()


def test_the_nearest_above_counts_and_hides_the_others(office: Path) -> None:
    far, near = office.parent / "dxfcheck.toml", office / "dxfcheck.toml"
    far.touch()
    assert find_settings_file(office / "line 2" / "press.dxf") == far
    near.touch()
    assert find_settings_file(office / "line 2" / "press.dxf") == near
    assert hidden_settings_files(office / "line 2" / "press.dxf") == (far,)
    assert find_settings_file(office) == near


def test_a_project_file_counts_only_with_its_table_and_after_the_other(office: Path) -> None:
    project = office / "pyproject.toml"
    project.write_text('[project]\ndependencies = ["dxfcheck"]\n', encoding="utf-8")
    assert find_settings_file(office / "press.dxf") is None
    project.write_text('[tool.dxfcheck.reading]\nunits = "mm"\n', encoding="utf-8")
    assert find_settings_file(office / "press.dxf") == project
    (office / "dxfcheck.toml").touch()
    assert find_settings_file(office / "press.dxf") == office / "dxfcheck.toml"
    assert hidden_settings_files(office / "press.dxf") == (project,)


@pytest.mark.parametrize(("text", "counts"), [("[tool.dxfcheck]\nx = ", True), ("# dxfcheck\nx = ", False)])
def test_a_damaged_project_file_counts_if_it_has_the_table(office: Path, text: str, *, counts: bool) -> None:
    (office / "pyproject.toml").write_text(text, encoding="utf-8")
    assert (find_settings_file(office / "press.dxf") is not None) is counts


def test_links_are_followed_first(office: Path, tmp_path: Path) -> None:
    (office / "dxfcheck.toml").touch()
    (office / "press.dxf").touch()
    elsewhere = tmp_path / "elsewhere"
    elsewhere.mkdir()
    (elsewhere / "linked.dxf").symlink_to(office / "press.dxf")
    assert find_settings_file(elsewhere / "linked.dxf") == office / "dxfcheck.toml"


def test_a_folder_is_looked_at_once_in_a_run(office: Path) -> None:
    known: dict[str, Path | None] = {}
    (office / "dxfcheck.toml").touch()
    find_settings_file(office / "line 2" / "a.dxf", known)
    (office / "dxfcheck.toml").unlink()
    assert find_settings_file(office / "line 2" / "b.dxf", known) == office / "dxfcheck.toml"


def test_a_folder_of_that_name_or_a_link_to_nothing_is_not_passed_over(office: Path) -> None:
    file = office / "dxfcheck.toml"
    file.mkdir()
    assert find_settings_file(office / "press.dxf") == file
    file.rmdir()
    file.symlink_to("office-settings.toml")
    assert find_settings_file(office / "press.dxf") == file


def test_paths_are_shown_as_a_person_here_would_name_them(office: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(office)
    assert shown_path(Path.cwd() / "line 2" / "dxfcheck.toml") == str(Path("line 2", "dxfcheck.toml"))
    assert shown_path(Path.cwd().parent / "dxfcheck.toml") == str(Path.cwd().parent / "dxfcheck.toml")
