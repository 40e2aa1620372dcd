"""Which settings file holds for a drawing: the nearest above it."""

from __future__ import annotations

import os
import re
from pathlib import Path

__all__ = ["PROJECT_FILE", "SETTINGS_FILE", "find_settings_file", "hidden_settings_files", "shown_path"]

SETTINGS_FILE = "dxfcheck.toml"
PROJECT_FILE = "pyproject.toml"

Folders = dict[str, Path | None]
"""The settings file that holds in each folder looked at so far."""

_TABLE = re.compile(rb"^[ \t]*\[[ \t]*tool[ \t]*\.[ \t]*[\"']?dxfcheck\b", re.MULTILINE)


def find_settings_file(drawing: Path, known: Folders | None = None) -> Path | None:
    """The nearest settings file in the folder of the drawing (or in the folder itself) or above it, None without one.

    Links are followed first. In one folder dxfcheck.toml comes before pyproject.toml, which counts only with a table
    [tool.dxfcheck]. ``known`` keeps what was found for the folders of one run.
    """
    return _nearest(_folder_of(drawing), {} if known is None else known)


def hidden_settings_files(drawing: Path) -> tuple[Path, ...]:
    """Settings files that the nearest one hides: those further up, and a pyproject.toml beside a dxfcheck.toml."""
    folder = _folder_of(drawing)
    found = [
        file for above in (folder, *Path(folder).parents) for file in _candidates(str(above)) if _holds_settings(file)
    ]
    return tuple(found[1:])


def shown_path(path: Path) -> str:
    """The path as a person here would name it: from the current folder, or in full where it does not lie below."""
    here = Path.cwd()
    return str(path.relative_to(here)) if path.is_relative_to(here) else str(path)


def _folder_of(drawing: Path) -> str:
    real = os.path.realpath(drawing)
    # Path.is_dir raises below a folder that may not be entered.
    return real if os.path.isdir(real) else str(Path(real).parent)  # noqa: PTH112


def _nearest(folder: str, known: Folders) -> Path | None:
    if folder not in known:
        own = next((file for file in _candidates(folder) if _holds_settings(file)), None)
        above = str(Path(folder).parent)
        known[folder] = own if own is not None or above == folder else _nearest(above, known)
    return known[folder]


def _candidates(folder: str) -> tuple[Path, Path]:
    return Path(folder, SETTINGS_FILE), Path(folder, PROJECT_FILE)


def _holds_settings(file: Path) -> bool:
    """Whether the file is there and, for one that is shared with other programs, has a table for this one."""
    try:
        if file.name == SETTINGS_FILE:
            # A link to nothing, or a folder of that name, must be told of when it is read, not passed over.
            return os.path.lexists(file) and not file.is_fifo()
        return file.is_file() and _has_table(file.read_bytes())
    except OSError:
        return file.name == SETTINGS_FILE  # it is there but cannot be read: that must be said, not passed over


def _has_table(content: bytes) -> bool:
    if b"dxfcheck" not in content:
        return False
    # Loaded on use: most runs meet no such file.
    import tomllib  # noqa: PLC0415

    try:
        tool = tomllib.loads(content.decode("utf-8-sig")).get("tool")
    except (ValueError, RecursionError):
        return _TABLE.search(content) is not None  # with the table in it, reading it tells what is wrong
    return isinstance(tool, dict) and "dxfcheck" in tool
