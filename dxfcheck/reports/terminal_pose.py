"""The drawn pose in words: freedoms beyond the count, who pushes whom, how far speeds can be trusted."""

from __future__ import annotations

import math
from collections.abc import Iterator

from dxfcheck.analysis.results import Advantage, Analysis, FiniteMotion, SpeedBounds
from dxfcheck.linkage import Linkage
from dxfcheck.reports.terminal_layout import figure, listed
from dxfcheck.tolerances.analysis import RANK_DOUBTFUL
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["finite_words", "push_sentences", "trust_words", "why_they_differ"]

SHOWN = 6
"""At most so many pushes and advantages are put into words; the JSON report has all."""


def finite_words(finite: FiniteMotion, unit: str) -> str:
    """What a small step showed, with its figures."""
    step = f"after a turn of {math.degrees(finite.turn):.2g} deg"
    if finite.verdict == "through":
        return f"it moves through: {step} all joints close again, while these lengths stay exact"
    misfit = f"off by {_rough(finite.misfit)} {unit} (limit {_rough(finite.limit)})"
    if finite.verdict == "locked":
        left_open = f"{step} a joint stays open by {_rough(finite.opening)} {unit}"
        return f"momentary: it locks after the first step; {left_open}, as if a length were {misfit}"
    kept = "1 freedom is" if finite.freedom == 1 else f"{finite.freedom} freedoms are"
    return f"momentary: {step} {kept} left"


def _rough(value: float) -> str:
    """Two digits, without an exponent as far as that reads well."""
    return figure(float(f"{value:.2g}"))


def push_sentences(linkage: Linkage, analysis: Analysis, unit: str) -> Iterator[tuple[str, str]]:
    """Label and text of the transmission angles and of the drive's speed over the outputs'; not of what is locked."""
    names = [link.name for link in linkage.links]
    locked = {link for part in analysis.locked_parts for link in part.links}
    pushes = [each for each in analysis.transmissions if each.pushed not in locked]
    for number, each in enumerate(pushes[:SHOWN]):
        degrees = math.degrees(each.angle)
        angle = f"transmission angle {degrees:.4g} deg"
        if each.square:
            angle += f" (pressure angle {90.0 - degrees:.4g} deg)"
        pin = linkage.pins[each.pin].name
        yield "" if number else "push", f"{names[each.pusher]} pushes {names[each.pushed]} at {pin}: {angle}"
    outputs = [each for each in analysis.advantages if each.link not in locked]
    if outputs:
        ratios = [f"{names[each.link]} {_ratio(linkage, each, unit)}" for each in outputs[:SHOWN]]
        yield "advantage", f"drive speed over output speed: {listed(ratios)}"


def _ratio(linkage: Linkage, each: Advantage, unit: str) -> str:
    """The figure, with its unit where the one turns and the other slides."""
    if each.ratio is None:
        return "no limit"
    drive_turns = linkage.drives[0].kind == "turn"
    if drive_turns == each.turns:
        return figure(each.ratio)
    return f"{figure(each.ratio)} {f'rad/{unit}' if drive_turns else f'{unit}/rad'}"


def why_they_differ(linkage: Linkage, analysis: Analysis) -> str:
    """What makes the two ways of solving differ more than rounding in the computer does."""
    if analysis.mobility.redundant:
        return "so much because a constraint repeats others only within the drawing's rounding, and each weighs it"
    near = [*analysis.dead_centres, *analysis.near_dead_centres]
    if near:
        pin = linkage.pins[min(near, key=lambda each: each.angle).pin].name
        return f"so much because the pose stands near a dead centre, at {pin}: the last digits are lost"
    if analysis.rank_gap is not None and analysis.rank_gap[0] < RANK_DOUBTFUL:
        smallest = f"smallest singular value {analysis.rank_gap[0]:.1g} of the greatest"
        return f"so much because constraints nearly repeat one another ({smallest}): the last digits are lost"
    return "so much for no reason that is known: do not rely on these speeds, and report the drawing"


def trust_words(linkage: Linkage, analysis: Analysis, bounds: SpeedBounds, unit: str) -> str:
    """What the speeds may be off by, for the link that is off by the greatest part of itself."""
    turns = [abs(motion.angular_velocity or 0.0) for motion in analysis.links]
    speeds = [abs(motion.velocity or 0.0) for motion in analysis.pins]
    parts = [
        (off / value, name)
        for values, offs, names in (
            (turns, bounds.links, [link.name for link in linkage.links]),
            (speeds, bounds.pins, [pin.name for pin in linkage.pins]),
        )
        for value, off, name in zip(values, offs, names, strict=True)
        if value > SHOWN_AS_ZERO * max(values)
    ]
    if not parts:
        return ""
    part, name = max(parts)
    if part < SHOWN_AS_ZERO:
        return "no rounding of places was found that reaches the digits shown"
    within = f"every coordinate within {_rough(bounds.resolution)} {unit}"
    return f"{within}: speeds within {100.0 * part:.2g} % ({name} at worst)"
