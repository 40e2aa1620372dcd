"""One rigid body of the drawing."""

from __future__ import annotations

from dataclasses import dataclass

__all__ = ["Body"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Body:
    """One rigid body: its strands, its pins (indices of sites) and whether it is the frame.

    ``fills`` and ``discs`` are indices of the solid fills and discs that are part of it, ``wheels`` the pitch circles
    (indices of primitives). ``block`` says that it is the block of a slide.
    """

    strands: tuple[int, ...]
    pins: tuple[int, ...]
    frame: bool
    discs: tuple[int, ...] = ()
    fills: tuple[int, ...] = ()
    wheels: tuple[int, ...] = ()
    block: bool = False
