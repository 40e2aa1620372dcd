from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import BlockUse, Source
from dxfcheck.reading.lines.roles import construction_reason, frame_reason, is_label_layer, is_pitch
from dxfcheck.settings import LayerRoles


def source(layer: str = "0", linetype: str = "CONTINUOUS", *blocks: str) -> Source:
    return Source(0, "1", layer, linetype, tuple(BlockUse(block, "2") for block in blocks))


@pytest.mark.parametrize(
    "layer", ["GROUND", "Frame", "fixed_points", "BASE-2", "Gestell", "BATI", "telaio", "Bastidor"]
)
def test_frame_layers_in_five_languages(layer: str) -> None:
    assert frame_reason(source(layer)) == f"layer {layer}"


@pytest.mark.parametrize("layer", ["0", "LINKS", "UNDERGROUND", "A-FRAME", ""])
def test_other_layers_say_nothing_of_a_frame(layer: str) -> None:
    assert frame_reason(source(layer)) is None


def test_a_frame_block_counts_however_deep_it_is_nested() -> None:
    assert frame_reason(source("0", "CONTINUOUS", "MACHINE", "ground_symbol")) == "block ground_symbol"
    assert frame_reason(source("0", "CONTINUOUS", "MACHINE", "PIN")) is None


def test_stated_layers_take_the_place_of_the_built_in_ones() -> None:
    roles = LayerRoles(frame=("Träger*",), pitch=("teilkreis",), construction=())
    assert frame_reason(source("TRAEGER"), roles) is None
    assert frame_reason(source("träger-2"), roles) == "layer träger-2"
    assert frame_reason(source("TRAGER"), roles) == "layer TRAGER"  # accents count as little as case
    assert frame_reason(source("0", "CONTINUOUS", "TRÄGER"), roles) == "block TRÄGER"
    assert frame_reason(source("FRAME"), roles) is None
    assert is_pitch(source("TEILKREIS"), roles)
    assert not is_pitch(source("PITCH"), roles)
    assert construction_reason(source("DIM"), roles) is None


def test_the_layer_is_told_before_the_block() -> None:
    assert frame_reason(source("FRAME", "CONTINUOUS", "BASE")) == "layer FRAME"


def test_the_linetype_is_told_before_the_layer() -> None:
    assert construction_reason(source("DIM", "PHANTOM2")) == "construction linework by linetype PHANTOM2"
    assert construction_reason(source("DIM")) == "construction linework by layer DIM"
    assert construction_reason(source()) is None


@pytest.mark.parametrize("number", ["02", "03", "04", "05", "08", "09", "10"])
def test_the_broken_linetypes_of_iso_templates_are_construction(number: str) -> None:
    assert construction_reason(source("0", f"ACAD_ISO{number}W100")) is not None
    assert construction_reason(source("0", "ACAD_ISO01W100")) is None


def test_brackets_in_a_layer_name_are_no_pattern() -> None:
    assert construction_reason(source("[DIM]")) is None


@pytest.mark.parametrize(
    ("layer", "linetype", "pitch"),
    [
        pytest.param("PITCH_1", "CONTINUOUS", True, id="layer"),
        pytest.param("0", "CENTERX2", True, id="chain linetype"),
        pytest.param("0", "ACAD_ISO10W100", True, id="a chain linetype of ISO templates"),
        pytest.param("0", "Chain", True, id="chain by name"),
        pytest.param("0", "PHANTOM", False, id="other positions"),
        pytest.param("PITCH", "ACAD_ISO05W100", False, id="other positions in ISO templates"),
        pytest.param("PITCH", "ACAD_ISO02W100", False, id="hidden in ISO templates"),
        pytest.param("0", "CONTINUOUS", False, id="plain"),
    ],
)
def test_what_may_be_a_pitch_circle(layer: str, linetype: str, pitch: bool) -> None:  # noqa: FBT001 - a table
    assert is_pitch(source(layer, linetype)) is pitch


@pytest.mark.parametrize("layer", ["Dimension", "TITLE", "border"])
def test_texts_of_title_block_and_dimensions_name_no_pin(layer: str) -> None:
    assert not is_label_layer(source(layer))
    assert is_label_layer(source("TEXT"))
