"""From the paths on the command line to drawings: folders opened up, each drawing once."""

from __future__ import annotations

import os
from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import NamedTuple

from dxfcheck.settings import Settings

__all__ = ["Target", "find_targets"]


class Target(NamedTuple):
    """One drawing to check, or a path that leads to none and the ``problem`` with it.

    ``settings`` are those of this drawing, None where the run's own hold.
    """

    path: str
    problem: str | None = None
    settings: Settings | None = None


def find_targets(paths: Sequence[str]) -> list[Target]:
    """The drawings in the order given, a folder's sorted by path; a drawing reached twice is checked once."""
    targets: dict[str, Target] = {}
    for path in paths:
        for target in _targets_of(path):
            targets.setdefault(target.path if target.problem else os.path.realpath(target.path), target)
    return list(targets.values())


def _targets_of(path: str) -> Iterator[Target]:
    if "\0" in path or not os.path.lexists(path):
        yield Target(path, "there is no such file or folder; check the path")
    elif not Path(path).exists():
        yield Target(path, "is a link to nothing; check where it leads")
    elif Path(path).is_dir():
        found = sorted(_below(Path(path), set()), key=lambda target: Path(target.path).parts)
        yield from found or [Target(path, "the folder holds no DXF file; name a file or another folder")]
    else:
        yield Target(path)


def _below(folder: Path, seen: set[tuple[int, int]]) -> Iterator[Target]:
    """Every *.dxf below the folder; linked folders are followed, each real one once, so that loops end."""
    try:
        status = folder.stat()
        entries = list(os.scandir(folder))
    except OSError as error:
        yield Target(str(folder), f"the folder cannot be opened: {error.strerror}; check its permissions")
        return
    if (status.st_dev, status.st_ino) in seen:
        return
    seen.add((status.st_dev, status.st_ino))
    for entry in sorted(entries, key=lambda entry: entry.name):
        if entry.is_dir():
            yield from _below(Path(entry.path), seen)
        elif entry.name.lower().endswith(".dxf"):
            yield Target(entry.path)
