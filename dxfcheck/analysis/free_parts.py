"""Which links the drives leave free, and which single drive against the frame would settle them."""

from __future__ import annotations

import numpy as np

from dxfcheck.analysis.constraints import Matrix
from dxfcheck.analysis.results import FreePart
from dxfcheck.analysis.velocity import Motion
from dxfcheck.geometry import cross, dot
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances import DRIVES_FREELY, FREE_RELATIVE

__all__ = ["free_parts"]


def free_parts(linkage: Linkage, motion: Motion) -> tuple[FreePart, ...]:
    """The links that are not settled, in parts that hang together without the settled ones; in order of their links."""
    if all(motion.settled):
        return ()
    return tuple([_part(linkage, motion, links) for links in _parts(linkage, motion.settled)])


def _parts(linkage: Linkage, settled: list[bool]) -> list[tuple[int, ...]]:
    around: list[list[int]] = [[] for _ in linkage.links]
    for joint in linkage.joints:
        if not settled[joint.first] and not settled[joint.second]:
            around[joint.first].append(joint.second)
            around[joint.second].append(joint.first)
    met = list(settled)
    parts = []
    for first in range(len(met)):
        if met[first]:
            continue
        met[first] = True
        part = [first]
        for link in part:
            for other in around[link]:
                if not met[other]:
                    met[other] = True
                    part.append(other)
        parts.append(tuple(sorted(part)))
    return parts


def _part(linkage: Linkage, motion: Motion, links: tuple[int, ...]) -> FreePart:
    columns = [3 * link + part for link in links for part in range(3)]
    _, values, motions = np.linalg.svd(_upper(motion.free[:, columns]), full_matrices=False)
    freedoms = int(np.count_nonzero(values > FREE_RELATIVE * values[0]))
    if freedoms != 1:
        return FreePart(links, freedoms, (), ())
    only = dict(zip(links, motions[0].reshape(-1, 3).tolist(), strict=True))
    return FreePart(links, 1, _turns(linkage, only), _slides(linkage, motion, only))


def _upper(free: Matrix) -> Matrix:
    """As many rows as there can be freedoms: the same singular values from the smaller triangle."""
    rows, columns = free.shape
    if rows <= columns:
        return free
    return np.asarray(np.linalg.qr(free, mode="r"), dtype=float)


def _turns(linkage: Linkage, only: dict[int, list[float]]) -> tuple[int, ...]:
    """The links that turn in the one free motion, those pinned on the frame first."""
    fastest = max([abs(speed) for speeds in only.values() for speed in speeds])
    turning = [link for link, (turn, _, _) in only.items() if abs(turn) > DRIVES_FREELY * fastest]
    on_frame = {link for pin in linkage.pins if pin.fixed for link in pin.links}
    return tuple(sorted(turning, key=lambda link: (link not in on_frame, link)))


def _slides(linkage: Linkage, motion: Motion, only: dict[int, list[float]]) -> tuple[int, ...]:
    """The slides on the frame that run in the one free motion."""
    fastest = max([abs(speed) for speeds in only.values() for speed in speeds])
    running = []
    for number, joint in enumerate(linkage.joints):
        link = joint.first if joint.second == linkage.frame else joint.second
        if joint.kind != "slide" or linkage.frame not in (joint.first, joint.second) or link not in only:
            continue
        turn, across, up = only[link]
        arm = (joint.at - motion.bodies[link].centre) / motion.bodies[link].size
        along = joint.direction or 0j
        if abs(dot(complex(across, up), along) + turn * cross(arm, along)) > DRIVES_FREELY * fastest:
            running.append(number)
    return tuple(running)
