"""The list of rules: each is entered by a decorator that holds its name, its weight and the words that explain it.

Importing this module, or any module of rules, loads neither ezdxf nor networkx nor numpy, so that
``dxfcheck explain`` answers at once.
"""

from __future__ import annotations

import importlib
import pkgutil
from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from typing import Literal

from dxfcheck.rules.finding import SEVERITIES, Finding, Severity
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import RuleWeight

__all__ = ["FAMILIES", "Check", "Family", "Rule", "all_rules", "find_rule", "in_order", "rule", "run_rules"]

Family = Literal["exchange", "linework", "dimensions", "structure", "pose", "limits", "settings"]
FAMILIES: tuple[Family, ...] = ("exchange", "linework", "dimensions", "structure", "pose", "limits", "settings")
"""In the order in which a drawing is worked through, from the file to the limits it is held against; at the end what is
wrong with the settings themselves."""

COMMON_PRACTICE = "common practice, no source"

Check = Callable[[RuleSubject], Iterator[Finding]]


@dataclass(frozen=True, slots=True, kw_only=True)
class Rule:
    """One rule and the words that explain it.

    ``severity`` is what its findings weigh as a rule, ``also`` what they weigh in the cases that ``looks_for`` names.
    ``matters`` says what goes wrong if nobody mends it, ``remedy`` how to mend it. ``settings`` names the settings that
    change what it finds, '' where there are none besides those of every rule; ``source`` where its limit comes from.
    """

    name: str
    severity: Severity
    family: Family
    title: str
    looks_for: str
    matters: str
    remedy: str
    check: Check
    also: tuple[Severity, ...] = ()
    settings: str = ""
    source: str = COMMON_PRACTICE


_entered: dict[str, Rule] = {}


def rule(  # noqa: PLR0913 - a rule is entered whole, in one place
    name: str,
    severity: Severity,
    title: str,
    *,
    family: Family,
    looks_for: str,
    matters: str,
    remedy: str,
    also: tuple[Severity, ...] = (),
    settings: str = "",
    source: str = COMMON_PRACTICE,
) -> Callable[[Check], Check]:
    """Enter the decorated function as the rule of that name; ValueError where the name is taken.

    The function is pure: it takes a RuleSubject and yields findings of its own name.
    """

    def enter(check: Check) -> Check:
        if name in _entered:
            msg = f"two rules are named {name!r}"
            raise ValueError(msg)
        _entered[name] = Rule(
            name=name,
            severity=severity,
            family=family,
            title=title,
            looks_for=looks_for,
            matters=matters,
            remedy=remedy,
            check=check,
            also=also,
            settings=settings,
            source=source,
        )
        return check

    return enter


def all_rules() -> tuple[Rule, ...]:
    """Every rule of the package, by family, then in the order of entry."""
    _load_families()
    return tuple(sorted(_entered.values(), key=lambda entered: FAMILIES.index(entered.family)))


def find_rule(name: str) -> Rule | None:
    """The rule of that name, None where there is none."""
    _load_families()
    return _entered.get(name)


def run_rules(subject: RuleSubject) -> tuple[Finding, ...]:
    """What all rules find, the gravest first, then by rule, then from left to right and upwards on the sheet.

    Rules that the settings switch off are not applied; where they state another weight all findings of a rule have it.
    """
    weights = dict(subject.settings.rule_weights)
    applied = all_rules()
    if weights:
        applied = tuple(entered for entered in applied if weights.get(entered.name) != "off")
    found = [finding for entered in applied for finding in entered.check(subject)]
    if weights:
        found = [_weighed(finding, weights) for finding in found]
    return in_order(found)


def in_order(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Findings the gravest first, then by rule, then from left to right and upwards on the sheet."""
    return tuple(sorted(findings, key=_rank))


def _weighed(finding: Finding, weights: Mapping[str, RuleWeight]) -> Finding:
    weight = weights.get(finding.rule, "off")
    return finding if weight == "off" else replace(finding, severity=weight)


def _rank(finding: Finding) -> tuple[int, str, bool, float, float, str]:
    """Sort key of a finding; what has no place on the sheet comes after what has."""
    at = finding.at
    x, y = (0.0, 0.0) if at is None else (at.real, at.imag)
    return SEVERITIES.index(finding.severity), finding.rule, at is None, x, y, finding.message


def _load_families() -> None:
    """Import every module of this package once, so that its rules are entered."""
    if _families_loaded:
        return
    package = importlib.import_module("dxfcheck.rules")
    for module in pkgutil.iter_modules(package.__path__, "dxfcheck.rules."):
        importlib.import_module(module.name)
    _families_loaded.append(True)


_families_loaded: list[bool] = []
