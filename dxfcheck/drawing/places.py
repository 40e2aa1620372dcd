"""Where an entity lies, so that a finding on it can be shown; for entities that are not read, as far as can be told."""

from __future__ import annotations

import cmath
from typing import Any

from ezdxf.entities.dxfentity import DXFEntity

from dxfcheck.drawing.primitives import Arc, Dimension, Fill, Path, Primitive, Ring, Segment, Text
from dxfcheck.drawing.shapes import LIBRARY_FAULTS, Given
from dxfcheck.geometry import Point

__all__ = ["place_of_entity", "place_of_primitive"]

_POINT_NAMES = ("insert", "start", "center", "location", "vtx0", "defpoint")
_POINT_LISTS = ("control_points", "fit_points", "vertices")


def place_of_primitive(primitive: Primitive) -> Point | None:
    """A point of a shape: its start, centre or first corner; None for a dimension without points."""
    if isinstance(primitive, Segment):
        return primitive.start
    if isinstance(primitive, Ring):
        return primitive.centre
    if isinstance(primitive, Arc):
        return primitive.start
    if isinstance(primitive, Path):
        return primitive.vertices[0]
    if isinstance(primitive, Text):
        return primitive.at
    points = primitive.points if isinstance(primitive, Dimension) else _first(primitive)
    return points[0] if points else None


def _first(fill: Fill) -> tuple[Point, ...]:
    return fill.outlines[0] if fill.outlines else ()


def place_of_entity(entity: DXFEntity, given: Given) -> Point | None:
    """A point of an entity that yielded no shapes, None where none can be told; a mirrored one's may be its own."""
    try:
        for name in _POINT_NAMES:
            if name in given:
                return _finite(given[name])
        for name in _POINT_LISTS:
            points = getattr(entity, name, None)
            if points is not None and not callable(points) and len(points) > 0:
                return _finite(getattr(points[0], "location", points[0]))  # those of a multiline have more than a place
    except LIBRARY_FAULTS:
        return None
    return None


def _finite(point: Any) -> Point | None:  # noqa: ANN401 - a vector, an array or a tuple, by the kind of entity
    place = complex(float(point[0]), float(point[1]))
    return place if cmath.isfinite(place) else None
