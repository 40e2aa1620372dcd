from __future__ import annotations

import pytest

from dxfcheck.cli.messages import fault_text, one_line, say
from dxfcheck.reports.terminal_layout import Column, table


def test_a_message_is_one_printable_line(capsys: pytest.CaptureFixture[str]) -> None:
    say("first\nsecond \x1b[2J")
    assert capsys.readouterr().err == "dxfcheck: first second ?[2J\n"
    assert one_line("a  b\tc") == "a b c"


def test_a_fault_says_what_was_being_done_and_where() -> None:
    with pytest.raises(ValueError, match="argument") as caught:
        table([Column("a", "", ["1"]), Column("b", "", ["1", "2"])], 80)
    text = fault_text(caught.value, "tipper.dxf")
    assert text.startswith("tipper.dxf: a fault of dxfcheck itself while writing the report: ValueError: ")
    assert "terminal_layout.py:" in text
    assert "please report this line and the drawing" in text
    assert "\n" not in text


def test_a_fault_from_nowhere_can_be_said_too() -> None:
    assert "while running the command: MemoryError" in fault_text(MemoryError())
