"""What the layer, the linetype and the block of a primitive say of it, where they say anything (reading rules 1, 5)."""

from __future__ import annotations

import unicodedata
from fnmatch import fnmatchcase
from functools import cache

from dxfcheck.drawing.primitives import Source
from dxfcheck.settings import LayerRoles
from dxfcheck.tolerances.linework import CHAIN_LINETYPES, CONSTRUCTION_LINETYPES, NO_LABEL_LAYERS

__all__ = ["BUILT_IN_ROLES", "construction_reason", "frame_reason", "is_label_layer", "is_pitch"]

BUILT_IN_ROLES = LayerRoles()
"""The layers that say what is on them where no settings name others."""


@cache
def _matches(name: str, patterns: tuple[str, ...]) -> bool:
    upper = _bare(name)
    return any(fnmatchcase(upper, _bare(pattern)) for pattern in patterns)


@cache
def _bare(text: str) -> str:
    """The text in capitals without accents."""
    plain = unicodedata.normalize("NFKD", text)
    return "".join(letter for letter in plain if not unicodedata.combining(letter)).upper()


def construction_reason(source: Source, roles: LayerRoles = BUILT_IN_ROLES) -> str | None:
    """Why a primitive is construction linework and no part of the linkage, or None."""
    if _matches(source.linetype, CONSTRUCTION_LINETYPES):
        return f"construction linework by linetype {source.linetype}"
    if _matches(source.layer, roles.construction):
        return f"construction linework by layer {source.layer}"
    return None


def frame_reason(source: Source, roles: LayerRoles = BUILT_IN_ROLES) -> str | None:
    """Why a primitive is frame by its layer or by the block it lies in, or None."""
    if _matches(source.layer, roles.frame):
        return f"layer {source.layer}"
    for use in source.blocks:
        if _matches(use.name, roles.frame):
            return f"block {use.name}"
    return None


def is_pitch(source: Source, roles: LayerRoles = BUILT_IN_ROLES) -> bool:
    """Whether a ring or line with this source may be a pitch circle or line: by its layer or a chain linetype.

    Hidden and phantom linework is none on any layer.
    """
    if _matches(source.linetype, CHAIN_LINETYPES):
        return True
    return _matches(source.layer, roles.pitch) and not _matches(source.linetype, CONSTRUCTION_LINETYPES)


def is_label_layer(source: Source) -> bool:
    """Whether a text on this layer may name a pin."""
    return not _matches(source.layer, NO_LABEL_LAYERS)
