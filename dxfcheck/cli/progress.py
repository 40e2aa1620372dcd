"""How far a long run has come, on the terminal of whoever waits for it."""

from __future__ import annotations

from collections.abc import Generator, Iterator
from typing import TextIO, TypeVar

__all__ = ["counted"]

Done = TypeVar("Done")


def counted(work: Iterator[Done], total: int, stream: TextIO) -> Generator[Done, None, None]:
    """The work as it is done, with a count of it on the last line of a terminal, away while anything else is printed.

    The results of the run may go to the same terminal: each is yielded with the count wiped out, so that it starts at
    the beginning of a line.
    """
    number = 0
    try:
        _show(stream, number, total)
        for done in work:
            number += 1
            _wipe(stream, total)
            yield done
            _show(stream, number, total)
    finally:
        _wipe(stream, total)


def _text(number: int, total: int) -> str:
    return f"{number} of {total} drawings"


def _show(stream: TextIO, number: int, total: int) -> None:
    stream.write(_text(number, total))
    stream.flush()


def _wipe(stream: TextIO, total: int) -> None:
    """Blanks over the longest count, without escape codes that some terminals would show."""
    stream.write(f"\r{' ' * len(_text(total, total))}\r")
    stream.flush()
