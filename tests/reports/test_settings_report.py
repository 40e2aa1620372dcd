from __future__ import annotations

import json

from dxfcheck.configuration.listing import ListedSetting
from dxfcheck.reports.settings_report import SettingsReport, settings_as_json, settings_lines

REPORT = SettingsReport(
    path="received/press.dxf",
    folder=False,
    file="dxfcheck.toml",
    hidden=("/srv/dxfcheck.toml",),
    used=('drawings "received/*.dxf" (line 8)',),
    unused=('drawings "old/*.dxf" (line 12)',),
    settings=(
        ListedSetting("drives", '["A-B = 1 rad/s"]', "option"),
        ListedSetting("reading.units", '"in"', 'dxfcheck.toml:9 (drawings "received/*.dxf")'),
        ListedSetting("reading.tolerance", "3e-06 of the sketch's diagonal", "built in"),
        ListedSetting("reading.layers.frame", '["' + "MACHINE-BED-OF-THE-LINE*" * 4 + '"]', "dxfcheck.toml:3"),
    ),
)


def texts(report: SettingsReport, width: int = 80) -> list[str]:
    return [line.text for line in settings_lines(report, width)]


def test_what_is_stated_comes_first_with_who_states_it() -> None:
    lines = texts(REPORT)
    assert lines[0] == "received/press.dxf: settings"
    assert lines[lines.index("Stated") + 1] == '  drives = ["A-B = 1 rad/s"]  from the option'
    assert '  reading.units = "in"        from dxfcheck.toml:9 (drawings "received/*.dxf")' in lines
    assert "      from dxfcheck.toml:3" in lines
    assert lines[-2:] == ["Built in", "  reading.tolerance  3e-06 of the sketch's diagonal"]


def test_the_files_and_tables_that_have_no_say_are_named() -> None:
    text = "\n".join(texts(REPORT))
    assert 'tables     drawings "received/*.dxf" (line 8)' in text
    assert 'left aside drawings "old/*.dxf" (line 12): they are of other drawings' in text
    assert "hidden     /srv/dxfcheck.toml: not used, as dxfcheck.toml is nearer" in text


def test_without_a_file_that_is_said() -> None:
    empty = SettingsReport(path=".", folder=True, file=None, hidden=(), used=(), unused=(), settings=())
    assert texts(empty)[1:] == [
        "  file       none: there is no dxfcheck.toml in this folder or above it", "", "Stated", "  nothing",
    ]  # fmt: skip


def test_lines_keep_to_the_width_where_they_can() -> None:
    long = [line for line in texts(REPORT, 60) if len(line) > 60]
    assert all("MACHINE-BED" in line for line in long)


def test_programs_get_the_same() -> None:
    found = json.loads(settings_as_json(REPORT))
    assert found["file"] == "dxfcheck.toml"
    assert found["hidden"] == ["/srv/dxfcheck.toml"]
    assert found["settings"][1] == {
        "key": "reading.units", "value": '"in"', "from": 'dxfcheck.toml:9 (drawings "received/*.dxf")',
    }  # fmt: skip
    assert len(found["settings"]) == 4
