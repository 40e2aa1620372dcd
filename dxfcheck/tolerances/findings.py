"""Limits of findings and reports."""

from __future__ import annotations

SHOWN_AS_ZERO = 1e-9
"""A terminal report shows 0 for what lies below this part of the mechanism's greatest figure of its kind."""

AMONG_LINKS_OF_DIAGONAL = 0.02
"""What lies within the box round a mechanism's pins, widened by this part of the diagonal, lies among its links."""

ON_AXIS_OF_REACH = 1e-3
"""The pins of a telescope lie on its axis within this part of their distance."""

ACCEPTED_WITHIN_OF_DIAGONAL = 5e-4
"""An accepted finding is found again within this part of the sheet's diagonal: a drawing that was saved anew with two
decimals, in inches, moves its ends by as much; another place lies further off."""

DOUBLES_TOLD = 2
"""More lines drawn twice than this are one finding: a sheet that was pasted onto itself doubles every line."""

COMPARED_ALLOWANCE_PERCENT = 0.1
"""A speed may change by so many per cent before two drawings count as different, where nothing else is stated: less
than what dimensions to a tenth of a millimetre do to a crank of 60 mm."""

SNAP_OF_COINCIDENCE = 0.1
"""Places to snap to are written to this part of the coincidence tolerance, so that an end typed there meets."""

SAME_RATE_RELATIVE = 1e-8
"""A drive written anew with nine figures is the same within this part of its rate."""

LIMIT_RELATIVE = 1e-4
"""A speed or ratio is beyond its limit where it passes it by more than this part: coordinates typed to two decimals
move speeds by as much on lengths of 50 mm, and a limit is often the nominal speed itself."""

LOW_TRANSMISSION_DEGREES = 40.0
"""A transmission angle below this makes forces and wear large (common practice, no source)."""

DOUBTFUL_SPEED_RELATIVE = 0.01
"""A speed that may be off by more than this part of itself is doubtful: stated speeds are rounded to three figures."""

SPEED_OF_FASTEST = 0.01
"""A speed below this part of the greatest of its kind is held against that part: one near zero is off by much of itself
without being of any weight."""

BOUNDS_SHOWN_OF = 40
"""On a sheet of at most so many mechanisms what each speed may be off by is shown, however small."""

RIGID_TRIANGLE = 3
"""Three bars pinned at their ends are a usual way to draw one link, and no locked part is told of."""

LARGE_DISAGREEMENT = 1e-6
"""Two ways of solving that differ by more than this part of the greatest speed differ by more than rounding in the
computer: well-conditioned poses stay below 1e-12."""
