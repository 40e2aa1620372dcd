"""The rules on the terminal: what each looks for, why it matters, how to mend it."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import groupby

from dxfcheck.reports.terminal_layout import Line, fold
from dxfcheck.rules.registry import Rule

__all__ = ["explain_all_lines", "explain_lines"]

LABEL = "  {:<11}"
INDENT = " " * 13


def explain_lines(rule: Rule, width: int) -> list[Line]:
    """One rule in full."""
    lines = [Line(f"{rule.name}: {rule.title}", "bold", len(rule.name))]
    facts = (
        ("severity", _severities(rule)),
        ("family", rule.family),
        ("looks for", rule.looks_for),
        ("matters", rule.matters),
        ("to mend", rule.remedy),
        ("settings", _settings(rule)),
        ("source", rule.source),
    )
    for label, text in facts:
        lines += map(Line, fold(text, width, LABEL.format(label), INDENT))
    return lines


def explain_all_lines(rules: Sequence[Rule], width: int) -> list[Line]:
    """A line for each rule, under its family."""
    longest = max((len(rule.name) for rule in rules), default=0)
    heaviest = max((len(_severities(rule)) for rule in rules), default=0)
    lines: list[Line] = []
    for family, members in groupby(rules, key=lambda rule: rule.family):
        lines += [Line("")] if lines else []
        lines.append(Line(family, "bold"))
        for rule in members:
            lead = f"  {rule.name:<{longest}}  {_severities(rule):<{heaviest}}  "
            lines += map(Line, fold(rule.title, width, lead, " " * len(lead)))
    return lines


def _severities(rule: Rule) -> str:
    """'error, warning': as a rule, and in special cases."""
    return ", ".join((rule.severity, *rule.also))


def _settings(rule: Rule) -> str:
    """The settings that change what a rule finds, and the one that every rule has."""
    own = f"rules.{rule.name} (its severity, or off)"
    return f"{rule.settings}; {own}" if rule.settings else own
