"""What a rule is given to look at: everything the stages before it made of one drawing."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from dxfcheck.requirements.verdict import Judged

if TYPE_CHECKING:  # the rules can be listed and explained without loading any stage
    from dxfcheck.analysis.results import Analysis
    from dxfcheck.drawing.primitives import Sketch
    from dxfcheck.linkage import Linkage
    from dxfcheck.reading.reading import Reading
    from dxfcheck.settings import Settings

__all__ = ["RuleSubject"]


@dataclass(frozen=True, slots=True, kw_only=True)
class RuleSubject:
    """One drawing as the rules see it; ``mechanisms`` are the reading's linkages, each with its analysis.

    ``judged`` says which limits and expectations they keep.
    """

    sketch: Sketch
    reading: Reading
    mechanisms: tuple[tuple[Linkage, Analysis], ...]
    settings: Settings
    judged: Judged = field(default_factory=Judged)
