"""Each drawing with its settings: those of the nearest file above it, or of the one that was named."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import TYPE_CHECKING

from dxfcheck.cli.messages import say, say_all
from dxfcheck.cli.paths import Target
from dxfcheck.configuration.lookup import find_settings_file
from dxfcheck.errors import SettingsInvalid
from dxfcheck.settings import Settings

if TYPE_CHECKING:
    from dxfcheck.configuration.settings_file import SettingsFile

__all__ = ["with_settings"]


def with_settings(targets: Sequence[Target], options: Settings, named: str | None) -> list[Target]:
    """The targets, each with the settings that hold for it; what stands above a drawing is left aside for a named file.

    SettingsInvalid where the named file cannot be used. One above a drawing that cannot be used is told of once, and
    keeps the drawings below it, but no others, from being checked.
    """
    known: dict[str, Path | None] = {}
    read: dict[Path, SettingsFile | SettingsInvalid] = {}
    configured = []
    for target in targets:
        above = find_settings_file(Path(target.path), known) if named is None else Path(named)
        if target.problem is not None or above is None:
            configured.append(target)
            continue
        if above not in read:
            read[above] = _read(above)
            _tell(read[above], named=named is not None)
        configured.append(_configured(target, read[above], options))
    return configured


def _read(path: Path) -> SettingsFile | SettingsInvalid:
    # Loaded on use: most folders have no settings file.
    from dxfcheck.configuration.settings_file import read_settings_file  # noqa: PLC0415

    try:
        return read_settings_file(path)
    except SettingsInvalid as error:
        return error


def _tell(file: SettingsFile | SettingsInvalid, *, named: bool) -> None:
    """Say what is wrong with a file, on standard error."""
    if not isinstance(file, SettingsInvalid):
        for line in _lost(file):
            say(line)
    elif named:
        raise file
    else:
        say_all(file.problems)


def _lost(file: SettingsFile) -> Iterator[str]:
    """One line on drawings that the file names and that are not there."""
    from dxfcheck.configuration.effective import lost_drawings  # noqa: PLC0415 - as in _read

    lost = lost_drawings(file)
    if lost:
        places = ", ".join(f"{path} (line {line})" for path, line in lost)
        yield f"{file.shown}: warning: drawings it names are not there: {places}; mend the path or remove the table"


def _configured(target: Target, file: SettingsFile | SettingsInvalid, options: Settings) -> Target:
    if isinstance(file, SettingsInvalid):
        count = len(file.problems)
        mistakes = "1 mistake" if count == 1 else f"{count} mistakes"
        return target._replace(problem=f"its settings file {file.path} has {mistakes}; mend the file first")
    from dxfcheck.configuration.effective import settings_for  # noqa: PLC0415 - as in _read

    return target._replace(settings=settings_for(Path(target.path), file, options).settings)
