from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Observation
from tests.sketches import (
    A,
    B,
    C,
    D,
    Drawn,
    labels,
    line,
    obround,
    observed,
    path,
    pins,
    rectangle,
    ring,
    rod,
    rods,
    text,
    tipper,
)

ELSEWHERE = 100 + 20j


def only(kind: str, *things: Drawn) -> Observation:
    (seen,) = observed(kind, *things)
    return seen


def test_a_sheet_that_shows_no_linkage() -> None:
    assert only("no-linkage", line(0j, 50j), ring(0j)).at is None
    assert observed("no-linkage", *tipper()) == []


def test_a_mechanism_on_no_frame_names_the_link_that_is_held() -> None:
    seen = only("no-frame", *(ring(at) for at in (A, B, C, D)), *rods(), *labels())
    assert (seen.subject, seen.mechanism, seen.at) == ("B-C", "M1", A)


@pytest.mark.parametrize(
    ("radius", "seen"),
    [
        pytest.param(4.0, 1, id="of their size"),
        pytest.param(11.9, 1, id="up to three times"),
        pytest.param(12.1, 0, id="larger"),
        pytest.param(1.34, 1, id="down to a third"),
        pytest.param(1.32, 0, id="smaller"),
    ],
)
def test_an_empty_ring_among_the_pins_looks_like_a_forgotten_one(radius: float, seen: int) -> None:
    found = observed("empty-pin", *tipper(), ring(ELSEWHERE, radius, handle="empty"))
    assert [(each.at, each.handles, each.mechanism) for each in found] == [(ELSEWHERE, ("empty",), "M1")] * seen


@pytest.mark.parametrize(("x", "seen"), [(171.9, 1), (172.1, 0)])
def test_a_ring_further_off_is_another_thing(x: float, seen: int) -> None:
    assert len(observed("empty-pin", *tipper(), ring(x + 40j))) == seen


def test_one_label_at_two_pins() -> None:
    twice = only("duplicate-label", *pins(), *rods(), text("A", A + 5), text("A", C + 5))
    assert (twice.subject, twice.amount, twice.at) == ("A", 2.0, A)
    assert twice.detail == "(160, 80)"
    assert observed("duplicate-label", *tipper()) == []


def test_linework_on_a_link_layer_that_hangs_on_nothing_is_one_finding() -> None:
    pieces = [line(complex(300, 10 * number), complex(320, 10 * number)) for number in range(12)]
    seen = only("floating-group", *tipper(), *pieces)
    assert seen.amount == 12.0
    assert len(seen.handles) == 10
    assert seen.detail.count("(300, ") == 10
    assert seen.detail.endswith("...")


def test_linework_on_layers_without_links_is_left_alone() -> None:
    table = path(-20 - 20j, 300 - 20j, 300 - 60j, layer="TABLE")
    assert observed("floating-group", *tipper(), table) == []


def test_a_group_of_pinned_lines_that_hangs_on_nothing_counts_as_one_piece() -> None:
    seen = only("floating-group", *tipper(), ring(300j), ring(350j), rod(300j, 350j))
    assert (seen.amount, seen.at) == (1.0, 300j)


def test_a_sheet_without_a_linkage_has_no_floating_group() -> None:
    assert observed("floating-group", line(0j, 50j), line(10j, 60j)) == []


def test_a_speck_on_a_link_is_told_with_its_length() -> None:
    seen = only("short-line", *tipper(), line(B, B + 0.003, handle="speck"))
    assert seen.amount == pytest.approx(0.003)
    assert seen.handles == ("speck",)


@pytest.mark.parametrize(
    ("shape", "what"),
    [
        pytest.param(rectangle(C, 24, 14), "sliding block", id="block"),
        pytest.param(obround(C - 9, C + 9, 5), "slot", id="slot"),
    ],
)
def test_a_mechanism_with_a_joint_that_is_not_read_is_refused(shape: Drawn, what: str) -> None:
    seen = only("joint-not-read", *pins(), *rods()[:2], shape, *labels())
    assert (seen.at, seen.subject) == (C, "C")
    assert what in seen.detail
    assert observed("no-linkage", *pins(), *rods()[:2], shape, *labels()) == []


def test_pins_of_the_tray_tipper_are_all_used() -> None:
    assert observed("empty-pin", *tipper()) == []
