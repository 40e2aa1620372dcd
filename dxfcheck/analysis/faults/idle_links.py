"""Links whose spin or slide moves nothing else: a roller, an arm that hangs free, a rod with a slide at both ends.

A link has such a motion where its own joints, with all other links held, do not hold it. Source: passive or redundant
freedom, Norton, Design of Machinery, ch. 2 (from memory).
"""

from __future__ import annotations

import numpy as np

from dxfcheck.analysis.freedom.constraints import CELLS, ROWS, Body
from dxfcheck.analysis.results import IdleLink
from dxfcheck.analysis.speeds.velocity import Motion, rate_row
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.tolerances.analysis import IDLE_RELATIVE

__all__ = ["idle_links"]

FEWEST_LINKS = 3
"""A single moving link moves nothing else because there is nothing else: it is the mechanism itself."""


def idle_links(linkage: Linkage, motion: Motion) -> tuple[IdleLink, ...]:
    """Every link that is not settled and that its own joints, and the drives taken, leave a motion of its own."""
    if len(linkage.links) < FEWEST_LINKS:
        return ()
    joints: dict[int, list[Joint]] = {link: [] for link, settled in enumerate(motion.settled) if not settled}
    for joint in linkage.joints:
        for link in (joint.first, joint.second):
            if link in joints:
                joints[link].append(joint)
    found = [_idle(linkage, motion, link, around) for link, around in joints.items()]
    return tuple([each for each in found if each is not None])


def _idle(linkage: Linkage, motion: Motion, link: int, joints: list[Joint]) -> IdleLink | None:
    """What the link may do while all others are held, None where that is nothing or it hangs on the frame alone."""
    if all(linkage.frame in (joint.first, joint.second) for joint in joints):
        return None
    rows = [row for joint in joints for row in _rows(joint, link, motion.bodies)]
    rows += _driven(linkage, motion, link)
    _, values, vectors = np.linalg.svd(np.array(rows), full_matrices=True)
    rank = int(np.count_nonzero(values > IDLE_RELATIVE * values[0]))
    if rank == len(vectors):
        return None
    turn, across, up = max(vectors[rank:].tolist(), key=lambda vector: abs(vector[0]))
    turns, body = abs(turn) > IDLE_RELATIVE, motion.bodies[link]
    return IdleLink(link, len(vectors) - rank, turns, _pin_at(linkage, body, across, up, turn) if turns else None)


def _rows(joint: Joint, link: int, bodies: list[Body]) -> list[list[float]]:
    """The joint's constraints over the unknowns of one of its links."""
    kind = "pin" if joint.full and joint.kind == "rolling" else joint.kind
    cells = CELLS[kind]
    rows = [[0.0, 0.0, 0.0] for _ in range(1 + cells[-1][0])]
    values = ROWS[kind](joint, bodies[link], 1.0 if link == joint.second else -1.0, bodies)
    for (row, column), value in zip(cells, values, strict=True):
        rows[row][column] = value
    return rows


def _driven(linkage: Linkage, motion: Motion, link: int) -> list[list[float]]:
    """The drives taken, over the unknowns of one link."""
    first = 3 * (link - (link > linkage.frame))
    rows = []
    for number in motion.taken:
        drive = linkage.drives[number]
        if link in (drive.link, drive.against):
            cells = dict(rate_row(drive, linkage, motion.bodies).cells)
            rows.append([cells.get(first + part, 0.0) for part in range(3)])
    return rows


def _pin_at(linkage: Linkage, body: Body, across: float, up: float, turn: float) -> int | None:
    """The pin about which a link turns with that motion."""
    pole = body.centre + 1j * complex(across, up) * body.size / turn
    near = (number for number, pin in enumerate(linkage.pins) if abs(pin.at - pole) <= IDLE_RELATIVE * body.size)
    return next(near, None)
