from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Observation
from tests.sketches import A, B, C, D, Drawn, labels, line, observed, pins, read, ring, rod, rods, tipper

ALONG = (C - B) / abs(C - B)
MIDDLE = (B + C) / 2
UP = 1j * ALONG
E = 90 + 120j


def tipper_with(coupler: Drawn) -> tuple[Drawn, ...]:
    return (*pins(), rod(A, B), coupler, rod(C, D), *labels())


def only(kind: str, *things: Drawn) -> Observation:
    (seen,) = observed(kind, *things)
    return seen


def test_nothing_is_wrong_with_the_tray_tipper() -> None:
    assert read(*tipper()).observations == ()


@pytest.mark.parametrize("gap", [0.081, 3.0, 15.9])
def test_an_end_short_of_a_rim_is_a_near_miss(gap: float) -> None:
    end = C - (4 + gap) * ALONG
    seen = only("near-miss", *tipper_with(line(B, end, handle="coupler")))
    assert seen.amount == pytest.approx(gap)
    assert seen.limit == pytest.approx(0.08)
    assert (seen.at, seen.handles, seen.mechanism, seen.severity) == (end, ("coupler",), "M1", None)
    assert "short of the rim of pin C" in seen.detail


def test_an_end_on_the_rim_is_none_and_one_two_diameters_short_is_a_loose_end() -> None:
    assert observed("near-miss", *tipper_with(line(B, C - 4.079 * ALONG))) == []
    far = tipper_with(line(B, C - 20.1 * ALONG))
    assert observed("near-miss", *far) == []
    assert only("loose-end", *far).severity == "warning"


def test_an_end_that_points_past_a_ring_does_not_miss_it() -> None:
    drawn = tipper_with(line(B, C - 10 * ALONG + 5j))
    assert observed("near-miss", *drawn) == []
    assert only("loose-end", *drawn).subject == "B"


@pytest.mark.parametrize(("past", "kind"), [(5.0, "near-miss"), (19.9, "near-miss"), (20.1, "loose-end")])
def test_an_end_up_to_two_diameters_past_a_pin_it_runs_through(past: float, kind: str) -> None:
    drawn = tipper_with(line(B, C + past * ALONG))
    seen = only(kind, *drawn)
    if kind == "near-miss":
        assert seen.severity == "warning"
        assert seen.amount == pytest.approx(past)
        assert seen.limit == pytest.approx(20.0)
        assert "past the centre of pin C" in seen.detail
    else:
        assert seen.severity == "note"
    assert len(read(*drawn).linkages[0].joints) == 4, "it is read as pinned there"


@pytest.mark.parametrize(("gap", "missed"), [(0.0004, False), (0.01, True), (0.18, True), (0.25, False)])
def test_an_end_between_t_and_a_thousandth_of_the_diagonal_short_of_a_weld(gap: float, missed: bool) -> None:  # noqa: FBT001 - a table
    brace = line(A + 0.4 * (B - A) * 1, MIDDLE - gap * UP, handle="brace")
    seen = observed("near-miss", *tipper(), brace)
    assert [each.handles for each in seen] == ([("brace", "coupler")] if missed else [])
    assert [each.amount for each in seen] == pytest.approx([gap] if missed else [], rel=0.1)


def test_the_free_end_of_a_lever_is_a_note_and_of_a_link_with_one_joint_a_warning() -> None:
    lever = line(D + 4 * (C - D) / abs(C - D), C + 0.8 * (C - D), handle="rocker")
    noted = only("loose-end", *pins(), *rods()[:2], lever, *labels())
    assert (noted.severity, noted.subject) == ("note", "C-D")
    warned = only("loose-end", *tipper(), line(B - 4j, B - 60j, handle="dangling"))
    assert (warned.severity, warned.at, warned.handles) == ("warning", B - 60j, ("dangling",))


def test_an_end_with_a_ring_or_a_weld_is_not_loose() -> None:
    assert observed("loose-end", *tipper(), line(MIDDLE, E), ring(E)) == []
    assert only("loose-end", *tipper(), line(MIDDLE, E)).at == E


@pytest.mark.parametrize(("off", "seen"), [(0.079, 0), (0.081, 1), (2.0, 1)])
def test_an_end_at_a_pin_aims_at_its_centre_within_two_per_cent(off: float, seen: int) -> None:
    coupler = line(B, C - 1.0 * ALONG + off * UP * 1.0, handle="coupler")
    drawn = tipper_with(coupler)
    found = [each for each in observed("off-centre-end", *drawn) if each.at == C - ALONG + off * UP]
    assert len(found) == seen
    if seen:
        assert found[0].amount == pytest.approx(off, rel=0.02)
        assert found[0].limit == pytest.approx(0.08)
        assert "past the centre of pin C" in found[0].detail


@pytest.mark.parametrize(("off", "seen"), [(0.01, 1), (3.5, 1), (4.5, 0)])
def test_a_line_through_a_ring_off_its_centre_is_told(off: float, seen: int) -> None:
    start, end = B, C + 60 * ALONG
    shift = off * UP
    drawn = [*tipper_with(line(start, end + shift * abs(end - start) / abs(C - start), handle="coupler"))]
    found = observed("off-centre-end", *drawn)
    assert len(found) == seen
    if seen:
        assert "not pinned there" in found[0].detail
        assert found[0].amount == pytest.approx(off, rel=0.01)


def test_a_line_drawn_twice_is_told_once_with_both_handles() -> None:
    seen = only("double-line", *tipper(), rod(B, C, handle="twice"))
    assert seen.handles == ("twice", "coupler")
    assert seen.subject == "B-C"
    assert seen.at == pytest.approx(MIDDLE)


def test_a_brace_drawn_twice_inside_one_link_is_told_as_well() -> None:
    brace = [line(MIDDLE, E), ring(E), line(MIDDLE, E, handle="twice")]
    assert only("double-line", *tipper(), *brace).handles[0] == "twice"


def test_two_pins_on_one_another_are_told_with_their_distance() -> None:
    seen = only("stacked-pins", *tipper(), ring(B + 0.01, 2.0))
    assert seen.amount == pytest.approx(0.01)
    assert seen.limit == pytest.approx(read(*tipper(), ring(B + 0.01, 2.0)).tolerance)
    assert seen.subject.startswith("B and ")


def test_rings_on_one_centre_and_rings_side_by_side_are_not_stacked() -> None:
    assert observed("stacked-pins", *tipper(), ring(B, 2.0), ring(B + 8, 3.0)) == []


def test_a_rod_whose_two_ends_both_stop_short_is_a_near_miss_twice() -> None:
    brace = line(B + 6 * (D - B) / abs(D - B), D - 6 * (D - B) / abs(D - B), handle="rod")
    found = observed("near-miss", *tipper(), brace)
    assert [each.amount for each in found] == pytest.approx([2.0, 2.0])
