from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.cli.configured import with_settings
from dxfcheck.cli.paths import Target
from dxfcheck.errors import SettingsInvalid
from dxfcheck.settings import Settings


@pytest.fixture
def office(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Two folders of drawings; only one has a settings file."""
    monkeypatch.chdir(tmp_path)
    for name in ("plain/a.dxf", "ruled/b.dxf", "ruled/deep/c.dxf"):
        Path(name).parent.mkdir(parents=True, exist_ok=True)
        Path(name).touch()
    write("ruled/dxfcheck.toml", '[reading]\nunits = "in"\n')
    return tmp_path


def write(path: str, text: str) -> None:
    Path(path).write_text(text, encoding="utf-8")


TARGETS = [Target("plain/a.dxf"), Target("ruled/b.dxf"), Target("ruled/deep/c.dxf"), Target("gone.dxf", "is not there")]


@pytest.mark.usefixtures("office")
def test_each_drawing_gets_the_settings_above_it() -> None:
    plain, ruled, deep, gone = with_settings(TARGETS, Settings(tolerance=1.0), None)
    assert plain == TARGETS[0]
    assert gone == TARGETS[3]
    expected = Settings(unit="in", unit_source="settings", tolerance=1.0, files=("ruled/dxfcheck.toml",))
    assert ruled.settings == expected
    assert deep.settings == expected


@pytest.mark.usefixtures("office")
def test_a_named_file_takes_the_place_of_all() -> None:
    write("other.toml", '[reading]\nunits = "m"\n')
    configured = with_settings(TARGETS[:3], Settings(), "other.toml")
    assert {target.settings and target.settings.unit for target in configured} == {"m"}


@pytest.mark.usefixtures("office")
def test_a_named_file_that_cannot_be_used_stops_everything() -> None:
    with pytest.raises(SettingsInvalid, match="there is no such settings file"):
        with_settings(TARGETS, Settings(), "gone.toml")


@pytest.mark.usefixtures("office")
def test_a_file_with_mistakes_is_told_of_once_and_only_its_drawings_are_not_checked(
    capsys: pytest.CaptureFixture[str],
) -> None:
    write("ruled/dxfcheck.toml", 'unit = "in"\nunits = "mm"\n')
    plain, ruled, deep, _ = with_settings(TARGETS, Settings(), None)
    assert plain.problem is None
    assert ruled.problem == deep.problem == "its settings file ruled/dxfcheck.toml has 2 mistakes; mend the file first"
    lines = capsys.readouterr().err.splitlines()
    assert [line.split(": ")[1] for line in lines] == ["ruled/dxfcheck.toml:1", "ruled/dxfcheck.toml:2"]


@pytest.mark.usefixtures("office")
def test_drawings_that_are_named_and_not_there_are_one_warning(capsys: pytest.CaptureFixture[str]) -> None:
    entry = '[[accept]]\nrule = "near-miss"\ndrawing = "{}"\nreason = "stop face"\n'
    table = '[drawings."{}".reading]\nunits = "mm"\n'
    tables = table.format("gone.dxf") + table.format("deep/c.dxf") + table.format("x/*.dxf")
    write("ruled/dxfcheck.toml", entry.format("b.dxf") + entry.format("old.dxf") + tables)
    configured = with_settings(TARGETS, Settings(), None)
    assert configured[1].settings is not None
    assert [each.rule for each in configured[1].settings.acceptances] == ["near-miss"]
    assert configured[2].settings is not None
    assert configured[2].settings.acceptances == ()
    assert capsys.readouterr().err.splitlines() == [
        (
            "dxfcheck: ruled/dxfcheck.toml: warning: drawings it names are not there: "
            "old.dxf (line 5), gone.dxf (line 9); mend the path or remove the table"
        )
    ]
