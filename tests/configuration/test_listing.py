from __future__ import annotations

from datetime import date
from pathlib import Path

from dxfcheck.configuration.effective import settings_for
from dxfcheck.configuration.listing import listed_settings
from dxfcheck.settings import Settings
from tests.configuration.files import settings_file

TEXT = """
[reading]
units = "mm"
frame-pins = ["A"]
[limits]
slide-speed = { "*" = "500 mm/s", "block at E" = "0.2 m/s" }
[drawings."received/*.dxf"]
reading.frame-pins = ["B"]
drives = ["A-B = 1 rad/s"]
[[accept]]
rule = "near-miss"
drawing = "received/a.dxf"
at = [1.5, 2]
reason = "stop face"
until = 2027-03-31
"""


def listed(folder: Path, options: Settings) -> dict[tuple[str, str], str]:
    file = settings_file(folder, TEXT)
    effective = settings_for(folder / "received" / "a.dxf", file, options, day=date(2028, 1, 1))
    return {(each.key, each.where.removeprefix(f"{folder}/")): each.value for each in listed_settings(effective)}


def test_every_value_says_who_states_it(tmp_path: Path) -> None:
    found = listed(tmp_path, Settings(unit="in", drives=("C-D = 2 rad/s",)))
    table = '(drawings "received/*.dxf")'
    assert found["reading.units", "option"] == '"in"'
    assert ("reading.units", "dxfcheck.toml:3") not in found
    assert found["reading.frame-pins", f"dxfcheck.toml:8 {table}"] == '["B"]'
    assert found["drives", "option"] == '["C-D = 2 rad/s"]'
    assert found["drives", f"dxfcheck.toml:9 {table}"] == '["A-B = 1 rad/s"]'
    assert found["limits.slide-speed", "dxfcheck.toml:6"] == '"500 mm/s"'
    assert found['limits.slide-speed."block at E"', "dxfcheck.toml:6"] == '"0.2 m/s"'
    assert found["reading.tolerance", "built in"] == "3e-06 of the sketch's diagonal"
    assert found["rules", "built in"] == "as in 'dxfcheck explain'"
    assert found["accept", "dxfcheck.toml:10"] == "near-miss at [1.5, 2]: stop face, until 2027-03-31 (expired)"


def test_without_any_settings_everything_is_built_in() -> None:
    effective = settings_for(Path("a.dxf"), None, Settings())
    assert {each.where for each in listed_settings(effective)} == {"built in"}
