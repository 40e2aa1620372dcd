from __future__ import annotations

import pytest

from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.guides import Guide, choose_guide
from dxfcheck.reading.slides.rails import Rail, RailHow

BOX = Box(0, (0,), 0j, (1 + 0j, 1j), (10.0, 6.0), (0,), frame=False, slack=0.1)
"""20 long and 12 wide; pieces of a guide lie level within 0.7."""
NO_PIN = BOX._replace(sites=())


def rail(
    strand: int,
    how: RailHow,
    *,
    axis: int = 0,
    offset: float = 0.0,
    low: float = -40.0,
    high: float = 40.0,
    pinned: bool = False,
) -> Rail:
    return Rail(strand, axis, offset, low, high, how, pinned)


def behind(strand: int, offset: float = 0.0) -> Rail:
    return rail(strand, "stops", offset=offset, high=-10.0)


def ahead(strand: int, offset: float = 0.0) -> Rail:
    return rail(strand, "stops", offset=offset, low=10.0)


def chosen(*rails: Rail, box: Box = BOX, frame: tuple[int, ...] = (), hatched: tuple[int, ...] = ()) -> Guide | None:
    found = choose_guide(box, rails, frame, hatched)
    return None if found is None else found.guide


@pytest.mark.parametrize(
    ("rails", "how", "strength"),
    [
        pytest.param([rail(1, "through", offset=3.0)], "runs through it", 4, id="through"),
        pytest.param([behind(1), ahead(2)], "is interrupted at it", 4, id="interrupted"),
        pytest.param([behind(1), ahead(2, 0.6)], "is interrupted at it", 4, id="interrupted, nearly level"),
        pytest.param(
            [rail(1, "beside", offset=6.0), rail(2, "beside", offset=-7.0)], "runs along both its sides", 4, id="rails"
        ),
        pytest.param([rail(1, "enters", low=5.0)], "ends inside it", 3, id="a rod in a barrel"),
        pytest.param([rail(1, "beside", offset=-6.0)], "runs beside it", 2, id="beside"),
    ],
)
def test_what_guides_a_block_and_how_plainly(rails: list[Rail], how: str, strength: int) -> None:
    guide = chosen(*rails)
    assert guide is not None
    assert (guide.how, guide.strength, guide.frame) == (how, strength, False)
    assert guide.strands == tuple(each.strand for each in rails)


@pytest.mark.parametrize(
    "rails",
    [
        pytest.param([], id="nothing"),
        pytest.param([behind(1)], id="one piece that stops at it"),
        pytest.param([behind(1), behind(2)], id="two pieces on one side"),
        pytest.param([behind(1), ahead(2, 0.8)], id="pieces out of level"),
        pytest.param([rail(1, "through", pinned=True)], id="a link of its own pin"),
    ],
)
def test_what_guides_no_block(rails: list[Rail]) -> None:
    assert chosen(*rails) is None


@pytest.mark.parametrize(
    ("rails", "how", "strength"),
    [
        pytest.param([rail(1, "beside", offset=-6.0)], "runs beside it", 4, id="beside"),
        pytest.param([rail(1, "enters", low=5.0)], "ends inside it", 4, id="ends inside"),
        pytest.param([behind(1)], "ends at it", 3, id="ends at it"),
        pytest.param([rail(1, "through", pinned=True)], "runs through it", 4, id="a frame line through its pin"),
    ],
)
def test_a_line_that_is_frame_is_a_plain_guide(rails: list[Rail], how: str, strength: int) -> None:
    guide = chosen(*rails, frame=(1,))
    assert guide is not None
    assert (guide.how, guide.strength, guide.frame) == (how, strength, True)


def test_a_box_without_a_pin_needs_a_plain_guide() -> None:
    assert chosen(rail(1, "beside", offset=6.0), box=NO_PIN) is None
    assert chosen(rail(1, "beside", offset=6.0), box=NO_PIN, frame=(1,)) is not None
    assert chosen(rail(1, "enters", low=5.0), box=NO_PIN) is not None


def test_one_piece_of_a_guide_on_the_frame_makes_it_frame() -> None:
    for rails in ([behind(1), ahead(2)], [rail(1, "beside", offset=6.0), rail(2, "beside", offset=-6.0)]):
        guide = chosen(*rails, frame=(2,))
        assert guide is not None
        assert (guide.frame, guide.strands) == (True, (1, 2))


def test_of_guides_the_plainest_counts_then_the_frame_then_the_nearest() -> None:
    plain, weak = rail(1, "through"), rail(2, "beside", offset=6.0)
    near, far = rail(3, "through", offset=1.0), rail(4, "through", offset=-4.0)
    assert chosen(weak, plain, box=BOX) == chosen(plain)
    assert chosen(far, near) == chosen(near)
    assert chosen(near, far, frame=(4,)) == chosen(far, frame=(4,))


def test_of_lines_beside_a_block_the_nearest_on_the_frame_counts() -> None:
    lines = [rail(1, "beside", offset=6.0), rail(2, "beside", offset=9.0), rail(3, "beside", offset=8.0)]
    guide = chosen(*lines, frame=(2, 3))
    assert guide is not None
    assert guide.strands == (3,)
    alone = chosen(*lines[1:])
    assert alone is not None
    assert alone.strands == (3,)


@pytest.mark.parametrize(
    ("left", "right", "frame", "how"),
    [
        pytest.param(6.0, -7.3, (), "runs along both its sides", id="nearly level"),
        pytest.param(6.0, -8.0, (), "runs beside it", id="out of level"),
        pytest.param(6.0, -11.0, (1, 2), "runs along both its sides", id="out of level, but both frame"),
        pytest.param(6.0, -11.0, (2,), "runs beside it", id="out of level, one frame"),
    ],
)
def test_two_rails_stand_level_or_are_both_frame(left: float, right: float, frame: tuple[int, ...], how: str) -> None:
    guide = chosen(rail(1, "beside", offset=left), rail(2, "beside", offset=right), frame=frame)
    assert guide is not None
    assert guide.how == how


def test_of_several_rails_the_inner_pair_counts() -> None:
    lines = [rail(number, "beside", offset=offset) for number, offset in enumerate((9.0, 6.0, -9.0, -6.0), start=1)]
    guide = chosen(*lines)
    assert guide is not None
    assert guide.strands == (2, 4)


def test_hatch_strokes_on_the_block_itself_are_a_guide_on_the_frame_without_ends() -> None:
    guide = chosen(hatched=(0,))
    assert guide is not None
    assert (guide.how, guide.frame, guide.ends, guide.offset) == ("is hatched along it", True, None, 6.0)
    upright = chosen(hatched=(1,))
    assert upright is not None
    assert (upright.axis, upright.offset) == (1, 10.0)


def test_a_guide_reaches_as_far_as_its_pieces_together() -> None:
    guide = chosen(behind(1), ahead(2))
    assert guide is not None
    assert guide.ends == (-40.0, 40.0)
    rails = chosen(rail(1, "beside", offset=6.0, low=-30.0), rail(2, "beside", offset=-6.2, high=25.0))
    assert rails is not None
    assert (rails.ends, rails.offset) == ((-40.0, 40.0), 6.0)


# --- other guides that fit as well ---

ACROSS = rail(9, "through", axis=1)


@pytest.mark.parametrize(
    ("rails", "frame", "others"),
    [
        pytest.param([rail(1, "through"), ACROSS], (), [(9,)], id="one across it"),
        pytest.param([rail(1, "through"), rail(2, "through", offset=4.0)], (), [(2,)], id="one along it"),
        pytest.param([rail(1, "through"), rail(2, "through", offset=4.0)], (1, 2), [], id="both of the frame"),
        pytest.param([rail(1, "through"), rail(2, "beside", offset=6.0)], (), [], id="a weaker one"),
        pytest.param(
            [rail(1, "through"), rail(2, "beside", axis=1, offset=10.0)], (1, 2), [], id="the wall of a cylinder"
        ),
        pytest.param(
            [rail(1, "beside", offset=6.0), rail(2, "beside", axis=1, offset=10.0)], (), [(2,)], id="two walls"
        ),
        pytest.param([rail(1, "through"), behind(2), ahead(3)], (), [], id="an interrupted one"),
        pytest.param(
            [rail(1, "beside", offset=6.0), rail(1, "beside", offset=-6.0), rail(1, "through")],
            (),
            [],
            id="of one strand",
        ),
    ],
)
def test_rivals_are_what_fits_as_well(rails: list[Rail], frame: tuple[int, ...], others: list[tuple[int, ...]]) -> None:
    found = choose_guide(BOX, rails, frame, ())
    assert found is not None
    assert [guide.strands for guide in found.others] == others
