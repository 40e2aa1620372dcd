from __future__ import annotations

import re

import pytest

from dxfcheck import __version__
from dxfcheck.cli import main
from dxfcheck.cli.arguments import Request, parse_arguments
from dxfcheck.settings import Settings


def test_defaults_state_nothing() -> None:
    assert parse_arguments(["check", "a.dxf"]) == Request(command="check", paths=("a.dxf",))


def test_every_option_of_check_is_understood() -> None:
    line = "check a.dxf folder --drive A-B=10rad/s --drive D-E=1rad/s --frame A,D --units mm --tolerance 0.01"
    line += " --expect-mobility -1 --fail-on note --jobs 3 --json - --quiet"
    request = parse_arguments(line.split())
    assert request == Request(
        command="check",
        paths=("a.dxf", "folder"),
        settings=Settings(
            unit="mm",
            tolerance=0.01,
            drives=("A-B=10rad/s", "D-E=1rad/s"),
            frame_pins=("A", "D"),
            expected_mobility=-1,
        ),
        fail_on="note",
        jobs=3,
        json="-",
        quiet=True,
    )


def test_read_shows_and_never_fails_on_findings() -> None:
    request = parse_arguments(["read", "a.dxf", "--frame", "A"])
    assert request.command == "read"
    assert request.fail_on == "never"
    assert request.settings.frame_pins == ("A",)


def test_a_settings_file_may_be_named() -> None:
    assert parse_arguments(["check", "a.dxf"]).settings_file is None
    assert parse_arguments(["read", "a.dxf", "--settings", "office.toml"]).settings_file == "office.toml"


def test_settings_takes_a_path_or_the_current_folder() -> None:
    assert parse_arguments(["settings"]).paths == (".",)
    line = "settings a.dxf --starter --units mm --expect-mobility 2 --json -"
    request = parse_arguments(line.split())
    assert (request.paths, request.starter, request.json) == (("a.dxf",), True, "-")
    assert request.settings == Settings(unit="mm", expected_mobility=2)


def test_explain_takes_one_rule_or_none() -> None:
    assert parse_arguments(["explain"]).rule is None
    assert parse_arguments(["explain", "loose-end"]).rule == "loose-end"


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        ([], "COMMAND"),
        (["chek"], "'chek'"),
        (["check"], "PATH"),
        (["check", "a.dxf", "--unheard-of"], "--unheard-of"),
        (["check", "a.dxf", "--sarif", "x"], "--sarif"),
        (["check", "a.dxf", "--quie"], "--quie"),
        (["check", "a.dxf", "--tolerance", "0"], "above 0"),
        (["check", "a.dxf", "--tolerance", "nan"], "above 0"),
        (["check", "a.dxf", "--tolerance", "wide"], "above 0"),
        (["check", "a.dxf", "--jobs", "0"], "1 or more"),
        (["check", "a.dxf", "--jobs", "many"], "whole number"),
        (["check", "a.dxf", "--expect-mobility", "1.5"], "whole number"),
        (["check", "a.dxf", "--fail-on", "sight"], "'sight'"),
        (["check", "a.dxf", "--units", "cubit"], "cubit"),
        (["check", "a.dxf", "--drive", "fast"], "fast"),
        (["check", "a.dxf", "--drive", "block at C = 5 mm/s cw"], "has no sense"),
        (["check", "a.dxf", "--drive", "A-B against = 5 rad/s"], "'against'"),
        (["check", "a.dxf", "--drive", "E-F = 50 mm"], "no speed with a unit"),
        (["check", "a.dxf", "--frame", "A,,D"], "without a name"),
        (["check", "a.dxf", "--frame", ""], "without a name"),
        (["read", "a.dxf", "--fail-on", "note"], "--fail-on"),
        (["explain", "a", "b"], "b"),
        (["check", "a.dxf", "--drive", "two\nlines \x1b[2J"], "two"),
    ],
)
def test_wrong_usage_is_one_clear_line_and_status_2(
    arguments: list[str], says: str, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(arguments) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith("dxfcheck: ")
    assert err.count("\n") == 1
    assert err[:-1].isprintable()
    assert says in err


def test_the_help_shows_every_form_of_drive_and_each_is_understood(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "--help"]) == 0
    out = " ".join(capsys.readouterr().out.split())
    forms = re.findall(r"'([^']+ = [^']+)'", out)
    assert [" against " in form for form in forms].count(True) == 1
    assert [form for form in forms if form.endswith("mm/s")] == ["block at C = 50 mm/s", "E-F = 50 mm/s"]
    drives = [part for form in forms for part in ("--drive", form)]
    assert parse_arguments(["check", "a.dxf", *drives]).settings.drives == tuple(forms)


def test_version_and_help_go_to_standard_output(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["--version"]) == 0
    assert capsys.readouterr().out == f"dxfcheck {__version__}\n"
    assert main(["--help"]) == 0
    out, err = capsys.readouterr()
    assert "130  interrupted" in out
    assert "no forces, strength, clearance or guarding" in out
    assert err == ""
