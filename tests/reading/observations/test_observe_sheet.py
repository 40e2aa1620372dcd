from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Observation
from tests.sketches import (
    A,
    B,
    C,
    D,
    Drawn,
    arc,
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


def test_a_sheet_without_a_linkage_says_what_it_shows_all_the_same() -> None:
    block = [rectangle(0j, 24, 14), line(-60, -12), line(12, 60)]
    wheels = [ring(100j, 20.0), ring(140j, 20.0)]
    (seen,) = observed("no-linkage", *block, *wheels, obround(200j, 240j, 5))
    assert seen.detail == (
        "1 rectangle on a line (a slide), 1 obround (a slot), 1 pair of rings that touch or cross (wheels)"
    )


def test_other_linework_is_not_said_to_show_anything() -> None:
    (seen,) = observed("no-linkage", line(0j, 50j), rectangle(100j, 30, 20), ring(300j))
    assert seen.detail == ""


def test_a_weld_mark_on_a_ring_says_that_the_link_is_read_as_pinned_there() -> None:
    marked = [*tipper(), arc(B + 4, 3.0, 0.0, 90.0, handle="weld"), line(B + 4, B + 60, handle="arm")]
    seen = only("weld-on-ring", *marked)
    assert seen.subject == "B"
    assert seen.handles == ("arm", "weld")


def test_pins_of_the_tray_tipper_are_all_used() -> None:
    assert observed("empty-pin", *tipper()) == []
