"""Tolerances of comparing two drawings."""

from __future__ import annotations

COMPARED_SAMPLE = 60
"""Two sheets with more pins than this are first laid on one another by a sample of so many."""

COMPARED_SAMPLE_LEAST = 0.2
"""A motion that brings together less than this part of the sample is not looked at further."""

COMPARED_ENOUGH = 0.8
COMPARED_MORE = 15
"""Once a motion explains this part of a large sheet, only so many others are tried: in a row of equal mechanisms,
shifting by one explains almost as much."""

COMPARED_CANDIDATES = 2000
"""At most so many motions of the whole sheet are tried: a sheet of a thousand equal mechanisms allows millions."""

COMPARED_DIGITS = 6
"""Exporters that round write coordinates to so many significant digits (seen in drawings by many hands)."""

COMPARED_NOISE = 2e-5
"""Two speeds that differ by less than this part of their mechanism's greatest one are the same: coordinates within the
coincidence tolerance give speeds that differ by a few times 3e-6."""

COMPARED_TURN_RADIANS = 2e-4
"""Directions of slides and slots within this angle are the same: what ten lengths of a block rounded to six digits on a
sheet of three hundred turn."""

COMPARED_FINDING_OF_SIZE = 0.02
"""A finding of one rule within this part of the largest mechanism's size of where it lay before is the same one."""

COMPARED_OF_SIZE = 2e-5
"""Places and lengths of a mechanism that differ by no more than this part of its size, nor by more than the tolerances
of the two drawings, are equal: on a sheet of hundreds of mechanisms the sheet's tolerance says little about one."""

COMPARED_FLOAT = 1e-12
"""Rounding in the computer when a sheet is turned, over its greatest coordinate."""

COMPARED_SNAP_OF_REACH = 1e-3
"""A sheet that is turned or moved by less than this part of the tolerance is not turned or moved."""
