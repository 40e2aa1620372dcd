from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest

from tests.configuration.files import problems_of, settings_file

GOOD = '[[accept]]\nrule = "near-miss"\ndrawing = "a b.dxf"\nreason = "stop face"\n'


def test_a_table_states_an_acceptance_of_one_drawing(tmp_path: Path) -> None:
    file = settings_file(tmp_path, f'# head\n{GOOD}at = [1, 2.5]\nhandle = "2F"\nuntil = 2027-03-31\n')
    (table,) = file.accepted
    assert (table.drawing, table.line) == ("a b.dxf", 2)
    acceptance = table.acceptance
    assert acceptance.rule == "near-miss"
    assert acceptance.reason == "stop face"
    assert acceptance.at == 1 + 2.5j
    assert acceptance.handle == "2F"
    assert acceptance.until == date(2027, 3, 31)
    assert acceptance.where == f"{tmp_path}/dxfcheck.toml:2"


def test_place_handle_and_day_may_be_left_out(tmp_path: Path) -> None:
    (table,) = settings_file(tmp_path, GOOD).accepted
    assert (table.acceptance.at, table.acceptance.handle, table.acceptance.until) == (None, None, None)


@pytest.mark.parametrize(
    ("more", "problem"),
    [
        ("at = [1]", "5: accept.at: it must be two coordinates, not a list; write at = [120.5, 40.0]"),
        ("at = [nan, 1]", "5: accept.at: it must be two coordinates, not a list; write at = [120.5, 40.0]"),
        ("at = [true, 1]", "5: accept.at: it must be two coordinates, not a list; write at = [120.5, 40.0]"),
        ("handle = 29", '5: accept.handle: it must be a text, not the number 29; write handle = "2F"'),
        ("handle = ''", '5: accept.handle: it is empty; write handle = "2F"'),
        (
            "until = 2027-03-31T10:00:00",
            (
                "5: accept.until: it must be a date, not the date or time 2027-03-31 10:00:00; "
                "write the day without quotes, as until = 2027-03-31"
            ),
        ),
        ("handel = '2F'", "5: accept.handel: there is no such key here; did you mean handle?"),
        ("units = 'mm'", "5: accept.units: there is no such key here; put units below [reading]"),
        (
            "colour = 1",
            "5: accept.colour: there is no such key here; use one of rule, drawing, at, handle, reason, until",
        ),
    ],
)
def test_a_mistake_says_what_to_do(tmp_path: Path, more: str, problem: str) -> None:
    assert problems_of(tmp_path, GOOD + more) == [f"dxfcheck.toml:{problem}"]


def test_rule_drawing_and_reason_must_be_stated(tmp_path: Path) -> None:
    assert [problem.split(";")[0] for problem in problems_of(tmp_path, "\n[[accept]]\n")] == [
        "dxfcheck.toml:2: accept.rule: it is missing: the rule whose finding is accepted",
        "dxfcheck.toml:2: accept.drawing: it is missing: the drawing, by its path from the folder of the settings file",
        "dxfcheck.toml:2: accept.reason: it is missing: why it is accepted",
    ]


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ('rule = "near-mis"', 'there is no rule "near-mis"; did you mean near-miss?'),
        ('rule = "xyzzy"', "there is no rule \"xyzzy\"; 'dxfcheck explain' lists them"),
        ('drawing = "*.dxf"', '"*.dxf" is a pattern; name one drawing, and write an [[accept]] table for each'),
        ('drawing = "/srv/a.dxf"', "the path must start from the folder of this file"),
        ('reason = "  "', "it is empty; write reason ="),
    ],
)
def test_a_value_that_cannot_be_used_is_told(tmp_path: Path, line: str, says: str) -> None:
    word = line.split(maxsplit=1)[0]
    text = "\n".join(line if each.startswith(word) else each for each in GOOD.splitlines())
    (problem,) = problems_of(tmp_path, text)
    assert says in problem


@pytest.mark.parametrize("name", ["a*.dxf", "what?.dxf", "~a.dxf"])
def test_a_drawing_may_be_called_like_a_pattern(tmp_path: Path, name: str) -> None:
    text = "\n".join(f"drawing = '{name}'" if each.startswith("drawing") else each for each in GOOD.splitlines())
    problems_of(tmp_path, text)
    (tmp_path / name).touch()
    assert [each.drawing for each in settings_file(tmp_path, text).accepted] == [name]
