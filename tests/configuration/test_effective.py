from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest

from dxfcheck.configuration.effective import lost_drawings, settings_for, today
from dxfcheck.settings import LayerRoles, Settings
from tests.configuration.files import settings_file

OFFICE = """
drives = ["A-B = 120 rpm cw"]
[reading]
units = "mm"
tolerance = 0.01
frame-pins = ["A", "D"]
part-blocks = ["BAR-*"]
layers.frame = ["BED"]
[expect]
mobility = 1
[limits]
pin-speed = { "*" = "2 m/s", "C" = "3 m/s" }
[rules]
empty-pin = "note"
short-line = "off"
[drawings."received/*.dxf"]
drives = []
reading.units = "in"
limits.pin-speed = "1 m/s"
rules.empty-pin = "off"
[drawings."received/press.dxf"]
reading.units = "m"
"""


def effective(folder: Path, drawing: str, options: Settings | None = None) -> Settings:
    return settings_for(folder / drawing, settings_file(folder, OFFICE), options or Settings()).settings


def test_without_a_file_the_options_hold(tmp_path: Path) -> None:
    options = Settings(unit="cm")
    assert settings_for(tmp_path / "a.dxf", None, options).settings is options


def test_a_drawing_has_what_its_file_states(tmp_path: Path) -> None:
    settings = effective(tmp_path, "tipper.dxf")
    assert (settings.unit, settings.unit_source) == ("mm", "settings")
    assert settings.tolerance == 0.01
    assert settings.settings_drives == ("A-B = 120 rpm cw",)
    assert settings.drives == ()
    assert settings.frame_pins == ("A", "D")
    assert settings.part_blocks == ("BAR-*",)
    assert settings.layers == LayerRoles(frame=("BED",))
    assert settings.expected_mobility == 1
    assert {(each.subject, each.stated) for each in settings.requirements} == {("*", "2 m/s"), ("C", "3 m/s")}
    assert settings.rule_weights == (("empty-pin", "note"), ("short-line", "off"))
    assert settings.files == (f"{tmp_path}/dxfcheck.toml",)


def test_limits_on_the_pose_take_the_place_of_the_built_in_ones(tmp_path: Path) -> None:
    file = settings_file(tmp_path, '[limits]\ntransmission-angle = "45°"\ndoubtful-speed = "2,5 %"\n')
    settings = settings_for(tmp_path / "a.dxf", file, Settings()).settings
    assert settings.transmission_angle == 45.0
    assert settings.doubtful_speed == 0.025


def test_tables_of_drawings_override_in_order_name_by_name(tmp_path: Path) -> None:
    received = effective(tmp_path, "received/tipper.dxf")
    assert received.unit == "in"
    assert received.settings_drives == ()
    assert received.frame_pins == ("A", "D")
    assert {(each.subject, each.stated) for each in received.requirements} == {("*", "1 m/s"), ("C", "3 m/s")}
    assert received.rule_weights == (("empty-pin", "off"), ("short-line", "off"))
    assert effective(tmp_path, "received/press.dxf").unit == "m"
    assert effective(tmp_path, "received/old/press.dxf").unit == "mm"


def test_options_override_settings(tmp_path: Path) -> None:
    options = Settings(unit="cm", tolerance=0.5, drives=("C-D = 1 rad/s",), frame_pins=("X",), expected_mobility=2)
    settings = effective(tmp_path, "received/press.dxf", options)
    assert (settings.unit, settings.unit_source) == ("cm", "option")
    assert settings.tolerance == 0.5
    assert settings.frame_pins == ("X",)
    assert settings.expected_mobility == 2
    # Which of two drives on one motion counts is known only once the drawing is read.
    assert effective(tmp_path, "tipper.dxf", options).drives == ("C-D = 1 rad/s",)
    assert effective(tmp_path, "tipper.dxf", options).settings_drives == ("A-B = 120 rpm cw",)


def test_a_file_that_states_nothing_for_a_drawing_has_no_say(tmp_path: Path) -> None:
    file = settings_file(tmp_path, "[reading]\n[drawings.'a.dxf'.reading]\nunits = 'mm'\n")
    assert settings_for(tmp_path / "b.dxf", file, Settings()).settings == Settings()
    assert settings_for(tmp_path / "a.dxf", file, Settings()).settings.files == (f"{tmp_path}/dxfcheck.toml",)


def test_a_folder_has_none_of_the_tables_of_drawings(tmp_path: Path) -> None:
    (tmp_path / "received").mkdir()
    assert effective(tmp_path, "received").unit == "mm"


ACCEPTED = """
[[accept]]
rule = "near-miss"
drawing = "line 2/a.dxf"
reason = "stop face"
until = 2027-03-31
"""


@pytest.mark.parametrize(("day", "expired"), [(date(2027, 3, 31), False), (date(2027, 4, 1), True)])
def test_an_acceptance_holds_for_its_drawing_until_its_day(tmp_path: Path, day: date, *, expired: bool) -> None:
    file = settings_file(tmp_path, ACCEPTED)
    (acceptance,) = settings_for(tmp_path / "line 2" / "a.dxf", file, Settings(), day=day).settings.acceptances
    assert acceptance.expired is expired
    assert settings_for(tmp_path / "a.dxf", file, Settings(), day=day).settings.acceptances == ()


def test_accepted_findings_of_drawings_that_are_not_there_are_lost(tmp_path: Path) -> None:
    file = settings_file(tmp_path, ACCEPTED)
    assert lost_drawings(file) == (("line 2/a.dxf", 2),)
    (tmp_path / "line 2").mkdir()
    (tmp_path / "line 2" / "a.dxf").touch()
    assert lost_drawings(file) == ()


def test_today_is_a_day() -> None:
    assert today() >= date(2024, 1, 1)


LIFTED = """
[expect]
mobility = 1
speeds.C = "1 m/s"
speeds."C-D" = "2 rad/s"
ratios."C-D / A-B" = "0.5"
[limits]
pin-speed = { "*" = "2 m/s", C = "3 m/s" }
slide-speed = "1 m/s"
[drawings."old.dxf"]
expect.mobility = "off"
expect.speeds.C = "off"
expect.ratios."C-D / A-B" = "off"
limits.pin-speed = "off"
"""


def test_what_is_off_for_some_drawings_is_not_stated_for_them(tmp_path: Path) -> None:
    file = settings_file(tmp_path, LIFTED)
    old = settings_for(tmp_path / "old.dxf", file, Settings()).settings
    other = settings_for(tmp_path / "other.dxf", file, Settings()).settings
    assert (old.expected_mobility, other.expected_mobility) == (None, 1)
    assert {each.stated for each in old.requirements if not each.lifts} == {"2 rad/s", "1 m/s"}
    assert {each.subject for each in old.requirements if each.quantity != "pin-speed"} == {"C-D", "*"}
    assert len(other.requirements) == 6


def test_a_limit_that_is_off_for_one_part_leaves_the_others(tmp_path: Path) -> None:
    file = settings_file(tmp_path, LIFTED.replace('pin-speed = "off"', 'pin-speed.C = "off"'))
    pins = settings_for(tmp_path / "old.dxf", file, Settings()).settings.requirements[-3:]
    assert {(each.subject, each.lifts) for each in pins if each.quantity == "pin-speed"} == {("*", False), ("C", True)}


def test_a_drawing_that_is_lost_is_told_at_each_line(tmp_path: Path) -> None:
    assert lost_drawings(settings_file(tmp_path, 2 * ACCEPTED)) == (("line 2/a.dxf", 2), ("line 2/a.dxf", 8))
