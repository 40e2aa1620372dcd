from __future__ import annotations

import dataclasses
import json
import os
import subprocess
import sys
from importlib.resources import files
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from dxfcheck.cli import compare as compare_command
from dxfcheck.cli import main
from fixtures.drafting import Note, mechanisms
from tests.comparison.drawn import drawn, moved_pins

HOUSE = Path(__file__).parents[2]
SCHEMA = json.loads((files("dxfcheck") / "reports" / "comparison.schema.json").read_text(encoding="utf-8"))
TIPPER = mechanisms.TRAY_TIPPER
LONGER = moved_pins(TIPPER, {"B": TIPPER.points["B"] * 0.002})


@pytest.fixture(autouse=True)
def folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    monkeypatch.chdir(tmp_path)
    drawn(Path("old.dxf"), [TIPPER])
    drawn(Path("longer.dxf"), [LONGER])
    return tmp_path


def test_no_change_is_said_first_and_is_status_0(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "old.dxf", "old.dxf"]) == 0
    out, err = capsys.readouterr()
    assert out.splitlines()[0] == "no change as a mechanism"
    assert "no forces, strength, clearance or guarding" in " ".join(out.split())
    assert err == ""


def test_a_change_is_status_1_unless_it_is_allowed(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "old.dxf", "longer.dxf"]) == 1
    assert capsys.readouterr().out.startswith("changed as a mechanism: 1 pin moved, 2 lengths, 6 speeds")
    assert main(["compare", "old.dxf", "longer.dxf", "--allow", "0.5 %"]) == 0
    assert "no speed by more than 0.5 %" in capsys.readouterr().out


def test_lines_are_no_longer_than_a_screen_is_wide(capsys: pytest.CaptureFixture[str]) -> None:
    main(["compare", "old.dxf", "longer.dxf"])
    assert max(map(len, capsys.readouterr().out.splitlines())) <= 80


def test_json_keeps_to_its_schema(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "old.dxf", "longer.dxf", "--json", "-"]) == 1
    report = json.loads(capsys.readouterr().out)
    Draft202012Validator(SCHEMA).validate(report)
    assert report["changed"] is True
    assert [length["of"] for length in report["mechanisms"][0]["lengths"]] == ["A-B", "B-C"]
    assert main(["compare", "old.dxf", "longer.dxf", "--json", "changes.json"]) == 1
    assert capsys.readouterr().out.startswith("changed")
    assert json.loads(Path("changes.json").read_text(encoding="utf-8")) == report


def test_a_report_is_never_written_over_a_drawing(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "old.dxf", "longer.dxf", "--json", "old.dxf"]) == 2
    assert "never written over" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        (["old.dxf"], "compare takes two drawings, OLD and NEW, not 1"),
        (["old.dxf", "gone.dxf"], "gone.dxf: there is no such file"),
        (["old.dxf", "bad.dxf"], "bad.dxf: "),
        (["old.dxf", "."], ".: is a folder; compare takes two drawings"),
        (["old.dxf", "old.dxf", "--allow", "-1"], "must be per cent, 0 or more"),
        (["old.dxf", "old.dxf", "--from-git"], "1, 7 or 9 arguments, not 2"),
        (["old.dxf", "--from-git", "--json", "-"], "leave --json out"),
        (["old.dxf", "old.dxf", "--drive", "nonsense"], "nonsense"),
    ],
)
def test_what_cannot_be_compared_is_one_line_and_status_2(
    arguments: list[str], says: str, capsys: pytest.CaptureFixture[str]
) -> None:
    Path("bad.dxf").write_text("no drawing\n", encoding="utf-8")
    assert main(["compare", *arguments]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert says in err
    assert len(err.splitlines()) == 1


def test_a_fault_of_our_own_is_one_line_and_status_3(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    def broken(*_: object, **__: object) -> None:
        raise ZeroDivisionError

    monkeypatch.setattr(compare_command, "compare_reports", broken)
    assert main(["compare", "old.dxf", "longer.dxf"]) == 3
    assert "a fault of dxfcheck itself" in capsys.readouterr().err
    assert main(["compare", "--from-git", "a.dxf", "old.dxf", "0", "100644", "longer.dxf", "0", "100644"]) == 0
    assert "a.dxf: a fault of dxfcheck itself" in capsys.readouterr().out


def test_options_and_settings_hold_for_both_drawings(capsys: pytest.CaptureFixture[str]) -> None:
    faster = dataclasses.replace(TIPPER, notes=(Note(content="ω_AB = 12 rad/s", beside=("A", "B")),))
    drawn(Path("faster.dxf"), [faster])
    assert main(["compare", "old.dxf", "faster.dxf"]) == 1
    assert main(["compare", "old.dxf", "faster.dxf", "--drive", "A-B = 3 rad/s"]) == 0
    capsys.readouterr()
    Path("dxfcheck.toml").write_text('[reading]\nunits = "in"\n', encoding="utf-8")
    main(["compare", "old.dxf", "faster.dxf", "--json", "-"])
    assert json.loads(capsys.readouterr().out)["units"]["length"] == "in"


class Repository:
    """A git repository of its own, in which dxfcheck shows what changed in drawings."""

    def __init__(self, folder: Path) -> None:
        self._folder = folder
        nothing = str(folder / "no-config")
        self._environment = {
            **{name: value for name, value in os.environ.items() if not name.startswith("GIT_")},
            "GIT_CONFIG_GLOBAL": nothing,
            "GIT_CONFIG_NOSYSTEM": "1",
            "PYTHONPATH": str(HOUSE),
            "PYTHONIOENCODING": "utf-8",
        }
        self.git("init", "--quiet")
        for key, value in (
            ("user.name", "A Drafter"),
            ("user.email", "drafter@example.invalid"),
            ("diff.dxfcheck.command", f'"{sys.executable}" -m dxfcheck compare --from-git'),
            ("core.quotepath", "false"),
        ):
            self.git("config", key, value)
        (folder / ".gitattributes").write_text("*.dxf diff=dxfcheck\n", encoding="utf-8")

    def git(self, *arguments: str) -> str:
        """What git prints; CalledProcessError where it does not end well."""
        done = subprocess.run(
            ["git", *arguments],  # noqa: S607 - whichever git the machine has
            cwd=self._folder,
            env=self._environment,
            check=True,
            capture_output=True,
            encoding="utf-8",
        )
        return done.stdout


def test_git_shows_what_changed_as_a_mechanism(tmp_path: Path) -> None:
    folder = tmp_path / "line 2"
    folder.mkdir()
    repository = Repository(folder)
    drawn(folder / "tray tipper.dxf", [TIPPER])
    drawn(folder / "gone.dxf", [TIPPER])
    drawn(folder / "bad.dxf", [TIPPER])
    repository.git("add", ".")
    repository.git("commit", "--quiet", "--message", "drawings")
    drawn(folder / "tray tipper.dxf", [LONGER])
    drawn(folder / "new.dxf", [mechanisms.BENCH_TRUSS])
    (folder / "gone.dxf").unlink()
    (folder / "bad.dxf").write_text("no drawing\n", encoding="utf-8")
    repository.git("add", "--all")
    shown = repository.git("diff", "--cached", "--no-renames")
    assert "tray tipper.dxf: changed as a mechanism: 1 pin moved, 2 lengths, 6 speeds" in shown
    assert "gone.dxf: deleted: 1 mechanism, moves with 1 freedom" in shown
    assert "new.dxf: added: 1 mechanism, cannot move" in shown
    assert "bad.dxf" in shown
    assert "OLD tray tipper.dxf (" in shown
    assert "git-blob" not in shown
    assert "new.dxf: " in repository.git("diff", "--cached", "--find-renames")


def test_git_names_a_path_that_is_not_merged_alone(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "--from-git", "old.dxf"]) == 0
    assert "old.dxf: not merged" in capsys.readouterr().out


def test_a_renamed_drawing_goes_by_its_new_name(capsys: pytest.CaptureFixture[str]) -> None:
    arguments = ["old.dxf", "old.dxf", "abc1234567", "100644", "longer.dxf", "0000000", "100644", "b.dxf", "similar"]
    assert main(["compare", "--from-git", *arguments]) == 0
    out = capsys.readouterr().out
    assert out.startswith("b.dxf: changed as a mechanism")
    assert "OLD old.dxf (abc1234)" in out


def test_warnings_of_a_settings_file_come_once_for_both_drawings(capsys: pytest.CaptureFixture[str]) -> None:
    Path("dxfcheck.toml").write_text("[drawings.'gone.dxf'.reading]\n", encoding="utf-8")
    assert main(["compare", "old.dxf", "longer.dxf"]) == 1
    assert capsys.readouterr().err.count("gone.dxf") == 1
