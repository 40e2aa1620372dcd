"""Python's cycle collector, kept out of the way while a drawing is worked on."""

from __future__ import annotations

import gc
from collections.abc import Iterator
from contextlib import contextmanager

__all__ = ["collect_new", "collector_paused", "keep_all"]


@contextmanager
def collector_paused() -> Iterator[None]:
    """Keep the collector from searching again and again through growing data, which frees nothing.

    Measured on 60,000 lines: reading the file takes a quarter less, turning it into shapes half. May be nested.
    """
    was_enabled = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if was_enabled:
            gc.enable()


def keep_all() -> None:
    """Let the collector, where it is switched off, never again look at what there is now."""
    if not gc.isenabled():
        gc.freeze()


def collect_new() -> None:
    """Where the collector is switched off, free what was left in cycles since everything was last kept; keep the rest.

    To be called between drawings: a drawing's entities and their document refer to one another. Looking for cycles
    among all the libraries' objects takes longer than checking a small drawing, among the new ones a fiftieth of it.
    """
    if not gc.isenabled():
        gc.collect()
        gc.freeze()
