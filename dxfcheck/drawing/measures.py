"""What a dimension measures, from its definition points (in the plane of its own block, as complex numbers).

The meaning of the points is that of the group codes of DIMENSION and ARC_DIMENSION (Autodesk, DXF Reference, from
memory; tried on dimensions of the libraries' samples, whose stored measurements agree).
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Mapping

from dxfcheck.geometry import Point, cross, dot

__all__ = ["measure", "measuring_direction"]

_FIRST, _SECOND, _THIRD, _OWN, _ARC = "defpoint2", "defpoint3", "defpoint4", "defpoint", "defpoint5"


def measuring_direction(kind: str, points: Mapping[str, Point], angle: float, *, of_x: bool) -> Point | None:
    """Unit vector along which a linear dimension (at ``angle`` radians) or an ordinate measures; None for others."""
    if kind == "linear":
        return cmath.rect(1.0, angle)
    if kind == "ordinate":
        return 1 + 0j if of_x else 1j
    if kind == "aligned" and _FIRST in points and _SECOND in points:
        along = points[_SECOND] - points[_FIRST]
        return along / abs(along) if along else None
    return None


def measure(kind: str, points: Mapping[str, Point], direction: Point | None) -> float | None:
    """The length, or the angle in degrees, that the points span; None where one of them is missing."""
    try:
        if kind in {"linear", "aligned"}:
            along = points[_SECOND] - points[_FIRST]
            return abs(dot(along, direction)) if direction is not None else abs(along)
        if kind in {"diameter", "radius"}:
            return abs(points[_THIRD] - points[_OWN])
        if kind == "ordinate":
            return abs(dot(points[_FIRST] - points[_OWN], direction)) if direction is not None else None
        if kind == "arc":
            return _arc_length(points)
        return _angle_of_lines(points) if _ARC in points else _angle_at_vertex(points)
    except KeyError:
        return None


def _arc_length(points: Mapping[str, Point]) -> float:
    """Length of the arc about the third point, on the side on which the dimension line stands."""
    centre = points[_THIRD]
    radius = abs(points[_FIRST] - centre)
    return radius * _swept(points[_FIRST] - centre, points[_SECOND] - centre, points[_OWN] - centre)


def _angle_at_vertex(points: Mapping[str, Point]) -> float:
    """The angle at the third point that holds the dimension's arc."""
    vertex = points[_THIRD]
    return math.degrees(_swept(points[_FIRST] - vertex, points[_SECOND] - vertex, points[_OWN] - vertex))


def _angle_of_lines(points: Mapping[str, Point]) -> float | None:
    """Of the four angles two lines make, the one that holds the dimension's arc; None for parallel lines."""
    one, other = points[_SECOND] - points[_FIRST], points[_OWN] - points[_THIRD]
    turn = cross(one, other)
    if not turn:
        return None
    crossing = points[_FIRST] + one * (cross(points[_THIRD] - points[_FIRST], other) / turn)
    towards = points[_ARC] - crossing
    # The sides of that angle are the half lines that the arc's point lies between.
    share = cross(towards, other) / turn, cross(one, towards) / turn
    sides = one if share[0] >= 0.0 else -one, other if share[1] >= 0.0 else -other
    return math.degrees(abs(cmath.phase(sides[1] / sides[0])))


def _swept(first: Point, last: Point, through: Point) -> float:
    """Radians from one direction to another by way of a third."""
    if not first or not last:
        return 0.0
    sweep = cmath.phase(last / first) % math.tau
    inside = not through or cmath.phase(through / first) % math.tau <= sweep
    return sweep if inside else math.tau - sweep
