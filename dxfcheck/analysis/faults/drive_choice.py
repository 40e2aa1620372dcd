"""Which drives, added to those that were taken, would settle the links that are still free."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import numpy as np

from dxfcheck.analysis.results import FreePart, IdleLink, SettlingDrive
from dxfcheck.analysis.speeds.velocity import Matrix, Motion, rate_row
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.tolerances.analysis import DENSE_LINKS, DRIVES_FREELY, SETTLING_DRIVES

__all__ = ["settling_drives"]


def settling_drives(
    linkage: Linkage, motion: Motion, parts: Sequence[FreePart], idle: Sequence[IdleLink]
) -> tuple[SettlingDrive, ...]:
    """As few drives as settle all but the idle links: on the frame's own pins first, then its slides, then all else.

    () where nothing is free, or where no such drives are found.
    """
    if motion.still_below is None or len(linkage.links) > DENSE_LINKS:
        return _one_each(linkage, parts, idle)
    wanted = len(motion.free) - sum([each.freedoms for each in idle])
    if not 0 < wanted <= SETTLING_DRIVES:
        return ()
    chosen: list[SettlingDrive] = []
    settled: list[Matrix] = []
    fastest = float(abs(motion.free).max())
    for drive in _candidates(linkage, motion, {each.link for each in idle}):
        effect = _effect(linkage, motion, drive)
        for before in settled:
            effect = effect - (effect @ before) * before
        size = float(np.linalg.norm(effect))
        if size > DRIVES_FREELY * fastest:
            chosen.append(drive)
            settled.append(effect / size)
        if len(chosen) == wanted:
            return tuple(chosen)
    return ()


def _one_each(linkage: Linkage, parts: Sequence[FreePart], idle: Sequence[IdleLink]) -> tuple[SettlingDrive, ...]:
    """For a large linkage: the first drive that settles each part, if every part has one."""
    alone = {each.link for each in idle}
    chosen = []
    for part in parts:
        if alone.issuperset(part.links):
            continue
        if part.turns:
            chosen.append(SettlingDrive(part.turns[0], linkage.frame, None))
        elif part.slides:
            chosen.append(_along(linkage, part.slides[0]))
        else:
            return ()
    return tuple(chosen) if len(chosen) <= SETTLING_DRIVES else ()


def _candidates(linkage: Linkage, motion: Motion, idle: set[int]) -> Iterator[SettlingDrive]:
    frame = linkage.frame
    free = [link for link, settled in enumerate(motion.settled) if not settled and link not in idle]
    on_frame = {link for pin in linkage.pins if pin.fixed for link in pin.links}
    slides = [
        number
        for number, joint in enumerate(linkage.joints)
        if joint.kind == "slide" and idle.isdisjoint((joint.first, joint.second))
    ]
    yield from (SettlingDrive(link, frame, None) for link in free if link in on_frame)
    yield from (_along(linkage, number) for number in slides if frame in _ends(linkage, number))
    yield from (SettlingDrive(link, frame, None) for link in free if link not in on_frame)
    yield from (_along(linkage, number) for number in slides if frame not in _ends(linkage, number))


def _ends(linkage: Linkage, number: int) -> tuple[int, int]:
    return linkage.joints[number].first, linkage.joints[number].second


def _along(linkage: Linkage, number: int) -> SettlingDrive:
    """The drive of a slide: of its moving link, where the other is the frame."""
    first, second = _ends(linkage, number)
    return SettlingDrive(first, second, number) if second == linkage.frame else SettlingDrive(second, first, number)


def _effect(linkage: Linkage, motion: Motion, drive: SettlingDrive) -> Matrix:
    """What each free motion does to the rate of a drive."""
    stated = Drive(
        link=drive.link,
        against=drive.against,
        rate=1.0,
        kind="turn" if drive.joint is None else "slide",
        joint=drive.joint,
    )
    row = rate_row(stated, linkage, motion.bodies)
    columns = [column + 3 * (column >= 3 * linkage.frame) for column, _ in row.cells]
    effect: Matrix = motion.free[:, columns] @ np.array([weight for _, weight in row.cells])
    return effect
