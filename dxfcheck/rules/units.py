"""The rule on the length unit: what the header says against what else the sheet says."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import finding, observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import UNITS
from dxfcheck.rules.subject import RuleSubject

__all__: list[str] = []


@rule(
    "units-doubtful",
    "warning",
    "A length unit that the sheet contradicts",
    family="exchange",
    looks_for="A drawing whose length unit disagrees with a note ('ALL DIMENSIONS IN mm'), with the unit that "
    "dimensions show, with dimension texts or stated lengths that fit in another unit (25.4: inches and millimetres), "
    "or with any plausible size: a longest link below 1 mm or above 100 m. $MEASUREMENT counts only where a drive's "
    "unit says the same, and neither where the sheet names its unit.",
    matters="All lengths and speeds are off by the factor between the two units.",
    remedy="Set the drawing's unit ($INSUNITS) to what is meant, or state it with --units; else correct the note.",
    settings=UNITS,
    source="the inch is 25.4 mm (agreement of 1959); common practice, no source for plausible sizes",
)
def units_doubtful(subject: RuleSubject) -> Iterator[Finding]:
    """What speaks against the stated unit."""
    for seen in observed(subject, "units-doubtful"):
        remedy = (
            f"set the drawing's unit ($INSUNITS) to {seen.subject} or state --units {seen.subject}, if that is meant; "
            "else correct the sheet"
            if seen.subject
            else "set the drawing's unit ($INSUNITS), or state it with --units"
        )
        yield finding(seen, "warning", seen.detail, remedy)
