from __future__ import annotations

import pytest

from dxfcheck.linkage import Drive
from dxfcheck.settings import Settings
from tests.sketches import (
    A,
    B,
    C,
    D,
    Drawn,
    arc,
    labels,
    linkage,
    observed,
    read,
    read_as,
    ring,
    rod,
    text,
    tipper,
)

BESIDE_CRANK = 12 + 14j
FAR_OFF = 60 + 400j
TALL = 2.0


def note(content: str, at: complex = BESIDE_CRANK) -> Drawn:
    return text(content, at, TALL, handle="note")


def driven(*things: Drawn, settings: Settings | None = None) -> dict[str, tuple[float, str]]:
    found = linkage(*things, settings=settings)
    return {found.links[drive.link].name: (drive.rate, drive.source) for drive in found.drives}


@pytest.mark.parametrize(
    ("content", "at"),
    [
        pytest.param("ω = 10 rad/s", BESIDE_CRANK, id="beside the link"),
        pytest.param("ω_AB = 10 rad/s", FAR_OFF, id="by two of its pins"),
        pytest.param("ω_BA = 10 rad/s", FAR_OFF, id="in either order"),
        pytest.param("ω_A-B = 10 rad/s", FAR_OFF, id="by its name"),
        pytest.param("ω_2 = 10 rad/s", BESIDE_CRANK, id="numbered, beside the link"),
    ],
)
def test_a_note_drives_the_link_it_names_or_stands_beside(content: str, at: complex) -> None:
    assert driven(*tipper(), note(content, at)) == {"A-B": (10.0, "note")}


def test_a_drive_note_keeps_its_words_place_and_handle() -> None:
    (drive,) = linkage(*tipper(), note("ω  = 10 rad/s")).drives
    assert drive == Drive(
        link=1,
        against=0,
        rate=10.0,
        kind="turn",
        source="note",
        stated="ω = 10 rad/s",
        at=BESIDE_CRANK,
        handles=("note",),
    )
    assert read_as(*tipper(), note("ω = 10 rad/s"))["note"] == "drive note"


def test_two_of_the_pins_of_a_longer_link_name_it() -> None:
    tip = 90 + 120j
    coupler = [rod(B, tip), ring(tip), text("E", tip + 5), rod(C, tip), arc(B, 12.0, 15, 40)]
    found = driven(*tipper(), *coupler, note("ω_BE = 3 rad/s", FAR_OFF))
    assert list(found.values()) == [(3.0, "note")]


def unknown(*things: Drawn, settings: Settings | None = None) -> str:
    (seen,) = observed("unknown-drive", *things, settings=settings)
    return seen.detail


def test_a_note_between_two_links_is_an_unknown_drive_and_no_guess() -> None:
    drawn = [*tipper(), note("ω = 10 rad/s", B + 8 - 5j)]
    assert "could belong to" in unknown(*drawn)
    assert "A-B of M1" in unknown(*drawn)
    assert driven(*drawn) == {"A-B": (1.0, "assumed")}


@pytest.mark.parametrize(("away", "near"), [(15.9, True), (16.1, False)])
def test_a_note_without_a_name_reaches_eight_text_heights(away: float, near: bool) -> None:  # noqa: FBT001 - a table
    below = [ring(0j, layer="FRAME"), ring(100 + 0j), rod(0j, 100 + 0j)]
    drawn = [*below, note("ω = 5 rad/s", 40 + away * 1j)]
    assert driven(*drawn) == {"P1-P2": (5.0, "note") if near else (1.0, "assumed")}
    if not near:
        assert unknown(*drawn) == "no link lies near it"


def test_a_name_that_no_link_has_is_an_unknown_drive_that_tells_the_names() -> None:
    assert unknown(*tipper(), note("ω_XY = 10 rad/s")) == "no link is called 'XY'; the links are A-B, B-C, C-D"


def test_a_note_in_doubt_drives_nothing() -> None:
    drawn = [*tipper(), note("ω_AB = -4 rad/s cw")]
    assert "minus sign" in unknown(*drawn)
    assert driven(*drawn) == {"A-B": (1.0, "assumed")}


def test_a_sliding_speed_cannot_drive_a_link_that_turns() -> None:
    assert "does not slide" in unknown(*tipper(), note("v = 0.2 m/s"))


def test_stated_lengths_are_no_drives() -> None:
    assert driven(*tipper(), note("AB = 40 mm")) == {"A-B": (1.0, "assumed")}
    assert observed("unknown-drive", *tipper(), note("AB = 40 mm")) == []


def test_an_option_comes_before_the_note_on_the_same_link() -> None:
    settings = Settings(drives=("A-B = 2 rad/s cw",))
    assert driven(*tipper(), note("ω_AB = 10 rad/s"), settings=settings) == {"A-B": (-2.0, "option")}


def test_options_and_notes_on_several_links_all_count_options_first() -> None:
    found = linkage(*tipper(), note("ω_AB = 10 rad/s"), settings=Settings(drives=("CD = 1 rad/s",)))
    assert [(found.links[drive.link].name, drive.source) for drive in found.drives] == [
        ("C-D", "option"),
        ("A-B", "note"),
    ]


def test_a_drive_of_the_settings_comes_before_the_note_and_after_the_option_on_the_same_link() -> None:
    settings = Settings(settings_drives=("A-B = 3 rad/s",))
    assert driven(*tipper(), note("ω_AB = 10 rad/s"), settings=settings) == {"A-B": (3.0, "settings")}
    settings = Settings(settings_drives=("A-B = 3 rad/s", "C-D = 1 rad/s"), drives=("A-B = 2 rad/s",))
    assert driven(*tipper(), note("ω_AB = 10 rad/s"), settings=settings) == {
        "A-B": (2.0, "option"),
        "C-D": (1.0, "settings"),
    }


def test_a_drive_of_the_settings_says_so() -> None:
    found = read(*tipper(), settings=Settings(settings_drives=("A-B = 3 rad/s",)))
    (evidence,) = [each for each in found.evidence if each.subject == "drive"]
    assert evidence.why == "stated in the settings: A-B = 3 rad/s"


def test_a_drive_of_the_settings_for_no_link_is_an_unknown_drive() -> None:
    assert "no link is called 'X-Y'" in unknown(*tipper(), settings=Settings(settings_drives=("X-Y = 1 rad/s",)))


def test_an_option_for_no_link_is_an_unknown_drive() -> None:
    assert "no link is called 'X-Y'" in unknown(*tipper(), settings=Settings(drives=("X-Y = 1 rad/s",)))


def twin(shift: complex) -> tuple[Drawn, ...]:
    """A lever A-B on the frame."""
    tip = shift + 50j
    return (
        ring(shift, layer="FRAME"),
        ring(tip),
        rod(shift, tip),
        text("A", shift + 5),
        text("B", tip + 5),
    )


@pytest.mark.parametrize(
    ("at", "rates"),
    [
        pytest.param(5 + 25j, [7.0, 1.0], id="beside the first"),
        pytest.param(205 + 25j, [1.0, 7.0], id="beside the second"),
    ],
)
def test_a_name_that_several_mechanisms_have_means_the_one_it_stands_in(at: complex, rates: list[float]) -> None:
    linkages = read(*twin(0j), *twin(200 + 0j), note("ω_AB = 7 rad/s", at)).linkages
    assert [drive.rate for each in linkages for drive in each.drives] == rates


@pytest.mark.parametrize(("off", "rates"), [(79.9, [7.0, 1.0]), (80.1, [1.0, 1.0])])
def test_such_a_note_stands_within_forty_text_heights(off: float, rates: list[float]) -> None:
    note_above = note("ω_AB = 7 rad/s", (46 + off) * 1j)  # the lever is drawn to 46, the rim of B
    linkages = read(*twin(0j), *twin(2000 + 0j), note_above).linkages
    assert [drive.rate for each in linkages for drive in each.drives] == rates


@pytest.mark.parametrize(("second", "known"), [(20.1, True), (19.9, False)])
def test_a_note_belongs_to_a_link_half_as_far_off_as_the_next(second: float, known: bool) -> None:  # noqa: FBT001
    content, height, first = "ω = 7 rad/s", 5.0, 10.0
    width = 0.65 * height * len(content)
    drawn = [*twin(0j), *twin(first + width + second + 0j), text(content, first + 20j, height)]
    rates = [drive.rate for each in read(*drawn).linkages for drive in each.drives]
    assert rates == ([7.0, 1.0] if known else [1.0, 1.0])
    assert len(observed("unknown-drive", *drawn)) == (0 if known else 1)


def test_a_name_that_several_mechanisms_have_is_unknown_far_from_both() -> None:
    assert "A-B of M1, A-B of M2" in unknown(*twin(0j), *twin(200 + 0j), note("ω_AB = 7 rad/s", FAR_OFF))


def test_the_shortest_arm_on_the_frame_is_assumed_to_turn_at_one_radian_a_second() -> None:
    assert abs(B - A) < abs(C - D)
    assert driven(*tipper()) == {"A-B": (1.0, "assumed")}


def test_of_equal_arms_the_first_by_name_is_assumed_to_turn() -> None:
    top = [ring(0j, layer="FRAME"), ring(100 + 0j, layer="FRAME"), ring(40j), ring(100 + 40j)]
    cranks = [rod(100 + 0j, 100 + 40j), rod(0j, 40j), rod(40j, 100 + 40j)]
    assert driven(*top, *cranks) == {"P1-P2": (1.0, "assumed")}


@pytest.mark.parametrize(("longer", "name"), [(5e-7, "P1-P2"), (5e-6, "P3-P4")])
def test_how_equal_arms_must_be(longer: float, name: str) -> None:
    tops = [40j * (1 + longer), 100 + 40j]
    rings = [ring(0j, layer="FRAME"), ring(100 + 0j, layer="FRAME"), *(ring(top) for top in tops)]
    assert list(driven(*rings, rod(0j, tops[0]), rod(100 + 0j, tops[1]), rod(*tops))) == [name]


def test_a_stated_drive_leaves_nothing_to_assume() -> None:
    assert driven(*tipper(), note("ω_CD = 0 rad/s", FAR_OFF)) == {"C-D": (0.0, "note")}


def test_each_mechanism_without_a_note_gets_an_assumed_drive() -> None:
    assert [each.drives[0].source for each in read(*twin(0j), *twin(200 + 0j)).linkages] == ["assumed", "assumed"]


def test_a_mechanism_on_no_frame_is_driven_by_nothing_and_says_so() -> None:
    loose = [ring(at) for at in (A, B, C, D)]
    drawn = [*loose, rod(A, B), rod(B, C), rod(C, D), *labels()]
    assert driven(*drawn) == {}
    assert unknown(*drawn, note("ω_AB = 3 rad/s")) == "its mechanism has no frame to turn against"
