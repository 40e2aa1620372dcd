"""What can stop the work on a drawing, one class for each thing the user can do about it."""

from __future__ import annotations

__all__ = ["DrawingUnreadable", "DxfCheckError", "OptionInvalid", "SettingsInvalid"]


class DxfCheckError(Exception):
    """Root of every error this package raises on purpose; its text is one line for the user."""


class DrawingUnreadable(DxfCheckError):
    """A file that cannot be read as a DXF drawing; other files are not affected.

    ``path`` is the file as the user named it, ``reason`` says what is wrong with it and ``remedy`` what to do.
    """

    def __init__(self, path: str, reason: str, remedy: str) -> None:
        super().__init__(f"{path}: {reason}; {remedy}")
        self.path = path
        self.reason = reason
        self.remedy = remedy


class OptionInvalid(DxfCheckError):
    """An option or a setting that cannot be used; nothing was checked."""


class SettingsInvalid(DxfCheckError):
    """A settings file that cannot be used; ``problems`` are all that is wrong with it, one line each.

    A line names the file, the line in it, the key, what is wrong and what to do. The text has them all, one below the
    other. ``path`` is the file as messages name it.
    """

    def __init__(self, path: str, problems: tuple[str, ...]) -> None:
        super().__init__("\n".join(problems))
        self.path = path
        self.problems = problems
