from __future__ import annotations

import json
import re
import shutil
from pathlib import Path

import pytest

from dxfcheck.cli import main

FIXTURES = Path(__file__).parents[2] / "fixtures"

SETTINGS = """\
[reading]
units = "mm"
[rules]
assumed-drive = "off"
loose-end = "error"
[drawings."received/*.dxf".reading]
units = "in"
"""


@pytest.fixture
def office(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Two drawings, and settings that differ between them."""
    (tmp_path / "received").mkdir()
    shutil.copy(FIXTURES / "tray-tipper.dxf", tmp_path)
    shutil.copy(FIXTURES / "soil-press.dxf", tmp_path / "received")
    (tmp_path / "dxfcheck.toml").write_text(SETTINGS, encoding="utf-8")
    monkeypatch.chdir(tmp_path)
    return tmp_path


def check_json(capsys: pytest.CaptureFixture[str], *arguments: str) -> dict[str, dict[str, object]]:
    main(["check", "--json", "-", *arguments])
    return {drawing["path"]: drawing for drawing in json.loads(capsys.readouterr().out)["drawings"]}


@pytest.mark.usefixtures("office")
def test_drawings_are_checked_with_their_settings(capsys: pytest.CaptureFixture[str]) -> None:
    drawings = check_json(capsys, "tray-tipper.dxf", "received")
    assert drawings["tray-tipper.dxf"]["units"] == {"length": "mm", "source": "settings"}
    assert drawings["received/soil-press.dxf"]["units"] == {"length": "in", "source": "settings"}
    assert drawings["tray-tipper.dxf"]["settings"] == {"files": ["dxfcheck.toml"], "rules_off": ["assumed-drive"]}


@pytest.mark.usefixtures("office")
def test_side_by_side_each_keeps_its_own(capsys: pytest.CaptureFixture[str]) -> None:
    drawings = check_json(capsys, "tray-tipper.dxf", "received", "--jobs", "2")
    assert {path: drawing["units"] for path, drawing in drawings.items()} == {
        "tray-tipper.dxf": {"length": "mm", "source": "settings"},
        "received/soil-press.dxf": {"length": "in", "source": "settings"},
    }


@pytest.mark.usefixtures("office")
def test_an_option_comes_before_the_settings(capsys: pytest.CaptureFixture[str]) -> None:
    assert check_json(capsys, "tray-tipper.dxf", "--units", "cm")["tray-tipper.dxf"]["units"] == {
        "length": "cm", "source": "option",
    }  # fmt: skip


@pytest.mark.usefixtures("office")
def test_the_report_says_that_rules_are_off(capsys: pytest.CaptureFixture[str]) -> None:
    main(["check", "tray-tipper.dxf"])
    assert "settings: dxfcheck.toml; 1 rule off" in " ".join(capsys.readouterr().out.split())


@pytest.mark.usefixtures("office")
def test_mistakes_are_all_shown_and_other_drawings_still_checked(capsys: pytest.CaptureFixture[str]) -> None:
    Path("received/dxfcheck.toml").write_text('[rules]\nempty-pn = "off"\nempty-pin = "of"\n', encoding="utf-8")
    assert main(["check", "--quiet", "."]) == 2
    out, err = capsys.readouterr()
    assert "received/soil-press.dxf: not read: its settings file received/dxfcheck.toml has 2 mistakes" in out
    assert out.splitlines()[-1].startswith("2 drawings, 1 not read")
    assert "received/dxfcheck.toml:2: rules.empty-pn: " in err
    assert "received/dxfcheck.toml:3: rules.empty-pin: " in err


@pytest.mark.usefixtures("office")
def test_a_named_file_with_mistakes_shows_them_all_and_checks_nothing(capsys: pytest.CaptureFixture[str]) -> None:
    Path("bad.toml").write_text('unit = "mm"\nunits = "mm"\n', encoding="utf-8")
    assert main(["check", "tray-tipper.dxf", "--settings", "bad.toml"]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert [line.split(": ")[1] for line in err.splitlines()] == ["bad.toml:1", "bad.toml:2"]


@pytest.mark.usefixtures("office")
def test_a_setting_that_a_drawing_cannot_use_is_a_finding(capsys: pytest.CaptureFixture[str]) -> None:
    Path("dxfcheck.toml").write_text('drives = ["X-Y = 1 rad/s"]\n[reading]\nframe-pins = ["Q"]\n', encoding="utf-8")
    findings = check_json(capsys, "tray-tipper.dxf")["tray-tipper.dxf"]["findings"]
    assert isinstance(findings, list)
    assert {"unknown-drive", "unknown-frame-pin"} <= {finding["rule"] for finding in findings}


@pytest.mark.usefixtures("office")
def test_the_settings_of_a_drawing_are_shown_with_their_lines(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["settings", "received/soil-press.dxf", "--tolerance", "0.5"]) == 0
    out = capsys.readouterr().out
    assert re.search(r'reading\.units = "in" +from dxfcheck\.toml:7 \(drawings "received/\*\.dxf"\)', out)
    assert re.search(r"reading\.tolerance = 0\.5 +from the option", out)
    assert re.search(r'rules\.assumed-drive = "off" +from dxfcheck\.toml:4', out)


@pytest.mark.usefixtures("office")
def test_without_a_path_those_of_the_folder_are_shown(capsys: pytest.CaptureFixture[str]) -> None:
    Path("received/dxfcheck.toml").touch()
    assert main(["settings"]) == 0
    assert 'left aside drawings "received/*.dxf" (line 6): they count for single drawings' in capsys.readouterr().out
    assert main(["settings", "received"]) == 0
    assert "hidden     dxfcheck.toml: not used, as received/dxfcheck.toml is nearer" in capsys.readouterr().out


@pytest.mark.usefixtures("office")
def test_settings_for_programs_go_to_a_file_or_to_standard_output(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["settings", "tray-tipper.dxf", "--json", "-"]) == 0
    found = json.loads(capsys.readouterr().out)
    assert {"key": "reading.units", "value": '"mm"', "from": "dxfcheck.toml:2"} in found["settings"]
    assert main(["settings", "tray-tipper.dxf", "--json", "out.json"]) == 0
    assert json.loads(Path("out.json").read_text(encoding="utf-8")) == found


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        (["gone.dxf"], "gone.dxf: there is no such file or folder; check the path"),
        (["tray-tipper.dxf", "--settings", "gone.toml"], "gone.toml: there is no such settings file; check the path"),
        (["tray-tipper.dxf", "--starter", "--json", "-"], "leave --json or --starter out"),
    ],
)
@pytest.mark.usefixtures("office")
def test_what_cannot_be_done_is_one_line(arguments: list[str], says: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["settings", *arguments]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert len(err.splitlines()) == 1
    assert says in err


@pytest.mark.usefixtures("office")
def test_a_starter_changes_nothing_about_the_check(capsys: pytest.CaptureFixture[str]) -> None:
    Path("dxfcheck.toml").unlink()
    main(["check", "tray-tipper.dxf"])
    before = capsys.readouterr()
    assert main(["settings", "tray-tipper.dxf", "--starter"]) == 0
    starter = capsys.readouterr()
    assert starter.err == ""
    Path("dxfcheck.toml").write_text(starter.out, encoding="utf-8")
    main(["check", "tray-tipper.dxf"])
    assert capsys.readouterr() == before


@pytest.mark.usefixtures("office")
def test_a_starter_never_touches_a_file_and_says_what_it_would_hide(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["settings", ".", "--starter"]) == 0
    assert "dxfcheck.toml is there already" in capsys.readouterr().err
    assert Path("dxfcheck.toml").read_text(encoding="utf-8") == SETTINGS
    Path("received/dxfcheck.toml").touch()  # as the shell makes it, before the command runs
    assert main(["settings", "received", "--starter"]) == 0
    assert "a settings file in received hides dxfcheck.toml" in capsys.readouterr().err


@pytest.mark.usefixtures("office")
def test_a_starter_needs_a_drawing_that_can_be_read(capsys: pytest.CaptureFixture[str]) -> None:
    Path("broken.dxf").write_text("no drawing", encoding="utf-8")
    assert main(["settings", "broken.dxf", "--starter"]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "broken.dxf: " in err
    assert main(["settings", ".", "--starter"]) == 2
    assert "[reading]" in capsys.readouterr().out


@pytest.mark.usefixtures("office")
def test_a_table_that_fits_no_drawing_is_told_of_for_the_folder(capsys: pytest.CaptureFixture[str]) -> None:
    with Path("dxfcheck.toml").open("a", encoding="utf-8") as file:
        file.write("[drawings.'Received/*.dxf'.reading]\n")
    main(["settings"])
    out = " ".join(capsys.readouterr().out.split())
    assert 'fit none drawings "Received/*.dxf" (line 8): no drawing has such a path; mend or remove' in out
    assert 'left aside drawings "received/*.dxf" (line 6): they count for single drawings' in out
    main(["settings", "tray-tipper.dxf"])
    assert "fit none" not in capsys.readouterr().out


@pytest.mark.parametrize("command", [["settings"], ["compare", "tray-tipper.dxf"]])
@pytest.mark.usefixtures("office")
def test_a_path_that_no_folder_can_hold_is_not_there(command: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    assert main([*command, f"{'x' * 300}.dxf"]) == 2
    assert "there is no such file or folder; check the path" in capsys.readouterr().err
