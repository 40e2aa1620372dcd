"""Pistons drawn as a single line across between two frame lines, at the end of a rod (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import angle_between_lines
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES, RIM_OF_RADIUS
from dxfcheck.tolerances.shapes import PISTON_BORES, PISTON_OF_BORE

__all__ = ["pistons_of"]


def pistons_of(sheet: Sheet, frame: Collection[int], used: Collection[int]) -> Iterator[Box]:
    """Lines whose ends both lie on long frame lines square to them, with a rod on their middle, as boxes.

    ``used`` are strands that are something else: on pins, or sides of boxes.
    """
    if len(frame) < 2:
        return
    ends, targets, _, meets = sheet.touching.as_pairs()
    fixed = np.zeros(len(sheet.strands), dtype=np.bool_)
    fixed[list(frame)] = True
    apart = fixed.copy()
    apart[list(used)] = True
    on_frame = np.zeros(2 * len(sheet.strands), dtype=np.bool_)
    on_frame[ends[fixed[targets] & meets]] = True
    rods = meets & ~fixed[ends // 2]
    for number in np.nonzero(on_frame.reshape(-1, 2).all(axis=1) & ~apart)[0].tolist():
        piston = sheet.strands[number]
        tips = ends[rods & (targets == number)].tolist()
        if isinstance(piston.primitive, Segment) and piston.length and _between_walls(sheet, piston, frame):
            middle = (piston.ends[0] + piston.ends[1]) / 2.0
            if any(abs(sheet.strands[tip // 2].ends[tip % 2] - middle) <= _thickness(piston) for tip in tips):
                yield _box(piston)


def _thickness(piston: Strand) -> float:
    return PISTON_OF_BORE * piston.length


def _box(piston: Strand) -> Box:
    across = (piston.ends[1] - piston.ends[0]) / piston.length
    return Box(
        number=0,
        strands=(piston.number,),
        centre=(piston.ends[0] + piston.ends[1]) / 2.0,
        axes=(-1j * across, across),
        halves=(_thickness(piston) / 2.0, piston.length / 2.0),
        sites=(),
        frame=False,
        slack=RIM_OF_RADIUS * piston.length / 2.0,
    )


def _between_walls(sheet: Sheet, piston: Strand, frame: Collection[int]) -> bool:
    """Whether each end lies on a frame line square to the piston that runs on well past it both ways."""
    walls = []
    for end, point in enumerate(piston.ends):
        found = [
            number
            for number in sheet.touching.met(piston.number, end)
            if number in frame
            and _is_wall(sheet.strands[number], piston)
            and min(abs(tip - point) for tip in sheet.strands[number].ends) > _thickness(piston)
        ]
        walls.extend(found[:1])
    return len(set(walls)) == 2


def _is_wall(wall: Strand, piston: Strand) -> bool:
    if not isinstance(wall.primitive, Segment) or wall.length < PISTON_BORES * piston.length:
        return False
    turn = angle_between_lines(wall.ends[1] - wall.ends[0], piston.ends[1] - piston.ends[0])
    return abs(turn - math.pi / 2.0) <= math.radians(GUIDE_TURN_DEGREES)
