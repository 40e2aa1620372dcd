from __future__ import annotations

import tomllib
from datetime import date

import pytest

from dxfcheck.configuration.accept_writer import PROJECT_TABLE, add_acceptances
from dxfcheck.errors import OptionInvalid
from dxfcheck.settings import Acceptance

PLACED = Acceptance(rule="near-miss", reason="stop face", at=120.5 + 40j)
NAMED = Acceptance(rule="empty-pin", reason="spare", handle="2F", until=date(2027, 3, 31))
BARE = Acceptance(rule="units-missing", reason="old sheet")


def test_entries_are_written_as_a_person_would_write_them() -> None:
    added = add_acceptances("", "line 2/tipper.dxf", [PLACED, NAMED, BARE])
    assert added.text == (
        "[[accept]]\n"
        'rule = "near-miss"\n'
        'drawing = "line 2/tipper.dxf"\n'
        "at = [120.5, 40.0]\n"
        'reason = "stop face"\n'
        "\n"
        "[[accept]]\n"
        'rule = "empty-pin"\n'
        'drawing = "line 2/tipper.dxf"\n'
        'handle = "2F"\n'
        'reason = "spare"\n'
        "until = 2027-03-31\n"
        "\n"
        "[[accept]]\n"
        'rule = "units-missing"\n'
        'drawing = "line 2/tipper.dxf"\n'
        'reason = "old sheet"\n'
    )
    assert added.lines == (1, 7, 14)


@pytest.mark.parametrize(
    "before",
    [
        "# notes\n[rules]\nempty-pin = 'off' # why\n",
        "[rules]\nempty-pin = 'off'",
        '[[accept]]\r\nrule = "x-y"\r\ndrawing = "a.dxf"\r\nreason = "r"\r\n\r\n[limits]\r\npin-speed = "2 m/s"\r\n',
        "\ufeff[reading]\nunits = 'mm'\n",
        "",
    ],
    ids=["plain", "no last line end", "carriage returns", "byte order mark", "empty"],
)
def test_what_stood_there_stays_as_it_was_and_the_line_of_the_entry_is_told(before: str) -> None:
    added = add_acceptances(before, "tipper.dxf", [PLACED, BARE])
    assert added.text.startswith(before)
    lines = added.text.splitlines()
    assert [lines[line - 1] for line in added.lines] == ["[[accept]]", "[[accept]]"]
    read = tomllib.loads(added.text.removeprefix("\ufeff"))
    stood = tomllib.loads(before.removeprefix("\ufeff"))
    assert read.pop("accept")[-2:] == [
        {"rule": "near-miss", "drawing": "tipper.dxf", "at": [120.5, 40.0], "reason": "stop face"},
        {"rule": "units-missing", "drawing": "tipper.dxf", "reason": "old sheet"},
    ]
    stood.pop("accept", None)
    assert read == stood
    endings = {line[len(line.rstrip("\r\n")) :] for line in added.text.splitlines(keepends=True)}
    assert endings == ({"\r\n"} if "\r\n" in before else {"\n"})


@pytest.mark.parametrize(
    "before", ["[project]\nname = 'tools'\n", "[tool.dxfcheck.rules]\nempty-pin = 'off'\n[other]\n"]
)
def test_a_project_file_has_them_in_the_table_of_this_tool(before: str) -> None:
    added = add_acceptances(before, "tipper.dxf", [PLACED], PROJECT_TABLE)
    assert added.text.startswith(before)
    assert tomllib.loads(added.text)["tool"]["dxfcheck"]["accept"][0]["at"] == [120.5, 40.0]


@pytest.mark.parametrize(
    "name", ['tïpper "x" [1].dxf', "a'b#c.dxf", "Förderer 2/ö.dxf", "ctrl\x07\x7f\ttab.dxf", "線.dxf", "sub,=.dxf"]
)
def test_names_and_reasons_come_back_as_they_were(name: str) -> None:
    added = add_acceptances("", name, [Acceptance(rule="near-miss", reason=f"as in {name}", at=0j)])
    (entry,) = tomllib.loads(added.text)["accept"]
    assert entry["drawing"] == name
    assert entry["reason"] == f"as in {name}"


@pytest.mark.parametrize(
    "at", [0j, complex(-0.0, -0.0), 1e-7 - 2e12j, 123456.78901 - 0.123456j, 40 - 1e-14j, 1e60 + 1e60j]
)
def test_places_come_back_to_ten_digits(at: complex) -> None:
    added = add_acceptances("", "a.dxf", [Acceptance(rule="near-miss", reason="r", at=at)])
    x, y = tomllib.loads(added.text)["accept"][0]["at"]
    assert isinstance(x, float)
    assert isinstance(y, float)
    assert complex(x, y) == pytest.approx(at, rel=1e-9)
    assert "-0.0]" not in added.text
    assert "e-" not in added.text


@pytest.mark.parametrize(
    ("before", "table", "says"),
    [
        ("accept = []\n", ("accept",), r"stand in brackets or braces; write each acceptance as a table \[\[accept\]\]"),
        ("tool = {dxfcheck = {}}\n", PROJECT_TABLE, "stand in brackets or braces"),
        ("[rules\n", ("accept",), "is no TOML"),
    ],
)
def test_a_file_to_which_nothing_can_be_added_is_refused(before: str, table: tuple[str, ...], says: str) -> None:
    with pytest.raises(OptionInvalid, match=says):
        add_acceptances(before, "a.dxf", [BARE], table)


def test_a_name_that_no_settings_file_can_hold_is_refused() -> None:
    with pytest.raises(OptionInvalid, match="no Unicode text"):
        add_acceptances("", "caf\udce9.dxf", [BARE])
    with pytest.raises(OptionInvalid, match=r"would not be understood: accept\.drawing"):
        add_acceptances("", "back\\slash.dxf", [BARE])
