"""Tolerances of reading texts, dimensions and notes, and of what looks wrong on a sheet."""

from __future__ import annotations

LABEL_LENGTH = 4
"""A text of at most this many characters may name a pin."""

LABEL_REACH_IN_DIAMETERS = 2.0
LABEL_REACH_IN_HEIGHTS = 2.5
"""A label lies within so many ring diameters, or so many text heights, of its pin; the greater reach counts."""

NOTE_REACH_IN_HEIGHTS = 8.0
"""A drive note without a name belongs to a link within this many text heights of it."""

NOTE_CLEARLY_NEARER = 0.5
"""... and only if it lies at most this part of the distance to the next nearest link away."""

ASSUMED_TIE = 1e-6
"""Arms whose lengths agree within this part are equally short when a drive has to be assumed."""

NAMED_NOTE_REACH_IN_HEIGHTS = 40.0
"""A drive note whose name fits links of several mechanisms means the clearly nearest within so many text heights."""

LINE_OFF_CENTRE_OF_RADIUS = 1.0
"""A line that runs through a ring this part of the radius off its centre may have been meant to be pinned there."""

EMPTY_PIN_LIKENESS = 3.0
"""A ring without a link is taken for a forgotten pin within so many radii of a linkage and this factor of its size."""

PLACES_NAMED = 10
"""At most so many places are named in one finding."""

TELESCOPE_ACROSS = 1e-6
"""Two pins whose joining line is square to a slide within this part are brought neither apart nor together by it."""

UNREAD_SHAPES_LIMIT = 3000
"""On a sheet without a linkage that holds more strands than this nobody drew a kinematic symbol to be named."""

EXPECTED_RELATIVE = 5e-3
"""So far, as a part of its figure, an expected speed or ratio may be off where no tolerance is stated with it: stated
figures are commonly rounded to three digits."""

LONE_FORCE_MOBILITY = 3
"""A lone 'F = 12' is a force and not a mobility: linkages of more freedoms than this are seldom drawn."""

SNAP_REACH_IN_GAPS = 3.0
"""An end is snapped along its own line to the line it misses within so many gaps; a shallower meeting to the nearest
point."""

FRACTION_STEP = 1.0 / 16.0
"""A length in fractions of an inch is rounded to sixteenths, or finer where its own fraction is (common practice)."""

MOST_REPEATS = 12
"""'12x60' means twelve parts of 60; where the first figure is greater it may be a length as well ('60x40')."""

LIMITS_ALIKE = 1.5
"""The two limits of one size, one over the other, differ by no more than this factor; else the one is divided."""

MIX_UP_DIGITS = 0.05
"""A written figure names a factor such as 25.4 only where half a unit of its last digit is at most this part of it."""

STATED_NOISE = 1e-9
"""Rounding in the computer, as a part of what is measured, by which it may pass the bounds of a written figure."""

DIMENSION_ON_OF_SIZE = 1e-3
"""A point of a dimension sits on linework within this part of the dimension's own size (a tenth of a millimetre at
100 mm): what is measured then changes by less than most sheets show."""

DIMENSION_MISS_OF_SIZE = 0.15
"""A point no further than this part of the dimension's size from an end or centre was left behind when that moved."""

DIMENSION_LEVEL = 0.1
"""Where a point is only in line with something further off, it has to be so within this part of what is allowed on
linework: on a full sheet much is nearly in line by chance. Two lines cross where the sine between them is as much."""

UNREAD_REACH_OF_DIAGONAL = 0.1
"""A dimension this near, in parts of the sheet's diagonal, to a known point of linework that was not read may sit on
that."""

LABELLED_PINS = 2
"""Where so many pins have labels, a label beside a corner without a ring may stand for a forgotten pin."""

UNIT_LIKENESS = 2e-3
"""Two sizes of a length unit that differ by less than this part are one: factors are typed as 25.4, 0.0394, 0.03937."""

LINK_LEAST_METRES = 1e-3
LINK_GREATEST_METRES = 100.0
"""A mechanism whose longest link lies outside these (1 mm, 100 m) was hardly meant so: its unit is doubtful."""

LINK_USUAL_METRES = 10.0
"""Another unit is offered in its place where the longest link is no longer than this in it."""

PLACE_DIGITS = 6
PLACE_LEAST_DECIMALS = 3
PLACE_MOST_DECIMALS = 9
"""A place is written to six digits of its larger coordinate, but to three decimals where that gives fewer (a micrometre
on a sheet in millimetres), and to no more than nine: what is smaller in any unit used is rounding noise."""

POINT_OF_DIAGONAL = 0.1
"""A dimension with a single point (an ordinate) is taken to be this part of the sheet's diagonal in size."""

CLIPPED_STROKE_REACH = 1.5
"""A loose line within so many lengths of a frame symbol's stroke, parallel to it and no longer, is one of its strokes
that was clipped: the strokes of a hatch stand about as far apart as they are long."""

EXPLODED_LABELS = 3
EXPLODED_STROKES = 3
EXPLODED_LETTER_IN_DIAMETERS = 3.0
"""At so many pins at least, and half of all, stand so many strokes of letters at least, no line or polyline of them
longer than so many ring diameters: labels were exploded into lines."""
