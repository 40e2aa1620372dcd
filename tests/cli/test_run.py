from __future__ import annotations

import errno
import io
import json
import subprocess
import sys
from pathlib import Path

import pytest

from dxfcheck import inspection
from dxfcheck.cli import main
from dxfcheck.errors import DrawingUnreadable
from dxfcheck.inspection import DrawingReport
from dxfcheck.settings import Settings
from tests.reports.samples import press, tipper

TROUBLE = {
    "broken": DrawingUnreadable("broken", "is no DXF file", "export it anew"),
    "fault": ZeroDivisionError("division by zero"),
    "stop": KeyboardInterrupt(),
}


@pytest.fixture(autouse=True)
def drawings_without_dxf(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """What a drawing holds follows from its name, so that these tests are about the command alone."""

    def inspect(path: str, _settings: Settings, **_: object) -> DrawingReport:
        for name, error in TROUBLE.items():
            if name in path:
                raise error
        return press(path) if "press" in path else tipper(path)

    monkeypatch.setattr(inspection, "inspect_drawing", inspect)
    monkeypatch.chdir(tmp_path)
    for name in ("tipper", "press", "broken", "fault", "stop"):
        Path(f"{name}.dxf").touch()


def test_a_drawing_is_checked(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "tipper.dxf"]) == 0
    out, err = capsys.readouterr()
    assert out.startswith("tipper.dxf: 1 mechanism, moves with 1 freedom")
    assert "no forces, strength, clearance or guarding" in " ".join(out.split())
    assert err == ""


def test_the_fail_level_decides(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "tipper.dxf", "--fail-on", "warning", "--quiet"]) == 1
    assert main(["check", "press.dxf", "--fail-on", "warning", "--quiet"]) == 0
    assert capsys.readouterr().out.splitlines()[-1] == "1 drawing: no findings"


def test_one_that_cannot_be_read_does_not_keep_others_from_being_checked(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "broken.dxf", "gone.dxf", "tipper.dxf", "--quiet"]) == 2
    out, err = capsys.readouterr()
    assert err.splitlines() == [
        "dxfcheck: broken.dxf: is no DXF file; export it anew",
        "dxfcheck: gone.dxf: there is no such file or folder; check the path",
    ]
    assert "tipper.dxf: warning loose-end" in out
    assert out.splitlines()[-1] == "3 drawings, 2 not read: 1 warning, 1 note"


def test_a_fault_of_our_own_is_one_line_and_status_3(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "fault.dxf", "broken.dxf", "tipper.dxf", "--quiet"]) == 3
    out, err = capsys.readouterr()
    line = err.splitlines()[0]
    assert line.startswith("dxfcheck: fault.dxf: a fault of dxfcheck itself while")
    assert "ZeroDivisionError: division by zero" in line
    assert "please report this line and the drawing" in line
    assert "Traceback" not in err
    assert "tipper.dxf: warning loose-end" in out


def test_an_interrupt_is_status_130(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "stop.dxf"]) == 130
    assert capsys.readouterr().err == "dxfcheck: interrupted\n"


def test_json_on_standard_output_is_the_only_thing_there(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "tipper.dxf", "broken.dxf", "--json", "-"]) == 2
    out, err = capsys.readouterr()
    report = json.loads(out)
    assert [drawing["status"] for drawing in report["drawings"]] == ["checked", "unreadable"]
    assert "evidence" not in report["drawings"][0]
    assert "broken.dxf" in err


def test_json_goes_to_a_file_beside_the_terminal_report(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "tipper.dxf", "--json", "report.json"]) == 0
    assert capsys.readouterr().out.startswith("tipper.dxf: ")
    assert json.loads(Path("report.json").read_text(encoding="utf-8"))["totals"]["drawings"] == 1


@pytest.mark.parametrize(
    ("target", "says"),
    [("tipper.dxf", "never written over"), ("missing/report.json", "no folder"), (".", "is a folder")],
)
def test_a_report_that_cannot_be_written_is_refused_before_work(
    target: str, says: str, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["check", "stop.dxf", "--json", target]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert says in err


def test_read_shows_how_drawings_were_read(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["read", "tipper.dxf", "broken.dxf"]) == 2
    out = capsys.readouterr().out
    assert "Account of the entities" in out
    assert "broken.dxf: not read" in out
    assert main(["read", "tipper.dxf", "--json", "-"]) == 0
    assert json.loads(capsys.readouterr().out)["drawings"][0]["evidence"][0]["rule"] == 2


def test_a_folder_is_opened_up(capsys: pytest.CaptureFixture[str]) -> None:
    for name in ("broken", "fault", "stop"):
        Path(f"{name}.dxf").unlink()
    assert main(["check", ".", "--quiet"]) == 0
    assert capsys.readouterr().out.splitlines()[-1] == "2 drawings: 1 warning, 1 note"


class Closed(io.StringIO):
    """A stream whose other end fails after so many writes."""

    def __init__(self, number: int, writes: int = 0) -> None:
        super().__init__()
        self.number = number
        self.writes = writes

    def write(self, text: str) -> int:
        if self.writes == 0:
            raise OSError(self.number, "No space left on device")
        self.writes -= 1
        return super().write(text)


def test_a_reader_that_goes_away_is_no_error_of_its_own(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr(sys, "stdout", Closed(errno.EPIPE))
    assert main(["check", "tipper.dxf", "--fail-on", "note"]) == 1
    monkeypatch.setattr(sys, "stdout", Closed(errno.EPIPE))
    assert main(["check", "tipper.dxf", "press.dxf"]) == 2
    assert capsys.readouterr().err == ""


def test_a_full_disk_is_said(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    monkeypatch.setattr(sys, "stdout", Closed(errno.ENOSPC))
    assert main(["check", "tipper.dxf"]) == 2
    assert "cannot be written to standard output: No space left on device" in capsys.readouterr().err


def test_a_stream_that_lacks_a_character_shows_an_escape() -> None:
    code = "from dxfcheck.cli.output import prepare_output; prepare_output(); print(chr(0x3c9))"
    done = subprocess.run(
        [sys.executable, "-X", "utf8=0", "-c", code], capture_output=True, env=ascii_only(), check=True
    )
    assert done.stdout == b"\\u03c9\n"


def ascii_only() -> dict[str, str]:
    return {"PYTHONIOENCODING": "ascii", "PYTHONPATH": str(Path(__file__).parents[2])}
