from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.reading import Observation
from dxfcheck.settings import Requirement
from tests.sketches import Drawn, fates, line, obround, observed, read, ring, rod, text, tipper

FAR_OFF = 60 + 400j
BESIDE_ROD = 95 + 62j


def note(content: str, at: complex = FAR_OFF) -> Drawn:
    return text(content, at, handle="note")


def stated(content: str, at: complex = FAR_OFF) -> Requirement:
    """The one requirement that a note on the tray tipper states."""
    reading = read(*tipper(), note(content, at))
    assert [each for each in reading.observations if each.kind == "unknown-requirement"] == []
    (found,) = reading.requirements
    return found


def unknown(content: str, at: complex = FAR_OFF) -> Observation:
    (seen,) = observed("unknown-requirement", *tipper(), note(content, at))
    return seen


def test_a_note_on_a_pin_keeps_its_place_handle_and_mechanism() -> None:
    found = stated("v_C <= 2 m/s")
    assert (found.quantity, found.subject, found.mechanism) == ("pin-speed", "C", "M1")
    assert (found.source, found.stated, found.at, found.handles) == ("note", "v_C <= 2 m/s", FAR_OFF, ("note",))


def test_a_link_is_named_as_the_report_names_it() -> None:
    found = stated("n_CD max 120 rpm")
    assert (found.quantity, found.subject, found.against) == ("link-speed", "C-D", "")
    relative = stated("ω_AB against BC <= 3 rad/s")
    assert (relative.subject, relative.against) == ("A-B", "B-C")


def test_a_ratio_names_both_links() -> None:
    found = stated("ω_CD/ω_AB = 0.5 ± 2 %")
    assert (found.quantity, found.subject, found.against) == ("speed-ratio", "C-D", "A-B")


def test_expected_turning_is_held_with_its_sense_and_a_limit_by_its_size() -> None:
    assert stated("ω_CD = 4 rad/s ± 2 %").signed
    assert not stated("ω_CD <= 4 rad/s").signed


def test_a_note_with_a_tolerance_is_no_drive() -> None:
    (linkage,) = read(*tipper(), note("ω_AB = 4 rad/s ± 2 %")).linkages
    assert [drive.source for drive in linkage.drives] == ["assumed"]
    (linkage,) = read(*tipper(), note("ω_AB = 4 rad/s, ω_CD max 5 rad/s")).linkages
    assert [(drive.source, drive.rate) for drive in linkage.drives] == [("note", 4.0)]


def test_a_limit_without_a_name_belongs_to_the_link_beside_it() -> None:
    assert stated("max. 120 rpm", BESIDE_ROD).subject == "B-C"
    assert stated("n_max = 120 rpm", BESIDE_ROD).subject == "B-C"


def test_words_without_a_name_are_for_all() -> None:
    assert (stated("rubbing speed max 0.5 m/s").subject, stated("rubbing speed max 0.5 m/s").mechanism) == ("*", "")


def test_a_mobility_is_the_mechanisms() -> None:
    found = stated("M = 1")
    assert (found.quantity, found.mechanism) == ("mobility", "M1")


def test_a_lone_f_is_a_mobility_only_beside_a_link() -> None:
    assert stated("F = 1", BESIDE_ROD).quantity == "mobility"
    assert read(*tipper(), note("F = 1")).requirements == ()


@pytest.mark.parametrize(
    ("content", "why"),
    [
        ("v_X <= 2 m/s", "no pin, slide or link is called 'X'"),
        ("n_XY <= 2 rpm", "no link is called 'XY'"),
        ("rubbing speed at X <= 1 m/s", "no pin is called 'X'"),
        ("v_CD <= 2 m/s", "C-D of M1 does not slide, so it has no sliding speed"),
        ("v_C <= 2", "no speed with a unit"),
        ("mobility = one", "no whole number"),
        ("i = 2.5", "names no links"),
    ],
)
def test_what_cannot_be_placed_is_never_dropped_in_silence(content: str, why: str) -> None:
    seen = unknown(content)
    assert why in seen.detail
    assert (seen.subject, seen.at, seen.handles) == (content, FAR_OFF, ("note",))


def test_a_figure_without_a_unit_is_none_of_ours_where_it_names_nothing() -> None:
    assert observed("unknown-requirement", *tipper(), note("v_X <= 2")) == []


def two_tippers() -> list[Drawn]:
    """Two levers on rods with the same labels, 400 apart."""
    drawn: list[Drawn] = []
    for corner in (0j, 400 + 0j):
        places = {"A": corner, "B": corner + 20 + 35j, "C": corner + 160 + 80j, "D": corner + 150}
        drawn += [ring(at, layer="FRAME" if name in "AD" else "0") for name, at in places.items()]
        drawn += [text(name, at + 5 + 3j) for name, at in places.items()]
        drawn += [rod(places[one], places[other]) for one, other in ("AB", "BC", "CD")]
    return drawn


def test_a_note_belongs_to_the_nearest_mechanism_that_has_its_subject() -> None:
    for shift, name in ((0, "M1"), (400, "M2")):
        for content in ("v_C <= 2 m/s", "n_CD <= 3 rpm", "M = 1"):
            (found,) = read(*two_tippers(), note(content, 175 + shift + 70j)).requirements
            assert found.mechanism == name


def test_a_note_midway_between_two_is_not_guessed() -> None:
    (seen,) = observed("unknown-requirement", *two_tippers(), note("v_C <= 2 m/s", 360 - 300j))
    assert "several mechanisms have a pin 'C'" in seen.detail


def test_the_account_and_the_evidence_tell_of_the_note() -> None:
    fate = fates(*tipper(), note("v_C <= 2 m/s"))["note"]
    assert (fate.read_as, fate.why) == ("note", "states a limit or an expectation")
    (item,) = [each for each in read(*tipper(), note("v_C <= 2 m/s")).evidence if each.subject == "requirement"]
    assert (item.name, item.rule, item.handles, item.mechanism) == ("v_C <= 2 m/s", 12, ("note",), "M1")


def test_a_sheet_without_a_linkage_is_held_to_nothing() -> None:
    reading = read(line(0j, 50 + 0j), note("v_C <= 2 m/s"))
    assert (reading.requirements, reading.linkages) == ((), ())


def test_a_pin_in_a_slot_is_a_slide_of_that_name() -> None:
    crank = (ring(0j, layer="FRAME"), ring(30 + 20j), rod(0j, 30 + 20j))
    foot, end = -30 - 40j, 10 + 0j - cmath.rect(6.0, math.pi / 4)
    lever = (ring(foot, layer="FRAME"), obround(10 + 0j, 50 + 40j, 6.0), line(foot, end))
    names = (text("A", 5 + 5j), text("B", 36 + 26j))
    (found,) = read(*crank, *lever, *names, note("sliding speed of B max 0.1 m/s")).requirements
    assert (found.quantity, found.subject, found.mechanism) == ("slide-speed", "pin B", "M1")
