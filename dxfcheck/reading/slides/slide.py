"""A box together with what it slides along."""

from __future__ import annotations

from typing import NamedTuple

from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.guides import ENDS_INSIDE, Guide

__all__ = ["Slide"]


class Slide(NamedTuple):
    """A box and what it slides along, or what slides in it; ``rivals`` are other guides that fit as well."""

    box: Box
    guide: Guide
    rivals: tuple[Guide, ...]

    @property
    def is_barrel(self) -> bool:
        """Whether a rod enters the box and ends in it: a telescope."""
        return self.guide.how == ENDS_INSIDE and not self.guide.frame
