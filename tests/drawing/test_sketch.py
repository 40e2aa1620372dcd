from __future__ import annotations

import gc
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Sketch
from dxfcheck.errors import OptionInvalid
from dxfcheck.settings import Settings

Sketcher = Callable[..., Sketch]


def in_unit(code: int) -> Callable[[Drawing], None]:
    def draw(drawing: Drawing) -> None:
        drawing.units = code
        drawing.modelspace().add_line((0, 0), (1, 0))

    return draw


def test_the_unit_comes_from_the_header(sketch_of: Sketcher) -> None:
    assert sketch_of(in_unit(4)).unit == ("mm", "header", 1e-3)
    assert sketch_of(in_unit(0)).unit == ("unitless", "assumed", None)


def test_an_option_overrules_the_header_and_scales_nothing(sketch_of: Sketcher) -> None:
    sketch = sketch_of(in_unit(4), settings=Settings(unit="in"))
    assert sketch.unit == ("in", "option", 0.0254)
    stated = sketch_of(in_unit(4), settings=Settings(unit="in", unit_source="settings"))
    assert stated.unit.source == "settings"
    assert sketch.diagonal == 1


def test_an_old_file_without_units_is_unitless(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_line((0, 0), (1, 0)), version="R12")
    assert sketch.unit.name == "unitless"


def test_an_unknown_unit_is_refused_before_the_file_is_looked_at(sketch_of: Sketcher) -> None:
    with pytest.raises(OptionInvalid, match="furlong"):
        sketch_of(in_unit(4), settings=Settings(unit="furlong"))


def test_the_cycle_collector_is_left_as_it_was(sketch_of: Sketcher) -> None:
    assert gc.isenabled()
    sketch_of(in_unit(4))
    assert gc.isenabled()


def test_a_damaged_configuration_beside_the_drawing_gives_one_line(tmp_path: Path) -> None:
    (tmp_path / "ezdxf.ini").write_text("no section\n")
    program = (
        "from dxfcheck.drawing import load_sketch\n"
        "from dxfcheck.errors import DrawingUnreadable\n"
        "from dxfcheck.settings import Settings\n"
        "try:\n    load_sketch('a.dxf', Settings())\n"
        "except DrawingUnreadable as fault:\n    print(fault)\n"
    )
    root = str(Path(__file__).parents[2])
    done = subprocess.run(
        [sys.executable, "-c", program],
        cwd=tmp_path,
        env={"PYTHONPATH": root, "HOME": str(tmp_path)},
        capture_output=True,
        text=True,
        check=False,
    )
    assert "ezdxf.ini" in done.stdout
    assert done.stderr == ""
