from __future__ import annotations

import errno
import io
import re
import shutil
import tomllib
from datetime import timedelta
from pathlib import Path

import pytest

from dxfcheck import inspection
from dxfcheck.cli import main
from dxfcheck.configuration.effective import today

RULES = Path(__file__).parents[2] / "fixtures" / "rules"


@pytest.fixture(autouse=True)
def office(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """A folder of drawings, as an office has it, to work in."""
    monkeypatch.chdir(tmp_path)
    shutil.copy(RULES / "empty-pin-bad.dxf", "tipper.dxf")
    shutil.copy(RULES.parent / "tray-tipper.dxf", "clean.dxf")
    shutil.copy(RULES / "near-miss-bad.dxf", "gap.dxf")


def accept(*arguments: str) -> int:
    return main(["accept", *arguments, "--reason", "spare hole"])


def entries(path: str = "dxfcheck.toml") -> list[dict[str, object]]:
    found: list[dict[str, object]] = tomllib.loads(Path(path).read_text(encoding="utf-8"))["accept"]
    return found


def test_what_was_accepted_fails_the_drawing_no_more(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "gap.dxf"]) == 1
    assert accept("gap.dxf") == 0
    out, err = capsys.readouterr()
    assert err == ""
    assert "gap.dxf: accepted error near-miss at (199.6" in out
    assert "; written to dxfcheck.toml:3\n" in out
    assert main(["check", "gap.dxf", "--fail-on", "warning"]) == 0
    out = capsys.readouterr().out
    assert "3 accepted" in " ".join(out.split())
    assert re.search(r"  error    near-miss at \(199.6\d+, 11.99\d+\): spare hole\n", out)
    assert accept("gap.dxf") == 0
    assert capsys.readouterr().out == (
        "gap.dxf: nothing to accept: no error and no warning that counts (3 accepted already)\n"
    )


@pytest.mark.parametrize(
    "name", ["line 2/Kipper ä.dxf", "a \"b\" [1] 'c'.dxf", "線 {x}=#.DXF", "sub/deep er/t.dxf", "~tmp*?.dxf"]
)
def test_drawings_of_any_name_can_be_accepted(name: str) -> None:
    Path(name).parent.mkdir(parents=True, exist_ok=True)
    Path("gap.dxf").rename(name)
    Path("dxfcheck.toml").write_text("", encoding="utf-8")
    assert main(["check", name, "--quiet"]) == 1
    assert accept(name) == 0
    assert {entry["drawing"] for entry in entries()} == {name}
    assert main(["check", name, "--quiet", "--fail-on", "warning"]) == 0


def test_a_new_settings_file_stands_beside_the_drawing() -> None:
    Path("sub").mkdir()
    Path("tipper.dxf").rename("sub/tipper.dxf")
    assert accept("sub/tipper.dxf") == 0
    assert Path("sub/dxfcheck.toml").read_text(encoding="utf-8").startswith("# Settings of dxfcheck for the drawings")
    assert entries("sub/dxfcheck.toml") == [
        {"rule": "empty-pin", "drawing": "tipper.dxf", "at": [110.0, 45.0], "reason": "spare hole"}
    ]


def test_the_nearest_settings_file_is_added_to_and_otherwise_kept(capsys: pytest.CaptureFixture[str]) -> None:
    before = b'# ours\r\n[rules]\r\nunlabelled-pins = "off"\r\n'
    Path("dxfcheck.toml").write_bytes(before)
    assert accept("tipper.dxf") == 0
    after = Path("dxfcheck.toml").read_bytes()
    assert after.startswith(before)
    assert b"\n" not in after.replace(b"\r\n", b"")
    assert capsys.readouterr().out.endswith("written to dxfcheck.toml:5\n")


def test_a_project_file_with_a_table_of_ours_is_added_to() -> None:
    Path("pyproject.toml").write_text('[project]\nname = "line"\n[tool.dxfcheck.rules]\n', encoding="utf-8")
    assert accept("tipper.dxf") == 0
    assert not Path("dxfcheck.toml").exists()
    tool = tomllib.loads(Path("pyproject.toml").read_text(encoding="utf-8"))["tool"]
    assert tool["dxfcheck"]["accept"][0]["rule"] == "empty-pin"
    assert main(["check", "tipper.dxf", "--quiet", "--fail-on", "note"]) == 0


def test_a_named_settings_file_is_written_to_with_the_path_from_there() -> None:
    Path("office").mkdir()
    Path("office/ours.toml").write_text("", encoding="utf-8")
    assert accept("tipper.dxf", "--settings", "office/ours.toml") == 0
    assert entries("office/ours.toml")[0]["drawing"] == "../tipper.dxf"
    assert not Path("dxfcheck.toml").exists()
    assert main(["check", "tipper.dxf", "--quiet", "--fail-on", "note", "--settings", "office/ours.toml"]) == 0
    assert main(["check", "tipper.dxf", "--quiet", "--fail-on", "note"]) == 1


def test_only_what_is_named_is_accepted() -> None:
    assert accept("gap.dxf", "--rule", "near-miss", "--at", "199.67,11.995", "--until", "2999-12-31") == 0
    (entry,) = entries()
    assert entry["rule"] == "near-miss"
    assert str(entry["until"]) == "2999-12-31"


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        (["gap.dxf", "--rule", "near-mis"], "there is no rule 'near-mis'; did you mean near-miss?"),
        (["gap.dxf", "--rule", "two-guides"], "gap.dxf: there is no two-guides"),
        (["gap.dxf", "--at", "-1,2"], "gap.dxf: there is no finding at (-1, 2); the nearest"),
        (["gap.dxf", "--rule", "stale-acceptance"], "stale-acceptance cannot be accepted"),
        (["gap.dxf", "--settings", "not-there.toml"], "not-there.toml: there is no such settings file"),
        (["."], ".: is a folder; accept the findings of one drawing at a time"),
        (["gone.dxf"], "gone.dxf: there is no such file or folder"),
        (["text.dxf"], "text.dxf: "),
    ],
)
def test_what_cannot_be_done_is_told_in_one_line_and_nothing_is_written(
    arguments: list[str], says: str, capsys: pytest.CaptureFixture[str]
) -> None:
    Path("text.dxf").write_text("no drawing", encoding="utf-8")
    before = sorted(Path().iterdir())
    assert accept(*arguments) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith(f"dxfcheck: {says}")
    assert err.count("\n") == 1
    assert sorted(Path().iterdir()) == before


def test_a_day_that_is_past_is_refused_and_today_is_not(capsys: pytest.CaptureFixture[str]) -> None:
    yesterday = (today() - timedelta(days=1)).isoformat()
    assert accept("tipper.dxf", "--until", yesterday) == 2
    assert capsys.readouterr().err == f"dxfcheck: --until {yesterday} is past; give a day to come\n"
    assert accept("tipper.dxf", "--until", today().isoformat()) == 0
    assert main(["check", "tipper.dxf", "--quiet", "--fail-on", "note"]) == 0


def test_a_clean_drawing_has_nothing_to_accept(capsys: pytest.CaptureFixture[str]) -> None:
    assert accept("clean.dxf") == 0
    assert capsys.readouterr().out == "clean.dxf: nothing to accept: no error and no warning that counts\n"
    assert not Path("dxfcheck.toml").exists()


def test_a_settings_file_that_cannot_take_them_stays_as_it_is(capsys: pytest.CaptureFixture[str]) -> None:
    Path("dxfcheck.toml").write_text("accept = []\n", encoding="utf-8")
    assert accept("tipper.dxf") == 2
    assert capsys.readouterr().err.startswith("dxfcheck: dxfcheck.toml: the acceptances in it")
    assert Path("dxfcheck.toml").read_text(encoding="utf-8") == "accept = []\n"


def test_after_the_drawing_changed_the_entry_is_stale_and_must_be_mended_by_hand(
    capsys: pytest.CaptureFixture[str],
) -> None:
    assert accept("tipper.dxf") == 0
    shutil.copy("clean.dxf", "tipper.dxf")
    capsys.readouterr()
    assert main(["check", "tipper.dxf", "--quiet", "--fail-on", "warning"]) == 1
    assert "tipper.dxf: warning stale-acceptance at (110, 45): dxfcheck.toml:3: " in capsys.readouterr().out
    assert accept("tipper.dxf") == 0
    assert "1 entry of stale-acceptance must be corrected by hand" in capsys.readouterr().out


def test_a_fault_of_ours_is_told_as_one(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    def fail(*_: object, **__: object) -> None:
        raise ZeroDivisionError

    monkeypatch.setattr(inspection, "inspect_drawing", fail)
    assert accept("tipper.dxf") == 3
    assert "a fault of dxfcheck itself" in capsys.readouterr().err
    assert not Path("dxfcheck.toml").exists()


def test_a_path_that_no_folder_can_hold_is_not_there(capsys: pytest.CaptureFixture[str]) -> None:
    assert accept(f"{'x' * 300}.dxf") == 2
    assert "there is no such file or folder; check the path" in capsys.readouterr().err


class Full(io.StringIO):
    """A stream on a full disk."""

    def write(self, _text: str) -> int:
        raise OSError(errno.ENOSPC, "No space left on device")


def test_where_nothing_can_be_printed_that_is_told(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr("sys.stdout", Full())
    assert accept("gap.dxf") == 2
    assert "what was done cannot be written to standard output: No space left" in capsys.readouterr().err
