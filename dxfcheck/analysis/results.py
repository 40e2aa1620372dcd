"""What the analysis of one linkage yields; None stands for what is not known, never 0."""

from __future__ import annotations

from dataclasses import dataclass

from dxfcheck.geometry import Point

__all__ = ["Analysis", "DeadCentre", "DriveVerdict", "JointMotion", "LinkMotion", "Mobility", "PinMotion"]


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
class Analysis:
    """Everything worked out for one linkage at the drawn pose.

    ``links``, ``pins``, ``joints`` and ``drives`` run parallel to the linkage's own. ``loops`` are link indices, one
    tuple for each independent loop. ``solved`` is True where every link's motion is determined by drives that agree.
    ``disagreement`` is the greatest difference between the two formulations, relative to the greatest speed; None
    where nothing was solved. ``dead_centres`` are (joint-line) places where a link cannot be driven by its neighbour.
    ``rank_gap`` holds the smallest singular value that counted and the greatest that was taken for zero, both over the
    greatest of all (0.0 where there is none); a first below RANK_DOUBTFUL makes the freedom at the pose doubtful.
    None where there are no constraints.
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
