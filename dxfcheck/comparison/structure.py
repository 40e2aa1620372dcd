"""What is there in one drawing only: links, pins and joints of one mechanism."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.comparison.joints import JointPairs, joint_name
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.pairing import Pairing
from dxfcheck.comparison.result import Change, PartChange
from dxfcheck.linkage import Linkage

__all__ = ["part_changes"]


def part_changes(
    old: Linkage, new: Linkage, pairing: Pairing, joints: JointPairs, motion: SheetMotion, scale: float
) -> tuple[PartChange, ...]:
    """Links, then pins, then joints that were added, are gone, or join other links; places are on the new sheet."""
    return (
        *_links(old, new, pairing),
        *_pins(old, new, pairing, motion, scale),
        *_pin_joints(old, new, pairing),
        *_other_joints(old, new, joints, motion, scale),
    )


def _links(old: Linkage, new: Linkage, pairing: Pairing) -> Iterator[PartChange]:
    there = set(pairing.links.values())
    for number, link in enumerate(new.links):
        if number not in there:
            yield PartChange("link", "added", link.name)
    for number, link in enumerate(old.links):
        other = pairing.links.get(number)
        if other is None:
            yield PartChange("link", "gone", link.name)
        elif link.kind != new.links[other].kind:
            kind = new.links[other].kind
            yield PartChange("link", "changed", new.links[other].name, f"is a {kind}, was a {link.kind}")


def _pins(old: Linkage, new: Linkage, pairing: Pairing, motion: SheetMotion, scale: float) -> Iterator[PartChange]:
    """Pins of one link (tracing points); those of more are joints, which see below."""
    there = set(pairing.pins.values())
    for number, pin in enumerate(new.pins):
        if number not in there and len(pin.links) < 2:
            yield PartChange("pin", "added", pin.name, f"on {_names(new, pin.links)} alone", pin.at)
    for number, pin in enumerate(old.pins):
        if number not in pairing.pins and len(pin.links) < 2:
            yield PartChange("pin", "gone", pin.name, f"of {_names(old, pin.links)} alone", motion(pin.at * scale))


def _pin_joints(old: Linkage, new: Linkage, pairing: Pairing) -> Iterator[PartChange]:
    there = set(pairing.pins.values())
    for number, pin in enumerate(new.pins):
        if number not in there and len(pin.links) > 1:
            yield PartChange("joint", "added", f"pin {pin.name}", f"joins {_names(new, pin.links)}", pin.at)
    for number, pin in enumerate(old.pins):
        other = pairing.pins.get(number)
        if other is None:
            if len(pin.links) > 1:
                yield PartChange("joint", "gone", f"pin {pin.name}", f"joined {_names(old, pin.links)}")
            continue
        target = new.pins[other]
        known = {pairing.links[link] for link in pin.links if link in pairing.links}
        lost = [old.links[link].name for link in pin.links if pairing.links.get(link) not in target.links]
        more = [new.links[link].name for link in target.links if link not in known]
        if lost or more:
            change: Change = "added" if not lost else "gone" if not more else "changed"
            detail = _joins_otherwise(more, lost, was_fixed=pin.fixed, is_fixed=target.fixed)
            yield PartChange("joint", change, f"pin {target.name}", detail, target.at)


def _joins_otherwise(more: list[str], lost: list[str], *, was_fixed: bool, is_fixed: bool) -> str:
    """How the links at a pin differ; the frame is said as fixed or free."""
    phrases = []
    if is_fixed != was_fixed:
        phrases.append("fixed to the frame, was free" if is_fixed else "free, was fixed to the frame")
        more, lost = ([name for name in names if name != "frame"] for names in (more, lost))
    if more:
        phrases.append(f"joins {', '.join(more)} as well")
    if lost:
        phrases.append(f"joins {', '.join(lost)} no longer")
    return "; ".join(phrases)


def _other_joints(
    old: Linkage, new: Linkage, joints: JointPairs, motion: SheetMotion, scale: float
) -> Iterator[PartChange]:
    for number in joints.added:
        joint = new.joints[number]
        if joint.kind != "pin":
            yield PartChange("joint", "added", joint_name(new, joint), "", joint.at)
    for number in joints.gone:
        joint = old.joints[number]
        if joint.kind != "pin":
            yield PartChange("joint", "gone", joint_name(old, joint), "", motion(joint.at * scale))


def _names(linkage: Linkage, links: tuple[int, ...]) -> str:
    return " and ".join(linkage.links[link].name for link in links)
