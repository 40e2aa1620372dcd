"""A drawing file, through all steps of this stage, to a Sketch."""

from __future__ import annotations

from pathlib import Path

from ezdxf.document import Drawing

from dxfcheck.collector import collector_paused
from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.extract import extract
from dxfcheck.drawing.load import open_drawing
from dxfcheck.drawing.plane import distance_notice, extent_of, flatten
from dxfcheck.drawing.primitives import LengthUnit, Notice, Sketch
from dxfcheck.drawing.units import header_metric, header_unit, parse_unit
from dxfcheck.settings import Settings

__all__ = ["read_sketch"]


def read_sketch(path: str | Path, settings: Settings) -> Sketch:
    """The drawing at ``path`` as plain shapes in one plane, every entity accounted for.

    Raises DrawingUnreadable where the file is no DXF or damaged beyond repair, OptionInvalid where the settings name
    an unknown unit.
    """
    stated = parse_unit(settings.unit)._replace(source=settings.unit_source) if settings.unit is not None else None
    with collector_paused():
        document, notices = open_drawing(Path(path))
        return _sketch(str(path), document, stated, notices)


def _sketch(path: str, document: Drawing, stated: LengthUnit | None, notices: tuple[Notice, ...]) -> Sketch:
    raw = extract(document)
    extent = extent_of(raw.primitives)
    flat = flatten(raw, extent.diagonal)
    if flat is not raw:
        extent = extent_of(flat.primitives)
    far = distance_notice(extent)
    return Sketch(
        path=clean(path),
        unit=stated or header_unit(document.header.get("$INSUNITS", 0)),
        entities=tuple(flat.entities),
        primitives=tuple(flat.primitives),
        notices=(*notices, *flat.notices, *([far] if far else [])),
        diagonal=extent.diagonal,
        metric=header_metric(document.header.get("$MEASUREMENT")),
        unplotted=flat.unplotted,
    )
