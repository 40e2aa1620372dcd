"""The one place that writes files: whole or not at all, and never a drawing."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path

from dxfcheck.errors import OptionInvalid

__all__ = ["refuse_target", "write_whole"]

_NEW_FILE_MODE = 0o666
"""What open() would ask for; the umask takes its part away."""


def refuse_target(path: Path) -> None:
    """Raise OptionInvalid where a report cannot be written to this path; to be asked before any work is done."""
    if ".dxf" in (path.suffix.lower(), path.resolve().suffix.lower()):
        msg = f"{path}: a report is never written over a drawing; give it another name"
    elif path.is_dir():
        msg = f"{path}: is a folder; name a file in it"
    elif not path.parent.is_dir():
        msg = f"{path}: there is no folder {path.parent}; make it first"
    else:
        return
    raise OptionInvalid(msg)


def write_whole(path: Path, text: str) -> None:
    """Write the text as UTF-8 so that a reader sees the old file or the new one, never half of one.

    A link is followed and its target replaced; a device or pipe (/dev/stdout, a process substitution) is written to as
    it stands. OptionInvalid where the file cannot be written.
    """
    refuse_target(path)
    try:
        if path.exists() and not path.is_file():
            path.write_text(text, encoding="utf-8")
        else:
            _replace(path.resolve(), text)
    except OSError as error:
        msg = f"{path}: cannot be written: {error.strerror or error}"
        raise OptionInvalid(msg) from error


def _replace(path: Path, text: str) -> None:
    """Write beside the target, then put the new file in its place."""
    mode = path.stat().st_mode & 0o777 if path.exists() else _NEW_FILE_MODE & ~_umask()
    handle, beside = tempfile.mkstemp(prefix=f".{path.name[:40]}.", suffix=".part", dir=path.parent)
    try:
        with os.fdopen(handle, "w", encoding="utf-8", newline="\n") as stream:
            stream.write(text)
        Path(beside).chmod(mode)
        Path(beside).replace(path)
    except BaseException:
        Path(beside).unlink(missing_ok=True)
        raise


def _umask() -> int:
    """The process's umask, which can only be read by setting it."""
    mask = os.umask(0o077)
    os.umask(mask)
    return mask
