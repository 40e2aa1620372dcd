"""Lines on their way to a stream: plain when piped to a file, with a little colour on a screen."""

from __future__ import annotations

import os
from collections.abc import Iterable, Iterator
from typing import TYPE_CHECKING, TextIO

from dxfcheck.reports.terminal_layout import WIDTH, Line

if TYPE_CHECKING:
    from rich.console import Console
    from rich.segment import Segment

__all__ = ["LineStream"]

NARROWEST, WIDEST = 60, 120
"""Prose is folded to the screen, but not into a ribbon or beyond what reads well."""


class LineStream:
    """Prints lines to one stream, and knows how wide they may be.

    Text is never taken for markup, and control characters are shown as '?'. Colours appear only on a terminal, and not
    where NO_COLOR is set; the lines are the same either way. OSError where the stream cannot be written to.
    """

    def __init__(self, stream: TextIO) -> None:
        self._stream = stream
        self._screen = _screen(stream)
        self.width = min(WIDEST, max(NARROWEST, self._screen.width)) if self._screen else WIDTH
        self._begun = False

    def block(self, lines: Iterable[Line]) -> None:
        """Lines set off from what was printed before by an empty one."""
        self.print([Line(""), *lines] if self._begun else lines)

    def print(self, lines: Iterable[Line]) -> None:
        """Lines one below the other."""
        self._begun = True
        if self._screen is None or self._screen.no_color or self._screen.color_system is None:
            self._stream.write("".join([f"{_printable(line.text)}\n" for line in lines]))
            self._stream.flush()
        else:
            _print_coloured(self._screen, lines)


def _screen(stream: TextIO) -> Console | None:
    """rich's view of the stream where a person looks at it, None where it is piped."""
    if not (stream.isatty() or os.environ.get("FORCE_COLOR")):
        return None
    # Loaded on use: a hook's small drawing should not wait for what only a screen needs.
    from rich.console import Console  # noqa: PLC0415

    screen = Console(file=stream, markup=False, emoji=False, highlight=False, soft_wrap=True)
    return screen if screen.is_terminal else None


def _print_coloured(screen: Console, lines: Iterable[Line]) -> None:
    from rich.segment import Segments  # noqa: PLC0415 - as above

    screen.print(Segments(_segments(lines)), end="")


def _segments(lines: Iterable[Line]) -> Iterator[Segment]:
    """The lines as rich prints them, styled up to each one's reach."""
    from rich.segment import Segment  # noqa: PLC0415 - as above
    from rich.style import Style  # noqa: PLC0415 - as above

    for line in lines:
        text = _printable(line.text)
        if line.style:
            reach = line.reach or len(text)
            yield Segment(text[:reach], Style.parse(line.style))
            yield Segment(text[reach:] + "\n")
        else:
            yield Segment(text + "\n")


def _printable(text: str) -> str:
    """The text with '?' for what a terminal might take for a command: a file's own name is cleaned nowhere else."""
    if text.isprintable():
        return text
    return "".join([char if char.isprintable() else "?" for char in text])
