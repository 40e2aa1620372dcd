"""The repository hook, run by the real pre-commit program in repositories of its own; nothing comes from a network."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
FIXTURES = ROOT / "fixtures"
GOOD = FIXTURES / "tray-tipper.dxf"
BAD = FIXTURES / "bench-truss.dxf"
ODD_NAME = "Sämaschine/Kipprahmen Größe 2 (neu) – 傾斜.DXF"
CONFIG = """\
repos:
  - repo: {hooks}
    rev: {revision}
    hooks:
      - id: dxfcheck
        language: unsupported
"""
"""As README.md says, but for the last line: the command is on the PATH, so that nothing has to be installed."""


class Repository:
    """A git repository of drawings."""

    def __init__(self, folder: Path, environment: dict[str, str]) -> None:
        self.folder = folder
        self._environment = environment

    def run(self, *command: str) -> subprocess.CompletedProcess[str]:
        """A command in the repository, both its streams in one."""
        return subprocess.run(
            command,
            cwd=self.folder,
            env=self._environment,
            stdout=subprocess.PIPE,
            stderr=subprocess.STDOUT,
            encoding="utf-8",
            check=False,
        )

    def git(self, *arguments: str) -> str:
        """What git prints where it succeeds."""
        done = self.run("git", *arguments)
        assert done.returncode == 0, done.stdout
        return done.stdout.strip()

    def pre_commit(self, *arguments: str) -> subprocess.CompletedProcess[str]:
        return self.run(sys.executable, "-m", "pre_commit", *arguments)

    def draw(self, source: Path, name: str) -> None:
        """A copy of the drawing, not yet committed."""
        target = self.folder / name
        target.parent.mkdir(parents=True, exist_ok=True)
        shutil.copyfile(source, target)

    def commit(self, *options: str) -> subprocess.CompletedProcess[str]:
        """Whether all there is can be committed."""
        self.git("add", ".")
        return self.run("git", "commit", "--message", "as drawn", *options)

    def clone(self, folder: Path) -> Repository:
        self.git("clone", "--quiet", str(self.folder), str(folder))
        return Repository(folder, self._environment)


@pytest.fixture
def environment(tmp_path: Path) -> dict[str, str]:
    """Nothing of the user's own git or pre-commit, and the command as this checkout has it."""
    command = tmp_path / "bin" / "dxfcheck"
    command.parent.mkdir()
    command.write_text(f'#!/bin/sh\nexec "{sys.executable}" -m dxfcheck "$@"\n', encoding="utf-8")
    command.chmod(0o755)
    plain = {name: value for name, value in os.environ.items() if not name.startswith(("GIT_", "PRE_COMMIT"))}
    return plain | {
        "PATH": f"{command.parent}{os.pathsep}{os.environ['PATH']}",
        "PYTHONPATH": str(ROOT),
        "PRE_COMMIT_HOME": str(tmp_path / "pre-commit"),
        "HOME": str(tmp_path),
        "GIT_CONFIG_NOSYSTEM": "1",
        **{
            f"GIT_{role}_{part}": "drafter@example.org"
            for role in ("AUTHOR", "COMMITTER")
            for part in ("NAME", "EMAIL")
        },
    }


@pytest.fixture
def drawings(tmp_path: Path, environment: dict[str, str]) -> Repository:
    """A repository whose commits the hook looks at."""
    hooks = Repository(tmp_path / "hooks", environment)
    hooks.folder.mkdir()
    hooks.git("init", "--quiet")
    shutil.copyfile(ROOT / ".pre-commit-hooks.yaml", hooks.folder / ".pre-commit-hooks.yaml")
    hooks.commit()
    repository = Repository(tmp_path / "drawings", environment)
    repository.folder.mkdir()
    repository.git("init", "--quiet")
    config = CONFIG.format(hooks=hooks.folder, revision=hooks.git("rev-parse", "HEAD"))
    (repository.folder / ".pre-commit-config.yaml").write_text(config, encoding="utf-8")
    installed = repository.pre_commit("install")
    assert installed.returncode == 0, installed.stdout
    return repository


def test_a_good_drawing_of_any_name_is_committed(drawings: Repository) -> None:
    drawings.draw(GOOD, "tray tipper.dxf")
    drawings.draw(GOOD, ODD_NAME)
    done = drawings.commit()
    assert done.returncode == 0, done.stdout
    assert "Passed" in done.stdout
    assert drawings.git("rev-list", "--count", "HEAD") == "1"


def test_a_bad_drawing_of_any_name_stops_the_commit_with_a_line_and_a_summary(drawings: Repository) -> None:
    drawings.draw(GOOD, "tray tipper.dxf")
    drawings.draw(BAD, ODD_NAME)
    done = drawings.commit()
    assert done.returncode == 1, done.stdout
    lines = done.stdout.splitlines()
    assert any(line.startswith(f"{ODD_NAME}: error no-motion at (0, 0): M1 cannot move") for line in lines), done.stdout
    assert "2 drawings: 1 error" in lines
    assert "\x1b" not in done.stdout
    assert drawings.run("git", "rev-parse", "--verify", "HEAD").returncode != 0


def test_a_commit_without_drawings_does_not_wait_for_the_hook(drawings: Repository) -> None:
    (drawings.folder / "notes on dxf.txt").write_text("no drawing", encoding="utf-8")
    done = drawings.commit()
    assert done.returncode == 0, done.stdout
    assert "(no files to check)" in done.stdout


def test_a_fresh_clone_checks_all_drawings_in_several_calls(drawings: Repository, tmp_path: Path) -> None:
    for number in range(9):
        drawings.draw(GOOD if number else BAD, f"line {number}/tipper.dxf")
    drawings.commit("--no-verify")
    done = drawings.clone(tmp_path / "clone").pre_commit("run", "--all-files", "--verbose")
    assert done.returncode == 1, done.stdout
    summaries = [line.split()[0] for line in done.stdout.splitlines() if " drawings: " in line]
    assert sum(map(int, summaries)) == 9, done.stdout
    assert done.stdout.count("line 0/tipper.dxf: error no-motion") == 1
