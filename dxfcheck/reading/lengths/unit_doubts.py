"""The length unit a drawing states, against everything else on the sheet and against a plausible size."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from itertools import combinations

from dxfcheck.drawing.primitives import LengthUnit, Sketch
from dxfcheck.drawing.units import LENGTH_UNITS
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lengths.mix_ups import INCH_IN_MILLIMETRES
from dxfcheck.reading.lengths.unit_signs import UnitSign
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.sheet import LINK_GREATEST_METRES, LINK_LEAST_METRES, LINK_USUAL_METRES, UNIT_LIKENESS

__all__ = ["doubt_units"]

_SOURCES = {"header": "the header says", "option": "the option says", "settings": "the settings say"}
_SPEED = re.compile(r"\d\s*(mm|cm|m|in|ft)\s*/\s*(?:s|sec|min)\b", re.IGNORECASE)
_INCH_SYSTEM = frozenset({"in", "ft", "yd", "mi", "mil", "uin", "ft-us", "in-us", "yd-us", "mi-us"})
_SHOWN = 3


def doubt_units(sketch: Sketch, linkages: Sequence[Linkage], signs: Sequence[UnitSign]) -> Iterator[Observation]:
    """What speaks against the stated unit, as one observation; where none is stated, the unit that all signs name."""
    unit = sketch.unit
    if unit.metres is None:
        named = {sign.unit for sign in signs}
        if unit.source == "assumed" and len(named) == 1:
            yield Observation(kind="units-missing", at=None, subject=signs[0].unit, detail=signs[0].why)
        return
    against = [sign for sign in signs if not _same(sign.unit, unit)]
    if not against and len(signs) == 0:
        against = list(_systems(sketch, linkages))
    if against:
        yield _doubt(unit, against, agreeing=len(signs) > len(against))
        return
    yield from _implausible(unit, linkages)


def _same(name: str, unit: LengthUnit) -> bool:
    size = LENGTH_UNITS[name]
    return size is None or unit.metres is None or abs(size - unit.metres) <= UNIT_LIKENESS * unit.metres


def _systems(sketch: Sketch, linkages: Sequence[Linkage]) -> Iterator[UnitSign]:
    """The header's system of patterns and the unit of a drive's speed, where both speak of the other system.

    Either alone says nothing: programs write the former from their templates (in real drawings it disagrees with the
    unit as often as not where that is inches), and a speed may be stated in any unit.
    """
    inches = sketch.unit.name in _INCH_SYSTEM
    if sketch.metric is None or sketch.metric is not inches:
        return
    for linkage in linkages:
        for drive in linkage.drives:
            match = _SPEED.search(drive.stated)
            if match is not None and drive.source == "note" and (match[1].lower() in _INCH_SYSTEM) is not inches:
                other = "mm" if inches else "in"
                system = "metric" if inches else "in inches"
                why = f"the drive is stated in {match[1]}/s and the header's $MEASUREMENT is {system}"
                yield UnitSign(other, why, drive.at, drive.handles[0] if drive.handles else "")
                return


def _doubt(unit: LengthUnit, against: Sequence[UnitSign], *, agreeing: bool) -> Observation:
    whys = [sign.why for sign in against]
    more = f" and {len(whys) - _SHOWN} more" if len(whys) > _SHOWN else ""
    other = against[0].unit
    size = LENGTH_UNITS[other] or 1.0
    ratio = max(size / (unit.metres or 1.0), (unit.metres or 1.0) / size)
    mixed = abs(ratio - INCH_IN_MILLIMETRES) <= UNIT_LIKENESS * INCH_IN_MILLIMETRES
    named = "inches and millimetres mixed up, a factor of 25.4" if mixed else f"a factor of {ratio:.6g}"
    doubled = "; other signs agree with it" if agreeing else ""
    return Observation(
        kind="units-doubtful",
        at=against[0].at,
        handles=tuple(dict.fromkeys(sign.handle for sign in against if sign.handle)),
        layer=against[0].layer,
        amount=ratio,
        subject=other,
        detail=f"{_SOURCES.get(unit.source, 'it is said')} {unit.name}, but {'; '.join(whys[:_SHOWN])}{more} "
        f"({named}{doubled})",
    )


def _implausible(unit: LengthUnit, linkages: Sequence[Linkage]) -> Iterator[Observation]:
    """A size no linkage has: the longest link of the sheet is shorter than 1 mm or longer than 100 m."""
    sizes = [
        (abs(linkage.pins[one].at - linkage.pins[other].at), link.name, linkage)
        for linkage in linkages
        for link in linkage.links
        if link.kind != "frame"
        for one, other in combinations(link.pins, 2)
    ]
    if not sizes or unit.metres is None:
        return
    length, name, linkage = max(sizes, key=lambda each: each[0])
    if length <= 0.0 or LINK_LEAST_METRES <= length * unit.metres <= LINK_GREATEST_METRES:
        return
    plausible = [
        other
        for other in ("mm", "in")
        if LINK_LEAST_METRES <= length * (LENGTH_UNITS[other] or 1.0) <= LINK_USUAL_METRES
    ]
    index = next(number for number, link in enumerate(linkage.links) if link.name == name)
    at = linkage.pins[linkage.links[index].pins[0]].at
    meant = f"; in {' or '.join(plausible)} it would be plausible" if plausible else ""
    yield Observation(
        kind="units-doubtful",
        at=at,
        handles=linkage.links[index].handles,
        layer=linkage.links[index].layer,
        amount=length,
        subject=plausible[0] if plausible else "",
        detail=f"{_SOURCES.get(unit.source, 'it is said')} {unit.name}, so that the longest link {name} is "
        f"{length:.6g} {unit.name} long, "
        f"{'longer than 100 m' if length * unit.metres > LINK_GREATEST_METRES else 'shorter than 1 mm'}{meant}",
        mechanism=linkage.name,
    )
