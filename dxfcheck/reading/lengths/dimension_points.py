"""Points of dimensions that sit on nothing: left behind when the linework moved, or never on any."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.fates import HIDDEN
from dxfcheck.drawing.primitives import Dimension, Sketch
from dxfcheck.geometry import Point
from dxfcheck.reading.lengths.sites import Sites, sites_of
from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray, near_pairs
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.tolerances.sheet import (
    DIMENSION_LEVEL,
    DIMENSION_MISS_OF_SIZE,
    DIMENSION_ON_OF_SIZE,
    POINT_OF_DIAGONAL,
    UNREAD_REACH_OF_DIAGONAL,
)

__all__ = ["MOST_OFF", "OffPoint", "points_off_geometry"]

_NO_LINEWORK = frozenset(
    {"ATTDEF", "DIMENSION", "LEADER", "MLEADER", "MTEXT", "MULTILEADER", "POINT", "TEXT", "VIEWPORT", "ARC_DIMENSION"}
)
MOST_COMPARED = 200
"""Ends round a point that are looked at in pairs."""
MOST_OFF = 50
"""Dimensions on nothing that are looked for on one sheet: each costs a look at all linework."""
_ENDLESS = frozenset({"RAY", "XLINE"})
_PARTLY_READ = frozenset({"unread-part", "hidden-part", "block-cycle", "block-missing", "outside-reference"})


class OffPoint(NamedTuple):
    """A point of a dimension on nothing: its distance from the nearest linework, and the nearest end or centre.

    ``near`` is True where that is so near that the point must once have sat there, ``held`` where another point of the
    dimension sits where it should. ``unasked`` is how many dimensions behind it were not looked at, as so many are off.
    """

    dimension: Dimension
    point: Point
    distance: float
    spot: Point
    spot_distance: float
    near: bool
    held: bool
    unasked: int = 0


class _Asked(NamedTuple):
    dimension: Dimension
    point: Point
    on: float
    size: float


def points_off_geometry(sketch: Sketch, dimensions: Sequence[Dimension], tolerance: Tolerance) -> list[OffPoint]:
    """The first point of each dimension that sits on nothing, in order of the dimensions.

    A point is silently right on an end, a centre, a line or rim as drawn; where two lines meet when they are drawn on;
    midway between two ends; for an angle on a leg drawn on; for a length or ordinate level with an end or centre, so
    that what is measured is right. Nothing is said near linework that was not read, nor of a point far from everything
    where there is any such linework: how far that runs is not known. After MOST_OFF of them no more are looked for.
    """
    asked = [each for dimension in dimensions for each in _asked(sketch, dimension, tolerance)]
    sites = sites_of(sketch)
    if not asked or sites.empty:
        return []
    points = np.array([each.point for each in asked], dtype=np.complex128)
    reaches = np.array([each.on for each in asked], dtype=np.float64)
    lines = near_pairs(
        points, reaches, np.concatenate((sites.starts, sites.spots)), np.concatenate((sites.ends, sites.spots))
    )
    settled = set(lines[0].tolist())
    off: defaultdict[int, list[_Asked]] = defaultdict(list)
    left: Sequence[_Asked] = ()
    for number, each in enumerate(asked):
        if number not in settled and not _excused(each, sites, tolerance):
            off[id(each.dimension)].append(each)
            if len(off) >= MOST_OFF:
                left = asked[number + 1 :]
                break
    unread = _unread_places(sketch)
    found = (_off_point(each, sites, unread, sketch.diagonal) for each in off.values())
    told = [each for each in found if each is not None]
    unasked = len({id(each.dimension) for each in left} - off.keys())
    return [*told[:-1], told[-1]._replace(unasked=unasked)] if told else []


def _off_point(off: Sequence[_Asked], sites: Sites, unread: Sequence[Point | None], diagonal: float) -> OffPoint | None:
    """The first of a dimension's points on nothing; None where it may sit on linework that was not read."""
    first = off[0]
    spot, distance = sites.nearest_spot(first.point)
    near = distance <= DIMENSION_MISS_OF_SIZE * first.size
    if _beside(first.point, unread, UNREAD_REACH_OF_DIAGONAL * diagonal) if near else unread:
        return None
    held = len(off) < len(first.dimension.points)
    return OffPoint(first.dimension, first.point, sites.nearest(first.point), spot, distance, near, held)


def _asked(sketch: Sketch, dimension: Dimension, tolerance: Tolerance) -> list[_Asked]:
    points = dimension.points
    size = max((abs(one - points[0]) for one in points[1:]), default=0.0) or POINT_OF_DIAGONAL * sketch.diagonal
    on = max(tolerance.t, min(tolerance.shape, DIMENSION_ON_OF_SIZE * size))
    return [_Asked(dimension, point, on, size) for point in points]


def _excused(asked: _Asked, sites: Sites, tolerance: Tolerance) -> bool:
    """Whether a point that is on no line and no end is right all the same."""
    point, kind = asked.point, asked.dimension.kind
    if bool((sites.rim_distances(point) <= asked.on).any()):
        return True
    tight = max(tolerance.t, DIMENSION_LEVEL * asked.on)
    if kind in {"radius", "diameter", "arc"} and bool(
        (np.abs(np.abs(point - sites.centres) - sites.radii) <= asked.on).any()
    ):
        return True  # on a rim drawn on
    carriers = _carriers(point, sites, tight)
    if carriers.size and (kind == "angular" or _turned(carriers)):
        return True
    direction = asked.dimension.direction
    if direction is not None and kind != "aligned":
        off = ((sites.spots - point) * np.conj(direction)).real
        if bool((np.abs(off) <= tight).any()):
            return True
    return _midway(point, sites.spots, asked)


def _carriers(point: Point, sites: Sites, tight: float) -> ComplexArray:
    """The directions of all lines that would run through the point if they were drawn on."""
    along = sites.ends - sites.starts
    lengths = np.abs(along)
    drawn = lengths > tight
    along = along[drawn] / lengths[drawn]
    off = ((point - sites.starts[drawn]) * np.conj(along)).imag
    found: ComplexArray = along[np.abs(off) <= tight]
    return found


def _turned(carriers: ComplexArray) -> bool:
    """Whether two of the lines cross there."""
    across: FloatArray = np.abs((carriers * np.conj(carriers[0])).imag)
    return bool((across > DIMENSION_LEVEL).any())


def _midway(point: Point, spots: ComplexArray, asked: _Asked) -> bool:
    """Whether the point is the middle between two ends or centres round about it."""
    near = spots[np.abs(spots - point) <= asked.size]
    if near.size > MOST_COMPARED:
        near = near[np.argsort(np.abs(near - point))[:MOST_COMPARED]]
    sums = near[:, None] + near[None, :] - 2.0 * point
    return bool((np.abs(sums) <= 2.0 * DIMENSION_LEVEL * asked.on).any())


def _unread_places(sketch: Sketch) -> list[Point | None]:
    """Where linework lies that was not read, or is hidden; None for what has no known place."""
    whole: list[Point | None] = [
        None if entity.type in _ENDLESS else entity.at
        for entity in sketch.entities
        if entity.fate is not None
        and (entity.fate.read_as == "unread" or entity.fate in HIDDEN)
        and entity.type not in _NO_LINEWORK
    ]
    return whole + [notice.at for notice in sketch.notices if notice.kind in _PARTLY_READ]


def _beside(point: Point, places: Sequence[Point | None], reach: float) -> bool:
    return any(place is None or abs(place - point) <= reach for place in places)
