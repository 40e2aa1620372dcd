"""Tolerances of ranks, drives, speeds and poses."""

from __future__ import annotations

RANK_RELATIVE = 1e-6
"""Singular values of the scaled constraint matrix below this part of the greatest count as zero: ends that meet lie
within 1e-7 of the diagonal of one another in drawings made to full precision, where special geometry is exact."""

RANK_OF_STEP = 1.5
"""Where coordinates were rounded to a step, singular values below this many steps over the mechanism's diagonal count
as zero: a redundant crank of a parallelogram typed to two decimals leaves 3e-5 at 300 mm, 8e-5 at 100 mm and 1.8e-4 at
60 mm (600 tried of each)."""

RANK_GREATEST = 3e-4
"""... but never those above this: random frames of five links and six pins lie below 1.7e-4 once in a thousand, random
four-bars never below 2e-3 (4,000 tried of each). Analysis.rank_gap shows what was near."""

RANK_DOUBTFUL = 1e-3
"""A smallest singular value below this that still counts makes the freedom at the pose doubtful; findings say so."""

RANK_STEP = 10.0
"""A singular value below the tolerance that follows the one before it by less than this factor counts as that one does:
in a strip of hundreds of crossed bars the true values themselves come down so far, one after another."""

RANK_NOISE = 1e-11
"""Below this part of the greatest every singular value is rounding error and zero."""

LINK_SIZE_FLOOR = 1e-5
"""Each link's turning is scaled by the link's own size, but by no less than this part of the mechanism's: joints drawn
apart by rounding noise only are one place."""

AT_LIMIT_RELATIVE = 1e-6
"""A drive that moves its link by less than this part of the fastest motion cannot drive: it is held at this pose."""

AT_LIMIT_OF_BEND = 30.0
"""Near a dead centre a drive is at its limit below this many times the angle that is missing there: the angle turns up
in the speeds times a few ratios of lengths, and what was typed to two decimals misses the exact pose."""

DEAD_CENTRE_RADIANS = 1e-3
"""Links within 0.06 degrees of a straight line are in line: coordinates typed to two decimals do that on a crank of
10 mm, and at 30 mm it is 0.03 mm, the play of a pin."""

DRIVE_DEPENDENT_RELATIVE = 1e-6
"""A drive of which less than this part is new, against the constraints and the drives before it, depends on them."""

DRIVE_AGREES_RELATIVE = 5e-3
"""A dependent drive agrees within this part of the rate: stated rates are commonly rounded to three figures."""

DETERMINED_RELATIVE = 1e-6
"""A motion is settled where what is left free moves it by less than this part of the fastest free motion."""

TRANSLATION_RELATIVE = 1e-6
"""A link that turns by less than this part of its speed over its size only translates: the pole would lie a million
sizes away, and drawn coordinates carry noise of 1e-7."""

REST_RELATIVE = 1e-10
"""A link whose turning is below this part of the fastest motion is at rest or translates: that is rounding error."""

FINITE_STEP_RADIANS = 0.03
"""A finite step turns the fastest link so far, a second one twice as far: enough for the square of it, by which a
linkage that locks stays open, to stand clear of lengths typed to two decimals."""

FINITE_STEP_TURNS = 12
"""Newton's method closes a linkage that can be closed in four or five turns; one that cannot is left after so many."""

STEPPED_LINKS = 80
STEPPED_FREEDOMS = 4
"""Finite steps are taken of linkages of at most so many links and freedoms at the pose; larger ones are not judged."""

DENSE_LINKS = 60
"""A mechanism of at most so many links is solved by one matrix for all of it; larger ones a few links at a time."""

STILL_OF_BORDER = 1e-9
"""A group of links whose constraints stand to it at a cosine below this leaves them to its neighbours: rounding error
has added up to 1e-12 in lattices of 5,000 links."""

MOST_PUT_OFF = 60
"""Links that follow their neighbours weakly are put off and solved together with these, up to so many at once."""

TALLEST_MOTION = 1e150
"""Motions of long lever chains are scaled down as they pass this, long before they overflow."""

LOOP_FIRM = 3e-3
"""What a large linkage's loop equations say with less weight than this, once others are solved, is settled last:
coordinates typed to decimals leave up to 3e-4 of an equation that repeats others."""

LOOP_NOISE = 1e-9
"""... and below this it is rounding error."""

NEARBY_JOINTS = 8
"""In a large mechanism a motion is judged against the fastest within so many joints."""

TRUST_LINKS = 80
"""How far speeds can be trusted is worked out for mechanisms of at most so many links: its cost grows with the cube."""

NEAR_DEAD_CENTRE_DEGREES = 5.0
"""Links within this angle of a dead centre are near it: less than a tenth of a push (the sine of the angle) turns the
link that is pushed there (common practice, no source)."""

STILL_JOINT = 1e-4
"""Links whose relative motion at a joint is below this part of the fastest near it may be rigid together: taken out of
the linkage, they are asked again."""

STRESS_OF_TOLERANCE = 30.0
"""Forces of a self-stress below so many times the rank tolerance are nothing: what was taken for dependent though
rounded gives other constraints a share of up to the tolerance over their own smallest singular values."""

FREE_RELATIVE = 1e-9
"""Free motions of a part of a linkage count from this part of the greatest; what lies below is rounding error."""

DRIVES_FREELY = 1e-3
"""A link that moves with less than this part of the fastest of its part is no good place for a drive."""

FLAT_TRIANGLE = 1e-6
"""A velocity triangle whose smallest sine is below this is no triangle: its sides lie along one line, and the sine rule
would divide rounding noise of 1e-16 by less than this."""

POLE_LINES_CROSS = 1e-3
"""Two lines that meet at less than this angle (its sine) show no pole: on paper nobody could say where they cross."""

WORKING_UNKNOWNS = 12
"""Equations in more unknowns than these that hang together are counted but not written out: nobody solves them by
hand (common practice, no source)."""

TRUST_OF_SIZE = 1e-6
"""A drawing that is known to this part of its smallest link gives speeds to more digits than anybody reads; what they
may be off by is then worked out only where it is shown."""

AT_REST_BESIDE = 1e-10
"""In a large mechanism a link that moves by less than this part of the motion of those it hangs on rests: that is
rounding error."""

IDLE_RELATIVE = 1e-6
"""A link's own constraints hold it where their singular values are above this part of the greatest: joints at one place
lie within rounding of one another."""

FREED_LINKS = 24
"""In a locked part of at most so many links each is tried for whether its removal lets the others move; a person looks
through no longer list, and each try costs two ranks."""

SETTLING_DRIVES = 6
"""So many missing drives at most are proposed by name: whoever lacks more has not begun to state them."""
