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


def pusher(knee: complex = 20 + 35j) -> list[Drawn]:
    """A crank AB, a rod BC and a block at C on a guide of the frame; ``knee`` is B."""
    end = 130 + 0j
    places = {"A": 0j, "B": knee, "C": end}
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


def trammel() -> list[Drawn]:
    """Blocks at B and C on level and upright frame guides with a rod between: no arm turns on the frame."""
    places = {"B": 0j, "C": 60 + 45j}
    drawn = [ring(at) for at in places.values()] + [text(name, at + 6 + 8j) for name, at in places.items()]
    level = rectangle(0j, 20, 12), line(-50 - 6j, 50 - 6j, layer="FRAME")
    upright = rectangle(60 + 45j, 12, 20), line(66 - 10j, 66 + 95j, layer="FRAME")
    return [*drawn, rod(places["B"], places["C"]), *level, *upright]


def test_an_assumed_slide_is_said_to_slide_and_how_to_state_it() -> None:
    found = only("assumed-drive", *trammel())
    assert "block at B is taken to slide at 1 mm/s towards 0 deg, so every speed is a ratio" in found.message
    assert found.remedy.startswith("write a note such as 'v = 50 mm/s' beside it")
    assert "--drive 'block at B = 50 mm/s'" in found.remedy
    stated = Settings(drives=("block at B = 50 mm/s",))
    assert findings("assumed-drive", *trammel(), settings=stated) == []
    unitless = LengthUnit("unitless", "assumed", None)
    assert "slide at 1 unit/s towards 0 deg" in only("assumed-drive", *trammel(), unit=unitless).message


def test_an_unknown_drive_says_how_a_slide_is_named() -> None:
    found = only("unknown-drive", *trammel(), note("v_X = 0.2 m/s"))
    assert "'v_C = 0.2 m/s'" in found.remedy
    assert findings("unknown-drive", *trammel(), note("v_C = 0.2 m/s")) == []


def test_sliding_drives_that_contradict_one_another_are_speeds_of_length() -> None:
    settings = Settings(drives=("block at B = 60 mm/s", "block at C = -90 mm/s"))
    found = only("drive-conflict", *trammel(), settings=settings)
    # The rod keeps its length where 60 vB = 45 vC: the others give 60 x 60 / 45 = 80.
    assert found.message == (
        "block at C is stated to slide at 90 mm/s towards -90 deg, which contradicts the other drives; "
        "the others give 80 mm/s; it is left out"
    )


def test_a_slide_driven_to_the_left_is_driven_towards_180_degrees() -> None:
    drawn = (*trammel(), note("v_B = -90 mm/s"))
    found = only("drive-conflict", *drawn, settings=Settings(drives=("block at C = 60 mm/s",)))
    assert "block at B is stated to slide at 90 mm/s towards 180 deg, which contradicts" in found.message


def test_a_drive_against_another_link_says_which() -> None:
    settings = Settings(drives=("A-B = 2 rad/s", "C-D against B-C = -99 rad/s"))
    found = only("drive-conflict", *tipper(), settings=settings)
    assert "C-D is stated to turn at 99 rad/s cw relative to B-C" in found.message


def test_a_block_at_the_end_of_its_stroke_cannot_be_driven() -> None:
    settings = Settings(drives=("block at C = 1 mm/s",))
    assert findings("drive-at-limit", *pusher(), settings=settings) == []
    found = only("drive-at-limit", *pusher(40 + 0j), settings=settings)
    assert "the stated sliding drive of block at C cannot act at this pose" in found.message


def test_drives_that_contradict_one_another_tell_the_speed_that_fits() -> None:
    settings = Settings(drives=("A-B = 2 rad/s", "C-D = 99 rad/s"))
    found = only("drive-conflict", *tipper(), settings=settings)
    assert found.severity == "error"
    assert "C-D is stated to turn at 99 rad/s ccw, which contradicts the other drives" in found.message
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


def squared() -> list[Drawn]:
    """A crank AB, and a rod BC that stands square to the guide of the block at C."""
    end = 80 + 0j
    places = {"A": 0j, "B": 80 - 60j, "C": end}
    drawn = [ring(at, layer="FRAME" if name == "A" else "0") for name, at in places.items()]
    drawn += [text(name, at + 4 + 8j) for name, at in places.items()]
    guided = rectangle(end, 20, 12), line(end - 50 + 6j, end + 40 + 6j, layer="FRAME")
    return [*drawn, rod(0j, places["B"]), rod(places["B"], end), *guided]


def test_a_rod_square_to_its_slide_is_a_dead_centre_but_not_in_line() -> None:
    found = only("dead-centre", *squared())
    assert "B-C and block at C push on one another square to the way they could go at C" in found.message
    assert "B-C cannot drive block at C" in found.message
    assert found.at == 80 + 0j


def test_no_dead_centre_in_a_general_pose_nor_in_a_structure() -> None:
    assert findings("dead-centre", *tipper()) == []
    assert findings("dead-centre", *tipper(), line(A, 160 + 80j)) == []
