"""Readers of dimensions and of filled areas."""

from __future__ import annotations

import math
from collections.abc import Iterable
from itertools import chain

from ezdxf import path as ezdxf_path
from ezdxf.entities.boundary_paths import PolylinePath
from ezdxf.entities.dimension import Dimension as DxfDimension
from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.entities.hatch import Hatch

from dxfcheck.drawing.placement import Placement
from dxfcheck.drawing.primitives import Dimension, Fate, Fill, Source
from dxfcheck.drawing.shapes import LIBRARY_FAULTS, Given, NotRead, Shapes, require_numbers
from dxfcheck.drawing.text import decode_paragraphs
from dxfcheck.geometry import Point
from dxfcheck.tolerances import FLATTENING_OF_RADIUS

__all__ = ["read_dimension", "read_hatch", "read_solid"]

_ORDINATE_OF_X = 64
_KIND_BITS = 15
_ARC = ("arc", ("defpoint2", "defpoint3", "defpoint4"))
_KINDS: dict[int, tuple[str, tuple[str, ...]]] = {
    0: ("linear", ("defpoint2", "defpoint3")),
    1: ("aligned", ("defpoint2", "defpoint3")),
    2: ("angular", ("defpoint2", "defpoint3", "defpoint4", "defpoint")),
    3: ("diameter", ("defpoint", "defpoint4")),
    4: ("radius", ("defpoint", "defpoint4")),
    5: ("angular", ("defpoint2", "defpoint3", "defpoint4")),
    6: ("ordinate", ("defpoint2",)),
    8: _ARC,
    9: ("radius", ("defpoint", "defpoint4")),  # a large radius with a jogged line; its measure is not told
}
"""By the low bits of the dimension type: our word for it and the points that sit on geometry (Autodesk, DXF Reference,
DIMENSION group 70, from memory)."""
_MEASURED_TEXT = "<>"
_NO_OUTLINE = Fate("skipped", "a fill without an outline")


def read_dimension(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A DIMENSION of any kind; what it measures is None where its definition points do not tell."""
    assert isinstance(entity, DxfDimension)  # noqa: S101 - told by the kind
    code = int(given.get("dimtype", 0))
    # Programs write the type of an arc-length dimension in different ways; its entity name is sure.
    known = _ARC if entity.dxftype() == "ARC_DIMENSION" else _KINDS.get(code & _KIND_BITS)
    if known is None:
        raise NotRead(Fate("unread", "a dimension of an unknown type"))
    kind, names = known
    points = [given[name].xyz for name in names if name in given]
    require_numbers(*chain.from_iterable(points))
    text = decode_paragraphs(str(given.get("text", "")))
    text = "" if text.strip() == _MEASURED_TEXT else text
    placed = tuple(place(complex(x, y)) for x, y, _ in points)
    return (Dimension(source, text, _measured(entity, kind, code), placed, kind),), 0.0, 0.0


def _measured(entity: DxfDimension, kind: str, code: int) -> float | None:
    """The figure a dimension stands for in its own block's unit, after the style's linear factor; None if unknown."""
    if kind == "arc":
        return None  # the library measures the angle, if anything
    try:
        figure = entity.get_measurement()
        factor = 1.0 if kind == "angular" else float(entity.override().get("dimlfac", 1.0) or 1.0)
    except LIBRARY_FAULTS:
        return None
    if not isinstance(figure, int | float):
        figure = abs(figure.x if code & _ORDINATE_OF_X else figure.y)
    # A negative factor applies to dimensions of paper space alone (DXF reference, DIMLFAC, from memory).
    measured = float(figure) * (factor if factor > 0.0 else 1.0)
    return measured if math.isfinite(measured) else None


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
