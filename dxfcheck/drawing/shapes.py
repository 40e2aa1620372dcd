"""What a reader of one entity hands back, and how it says that it cannot."""

from __future__ import annotations

import math
import struct
from collections.abc import Callable
from typing import Any

from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.lldxf.const import DXFError

from dxfcheck.drawing.fates import OFF_PLANE
from dxfcheck.drawing.placement import Placement
from dxfcheck.drawing.primitives import Fate, Primitive, Source
from dxfcheck.tolerances.drawing import COORDINATE_LIMIT, TILT_RADIANS

__all__ = [
    "LIBRARY_FAULTS",
    "NOT_A_NUMBER",
    "SQUARE_LIMIT",
    "Given",
    "NotRead",
    "Reader",
    "Shapes",
    "faces_away",
    "require_numbers",
]

LIBRARY_FAULTS = (
    ArithmeticError,
    AssertionError,
    AttributeError,
    EOFError,
    LookupError,
    NotImplementedError,
    OSError,
    RecursionError,
    StopIteration,
    TypeError,
    ValueError,
    struct.error,
    DXFError,
)
"""What ezdxf lets out on damaged drawings (seen on the corpora; besides its own errors come plain Python ones)."""

Given = dict[str, Any]
"""The DXF attributes an entity states, by ezdxf's names; defaults are not filled in, which is what makes it fast."""

Shapes = tuple[tuple[Primitive, ...], float, float]
"""The primitives of one entity and the lowest and highest z of them on the sheet."""

Reader = Callable[[DXFEntity, Given, Source, Placement], Shapes]
"""Turns one entity into shapes on the sheet; may raise NotRead and any of LIBRARY_FAULTS."""

SQUARE_LIMIT = COORDINATE_LIMIT * COORDINATE_LIMIT
NOT_A_NUMBER = Fate("unread", "a coordinate is no number")


class NotRead(Exception):
    """An entity that yields no shapes, with its fate; ``tilt`` in degrees where it is turned out of the plane."""

    def __init__(self, fate: Fate, tilt: float | None = None) -> None:
        super().__init__(fate.why)
        self.fate = fate
        self.tilt = tilt


def require_numbers(*figures: complex) -> None:
    """NotRead unless every figure is a number of a drawing's size: not NaN, infinite or beyond COORDINATE_LIMIT.

    The sum of their sizes is none where one of them is none, and nothing cancels in it.
    """
    if not sum(map(abs, figures)) < COORDINATE_LIMIT:
        raise NotRead(NOT_A_NUMBER)


def faces_away(extrusion: Any) -> bool:  # noqa: ANN401 - ezdxf's vector or a plain tuple
    """Whether an entity's normal points into the sheet; NotRead where it does not stand upright on the sheet."""
    x, y, z = extrusion
    require_numbers(x, y, z)
    if x or y:
        sideways = math.hypot(x, y)
        if sideways > TILT_RADIANS * abs(z):
            raise NotRead(OFF_PLANE, math.degrees(math.atan2(sideways, abs(z))))
    return bool(z < 0)
