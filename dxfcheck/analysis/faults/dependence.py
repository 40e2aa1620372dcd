"""Which constraints repeat one another at the drawn pose, and what can go without adding a freedom.

A combination of constraints that comes to nothing is a state of self-stress: forces at the joints that balance on every
link without any load. A redundant constraint is one such state; the joints that carry force in it are those whose
constraints depend on one another, and with the states combined so that each holds as few as possible, none of its
joints can be left out: the set is minimal. A link carries in the states some combinations of the forces at its own
places. Taking it away takes three unknowns and its constraints; the freedom stays as it is where the forces that it can
carry are all that balance on it. Source: C.R. Calladine, Buckminster Fuller's tensegrity structures and Clerk Maxwell's
rules for the construction of stiff frames, Int. J. Solids Structures 14, 1978 (from memory).
"""

from __future__ import annotations

from itertools import accumulate

import numpy as np

from dxfcheck.analysis.freedom.constraints import Body, constraint_matrix, rank_of, rank_tolerance, rows_of_joint
from dxfcheck.analysis.freedom.elimination import Stage, split_with_care, stages
from dxfcheck.analysis.loops.loops import places_of
from dxfcheck.analysis.results import DependentJoints
from dxfcheck.analysis.topology import Topology
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import DENSE_LINKS, RANK_GREATEST, RANK_NOISE, STRESS_OF_TOLERANCE

__all__ = ["dependent_joints"]

Stress = dict[int, float]
"""The force that each constraint carries in a state of self-stress, by the constraint's number; the greatest is 1."""


Force = list[tuple[int, float]]
"""One component of the force on a link at one of its places: constraints by number, and the sense of each there."""


def dependent_joints(linkage: Linkage, topology: Topology, bodies: list[Body]) -> tuple[DependentJoints, ...]:
    """One for each redundant constraint: a minimal set of joints whose constraints depend on one another.

    With the single joints of it, and the single links at these, whose removal leaves the freedom as it is and the
    constraint no longer redundant.
    """
    least = STRESS_OF_TOLERANCE * rank_tolerance(linkage)
    stresses = _sparsest(_stresses(linkage, topology, bodies), least)
    starts = _starts(topology)
    joint_of = [joint for joint, _ in enumerate(topology.joints) for _ in range(starts[joint + 1] - starts[joint])]
    touched = [sorted({joint_of[row] for row in stress}) for stress in stresses]
    forces = _forces_on_links(topology, starts)
    acting = _acting(stresses)
    ends = [(joint.first, joint.second) for joint in topology.joints]
    members = sorted({joint for joints in touched for joint in joints})
    joints_to_go = {
        joint
        for joint in members
        if _holds_all([[(row, 1.0)] for row in range(starts[joint], starts[joint + 1])], 0, stresses, acting, least)
    }
    links_to_go = {
        link
        for link in {link for joint in members for link in ends[joint]} - {topology.frame}
        if _holds_all(forces[link], BALANCE, stresses, acting, least)
    }
    return tuple(
        [
            DependentJoints(
                joints=tuple(joints),
                joints_to_go=tuple([joint for joint in joints if joint in joints_to_go]),
                links_to_go=tuple(
                    [
                        link
                        for link in sorted({link for joint in joints for link in ends[joint]} & links_to_go)
                        if _rank_of(forces[link], [stress], least)
                    ]
                ),
            )
            for joints, stress in zip(touched, stresses, strict=True)
        ]
    )


BALANCE = 3
"""So many equations of balance bind the forces on one link in the plane."""


def _acting(stresses: list[Stress]) -> dict[int, list[int]]:
    """In which states each constraint carries force."""
    acting: dict[int, list[int]] = {}
    for number, stress in enumerate(stresses):
        for row in stress:
            acting.setdefault(row, []).append(number)
    return acting


def _holds_all(
    forces: list[Force], bound: int, stresses: list[Stress], acting: dict[int, list[int]], least: float
) -> bool:
    """Whether the states hold every combination of some forces, but for so many that must balance."""
    numbers = sorted({number for force in forces for row, _ in force for number in acting.get(row, ())})
    return _rank_of(forces, [stresses[number] for number in numbers], least) == len(forces) - bound


def _starts(topology: Topology) -> list[int]:
    """The number of each joint's first constraint, and behind them that of all."""
    return list(accumulate([rows_of_joint(joint.acts_as) for joint in topology.joints], initial=0))


def _forces_on_links(topology: Topology, starts: list[int]) -> list[list[Force]]:
    """Every component of force that may act on each link; a pin's joints act on its first link all at one place."""
    forces: list[list[Force]] = [[] for _ in range(topology.links)]
    for place in places_of(topology):
        at_place: dict[int, list[Force]] = {}
        for number in place.joints:
            joint = topology.joints[number]
            rows = range(starts[number], starts[number + 1])
            for link, sense in ((joint.first, -1.0), (joint.second, 1.0)):
                components = at_place.setdefault(link, [[] for _ in rows])
                for component, row in zip(components, rows, strict=True):
                    component.append((row, sense))
        for link, components in at_place.items():
            forces[link] += components
    return forces


def _rank_of(forces: list[Force], stresses: list[Stress], least: float) -> int:
    """How many independent combinations of some forces the states of self-stress hold."""
    table = [[sum([sense * stress.get(row, 0.0) for row, sense in force]) for force in forces] for stress in stresses]
    kept = [line for line in table if any(line)]
    return int(np.count_nonzero(np.linalg.svd(np.array(kept), compute_uv=False) > least)) if kept else 0


def _stresses(linkage: Linkage, topology: Topology, bodies: list[Body]) -> list[Stress]:
    """The states of self-stress: the left null space of the constraints, by one matrix or a few links at a time."""
    if topology.links > DENSE_LINKS:
        return _stresses_of_stages(list(stages(linkage, topology, bodies, split_with_care)), _starts(topology))
    matrix = constraint_matrix(linkage, topology, bodies)
    if not matrix.size:
        return []
    left, singular, _ = np.linalg.svd(matrix, full_matrices=True)
    values: list[float] = singular.tolist()
    rank = len(values)
    if values[-1] <= RANK_GREATEST * values[0]:
        rank = rank_of(values, rank_tolerance(linkage))
    return [dict(enumerate(stress)) for stress in left[:, rank:].T.tolist()]


def _stresses_of_stages(taken: list[Stage], starts: list[int]) -> list[Stress]:
    """What comes to nothing in each step, traced back through the steps before it to the joints' own constraints."""
    stresses: list[Stress] = []
    for last, stage in enumerate(taken):
        found: list[Stress] = [{} for _ in stage.split.dependent]
        waiting = {last: stage.split.dependent} if found else {}
        while waiting:
            number = max(waiting)
            parts = waiting.pop(number)
            column = 0
            for joint in taken[number].joints:
                for row in range(starts[joint], starts[joint + 1]):
                    for stress, part in zip(found, parts[:, column].tolist(), strict=True):
                        stress[row] = part
                    column += 1
            for before in taken[number].parts:
                made_by = taken[before].split.left_by
                share = parts[:, column : column + len(made_by)]
                column += len(made_by)
                if abs(share).max() > RANK_NOISE:
                    waiting[before] = share @ made_by
        stresses += found
    return stresses


def _sparsest(stresses: list[Stress], least: float) -> list[Stress]:
    """The same states combined so that each holds as few constraints as possible, and no force below ``least``.

    Elimination: one constraint of each state is brought out of all others. What two states share beyond that cannot be
    spared, since without that constraint the rest of each set is independent.
    """
    states = list(stresses)
    for number in range(len(states)):
        pivot = max(states[number], key=lambda row, state=states[number]: abs(state[row]))  # type: ignore[misc]
        state = states[number] = _scaled(states[number], pivot)
        for other in states:
            factor = other.pop(pivot, 0.0) if other is not state else 0.0
            if factor:
                for row, part in state.items():
                    if row != pivot:
                        other[row] = other.get(row, 0.0) - factor * part
    return [_trimmed(state, least) for state in states]


def _scaled(state: Stress, pivot: int) -> Stress:
    """The state with a force of 1 at one constraint, and without rounding error."""
    scale = state[pivot]
    return {row: part / scale for row, part in state.items() if abs(part) > RANK_NOISE * abs(scale)}


def _trimmed(state: Stress, least: float) -> Stress:
    greatest = max(map(abs, state.values()))
    return {row: part / greatest for row, part in sorted(state.items()) if abs(part) > least * greatest}
