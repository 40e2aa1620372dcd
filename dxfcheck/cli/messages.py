"""Messages about the run, on standard error: one line each, and never a traceback."""

from __future__ import annotations

import sys
import traceback
from collections.abc import Iterable
from pathlib import Path

from dxfcheck import __version__

__all__ = ["fault_text", "one_line", "say", "say_all"]

DOING = {
    "drawing": "loading the drawing",
    "reading": "reading the sketch",
    "analysis": "working out the motion",
    "rules": "applying the rules",
    "comparison": "comparing the drawings",
    "reports": "writing the report",
}
"""What was being done, by the room of the house in which it failed."""


def say(text: str) -> None:
    """One line on standard error; nothing where that is closed."""
    try:
        sys.stderr.write(f"dxfcheck: {one_line(text)}\n")
        sys.stderr.flush()
    except (OSError, ValueError):
        return


def say_all(problems: Iterable[str]) -> None:
    """Each on a line of its own."""
    for problem in problems:
        say(problem)


def one_line(text: str) -> str:
    """The text on one line, with '?' for characters that a terminal might take for a command."""
    return "".join(char if char.isprintable() else "?" for char in " ".join(text.split()))


def fault_text(error: BaseException, path: str | None = None) -> str:
    """The one line about a fault of our own: the file, what was being done, and how to report it."""
    frames = [frame for frame in traceback.extract_tb(error.__traceback__) if "dxfcheck" in Path(frame.filename).parts]
    rooms = [room for frame in frames for room in Path(frame.filename).parts if room in DOING]
    doing = DOING[rooms[-1]] if rooms else "running the command"
    where = f" ({Path(frames[-1].filename).name}:{frames[-1].lineno})" if frames else ""
    subject = f"{path}: " if path else ""
    said = one_line(f"{type(error).__name__}: {error}")[:200]
    return (
        f"{subject}a fault of dxfcheck itself while {doing}: {said}{where}; "
        f"please report this line and the drawing to the dxfcheck authors (version {__version__})"
    )
