"""Strings out of a drawing made safe to show: no control characters, no bidi marks, no lone surrogates."""

from __future__ import annotations

__all__ = ["clean", "clean_lines"]

REPLACEMENT = "\N{REPLACEMENT CHARACTER}"


def clean(text: str) -> str:
    """The text with every character that cannot be printed replaced by U+FFFD; line ends too."""
    if text.isprintable():
        return text
    return "".join(char if char.isprintable() else REPLACEMENT for char in text)


def clean_lines(text: str) -> str:
    r"""As clean, but '\n' is kept and every other line end becomes one, as does a tab a blank."""
    if text.isprintable():
        return text
    unified = text.replace("\r\n", "\n").replace("\r", "\n").replace("\t", " ").replace("\xa0", " ")
    return "\n".join(clean(line) for line in unified.split("\n"))
