"""Tolerances of reading lines and rings: what meets, what lands, what a layer or linetype says."""

from __future__ import annotations

COINCIDENCE_OF_DIAGONAL = 3e-6
"""t over the sketch's diagonal: rounding noise lies below 1e-7, real mismatches above 1e-5 (seen in 2,806 drawings)."""

SHAPE_OF_SIZE = 0.03
"""... and within this part of their own size, whatever the sheet's diagonal."""

RIM_OF_RADIUS = 0.02
"""An end meets a rim, and aims at its centre, within this part of the radius."""

TYPED_STEPS = (0.1, 0.01, 0.001, 0.0001)
"""Coordinates that all lie on one of these grids were typed or rounded to so many decimals; whole numbers are exact."""

EXPORTED_STEPS = (1e-5, 1e-6, 1e-7, 1e-8)
"""Grids of decimals that programs round to on export; finer ones cannot be told from full precision at 300 mm."""

TYPED_NOISE = 1e-12
"""How far from its grid a typed coordinate may lie, over its own size: rounding in the computer."""

CHAIN_LINETYPES = ("CENTER*", "DASHDOT*", "CHAIN*", "ACAD_ISO04W100", "ACAD_ISO08W100", "ACAD_ISO10W100")
"""Linetypes in which a ring may be a pitch circle (ISO 128 long-dashed dotted line, from memory; the numbered names are
those of the ISO linetypes in the templates of common drafting programs, from memory)."""

PHANTOM_LINETYPES = ("PHANTOM*", "DIVIDE*", "ACAD_ISO05W100", "ACAD_ISO09W100")
"""Linetypes of other positions of a moving part (ISO 128 long-dashed double-dotted line, from memory)."""

HIDDEN_LINETYPES = ("HIDDEN*", "ACAD_ISO02W100", "ACAD_ISO03W100")
"""Linetypes of hidden edges (ISO 128 dashed lines, from memory)."""

CONSTRUCTION_LINETYPES = (*CHAIN_LINETYPES, *PHANTOM_LINETYPES, *HIDDEN_LINETYPES)
"""Linetypes of construction linework: axes, hidden edges, other positions of a moving part."""

WELD_GAP_OF_DIAGONAL = 1e-3
"""An end between t and this part of the diagonal from other linework is a near miss of a weld."""

GAP_OF_SIZE = 0.1
"""... if that is no more than this part of its line's own length."""

RIM_GAP_IN_DIAMETERS = 2.0
"""An end up to this many ring diameters short of a rim, or past a pin it runs through, is a near miss of that pin."""

TANGENT_ANGLE_DEGREES = 60.0
"""An end at a rim whose line points further than this from the centre is a tangent (a belt) and does not land."""

STROKE_PARALLEL_DEGREES = 3.0
"""Strokes of one symbol are parallel within this angle."""

RIGHT_ANGLE_DEGREES = 0.5
"""Corners of a rectangle are square, and sides of an obround parallel, within this angle."""

DISC_OFFSET_OF_RADIUS = 0.25
"""A ring that holds another pin at least this part of its radius off its centre is a disc; nearer, the two rings were
meant to be on one centre."""

STACKED_OF_RADIUS = 1.5
"""Two pins whose centres lie nearer than this many times the greater ring's radius stand on one another."""

ROUND_LOOP_LIKENESS = 3.0
"""The lines of such a loop differ in length by no more than this factor."""

ROUND_LOOP_PIECES = 10
"""A closed loop of at least this many short lines on one circle is a ring."""

CHORD_ANGLE_DEGREES = 7.5
"""Arcs are replaced by chords of at most this angle when looking for neighbours (never when measuring)."""

NO_LABEL_LAYERS = ("DIM*", "TITLE*", "BORDER*")
"""Layers whose texts never name a pin."""

CORNER_OF_LINE = 0.5
"""The edges of a filled corner are at most this part of the lines it welds long."""

ARC_REACH_IN_SHAPES = 4.0
"""However large an arc, an end meets it only within this many shape tolerances."""

STRAY_DIAGONALS = 100.0
"""A sheet counts as no more than this many times as large as the box round its rings."""

GUIDE_TURN_DEGREES = 0.5
"""A guide runs along a side of its block within this angle."""

MOST_SLENDER_BLOCK = 40.0
"""A block or barrel is at most so many times as long as it is wide: a pin further from a side is not in its box."""

SMOOTH_JOINT_DEGREES = 3.0
"""Where a line passes into an arc with less of a bend than this, its outline has no corner there."""

BLOCK_IN_SLOT_RADII = 4.0
"""The ends of a block in a slot lie within this many half widths of the slot from its pin."""

FORK_PAST_RADII = 3.0
"""The lines of a fork run on past its pin's ring by a ring's diameter: this many radii from the centre."""

FORK_LIKENESS = 1.25
"""The lines of a fork that is not joined at one end differ in length by no more than this factor."""

HOLE_OF_BAR = 0.75
"""The holes of a bar are narrower than this part of it; a pin that fills its slot is wider."""

BAR_LENGTH_OF_WIDTH = 3.0
"""An outline that is symmetric about its long axis and at least so many times as long as it is wide is a bar."""

SHARED_SIDE_OF_BLOCK = 1.5
"""A line that is one side of a block and its guide as well is at least so many times as long as that side."""

ROUNDING_OF_BLOCK = 0.5
"""The corners of a block are rounded with at most this part of the straight part of its shortest side."""

FORK_CLEARANCE_OF_RADIUS = 1.5
"""The lines of a fork that is joined at one end lie no further from its pin's centre than so many radii."""

CONSTRUCTION_LAYERS = ("DEFPOINTS", "DIM*", "CENTER*", "CONSTR*", "TITLE*", "BORDER*", "NOTE*", "TEXT*")
"""Layers whose linework is never a link."""

FRAME_NAMES = ("GROUND*", "FRAME*", "FIXED*", "BASE*", "GESTELL*", "BATI*", "TELAIO*", "BASTIDOR*")
"""Layers and blocks whose linework is the frame, in English, German, French, Italian and Spanish."""

PITCH_LAYERS = ("PITCH*", "GEAR*")
"""Layers whose rings are pitch circles."""
