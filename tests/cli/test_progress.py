from __future__ import annotations

import io

from dxfcheck.cli.progress import counted


def screen_of(written: str) -> list[str]:
    """What a terminal shows of it: a carriage return goes back to the start of the line, which is then written over."""
    lines = []
    for line in written.split("\n"):
        shown = ""
        for piece in line.split("\r"):
            shown = piece + shown[len(piece) :]
        lines.append(shown.rstrip())
    return lines


def test_each_result_starts_a_line_of_its_own_and_the_count_stays_below() -> None:
    terminal = io.StringIO()
    for name in counted(iter(["a.dxf", "b.dxf"]), 12, terminal):
        assert screen_of(terminal.getvalue())[-1] == ""
        terminal.write(f"{name}: fine\n")
    assert screen_of(terminal.getvalue()) == ["a.dxf: fine", "b.dxf: fine", ""]
    assert "1 of 12 drawings" in terminal.getvalue()


def test_nothing_is_left_where_the_work_breaks_off() -> None:
    terminal = io.StringIO()
    work = counted(iter(["a.dxf", "b.dxf"]), 2, terminal)
    next(work)
    work.close()
    assert screen_of(terminal.getvalue()) == [""]
