"""One linkage through the whole analysis: loops, freedom, drives, velocities, and the second opinion on them."""

from __future__ import annotations

from functools import partial

from dxfcheck.analysis.constraints import bodies_of, constraint_matrix, freedom_of, rank_tolerance
from dxfcheck.analysis.dead_centres import dead_centres
from dxfcheck.analysis.loop_equations import LoopSolution, solve_loops
from dxfcheck.analysis.loops import link_loops
from dxfcheck.analysis.mobility import count_mobility
from dxfcheck.analysis.motions import joint_motions, link_motions, pin_motions, unknown_motions
from dxfcheck.analysis.results import Analysis, DeadCentre, DriveVerdict
from dxfcheck.analysis.topology import topology_of
from dxfcheck.analysis.velocity import Motion, apply_drives
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.tolerances import AT_LIMIT_OF_BEND, AT_LIMIT_RELATIVE

__all__ = ["analyse"]


def analyse(linkage: Linkage) -> Analysis:
    """Mobility, loops, drives, velocities and dead centres of one linkage at the drawn pose.

    An ungrounded linkage is counted with its held link and gets no speeds; its drives are not judged.
    """
    topology = topology_of(linkage)
    bodies = bodies_of(linkage)
    freedom = freedom_of(constraint_matrix(linkage, topology, bodies), partial(rank_tolerance, linkage))
    at_pose = len(freedom.motions)
    mobility = count_mobility(linkage, at_pose)
    if not linkage.grounded:
        links, pins, joints = unknown_motions(linkage)
        return Analysis(
            mobility=mobility,
            loops=link_loops(topology),
            links=links,
            pins=pins,
            joints=joints,
            drives=(DriveVerdict(outcome="not judged", implied=None),) * len(linkage.drives),
            solved=False,
            disagreement=None,
            rank_gap=freedom.gap,
        )
    centres = dead_centres(linkage)
    limits = [_limit_of(drive, centres) for drive in linkage.drives]
    motion, verdicts = apply_drives(linkage, bodies, freedom.motions, limits)
    second = solve_loops(linkage, topology, motion.taken, at_pose) if motion.taken else None
    return Analysis(
        mobility=mobility,
        loops=link_loops(topology),
        links=link_motions(linkage, motion),
        pins=pin_motions(linkage, motion),
        joints=joint_motions(linkage, motion),
        drives=verdicts,
        solved=_is_solved(motion, verdicts),
        disagreement=None if second is None else _disagreement(motion, second),
        dead_centres=centres,
        rank_gap=freedom.gap,
    )


def _limit_of(drive: Drive, centres: tuple[DeadCentre, ...]) -> float:
    """The limit grows with the bend at a dead centre that may stop the drive; the driven link there drives itself."""
    bends = [centre.angle for centre in centres if centre.driven not in {drive.link, drive.against}]
    return max(AT_LIMIT_RELATIVE, AT_LIMIT_OF_BEND * max(bends, default=0.0))


_KEPT = frozenset({"taken", "repeats"})


def _is_solved(motion: Motion, verdicts: tuple[DriveVerdict, ...]) -> bool:
    return bool(verdicts) and all(motion.settled) and _KEPT.issuperset([verdict.outcome for verdict in verdicts])


def _disagreement(motion: Motion, second: LoopSolution) -> float:
    """Greatest difference between the two formulations over the greatest speed, among the settled links.

    Compared are every link's turn times its size, and the velocity of its centre: together they bound the difference
    at its pins.
    """
    differences, speeds = [0.0], [0.0]
    for link, body in enumerate(motion.bodies):
        if motion.settled[link]:
            turn, velocity = motion.turns[link], motion.centres[link]
            differences += [abs(turn - second.turns[link]) * body.size]
            differences += [abs(velocity - second.velocity(link, body.centre))]
            speeds += [abs(turn) * body.size, abs(velocity)]
    greatest = max(speeds)
    return max(differences) / greatest if greatest else max(differences)
