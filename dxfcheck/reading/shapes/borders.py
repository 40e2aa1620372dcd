"""Which outlines are borders round whole assemblies of links, and no parts themselves (reading rule 1)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Mapping, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.geometry import Point
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.shapes.contours import Contour

__all__ = ["find_borders"]


class _Drawn(NamedTuple):
    """A link that a border may enclose: points it runs through, its strands and its pins."""

    points: Sequence[Point]
    strands: Collection[int]
    sites: Collection[int]


def find_borders(
    contours: Sequence[Contour],
    inside: Sequence[Sequence[int]],
    holed: Collection[int],
    strands: Sequence[Strand],
    pins: Sequence[PinSite],
    pins_of: Mapping[int, Collection[int]],
    frame: Collection[int],
) -> set[int]:
    """The contours (their indices) on which nothing lands and that enclose whole assemblies of links.

    ``inside`` are the pins in each contour, ``holed`` the contours that would be links, ``pins_of`` those each strand
    lands on. A contour with a pin from which something leads out of it, a link or the leg of a frame symbol, is a part
    that merely covers shorter links, unless it holds both pins of one: it would be that link drawn twice.
    """
    outline_links = [number for number in holed if len(inside[number]) > 1]
    of_outlines = {strand for number in outline_links for strand in contours[number].strands}
    linking = [strands[strand] for strand, sites in sorted(pins_of.items()) if len(sites) > 1]
    links = [
        _Drawn([end for piece in line.pieces for end in (piece.start, piece.end)], (line.number,), pins_of[line.number])
        for line in linking
        if line.number not in frame and line.number not in of_outlines
    ]
    links.extend(_Drawn(contours[each].points, contours[each].strands, inside[each]) for each in outline_links)
    on_site: defaultdict[int, list[Point]] = defaultdict(list)
    for strand, sites in pins_of.items():
        points = [end for piece in strands[strand].pieces for end in (piece.start, piece.end)]
        for site in sites:
            on_site[site].extend(points)
    for each in outline_links:
        for site in inside[each]:
            on_site[site].extend(pins[other].at for other in inside[each])
    firsts = np.array([link.points[0] for link in links], dtype=np.complex128)
    found = set()
    for number, contour in enumerate(contours):
        if any(pins_of.get(strand) for strand in contour.strands) and number not in holed:
            continue
        middle, reach = contour.circle_round()
        near = np.nonzero(np.abs(firsts - middle) <= reach)[0].tolist()
        others = [links[each] for each in near if set(contour.strands).isdisjoint(links[each].strands)]
        enclosed = [link for link in others if contour.encloses(link.points)]
        if enclosed:
            reaching = [point for hole in inside[number] for point in on_site[hole]]
            if contour.encloses(reaching) or any(set(link.sites) <= set(inside[number]) for link in enclosed):
                found.add(number)
    return found
