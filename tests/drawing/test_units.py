from __future__ import annotations

import subprocess
import sys

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.drawing.units import LENGTH_UNITS, header_metric, header_unit, parse_unit
from dxfcheck.errors import OptionInvalid

UNITLESS = LengthUnit("unitless", "assumed", None)


@pytest.mark.parametrize(
    ("code", "name", "metres"),
    [
        (1, "in", 0.0254),
        (2, "ft", 0.3048),
        (3, "mi", 1609.344),
        (4, "mm", 0.001),
        (6, "m", 1.0),
        (8, "uin", 2.54e-8),
        (9, "mil", 2.54e-5),
        (10, "yd", 0.9144),
        (13, "um", 1e-6),
        (20, "pc", 3.0856775814913673e16),
        (21, "ft-us", 1200 / 3937),
        (24, "mi-us", 5280 * 1200 / 3937),
    ],
)
def test_a_header_code_gives_name_and_size(code: int, name: str, metres: float) -> None:
    unit = header_unit(code)
    assert (unit.name, unit.source) == (name, "header")
    assert unit.metres == pytest.approx(metres, rel=1e-12)


def test_every_code_of_the_reference_has_a_name_of_its_own() -> None:
    assert len({header_unit(code).name for code in range(1, 25)}) == 24


@pytest.mark.parametrize("code", [0, -10, 25, 99, None, "mm", 4.5, float("nan")])
def test_a_code_out_of_range_is_unitless(code: object) -> None:
    assert header_unit(code) == UNITLESS


@pytest.mark.parametrize(
    ("stated", "name"), [("mm", "mm"), ("MM", "mm"), (" inch ", "in"), ("Gm", "Gm"), ("unitless", "unitless")]
)
def test_an_option_names_a_unit(stated: str, name: str) -> None:
    assert parse_unit(stated) == LengthUnit(name, "option", LENGTH_UNITS[name])


def test_an_unknown_unit_is_refused_with_the_known_ones() -> None:
    with pytest.raises(OptionInvalid, match=r"'furlong' is not known; use one of .*mm"):
        parse_unit("furlong")


def test_units_and_primitives_do_not_load_the_dxf_library() -> None:
    program = "import sys, dxfcheck.drawing.units, dxfcheck.drawing.primitives; sys.exit('ezdxf' in sys.modules)"
    assert subprocess.run([sys.executable, "-c", program], check=False).returncode == 0


@pytest.mark.parametrize(("code", "metric"), [(0, False), (1, True), (None, None), (7, None), ("1", None)])
def test_the_header_may_say_that_patterns_are_metric(code: object, metric: bool | None) -> None:  # noqa: FBT001
    assert header_metric(code) is metric
