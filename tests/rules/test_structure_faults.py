"""Who is at fault: locked parts, special geometry, free and idle links, each by name."""

from __future__ import annotations

from tests.rules.subjects import findings, only
from tests.sketches import C, Drawn, line, ring, rod, text, tipper

FRAME_PINS = (ring(0j, layer="FRAME"), ring(100 + 0j, layer="FRAME"))


def named(places: dict[str, complex], bars: tuple[str, ...], fixed: str) -> list[Drawn]:
    """Rings with labels, the fixed ones on layer FRAME, and lines between them."""
    drawn = [ring(at, layer="FRAME" if name in fixed else "0") for name, at in places.items()]
    drawn += [text(name, at + 3 + 5j) for name, at in places.items()]
    return [*drawn, *(rod(places[bar[0]], places[bar[1]]) for bar in bars)]


def parallel_cranks(*xs: float) -> list[Drawn]:
    """A beam carried by upright cranks of equal length."""
    drawn = [line(complex(xs[0], 40), complex(xs[-1], 40))]
    for x in xs:
        drawn += [ring(complex(x, 0), layer="FRAME"), ring(complex(x, 40)), rod(complex(x, 0), complex(x, 40))]
    return drawn


FIVE_BARS = ("AC", "AD", "BC", "BD", "CD")
BRACED = {"A": 0j, "B": 180 + 0j, "C": 190 + 130j, "D": -10 + 120j, "E": -80 + 170j}


def test_a_truss_beside_a_driven_arm_is_locked_with_one_bar_too_many() -> None:
    found = only("locked-part", *named(BRACED, (*FIVE_BARS, "DE"), "AB"), text("ω_DE = 2 rad/s", 400 + 300j))
    assert (found.severity, found.mechanism, found.at) == ("error", "M1", BRACED["D"])
    assert found.message == (
        "A-C, A-D, B-C, B-D, C-D are locked with the frame: 1 constraint too many; "
        "the constraints of A, B, C, D depend on one another"
    )
    assert found.remedy == "take out A-C, A-D, B-C, B-D or C-D; 2 such let the part move"


def test_without_a_bar_too_many_each_bar_that_frees_it_is_named() -> None:
    drawn = named({"A": 0j, "B": 70 + 110j, "C": 180 + 0j, "E": 140 + 160j}, ("AB", "BC", "BE"), "AC")
    found = only("locked-part", *drawn, text("ω_BE = 2 rad/s", 400 + 300j))
    assert found.message == "A-B, B-C are locked with the frame, with just as many constraints as hold them"
    assert found.remedy.startswith("take out A-B or B-C")


def carried(*bars: str) -> list[Drawn]:
    """Links between C, D, E and F that a crank AB, a rod BC and a rocker GE carry along."""
    places = {"A": 0j, "B": 20 + 60j, "C": 120 + 90j, "D": 130 + 190j, "E": 230 + 80j, "F": 240 + 180j, "G": 250 + 0j}
    return named(places, ("AB", "BC", "EG", *bars), "AG")


def test_three_bars_in_a_triangle_are_a_usual_link() -> None:
    assert findings("locked-part", *carried("CD", "DE", "CE")) == []


def test_more_bars_that_move_as_one_link_are_a_note_and_with_one_too_many_an_error() -> None:
    five = ("CD", "DE", "CE", "DF", "EF")
    note = only("locked-part", *carried(*five))
    assert note.severity == "note"
    assert note.message == "C-D, C-E, D-E, D-F, E-F are locked with one another and move as one link"
    error = only("locked-part", *carried(*five, "CF"))
    assert error.severity == "error"
    assert (
        "move as one link: 1 constraint too many; the constraints of C, D, E, F depend on one another" in error.message
    )
    assert error.remedy == "take out C-D, C-E, C-F, D-E, D-F or E-F"
    assert findings("special-geometry", *carried(*five, "CF")) == []


def test_equal_cranks_move_through_and_the_joints_that_depend_are_named() -> None:
    found = only("special-geometry", *parallel_cranks(0.0, 60.0, 150.0))
    assert (found.severity, found.at) == ("warning", 0j)
    assert "1 freedom at the drawn pose where the count gives 0" in found.message
    assert "the constraints of P1, P2, P3, P4, P5, P6 depend on one another; it moves through" in found.message
    assert "limit" in found.message
    assert found.remedy.endswith("or take out P1-P2, P3-P4 or P5-P6")
    assert findings("special-geometry", *parallel_cranks(0.0, 150.0)) == []


def test_a_stretched_pair_locks_after_the_first_step() -> None:
    found = only("special-geometry", *named({"A": 0j, "B": 110 + 0j, "C": 200 + 0j}, ("AB", "BC"), "AC"))
    assert found.severity == "warning"
    assert "the constraints of A, B, C depend on one another" in found.message
    assert "it locks after the first step and cannot move beyond an instant" in found.message
    assert found.remedy.startswith("as drawn it will not turn")
    assert found.remedy.endswith("take out A-B or B-C")


FIVE_BAR = {"A": 0j, "B": -34 + 72j, "C": 84 + 126j, "D": 190 + 69j, "E": 150 + 0j}


def test_the_drive_that_would_settle_a_five_bar_is_named() -> None:
    drawn = named(FIVE_BAR, ("AB", "BC", "CD", "DE"), "AE")
    found = only("undriven-freedom", *drawn, text("ω_AB = 3 rad/s", 400 + 300j))
    assert found.severity == "warning"
    assert found.message == "1 freedom of M1 not driven: B-C, C-D, D-E may move in any way"
    assert found.remedy == "drive D-E too, by a note or with --drive 'D-E = 1 rad/s'"


def test_an_arm_that_hangs_free_is_idle_and_not_undriven() -> None:
    arm = [*tipper(), rod(C, 230 + 40j), ring(230 + 40j), text("E", 235 + 40j)]
    found = only("idle-freedom", *arm)
    assert (found.severity, found.mechanism) == ("note", "M1")
    assert found.message == "C-E turns freely about C: this moves nothing else, and its own speed is not settled"
    assert "--drive 'C-E = 1 rad/s'" in found.remedy
    assert findings("undriven-freedom", *arm) == []
    driven = text("ω_CE = 1 rad/s", 60 + 400j)
    assert findings("idle-freedom", *arm, driven, text("ω_AB = 1 rad/s", 60 + 500j)) == []


def test_an_idle_arm_does_not_hide_what_is_undriven() -> None:
    places = {**FIVE_BAR, "F": 80 + 200j}
    drawn = [*named(places, ("AB", "BC", "CD", "DE", "CF"), "AE"), text("ω_AB = 3 rad/s", 400 + 300j)]
    assert only("idle-freedom", *drawn).message.startswith("C-F turns freely about C")
    assert only("undriven-freedom", *drawn).message == "1 freedom of M1 not driven: B-C, C-D, D-E may move in any way"
