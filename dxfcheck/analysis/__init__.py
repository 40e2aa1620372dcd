"""What a linkage can do at the drawn pose: mobility, loops, freedom, velocities, poles. Home of numpy and networkx."""

from __future__ import annotations

from dxfcheck.analysis.results import Analysis
from dxfcheck.linkage import Linkage

__all__ = ["analyse"]


def analyse(linkage: Linkage, *, bounds_shown: bool = True) -> Analysis:
    """Mobility, loops, drives, velocities and quality of one linkage at the drawn pose.

    ``bounds_shown`` False leaves out what speeds may be off by, unless the drawing is coarse.
    """
    # Imported here because numpy and networkx take 0.3 s, and whoever wants only the results' types must not pay it.
    from dxfcheck.analysis.analysis import analyse as analyse_linkage  # noqa: PLC0415

    return analyse_linkage(linkage, bounds_shown=bounds_shown)
