"""Lines on their way to a stream: plain when piped to a file, with a little colour on a screen."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import TextIO

from rich.console import Console
from rich.segment import Segment, Segments
from rich.style import Style

from dxfcheck.reports.terminal_layout import WIDTH, Line

__all__ = ["LineStream"]

NARROWEST, WIDEST = 60, 120
"""Prose is folded to the screen, but not into a ribbon or beyond what reads well."""

PLAIN = Style.null()


class LineStream:
    """Prints lines to one stream, and knows how wide they may be.

    Text is never taken for markup, and control characters are shown as '?'. Colours appear only on a terminal, and not
    where NO_COLOR is set; the lines are the same either way. OSError where the stream cannot be written to.
    """

    def __init__(self, stream: TextIO) -> None:
        self._console = Console(file=stream, markup=False, emoji=False, highlight=False, soft_wrap=True)
        self._stream = stream
        terminal = self._console.is_terminal
        self._coloured = terminal and not self._console.no_color and self._console.color_system is not None
        self.width = min(WIDEST, max(NARROWEST, self._console.width)) if terminal else WIDTH
        self._begun = False

    def block(self, lines: Iterable[Line]) -> None:
        """Lines set off from what was printed before by an empty one."""
        self.print([Line(""), *lines] if self._begun else lines)

    def print(self, lines: Iterable[Line]) -> None:
        """Lines one below the other."""
        self._begun = True
        if self._coloured:
            self._console.print(Segments(_segments(lines)), end="")
        else:
            self._stream.write("".join([f"{_printable(line.text)}\n" for line in lines]))
            self._stream.flush()


def _segments(lines: Iterable[Line]) -> Iterator[Segment]:
    """The lines as rich prints them, styled up to each one's reach."""
    for line in lines:
        text = _printable(line.text)
        if line.style:
            reach = line.reach or len(text)
            yield Segment(text[:reach], Style.parse(line.style))
            yield Segment(text[reach:] + "\n", PLAIN)
        else:
            yield Segment(text + "\n", PLAIN)


def _printable(text: str) -> str:
    """The text with '?' for what a terminal might take for a command: a file's own name is cleaned nowhere else."""
    if text.isprintable():
        return text
    return "".join([char if char.isprintable() else "?" for char in text])
