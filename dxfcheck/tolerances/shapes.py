"""Tolerances of reading frame symbols, slides and gears."""

from __future__ import annotations

SHORT_OF_COINCIDENCE = 10.0
"""A line shorter than this many tolerances t is a speck, not a link."""

CROSS_OVERHANG_IN_RADII = 1.0
"""The lines of a centre cross end at most this many radii outside their ring."""

STROKE_ANGLES_DEGREES = (15.0, 75.0)
"""Hatch strokes of a frame symbol stand at an angle between these to their base line."""

STROKE_OF_BASE = 0.5
"""A hatch stroke is at most this part of its base line long."""

STROKE_SHORT_OF_BASE = 0.5
"""A loose hatch stroke may stop short of its base by this part of its own height over the base."""

ARROW_BARB_DEGREES = (5.0, 45.0)
"""The barbs of an arrow stand at an angle between these to its shaft."""

ARROW_BARB_OF_SHAFT = 0.6
"""The barbs of an arrow are at most this part of its shaft long."""

CROSS_ANGLE_DEGREES = 30.0
"""The two lines of a centre cross stand at least at this angle to one another."""

ARROW_HEAD_DEGREES = 10.0
"""A closed arrow head is in line with its shaft within this angle."""

GUIDE_BESIDE_OF_WIDTH = 0.5
"""A guide beside a block lies no further from its side than this part of the block's width across the guide."""

GUIDE_GAP_OF_BLOCK = 0.5
"""A guide interrupted at a block stops short of it by no more than this part of the block's length along it."""

GUIDE_LEVEL_OF_WIDTH = 0.05
"""The two pieces of an interrupted guide, and two rails, lie level within this part of the block's width."""

TANGENT_OF_RADIUS = 0.0025
"""Pitch circles that miss tangency by less than this part of the smaller radius were drawn to roll on one another:
radii typed to two decimals miss by 0.015 at worst."""

ROLLING_OF_RADIUS = 0.03
"""... up to this part they are read as rolling, with a finding,"""

NEAR_TANGENT_OF_RADIUS = 0.15
"""... and up to this part they are not read as rolling but reported, where one of them rolls on nothing else."""

RACK_PARALLEL_DEGREES = 0.5
"""A slide runs along a rack within this angle."""

GUIDE_LOOKED_FOR_IN_BLOCKS = 4.0
"""A block without a guide says how far off the nearest parallel line is, within so many of its half diagonals."""

EMPTY_GUIDE_IN_DIAMETERS = 6.0
"""A frame line that holds nothing, within so many ring diameters of a pin with one link, may be its forgotten guide."""

WELD_ARC_DEGREES = (30.0, 200.0)
"""A weld mark is an arc that sweeps between these angles about the end of a line, from its neighbour to the line."""

WELD_ARC_OFF_CENTRE = 0.15
"""The centre of a weld mark's arc lies within this part of its radius of the line's end."""

WELD_ARC_OF_LINE = 0.3
"""The radius of a weld mark's arc is at most this part of its line."""

SLEEVE_WIDTH_OF_LENGTH = 1.5
"""The two lines of a sleeve lie no further apart than so many times their length."""

SLEEVE_LIKENESS = 0.2
"""The two lines of a sleeve differ in length, and are shifted along one another, by no more than this part of it."""

SLEEVE_STROKES = 2
"""A line beside a rod on which so many other lines stand may be hatched: one side of a sleeve."""

BUSH_GAPS_ALIKE = 2.0
"""Of a rectangle inside another round the same pin: the gaps along and across are alike up to this factor, or it is no
bush but a block with room to slide."""

CENTRE_MARK_OF_BLOCK = 1.5
"""Two lines that cross at a block's pin are centre marks where they are at most so many times as long as the block."""

PISTON_BORES = 2.0
"""A line across between two frame lines is a piston where both are at least so many times as long as it is."""

PISTON_OF_BORE = 0.05
"""So thick is a piston that is drawn as a single line taken to be, as a part of its length."""
