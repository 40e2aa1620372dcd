"""Large linkages through the whole analysis: against closed forms, and against one matrix for all of it."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.freedom import freedom
from dxfcheck.analysis.loops import loop_equations, loops
from dxfcheck.analysis.results import Analysis
from dxfcheck.linkage import Drive, Linkage
from tests.analysis.lattices import error_of, four_bar_chain, scissor_lattice
from tests.analysis.random_models import random_model, stacked_floors

AGREE = 1e-8


@pytest.mark.parametrize("driven", [1, 301, 599])
def test_speeds_of_a_lattice_wherever_it_is_driven(driven: int) -> None:
    model = scissor_lattice(600, driven=driven)
    result = analyse(model)
    assert (result.mobility.count, result.mobility.at_pose) == (1, 1)
    assert result.solved
    assert error_of(model, result) < 1e-10
    assert result.disagreement is not None
    assert result.disagreement < 1e-10
    assert len(result.loops) == 300


def test_five_thousand_links() -> None:
    model = scissor_lattice(5000)
    result = analyse(model)
    assert (result.mobility.count, result.mobility.at_pose) == (1, 1)
    assert result.solved
    assert error_of(model, result) < 1e-9
    assert result.disagreement is not None
    assert result.disagreement < 1e-9


def test_lattice_driven_by_its_foot() -> None:
    model = scissor_lattice(200, driven=None)
    slide = len(model.joints) - 1
    drive = Drive(link=201, against=0, rate=-300.0 * math.sin(math.radians(35.0)), kind="slide", joint=slide)
    result = analyse(replace(model, drives=(drive,)))
    assert result.solved
    assert error_of(model, result) < 1e-10


def test_undriven_lattice_is_counted_and_nothing_but_the_frame_known() -> None:
    result = analyse(scissor_lattice(400, driven=None))
    assert (result.mobility.count, result.mobility.at_pose) == (1, 1)
    assert [link.determined for link in result.links] == [True] + [False] * 401


def test_cells_without_their_middle_pin_leave_what_is_above_them_free() -> None:
    """Cell 120 of 200 lacks its pin: two freedoms more, and only what stands below it is settled."""
    result = analyse(scissor_lattice(400, unpinned=(120,)))
    assert result.mobility.at_pose == 3
    assert not result.solved
    settled = [link.determined for link in result.links]
    assert settled[1:239] == [True] * 238
    assert not any(settled[241:401])
    assert settled[401]
    assert result.disagreement is not None
    assert result.disagreement < AGREE


def test_slow_end_of_a_long_chain_is_no_dead_centre() -> None:
    """Each stage turns faster than the one before, the last ten million times as fast as the crank."""
    result = analyse(four_bar_chain(60, crank=53.0))
    assert [drive.outcome for drive in result.drives] == ["taken"]
    rates = [abs(link.angular_velocity or 0.0) for link in result.links[1::2]]
    assert rates[-1] > 1e7 * rates[0]
    assert result.solved
    assert result.disagreement is not None
    assert result.disagreement < AGREE


@pytest.mark.parametrize("decimals", [None, 2])
def test_redundant_floors_typed_to_decimals_are_solved(decimals: int | None) -> None:
    result = analyse(stacked_floors(20, decimals))
    assert result.mobility.at_pose == 20
    assert result.solved
    assert result.disagreement is not None
    assert result.disagreement < (1e-10 if decimals is None else 0.01)


def analyse_large(model: Linkage, monkeypatch: pytest.MonkeyPatch) -> Analysis:
    """As if it had too many links for one matrix."""
    for module in (freedom, loops, loop_equations):
        monkeypatch.setattr(module, "DENSE_LINKS", 0)
    loops.independent_loops.cache_clear()
    result = analyse(model)
    loops.independent_loops.cache_clear()
    monkeypatch.undo()
    return result


def agree(one: complex | None, other: complex | None, greatest: float) -> bool:
    if one is None or other is None:
        return one is other
    return abs(one - other) <= AGREE * max(1.0, greatest)


@pytest.mark.parametrize("coarse", [False, True])
@pytest.mark.parametrize("seed", range(100, 150))
def test_random_linkages_get_the_same_answers_both_ways(
    seed: int, monkeypatch: pytest.MonkeyPatch, *, coarse: bool
) -> None:
    model = random_model(seed, 30, coarse=coarse)
    small, large = analyse(model), analyse_large(model, monkeypatch)
    assert large.mobility == small.mobility
    assert [drive.outcome for drive in large.drives] == [drive.outcome for drive in small.drives]
    assert large.solved == small.solved
    assert (large.disagreement or 0.0) < AGREE
    fastest = max(abs(link.angular_velocity or 0.0) for link in small.links)
    for one, other in zip(small.links, large.links, strict=True):
        assert agree(one.angular_velocity, other.angular_velocity, fastest)
    fastest = max(abs(pin.velocity or 0j) for pin in small.pins)
    for this, that in zip(small.pins, large.pins, strict=True):
        assert agree(this.velocity, that.velocity, fastest)
    for here, there in zip(small.joints, large.joints, strict=True):
        assert agree(here.slide_speed, there.slide_speed, fastest)
