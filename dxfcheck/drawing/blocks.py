"""Block definitions, and the arithmetic of the references to them."""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterator
from typing import NamedTuple

from ezdxf.document import Drawing
from ezdxf.entities.dxfentity import DXFEntity

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.layers import LayerState
from dxfcheck.drawing.placement import Placement, reference_placement
from dxfcheck.drawing.primitives import BlockUse
from dxfcheck.drawing.shapes import Given, require_numbers
from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import EVEN_SCALE_RELATIVE

__all__ = ["Block", "Blocks", "Level", "array_offsets", "array_size", "placement_of", "scales_evenly"]

_ORIGIN = (0.0, 0.0, 0.0)


class Block(NamedTuple):
    """A block definition: its entities, base point, and whether it stands for another file."""

    name: str
    base: tuple[float, float, float]
    entities: tuple[DXFEntity, ...]
    external: bool


class Level(NamedTuple):
    """Where the extraction stands: on the sheet (no layer, no blocks) or inside references, outermost first.

    ``layer`` and ``linetype`` are those of the innermost reference, which layer 0 and BYBLOCK take over; ``names`` are
    the blocks being expanded, as the file writes them but lower case.
    """

    place: Placement
    layer: LayerState | None
    linetype: str
    trail: tuple[BlockUse, ...]
    names: tuple[str, ...]


class Blocks(dict[str, Block | None]):
    """Block definitions by lower-case name, made on first use; None for one that the drawing does not hold."""

    def __init__(self, document: Drawing) -> None:
        super().__init__()
        self._blocks = document.blocks

    def __missing__(self, name: str) -> Block | None:
        """Look a block up in the drawing."""
        layout = self._blocks.get(name)
        block = None
        if layout is not None:
            head = layout.block
            stated = vars(head.dxf) if head is not None else {}
            base = stated["base_point"].xyz if "base_point" in stated else _ORIGIN
            external = head is not None and (head.is_xref or head.is_xref_overlay)
            block = Block(clean(layout.name), base, tuple(layout), external)
        self[name] = block
        return block


def placement_of(given: Given, block: Block) -> Placement:
    """Map of the block's plane into that of its reference; NotRead where a figure is no number."""
    at = given["insert"].xyz if "insert" in given else _ORIGIN
    scale = (given.get("xscale", 1.0), given.get("yscale", 1.0), given.get("zscale", 1.0))
    rotation = given.get("rotation", 0.0)
    require_numbers(*at, *block.base, *scale, rotation)
    return reference_placement(at, block.base, scale, rotation)


def scales_evenly(given: Given) -> bool:
    """Whether a reference scales x and y by the same size; their signs may differ, and 0 is read as 1."""
    across = abs(given.get("xscale", 1.0)) or 1.0
    upward = abs(given.get("yscale", 1.0)) or 1.0
    return bool(abs(across - upward) <= EVEN_SCALE_RELATIVE * max(across, upward))


def array_size(given: Given) -> int:
    """How many copies a reference makes: rows times columns, each at least one."""
    return max(1, int(given.get("row_count", 1))) * max(1, int(given.get("column_count", 1)))


def array_offsets(given: Given) -> Iterator[Point]:
    """Where the copies of a reference stand against the first; turned with it, but not scaled.

    Copies that would fall on the same place, for want of a spacing, are made once.
    """
    if "row_count" not in given and "column_count" not in given:
        yield 0j
        return
    turn = cmath.rect(1.0, math.radians(given.get("rotation", 0.0)))
    across, upward = float(given.get("column_spacing", 0.0)), float(given.get("row_spacing", 0.0))
    require_numbers(across, upward)
    columns = max(1, int(given.get("column_count", 1))) if across else 1
    rows = max(1, int(given.get("row_count", 1))) if upward else 1
    for row in range(rows):
        for column in range(columns):
            yield turn * complex(column * across, row * upward)
