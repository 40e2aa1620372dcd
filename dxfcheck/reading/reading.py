"""What the reading of a sketch yields: the linkages, the evidence for them, what looked wrong, and the account."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.settings import Requirement

__all__ = ["AccountLine", "Evidence", "Observation", "Reading"]


@dataclass(frozen=True, slots=True)
class AccountLine:
    """So many entities of one type on one layer, what they were read as and why."""

    type: str
    layer: str
    read_as: str
    why: str
    count: int


class Evidence(NamedTuple):
    """Why something was read as it was: the entities and the reading rule (1 to 12 of DEVELOPERS.md) that decided.

    ``subject`` is 'pin', 'link', 'joint', 'frame', 'drive', 'label' ...; ``name`` its name in the report.
    """

    subject: str
    name: str
    rule: int
    why: str
    handles: tuple[str, ...]
    at: Point | None
    mechanism: str | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Observation:
    """Something on the sheet that a rule may turn into a finding.

    ``kind`` names the rule it is for. ``subject`` is what it is about (a link's or pin's name), ``detail`` a phrase;
    ``amount`` is the figure found and ``limit`` what it was held against, both in the drawing's unit unless the rule
    says otherwise. ``severity`` overrides the rule's own where the design gives two. ``snap`` is where what lies at
    ``at`` ought to be moved to, where that can be told. ``case`` names the case of its rule, where the rule has
    several that differ in their words or remedies.
    """

    kind: str
    at: Point | None
    handles: tuple[str, ...] = ()
    layer: str | None = None
    amount: float | None = None
    limit: float | None = None
    subject: str = ""
    detail: str = ""
    mechanism: str | None = None
    severity: Literal["error", "warning", "note"] | None = None
    snap: Point | None = None
    case: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class Reading:
    """A sketch as read. ``tolerance`` is the coincidence tolerance that was used, in the drawing's unit.

    ``requirements`` are the limits and expectations that notes on the sheet state.
    """

    tolerance: float
    linkages: tuple[Linkage, ...]
    evidence: tuple[Evidence, ...]
    observations: tuple[Observation, ...]
    account: tuple[AccountLine, ...]
    requirements: tuple[Requirement, ...] = ()
