"""What the JSON report says of the drawn pose: pushes, advantages, finite steps, and how far figures can be trusted."""

from __future__ import annotations

import math
from typing import Any, Literal

from dxfcheck.analysis.results import Analysis, SpeedBounds
from dxfcheck.linkage import Linkage

__all__ = ["off_by", "pose_items"]


def pose_items(linkage: Linkage, analysis: Analysis) -> dict[str, Any]:
    """The keys of one mechanism that tell of its pose; angles in degrees, what was not worked out is null."""
    names = [link.name for link in linkage.links]
    return {
        "transmissions": [
            {
                "pin": linkage.pins[each.pin].name,
                "pusher": names[each.pusher],
                "pushed": names[each.pushed],
                "angle": math.degrees(each.angle),
                "pressure_angle": 90.0 - math.degrees(each.angle) if each.square else None,
            }
            for each in analysis.transmissions
        ],
        "advantages": [
            {"link": names[each.link], "kind": "turn" if each.turns else "slide", "ratio": each.ratio}
            for each in analysis.advantages
        ],
        "finite_motion": _finite(analysis),
        "locked_parts": [
            {
                "links": [names[link] for link in part.links],
                "with_frame": part.with_frame,
                "redundant": part.redundant,
                "links_to_go": [names[link] for link in part.links_to_go],
            }
            for part in analysis.locked_parts
        ],
        "idle_links": [
            {"link": names[idle.link], "freedoms": idle.freedoms, "turns": idle.turns} for idle in analysis.idle_links
        ],
        "settling_drives": [
            {
                "link": names[drive.link],
                "against": names[drive.against],
                "kind": "turn" if drive.joint is None else "slide",
            }
            for drive in analysis.settling_drives
        ],
        "resolution": None if analysis.bounds is None else analysis.bounds.resolution,
    }


def _finite(analysis: Analysis) -> dict[str, Any] | None:
    finite = analysis.finite
    if finite is None:
        return None
    return {
        "verdict": finite.verdict,
        "turn": math.degrees(finite.turn),
        "opening": finite.opening,
        "misfit": finite.misfit,
        "limit": finite.limit,
        "freedom": finite.freedom,
    }


def off_by(bounds: SpeedBounds | None, what: Literal["links", "pins", "turns", "slides"], number: int) -> float | None:
    """What a speed may be off by, None where it was not worked out."""
    if bounds is None:
        return None
    of = {"links": bounds.links, "pins": bounds.pins, "turns": bounds.turns, "slides": bounds.slides}
    return of[what][number]
