"""Settings files written for a test."""

from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.configuration.settings_file import SettingsFile, read_settings_file
from dxfcheck.errors import SettingsInvalid


def settings_file(folder: Path, text: str, name: str = "dxfcheck.toml") -> SettingsFile:
    """The file as read."""
    path = folder / name
    path.write_text(text, encoding="utf-8")
    return read_settings_file(path)


def problems_of(folder: Path, text: str, name: str = "dxfcheck.toml") -> list[str]:
    """What is wrong with the file, each message without the folder in front."""
    with pytest.raises(SettingsInvalid) as caught:
        settings_file(folder, text, name)
    return [problem.removeprefix(f"{folder}/") for problem in caught.value.problems]
