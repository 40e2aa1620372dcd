"""Which pins are holes of which outlines, and which outlines are borders (reading rules 1 and 4).

Glossary
    holder      an outline inside which a ring lies wholly
    feature     an outline round one pin that lies inside another holder of it: a nut, a boss
    void        a slot cut out of an outline: what slides in it is no hole of that outline
"""

from __future__ import annotations

import math
from collections import Counter, defaultdict
from collections.abc import Collection, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import BlockUse, Segment, Source
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.shapes.bar_axes import beside_axis, is_on_axis
from dxfcheck.reading.shapes.borders import find_borders
from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.reading.shapes.contours import Contour
from dxfcheck.reading.shapes.obrounds import Channel
from dxfcheck.reading.shapes.slots import Bar, Slot
from dxfcheck.tolerances.linework import SMOOTH_JOINT_DEGREES

__all__ = ["OutlineLinks", "cut_slots", "find_outline_links", "owner_of_cut"]


class Holes(NamedTuple):
    """The sites of each contour's holes, in the order of the contours, and what was doubtful about them."""

    held: tuple[tuple[int, ...], ...]
    oddities: tuple[Oddity, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class OutlineLinks:
    """Outlines read as links and borders.

    ``borders`` are strands of outlines that enclose whole links. ``held`` are landings of holes, on the first strand of
    each outline; ``groups`` the strands of outlines that are one link, whatever their ends do. ``void`` are (strand,
    pin) of landings that do not count: the outline of a bar that merely passes by.
    """

    borders: frozenset[int]
    held: tuple[Landing, ...]
    groups: tuple[tuple[int, ...], ...]
    void: frozenset[tuple[int, int]]
    oddities: tuple[Oddity, ...]


def find_outline_links(
    contours: Sequence[Contour],
    strands: Sequence[Strand],
    landings: Sequence[Landing],
    pins: Sequence[PinSite],
    frame: Collection[int],
    tolerance: Tolerance,
    voids: Sequence[Channel] = (),
    bars: Sequence[Bar] = (),
) -> OutlineLinks:
    """Read the contours: a link with the pins at its corners; only if no corner has a pin, with its holes.

    Of an outline with two holes or more, landings of its sides are mere passing by and do not count. An outline none
    of whose pins lies inside with its whole ring has those whose centres lie inside, unless it lands on others.
    Frame outlines (strands in ``frame``) keep all their landings. ``voids`` are slots, of which those
    in ``frame`` are cut out of frame outlines only; ``bars`` have their two pins
    whatever else lies inside, and are links even where they are no contours.
    """
    if not contours and not bars:
        return OutlineLinks(borders=frozenset(), held=(), groups=(), void=frozenset(), oddities=())
    firm = [each for each in landings if each.how != "across"]
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    for each in firm:
        pins_of[each.strand].add(each.pin)
    inside = _wholly_inside(contours, pins, tolerance, voids, frame)
    bar_of = _bars_among(contours, bars)
    for number, bar in bar_of.items():
        inside[number] = list(bar.sites)
    cornered = _with_pins_at_corners(contours, strands, firm, pins) - bar_of.keys()
    beside = _beside_axes(contours, inside, {*cornered, *bar_of}, pins_of, pins, voids, tolerance)
    for number, sites in beside.items():
        inside[number] = [site for site in inside[number] if site not in sites]
    holed = [
        number
        for number, sites in enumerate(inside)
        if number not in cornered
        and (len(sites) > 1 or (sites and not any(pins_of.get(each) for each in contours[number].strands)))
    ]
    borders = find_borders(contours, inside, holed, strands, pins, pins_of, frame) - bar_of.keys()
    plain = [number for number in holed if number not in borders]
    ends = {place for place, number in enumerate(plain) if number in bar_of}
    holes = _share([contours[each] for each in plain], [inside[each] for each in plain], pins, strands, tolerance, ends)
    held: dict[int, tuple[int, ...]] = dict(zip(plain, holes.held, strict=True))
    held.update((number, bar.sites) for number, bar in bar_of.items())
    for number, contour in enumerate(contours):
        if not inside[number] and number not in borders and number not in cornered:
            around = _centres_inside(contour, pins, voids, frame)
            if {site for each in contour.strands for site in pins_of.get(each, ())} <= set(around):
                held[number] = around
    links = [(contours[number].strands, sites) for number, sites in sorted(held.items())]
    known = list(bar_of.values())
    links.extend((bar.shape.strands, bar.sites) for bar in bars if bar not in known)
    passing = {strand for lines, _ in links for strand in lines}.difference(frame)
    return OutlineLinks(
        borders=frozenset(strand for number in borders for strand in contours[number].strands),
        held=tuple(Landing(lines[0], site, "corner", None, 0.0) for lines, sites in links for site in sites),
        groups=tuple(lines for lines, sites in links if sites),
        void=frozenset((each.strand, each.pin) for each in landings if each.strand in passing),
        oddities=(*holes.oddities, *_laid_over(beside, contours, held, pins)),
    )


def _beside_axes(
    contours: Sequence[Contour],
    inside: Sequence[Sequence[int]],
    apart: Collection[int],
    pins_of: Mapping[int, Collection[int]],
    pins: Sequence[PinSite],
    voids: Sequence[Channel],
    tolerance: Tolerance,
) -> dict[int, tuple[int, ...]]:
    """For contours that are bars, but those ``apart``, the pins of other links over which they merely lie."""
    on_site: defaultdict[int, set[int]] = defaultdict(set)
    for strand, sites in pins_of.items():
        for site in sites:
            on_site[site].add(strand)
    around = Counter(site for sites in inside for site in sites)
    found = {}
    for number, contour in enumerate(contours):
        if number not in apart and inside[number]:
            cuts = [void for void in voids if _cut_from(void, contour) and void.strands[0] not in contour.strands]
            carried = [each for each in inside[number] if around[each] > 1 or on_site[each].difference(contour.strands)]
            sites = beside_axis(contour, inside[number], cuts, pins, carried, tolerance)
            if sites:
                found[number] = sites
    return found


def _laid_over(
    beside: Mapping[int, Sequence[int]],
    contours: Sequence[Contour],
    held: Mapping[int, Sequence[int]],
    pins: Sequence[PinSite],
) -> Iterator[Oddity]:
    """What is said of pins of other links inside a bar."""
    for number, sites in beside.items():
        for site in sites if number in held else ():
            detail = "an outline with holes on its axis lies over it, off that axis: read as no hole of that outline"
            yield Oddity("doubtful-hole", pins[site].at, detail, site=site, strands=contours[number].strands)


def _bars_among(contours: Sequence[Contour], bars: Sequence[Bar]) -> dict[int, Bar]:
    """The contours (their indices) that are bars."""
    of_strand = {strand: number for number, contour in enumerate(contours) for strand in contour.strands}
    found = ((of_strand.get(bar.shape.strands[0]), bar) for bar in bars)
    return {number: bar for number, bar in found if number is not None}


def _share(
    contours: Sequence[Contour],
    inside: Sequence[Sequence[int]],
    pins: Sequence[PinSite],
    strands: Sequence[Strand],
    tolerance: Tolerance,
    bars: Collection[int] = (),
) -> Holes:
    """Give each site inside some contours (``inside``, for each of them) to those that own it; ``bars`` always do.

    Where as many rings are drawn on one centre as outlines hold it, all have it. Where rings are fewer, outlines with
    an arc about the hole or the hole on their axis have it, as bars do, and those drawn with it (in one block
    reference, or alone on its layer); unless all holders are such bars, an oddity 'doubtful-hole' says how it was read.
    """
    holders: defaultdict[int, list[int]] = defaultdict(list)
    for number, sites in enumerate(inside):
        for site in sites:
            holders[site].append(number)

    def axial(number: int, site: int) -> bool:
        others = [pins[each] for each in inside[number] if each != site]
        return is_on_axis(contours[number], pins[site], others, tolerance)

    held: list[list[int]] = [[] for _ in contours]
    oddities = []
    for site, candidates in sorted(holders.items()):
        outer = _without_features(contours, inside, candidates)
        on_axis = [each for each in outer if len(outer) > len(pins[site].rings) and axial(each, site)]
        # A link has two pins: an outline with one other hole needs this one.
        needy = [each for each in outer if len(inside[each]) == 2]
        chosen, odd = _owners(pins[site], outer, contours, strands, tolerance, {*bars, *on_axis}, needy)
        for number in chosen:
            held[number].append(site)
        if odd is not None:
            oddities.append(odd)
    return Holes(tuple(tuple(sites) for sites in held), tuple(oddities))


def cut_slots(slots: Sequence[Slot], touching: Touches, landings: Sequence[Landing]) -> list[Slot]:
    """The slots that may be cut out of an outline: nothing else ends on their sides.

    A slot with hatch strokes on it, or one at the end of a rod, merely lies under the outline that is drawn over it.
    """
    if not slots:
        return []
    ends, targets, _, meets = touching.as_pairs()
    owner_of = {strand: number for number, slot in enumerate(slots) for strand in (*slot.strands, *slot.block)}
    on_slot = np.isin(targets, np.array(sorted(owner_of), dtype=np.int64)) & meets
    landed = {(each.strand, each.end, each.pin) for each in landings}
    attached = set()
    for end, target in zip(ends[on_slot].tolist(), targets[on_slot].tolist(), strict=True):
        number = owner_of[target]
        on_pin = any((end // 2, end % 2, site) in landed for site in slots[number].sites)
        if owner_of.get(end // 2) != number and not on_pin:
            attached.add(number)
    return [slot for number, slot in enumerate(slots) if number not in attached]


def owner_of_cut(
    shape: Channel, contours: Sequence[Contour], borders: Collection[int] = (), frame: Collection[int] = ()
) -> int | None:
    """The contour (its index) out of which a slot is cut: the smallest that encloses it and is no border.

    A slot in ``frame`` is cut out of frame outlines only.
    """
    extremes = [centre + shape.radius * out for centre in shape.centres for out in (1, 1j, -1, -1j)]
    around = [
        (_size(contour), number)
        for number, contour in enumerate(contours)
        if not set(contour.strands) & {*shape.strands, *borders}
        and (shape.strands[0] not in frame or contour.strands[0] in frame)
        and contour.encloses(extremes)
    ]
    return min(around)[1] if around else None


def _size(contour: Contour) -> float:
    across = [point.real for point in contour.points]
    up = [point.imag for point in contour.points]
    return (max(across) - min(across)) * (max(up) - min(up))


def _wholly_inside(
    contours: Sequence[Contour],
    pins: Sequence[PinSite],
    tolerance: Tolerance,
    voids: Sequence[Channel],
    frame: Collection[int] = (),
) -> list[list[int]]:
    """For each contour, the sites whose smallest ring lies inside it and in none of its slots."""
    found: list[list[int]] = [[] for _ in contours]
    if not contours or not pins:
        return found
    middles, reaches = zip(*(contour.circle_round() for contour in contours), strict=True)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    pairs = near_pairs(np.array(middles), np.array(reaches), places, places)
    for number, site in zip(*(each.tolist() for each in pairs), strict=True):
        contour, pin = contours[number], pins[site]
        clear = contour.contains(pin.at) and contour.clearance(pin.at) >= pin.radius - tolerance.rim(pin.radius)
        if clear and not any(_cut_from(void, contour, frame) for void in voids if void.contains(pin.at)):
            found[number].append(site)
    return found


def _cut_from(void: Channel, contour: Contour, frame: Collection[int] = ()) -> bool:
    """Whether a slot is cut out of a contour, or is that contour itself; what moves over a frame slot is not cut."""
    if void.strands[0] in frame and contour.strands[0] not in frame:
        return False
    return void.strands[0] in contour.strands or contour.encloses(void.centres)


def _centres_inside(
    contour: Contour, pins: Sequence[PinSite], voids: Sequence[Channel], frame: Collection[int]
) -> tuple[int, ...]:
    own = [void for void in voids if _cut_from(void, contour, frame)]
    middle, reach = contour.circle_round()
    return tuple(
        pin.number
        for pin in pins
        if abs(pin.at - middle) <= reach and contour.contains(pin.at)
        if not any(void.contains(pin.at) for void in own)
    )


def _without_features(
    contours: Sequence[Contour], inside: Sequence[Sequence[int]], holders: Sequence[int]
) -> list[int]:
    """The holders of a pin but for its features."""
    if len(holders) < 2:
        return list(holders)
    return [
        number
        for number in holders
        if len(inside[number]) > 1
        or not any(other != number and contours[other].encloses(contours[number].points) for other in holders)
    ]


def _owners(
    pin: PinSite,
    holders: Sequence[int],
    contours: Sequence[Contour],
    strands: Sequence[Strand],
    tolerance: Tolerance,
    bars: Collection[int],
    needy: Collection[int],
) -> tuple[Sequence[int], Oddity | None]:
    """Which of its holders a pin belongs to: ``bars`` surely, those ``needy`` where its source tells nothing."""
    if len(pin.rings) >= len(holders):
        return holders, None
    within = max(tolerance.rim(pin.radius), tolerance.close(pin.radius))
    rounded = [number for number in holders if number in bars or contours[number].rounds(pin.at, pin.radius, within)]
    if len(rounded) == len(holders):
        return holders, None
    drawn_with = _drawn_with(
        [ring.source for ring in pin.rings],
        {number: strands[contours[number].strands[0]].primitive.source for number in holders},
    )
    chosen = sorted({*rounded, *(drawn_with or needy)})
    rings = "1 ring is" if len(pin.rings) == 1 else f"{len(pin.rings)} rings are"
    how = _reason(len(chosen), len(holders), by_form=bool(rounded), by_source=bool(drawn_with))
    detail = f"{len(holders)} outlines lie over it but {rings} drawn: {how}"
    lines = tuple(strand for number in holders for strand in contours[number].strands)
    return chosen or holders, Oddity("doubtful-hole", pin.at, detail, site=pin.number, strands=lines)


def _reason(chosen: int, holders: int, *, by_form: bool, by_source: bool) -> str:
    """How a doubtful hole was read, in words."""
    if not chosen or chosen == holders:
        return "read as a hole of all of them"
    outlines = "the one" if chosen == 1 else f"the {chosen}"
    form = f"with {'an arc' if chosen == 1 else 'arcs'} about it or {'its axis' if chosen == 1 else 'axes'} through it"
    source = "drawn in its block or on its layer"
    return f"read as a hole of {outlines} {' or '.join([form] * by_form + [source] * by_source) or 'with one other'}"


def _drawn_with(rings: Iterable[Source], outlines: dict[int, Source]) -> list[int]:
    """The outlines drawn in one block reference with a ring, else on its layer, if that tells them apart."""
    rings = list(rings)
    references = {_reference(source) for source in rings} - {None}
    chosen = [number for number, source in outlines.items() if _reference(source) in references]
    if not chosen:
        layers = {source.layer for source in rings}
        chosen = [number for number, source in outlines.items() if source.layer in layers]
    return chosen if len(chosen) < len(outlines) else []


def _reference(source: Source) -> tuple[int, tuple[BlockUse, ...]] | None:
    return (source.entity, source.blocks) if source.blocks else None


def _with_pins_at_corners(
    contours: Sequence[Contour], strands: Sequence[Strand], landings: Iterable[Landing], pins: Sequence[PinSite]
) -> set[int]:
    """The contours that have a pin at a corner; where a side passes smoothly into an arc there is none."""
    of_strand = {strand: number for number, contour in enumerate(contours) for strand in contour.strands}
    found = set()
    for landing in landings:
        number = of_strand.get(landing.strand)
        if number is not None and landing.how == "corner" and number not in found:
            corner = min(strands[landing.strand].corners, key=lambda each: abs(each - pins[landing.pin].at))
            if _is_kink(contours[number], corner):
                found.add(number)
    return found


def _is_kink(contour: Contour, corner: Point) -> bool:
    """Whether a contour bends sharply at one of its vertices."""
    nearest = sorted(contour.pieces, key=lambda piece: min(abs(piece.start - corner), abs(piece.end - corner)))[:2]
    headings = [
        piece.end - piece.start if isinstance(piece, Segment) else (corner - piece.centre) * 1j for piece in nearest
    ]
    return len(headings) < 2 or angle_between_lines(*headings) > math.radians(SMOOTH_JOINT_DEGREES)
