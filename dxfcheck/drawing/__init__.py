"""From a DXF file to a Sketch of plain shapes; the only stage that knows ezdxf's entities."""

from __future__ import annotations

import configparser
from pathlib import Path

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.primitives import Sketch
from dxfcheck.errors import DrawingUnreadable
from dxfcheck.settings import Settings

__all__ = ["load_sketch"]


def load_sketch(path: str | Path, settings: Settings) -> Sketch:
    """The drawing at ``path`` as plain shapes; DrawingUnreadable where it is none, OptionInvalid for a unit unknown."""
    try:
        # Imported here because ezdxf takes 0.4 s, and whoever wants only the primitives or the units must not pay it.
        from dxfcheck.drawing.sketch import read_sketch  # noqa: PLC0415
    except (configparser.Error, SystemExit) as fault:
        # The library reads a file ezdxf.ini of the current folder on import, and gives up where that is damaged.
        reason = "the DXF library cannot start because of a damaged file ezdxf.ini"
        raise DrawingUnreadable(clean(str(path)), reason, "remove ezdxf.ini from the current folder") from fault
    return read_sketch(path, settings)
