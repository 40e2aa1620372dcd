"""Which links the drives leave free, and which single drive against the frame would settle them."""

from __future__ import annotations

import numpy as np

from dxfcheck.analysis.faults.joined import joined_groups
from dxfcheck.analysis.freedom.constraints import Matrix
from dxfcheck.analysis.results import FreePart
from dxfcheck.analysis.speeds.velocity import Motion
from dxfcheck.geometry import cross, dot
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import DRIVES_FREELY, FREE_RELATIVE, NEARBY_JOINTS

__all__ = ["free_parts"]


def free_parts(linkage: Linkage, motion: Motion) -> tuple[FreePart, ...]:
    """The links that are not settled, in parts that hang together without the settled ones; in order of their links."""
    if all(motion.settled):
        return ()
    parts = _parts(linkage, motion.settled)
    return tuple([_part(linkage, motion, links, alone=len(parts) == 1) for links in parts])


def _parts(linkage: Linkage, settled: list[bool]) -> list[tuple[int, ...]]:
    free = [link for link, is_settled in enumerate(settled) if not is_settled]
    pairs = [(joint.first, joint.second) for joint in linkage.joints]
    return joined_groups(free, [pair for pair in pairs if not any(settled[link] for link in pair)])


def _part(linkage: Linkage, motion: Motion, links: tuple[int, ...], *, alone: bool) -> FreePart:
    if alone and len(motion.free) > 1:
        return FreePart(links, len(motion.free), (), ())
    columns = [3 * link + part for link in links for part in range(3)]
    free = motion.free[:, columns]
    if motion.still_below is None:  # what rests does so exactly, and what moves may be slow in all of a motion
        greatest = abs(free).max(axis=1)
        free = free[greatest > 0.0] / greatest[greatest > 0.0, None]
    _, values, motions = np.linalg.svd(_upper(free), full_matrices=False)
    freedoms = int(np.count_nonzero(values > FREE_RELATIVE * values[0]))
    if freedoms != 1:
        return FreePart(links, freedoms, (), ())
    only = dict(zip(links, motions[0].reshape(-1, 3).tolist(), strict=True))
    firm = _firm(linkage, only)
    return FreePart(links, 1, _turns(linkage, only, firm), _slides(linkage, motion, only, firm))


def _upper(free: Matrix) -> Matrix:
    """As many rows as there can be freedoms: the same singular values from the smaller triangle."""
    rows, columns = free.shape
    if rows <= columns:
        return free
    return np.asarray(np.linalg.qr(free, mode="r"), dtype=float)


def _firm(linkage: Linkage, only: dict[int, list[float]]) -> dict[int, float]:
    """What each link must move with to be a good place for a drive, by the fastest within so many joints of it."""
    speeds = {link: max(map(abs, motion)) for link, motion in only.items()}
    pairs = [(joint.first, joint.second) for joint in linkage.joints if joint.first in only and joint.second in only]
    for _ in range(NEARBY_JOINTS):
        before = dict(speeds)
        for first, second in pairs:
            speeds[first] = max(speeds[first], before[second])
            speeds[second] = max(speeds[second], before[first])
    return {link: DRIVES_FREELY * speed for link, speed in speeds.items()}


def _turns(linkage: Linkage, only: dict[int, list[float]], firm: dict[int, float]) -> tuple[int, ...]:
    """The links that turn in the one free motion, those pinned on the frame first."""
    turning = [link for link, (turn, _, _) in only.items() if abs(turn) > firm[link]]
    on_frame = {link for pin in linkage.pins if pin.fixed for link in pin.links}
    return tuple(sorted(turning, key=lambda link: (link not in on_frame, link)))


def _slides(linkage: Linkage, motion: Motion, only: dict[int, list[float]], firm: dict[int, float]) -> tuple[int, ...]:
    """The slides on the frame that run in the one free motion."""
    running = []
    for number, joint in enumerate(linkage.joints):
        link = joint.first if joint.second == linkage.frame else joint.second
        if joint.kind != "slide" or linkage.frame not in (joint.first, joint.second) or link not in only:
            continue
        turn, across, up = only[link]
        arm = (joint.at - motion.bodies[link].centre) / motion.bodies[link].size
        along = joint.direction or 0j
        if abs(dot(complex(across, up), along) + turn * cross(arm, along)) > firm[link]:
            running.append(number)
    return tuple(running)
