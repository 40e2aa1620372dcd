"""Readers of the entities that draw lines: one small function a kind."""

from __future__ import annotations

import math
from itertools import chain
from typing import Any

from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.entities.lwpolyline import LWPolyline
from ezdxf.entities.polyline import Polyline

from dxfcheck.drawing.curves import FULL_TURN, ellipse_shape, polyline_shape, sweep_between
from dxfcheck.drawing.placement import SHEET, Placement
from dxfcheck.drawing.primitives import Arc, Fate, Ring, Segment, Source
from dxfcheck.drawing.shapes import NOT_A_NUMBER, SQUARE_LIMIT, Given, NotRead, Shapes, faces_away, require_numbers

__all__ = ["read_arc", "read_circle", "read_ellipse", "read_line", "read_lwpolyline", "read_polyline"]

_ORIGIN = (0.0, 0.0, 0.0)
_NO_RADIUS = Fate("skipped", "a circle of no radius")
_MESH = 16
_POLYFACE = 64
_POLYLINE_3D = 8
_CLOSED = 1
_SPLINE_FRAME = 16


def read_line(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A LINE; its ends are in world coordinates whatever its extrusion says."""
    x1, y1, z1 = given["start"].xyz
    x2, y2, z2 = given["end"].xyz
    if not x1 * x1 + y1 * y1 + z1 * z1 + x2 * x2 + y2 * y2 + z2 * z2 < SQUARE_LIMIT:
        raise NotRead(NOT_A_NUMBER)
    if place is SHEET:
        return (Segment(source, complex(x1, y1), complex(x2, y2)),), z1, z2
    start, end = complex(x1, y1), complex(x2, y2)
    direct, mirrored, shift, z_scale, z_shift = place  # as Placement does, without its calls: blocks hold most lines
    start = direct * start + mirrored * start.conjugate() + shift
    end = direct * end + mirrored * end.conjugate() + shift
    return (Segment(source, start, end),), z_scale * z1 + z_shift, z_scale * z2 + z_shift


def read_circle(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A CIRCLE, a ring unless an unevenly scaled block makes an ellipse of it."""
    x, y, z = given["center"].xyz
    radius = abs(given.get("radius", 1.0))
    if not x * x + y * y + z * z + radius * radius < SQUARE_LIMIT:
        raise NotRead(NOT_A_NUMBER)
    if radius == 0.0:
        raise NotRead(_NO_RADIUS)
    if place is SHEET:
        return (Ring(source, complex(x, y), radius),), z, z
    direct, mirrored, shift, z_scale, z_shift = place
    height = z_scale * z + z_shift
    centre = complex(x, y)
    if not mirrored:
        return (Ring(source, direct * centre + shift, radius * abs(direct)),), height, height
    if not direct:
        return (Ring(source, mirrored * centre.conjugate() + shift, radius * abs(mirrored)),), height, height
    return (ellipse_shape(source, place, centre, complex(radius), 0j, 0.0, FULL_TURN),), height, height


def read_arc(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """An ARC; a full turn is a ring."""
    x, y, z = given["center"].xyz
    radius = abs(given.get("radius", 1.0))
    start = math.radians(given.get("start_angle", 0.0))
    end = math.radians(given.get("end_angle", 360.0))
    require_numbers(x, y, z, radius, start, end)
    sweep = sweep_between(start, end)
    if place is SHEET and radius and 0.0 < sweep < FULL_TURN:
        return (Arc(source, complex(x, y), radius, start, sweep),), z, z
    shape = ellipse_shape(source, place, complex(x, y), complex(radius), 0j, start, sweep)
    height = place.height(z)
    return (shape,), height, height


def read_ellipse(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """An ELLIPSE: c + a cos t + b sin t, with b perpendicular to the half axis a and ``ratio`` times as long."""
    x, y, z = given["center"].xyz
    axis_x, axis_y, axis_z = given["major_axis"].xyz
    ratio = abs(given.get("ratio", 1.0))
    start = given.get("start_param", 0.0)
    end = given.get("end_param", FULL_TURN)
    require_numbers(x, y, z, axis_x, axis_y, axis_z, ratio, start, end)
    across = -ratio if faces_away(given.get("extrusion", (0.0, 0.0, 1.0))) else ratio
    # cos t = (e^it + e^-it) / 2, sin t = (e^it - e^-it) / 2i, and b = i * across * a.
    axis = complex(axis_x, axis_y)
    forward, backward = axis * (1 + across) / 2, axis * (1 - across) / 2
    shape = ellipse_shape(source, place, complex(x, y), forward, backward, start, sweep_between(start, end))
    return (shape,), place.height(z - abs(axis_z)), place.height(z + abs(axis_z))


def read_lwpolyline(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """An LWPOLYLINE with its bulges; widths are not looked at."""
    assert isinstance(entity, LWPolyline)  # noqa: S101 - told by the kind
    z = float(given.get("elevation", 0.0))
    rows = entity.lwpoints.values.tolist()
    require_numbers(z, *chain.from_iterable(rows))
    corners = [(complex(x, y), bulge) for x, y, _, _, bulge in rows]
    shape = polyline_shape(source, place, corners, closed=bool(given.get("flags", 0) & _CLOSED))
    height = place.height(z)
    return (shape,), height, height


def read_polyline(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A POLYLINE of two or three dimensions; meshes are not read, frame points of spline fits are left out."""
    assert isinstance(entity, Polyline)  # noqa: S101 - told by the kind
    flags = given.get("flags", 0)
    if flags & (_MESH | _POLYFACE):
        raise NotRead(Fate("unread", "a mesh is not read"))
    stated = [vars(vertex.dxf) for vertex in entity.vertices]
    drawn = [vertex for vertex in stated if not vertex.get("flags", 0) & _SPLINE_FRAME]
    places = [vertex["location"].xyz if "location" in vertex else _ORIGIN for vertex in drawn]
    bulges = [float(vertex.get("bulge", 0.0)) for vertex in drawn]
    require_numbers(*chain.from_iterable(places), *bulges)
    corners = [(complex(x, y), bulge) for (x, y, _), bulge in zip(places, bulges, strict=True)]
    shape = polyline_shape(source, place, corners, closed=bool(flags & _CLOSED))
    heights = [place.height(z) for z in _heights(given, places, solid=bool(flags & _POLYLINE_3D))]
    require_numbers(*heights)
    return (shape,), min(heights), max(heights)


def _heights(given: Given, places: list[tuple[float, float, float]], *, solid: bool) -> list[float]:
    """The z of a polyline's vertices: their own in three dimensions, the common elevation in two."""
    if solid:
        return [z for _, _, z in places]
    elevation: Any = given.get("elevation")
    return [elevation.z if elevation is not None else 0.0]
