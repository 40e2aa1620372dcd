"""`dxfcheck explain`: the rules in words; loads none of what reads drawings."""

from __future__ import annotations

import difflib
import sys

from dxfcheck.cli.arguments import Request
from dxfcheck.cli.output import drop_output
from dxfcheck.cli.status import CLEAN
from dxfcheck.errors import OptionInvalid
from dxfcheck.reports.terminal_explain import explain_all_lines, explain_lines
from dxfcheck.reports.terminal_stream import LineStream
from dxfcheck.rules.registry import all_rules, find_rule

__all__ = ["run_explain", "unknown_rule"]


def run_explain(request: Request) -> int:
    """Print one rule, or all; OptionInvalid for a rule that does not exist."""
    stream = LineStream(sys.stdout)
    try:
        if request.rule is None:
            stream.print(explain_all_lines(all_rules(), stream.width))
        else:
            rule = find_rule(request.rule.strip().lower())
            if rule is None:
                raise OptionInvalid(unknown_rule(request.rule))
            stream.print(explain_lines(rule, stream.width))
    except BrokenPipeError:
        drop_output()
    return CLEAN


def unknown_rule(name: str) -> str:
    """What to say of a rule that does not exist, with the nearest one that does."""
    near = difflib.get_close_matches(name.lower(), [rule.name for rule in all_rules()], n=1)
    hint = f"did you mean {near[0]}?" if near else "'dxfcheck explain' lists them"
    return f"there is no rule {name!r}; {hint}"
