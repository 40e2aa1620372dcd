from __future__ import annotations

import argparse
from datetime import date

import pytest

from dxfcheck.cli.accept_arguments import AcceptRequest, accept_request, add_accept, joined_places
from dxfcheck.cli.arguments import parse_arguments


def parsed(*arguments: str) -> AcceptRequest:
    parser = argparse.ArgumentParser(exit_on_error=False, allow_abbrev=False)
    add_accept(parser)
    return accept_request(parser.parse_args(joined_places(["tipper.dxf", "--reason", "why", *arguments])))


def test_all_is_optional_but_the_reason() -> None:
    assert parsed() == AcceptRequest(path="tipper.dxf", reason="why")


def test_everything_can_be_narrowed() -> None:
    stated = parsed("--rule", "near-miss", "--at", "120.5,40", "--handle", "2f", "--until", "2027-03-31")
    assert stated == AcceptRequest(
        path="tipper.dxf", reason="why", rule="near-miss", at=120.5 + 40j, handle="2F", until=date(2027, 3, 31)
    )


@pytest.mark.parametrize("place", ["-3.5,4", "(-3.5, 4)", " -3.5 , 4 "])
def test_a_place_may_be_written_as_the_report_shows_it_and_start_with_a_minus(place: str) -> None:
    assert parsed("--at", place).at == -3.5 + 4j


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        (["--reason", " \t "], "says nothing"),
        (["--at", "1"], "must be a place X,Y"),
        (["--at", "1,2,3"], "must be a place X,Y"),
        (["--at", "nan,2"], "must be a place X,Y"),
        (["--handle", "beam"], "must be the handle of an entity"),
        (["--until", "31.3.2027"], "must be a day such as 2027-03-31"),
        (["--until", "2027-02-30"], "must be a day such as 2027-03-31"),
        (["--until", "20270331"], "must be a day such as 2027-03-31"),
    ],
)
def test_what_cannot_be_used_is_refused(arguments: list[str], says: str) -> None:
    with pytest.raises(argparse.ArgumentError, match=says):
        parsed(*arguments)


def test_the_reason_is_one_line() -> None:
    assert parsed("--reason", "drawn so\n  on purpose ").reason == "drawn so on purpose"


def test_the_command_takes_the_options_that_say_how_a_drawing_is_read(capsys: pytest.CaptureFixture[str]) -> None:
    request = parse_arguments(["accept", "a.dxf", "--reason", "r", "--frame", "A,D", "--settings", "office.toml"])
    assert request.command == "accept"
    assert request.accept == AcceptRequest(path="a.dxf", reason="r")
    assert request.settings.frame_pins == ("A", "D")
    assert request.settings_file == "office.toml"
    with pytest.raises(SystemExit) as stop:
        parse_arguments(["accept", "a.dxf"])
    assert stop.value.code == 2
    assert "--reason" in capsys.readouterr().err
