"""Small drawings made on the spot."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import ezdxf
import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing import load_sketch
from dxfcheck.drawing.primitives import Sketch
from dxfcheck.settings import Settings


@pytest.fixture
def sketch_of(tmp_path: Path) -> Callable[[Callable[[Drawing], object]], Sketch]:
    """Draw with a function, save, and load what was saved."""

    def load(draw: Callable[[Drawing], object], *, version: str = "R2010", settings: Settings | None = None) -> Sketch:
        document = ezdxf.new(version)
        draw(document)
        path = tmp_path / "tray-tipper.dxf"
        document.saveas(path)
        return load_sketch(path, settings or Settings())

    return load
