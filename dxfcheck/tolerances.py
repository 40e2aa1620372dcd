"""Every tolerance and limit the program decides by: no other file holds one as a literal."""

from __future__ import annotations

COINCIDENCE_OF_DIAGONAL = 3e-6
"""t over the sketch's diagonal: rounding noise lies below 1e-7, real mismatches above 1e-5 (seen in 2,806 drawings)."""

SHAPE_OF_DIAGONAL = 5e-4
"""Rectangles, obrounds and frame symbols close within this part of the diagonal: drafters type them to two decimals."""

SHAPE_OF_SIZE = 0.03
"""... and within this part of their own size, whatever the sheet's diagonal."""

RIM_OF_RADIUS = 0.02
"""An end meets a rim, and aims at its centre, within this part of the radius."""

RANK_RELATIVE = 1e-6
"""Singular values of the scaled constraint matrix below this part of the greatest count as zero: ends that meet lie
within 1e-7 of the diagonal of one another in drawings made to full precision, where special geometry is exact."""

TYPED_STEPS = (0.1, 0.01, 0.001, 0.0001)
"""Coordinates that all lie on one of these grids were typed or rounded to so many decimals; whole numbers are exact."""

TYPED_NOISE = 1e-12
"""How far from its grid a typed coordinate may lie, over its own size: rounding in the computer."""

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

CHAIN_LINETYPES = ("CENTER*", "DASHDOT*", "CHAIN*", "ACAD_ISO04W100", "ACAD_ISO08W100", "ACAD_ISO10W100")
"""Linetypes in which a ring may be a pitch circle (ISO 128 long-dashed dotted line, from memory; the numbered names are
those of the ISO linetypes in the templates of common drafting programs, from memory)."""

PHANTOM_LINETYPES = ("PHANTOM*", "DIVIDE*", "ACAD_ISO05W100", "ACAD_ISO09W100")
"""Linetypes of other positions of a moving part (ISO 128 long-dashed double-dotted line, from memory)."""

HIDDEN_LINETYPES = ("HIDDEN*", "ACAD_ISO02W100", "ACAD_ISO03W100")
"""Linetypes of hidden edges (ISO 128 dashed lines, from memory)."""

CONSTRUCTION_LINETYPES = (*CHAIN_LINETYPES, *PHANTOM_LINETYPES, *HIDDEN_LINETYPES)
"""Linetypes of construction linework: axes, hidden edges, other positions of a moving part."""

CONSTRUCTION_LAYERS = ("DEFPOINTS", "DIM*", "CENTER*", "CONSTR*", "TITLE*", "BORDER*", "NOTE*", "TEXT*")
"""Layers whose linework is never a link."""

FRAME_NAMES = ("GROUND*", "FRAME*", "FIXED*", "BASE*", "GESTELL*", "BATI*", "TELAIO*", "BASTIDOR*")
"""Layers and blocks whose linework is the frame, in English, German, French, Italian and Spanish."""

PITCH_LAYERS = ("PITCH*", "GEAR*")
"""Layers whose rings are pitch circles."""

SHORT_OF_COINCIDENCE = 10.0
"""A line shorter than this many tolerances t is a speck, not a link."""

WELD_GAP_OF_DIAGONAL = 1e-3
"""An end between t and this part of the diagonal from other linework is a near miss of a weld."""

GAP_OF_SIZE = 0.1
"""... if that is no more than this part of its line's own length."""

RIM_GAP_IN_DIAMETERS = 2.0
"""An end up to this many ring diameters short of a rim, or past a pin it runs through, is a near miss of that pin."""

TANGENT_ANGLE_DEGREES = 60.0
"""An end at a rim whose line points further than this from the centre is a tangent (a belt) and does not land."""

CROSS_OVERHANG_IN_RADII = 1.0
"""The lines of a centre cross end at most this many radii outside their ring."""

STROKE_ANGLES_DEGREES = (15.0, 75.0)
"""Hatch strokes of a frame symbol stand at an angle between these to their base line."""

STROKE_PARALLEL_DEGREES = 3.0
"""Strokes of one symbol are parallel within this angle."""

STROKE_OF_BASE = 0.5
"""A hatch stroke is at most this part of its base line long."""

STROKE_SHORT_OF_BASE = 0.5
"""A loose hatch stroke may stop short of its base by this part of its own height over the base."""

RIGHT_ANGLE_DEGREES = 0.5
"""Corners of a rectangle are square, and sides of an obround parallel, within this angle."""

DISC_OFFSET_OF_RADIUS = 0.25
"""A ring that holds another pin at least this part of its radius off its centre is a disc; nearer, the two rings were
meant to be on one centre."""

STACKED_OF_RADIUS = 1.5
"""Two pins whose centres lie nearer than this many times the greater ring's radius stand on one another."""

LABEL_LENGTH = 4
"""A text of at most this many characters may name a pin."""

LABEL_REACH_IN_DIAMETERS = 2.0
LABEL_REACH_IN_HEIGHTS = 2.5
"""A label lies within so many ring diameters, or so many text heights, of its pin; the greater reach counts."""

NOTE_REACH_IN_HEIGHTS = 8.0
"""A drive note without a name belongs to a link within this many text heights of it."""

NOTE_CLEARLY_NEARER = 0.5
"""... and only if it lies at most this part of the distance to the next nearest link away."""

ROUND_LOOP_LIKENESS = 3.0
"""The lines of such a loop differ in length by no more than this factor."""

ROUND_LOOP_PIECES = 10
"""A closed loop of at least this many short lines on one circle is a ring."""

ARROW_BARB_DEGREES = (5.0, 45.0)
"""The barbs of an arrow stand at an angle between these to its shaft."""

ARROW_BARB_OF_SHAFT = 0.6
"""The barbs of an arrow are at most this part of its shaft long."""

CHORD_ANGLE_DEGREES = 7.5
"""Arcs are replaced by chords of at most this angle when looking for neighbours (never when measuring)."""

# --- drawing: how a file is turned into plain shapes ---

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

SHOWN_AS_ZERO = 1e-9
"""A terminal report shows 0 for what lies below this part of the mechanism's greatest figure of its kind."""

CROSS_ANGLE_DEGREES = 30.0
"""The two lines of a centre cross stand at least at this angle to one another."""

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

NO_LABEL_LAYERS = ("DIM*", "TITLE*", "BORDER*")
"""Layers whose texts never name a pin."""

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

COORDINATE_LIMIT = 1e60
"""Figures beyond this are no coordinates but damage; what lies below can be squared and scaled without overflow."""

AMONG_LINKS_OF_DIAGONAL = 0.02
"""What lies within the box round a mechanism's pins, widened by this part of the diagonal, lies among its links."""

CORNER_OF_LINE = 0.5
"""The edges of a filled corner are at most this part of the lines it welds long."""

ARC_REACH_IN_SHAPES = 4.0
"""However large an arc, an end meets it only within this many shape tolerances."""

ARROW_HEAD_DEGREES = 10.0
"""A closed arrow head is in line with its shaft within this angle."""

STRAY_DIAGONALS = 100.0
"""A sheet counts as no more than this many times as large as the box round its rings."""

GUIDE_BESIDE_OF_WIDTH = 0.5
"""A guide beside a block lies no further from its side than this part of the block's width across the guide."""

GUIDE_GAP_OF_BLOCK = 0.5
"""A guide interrupted at a block stops short of it by no more than this part of the block's length along it."""

GUIDE_TURN_DEGREES = 0.5
"""A guide runs along a side of its block within this angle."""

GUIDE_LEVEL_OF_WIDTH = 0.05
"""The two pieces of an interrupted guide, and two rails, lie level within this part of the block's width."""

MOST_SLENDER_BLOCK = 40.0
"""A block or barrel is at most so many times as long as it is wide: a pin further from a side is not in its box."""

TANGENT_OF_RADIUS = 0.0025
"""Pitch circles that miss tangency by less than this part of the smaller radius were drawn to roll on one another:
radii typed to two decimals miss by 0.015 at worst."""

ROLLING_OF_RADIUS = 0.03
"""... up to this part they are read as rolling, with a finding,"""

NEAR_TANGENT_OF_RADIUS = 0.15
"""... and up to this part they are not read as rolling but reported, where one of them rolls on nothing else."""

RACK_PARALLEL_DEGREES = 0.5
"""A slide runs along a rack within this angle."""

SMOOTH_JOINT_DEGREES = 3.0
"""Where a line passes into an arc with less of a bend than this, its outline has no corner there."""

TELESCOPE_ACROSS = 1e-6
"""Two pins whose joining line is square to a slide within this part are brought neither apart nor together by it."""

GUIDE_LOOKED_FOR_IN_BLOCKS = 4.0
"""A block without a guide says how far off the nearest parallel line is, within so many of its half diagonals."""

ON_AXIS_OF_REACH = 1e-3
"""The pins of a telescope lie on its axis within this part of their distance."""

BLOCK_IN_SLOT_RADII = 4.0
"""The ends of a block in a slot lie within this many half widths of the slot from its pin."""

FORK_PAST_RADII = 3.0
"""The lines of a fork run on past its pin's ring by a ring's diameter: this many radii from the centre."""

FORK_LIKENESS = 1.25
"""The lines of a fork that is not joined at one end differ in length by no more than this factor."""

HOLE_OF_BAR = 0.75
"""The holes of a bar are narrower than this part of it; a pin that fills its slot is wider."""

EMPTY_GUIDE_IN_DIAMETERS = 6.0
"""A frame line that holds nothing, within so many ring diameters of a pin with one link, may be its forgotten guide."""

WELD_ARC_DEGREES = (30.0, 200.0)
"""A weld mark is an arc that sweeps between these angles about the end of a line, from its neighbour to the line."""

WELD_ARC_OFF_CENTRE = 0.15
"""The centre of a weld mark's arc lies within this part of its radius of the line's end."""

WELD_ARC_OF_LINE = 0.3
"""The radius of a weld mark's arc is at most this part of its line."""

UNREAD_SHAPES_LIMIT = 3000
"""On a sheet without a linkage that holds more strands than this nobody drew a kinematic symbol to be named."""

SLEEVE_WIDTH_OF_LENGTH = 1.5
"""The two lines of a sleeve lie no further apart than so many times their length."""

SLEEVE_LIKENESS = 0.2
"""The two lines of a sleeve differ in length, and are shifted along one another, by no more than this part of it."""

SLEEVE_STROKES = 2
"""A line beside a rod on which so many other lines stand may be hatched: one side of a sleeve."""

BAR_LENGTH_OF_WIDTH = 3.0
"""An outline that is symmetric about its long axis and at least so many times as long as it is wide is a bar."""

BUSH_GAPS_ALIKE = 2.0
"""Of a rectangle inside another round the same pin: the gaps along and across are alike up to this factor, or it is no
bush but a block with room to slide."""

CENTRE_MARK_OF_BLOCK = 1.5
"""Two lines that cross at a block's pin are centre marks where they are at most so many times as long as the block."""

SHARED_SIDE_OF_BLOCK = 1.5
"""A line that is one side of a block and its guide as well is at least so many times as long as that side."""

PISTON_BORES = 2.0
"""A line across between two frame lines is a piston where both are at least so many times as long as it is."""

PISTON_OF_BORE = 0.05
"""So thick is a piston that is drawn as a single line taken to be, as a part of its length."""

ROUNDING_OF_BLOCK = 0.5
"""The corners of a block are rounded with at most this part of the straight part of its shortest side."""

FORK_CLEARANCE_OF_RADIUS = 1.5
"""The lines of a fork that is joined at one end lie no further from its pin's centre than so many radii."""

ACCEPTED_WITHIN_OF_DIAGONAL = 5e-4
"""An accepted finding is found again within this part of the sheet's diagonal: a drawing that was saved anew with two
decimals, in inches, moves its ends by as much; another place lies further off."""

# --- exchange and linework rules ---

NESTED_DEEP = 4
"""Blocks in blocks so deep (the reference on the sheet counts as one) are told of: libraries of parts nest two or three
deep, and what explodes a drawing step by step is commonly stopped after that (common practice, no source)."""

DOUBLES_TOLD = 2
"""More lines drawn twice than this are one finding: a sheet that was pasted onto itself doubles every line."""

EXPECTED_RELATIVE = 5e-3
"""So far, as a part of its figure, an expected speed or ratio may be off where no tolerance is stated with it: stated
figures are commonly rounded to three digits."""

FINITE_STEP_RADIANS = 0.03
"""A finite step turns the fastest link so far, a second one twice as far: enough for the square of it, by which a
linkage that locks stays open, to stand clear of lengths typed to two decimals."""

FINITE_STEP_TURNS = 12
"""Newton's method closes a linkage that can be closed in four or five turns; one that cannot is left after so many."""

STEPPED_LINKS = 80
STEPPED_FREEDOMS = 4
"""Finite steps are taken of linkages of at most so many links and freedoms at the pose; larger ones are not judged."""

NEVER_PLOTTED = "DEFPOINTS"
"""The layer that drafting programs make for the points of dimensions and never plot (from memory, common practice)."""

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

COMPARED_ALLOWANCE_PERCENT = 0.1
"""A speed may change by so many per cent before two drawings count as different, where nothing else is stated: less
than what dimensions to a tenth of a millimetre do to a crank of 60 mm."""

LONE_FORCE_MOBILITY = 3
"""A lone 'F = 12' is a force and not a mobility: linkages of more freedoms than this are seldom drawn."""

DENSE_LINKS = 60
"""A mechanism of at most so many links is solved by one matrix for all of it; larger ones a few links at a time."""

STILL_OF_BORDER = 1e-9
"""A group of links whose constraints stand to it at a cosine below this leaves them to its neighbours: rounding error
has added up to 1e-12 in lattices of 5,000 links."""

MOST_PUT_OFF = 60
"""Links that follow their neighbours weakly are put off and solved together with these, up to so many at once."""

TALLEST_MOTION = 1e150
"""Motions of long lever chains are scaled down as they pass this, long before they overflow."""

SNAP_REACH_IN_GAPS = 3.0
"""An end is snapped along its own line to the line it misses within so many gaps; a shallower meeting to the nearest
point."""

SNAP_OF_COINCIDENCE = 0.1
"""Places to snap to are written to this part of the coincidence tolerance, so that an end typed there meets."""

# --- lengths and units that the sheet states ---

FRACTION_STEP = 1.0 / 16.0
"""A length in fractions of an inch is rounded to sixteenths, or finer where its own fraction is (common practice)."""

MOST_REPEATS = 12
"""'12x60' means twelve parts of 60; where the first figure is greater it may be a length as well ('60x40')."""

LIMITS_ALIKE = 1.5
"""The two limits of one size, one over the other, differ by no more than this factor; else the one is divided."""

COMPARED_OF_SIZE = 2e-5
"""Places and lengths of a mechanism that differ by no more than this part of its size, nor by more than the tolerances
of the two drawings, are equal: on a sheet of hundreds of mechanisms the sheet's tolerance says little about one."""

COMPARED_FLOAT = 1e-12
"""Rounding in the computer when a sheet is turned, over its greatest coordinate."""

MIX_UP_DIGITS = 0.05
"""A written figure names a factor such as 25.4 only where half a unit of its last digit is at most this part of it."""

STATED_NOISE = 1e-9
"""Rounding in the computer, as a part of what is measured, by which it may pass the bounds of a written figure."""

SAME_RATE_RELATIVE = 1e-8
"""A drive written anew with nine figures is the same within this part of its rate."""

LIMIT_RELATIVE = 1e-4
"""A speed or ratio is beyond its limit where it passes it by more than this part: coordinates typed to two decimals
move speeds by as much on lengths of 50 mm, and a limit is often the nominal speed itself."""

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

LOOP_FIRM = 3e-3
"""What a large linkage's loop equations say with less weight than this, once others are solved, is settled last:
coordinates typed to decimals leave up to 3e-4 of an equation that repeats others."""

LOOP_NOISE = 1e-9
"""... and below this it is rounding error."""

NEARBY_JOINTS = 8
"""In a large mechanism a motion is judged against the fastest within so many joints."""

POINT_OF_DIAGONAL = 0.1
"""A dimension with a single point (an ordinate) is taken to be this part of the sheet's diagonal in size."""

COMPARED_SNAP_OF_REACH = 1e-3
"""A sheet that is turned or moved by less than this part of the tolerance is not turned or moved."""

TRUST_LINKS = 80
"""How far speeds can be trusted is worked out for mechanisms of at most so many links: its cost grows with the cube."""

LOW_TRANSMISSION_DEGREES = 40.0
"""A transmission angle below this makes forces and wear large (common practice, no source)."""

NEAR_DEAD_CENTRE_DEGREES = 5.0
"""Links within this angle of a dead centre are near it: less than a tenth of a push (the sine of the angle) turns the
link that is pushed there (common practice, no source)."""

DOUBTFUL_SPEED_RELATIVE = 0.01
"""A speed that may be off by more than this part of itself is doubtful: stated speeds are rounded to three figures."""

SPEED_OF_FASTEST = 0.01
"""A speed below this part of the greatest of its kind is held against that part: one near zero is off by much of itself
without being of any weight."""

CLIPPED_STROKE_REACH = 1.5
"""A loose line within so many lengths of a frame symbol's stroke, parallel to it and no longer, is one of its strokes
that was clipped: the strokes of a hatch stand about as far apart as they are long."""

EXPLODED_LABELS = 3
EXPLODED_STROKES = 3
EXPLODED_LETTER_IN_DIAMETERS = 3.0
"""At so many pins at least, and half of all, stand so many strokes of letters at least, no line or polyline of them
longer than so many ring diameters: labels were exploded into lines."""

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

BOUNDS_SHOWN_OF = 40
"""On a sheet of at most so many mechanisms what each speed may be off by is shown, however small."""

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

RIGID_TRIANGLE = 3
"""Three bars pinned at their ends are a usual way to draw one link, and no locked part is told of."""
