"""What the layer, the linetype and the block of a primitive say of it, where they say anything (reading rules 1, 5)."""

from __future__ import annotations

import unicodedata
from fnmatch import fnmatchcase
from functools import cache

from dxfcheck.drawing.primitives import Source
from dxfcheck.tolerances import (
    CHAIN_LINETYPES,
    CONSTRUCTION_LAYERS,
    CONSTRUCTION_LINETYPES,
    FRAME_NAMES,
    NO_LABEL_LAYERS,
    PITCH_LAYERS,
)

__all__ = ["construction_reason", "frame_reason", "is_label_layer", "is_pitch"]


@cache
def _matches(name: str, patterns: tuple[str, ...]) -> bool:
    plain = unicodedata.normalize("NFKD", name)
    upper = "".join(letter for letter in plain if not unicodedata.combining(letter)).upper()
    return any(fnmatchcase(upper, pattern) for pattern in patterns)


def construction_reason(source: Source) -> str | None:
    """Why a primitive is construction linework and no part of the linkage, or None."""
    if _matches(source.linetype, CONSTRUCTION_LINETYPES):
        return f"construction linework by linetype {source.linetype}"
    if _matches(source.layer, CONSTRUCTION_LAYERS):
        return f"construction linework by layer {source.layer}"
    return None


def frame_reason(source: Source) -> str | None:
    """Why a primitive is frame by its layer or by the block it lies in, or None."""
    if _matches(source.layer, FRAME_NAMES):
        return f"layer {source.layer}"
    for use in source.blocks:
        if _matches(use.name, FRAME_NAMES):
            return f"block {use.name}"
    return None


def is_pitch(source: Source) -> bool:
    """Whether a ring or line with this source may be a pitch circle or line: by its layer or a chain linetype.

    Hidden and phantom linework is none on any layer.
    """
    if _matches(source.linetype, CHAIN_LINETYPES):
        return True
    return _matches(source.layer, PITCH_LAYERS) and not _matches(source.linetype, CONSTRUCTION_LINETYPES)


def is_label_layer(source: Source) -> bool:
    """Whether a text on this layer may name a pin."""
    return not _matches(source.layer, NO_LABEL_LAYERS)
