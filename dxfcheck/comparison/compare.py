"""Two drawings as mechanisms: the one function that the rest of this package is for."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from typing import NamedTuple

from dxfcheck.collector import collector_paused
from dxfcheck.comparison.drives import drive_changes
from dxfcheck.comparison.findings import FindingPlaces, compare_findings
from dxfcheck.comparison.joints import pair_joints
from dxfcheck.comparison.lengths import Lengths, common_lengths
from dxfcheck.comparison.matching import MechanismPair, match_mechanisms
from dxfcheck.comparison.measures import length_changes, moves, radius_changes, turned_directions
from dxfcheck.comparison.motion import UNMOVED, SheetMotion
from dxfcheck.comparison.pairing import Pairing, pair_parts
from dxfcheck.comparison.result import Comparison, MechanismChange, PartChange
from dxfcheck.comparison.speeds import Paired, compare_speeds
from dxfcheck.comparison.structure import part_changes
from dxfcheck.geometry import Point
from dxfcheck.inspection import DrawingReport, MechanismReport
from dxfcheck.linkage import Linkage
from dxfcheck.rules.finding import Finding
from dxfcheck.tolerances.comparison import COMPARED_FINDING_OF_SIZE
from dxfcheck.tolerances.findings import COMPARED_ALLOWANCE_PERCENT

__all__ = ["compare_reports"]


class _Compared(NamedTuple):
    """One mechanism compared, with its pins (old index to new) for the findings."""

    change: MechanismChange
    pair: MechanismPair
    parts: Pairing


def compare_reports(old: DrawingReport, new: DrawingReport, *, allow: float = COMPARED_ALLOWANCE_PERCENT) -> Comparison:
    """What changed from one checked drawing to the other as a mechanism; near-linear in the size of the drawings.

    ``allow`` is per cent of a speed. Both reports have status 'checked'; ValueError where one was not read.
    """
    if "unreadable" in (old.status, new.status):
        msg = "a drawing that was not read cannot be compared"
        raise ValueError(msg)
    with collector_paused():
        return _compare(old, new, allow)


def _compare(old: DrawingReport, new: DrawingReport, allow: float) -> Comparison:
    lengths = common_lengths(old, new)
    sheets = match_mechanisms(old.mechanisms, new.mechanisms, lengths.scale, lengths.reach)
    compared = [
        _mechanism(old.mechanisms[pair.old], new.mechanisms[pair.new], pair, sheets.motion, lengths, allow)
        for pair in sheets.pairs
    ]
    fresh, cured = _findings(old, new, compared, sheets.motion, lengths.scale)
    return Comparison(
        old=old,
        new=new,
        allow=allow,
        motion=sheets.motion,
        unit=lengths.unit,
        unit_note=lengths.note,
        tolerance=lengths.tolerance(moved=sheets.motion != UNMOVED),
        rounded=lengths.rounded,
        mechanisms=tuple(each.change for each in compared),
        parts=(
            *_whole("added", [new.mechanisms[number] for number in sheets.added]),
            *_whole("gone", [old.mechanisms[number] for number in sheets.gone]),
        ),
        new_findings=fresh,
        cured_findings=cured,
    )


def _mechanism(
    old: MechanismReport, new: MechanismReport, pair: MechanismPair, sheet: SheetMotion, lengths: Lengths, allow: float
) -> _Compared:
    before, after, scale = old.linkage, new.linkage, lengths.scale
    parts = pair_parts(before, after, pair.motion, scale, pair.pins)
    joints = pair_joints(before, after, parts, pair.motion, scale)
    tolerance = lengths.tolerance(moved=pair.motion != UNMOVED, size=_extent([pin.at for pin in after.pins]))
    paired = Paired(old=old, new=new, parts=parts, joints=joints.both, motion=pair.motion, scale=scale)
    speeds = compare_speeds(paired, allow)
    backwards = speeds.factor < 0 and not speeds.ratio_to
    change = MechanismChange(
        old_name=before.name,
        new_name=after.name,
        placed=None if pair.motion == sheet else pair.motion,
        old_mobility=old.analysis.mobility,
        new_mobility=new.analysis.mobility,
        parts=part_changes(before, after, parts, joints, pair.motion, scale),
        moved=tuple(
            move for move in moves(before, after, parts, joints.both, pair.motion, scale) if abs(move.by) > tolerance
        ),
        lengths=tuple(length_changes(before, after, parts, scale, tolerance)),
        radii=tuple(radius_changes(before, after, parts, scale, tolerance)),
        turned=tuple(turned_directions(before, after, joints.both, pair.motion)),
        drives=tuple(drive_changes(paired, allow, runs_as_stated=not (backwards and pair.motion.mirrored))),
        speeds=speeds.beyond,
        within=speeds.within,
        speeds_compared=speeds.compared,
        reversed_motion=backwards,
        mirrored=pair.motion.mirrored,
        ratio_to=speeds.ratio_to,
        renamed=tuple(_renamed(before, after, parts)),
    )
    return _Compared(change, pair, parts)


def _renamed(old: Linkage, new: Linkage, parts: Pairing) -> Iterator[tuple[str, str]]:
    """Pins with another label; names that were only given by their order on the sheet do not count."""
    for first, second in sorted(parts.pins.items(), key=lambda pair: pair[1]):
        before, after = old.pins[first], new.pins[second]
        if before.name != after.name and (before.labelled or after.labelled):
            yield before.name, after.name


def _whole(change: str, mechanisms: Sequence[MechanismReport]) -> Iterator[PartChange]:
    for report in mechanisms:
        linkage, mobility = report.linkage, report.analysis.mobility
        detail = f"{len(linkage.links)} links, mobility {mobility.count}, freedom at the pose {mobility.at_pose}"
        at = min((pin.at for pin in linkage.pins), key=lambda place: (place.real, place.imag), default=None)
        yield PartChange("mechanism", "added" if change == "added" else "gone", linkage.name, detail, at)


def _findings(
    old: DrawingReport, new: DrawingReport, compared: Sequence[_Compared], motion: SheetMotion, scale: float
) -> tuple[tuple[Finding, ...], tuple[Finding, ...]]:
    """Findings that are new, and those that are cured."""
    pins = {
        (each.pair.old, first): (each.pair.new, second)
        for each in compared
        for first, second in each.parts.pins.items()
    }
    names = {each.change.old_name: each.change.new_name for each in compared}
    before = FindingPlaces(old, lambda place: motion(place * scale), pins, names)
    own = {
        (number, index): (number, index)
        for number, mechanism in enumerate(new.mechanisms)
        for index in range(len(mechanism.linkage.pins))
    }
    after = FindingPlaces(
        new, lambda place: place, own, {each.linkage.name: each.linkage.name for each in new.mechanisms}
    )
    size = max((_extent([pin.at for pin in mechanism.linkage.pins]) for mechanism in new.mechanisms), default=0.0)
    reach = max(COMPARED_FINDING_OF_SIZE * size, new.tolerance or 0.0)
    return compare_findings(old.findings, new.findings, before, after, reach)


def _extent(places: Sequence[Point]) -> float:
    """Diagonal of the box round places; 0 for none."""
    if not places:
        return 0.0
    across = [place.real for place in places]
    up = [place.imag for place in places]
    return math.hypot(max(across) - min(across), max(up) - min(up))
