from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.reading.requirements.requirement_text import read_expected_speed, read_limit, read_ratio
from dxfcheck.settings import Requirement, Settings
from dxfcheck.tolerances.sheet import PLACES_NAMED
from tests.rules.subjects import findings, only
from tests.sketches import B, C, Drawn, path, ring, rod, text, tipper

NOTE_AT = 60 + 400j
DRIVE = "A-B = 10 rad/s"
"""The crank is 40.31 mm long, so pin B runs at 403.1 mm/s; the rings have a radius of 4 mm."""


def note(content: str) -> Drawn:
    return text(content, NOTE_AT, handle="note")


def held(*requirements: Requirement, drives: tuple[str, ...] = (DRIVE,)) -> Settings:
    return Settings(requirements=requirements, drives=drives)


def test_a_fast_pin_is_told_with_its_limit_its_excess_its_place_and_a_remedy() -> None:
    found = only("pin-speed", *tipper(), note("v_B <= 0.35 m/s"), settings=held())
    assert found.severity == "error"
    assert found.message.startswith("pin B of M1 runs at 403.1 mm/s, 15.2 % over its limit of 350 mm/s")
    assert "set by the note 'v_B <= 0.35 m/s' at (60, 400)" in found.message
    assert found.remedy.startswith("run the drive A-B at 8.682 rad/s ccw")
    assert (found.at, found.handles, found.mechanism) == (B, ("ring B", "note"), "M1")


def test_a_limit_of_the_settings_says_where_it_stands() -> None:
    limit = read_limit("pin-speed", "B", "0.35 m/s", where="dxfcheck.toml:12")
    assert "set as '0.35 m/s' in dxfcheck.toml:12" in only("pin-speed", *tipper(), settings=held(limit)).message


def test_a_limit_that_is_kept_is_not_told() -> None:
    assert findings("pin-speed", *tipper(), note("v_B <= 0.41 m/s"), settings=held()) == []


def test_a_pin_that_rubs_names_both_links() -> None:
    found = only("rubbing-speed", *tipper(), note("rubbing speed at A <= 30 mm/s"), settings=held())
    assert found.message.startswith("frame and A-B of M1 rub on one another at pin A at 40 mm/s, 33.3 % over")
    assert found.remedy.startswith("make the pin thinner, or run the drive A-B at 7.5 rad/s ccw")


def test_a_link_that_turns_too_fast() -> None:
    found = only("link-speed", *tipper(), note("n_AB max 60 rpm"), settings=held())
    assert found.message.startswith(
        "A-B of M1 turns at 10 rad/s ccw (95.49 r/min), 59.2 % over its limit of 6.283 rad/s"
    )


def test_a_ratio_off_its_figure() -> None:
    found = only("speed-ratio", *tipper(), settings=held(read_ratio("C-D / A-B", "0.9 ± 1 %")))
    assert "times as fast as A-B, the same way" in found.message
    assert "(from 0.891 to 0.909 holds)" in found.message
    assert "C-D / A-B" not in found.remedy


def test_an_expected_speed_says_which_way_it_is_off() -> None:
    found = only("expected-speed", *tipper(), note("v_B = 0.42 m/s ± 1 %"), settings=held())
    assert "4.02 % less than the 420 mm/s expected (from 415.8 to 424.2 holds)" in found.message
    other = only("expected-speed", *tipper(), settings=held(read_expected_speed("A-B", "10 rad/s cw")))
    assert "the other way than the 10 rad/s cw" in other.message
    assert findings("pin-speed", *tipper(), note("v_B = 0.42 m/s ± 1 %"), settings=held()) == []


@pytest.mark.parametrize("name", ["pin-speed", "link-speed"])
def test_a_speed_that_is_not_known_is_a_warning_of_its_rule(name: str) -> None:
    end = C + 60 + 20j
    arm = (ring(end), rod(C, end), text("E", end + 6 + 4j))
    limits = (read_limit("pin-speed", "E", "1 m/s"), read_limit("link-speed", "C-E", "300 rpm"))
    found = only(name, *tipper(), *arm, settings=held(*limits))
    assert found.severity == "warning"
    assert "not known at this pose" in found.message
    assert "could not be checked: the drives do not settle it" in found.message


def test_with_an_assumed_drive_it_is_said_once_a_mechanism() -> None:
    limits = (read_limit("pin-speed", "*", "1 mm/s"), read_limit("link-speed", "*", "1 rpm"))
    found = only("unjudged-limit", *tipper(), settings=held(*limits, drives=()))
    assert found.severity == "warning"
    assert found.message.startswith("2 stated limits of M1 not judged, as its drive is only assumed")
    assert findings("pin-speed", *tipper(), settings=held(*limits, drives=())) == []


def test_without_a_unit_it_is_said_once_how_limits_were_taken() -> None:
    unitless = LengthUnit("unitless", "assumed", None)
    limits = (read_limit("pin-speed", "B", "500 m/s"), read_limit("pin-speed", "C", "500 m/s"))
    found = only("limit-unit-assumed", *tipper(), unit=unitless, settings=held(*limits))
    assert "is taken as 500 of its units a second, and 1 more likewise" in found.message
    assert findings("limit-unit-assumed", *tipper(), settings=held(*limits)) == []


def test_a_requirement_of_nothing_weighs_by_where_it_was_stated() -> None:
    assert only("unknown-requirement", *tipper(), note("v_X <= 2 m/s")).severity == "warning"
    assert only("unknown-requirement", *tipper(), note("i = 2.5")).severity == "note"
    named = only("unknown-requirement", *tipper(), settings=held(read_limit("pin-speed", "X", "1 m/s")))
    assert named.severity == "error"
    assert "the pin-speed of X, set as '1 m/s' in the settings, is held against nothing" in named.message
    pattern = only("unknown-requirement", *tipper(), settings=held(read_limit("pin-speed", "X*", "1 m/s")))
    assert pattern.severity == "warning"


def test_many_parts_beyond_one_limit_are_told_by_the_worst() -> None:
    places = [complex(20 * number, 0) for number in range(14)]
    strip = [ring(places[0], layer="FRAME"), *(ring(at) for at in places[1:]), path(*places)]
    limit = read_limit("pin-speed", "*", "1 mm/s")
    found = findings("pin-speed", *strip, settings=Settings(requirements=(limit,), drives=("P1-P2 = 1 rad/s",)))
    assert len(found) == PLACES_NAMED
    assert {each.at for each in found} == set(places[-PLACES_NAMED:])
    assert [each.message for each in found if "3 more are beyond it as well" in each.message]
