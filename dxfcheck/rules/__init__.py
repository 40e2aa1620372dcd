"""The rules: what a drafter or a reviewer would want pointed out, one pure function each, one file a family."""

from __future__ import annotations

from dxfcheck.rules.registry import Rule, all_rules, find_rule, rule, run_rules

__all__ = ["Rule", "all_rules", "find_rule", "rule", "run_rules"]
