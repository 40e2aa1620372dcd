"""The walk over a drawing: every top-level entity gets its place in the account, every shape its source."""

from __future__ import annotations

from collections import Counter
from typing import NamedTuple

from ezdxf.document import Drawing
from ezdxf.entities.dxfentity import DXFEntity, DXFTagStorage
from ezdxf.entities.insert import Insert

from dxfcheck.drawing.blocks import Block, Blocks, Level, array_offsets, array_size, placement_of, scales_evenly
from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.dimensions import read_dimension
from dxfcheck.drawing.fates import EXTERNAL, HIDDEN, INVISIBLE, OFF_PLANE, PAPER_SPACE, UNDERLAY
from dxfcheck.drawing.layers import CONTINUOUS, LayerState, LayerStates
from dxfcheck.drawing.linework import read_arc, read_circle, read_ellipse, read_line, read_lwpolyline, read_polyline
from dxfcheck.drawing.marks import read_hatch, read_solid
from dxfcheck.drawing.placement import FLIPPED, SHEET, Placement
from dxfcheck.drawing.places import place_of_entity, place_of_primitive
from dxfcheck.drawing.primitives import BlockUse, Entity, Fate, Notice, Primitive, Source
from dxfcheck.drawing.shapes import (
    LIBRARY_FAULTS,
    NOT_A_NUMBER,
    Given,
    NotRead,
    Reader,
    faces_away,
    require_numbers,
)
from dxfcheck.drawing.text import read_attribute, read_mtext, read_text
from dxfcheck.tolerances.drawing import BLOCK_DEPTH_LIMIT, BLOCK_ENTITY_LIMIT, NESTED_DEEP

__all__ = ["Extraction", "Heights", "extract"]

READERS: dict[str, Reader] = {
    "ARC": read_arc,
    "ARC_DIMENSION": read_dimension,
    "ATTRIB": read_attribute,
    "CIRCLE": read_circle,
    "DIMENSION": read_dimension,
    "ELLIPSE": read_ellipse,
    "HATCH": read_hatch,
    "LARGE_RADIAL_DIMENSION": read_dimension,
    "LINE": read_line,
    "LWPOLYLINE": read_lwpolyline,
    "MTEXT": read_mtext,
    "POLYLINE": read_polyline,
    "SOLID": read_solid,
    "TEXT": read_text,
    "TRACE": read_solid,
}
_FATES = {
    "ACAD_TABLE": Fate("note", "table"),
    "ATTDEF": Fate("note", "attribute definition"),
    "DGNUNDERLAY": UNDERLAY,
    "DWFUNDERLAY": UNDERLAY,
    "IMAGE": UNDERLAY,
    "LEADER": Fate("note", "leader"),
    "MLEADER": Fate("note", "leader"),
    "MULTILEADER": Fate("note", "leader"),
    "PDFUNDERLAY": UNDERLAY,
    "POINT": Fate("skipped", "a point has no extent"),
    "RAY": Fate("skipped", "a construction line without an end"),
    "TOLERANCE": Fate("note", "tolerance frame"),
    "WIPEOUT": Fate("skipped", "a mask"),
    "XLINE": Fate("skipped", "a construction line without an end"),
}
_OBJECT_COORDINATES = frozenset(
    {"ARC", "ATTRIB", "CIRCLE", "HATCH", "INSERT", "LWPOLYLINE", "POLYLINE", "SOLID", "TEXT", "TRACE"}
)
"""Kinds whose points lie in the coordinate system of their extrusion (DXF reference, from memory; as in ezdxf)."""
_POLYLINE_3D = 8
_TOO_MUCH = Fate("unread", "the block reference holds too much to expand")
_TOP = Level(SHEET, None, CONTINUOUS, (), ())


class Heights(NamedTuple):
    """Lowest and highest z of the primitives ``first`` to ``last`` (exclusive), where it is not 0 throughout."""

    first: int
    last: int
    low: float
    high: float


class Extraction(NamedTuple):
    """A drawing's entities and shapes as they came, before the plane of the sheet is settled."""

    entities: list[Entity]
    primitives: list[Primitive]
    notices: list[Notice]
    heights: list[Heights]
    unplotted: frozenset[str] = frozenset()
    """Layers that hold something and are not plotted."""


class _LimitReached(Exception):
    """A reference that holds too much, or nests too deep, to be expanded; the text says which."""


def extract(document: Drawing) -> Extraction:
    """All entities of model space, then of the paper layouts by name, and the shapes of the former."""
    walk = _Walk(document)
    for entity in document.modelspace():
        walk.take(entity)
    walk.note_mirrored()
    for layout in sorted(document.layouts, key=lambda layout: layout.name):
        if layout.is_any_paperspace:
            for entity in layout:
                walk.take_paper(entity)
    return walk.out._replace(unplotted=walk.layers.unplotted())


class _Walk:
    """The state of one walk: what was collected and what may still be taken out of blocks."""

    def __init__(self, document: Drawing) -> None:
        self.out = Extraction([], [], [], [])
        self.layers = LayerStates(document)
        self.blocks = Blocks(document)
        self.budget = BLOCK_ENTITY_LIMIT
        self.mirrored: dict[int, None] = {}
        self.pending: dict[tuple[str, str], float | None] = {}
        self.parts: Counter[Fate] = Counter()

    def take(self, entity: DXFEntity) -> None:
        """Read a top-level entity of model space and enter it in the account."""
        out = self.out
        index = len(out.entities)
        first = len(out.primitives)
        given = vars(entity.dxf)
        kind = entity.dxftype()
        layer = self.layers[given["layer"] if "layer" in given else _layer_name(entity)]
        fate = self._read(entity, kind, layer, _TOP, index)
        if len(out.primitives) > first:
            fate = None
            at = place_of_primitive(out.primitives[first])
        else:
            at = place_of_entity(entity, given)
        out.entities.append(Entity(clean(given.get("handle") or ""), clean(kind), layer.name, fate, at))
        if self.pending or self.parts:
            self._close(index)

    def take_paper(self, entity: DXFEntity) -> None:
        """Enter an entity of a paper layout in the account; nothing of it is read."""
        given = vars(entity.dxf)
        layer = clean(given["layer"] if "layer" in given else _layer_name(entity))
        self.out.entities.append(
            Entity(clean(given.get("handle") or ""), clean(entity.dxftype()), layer, PAPER_SPACE, None)
        )

    def note_mirrored(self) -> None:
        """One notice for all entities drawn from behind the sheet."""
        if self.mirrored:
            first = next(iter(self.mirrored))
            count = len(self.mirrored)
            at = self.out.entities[first].at
            self.out.notices.append(
                Notice("mirrored-plane", f"{count} drawn with extrusion (0, 0, -1)", first, at, float(count))
            )

    def _close(self, index: int) -> None:
        """Turn what was seen in a top-level entity into notices, each once."""
        entity = self.out.entities[index]
        for (kind, detail), amount in self.pending.items():
            self.out.notices.append(Notice(kind, detail, index, entity.at, amount))
        if entity.fate is None:
            for fate, count in self.parts.items():
                kind = "unread-part" if fate.read_as == "unread" else "hidden-part"
                self.out.notices.append(Notice(kind, fate.why, index, entity.at, float(count)))
        self.pending.clear()
        self.parts.clear()

    def _read(  # noqa: PLR0911 - one return for each way an entity can end
        self, entity: DXFEntity, kind: str, layer: LayerState, level: Level, index: int
    ) -> Fate | None:
        """Add the shapes of one entity on a layer in effect; its fate where it yields none."""
        given = vars(entity.dxf)
        # A reference on a layer that is off hides only what lies on layer 0 inside it.
        if layer.hidden is not None and (kind != "INSERT" or layer.frozen):
            return layer.hidden
        if given.get("invisible"):
            return INVISIBLE
        linetype = _linetype(given["linetype"], layer, level) if "linetype" in given else layer.linetype
        try:
            place = level.place
            if "extrusion" in given and kind in _OBJECT_COORDINATES:
                place = self._oriented(place, kind, given, index)
            if kind in READERS:
                source = Source(index, clean(given.get("handle") or ""), layer.name, linetype, level.trail)
                self._add(*READERS[kind](entity, given, source, place))
                return None
            if isinstance(entity, Insert):
                return self._expand(entity, level, place, layer, linetype, index)
        except NotRead as refusal:
            return self._refused(refusal)
        except LIBRARY_FAULTS as fault:
            return Fate("unread", f"{clean(kind)} is damaged: {_said(fault)}")
        return _FATES.get(kind) or Fate("unread", f"{clean(kind)} is not read")

    def _read_inside(self, entity: DXFEntity, level: Level, index: int) -> Fate | None:
        """As _read, for an entity of a block or an attribute: layer 0 is the layer of the reference around it."""
        given = vars(entity.dxf)
        layer = self.layers[given["layer"] if "layer" in given else _layer_name(entity)]
        if layer.is_zero and level.layer is not None:
            layer = level.layer
        return self._read(entity, entity.dxftype(), layer, level, index)

    def _add(self, shapes: tuple[Primitive, ...], low: float, high: float) -> None:
        primitives = self.out.primitives
        if low or high:
            first = len(primitives)
            low, high = (low, high) if low <= high else (high, low)
            self.out.heights.append(Heights(first, first + len(shapes), low, high))
        primitives += shapes

    def _oriented(self, place: Placement, kind: str, given: Given, index: int) -> Placement:
        """The placement for an entity in the object coordinate system its extrusion makes."""
        if kind == "POLYLINE" and given.get("flags", 0) & _POLYLINE_3D:
            return place
        if not faces_away(given["extrusion"]):
            return place
        self.mirrored[index] = None
        return place.after(FLIPPED)

    def _refused(self, refusal: NotRead) -> Fate:
        """The fate of an entity a reader refused, with the notice that goes with it."""
        if refusal.fate is NOT_A_NUMBER:
            self.pending["not-finite", NOT_A_NUMBER.why] = None
        elif refusal.fate is OFF_PLANE and refusal.tilt is not None:
            self.pending["off-plane", f"tilted by {refusal.tilt:.3g} degrees"] = None
        return refusal.fate

    def _expand(
        self, entity: Insert, outside: Level, place: Placement, layer: LayerState, linetype: str, index: int
    ) -> Fate | None:
        """Add the shapes of a block reference and its attributes; its fate where nothing of it is left."""
        start = (len(self.out.primitives), len(self.out.heights))
        given = vars(entity.dxf)
        name = str(given.get("name", ""))
        use = BlockUse(clean(name), clean(given.get("handle") or ""))
        inside = Level(place, layer, linetype, (*outside.trail, use), (*outside.names, name.lower()))
        try:
            fates = self._expand_copies(entity, inside, index)
            if entity.attribs:
                attributes = outside._replace(trail=inside.trail)
                fates += [self._read_inside(attribute, attributes, index) for attribute in entity.attribs]
        except _LimitReached as reached:
            if outside.trail:
                raise
            del self.out.primitives[start[0] :], self.out.heights[start[1] :]
            self.parts.clear()
            self.pending.clear()
            self.pending["block-limit", f"block {use.name}: {reached}"] = None
            return _TOO_MUCH
        if len(self.out.primitives) > start[0]:
            return None
        said = [fate for fate in fates if fate is not None]
        unread = [fate for fate in said if fate.read_as == "unread"]
        return next(iter([*unread, *said]), Fate("skipped", "the block is empty"))

    def _expand_copies(self, entity: Insert, inside: Level, index: int) -> list[Fate | None]:
        given = vars(entity.dxf)
        block, refusal = self._block(inside)
        if block is None:
            return [refusal]
        if len(inside.names) > BLOCK_DEPTH_LIMIT:
            msg = f"nested deeper than {BLOCK_DEPTH_LIMIT}"
            raise _LimitReached(msg)
        copies = array_size(given)
        if copies * max(1, len(block.entities)) > self.budget:
            msg = (
                f"{copies} copies of {len(block.entities)} entities; at most {BLOCK_ENTITY_LIMIT} a sheet are expanded"
            )
            raise _LimitReached(msg)
        if copies > 1:
            self.pending["block-array", f"block {block.name}"] = float(copies)
        if len(inside.names) >= NESTED_DEEP:
            nested = ("nested-block", f"block {inside.trail[0].name}")
            self.pending[nested] = max(self.pending.get(nested) or 0.0, float(len(inside.names)))
        if not scales_evenly(given):
            across, upward = given.get("xscale", 1.0), given.get("yscale", 1.0)
            ratio = abs(across or 1.0) / abs(upward or 1.0)
            self.pending["uneven-scale", f"block {block.name} scaled by {across:g} and {upward:g}"] = ratio
        own = placement_of(given, block)
        fates: list[Fate | None] = [refusal]
        for number, offset in enumerate(array_offsets(given)):
            placed = own._replace(shift=own.shift + offset) if offset else own
            place = placed if inside.place is SHEET else inside.place.after(placed)
            require_numbers(*place)
            trail = (*inside.trail[:-1], inside.trail[-1]._replace(copy=number)) if number else inside.trail
            fates += self._expand_once(block, inside._replace(place=place, trail=trail), index)
        return fates

    def _expand_once(self, block: Block, level: Level, index: int) -> list[Fate | None]:
        self.budget -= max(1, len(block.entities))
        if self.budget < 0:
            msg = f"more than {BLOCK_ENTITY_LIMIT} entities come out of the blocks of this sheet"
            raise _LimitReached(msg)
        fates: list[Fate | None] = []
        for entity in block.entities:
            fate = self._read_inside(entity, level, index)
            if fate is not None:
                fates.append(fate)
                if entity.dxftype() != "INSERT" and (fate.read_as == "unread" or fate in HIDDEN):
                    self.parts[fate] += 1
        return fates

    def _block(self, inside: Level) -> tuple[Block | None, Fate | None]:
        """The block of the innermost reference, None where it cannot be expanded, with the fate and its notice."""
        name = inside.names[-1]
        shown = inside.trail[-1].name
        if name in inside.names[:-1]:
            self.pending["block-cycle", f"block {shown} contains itself"] = None
            return None, Fate("unread", "the block contains itself")
        block = self.blocks[name]
        if block is None:
            self.pending["block-missing", f"block {shown} is not in the drawing"] = None
            return None, Fate("unread", "the block is missing")
        if block.external:
            self.pending["outside-reference", f"block {shown} stands for another file"] = None
            return block, EXTERNAL
        return block, None


def _layer_name(entity: DXFEntity) -> str:
    """The layer of an entity that has it not among its attributes: of a kind only stored, or '0' where none is said."""
    stored = entity.graphic_properties() if isinstance(entity, DXFTagStorage) else {}
    return str(stored.get("layer", "0"))


def _said(fault: Exception) -> str:
    """What a fault says, in a few clean words; a key that was looked up in vain is an attribute that is missing."""
    if isinstance(fault, KeyError) and fault.args and isinstance(fault.args[0], str):
        return f"no {clean(fault.args[0])} is given"
    return clean(str(fault)) or type(fault).__name__


def _linetype(stated: object, layer: LayerState, level: Level) -> str:
    """The linetype in effect, upper case."""
    name = clean(str(stated)).upper()
    if name == "BYLAYER":
        return layer.linetype
    return level.linetype if name == "BYBLOCK" else name
