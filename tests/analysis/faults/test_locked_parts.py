"""Locked parts one by one, what would free them, and what costs nothing; brute force is in tests/property."""

from __future__ import annotations

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import LockedPart
from dxfcheck.linkage import Linkage
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import linkage
from tests.published.test_mobility import CASES


def names(model: Linkage, links: tuple[int, ...]) -> list[str]:
    return [model.links[link].name for link in links]


def test_two_trusses_that_only_a_linkage_of_bars_joins_are_two_parts() -> None:
    points = {"A": 0j, "B": 40 + 70j, "C": 90 + 0j, "D": 300 + 0j, "E": 340 + 60j, "F": 400 + 0j, "G": 200 + 200j}
    pins = {"A": "ground a", "B": "a b p", "C": "ground b", "D": "ground d", "E": "d f q", "F": "ground f"}
    tied = linkage({**points, "H": 250 + 160j}, {**pins, "G": "p r", "H": "r q"})
    parts = analyse(tied).locked_parts
    assert [names(tied, part.links) for part in parts] == [["a", "b"], ["d", "f"]]
    assert [(part.with_frame, part.redundant) for part in parts] == [(True, 0), (True, 0)]
    assert [names(tied, part.links_to_go) for part in parts] == [["a", "b"], ["d", "f"]]


def test_bars_whose_removal_leaves_the_fewest_locked_are_named() -> None:
    """Two bars to a node and two more on that node and the frame: without the lower ones all of them move."""
    points = {"A": 0j, "B": 50 + 80j, "C": 100 + 0j, "D": 60 + 160j, "E": -60 + 90j}
    model = linkage(points, {"A": "ground a", "B": "a b c", "C": "ground b", "D": "c d", "E": "ground d"})
    (part,) = analyse(model).locked_parts
    assert part.links == (1, 2, 3, 4)
    assert names(model, part.links_to_go) == ["a", "b"]


def test_bar_too_many_is_counted() -> None:
    points = {"A": 0j, "B": 50 + 80j, "C": 100 + 0j, "D": 150 + 10j}
    model = linkage(points, {"A": "ground a", "B": "a b c", "C": "ground b", "D": "ground c"})
    assert analyse(model).locked_parts == (LockedPart((1, 2, 3), True, 1, (1, 2, 3)),)  # noqa: FBT003 - a NamedTuple


def test_usual_linkage_and_a_rocker_at_rest_have_none() -> None:
    assert analyse(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 1.0})).rigid_parts is None
    points = {"A": 0j, "B": 30 + 0j, "C": 130 + 0j, "D": 150 - 60j}
    at_rest = analyse(linkage(points, FOUR_BAR, turn={"crank": 1.0}))
    assert at_rest.solved
    assert at_rest.locked_parts == ()


def test_straight_line_linkage_with_coincident_joints_is_neither_locked_nor_special() -> None:
    """M17: four pins of three links each, so 10 joints; the count is right and nothing repeats."""
    case = CASES["M17 straight-line linkage of eight links"]
    points = {name: complex(float(x), float(y)) for name, x, y in (each.split() for each in case.points.split("; "))}
    pins = {name: " ".join(links) for name, *links in (each.split() for each in case.pins.split("; "))}
    result = analyse(linkage(points, pins, turn={"crank": 1.0}))
    assert result.solved
    assert (result.locked_parts, result.dependent_joints, result.finite) == ((), (), None)
    assert (result.idle_links, result.settling_drives) == ((), ())
