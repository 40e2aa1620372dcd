"""Which links stay free under the drives, and what single drive would settle them; checked by driving it."""

from __future__ import annotations

from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import FreePart
from dxfcheck.linkage import Drive, Linkage
from tests.analysis.lattices import scissor_lattice
from tests.analysis.random_models import random_model
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import Other, linkage

FIVE_BAR_POINTS = {"A": 0j, "B": 20 + 70j, "C": 80 + 120j, "D": 140 + 60j, "E": 110 + 0j}
FIVE_BAR = {"A": "ground a", "B": "a b", "C": "b c", "D": "c d", "E": "ground d"}


def test_undriven_four_bar_is_settled_by_any_link_the_cranks_first() -> None:
    assert analyse(linkage(FOUR_BAR_POINTS, FOUR_BAR)).free_parts == (FreePart((1, 2, 3), 1, (1, 3, 2), ()),)


def test_five_bar_with_one_crank_driven() -> None:
    assert analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR, turn={"a": 1.0})).free_parts == (
        FreePart((2, 3, 4), 1, (4, 2, 3), ()),
    )


def test_no_single_drive_settles_two_freedoms() -> None:
    assert analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR)).free_parts == (FreePart((1, 2, 3, 4), 2, (), ()),)


def test_two_cranks_on_one_frame_are_two_parts() -> None:
    points = {"A": 0j, "B": 20 + 5j, "C": 100 + 0j, "D": 120 + 5j}
    model = linkage(points, {"A": "ground a", "C": "ground c"}, tracing={"B": "a", "D": "c"})
    assert analyse(model).free_parts == (FreePart((1,), 1, (1,), ()), FreePart((2,), 1, (2,), ()))


def test_slide_on_the_frame_may_be_driven() -> None:
    slide: list[Other] = [("slide", 150 + 0j, "ground", "block", 1 + 0j)]
    pins = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
    model = linkage({"O": 0j, "B": 30 + 40j, "P": 150 + 0j}, pins, others=slide)
    assert analyse(model).free_parts == (FreePart((1, 2, 3), 1, (1, 2), (3,)),)


def test_link_at_its_dead_centre_is_not_offered() -> None:
    points = {"A": 0j, "B": 20 + 35j, "C": 100 + 60j, "D": 164 + 80j}
    (part,) = analyse(linkage(points, FOUR_BAR, turn={"crank": 1.0})).free_parts
    assert (part.links, part.turns) == ((2, 3), (3, 2))


def test_what_stands_above_a_cell_without_its_pin() -> None:
    (part,) = analyse(scissor_lattice(200, unpinned=(60,))).free_parts
    assert part.links == tuple(range(121, 201))
    assert part.freedoms == 2


def test_freedoms_of_many_cells_without_their_pins_add_up() -> None:
    result = analyse(scissor_lattice(400, unpinned=range(5, 200, 10)))
    (part,) = result.free_parts
    assert part.freedoms == result.mobility.at_pose - 1
    assert part.links == tuple(range(11, 401))


@pytest.mark.parametrize("seed", range(200, 260))
def test_a_drive_that_is_offered_settles_its_part_and_the_freedoms_add_up(seed: int) -> None:
    model = random_model(seed, 12)
    result = analyse(model)
    taken = sum(drive.outcome == "taken" for drive in result.drives)
    assert {link for part in result.free_parts for link in part.links} == {
        number for number, link in enumerate(result.links) if not link.determined
    }
    assert sum(part.freedoms for part in result.free_parts) >= result.mobility.at_pose - taken
    for part in result.free_parts:
        for link in part.turns:
            assert settles(model, Drive(link=link, against=0, rate=1.0), part)


def settles(model: Linkage, drive: Drive, part: FreePart) -> bool:
    result = analyse(replace(model, drives=(*model.drives, drive)))
    return result.drives[-1].outcome == "taken" and all(result.links[link].determined for link in part.links)
