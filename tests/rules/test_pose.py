from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.settings import Settings
from tests.rules.subjects import findings, only
from tests.sketches import A, Drawn, line, rectangle, ring, rod, text, tipper

FAR_OFF = 60 + 400j


def stretched() -> list[Drawn]:
    """Crank and coupler in one line: the rocker is at its dead centre."""
    places = {"A": 0j, "B": 30 + 0j, "C": 130 + 0j, "D": 150 - 60j}
    drawn = [ring(at, layer="FRAME" if name in "AD" else "0") for name, at in places.items()]
    drawn += [text(name, at + 4 + 4j) for name, at in places.items()]
    bars = (("A", "B"), ("B", "C"), ("C", "D"))
    return [*drawn, *(rod(places[one], places[other]) for one, other in bars)]


def note(content: str) -> Drawn:
    return text(content, FAR_OFF, handle="note")


def test_an_assumed_drive_says_which_link_and_how_to_state_it() -> None:
    found = only("assumed-drive", *tipper())
    assert found.severity == "note"
    assert "A-B is taken to turn at 1 rad/s ccw" in found.message
    assert "--drive 'A-B = 60 rpm'" in found.remedy
    assert (found.at, found.handles, found.mechanism) == (A, ("crank",), "M1")


def test_a_stated_drive_is_not_assumed() -> None:
    assert findings("assumed-drive", *tipper(), note("ω_AB = 3 rad/s")) == []


def test_an_unknown_drive_is_told_at_its_note() -> None:
    found = only("unknown-drive", *tipper(), note("ω_XY = 3 rad/s"))
    assert found.severity == "error"
    assert found.message.startswith("the drive 'ω_XY = 3 rad/s' is left out: no link is called 'XY'")
    assert (found.at, found.handles) == (FAR_OFF, ("note",))


def pusher() -> list[Drawn]:
    """A crank AB, a rod BC and a block at C on a guide of the frame."""
    end = 130 + 0j
    places = {"A": 0j, "B": 20 + 35j, "C": end}
    drawn = [ring(at, layer="FRAME" if name == "A" else "0") for name, at in places.items()]
    drawn += [text(name, at + 4 + 8j) for name, at in places.items()]
    guided = rectangle(end, 20, 12), line(end - 50 - 6j, end + 40 - 6j, layer="FRAME")
    return [*drawn, rod(0j, places["B"]), rod(places["B"], end), *guided]


def test_a_sliding_speed_without_a_unit_says_how_it_was_taken() -> None:
    unitless, settings = LengthUnit("unitless", "assumed", None), Settings(drives=("block at C = 50 mm/s",))
    found = only("drive-unit-assumed", *pusher(), unit=unitless, settings=settings)
    assert (found.severity, found.mechanism) == ("warning", "M1")
    assert "taken as 50 of its units a second" in found.message
    assert "--units" in found.remedy
    assert findings("drive-unit-assumed", *pusher(), settings=settings) == []


def test_drives_that_contradict_one_another_tell_the_speed_that_fits() -> None:
    settings = Settings(drives=("A-B = 2 rad/s", "C-D = 99 rad/s"))
    found = only("drive-conflict", *tipper(), settings=settings)
    assert found.severity == "error"
    assert "C-D is stated to turn at 99 rad/s" in found.message
    assert "the others give" in found.message


def test_a_second_drive_that_fits_is_no_conflict() -> None:
    implied = only("drive-conflict", *tipper(), settings=Settings(drives=("A-B = 2 rad/s", "C-D = 99 rad/s")))
    fitting = implied.message.split("the others give ")[1].split(" ")[0]
    settings = Settings(drives=("A-B = 2 rad/s", f"C-D = {fitting} rad/s"))
    assert findings("drive-conflict", *tipper(), settings=settings) == []


@pytest.mark.parametrize(("link", "told"), [("C-D", 1), ("A-B", 0)])
def test_a_rocker_at_its_dead_centre_cannot_be_driven_but_the_crank_can(link: str, told: int) -> None:
    found = findings("drive-at-limit", *stretched(), settings=Settings(drives=(f"{link} = 1 rad/s",)))
    assert len(found) == told
    for each in found:
        assert each.severity == "error"
        assert f"the stated drive of {link} cannot act at this pose" in each.message


def test_links_in_line_are_a_dead_centre_at_their_pin() -> None:
    found = only("dead-centre", *stretched())
    assert found.severity == "warning"
    assert "A-B and B-C are in line at B" in found.message
    assert found.at == 30 + 0j


def test_a_rod_square_to_its_slide_is_a_dead_centre_but_not_in_line() -> None:
    end = 80 + 0j
    places = {"A": 0j, "B": 80 - 60j, "C": end}
    drawn = [ring(at, layer="FRAME" if name == "A" else "0") for name, at in places.items()]
    drawn += [text(name, at + 4 + 8j) for name, at in places.items()]
    guided = rectangle(end, 20, 12), line(end - 50 + 6j, end + 40 + 6j, layer="FRAME")
    found = only("dead-centre", *drawn, rod(0j, places["B"]), rod(places["B"], end), *guided)
    assert "B-C and block at C push on one another square to the way they could go at C" in found.message
    assert "B-C cannot drive block at C" in found.message
    assert found.at == end


def test_no_dead_centre_in_a_general_pose_nor_in_a_structure() -> None:
    assert findings("dead-centre", *tipper()) == []
    assert findings("dead-centre", *tipper(), line(A, 160 + 80j)) == []
