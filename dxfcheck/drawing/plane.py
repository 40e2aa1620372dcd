"""The plane of the sheet: which z most linework shares, what lies off it, and how large the sheet is."""

from __future__ import annotations

import cmath
import math
from collections import defaultdict
from collections.abc import Iterable, Sequence
from typing import NamedTuple

from dxfcheck.drawing.curves import FULL_TURN
from dxfcheck.drawing.extract import Extraction, Heights
from dxfcheck.drawing.fates import OFF_PLANE
from dxfcheck.drawing.primitives import Arc, Entity, Fill, Notice, Path, Primitive, Ring, Segment
from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import FAR_OF_DIAGONAL, SHAPE_OF_DIAGONAL

__all__ = ["Extent", "distance_notice", "extent_of", "flatten"]


class Extent(NamedTuple):
    """The box round all linework; both corners 0 where there is none."""

    low: Point
    high: Point

    @property
    def diagonal(self) -> float:
        """Length of its diagonal in the drawing's unit."""
        return abs(self.high - self.low)


def extent_of(primitives: Iterable[Primitive]) -> Extent:
    """The box round the linework among the primitives; texts, dimensions and fills do not count."""
    points: list[Point] = []
    add = points.append
    for primitive in primitives:
        kind = type(primitive)
        if kind is Segment:
            add(primitive[1])  # type: ignore[arg-type] # start and end by position: this loop sees every line
            add(primitive[2])  # type: ignore[arg-type]
        elif isinstance(primitive, Ring):
            reach = complex(primitive.radius, primitive.radius)
            points += (primitive.centre - reach, primitive.centre + reach)
        elif isinstance(primitive, Arc):
            points += _arc_extremes(primitive)
        elif isinstance(primitive, Path):
            points += primitive.vertices
            for piece in primitive.pieces:
                if isinstance(piece, Arc):
                    points += _arc_extremes(piece)
    if not points:
        return Extent(0j, 0j)
    reals = [point.real for point in points]
    imaginaries = [point.imag for point in points]
    return Extent(complex(min(reals), min(imaginaries)), complex(max(reals), max(imaginaries)))


def _arc_extremes(arc: Arc) -> list[Point]:
    """Ends of an arc and those of its points that lie furthest right, up, left and down."""
    quarter = FULL_TURN / 4
    first = math.ceil(arc.start_angle / quarter)
    last = math.floor((arc.start_angle + arc.sweep) / quarter)
    tops = [arc.centre + cmath.rect(arc.radius, quarter * step) for step in range(first, last + 1)]
    return [arc.start, arc.end, *tops]


def flatten(extraction: Extraction, diagonal: float) -> Extraction:
    """The extraction without what lies off the plane most linework is in, with fates and notices for that."""
    if not extraction.heights:
        return extraction
    slack = SHAPE_OF_DIAGONAL * diagonal
    level = _common_height(extraction, slack)
    heights = [*extraction.heights, *_ground(extraction)] if abs(level) > slack else extraction.heights
    off = [piece for piece in heights if abs(piece.low - level) > slack or abs(piece.high - level) > slack]
    if not off:
        return extraction
    dropped: set[int] = set()
    by_entity: dict[int, list[Heights]] = defaultdict(list)
    for piece in off:
        dropped.update(range(piece.first, piece.last))
        by_entity[extraction.primitives[piece.first].source.entity].append(piece)
    primitives = [shape for index, shape in enumerate(extraction.primitives) if index not in dropped]
    left = {shape.source.entity for shape in primitives}
    entities: list[Entity] = list(extraction.entities)
    notices = list(extraction.notices)
    for index, pieces in sorted(by_entity.items()):
        notices.append(_off_plane(index, entities[index], extraction.primitives, pieces, level))
        if index not in left:
            entities[index] = entities[index]._replace(fate=OFF_PLANE)
    return Extraction(entities, primitives, notices, [], extraction.unplotted)


def _ground(extraction: Extraction) -> list[Heights]:
    """The linework at z = 0 throughout, of which the extraction keeps no heights."""
    raised: set[int] = set()
    for piece in extraction.heights:
        raised.update(range(piece.first, piece.last))
    shapes = enumerate(extraction.primitives)
    drawn = (Segment, Ring, Arc, Path, Fill)
    return [Heights(at, at + 1, 0.0, 0.0) for at, shape in shapes if at not in raised and isinstance(shape, drawn)]


def _common_height(extraction: Extraction, slack: float) -> float:
    """The z that most shapes share within the slack; the one nearer to 0 of two that are equally common."""
    weights: dict[float, int] = defaultdict(int)
    for piece in extraction.heights:
        if piece.high - piece.low <= slack:
            weights[(piece.low + piece.high) / 2] += piece.last - piece.first
    grounded = len(_ground(extraction))
    if grounded:
        weights[0.0] += grounded
    levels = sorted(weights)
    best, best_key = 0.0, (0, 0.0)
    last, total = 0, 0
    for first, low in enumerate(levels):
        while last < len(levels) and levels[last] - low <= slack:
            total += weights[levels[last]]
            last += 1
        heaviest = max(levels[first:last], key=lambda z: weights[z])
        if (total, -abs(heaviest)) > best_key:
            best, best_key = heaviest, (total, -abs(heaviest))
        total -= weights[low]
    return best


def _off_plane(
    index: int, entity: Entity, primitives: Sequence[Primitive], pieces: Sequence[Heights], level: float
) -> Notice:
    """The notice for an entity of which some pieces lie off the plane: the greatest difference of z, and the tilt."""
    worst = max(pieces, key=lambda piece: max(abs(piece.low - level), abs(piece.high - level)))
    amount = max(worst.low - level, worst.high - level, key=abs)
    rise = worst.high - worst.low
    span = extent_of(primitives[worst.first : worst.last]).diagonal
    where = f"lies {abs(amount):.6g} {'above' if amount > 0 else 'below'} the plane of the sheet"
    if rise > SHAPE_OF_DIAGONAL * max(span, abs(amount)):
        where += f", tilted by {math.degrees(math.atan2(rise, span)):.3g} degrees"
    return Notice("off-plane", where, index, entity.at, amount)


def distance_notice(extent: Extent) -> Notice | None:
    """A notice where the sheet lies so far from the origin that the numbers hold too few digits for its shapes."""
    furthest = max(abs(extent.low), abs(extent.high))
    if extent.diagonal == 0.0 or furthest <= FAR_OF_DIAGONAL * extent.diagonal:
        return None
    times = furthest / extent.diagonal
    return Notice("far-from-origin", f"{times:.3g} diagonals from the origin", None, extent.low, furthest)
