from __future__ import annotations

import pytest

from tests.sketches import (
    A,
    B,
    C,
    Drawn,
    dimension,
    fates,
    fill,
    line,
    obround,
    path,
    pins,
    read,
    rectangle,
    ring,
    rod,
    rods,
    text,
    tipper,
)

BESIDE_CRANK = 12 + 14j


@pytest.mark.parametrize(
    ("thing", "read_as", "why"),
    [
        pytest.param(line(300j, 300j + 50), "other linework", "no pin on it", id="linework without a pin"),
        pytest.param(line(0j, 300j, linetype="PHANTOM2"), "skipped", "linetype PHANTOM2", id="other positions"),
        pytest.param(line(0j, 300j, layer="Dim"), "skipped", "layer Dim", id="construction layer"),
        pytest.param(ring(300j), "other linework", "no link on it", id="an empty ring"),
        pytest.param(text("TRAY TIPPER", 300j), "note", "text", id="a text"),
        pytest.param(text("ω = 3 rad/s", BESIDE_CRANK, 2.0), "drive note", "states a drive", id="a drive note"),
        pytest.param(dimension(40.0, A, B), "note", "dimension", id="a dimension"),
        pytest.param(fill(300j, 310j, 310j + 5, solid=False), "skipped", "pattern hatch", id="a pattern hatch"),
        pytest.param(fill(300j, 310j, 310j + 5, solid=True), "skipped", "no part of a link", id="a solid fill"),
        pytest.param(line(A, A - 20j, layer="FRAME"), "frame", "layer FRAME", id="linework on a frame layer"),
        pytest.param(line(A, A - 20j, block="BASE"), "frame", "block BASE", id="a frame block"),
        pytest.param(
            path(-60 - 60j, 300 - 60j, 300 + 200j, -60 + 200j, closed=True), "skipped", "encloses", id="a sheet border"
        ),
        pytest.param(
            ring(300j, layer="GEAR"), "skipped", "rolls on nothing", id="a ring on a pitch layer beside no other"
        ),
    ],
)
def test_what_else_is_on_the_sheet_of_the_tray_tipper(thing: Drawn, read_as: str, why: str) -> None:
    fate = fates(*tipper(), thing._replace(handle="thing"))["thing"]
    assert fate.read_as == read_as
    assert why in fate.why


def test_the_parts_of_the_tray_tipper() -> None:
    read_as = {handle: fate.read_as for handle, fate in fates(*tipper()).items()}
    assert read_as == {
        **dict.fromkeys(["ring A", "ring B", "ring C", "ring D"], "pin"),
        **dict.fromkeys(["crank", "coupler", "rocker"], "link"),
        **dict.fromkeys(["label A", "label B", "label C", "label D"], "label"),
    }


def test_linework_welded_to_the_frame_is_frame_and_says_so() -> None:
    bracket = [line(A, A - 20j, layer="FRAME"), line(A - 20j, A + 30 - 20j, handle="welded")]
    fate = fates(*tipper(), *bracket)["welded"]
    assert fate == ("frame", "welded to the frame")


def test_a_disc_is_told_from_a_pin() -> None:
    hub = 60 + 60j
    plate = [ring(hub, 30.0, handle="plate"), ring(hub + 20, 3.0), ring(hub - 20, 3.0)]
    assert fates(*plate, rod(hub + 20, 200 + 0j))["plate"].read_as == "disc"


@pytest.mark.parametrize(
    ("shape", "word"),
    [
        pytest.param(rectangle(C, 24, 14), "slide", id="block"),
        pytest.param(obround(C - 9, C + 9, 5), "slot", id="slot"),
    ],
)
def test_what_a_pin_slides_in_is_told_from_the_link_that_ends_there(shape: Drawn, word: str) -> None:
    read_as = fates(*pins(), *rods()[:2], shape._replace(handle="shape"))
    assert read_as["shape"].read_as == word
    assert read_as["coupler"].why == "part of a link"


def test_pins_and_lines_that_hang_on_no_linkage() -> None:
    lone = fates(*tipper(), ring(300j), ring(350j, handle="end"), rod(300j, 350j, handle="rod"))
    assert lone["rod"].read_as == "other linework"
    assert lone["end"].why == "a ring on linework that hangs on no linkage"


def test_the_account_sums_to_the_entities() -> None:
    things = [*tipper(), ring(300j), line(300j, 340j), text("note", 10j), dimension(3.0)]
    assert sum(each.count for each in read(*things).account) == len(things)
