"""Plane geometry on complex numbers.

A point or vector of the plane is the complex number x + iy: Python's own type then adds, turns and measures, in C and
without a vector class of ours. Lengths are in the drawing's unit, angles in radians counter-clockwise from +x.
"""

from __future__ import annotations

import cmath
import math

__all__ = ["Point", "angle_between_lines", "cross", "distance_to_segment", "dot", "parameter_on_line", "unit"]

Point = complex


def dot(a: Point, b: Point) -> float:
    """Scalar product of two vectors."""
    return a.real * b.real + a.imag * b.imag


def cross(a: Point, b: Point) -> float:
    """z component of the vector product; positive where b lies counter-clockwise of a."""
    return a.real * b.imag - a.imag * b.real


def unit(vector: Point) -> Point:
    """The vector scaled to length 1; ValueError for a zero vector."""
    length = abs(vector)
    if length == 0.0:
        msg = "a zero vector has no direction"
        raise ValueError(msg)
    return vector / length


def parameter_on_line(point: Point, start: Point, end: Point) -> float:
    """Where the foot of the perpendicular from a point falls: 0 at start, 1 at end (0 for a line of no length)."""
    along = end - start
    square = dot(along, along)
    return dot(point - start, along) / square if square else 0.0


def distance_to_segment(point: Point, start: Point, end: Point) -> float:
    """Shortest distance from a point to a bounded straight line."""
    parameter = min(1.0, max(0.0, parameter_on_line(point, start, end)))
    return abs(point - (start + parameter * (end - start)))


def angle_between_lines(a: Point, b: Point) -> float:
    """Angle between two undirected lines along vectors a and b, 0 to pi/2; 0 where either has no length."""
    if a == 0 or b == 0:
        return 0.0
    angle = abs(cmath.phase(b / a))
    return min(angle, math.pi - angle)
