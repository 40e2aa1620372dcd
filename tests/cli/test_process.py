"""The command as a process of its own, on real drawings."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
TIPPER = str(ROOT / "fixtures" / "tray-tipper.dxf")


def run(*arguments: str, **environment: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "dxfcheck", *arguments],
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
        env={**os.environ, "PYTHONPATH": str(ROOT), **environment},
    )


def test_a_drawing_is_checked_and_piped_without_colour() -> None:
    done = run("check", TIPPER)
    assert done.returncode == 0
    assert done.stderr == ""
    assert done.stdout.startswith(f"{TIPPER}:")
    assert "M = 3 x (4 - 1) - 2 x 4 - 0 = 1" in done.stdout
    assert "\x1b" not in done.stdout


def test_quiet_lines_are_the_same_on_any_screen() -> None:
    truss = str(ROOT / "fixtures" / "bench-truss.dxf")
    lines = run("check", truss, "--quiet").stdout.splitlines()
    assert len(lines) == 2
    assert lines[0].startswith(f"{truss}: error no-motion at (0, 0): M1 cannot move")
    assert lines[1] == "1 drawing: 1 error"
    assert run("check", truss, "--quiet", FORCE_COLOR="1", COLUMNS="40").stdout.splitlines() == lines


def test_the_same_drawing_gives_the_same_bytes_whatever_the_hash_seed() -> None:
    reports = {run("check", TIPPER, "--json", "-", PYTHONHASHSEED=seed).stdout for seed in ("1", "2")}
    assert len(reports) == 1
    assert json.loads(reports.pop())["totals"]["drawings"] == 1


def test_a_stated_drive_is_taken() -> None:
    done = run("check", TIPPER, "--json", "-", "--drive", "A-B = 2 rad/s cw")
    drive = json.loads(done.stdout)["drawings"][0]["mechanisms"][0]["drives"][0]
    assert drive["link"] == "A-B"
    assert drive["rate"] == -2.0
    assert drive["source"] == "option"


def test_a_file_that_is_no_drawing_is_one_line_and_status_2(tmp_path: Path) -> None:
    (tmp_path / "notes.dxf").write_text("minutes of a meeting", encoding="utf-8")
    done = run("check", str(tmp_path / "notes.dxf"), TIPPER, "--quiet")
    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert "notes.dxf" in done.stderr
    assert "2 drawings, 1 not read" in done.stdout


@pytest.mark.skipif(not Path("/bin/sh").exists(), reason="needs a shell")
def test_a_pipe_that_closes_early_is_quiet() -> None:
    command = f'"{sys.executable}" -m dxfcheck read "{TIPPER}" "{TIPPER}" "{ROOT}/fixtures" | head -n 1'
    done = subprocess.run(
        ["/bin/sh", "-c", command],
        capture_output=True,
        text=True,
        check=False,
        env={**os.environ, "PYTHONPATH": str(ROOT)},
    )
    assert done.stdout.count("\n") == 1
    assert done.stderr == ""
