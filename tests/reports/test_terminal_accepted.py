from __future__ import annotations

import io
from dataclasses import replace

from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.reports.terminal_accepted import ACCEPTED_SHOWN, accepted_lines
from dxfcheck.reports.terminal_drawing import quiet_lines, quiet_summary, summary_lines
from tests.reports.samples import ACCEPTED, LOOSE_END, press, tipper

WIDTH = 80


def test_an_accepted_finding_is_shown_in_short_with_its_reason_and_last_day() -> None:
    assert [line.text for line in accepted_lines([ACCEPTED], WIDTH)] == [
        "",
        "Accepted",
        "  warning  empty-pin at (60, 10), until 2027-03-31: spare hole for the tray stop",
    ]


def test_one_without_a_place_or_a_last_day_says_neither() -> None:
    stated = ACCEPTED.accepted
    assert stated is not None
    bare = replace(ACCEPTED, at=None, accepted=replace(stated, at=None, until=None))
    assert accepted_lines([bare], WIDTH)[-1].text == "  warning  empty-pin: spare hole for the tray stop"


def test_where_nothing_was_accepted_nothing_is_said() -> None:
    assert accepted_lines([], WIDTH) == []


def test_a_long_reason_is_folded_and_of_very_many_the_first_are_shown() -> None:
    stated = ACCEPTED.accepted
    assert stated is not None
    wordy = replace(ACCEPTED, accepted=replace(stated, reason="drawn so on purpose, " * 8))
    lines = [line.text for line in accepted_lines([wordy] * (ACCEPTED_SHOWN + 2), WIDTH)]
    assert max(map(len, lines)) <= WIDTH
    assert sum("empty-pin" in line for line in lines) == ACCEPTED_SHOWN
    assert lines[-1] == "           and 2 more findings; all are in the JSON report"


def test_they_come_after_those_that_count_whatever_they_weigh() -> None:
    stream = io.StringIO()
    TerminalReport(stream).drawing(tipper(findings=(replace(ACCEPTED, severity="error"), LOOSE_END)))
    text = stream.getvalue()
    assert text.index("Findings") < text.index("loose-end") < text.index("Accepted") < text.index("empty-pin")
    assert "this ring looks like" not in text


def test_where_all_was_accepted_there_is_no_heading_for_findings() -> None:
    stream = io.StringIO()
    TerminalReport(stream).drawing(tipper(findings=(ACCEPTED,)))
    assert "Findings" not in stream.getvalue()


def test_a_quiet_run_only_counts_them() -> None:
    report = tipper(findings=(ACCEPTED, LOOSE_END))
    (line,) = quiet_lines(report)
    assert "loose-end" in line.text
    assert quiet_summary([report, press()]).text == "2 drawings: 1 warning, 1 accepted"


def test_the_summary_has_a_column_for_them_where_there_are_any() -> None:
    without = summary_lines([tipper(), press()], WIDTH)
    assert "accepted" not in without[1].text
    heading, first, second = summary_lines([tipper(findings=(ACCEPTED, LOOSE_END)), press()], WIDTH)[1:4]
    assert heading.text.split()[-4:] == ["errors", "warnings", "notes", "accepted"]
    assert first.text.split()[-4:] == ["0", "1", "0", "1"]
    assert second.text.split()[-1] == "0"
