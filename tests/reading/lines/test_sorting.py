from __future__ import annotations

import pytest

from dxfcheck.reading.lines.sorting import sort_primitives
from tests.sketches import Drawn, arc, dimension, fill, line, path, ring, sketch, text


def test_each_kind_goes_to_its_place() -> None:
    kinds = sort_primitives(
        sketch(
            line(0j, 1 + 0j),
            ring(0j),
            arc(0j, 1, 0, 90),
            path(0j, 1j),
            text("A", 0j),
            fill(0j, 1 + 0j, 1j, solid=True),
            dimension(5.0, 0j),
        )
    )
    assert [index for index, _ in kinds.lines] == [0, 2, 3]
    assert [index for index, _ in kinds.rings] == [1]
    assert [index for index, _ in kinds.texts] == [4]
    assert [index for index, _ in kinds.fills] == [5]
    assert kinds.skipped[6].read_as == "note"
    assert set(kinds.skipped) == {6}


@pytest.mark.parametrize("linetype", ["CENTER", "CENTER2", "DASHDOT", "DASHDOTX2", "PHANTOM", "HIDDEN2", "DIVIDE"])
def test_construction_linetypes_are_skipped_and_say_why(linetype: str) -> None:
    kinds = sort_primitives(sketch(line(0j, 1 + 0j, linetype=linetype)))
    assert kinds.lines == ()
    assert kinds.skipped[0].read_as == "skipped"
    assert linetype in kinds.skipped[0].why


@pytest.mark.parametrize("linetype", ["CONTINUOUS", "DASHED", "DOT", "BORDER"])
def test_other_linetypes_are_links_like_any(linetype: str) -> None:
    assert len(sort_primitives(sketch(line(0j, 1 + 0j, linetype=linetype))).lines) == 1


@pytest.mark.parametrize(
    "layer", ["Defpoints", "DIM", "dimensions", "CENTER-1", "construction", "Title", "border_A3", "Notes", "TEXT-2"]
)
def test_construction_layers_are_skipped_without_regard_to_case(layer: str) -> None:
    kinds = sort_primitives(sketch(line(0j, 1 + 0j, layer=layer), ring(0j, layer=layer)))
    assert (kinds.lines, kinds.rings) == ((), ())
    assert all(layer in kinds.skipped[index].why for index in (0, 1))


@pytest.mark.parametrize("layer", ["0", "LINKS", "MY-DIM", "UNTITLED", "Mittellinien"])
def test_patterns_hold_from_the_start_of_a_name(layer: str) -> None:
    assert len(sort_primitives(sketch(line(0j, 1 + 0j, layer=layer))).lines) == 1


def test_texts_and_dimensions_are_read_on_any_layer() -> None:
    kinds = sort_primitives(sketch(text("A", 0j, layer="TEXT"), dimension(3.0, layer="DIM")))
    assert len(kinds.texts) == 1
    assert kinds.skipped[1].read_as == "note"


@pytest.mark.parametrize(
    ("layer", "linetype"),
    [("PITCH", "CONTINUOUS"), ("gears", "CONTINUOUS"), ("0", "CENTER2"), ("0", "DASHDOT")],
)
def test_rings_on_a_pitch_layer_or_in_a_chain_linetype_may_be_pitch_circles(layer: str, linetype: str) -> None:
    kinds = sort_primitives(sketch(ring(0j, layer=layer, linetype=linetype)))
    assert [index for index, _ in kinds.pitch_rings] == [0]
    assert kinds.rings == ()


def test_a_hidden_ring_is_neither_pin_nor_pitch_circle() -> None:
    kinds = sort_primitives(sketch(ring(0j, linetype="HIDDEN")))
    assert kinds.rings == kinds.pitch_rings == ()


def test_frame_lines_are_named_with_their_reason() -> None:
    kinds = sort_primitives(
        sketch(line(0j, 1 + 0j, layer="Frame-1"), line(0j, 1j), line(0j, 2j, block="GESTELL_LINKS"))
    )
    assert kinds.frame_lines == {0: "layer Frame-1", 2: "block GESTELL_LINKS"}


RACK = 20j, 100 + 20j
WHEEL = ring(50 + 0j, 20.0, layer="PITCH")


@pytest.mark.parametrize(
    "rack",
    [
        pytest.param(line(*RACK, linetype="CENTER"), id="a chain line"),
        pytest.param(line(*RACK, layer="Gear"), id="on a pitch layer"),
        pytest.param(line(*RACK, layer="PITCH", linetype="DASHDOT2"), id="both"),
        pytest.param(line(*RACK, layer="GROUND", linetype="CENTER"), id="on a frame layer"),
    ],
)
def test_a_pitch_line_tangent_to_a_pitch_ring_is_a_rack_among_the_lines(rack: Drawn) -> None:
    kinds = sort_primitives(sketch(line(0j, 1j), rack, line(2j, 3j), WHEEL))
    assert [index for index, _ in kinds.lines] == [0, 1, 2]
    assert kinds.racks == {1}
    assert kinds.skipped == {}
    assert set(kinds.frame_lines) == ({1} if rack.layer == "GROUND" else set())


@pytest.mark.parametrize(
    "other",
    [
        pytest.param(line(21j, 100 + 21j, linetype="CENTER"), id="not tangent"),
        pytest.param(line(*RACK, linetype="PHANTOM"), id="another position"),
        pytest.param(line(*RACK, layer="PITCH", linetype="HIDDEN"), id="hidden"),
        pytest.param(line(*RACK, layer="CENTER"), id="an axis by its layer"),
    ],
)
def test_other_construction_lines_stay_skipped(other: Drawn) -> None:
    kinds = sort_primitives(sketch(other, WHEEL))
    assert kinds.lines == ()
    assert set(kinds.skipped) == {0}
    assert kinds.racks == frozenset()


@pytest.mark.parametrize("other", [line(21j, 100 + 21j, layer="PITCH"), line(*RACK)], ids=["not tangent", "plain"])
def test_other_lines_are_linework_and_no_racks(other: Drawn) -> None:
    kinds = sort_primitives(sketch(other, WHEEL))
    assert [index for index, _ in kinds.lines] == [0]
    assert kinds.racks == frozenset()


def test_without_pitch_rings_there_are_no_racks() -> None:
    kinds = sort_primitives(sketch(line(*RACK, linetype="CENTER"), ring(50 + 0j, 20.0)))
    assert set(kinds.skipped) == {0}


def test_a_chain_ring_on_a_frame_layer_is_a_pitch_ring() -> None:
    kinds = sort_primitives(sketch(ring(0j, 20.0, layer="GROUND", linetype="CENTER")))
    assert [index for index, _ in kinds.pitch_rings] == [0]


@pytest.mark.parametrize("linetype", ["HIDDEN", "PHANTOM"])
def test_a_ring_that_shows_another_position_is_no_pitch_circle_on_any_layer(linetype: str) -> None:
    kinds = sort_primitives(sketch(ring(0j, layer="PITCH", linetype=linetype)))
    assert kinds.pitch_rings == ()
    assert set(kinds.skipped) == {0}
