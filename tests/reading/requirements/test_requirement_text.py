from __future__ import annotations

import math
import subprocess
import sys

import pytest

from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.requirements.requirement_text import read_expected_speed, read_limit, read_ratio
from dxfcheck.settings import Figure, Quantity, Requirement


def bounds(requirement: Requirement) -> tuple[object, object]:
    """Least and greatest amount."""
    least, greatest = requirement.least, requirement.greatest
    return (None if least is None else least.amount), (None if greatest is None else greatest.amount)


@pytest.mark.parametrize("text", ["500 mm/s", "<= 500 mm/s", "at most 0.5 m/s", "max. 0,5 m/s", "up to 500 mm/s"])
def test_a_limit_is_the_greatest_size_in_metres_a_second(text: str) -> None:
    limit = read_limit("pin-speed", "C", text, where="dxfcheck.toml:4")
    assert bounds(limit) == (None, pytest.approx(0.5))
    assert (limit.quantity, limit.subject, limit.expected, limit.signed) == ("pin-speed", "C", None, False)
    assert (limit.stated, limit.source, limit.where) == (text, "settings", "dxfcheck.toml:4")


def test_a_pin_may_be_called_one() -> None:
    assert read_limit("pin-speed", "pin C", "1 m/s").subject == "C"
    assert read_expected_speed("pin C", "1 m/s").subject == "C"
    assert read_limit("slide-speed", "pin C", "1 m/s").subject == "pin C"


def test_a_limit_keeps_its_figure_as_written_for_drawings_without_a_unit() -> None:
    assert read_limit("slide-speed", "*", "30 m/min").greatest == Figure(0.5, 0.5)
    written = read_limit("slide-speed", "*", "500 mm/s").greatest
    assert written is not None
    assert written.written == pytest.approx(500.0)


def test_a_limit_may_state_a_least_size_or_a_range() -> None:
    assert bounds(read_limit("pin-speed", "C", ">= 0.1 m/s")) == (pytest.approx(0.1), None)
    assert bounds(read_limit("pin-speed", "C", "0.1 to 0.3 m/s")) == (pytest.approx(0.1), pytest.approx(0.3))


def test_a_limit_on_turning_may_be_against_another_link() -> None:
    limit = read_limit("link-speed", "A-B against  B-C", "300 rpm")
    assert (limit.subject, limit.against) == ("A-B", "B-C")
    assert bounds(limit) == (None, pytest.approx(10 * math.pi))


@pytest.mark.parametrize(
    ("quantity", "subject", "text", "why"),
    [
        ("pin-speed", "C", "300 rpm", "a speed of turning"),
        ("link-speed", "C-D", "2 m/s", "a speed along"),
        ("pin-speed", "C", "2", "without a unit"),
        ("pin-speed", "C", "fast", "no figure"),
        ("pin-speed", "C", "-2 m/s", "a size"),
        ("link-speed", "C-D", "20 rpm cw", "a size"),
        ("pin-speed", "C", "2 m/s ± 1 %", "no tolerance"),
        ("pin-speed", "C", "1,200 mm/s", "in thousands"),
        ("pin-speed", "C", "1e999 m/s", "finite"),
        ("pin-speed", "C", "3 to 2 m/s", "lesser figure first"),
        ("pin-speed", "C against D", "2 m/s", "a pin only"),
        ("pin-speed", "", "2 m/s", "name a pin"),
        ("mobility", "", "1", "whole number"),
    ],
)
def test_a_limit_that_cannot_be_used_is_refused_in_one_line(
    quantity: Quantity, subject: str, text: str, why: str
) -> None:
    with pytest.raises(OptionInvalid, match=why) as refused:
        read_limit(quantity, subject, text)
    assert "\n" not in str(refused.value)


def test_an_expected_speed_of_a_pin_is_a_size_within_its_tolerance() -> None:
    expected = read_expected_speed("C", "0.35 m/s ± 2 %")
    assert (expected.quantity, expected.signed) == ("pin-speed", False)
    assert bounds(expected) == (pytest.approx(0.343), pytest.approx(0.357))
    assert expected.expected == Figure(0.35, 0.35)


def test_expected_turning_has_a_sense() -> None:
    clockwise = read_expected_speed("C-D", "4 rad/s cw ± 0.5 rad/s")
    assert (clockwise.quantity, clockwise.signed) == ("link-speed", True)
    assert bounds(clockwise) == (pytest.approx(-4.5), pytest.approx(-3.5))
    assert bounds(read_expected_speed("C-D", "-4 rad/s ± 0.5")) == bounds(clockwise)
    assert bounds(read_expected_speed("C-D", "4 rad/s ± 0.5")) == (pytest.approx(3.5), pytest.approx(4.5))


@pytest.mark.parametrize(
    ("subject", "quantity"), [("block at C", "slide-speed"), ("D-E", "slide-speed"), ("E", "pin-speed")]
)
def test_a_speed_along_is_a_slides_where_no_pin_is_named(subject: str, quantity: str) -> None:
    assert read_expected_speed(subject, "120 mm/s ± 1 %").quantity == quantity


def test_without_a_tolerance_an_expected_speed_holds_within_half_a_per_cent() -> None:
    assert bounds(read_expected_speed("C-D", "4 rad/s")) == (pytest.approx(3.98), pytest.approx(4.02))


def test_a_tolerance_may_have_another_unit_than_its_figure() -> None:
    expected = read_expected_speed("C", "0.35 m/s ± 5 mm/s")
    assert bounds(expected) == (pytest.approx(0.345), pytest.approx(0.355))
    assert expected.greatest is not None
    assert expected.greatest.written == pytest.approx(0.355)


@pytest.mark.parametrize(
    ("subject", "text", "why"),
    [
        ("C", "-1 m/s", "a size"),
        ("C-D", "4", "no unit"),
        ("C-D", "0 rad/s ± 2 %", "per cent of 0"),
        ("C-D", "-4 rad/s cw", "a sign and says 'cw'"),
        ("C-D", "4 rad/s ± 2 mm/s", "do not go together"),
        ("C-D", "<= 4 rad/s ± 2 %", "a tolerance as well"),
        ("block at C", "2 m/s cw", "only a speed of turning has a sense"),
    ],
)
def test_an_expected_speed_that_cannot_be_used_is_refused(subject: str, text: str, why: str) -> None:
    with pytest.raises(OptionInvalid, match=why):
        read_expected_speed(subject, text)


@pytest.mark.parametrize(
    ("text", "least", "greatest", "signed"),
    [
        ("0.5 ± 2 %", 0.49, 0.51, False),
        ("1:2 ± 2 %", 0.49, 0.51, False),
        ("0.4 to 0.6", 0.4, 0.6, False),
        ("0.4-0.6", 0.4, 0.6, False),
        ("-0.5 ± 0.1", -0.6, -0.4, True),
    ],
)
def test_a_ratio_names_two_links(text: str, least: float, greatest: float, signed: bool) -> None:  # noqa: FBT001
    ratio = read_ratio("C-D / A-B", text)
    assert (ratio.quantity, ratio.subject, ratio.against, ratio.signed) == ("speed-ratio", "C-D", "A-B", signed)
    assert bounds(ratio) == (pytest.approx(least), pytest.approx(greatest))


def test_a_ratio_may_only_have_a_greatest_size() -> None:
    assert bounds(read_ratio("C-D/A-B", "at most 0.6")) == (None, 0.6)


@pytest.mark.parametrize(("links", "text", "why"), [("C-D", "0.5", "two links"), ("C-D/A-B", "3 rpm", "of turning")])
def test_a_ratio_that_cannot_be_used_is_refused(links: str, text: str, why: str) -> None:
    with pytest.raises(OptionInvalid, match=why):
        read_ratio(links, text)


def test_reading_stated_figures_loads_no_heavy_library() -> None:
    code = (
        "import sys, dxfcheck.reading.requirements.requirement_text\n"
        "print([name for name in ('ezdxf', 'networkx', 'numpy') if name in sys.modules])"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
