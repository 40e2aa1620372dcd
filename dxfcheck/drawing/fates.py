"""Fates sealed on loading that rules ask for later, so that the words stand in one place."""

from __future__ import annotations

from dxfcheck.drawing.primitives import Fate

__all__ = ["EXTERNAL", "HIDDEN", "INVISIBLE", "LAYER_FROZEN", "LAYER_OFF", "OFF_PLANE", "PAPER_SPACE", "UNDERLAY"]

PAPER_SPACE = Fate("skipped", "paper space")
LAYER_FROZEN = Fate("skipped", "layer is frozen")
LAYER_OFF = Fate("skipped", "layer is off")
INVISIBLE = Fate("skipped", "invisible")
HIDDEN = frozenset({LAYER_FROZEN, LAYER_OFF, INVISIBLE})
"""Fates of what the drawing holds but does not show."""
OFF_PLANE = Fate("unread", "lies off the plane of the sheet")
EXTERNAL = Fate("unread", "an external reference is not followed")
UNDERLAY = Fate("unread", "a picture or underlay lies in another file")
