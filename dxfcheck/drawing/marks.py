"""Readers of filled areas."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import chain

from ezdxf import path as ezdxf_path
from ezdxf.entities.boundary_paths import PolylinePath
from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.entities.hatch import Hatch

from dxfcheck.drawing.placement import Placement
from dxfcheck.drawing.primitives import Fate, Fill, Source
from dxfcheck.drawing.shapes import Given, NotRead, Shapes, require_numbers
from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import FLATTENING_OF_RADIUS

__all__ = ["read_hatch", "read_solid"]

_NO_OUTLINE = Fate("skipped", "a fill without an outline")


def read_hatch(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A HATCH: its boundaries with curved edges flattened, solid or a pattern."""
    assert isinstance(entity, Hatch)  # noqa: S101 - told by the kind
    elevation = given.get("elevation")
    z = elevation.z if elevation is not None else 0.0
    outlines = tuple(outline for outline in map(_outline, entity.paths) if len(outline) > 1)
    require_numbers(z, *(part for outline in outlines for point in outline for part in (point.real, point.imag)))
    if not outlines:
        raise NotRead(_NO_OUTLINE)
    placed = tuple(tuple(place(point) for point in outline) for outline in outlines)
    height = place.height(z)
    return (Fill(source, placed, bool(given.get("solid_fill", 0))),), height, height


def _outline(boundary: object) -> tuple[Point, ...]:
    """The corners of one boundary of a hatch, the first not repeated, in the hatch's own plane."""
    if isinstance(boundary, PolylinePath) and not boundary.has_bulge():
        return _open_ended(complex(x, y) for x, y, _ in boundary.vertices)
    curve = ezdxf_path.from_hatch_boundary_path(boundary)  # type: ignore[arg-type]
    controls = list(curve.control_vertices())
    if len(controls) <= 1:
        return ()
    require_numbers(*chain.from_iterable(vertex.xyz for vertex in controls))
    size = max(vertex.distance(controls[0]) for vertex in controls)
    if size == 0.0:
        return ()
    return _open_ended(complex(x, y) for x, y, _ in (v.xyz for v in curve.flattening(size * FLATTENING_OF_RADIUS)))


def _open_ended(points: Iterable[Point]) -> tuple[Point, ...]:
    """The points without a last one that repeats the first."""
    listed = tuple(points)
    return listed[:-1] if len(listed) > 1 and listed[0] == listed[-1] else listed


def read_solid(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A SOLID or TRACE: its third and fourth corners are stored crosswise."""
    corners = [given[name].xyz for name in ("vtx0", "vtx1", "vtx3", "vtx2") if name in given]
    require_numbers(*chain.from_iterable(corners))
    points: list[Point] = []
    for x, y, _ in corners:
        point = place(complex(x, y))
        if point not in points:
            points.append(point)
    if len(points) < 2:
        raise NotRead(_NO_OUTLINE)
    heights = [place.height(z) for _, _, z in corners]
    return (Fill(source, (tuple(points),), solid=True),), min(heights), max(heights)
