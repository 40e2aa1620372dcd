"""The plain shapes a drawing is reduced to: everything after this stage works on them and never sees DXF.

Glossary
    sketch      one drawing, as plain shapes in one plane, with a record of every entity it holds
    entity      what the drawing file itself holds at top level; counted once in the account, a block reference as one
    primitive   a plain shape made from an entity, or from an entity inside a block reference
    fate        what became of an entity or primitive: the role it was read in, and why

Points are complex numbers x + iy in the drawing's length unit, in the plane of the world coordinate system (WCS).
Angles are radians, counter-clockwise from +x.
"""

from __future__ import annotations

import cmath
from dataclasses import dataclass
from typing import NamedTuple

from dxfcheck.geometry import Point

__all__ = [
    "Arc",
    "BlockUse",
    "Dimension",
    "DimensionStyle",
    "Entity",
    "Fate",
    "Fill",
    "LengthUnit",
    "Linework",
    "Notice",
    "Path",
    "Primitive",
    "Ring",
    "Segment",
    "Sketch",
    "Source",
    "Text",
]


class BlockUse(NamedTuple):
    """One step of the way into a block: the block's name and the handle of the reference that used it.

    ``copy`` tells the copies of an arrayed reference apart, 0 for the first.
    """

    name: str
    handle: str
    copy: int = 0


class Source(NamedTuple):
    """Where a primitive comes from; a NamedTuple because a busy sheet makes tens of thousands of them."""

    entity: int
    """Index into Sketch.entities of the top-level entity."""
    handle: str
    """Handle of the entity itself (of its definition, where it lies in a block); '' where the file gives none."""
    layer: str
    """Layer in effect: layer 0 inside a block is the layer of the reference."""
    linetype: str
    """Linetype in effect, upper case, BYLAYER and BYBLOCK resolved; 'CONTINUOUS' where nothing is said."""
    blocks: tuple[BlockUse, ...]
    """The block references around it, outermost first; empty for what lies on the sheet itself."""


class Segment(NamedTuple):
    """A bounded straight line; its length may be zero."""

    source: Source
    start: Point
    end: Point


class Arc(NamedTuple):
    """A circular arc of less than a full turn, from ``start_angle`` counter-clockwise over ``sweep`` (0 to 2 pi)."""

    source: Source
    centre: Point
    radius: float
    start_angle: float
    sweep: float

    @property
    def start(self) -> Point:
        """First end, at start_angle."""
        return self.centre + cmath.rect(self.radius, self.start_angle)

    @property
    def end(self) -> Point:
        """Last end, counter-clockwise of the first."""
        return self.centre + cmath.rect(self.radius, self.start_angle + self.sweep)


class Ring(NamedTuple):
    """A full circle: a CIRCLE, a full-turn ARC, an ELLIPSE of ratio 1, a closed polyline of bulges on one centre."""

    source: Source
    centre: Point
    radius: float


class Path(NamedTuple):
    """One polyline or flattened curve: pieces joined end to end, rigid as a whole.

    ``pieces`` run in drawing order, each one's far end at the next one's near end (an Arc may run either way along the
    path, so compare both its ends). ``vertices`` are the drawn corner points in order, the first not repeated.
    ``curved`` is True where the path stands for a smooth curve (an ellipse) and its vertices are not corners.
    """

    source: Source
    pieces: tuple[Segment | Arc, ...]
    vertices: tuple[Point, ...]
    closed: bool
    curved: bool


class Text(NamedTuple):
    """A TEXT, MTEXT or ATTRIB, its escapes and codes decoded and control characters replaced by U+FFFD.

    ``at`` is the alignment point, ``box`` the four corners of its estimated box as drawn (turned, mirrored),
    counter-clockwise or clockwise. ``height`` is the cap height in the drawing's unit.
    """

    source: Source
    content: str
    at: Point
    height: float
    box: tuple[Point, ...]


class DimensionStyle(NamedTuple):
    """What the style of a dimension says of the figure it shows; the defaults are those of a style that says nothing.

    ``factor`` is the linear factor, ``rounding`` the step to which figures are rounded (0: none), ``decimals`` how many
    are shown (None where it is not stated, or not a number of decimals). ``suffix`` is what is written round the
    figure ('<> mm'), ``alternate`` the factor of a second figure where one is shown, ``alternate_suffix`` what is
    written round that. ``feet`` is True where figures are shown in feet and inches.
    """

    factor: float = 1.0
    rounding: float = 0.0
    decimals: int | None = None
    suffix: str = ""
    alternate: float | None = None
    alternate_suffix: str = ""
    feet: bool = False


class Dimension(NamedTuple):
    """A dimension: its text as overridden by hand ('' where measured) and what it measures.

    ``measured`` is in the unit of the drawing (of its own block, where it lies in one) after the style's linear factor,
    or degrees for an angular one; None where it cannot be told. ``points`` are the definition points that ought to sit
    on geometry: both feet of a linear or aligned one; two on each leg of an angle, or one on each leg, then its vertex;
    the centre, then the rim, of a radius; the feet, then the centre, of an arc. ``kind`` is 'linear', 'aligned',
    'angular', 'diameter', 'radius', 'ordinate' or 'arc'. ``direction`` is the unit vector on the sheet along which a
    linear one or an ordinate measures. ``underlined`` marks a text as not to scale.
    """

    source: Source
    text: str
    measured: float | None
    points: tuple[Point, ...]
    kind: str
    direction: Point | None = None
    style: DimensionStyle = DimensionStyle()
    underlined: bool = False


class Fill(NamedTuple):
    """A HATCH, SOLID or TRACE: the polygons it fills (curved edges flattened) and whether it is solid or a pattern."""

    source: Source
    outlines: tuple[tuple[Point, ...], ...]
    solid: bool


Linework = Segment | Arc | Ring | Path
Primitive = Segment | Arc | Ring | Path | Text | Dimension | Fill


class Fate(NamedTuple):
    """What an entity was read as (a word of the report's account) and why, in a few words."""

    read_as: str
    why: str


class Entity(NamedTuple):
    """One top-level entity of model space or of a paper layout.

    ``fate`` is None where primitives were made of it, so that the reading stage decides; else it was decided on
    loading: an entity kind not read, paper space, a layer switched off, a coordinate that is no number.
    ``at`` is a place on the sheet where it can be told.
    """

    handle: str
    type: str
    layer: str
    fate: Fate | None
    at: Point | None


class LengthUnit(NamedTuple):
    """The drawing's length unit: 'mm', 'in', 'm' ... or 'unitless', where it was learnt, and its size in metres.

    ``source`` is 'header', 'option', 'settings' or 'assumed'; ``metres`` is None for 'unitless'.
    """

    name: str
    source: str
    metres: float | None


class Notice(NamedTuple):
    """Something the loading stage saw that a rule may turn into a finding.

    ``kind`` is one of: 'recovered' (the file was damaged and repaired), 'emptied' (nothing was left after repair),
    'not-finite' (a coordinate is no number), 'off-plane' (z differs from the rest of the sheet, or tilted),
    'mirrored-plane' (extrusion 0, 0, -1), 'uneven-scale', 'outside-reference' (an external reference),
    'block-array' (amount copies of a block), 'nested-block' (so many blocks deep), 'block-cycle', 'block-limit' (depth
    or count cap), 'block-missing', 'far-from-origin' (digits lost; amount is the greatest distance), 'unread-part' and
    'hidden-part' (inside a block reference of which other things were read; detail is why, amount how many).
    ``detail`` is a phrase for the message; ``amount`` a figure where there is one.
    """

    kind: str
    detail: str
    entity: int | None
    at: Point | None
    amount: float | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Sketch:
    """One drawing as plain shapes."""

    path: str
    unit: LengthUnit
    entities: tuple[Entity, ...]
    primitives: tuple[Primitive, ...]
    notices: tuple[Notice, ...]
    diagonal: float
    """Diagonal of the box round all linework of model space, in the drawing's unit; 0 where there is none."""
    metric: bool | None = None
    """Whether the header says that patterns are metric ($MEASUREMENT), None where it says nothing."""
    unplotted: frozenset[str] = frozenset()
    """Layers of model space that hold something and are not plotted."""

    def handles(self, primitive: Primitive) -> str:
        """The handle a drafter would look for: the top-level entity's."""
        return self.entities[primitive.source.entity].handle
