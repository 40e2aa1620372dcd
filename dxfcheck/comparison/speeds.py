"""Speeds of one mechanism in both drawings."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

from dxfcheck.comparison.joints import JointPair, joint_name
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.pairing import Pairing
from dxfcheck.comparison.result import SpeedChange, SpeedQuantity
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Drive
from dxfcheck.tolerances.comparison import COMPARED_NOISE
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["Paired", "Speeds", "compare_speeds"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Paired:
    """One mechanism in both drawings, its parts paired; ``scale`` brings old lengths to the new unit."""

    old: MechanismReport
    new: MechanismReport
    parts: Pairing
    joints: tuple[JointPair, ...]
    motion: SheetMotion
    scale: float


@dataclass(frozen=True, slots=True, kw_only=True)
class Speeds:
    """Speeds that changed by more than allowed, and those that changed by less; ``compared`` counts all.

    ``factor`` is what the new drawing's speeds were multiplied by: -1 where it runs the other way, another figure
    where both drawings leave the drive to be assumed and these are not the same.
    """

    beyond: tuple[SpeedChange, ...]
    within: tuple[SpeedChange, ...]
    compared: int
    factor: float
    ratio_to: str = ""


def compare_speeds(paired: Paired, allow: float) -> Speeds:
    """Hold every speed that both drawings could have against the other's; ``allow`` is per cent of the old one."""
    plain = list(_speeds(paired))
    noise = _noise(paired, plain)
    ratio = _assumed_ratio(paired)
    factor = ratio[0] if ratio else -1.0 if _reversed(plain, noise) else 1.0
    judged = [_judged(_times(change, factor), allow, noise[change.quantity]) for change in plain]
    return Speeds(
        beyond=tuple(change for change, differs in judged if change.beyond),
        within=tuple(change for change, differs in judged if differs and not change.beyond),
        compared=len(plain),
        factor=factor,
        ratio_to=ratio[1] if ratio else "",
    )


def _speeds(paired: Paired) -> Iterator[SpeedChange]:
    """Every speed, brought to the new sheet; not yet judged."""
    yield from _turning(paired)
    yield from _of_pins(paired)
    yield from _of_joints(paired)


def _turning(paired: Paired) -> Iterator[SpeedChange]:
    before, after, linkage = paired.old.analysis.links, paired.new.analysis.links, paired.new.linkage
    for first, second in sorted(paired.parts.links.items(), key=lambda pair: pair[1]):
        if second != linkage.frame or first != paired.old.linkage.frame:
            speeds = _times_known(before[first].angular_velocity, paired.motion.sense), after[second].angular_velocity
            yield SpeedChange("turning", linkage.links[second].name, *speeds, beyond=False)


def _of_pins(paired: Paired) -> Iterator[SpeedChange]:
    old, new = paired.old.linkage.pins, paired.new.linkage.pins
    for first, second in sorted(paired.parts.pins.items(), key=lambda pair: pair[1]):
        if old[first].fixed and new[second].fixed:
            continue
        before, after = paired.old.analysis.pins[first].velocity, paired.new.analysis.pins[second].velocity
        laid = None if before is None else paired.motion.vector(before) * paired.scale
        sizes = None if laid is None else abs(laid), None if after is None else abs(after)
        yield SpeedChange("pin speed", new[second].name, *sizes, beyond=False, old_velocity=laid, new_velocity=after)


def _of_joints(paired: Paired) -> Iterator[SpeedChange]:
    new = paired.new.linkage
    for pair in sorted(paired.joints, key=lambda pair: pair.new):
        before, after = paired.old.analysis.joints[pair.old], paired.new.analysis.joints[pair.new]
        name = joint_name(new, new.joints[pair.new])
        quantities: tuple[tuple[SpeedQuantity, float | None, float | None, float], ...] = (
            ("sliding", before.slide_speed, after.slide_speed, paired.scale * pair.sign),
            ("rubbing", before.rubbing_speed, after.rubbing_speed, paired.scale),
        )
        kind = new.joints[pair.new].kind
        applies = {"sliding": kind in ("slide", "pin in slot"), "rubbing": kind == "pin"}
        for quantity, was, is_now, scale in quantities:
            if applies[quantity]:
                yield SpeedChange(quantity, name, _times_known(was, scale), is_now, beyond=False)


def _noise(paired: Paired, changes: Sequence[SpeedChange]) -> dict[SpeedQuantity, float]:
    """How far speeds of each kind may differ and still be the same: a part of the greatest of that kind.

    No less than what is nothing beside the mechanism's fastest motion, over or times its size.
    """
    greatest: dict[SpeedQuantity, float] = dict.fromkeys(("turning", "pin speed", "sliding", "rubbing"), 0.0)
    for change in changes:
        greatest[change.quantity] = max(greatest[change.quantity], abs(change.old or 0.0), abs(change.new or 0.0))
    greatest["pin speed"] = greatest["sliding"] = max(greatest["pin speed"], greatest["sliding"])
    places = [pin.at for pin in paired.new.linkage.pins]
    extent = max((abs(place - places[0]) for place in places), default=0.0)
    along = SHOWN_AS_ZERO * extent * greatest["turning"]
    turning = COMPARED_NOISE * greatest["pin speed"] / extent if extent else 0.0
    return {
        quantity: max(COMPARED_NOISE * size, turning if quantity == "turning" else along)
        for quantity, size in greatest.items()
    }


def _judged(change: SpeedChange, allow: float, noise: float) -> tuple[SpeedChange, bool]:
    """The change with its verdict, and whether there is any change at all."""
    if change.old is None or change.new is None:
        differs = (change.old is None) != (change.new is None)
        return change._replace(beyond=differs), differs
    nothing = noise * SHOWN_AS_ZERO / COMPARED_NOISE
    old, new = _settled(change.old, nothing), _settled(change.new, nothing)
    off = abs(new - old)
    return change._replace(old=old, new=new, beyond=off > max(allow / 100.0 * abs(old), noise)), off > noise


def _settled(value: float, nothing: float) -> float:
    """The figure, or 0 where it is no more than rounding error, so that no per cent are taken of it."""
    return 0.0 if abs(value) <= nothing else value


def _reversed(changes: Sequence[SpeedChange], noise: Mapping[SpeedQuantity, float]) -> bool:
    """Whether all that turns or slides does so the other way."""
    flipped = 0
    for change in changes:
        if change.quantity not in ("turning", "sliding") or change.old is None or change.new is None:
            continue
        if min(abs(change.old), abs(change.new)) <= noise[change.quantity]:
            continue
        if change.old * change.new > 0:
            return False
        flipped += 1
    return flipped > 0


def _assumed_ratio(paired: Paired) -> tuple[float, str] | None:
    """What the new speeds are to be multiplied by so that the old drawing's assumed drive runs alike in both.

    None where either drawing states a drive; 1 where the motion of the old one's driven link is not known in the new.
    """
    drives, others = paired.old.linkage.drives, paired.new.linkage.drives
    if not drives or not others or any(drive.source != "assumed" for drive in (*drives, *others)):
        return None
    drive, linkage = drives[0], paired.new.linkage
    link, against = paired.parts.links.get(drive.link), paired.parts.links.get(drive.against)
    if link is None or against is None:
        return 1.0, linkage.links[others[0].link].name
    rate = _slide_rate(paired, drive) if drive.kind == "slide" else _turn_rate(paired, link, against)
    stated = drive.rate * (paired.scale if drive.kind == "slide" else paired.motion.sense)
    return (stated / rate if rate else 1.0), linkage.links[link].name


def _turn_rate(paired: Paired, link: int, against: int) -> float | None:
    speeds = [paired.new.analysis.links[number].angular_velocity for number in (link, against)]
    return None if speeds[0] is None or speeds[1] is None else speeds[0] - speeds[1]


def _slide_rate(paired: Paired, drive: Drive) -> float | None:
    """The speed of the old drawing's driven slide in the new one, in the sense of the old drive's rate."""
    for pair in paired.joints:
        if pair.old == drive.joint:
            sense = pair.sign if drive.link == paired.old.linkage.joints[pair.old].second else -pair.sign
            return _times_known(paired.new.analysis.joints[pair.new].slide_speed, sense)
    return None


def _times(change: SpeedChange, factor: float) -> SpeedChange:
    """The change with the new speed multiplied; a size stays one."""
    if factor == 1.0 or change.new is None:
        return change
    signed = change.quantity in ("turning", "sliding")
    velocity = None if change.new_velocity is None else change.new_velocity * factor
    return change._replace(new=change.new * (factor if signed else abs(factor)), new_velocity=velocity)


def _times_known(value: float | None, factor: float) -> float | None:
    return None if value is None else value * factor
