from __future__ import annotations

import io
from collections.abc import Callable
from dataclasses import replace

import pytest

from dxfcheck.analysis.results import Mobility
from dxfcheck.inspection import DrawingReport, MechanismReport
from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.reports.terminal_drawing import verdict
from dxfcheck.rules.finding import Finding
from tests.reports.samples import (
    ACCEPTED,
    LOOSE_END,
    PRESS,
    PRESS_ANALYSIS,
    TIPPER,
    TIPPER_ANALYSIS,
    press,
    tipper,
    unreadable,
)

ALL = [tipper(), press(), unreadable()]
WORD_TOO_LONG = 80


class Screen(io.StringIO):
    """A stream that says it is a terminal."""

    def isatty(self) -> bool:
        return True


def printed(*reports: DrawingReport, stream: io.StringIO | None = None) -> str:
    stream = io.StringIO() if stream is None else stream
    terminal = TerminalReport(stream)
    for report in reports:
        terminal.drawing(report)
    terminal.end(reports)
    return stream.getvalue()


def read(report: DrawingReport) -> str:
    stream = io.StringIO()
    TerminalReport(stream).reading(report)
    return stream.getvalue()


@pytest.fixture(autouse=True)
def plain_environment(monkeypatch: pytest.MonkeyPatch) -> None:
    for name in ("NO_COLOR", "FORCE_COLOR", "COLUMNS", "TTY_COMPATIBLE", "TTY_INTERACTIVE"):
        monkeypatch.delenv(name, raising=False)
    monkeypatch.setenv("TERM", "xterm-256color")


def test_the_check_report_is_the_golden_one(golden: Callable[[str, str], None]) -> None:
    golden("check.txt", printed(*ALL))


def test_the_reading_report_is_the_golden_one(golden: Callable[[str, str], None]) -> None:
    golden("read.txt", read(tipper()))


def test_the_quiet_report_is_the_golden_one(golden: Callable[[str, str], None]) -> None:
    stream = io.StringIO()
    terminal = TerminalReport(stream)
    for report in ALL:
        terminal.quiet(report)
    terminal.quiet_end(ALL)
    golden("quiet.txt", stream.getvalue())


def test_no_line_is_longer_than_a_screen_and_none_is_cut() -> None:
    text = printed(*ALL) + read(tipper())
    assert max(map(len, text.splitlines())) <= WORD_TOO_LONG
    assert "…" not in text
    assert "..." not in text


def test_forty_links_still_fit(golden: Callable[[str, str], None]) -> None:
    golden("forty-links.txt", printed(lift_table()))


def lift_table() -> DrawingReport:
    """A stack of forty links, one of them with a name longer than its column."""
    link, pin = TIPPER.links[1], TIPPER.pins[1]
    names = [f"P{n}-P{n + 1}" for n in range(38)]
    links = (*TIPPER.links[:1], *(replace(link, name=name) for name in names), replace(link, name="-".join(names[:9])))
    pins = tuple(replace(pin, name=f"P{n}", at=complex(n * 1e4, -n), links=(n, n + 1)) for n in range(39))
    joints = tuple(replace(TIPPER.joints[1], first=n, second=n + 1, pin=n, at=pins[n].at) for n in range(39))
    analysis = replace(
        TIPPER_ANALYSIS,
        links=(TIPPER_ANALYSIS.links[0], *(TIPPER_ANALYSIS.links[2] for _ in range(39))),
        pins=tuple(TIPPER_ANALYSIS.pins[2] for _ in pins),
        joints=tuple(TIPPER_ANALYSIS.joints[1] for _ in joints),
        loops=(tuple(range(40)),),
    )
    linkage = replace(TIPPER, links=links, pins=pins, joints=joints)
    return replace(tipper(findings=()), mechanisms=(MechanismReport(linkage=linkage, analysis=analysis),))


def with_freedom(at_pose: int, *, grounded: bool = True, solved: bool = False) -> MechanismReport:
    mobility = Mobility(count=at_pose, links=4, full_joints=4, half_joints=0, at_pose=at_pose)
    return MechanismReport(
        linkage=replace(PRESS, grounded=grounded), analysis=replace(PRESS_ANALYSIS, mobility=mobility, solved=solved)
    )


@pytest.mark.parametrize(
    ("report", "says"),
    [
        (tipper(findings=()), "1 mechanism, moves with 1 freedom, driven as stated; no findings"),
        (tipper(), "1 mechanism, moves with 1 freedom, driven as stated; 1 warning, 1 note"),
        (
            tipper(findings=(ACCEPTED, LOOSE_END, ACCEPTED)),
            "1 mechanism, moves with 1 freedom, driven as stated; 1 warning, 2 accepted",
        ),
        (
            tipper(findings=(ACCEPTED,)),
            "1 mechanism, moves with 1 freedom, driven as stated; no findings but 1 accepted",
        ),
        (replace(press(), mechanisms=()), "holds no linkage; no findings"),
        (replace(press(), mechanisms=(with_freedom(0),)), "1 mechanism, cannot move; no findings"),
        (
            replace(press(), mechanisms=(with_freedom(2),)),
            "1 mechanism, moves with 2 freedoms, speeds not settled; no findings",
        ),
        (
            replace(press(), mechanisms=(with_freedom(1, grounded=False),)),
            "1 mechanism, tied to no frame, moves with 1 freedom within itself; no findings",
        ),
        (
            replace(press(), mechanisms=(with_freedom(1, solved=True), with_freedom(0), with_freedom(1, solved=True))),
            "3 mechanisms, 1 cannot move, 2 with 1 freedom, driven as stated; no findings",
        ),
        (unreadable(), "not read: is no DXF file; export it anew"),
        (
            replace(unreadable(), error="broken.dxf: is no DXF file; export it anew"),
            "not read: is no DXF file; export it anew",
        ),
    ],
)
def test_the_verdict_answers_what_a_drafter_asks_first(report: DrawingReport, says: str) -> None:
    assert verdict(report) == says


def test_an_assumed_drive_is_called_one() -> None:
    drive = replace(TIPPER.drives[0], source="assumed", rate=1.0, stated="")
    report = tipper(findings=())
    report = replace(report, mechanisms=(replace(report.mechanisms[0], linkage=replace(TIPPER, drives=(drive,))),))
    text = " ".join(printed(report).split())
    assert "drive assumed" in text
    assert "A-B turns at 1 rad/s ccw (9.5493 r/min): assumed, as none is stated, so every speed is a ratio" in text


def test_a_drive_the_other_way_is_clockwise() -> None:
    drive = replace(TIPPER.drives[0], rate=-4.0)
    report = tipper()
    linkage = replace(TIPPER, drives=(drive,))
    assert "4 rad/s cw" in printed(replace(report, mechanisms=(replace(report.mechanisms[0], linkage=linkage),)))


def test_an_assembly_tied_to_no_frame_gets_no_speeds() -> None:
    text = printed(replace(press(), mechanisms=(with_freedom(1, grounded=False),)))
    assert "no speeds are given" in " ".join(text.split())
    assert "omega" not in text


def test_a_link_that_turns_about_no_point_is_said_to_translate_and_one_at_rest_to_rest() -> None:
    links = list(TIPPER_ANALYSIS.links)
    links[2] = replace(links[2], angular_velocity=0.0, pole=None)
    text = printed_with(links=tuple(links))
    assert "translates" in text
    still = tuple(replace(pin, velocity=0j) for pin in TIPPER_ANALYSIS.pins)
    text = printed_with(links=tuple(replace(link, angular_velocity=0.0, pole=None) for link in links), pins=still)
    assert text.count("at rest") == 3


def printed_with(**changes: object) -> str:
    report = tipper()
    analysis = replace(TIPPER_ANALYSIS, **changes)  # type: ignore[arg-type]
    return printed(replace(report, mechanisms=(replace(report.mechanisms[0], analysis=analysis),)))


def test_colour_changes_nothing_but_the_colour() -> None:
    coloured = printed(*ALL, stream=Screen())
    assert "\x1b[" in coloured
    assert strip_colour(coloured) == printed(*ALL)


def strip_colour(text: str) -> str:
    parts = text.split("\x1b[")
    return parts[0] + "".join(part.partition("m")[2] for part in parts[1:])


def test_no_colour_is_honoured(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("NO_COLOR", "1")
    assert "\x1b" not in printed(*ALL, stream=Screen())


def test_a_wide_screen_is_used(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("COLUMNS", "110")
    longest = max(map(len, strip_colour(printed(*ALL, stream=Screen())).splitlines()))
    assert WORD_TOO_LONG < longest <= 110


def test_text_from_outside_is_no_markup_and_no_command() -> None:
    finding = Finding(
        rule="loose-end",
        severity="error",
        message="[bold]see[/b] :smile: [link=file:///etc/passwd]",
        remedy="\x1b[2J\x9b2J\u202etext",
        layer="[/red]",
    )
    text = printed(tipper("dir\x1b]0;title\x07\n/x.dxf", findings=(finding,)), stream=Screen())
    assert "[bold]see[/b] :smile: [link=file:///etc/passwd]" in text
    assert "layer [/red]" in text
    plain = strip_colour(text)
    assert all(char.isprintable() or char == "\n" for char in plain)
    assert plain.startswith("dir?]0;title??/x.dxf: ")


def test_a_finding_says_where_it_is(capsys: pytest.CaptureFixture[str]) -> None:
    text = printed(tipper(findings=(LOOSE_END,)))
    assert "warning  loose-end  at (150, 92.5), in M1, layer LINKS, handle 2F\n" in text
    assert capsys.readouterr().out == ""


def test_a_quiet_finding_is_one_line_however_long() -> None:
    stream = io.StringIO()
    TerminalReport(stream).quiet(tipper(findings=(replace(LOOSE_END, message="word " * 60),)))
    assert stream.getvalue().count("\n") == 1


def test_the_summary_has_a_row_for_each_of_several_drawings() -> None:
    assert "Summary" not in printed(tipper())
    text = printed(*ALL)
    assert "Summary" in text
    assert text.count("soil-press.dxf") == 2


def test_the_account_shows_its_sum() -> None:
    assert "sum           16                  of 16 in the drawing" in read(tipper())


def test_what_is_read_is_shown_with_the_rule_that_decided() -> None:
    text = read(tipper())
    assert (
        "  pin A; at (0, 0); joins frame and A-B; on the frame\n    rule 2: a circle of radius 3; handle 40\n" in text
    )
    assert "Also decided\n  border\n    rule 1: an outline that encloses whole links; handle 99\n" in text


def test_an_unreadable_drawing_is_read_as_nothing() -> None:
    assert read(unreadable()) == "broken.dxf: not read: is no DXF file; export it anew\n"


def test_settings_that_had_a_say_and_rules_off_are_told() -> None:
    report = replace(tipper(), settings_files=("dxfcheck.toml",), rules_off=("empty-pin", "short-line"))
    assert "settings: dxfcheck.toml; 2 rules off" in " ".join(printed(report).split())
    assert "settings:" not in printed(tipper())
