"""What the analysis of one linkage yields; None stands for what is not known, never 0."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, NamedTuple

from dxfcheck.geometry import Point

__all__ = [
    "Advantage",
    "Analysis",
    "DeadCentre",
    "DependentJoints",
    "DriveVerdict",
    "FiniteMotion",
    "FreePart",
    "IdleLink",
    "JointMotion",
    "LinkMotion",
    "LockedPart",
    "Mobility",
    "PinMotion",
    "RigidParts",
    "SettlingDrive",
    "SpeedBounds",
    "Transmission",
]


@dataclass(frozen=True, slots=True, kw_only=True)
class Mobility:
    """Gruebler's count M = 3 (n - 1) - 2 f - h and the freedom at the drawn pose.

    ``links`` counts the frame. ``at_pose`` is columns minus rank of the velocity constraints.
    """

    count: int
    links: int
    full_joints: int
    half_joints: int
    at_pose: int

    @property
    def redundant(self) -> int:
        """Freedoms at the pose beyond the count: constraints that repeat one another there; 0 where there are none."""
        return max(0, self.at_pose - self.count)


@dataclass(frozen=True, slots=True, kw_only=True)
class LinkMotion:
    """Motion of one link against the frame: rad/s counter-clockwise, and its pole (instant centre).

    ``determined`` says whether the drives settle this link's motion. The pole is None for a link at rest, one that
    only translates, or one that is not determined.
    """

    angular_velocity: float | None
    pole: Point | None
    determined: bool


@dataclass(frozen=True, slots=True, kw_only=True)
class PinMotion:
    """Velocity of one pin against the frame, length units a second as vx + i vy."""

    velocity: Point | None


@dataclass(frozen=True, slots=True, kw_only=True)
class JointMotion:
    """Relative motion at one joint: the second link's against the first's.

    ``relative_angular_velocity`` rad/s; ``slide_speed`` along the joint's direction; ``rubbing_speed`` the pin's
    radius times the size of the relative angular velocity (Khurmi & Gupta, Theory of Machines, ch. 7).
    """

    relative_angular_velocity: float | None
    slide_speed: float | None
    rubbing_speed: float | None


@dataclass(frozen=True, slots=True, kw_only=True)
class DriveVerdict:
    """What became of one drive at the pose.

    ``outcome`` is 'taken'; 'repeats' (it follows from the drives before it and agrees with them); 'conflict' (it
    contradicts them); or 'at limit' (the constraints alone hold the driven link still at this pose: it cannot be
    driven from there); 'not judged' in an assembly that nothing ties to the frame. ``implied`` is the rate that the
    constraints and the drives before it give, where they do.
    """

    outcome: str
    implied: float | None


@dataclass(frozen=True, slots=True, kw_only=True)
class DeadCentre:
    """Two links in line at their common pin, so that one cannot drive the other there.

    ``pin`` is the pin between them; ``links`` the two links; ``driven`` the link that cannot be driven (the follower
    side), None where it is not clear; ``angle`` what is missing from a straight line, radians. Where it is ``square``
    the push stands square to a slide or slot, so that the two are not seen in line: ``angle`` is then what is missing
    from that square.
    """

    pin: int
    links: tuple[int, int]
    driven: int | None
    angle: float
    square: bool = False


class Transmission(NamedTuple):
    """At a pin one link pushes another; indices. ``angle`` is the transmission angle, radians, 0 to pi/2.

    ``square`` says that it is taken to the normal of a slide or slot: the pressure angle is then pi/2 less it.
    """

    pin: int
    pusher: int
    pushed: int
    angle: float
    square: bool


class Advantage(NamedTuple):
    """How a driven turn or slide compares with that of a link held by the frame: drive speed over output speed.

    ``link`` is the output; ``turns`` says that it turns on the frame, else it slides there. ``ratio`` is the size of
    drive over output; None where the output stands still: the advantage is then without limit. Where both turn or both
    slide it is a plain number, else a length (drive turns, output slides: radians to a length unit) or its inverse.
    """

    link: int
    turns: bool
    ratio: float | None


@dataclass(frozen=True, slots=True, kw_only=True)
class FiniteMotion:
    """What small finite steps showed.

    ``verdict`` is 'through' (every freedom of the pose is there after the step too), 'momentary' (some are not) or
    'locked' (no step closes). ``turn`` is how far the fastest link turned, radians (or slid, over its size), and
    ``opening`` what was then left open where the loop is told most, in the drawing's unit. ``misfit`` is the error of
    one length that would open it so, ``limit`` what was taken for the drawing's own rounding, both in that unit.
    ``freedom`` is the freedom at the pose that was reached, 0 where none was.
    """

    verdict: Literal["through", "momentary", "locked"]
    turn: float
    opening: float
    misfit: float
    limit: float
    freedom: int


@dataclass(frozen=True, slots=True, kw_only=True)
class SpeedBounds:
    """By how much each speed may be off, parallel to the linkage's own links, pins and joints.

    ``resolution`` is what each coordinate may be off by, in the drawing's unit. ``links`` rad/s; ``pins`` the size of
    the velocity, length units a second; ``turns`` the joints' relative turning, rad/s, and ``slides`` their sliding,
    length units a second (0.0 at a joint that does not slide).
    """

    resolution: float
    links: tuple[float, ...]
    pins: tuple[float, ...]
    turns: tuple[float, ...]
    slides: tuple[float, ...]


class RigidParts(NamedTuple):
    """Links that form rigid sub-structures at the pose, whatever the drives do; indices, ascending.

    ``with_frame`` are the moving links that are rigid with the frame; ``others`` groups of two or more links that are
    rigid in themselves and move.
    """

    with_frame: tuple[int, ...]
    others: tuple[tuple[int, ...], ...]


class DependentJoints(NamedTuple):
    """One redundant constraint: a minimal set of joints whose constraints depend on one another; indices, ascending.

    ``joints_to_go`` are the joints of the set, and ``links_to_go`` the links, each of which alone can be taken away
    without adding a freedom, and the constraint is then redundant no longer.
    """

    joints: tuple[int, ...]
    joints_to_go: tuple[int, ...]
    links_to_go: tuple[int, ...]


class FreePart(NamedTuple):
    """Links, joined to one another, that the drives leave free; indices, ascending.

    ``freedoms`` is the number of their motions still free. ``turns`` are the links, ``slides`` the joints on the frame,
    any one of which would settle the whole part if driven against the frame, those on the frame's own pins first; none
    where there is more than one freedom.
    """

    links: tuple[int, ...]
    freedoms: int
    turns: tuple[int, ...]
    slides: tuple[int, ...]


class LockedPart(NamedTuple):
    """Moving links that are rigid with one another, and with the frame where ``with_frame``; indices, ascending.

    ``redundant`` is how many of the constraints among them are more than hold them still. ``links_to_go`` are the
    links, each of which alone, taken out, lets the others move where nothing is redundant; where something is, each of
    which alone takes a redundant constraint away. None where there are more links than are tried.
    """

    links: tuple[int, ...]
    with_frame: bool
    redundant: int
    links_to_go: tuple[int, ...]


class IdleLink(NamedTuple):
    """A link with a motion of its own that moves no other link; an index.

    ``freedoms`` is how many such motions it has. ``turns`` says that one of them turns it; it then turns about ``pin``,
    where that is a pin of the linkage.
    """

    link: int
    freedoms: int
    turns: bool
    pin: int | None


class SettlingDrive(NamedTuple):
    """A drive that would settle what is free: ``link`` against ``against``, indices.

    ``joint`` is the slide that it runs along, None for one that turns.
    """

    link: int
    against: int
    joint: int | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Analysis:
    """Everything worked out for one linkage at the drawn pose.

    ``links``, ``pins``, ``joints`` and ``drives`` run parallel to the linkage's own. ``loops`` are link indices, one
    tuple for each independent loop. ``solved`` is True where every link's motion is determined by drives that agree.
    ``disagreement`` is the greatest difference between the two formulations, relative to the greatest speed; None
    where nothing was solved. ``dead_centres`` are (joint-line) places where a link cannot be driven by its neighbour.
    ``rank_gap`` holds the smallest singular value that counted and the greatest that was taken for zero, both over the
    greatest of all (0.0 where there is none); a first below RANK_DOUBTFUL makes the freedom at the pose doubtful.
    None where there are no constraints.
    ``near_dead_centres`` are those within NEAR_DEAD_CENTRE_DEGREES that are no dead centres yet. ``transmissions`` say
    how links push one another away from the drive, ``advantages`` how the drive's speed compares with the outputs'.
    ``finite`` says what becomes of freedoms beyond the count after a small step; None where there are none, or where it
    could not be judged. ``bounds`` say by how much speeds may be off; None where they were not worked out.
    ``rigid_parts`` and ``dependent_joints`` are worked out where the freedom at the pose differs from the count or the
    count is not above 0, ``rigid_parts`` also where not all is solved or a joint of a solved linkage stands still;
    ``free_parts`` where a grounded linkage is not solved. ``locked_parts`` are the rigid parts one by one, with what
    would free them. ``idle_links`` are links whose free motion moves nothing else; ``settling_drives`` the drives that
    would together settle all else that is free, () where it is settled or none were found.
    """

    mobility: Mobility
    loops: tuple[tuple[int, ...], ...]
    links: tuple[LinkMotion, ...]
    pins: tuple[PinMotion, ...]
    joints: tuple[JointMotion, ...]
    drives: tuple[DriveVerdict, ...]
    solved: bool
    disagreement: float | None
    dead_centres: tuple[DeadCentre, ...] = ()
    rank_gap: tuple[float, float] | None = None
    near_dead_centres: tuple[DeadCentre, ...] = ()
    transmissions: tuple[Transmission, ...] = ()
    advantages: tuple[Advantage, ...] = ()
    finite: FiniteMotion | None = None
    bounds: SpeedBounds | None = None
    rigid_parts: RigidParts | None = None
    dependent_joints: tuple[DependentJoints, ...] = ()
    free_parts: tuple[FreePart, ...] = ()
    locked_parts: tuple[LockedPart, ...] = ()
    idle_links: tuple[IdleLink, ...] = ()
    settling_drives: tuple[SettlingDrive, ...] = ()
