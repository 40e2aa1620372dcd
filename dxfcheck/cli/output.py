"""Standard output: what it can encode, and what to do when its reader has gone."""

from __future__ import annotations

import io
import os
import sys

__all__ = ["drop_output", "prepare_output"]


def prepare_output() -> None:
    """Let a character that the stream's encoding lacks be shown as an escape instead of stopping the report."""
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(errors="backslashreplace")


def drop_output() -> None:
    """Send what is left of standard output nowhere, as its reader is gone or its disk is full."""
    try:
        nowhere = os.open(os.devnull, os.O_WRONLY)
        os.dup2(nowhere, sys.stdout.fileno())
        os.close(nowhere)
    except (OSError, ValueError):  # closed, or no file at all
        return
