from __future__ import annotations

import re
from pathlib import Path

import pytest

from dxfcheck.configuration.effective import settings_for
from dxfcheck.configuration.settings_file import SettingsFile
from dxfcheck.inspection import DrawingReport, inspect_drawing
from dxfcheck.reports.settings_starter import starter_text
from dxfcheck.settings import Settings
from tests.configuration.files import settings_file
from tests.reports.samples import press, tipper, unreadable

FIXTURES = Path(__file__).parents[2] / "fixtures"


def in_force(text: str) -> str:
    """The text with every setting taken out of its comment."""
    return re.sub(r"^#(?! )", "", text, flags=re.MULTILINE)


def stated(file: SettingsFile) -> dict[str, object]:
    return {f"{each.key}/{each.name}".rstrip("/"): each.value for each in file.statements}


def speeds(report: DrawingReport) -> list[float]:
    """Of all pins; -1 for one that is not known."""
    pins = [pin for each in report.mechanisms for pin in each.analysis.pins]
    return [-1.0 if pin.velocity is None else abs(pin.velocity) for pin in pins]


REPORTS = {
    "one": [tipper("tipper.dxf")],
    "one and one not read": [unreadable(), press("press.dxf")],
    "several": [tipper("a/tipper.dxf"), press("press.dxf")],
    "none": [unreadable()],
    "odd names": [tipper("a [1]\x07*.dxf"), press('"b".dxf'), press("c\udc80.dxf"), press("d\\e.dxf")],
    "many": [tipper(f"{number}.dxf") for number in range(30)],
}


@pytest.mark.parametrize("reports", REPORTS.values(), ids=REPORTS.keys())
def test_it_states_nothing_and_is_valid_with_every_line_in_force(tmp_path: Path, reports: list[DrawingReport]) -> None:
    text = starter_text(reports, Path())
    file = settings_file(tmp_path, text)
    assert file.statements == ()
    assert not [table for table in file.tables if table.statements]
    full = settings_file(tmp_path, in_force(text))
    assert len(full.statements) > 10


def test_it_holds_what_the_drawing_holds(tmp_path: Path) -> None:
    text = starter_text([tipper("tipper.dxf")], Path())
    found = stated(settings_file(tmp_path, in_force(text)))
    assert found["drives"] == ("A-B = 10 rad/s",)
    assert found["reading.units"] == "mm"
    assert found["reading.frame-pins"] == ("A", "D")
    assert found["expect.mobility"] == 1
    assert {key for key in found if key.startswith("rules.*/")} == {
        f"rules.*/{finding.rule}" for finding in tipper().findings
    }
    assert "# Made from tipper.dxf." in text
    assert "#   LINKS: 3 link" in text


def test_each_of_several_drawings_has_its_own_drives_and_pins(tmp_path: Path) -> None:
    text = starter_text([tipper(str(tmp_path / "a [1]" / "tipper.dxf")), press(str(tmp_path / "press.dxf"))], tmp_path)
    file = settings_file(tmp_path, in_force(text))
    settings = settings_for(tmp_path / "a [1]" / "tipper.dxf", file, Settings()).settings
    assert settings.settings_drives == ("A-B = 10 rad/s",)
    assert settings.frame_pins == ("A", "D")


@pytest.mark.parametrize("name", ["tray-tipper", "lift-table", "soil-press", "pot-placer", "mixer"])
def test_in_force_the_drawing_is_checked_as_before(tmp_path: Path, name: str) -> None:
    path = FIXTURES / f"{name}.dxf"
    before = inspect_drawing(str(path), Settings())
    text = starter_text([before], FIXTURES)
    idle = settings_for(path, settings_file(tmp_path, text), Settings()).settings
    assert idle == Settings()
    lines = in_force(text)
    only_drives = re.search(r"^drives = .*$", lines, re.MULTILINE)
    assert only_drives is not None
    settings = settings_for(path, settings_file(tmp_path, only_drives[0]), Settings()).settings
    after = inspect_drawing(str(path), settings)
    assert speeds(after) == pytest.approx(speeds(before))
    assert after.findings == before.findings
    assert {drive.source for report in after.mechanisms for drive in report.linkage.drives} == {"settings"}
