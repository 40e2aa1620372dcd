"""Tolerances and limits of turning a file into plain shapes."""

from __future__ import annotations

SHAPE_OF_DIAGONAL = 5e-4
"""Rectangles, obrounds and frame symbols close within this part of the diagonal: drafters type them to two decimals."""

BLOCK_DEPTH_LIMIT = 32
"""Block references nested deeper than this are not followed; drawings of the corpora stay below 8."""

BLOCK_ENTITY_LIMIT = 200_000
"""Most entities taken out of block references on one sheet, so that an array of a billion copies ends at once."""

EVEN_SCALE_RELATIVE = 1e-9
"""Scales of a block reference that differ by less than this part of the greater are the same (rounding noise)."""

ELLIPSE_IS_RING_RELATIVE = 1e-6
"""An ellipse whose axes differ by less than this part is a ring: exporters write circles with ratio 0.9999999."""

FULL_TURN_SLACK = 1e-6
"""Radians short of a full turn at which an arc still closes: 360 degrees typed with six digits."""

ROUND_OF_RADIUS = 0.01
"""Corners of a many-sided loop, and centres of its arcs, agree on one circle within this part of its radius."""

MANY_SIDES = 12
"""A closed loop of at least this many straight pieces on one circle stands for a ring; a nut has six."""

STRAIGHT_BULGE = 1e-9
"""A bulge below this is a straight piece: its arc rises by less than half this part of its chord."""

REPEATED_VERTEX_RELATIVE = 1e-9
"""Neighbouring vertices of a polyline nearer than this part of its size are one vertex drawn twice."""

FLATTENING_OF_RADIUS = 1e-3
"""Greatest gap between an ellipse (or a hatch's curved edge) and the chords that stand for it, over its radius."""

TILT_RADIANS = 1e-6
"""An entity whose plane is turned out of the sheet's by less than this lies flat: noise of exporters' axes."""

FAR_OF_DIAGONAL = 1e6
"""Coordinates further from the origin than this many diagonals leave too few of the 16 digits for the shapes."""

TEXT_WIDTH_OF_HEIGHT = 0.65
"""Mean advance of a letter over the cap height of technical lettering; fonts of the machine are not asked (from
memory, common practice, no source)."""

TEXT_LINE_OF_HEIGHT = 5.0 / 3.0
"""Distance between the lines of a paragraph text over its height at spacing factor 1 (DXF reference, MTEXT group 44,
from memory)."""

COORDINATE_LIMIT = 1e60
"""Figures beyond this are no coordinates but damage; what lies below can be squared and scaled without overflow."""

NESTED_DEEP = 4
"""Blocks in blocks so deep (the reference on the sheet counts as one) are told of: libraries of parts nest two or three
deep, and what explodes a drawing step by step is commonly stopped after that (common practice, no source)."""

NEVER_PLOTTED = "DEFPOINTS"
"""The layer that drafting programs make for the points of dimensions and never plot (from memory, common practice)."""
