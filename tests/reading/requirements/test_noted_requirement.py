from __future__ import annotations

import math

import pytest

from dxfcheck.reading.drives.drive_text import find_statements
from dxfcheck.reading.requirements.noted_requirement import NotedRequirement, find_requirements, without_requirements


def only(text: str) -> NotedRequirement:
    (found,) = find_requirements(text)
    return found


def bounds(noted: NotedRequirement) -> tuple[object, object]:
    assert noted.value is not None
    least, greatest = noted.value.least, noted.value.greatest
    return (None if least is None else least.amount), (None if greatest is None else greatest.amount)


@pytest.mark.parametrize(
    "text",
    [
        "v_C <= 2 m/s",
        "v_C ≤ 2 m/s",
        "v_C < 2 m/s",
        "v_C max 2 m/s",
        "v_C max. 2 m/s",
        "v_C: max. 2 m/s",
        "v_C,max = 2 m/s",
        "v_{C,max} = 2 m/s",
        "v_Cmax = 2000 mm/s",
        "v_max,C = 2 m/s",
        "v_C = 2 m/s max.",
        "v_C at most 2 m/s",
    ],
)
def test_a_limit_of_a_point_is_written_in_many_ways(text: str) -> None:
    found = only(text)
    assert (found.quantity, found.name, found.doubt) == (None, "C", None)
    assert bounds(found) == (None, pytest.approx(2.0))


@pytest.mark.parametrize("text", ["n_CD <= 120 rpm", "n_{CD} max 120 1/min", "ω_CD ≤ 12.5664 rad/s", "nCD max 2 1/s"])
def test_a_limit_on_turning(text: str) -> None:
    found = only(text)
    assert (found.quantity, found.name) == ("link-speed", "CD")
    assert bounds(found) == (None, pytest.approx(4 * math.pi, rel=1e-5))


def test_a_figure_with_a_tolerance_is_expected() -> None:
    found = only("ω_CD = 4 rad/s ± 2 %")
    assert bounds(found) == (pytest.approx(3.92), pytest.approx(4.08))
    assert found.value is not None
    assert found.value.expected is not None


def test_a_figure_without_one_is_a_drive_and_not_found_here() -> None:
    assert find_requirements("ω_CD = 4 rad/s") == []
    assert find_requirements("n = 120 rpm") == []


def test_a_ratio_needs_no_tolerance() -> None:
    found = only("ω_CD/ω_AB = 1:2")
    assert (found.quantity, found.name, found.against) == ("speed-ratio", "CD", "AB")
    assert bounds(found) == (pytest.approx(0.4975), pytest.approx(0.5025))


@pytest.mark.parametrize("text", ["i_AB/CD = 2.5 ± 1 %", "n_AB : n_CD = 2.5 ± 1 %", "i = ω_AB/ω_CD = 2.5 ± 1 %"])
def test_other_ways_to_write_a_ratio(text: str) -> None:
    found = only(text)
    assert (found.name, found.against) == ("AB", "CD")
    assert bounds(found) == (pytest.approx(2.475), pytest.approx(2.525))


def test_words_name_what_letters_cannot() -> None:
    assert (only("rubbing speed at B <= 0.1 m/s").quantity, only("rubbing speed at B <= 0.1 m/s").name) == (
        "rubbing-speed",
        "B",
    )
    assert only("sliding speed of block at E max 0.2 m/s").name == "block at E"
    assert only("sliding speed of pin D max 0.2 m/s").name == "D"
    assert only("rubbing speed at most 0.1 m/s").name is None


def test_a_relative_speed() -> None:
    assert (only("ω_AB against BC <= 3 rad/s").name, only("ω_AB against BC <= 3 rad/s").against) == ("AB", "BC")


@pytest.mark.parametrize(
    ("text", "doubt"),
    [
        ("v_C <= 2", "no speed with a unit"),
        ("ω_CD <= fast", "no speed with a unit"),
        ("v_C max 2 rpm", "'v' does not go with that unit"),
        ("n_AB <= 120 rpm cw", "a size"),
        ("v_C max <= 2 m/s", "'max' and '<='"),
        ("rubbing speed at B <= 3 rpm", "does not go with that unit"),
        ("v_C <= 1,200 mm/s", "in thousands"),
        ("v_B/v_C = 2", "speeds of turning"),
        ("i = 2.5", "names no links"),
    ],
)
def test_what_cannot_be_understood_carries_a_doubt(text: str, doubt: str) -> None:
    found = only(text)
    assert found.doubt is not None
    assert doubt in found.doubt
    assert found.value is None


@pytest.mark.parametrize(
    "text",
    ["max load 200 kg", "min. bend radius 3", "100 ± 0.5 mm", "w_1 <= 20 mm", "ω = 10 rad/s - 20 mm", "A-B", "±0.1"],
)
def test_other_texts_are_let_be(text: str) -> None:
    assert find_requirements(text) == []


def test_every_line_is_read_for_itself() -> None:
    found = find_requirements("v_C <= 2 m/s\nM = 1")
    assert [each.quantity for each in found] == [None, "mobility"]
    assert find_requirements("n = 120 rpm\nmax load 3 kg") == []


def test_what_is_taken_leaves_the_drives_beside_it() -> None:
    text = "ω_AB = 4 rad/s, v_C <= 2 m/s"
    left = without_requirements(text, find_requirements(text))
    assert [(each.name, each.rate) for each in find_statements(left)] == [("AB", 4.0)]
    toleranced = "ω_CD = 4 rad/s ± 2 %"
    assert find_statements(without_requirements(toleranced, find_requirements(toleranced))) == []


def test_a_bare_limit_belongs_only_beside_a_link() -> None:
    assert (only("max. 120 rpm").explicit, only("max. 120 rpm").name) == (False, None)
