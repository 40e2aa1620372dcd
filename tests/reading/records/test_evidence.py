from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Evidence
from dxfcheck.settings import Settings
from tests.sketches import A, B, C, Drawn, arc, line, path, pins, read, ring, rod, text, tipper

E = 90 + 120j


def evidence(*things: Drawn, settings: Settings | None = None) -> dict[tuple[str, str], Evidence]:
    return {(each.subject, each.name): each for each in read(*things, settings=settings).evidence}


def test_every_pin_link_joint_and_frame_pin_has_its_evidence() -> None:
    subjects = [(each.subject, each.name) for each in read(*tipper()).evidence]
    assert subjects == [
        ("frame", "A"),
        ("frame", "D"),
        *(("pin", name) for name in "ABCD"),
        *(("link", name) for name in ("A-B", "B-C", "C-D")),
        ("joint", "frame / A-B"),
        ("joint", "A-B / B-C"),
        ("joint", "B-C / C-D"),
        ("joint", "frame / C-D"),
        ("drive", "A-B"),
    ]


def test_it_names_the_rule_the_handles_and_the_mechanism() -> None:
    found = evidence(*tipper())
    link = found["link", "A-B"]
    assert (link.rule, link.handles, link.mechanism) == (3, ("crank",), "M1")
    assert "1 line: ends at A, ends at B" in link.why
    pin = found["pin", "B"]
    assert (pin.rule, pin.handles, pin.at) == (2, ("ring B",), B)
    assert found["frame", "A"].rule == 5
    assert found["drive", "A-B"].rule == 10


@pytest.mark.parametrize(
    ("things", "settings", "why"),
    [
        pytest.param(tipper(), None, "its ring is frame by layer FRAME", id="its ring"),
        pytest.param(
            (ring(A), *tipper()[1:], line(A, A - 20j, layer="GROUND")), None, "frame linework", id="frame linework"
        ),
        pytest.param((ring(A), *tipper()[1:]), Settings(frame_pins=("A",)), "stated to be a frame pin", id="stated"),
    ],
)
def test_why_a_pin_is_fixed(things: tuple[Drawn, ...], settings: Settings | None, why: str) -> None:
    assert why in evidence(*things, settings=settings)["frame", "A"].why


def test_a_mechanism_without_a_frame_says_which_link_is_held() -> None:
    found = evidence(*(ring(at) for at in (A, B, C, E)), rod(A, B), rod(B, C), rod(C, E))
    assert "B-C" not in found["frame", "none"].why
    assert "held for the count" in found["frame", "none"].why
    assert found["frame", "none"].rule == 8


@pytest.mark.parametrize(
    ("rings", "what"),
    [
        pytest.param([ring(B)], "one ring", id="one ring"),
        pytest.param([ring(B), ring(B, 2.0)], "2 rings on one centre", id="two rings"),
        pytest.param([arc(B, 4, 0, 180), arc(B, 4, 180, 180)], "one ring drawn in 2 pieces", id="two halves"),
    ],
)
def test_what_a_pin_was_drawn_as(rings: list[Drawn], what: str) -> None:
    others = [thing for thing in tipper() if thing.handle != "ring B"]
    assert evidence(*others, *rings)["pin", "B"].why.startswith(f"{what}; named by the text")


def test_pins_without_a_label_are_numbered_by_their_place() -> None:
    assert "numbered by its place" in evidence(*pins(), *tipper()[4:7])["pin", "P1"].why


def test_welded_linework_is_told_by_rule_4() -> None:
    arm = [line((B + C) / 2, E), ring(E), text("E", E + 5)]
    link = evidence(*tipper(), *arm)["link", "B-C-E"]
    assert link.rule == 4
    assert "2 lines welded together" in link.why


@pytest.mark.parametrize(
    ("coupler", "words"),
    [
        pytest.param(line(B, C + (C - B)), "runs on through C", id="running on"),
        pytest.param(path(B, C, E), "has a corner or hole at C", id="a corner"),
        pytest.param(path(B, C, E, closed=True), "1 outline", id="an outline"),
        pytest.param(arc((B + C) / 2, abs(C - B) / 2, 197.818889, 180), "1 arc", id="an arc"),
    ],
)
def test_how_a_link_meets_its_pins(coupler: Drawn, words: str) -> None:
    others = [thing for thing in tipper() if thing.handle != "coupler"]
    found = evidence(*others, coupler)
    assert any(words in each.why for (subject, _), each in found.items() if subject == "link")


def test_a_pin_of_three_links_is_told_by_rule_7() -> None:
    drawn = [*tipper(), rod(B, E), ring(E), rod(E, C)]
    joint = evidence(*drawn)["joint", "A-B / B-C"]
    assert joint.rule == 7
    assert "a pin of 3 links, which is 2 joints" in joint.why


@pytest.mark.parametrize(
    ("extra", "settings", "rule", "why"),
    [
        pytest.param([], None, 10, "no drive is stated", id="assumed"),
        pytest.param([text("ω_AB = 3 rad/s", 300j)], None, 9, "note 'ω_AB = 3 rad/s'", id="note"),
        pytest.param([], Settings(drives=("A-B = 3 rad/s",)), 9, "option: A-B = 3 rad/s", id="option"),
    ],
)
def test_where_a_drive_comes_from(extra: list[Drawn], settings: Settings | None, rule: int, why: str) -> None:
    drive = evidence(*tipper(), *extra, settings=settings)["drive", "A-B"]
    assert drive.rule == rule
    assert why in drive.why


def test_a_link_laid_over_a_pivot_says_that_it_is_not_pinned_there() -> None:
    """A folded dead centre: the coupler runs back over the crank's pivot."""
    drawn = (
        ring(0j, 2, layer="FRAME"),
        ring(30 + 0j, 2),
        ring(-60 + 0j, 2),
        ring(-80 + 50j, 2, layer="FRAME"),
        line(0j, 30 + 0j),
        line(30 + 0j, -60 + 0j),
        line(-60 + 0j, -80 + 50j),
    )
    found = [each.why for each in read(*drawn).evidence if each.subject == "link"]
    assert sum("without being pinned there" in why for why in found) == 1
