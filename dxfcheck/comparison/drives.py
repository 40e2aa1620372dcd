"""Stated drives of one mechanism in both drawings."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.comparison.result import DriveChange, StatedDrive
from dxfcheck.comparison.speeds import Paired
from dxfcheck.linkage import Drive, Linkage

__all__ = ["drive_changes"]

Key = tuple[str, int, int] | tuple[str, int]


def drive_changes(paired: Paired, allow: float, *, runs_as_stated: bool) -> Iterator[DriveChange]:
    """Drives that are in one drawing only, or state another rate; those that both assume are left aside.

    ``allow`` is per cent of the old rate. ``runs_as_stated`` False: the sheet is mirrored and the sense of its drives
    was left as it is, so that only the sizes of rates are compared.
    """
    old, new = paired.old.linkage, paired.new.linkage
    if {drive.source for drive in (*old.drives, *new.drives)} <= {"assumed"}:
        return
    there = {_new_key(drive): drive for drive in reversed(new.drives)}
    for drive in old.drives:
        key, scale = _old_key(paired, drive)
        before = StatedDrive(drive.rate * scale, drive.source, drive.stated)
        other = there.pop(key, None) if key is not None else None
        if other is None:
            yield DriveChange(_subject(old, drive), drive.kind, before, None, beyond=True)
            continue
        after = StatedDrive(_rate(new, other), other.source, other.stated)
        if not runs_as_stated:
            before = before._replace(rate=-before.rate)
        off = abs(after.rate - before.rate)
        beyond = off > allow / 100.0 * abs(before.rate)
        if beyond or (before.source == "assumed") != (after.source == "assumed"):
            yield DriveChange(_subject(new, other), other.kind, before, after, beyond=beyond)
    for drive in new.drives:
        if _new_key(drive) in there:
            after = StatedDrive(_rate(new, drive), drive.source, drive.stated)
            yield DriveChange(_subject(new, drive), drive.kind, None, after, beyond=True)


def _new_key(drive: Drive) -> Key:
    return ("slide", drive.joint) if drive.joint is not None else ("turn", drive.link, drive.against)


def _old_key(paired: Paired, drive: Drive) -> tuple[Key | None, float]:
    """What the drive goes by in the new drawing, and what brings its rate there."""
    if drive.joint is not None:
        second = drive.link == paired.old.linkage.joints[drive.joint].second
        for pair in paired.joints:
            if pair.old == drive.joint:
                return ("slide", pair.new), paired.scale * (pair.sign if second else -pair.sign)
        return None, paired.scale
    link, against = paired.parts.links.get(drive.link), paired.parts.links.get(drive.against)
    scale = float(paired.motion.sense)
    return (None if link is None or against is None else ("turn", link, against)), scale


def _rate(linkage: Linkage, drive: Drive) -> float:
    """The rate; for a slide that of the joint's second link against its first."""
    if drive.joint is None or drive.link == linkage.joints[drive.joint].second:
        return drive.rate
    return -drive.rate


def _subject(linkage: Linkage, drive: Drive) -> str:
    against = "" if drive.against == linkage.frame else f" against {linkage.links[drive.against].name}"
    return linkage.links[drive.link].name + against
