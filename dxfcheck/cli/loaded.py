"""Imported for what it brings along: all that a drawing needs, loaded before the first one is looked at.

Worker processes are forked from a server that has imported this, so that none of them loads a library itself.
"""

from __future__ import annotations

from dxfcheck.analysis.analysis import analyse
from dxfcheck.drawing.sketch import read_sketch
from dxfcheck.inspection import inspect_drawing
from dxfcheck.rules.registry import all_rules

__all__ = ["LOADED"]

LOADED = (read_sketch, analyse, inspect_drawing, all_rules())
"""What other modules load only when it is first called for."""
