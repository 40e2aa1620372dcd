"""Reader of dimensions: what is written on them, what they measure, and how their style shows it."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence
from itertools import chain
from typing import Any

from ezdxf.entities.dimension import Dimension as DxfDimension
from ezdxf.entities.dxfentity import DXFEntity

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.measures import measure, measuring_direction
from dxfcheck.drawing.placement import Placement
from dxfcheck.drawing.primitives import Dimension, DimensionStyle, Fate, Source
from dxfcheck.drawing.shapes import LIBRARY_FAULTS, Given, NotRead, Shapes, require_numbers
from dxfcheck.drawing.text import decode_paragraphs, unstack
from dxfcheck.tolerances.drawing import TILT_RADIANS

__all__ = ["read_dimension"]

_ORDINATE_OF_X = 64
_KIND_BITS = 15
_LARGE_RADIUS = 9
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
    _LARGE_RADIUS: ("radius", ("defpoint", "defpoint4")),  # a large radius with a jogged line
}
"""By the low bits of the dimension type: our word for it and the points that sit on geometry (Autodesk, DXF Reference,
DIMENSION group 70, from memory)."""
_ALL_POINTS = ("defpoint", "defpoint2", "defpoint3", "defpoint4")
_ANGLE_OF_LINES = 2
_MEASURED_TEXT = "<>"
_FEET = frozenset({3, 4})
"""DIMLUNIT: engineering and architectural units, both in feet and inches (DXF reference, from memory)."""
_FRACTIONS = frozenset({1, 4, 5})
"""DIMLUNIT in which the decimals are powers of ten of something else, or of two."""
_UNDERLINED = re.compile(r"\\L|%%[uU]")
_SWITCHES = re.compile(r"%%[uUoOkK]")


def read_dimension(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A DIMENSION of any kind; what it measures is None where its definition points do not tell."""
    assert isinstance(entity, DxfDimension)  # noqa: S101 - told by the kind
    code = int(given.get("dimtype", 0))
    # Programs write the type of an arc-length dimension in different ways; its entity name is sure.
    known = _ARC if entity.dxftype() == "ARC_DIMENSION" else _KINDS.get(code & _KIND_BITS)
    if known is None:
        raise NotRead(Fate("unread", "a dimension of an unknown type"))
    kind, names = known
    require_numbers(*chain.from_iterable(given[name].xyz for name in names if name in given))
    raw = str(given.get("text", ""))
    text = decode_paragraphs(_SWITCHES.sub("", unstack(raw)) if "\\" in raw or "%%" in raw else raw)
    points = _points(given, lines=code & _KIND_BITS == _ANGLE_OF_LINES)
    direction = _direction(given, code, kind, points)
    style = _style(entity)
    placed = tuple(place(points[name]) for name in names if name in points)
    dimension = Dimension(
        source,
        text="" if text.strip() == _MEASURED_TEXT else text,
        measured=_measured(kind, points, direction, style) if style is not None and _is_flat(given, names) else None,
        points=placed,
        kind=kind,
        direction=_placed(direction, place),
        style=style or DimensionStyle(),
        underlined=bool(_UNDERLINED.search(raw)),
    )
    return (dimension,), 0.0, 0.0


def _is_flat(given: Given, names: Sequence[str]) -> bool:
    """Whether it lies in a plane of the sheet, so that it measures what is seen."""
    if "extrusion" in given and (given["extrusion"].x or given["extrusion"].y):
        return False
    stated = [given[name] for name in names if name in given]
    span = max((abs(one.x - stated[0].x) + abs(one.y - stated[0].y) for one in stated), default=0.0)
    return all(abs(one.z - stated[0].z) <= TILT_RADIANS * span for one in stated)


def _points(given: Given, *, lines: bool) -> dict[str, complex]:
    names = (*_ALL_POINTS, "defpoint5") if lines else _ALL_POINTS
    return {name: complex(given[name].x, given[name].y) for name in names if name in given}


def _direction(given: Given, code: int, kind: str, points: dict[str, complex]) -> complex | None:
    """Along what it measures in its own plane; None too for an ordinate in a turned coordinate system."""
    if kind == "ordinate" and given.get("horizontal_direction", 0.0):
        return None
    angle = math.radians(float(given.get("angle", 0.0)))
    if kind == "linear" and "extrusion" in given and given["extrusion"].z < 0.0:
        angle = math.pi - angle  # angles are seen from behind there
    return measuring_direction(kind, points, angle, of_x=bool(code & _ORDINATE_OF_X))


def _placed(direction: complex | None, place: Placement) -> complex | None:
    """The direction on the sheet."""
    if direction is None:
        return None
    turned = place(direction) - place(0j)
    return turned / abs(turned) if turned else None


def _measured(kind: str, points: dict[str, complex], direction: complex | None, style: DimensionStyle) -> float | None:
    figure = measure(kind, points, direction)
    if figure is None:
        return None
    measured = figure if kind == "angular" else figure * style.factor
    return measured if math.isfinite(measured) else None


def _style(entity: DxfDimension) -> DimensionStyle | None:
    """What its style and its own overrides say; None where its style is not in the drawing."""
    try:
        override = entity.override()
        factor = _number(override.get("dimlfac"), 1.0)
        decimals = override.get("dimdec")
        shown = int(_number(override.get("dimlunit"), 0.0))
        alternate = _number(override.get("dimaltf"), 0.0) if override.get("dimalt") else 0.0
        return DimensionStyle(
            # A negative factor applies to dimensions of paper space alone (DXF reference, DIMLFAC, from memory).
            factor=factor if factor > 0.0 else 1.0,
            rounding=max(0.0, _number(override.get("dimrnd"), 0.0)),
            decimals=int(decimals) if isinstance(decimals, int) and shown not in _FRACTIONS else None,
            suffix=clean(str(override.get("dimpost") or "")),
            alternate=alternate if alternate > 0.0 else None,
            alternate_suffix=clean(str(override.get("dimapost") or "")),
            feet=shown in _FEET,
        )
    except LIBRARY_FAULTS:
        return None


def _number(value: Any, default: float) -> float:  # noqa: ANN401 - whatever the style holds
    """The value where it is a finite number, else the default."""
    return float(value) if isinstance(value, int | float) and math.isfinite(value) else default
