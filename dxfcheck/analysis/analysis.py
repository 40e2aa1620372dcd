"""One linkage through the whole analysis: loops, freedom, drives, velocities, and the second opinion on them."""

from __future__ import annotations

from dxfcheck.analysis.faults.faults import faults_of, faults_without_frame
from dxfcheck.analysis.freedom.constraints import bodies_of
from dxfcheck.analysis.freedom.freedom import freedom_at_pose
from dxfcheck.analysis.loops.loop_equations import LoopSolution, solve_loops
from dxfcheck.analysis.loops.loops import link_loops
from dxfcheck.analysis.mobility import count_mobility
from dxfcheck.analysis.pose.pose import bounds_of, finite_of, pose_of
from dxfcheck.analysis.pose.transmission import advantages
from dxfcheck.analysis.results import Analysis, DriveVerdict
from dxfcheck.analysis.speeds.motions import joint_motions, link_motions, pin_motions, unknown_motions
from dxfcheck.analysis.speeds.velocity import Motion, apply_drives
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage

__all__ = ["analyse"]


def analyse(linkage: Linkage, *, bounds_shown: bool = True) -> Analysis:
    """Mobility, loops, drives, velocities and quality of one linkage at the drawn pose.

    An ungrounded linkage is counted with its held link and gets no speeds; its drives are not judged. Where the bounds
    of its speeds are not shown, they are worked out only if the drawing is coarse.
    """
    topology = topology_of(linkage)
    bodies = bodies_of(linkage)
    freedom = freedom_at_pose(linkage, topology, bodies)
    at_pose = len(freedom.motions)
    mobility = count_mobility(linkage, at_pose)
    if not linkage.grounded:
        links, pins, joints = unknown_motions(linkage)
        found = faults_without_frame(linkage, topology, bodies, mobility, freedom.motions)
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
            rigid_parts=found.rigid_parts,
            dependent_joints=found.dependent_joints,
        )
    pose = pose_of(linkage)
    motion, verdicts = apply_drives(linkage, topology, bodies, freedom.motions, pose.dead_centres)
    second = solve_loops(linkage, topology, motion.taken, at_pose) if motion.taken else None
    solved = _is_solved(motion, verdicts)
    links, joints = link_motions(linkage, motion), joint_motions(linkage, motion)
    faults = faults_of(linkage, topology, mobility, freedom.motions, motion, solved=solved)
    return Analysis(
        mobility=mobility,
        loops=link_loops(topology),
        links=links,
        pins=pin_motions(linkage, motion),
        joints=joints,
        drives=verdicts,
        solved=solved,
        disagreement=None if second is None else _disagreement(motion, second),
        dead_centres=pose.dead_centres,
        rank_gap=freedom.gap,
        near_dead_centres=pose.near_dead_centres,
        transmissions=pose.transmissions,
        advantages=advantages(linkage, links, joints, [linkage.drives[number] for number in motion.taken]),
        finite=finite_of(linkage, bodies, freedom, mobility),
        bounds=bounds_of(linkage, topology, motion, wanted=bounds_shown) if solved else None,
        **faults._asdict(),
    )


_KEPT = frozenset({"taken", "repeats"})


def _is_solved(motion: Motion, verdicts: tuple[DriveVerdict, ...]) -> bool:
    return bool(verdicts) and all(motion.settled) and _KEPT.issuperset([verdict.outcome for verdict in verdicts])


def _disagreement(motion: Motion, second: LoopSolution) -> float:
    """Greatest difference between the two formulations among the settled links, over the greatest speed.

    Where all that is settled rests, that is the speed of what the drives move without settling it. Compared are every
    link's turn times its size, and the velocity of its centre: together they bound the difference at its pins.
    """
    differences, speeds = [0.0], [motion.fastest]
    for link, body in enumerate(motion.bodies):
        if motion.settled[link]:
            turn, velocity = motion.turns[link], motion.centres[link]
            differences += [abs(turn - second.turns[link]) * body.size]
            differences += [abs(velocity - second.velocity(link, body.centre))]
            speeds += [abs(turn) * body.size, abs(velocity)]
    greatest = max(speeds)
    return max(differences) / greatest if greatest else max(differences)
