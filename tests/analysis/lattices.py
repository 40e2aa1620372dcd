"""Large linkages for tests and benchmarks, with what is known of them in closed form."""

from __future__ import annotations

import cmath
import math
from collections.abc import Sequence

from dxfcheck.analysis.results import Analysis
from dxfcheck.linkage import Drive, Joint, Link, Linkage, Pin

__all__ = ["ARM", "LEAN", "error_of", "four_bar_chain", "large_linkage", "scissor_lattice"]

ARM = 300.0
LEAN = math.radians(35.0)


def large_linkage(
    places: Sequence[tuple[complex, tuple[int, ...]]],
    links: int,
    *,
    slides: Sequence[tuple[complex, int, int, complex]] = (),
    slots: Sequence[tuple[complex, int, int, complex]] = (),
    drives: Sequence[Drive] = (),
) -> Linkage:
    """A linkage of so many links, the frame among them as link 0, from its pins: place and links, the first one first.

    Slides and slots are place, first link, second link and direction.
    """
    pins_of: list[list[int]] = [[] for _ in range(links)]
    for number, (_, ends) in enumerate(places):
        for link in ends:
            pins_of[link].append(number)
    joints = [
        Joint(kind="pin", first=ends[0], second=link, at=at, pin=number)
        for number, (at, ends) in enumerate(places)
        for link in ends[1:]
    ]
    for kind, sliding in (("slide", slides), ("pin in slot", slots)):
        joints += [
            Joint(kind=kind, first=first, second=second, at=at, direction=along)  # type: ignore[arg-type]
            for at, first, second, along in sliding
        ]
    return Linkage(
        name="M1",
        links=tuple(
            Link(name=f"k{number}", kind="link" if number else "frame", pins=tuple(pins))
            for number, pins in enumerate(pins_of)
        ),
        pins=tuple(
            Pin(name=f"P{number}", at=at, radius=3.0, links=ends, fixed=0 in ends)
            for number, (at, ends) in enumerate(places)
        ),
        joints=tuple(joints),
        drives=tuple(drives),
    )


def scissor_lattice(arms: int, *, driven: int | None = 1, unpinned: Sequence[int] = (), turn: float = 0.0) -> Linkage:
    """Crossing arms of ARM at LEAN, two a cell: links 2c + 1 and 2c + 2 of cell c, and last the foot of the second.

    The first arm stands on a fixed pin, the second on a slide. ``driven`` arm turns at 1 rad/s; ``unpinned`` cells lack
    the pin at their middle; ``turn`` turns the whole, radians.
    """
    cells = arms // 2
    step, turned = cmath.rect(ARM, LEAN), cmath.rect(1.0, turn)
    foot = 2 * cells + 1
    places: list[tuple[complex, tuple[int, ...]]] = [(0j, (0, 1)), (step.real + 0j, (2, foot))]
    for cell in range(cells):
        rising, falling = 2 * cell + 1, 2 * cell + 2
        low, high = cell * step.imag, (cell + 1) * step.imag
        if cell not in unpinned:
            places.append((complex(step.real / 2, (low + high) / 2), (rising, falling)))
        above = cell + 1 < cells
        places.append((complex(0.0, high), (falling, rising + 2) if above else (falling,)))
        places.append((complex(step.real, high), (rising, falling + 2) if above else (rising,)))
    return large_linkage(
        [(at * turned, links) for at, links in places],
        foot + 1,
        slides=[(step.real * turned, 0, foot, turned)],
        drives=[] if driven is None else [Drive(link=driven, against=0, rate=1.0)],
    )


def error_of(model: Linkage, result: Analysis) -> float:
    """Greatest error of an analysis of scissor_lattice (driven at an odd arm, not turned), over the greatest speed.

    With the arms turning at +1 and -1 rad/s, level k is k ARM sin(LEAN) high and rises at k ARM cos(LEAN); the foot
    runs at -ARM sin(LEAN), and so does everything above it, the middles at half of that.
    """
    errors, speeds = [], []
    for pin, motion in zip(model.pins, result.pins, strict=True):
        if motion.velocity is None:
            return math.inf
        expected = complex(-pin.at.real * math.tan(LEAN), pin.at.imag / math.tan(LEAN))
        errors.append(abs(motion.velocity - expected))
        speeds.append(abs(expected))
    for number, link in enumerate(result.links[1:-1], start=1):
        rate = 1.0 if number % 2 else -1.0
        errors.append(ARM * abs(math.inf if link.angular_velocity is None else link.angular_velocity - rate))
    return max(errors) / max(speeds)


def four_bar_chain(bars: int, crank: float = 30.0) -> Linkage:
    """So many four-bars one behind the other, each driven by the rocker of the one before; links 2k + 1 turn on D_k."""
    places: list[tuple[complex, tuple[int, ...]]] = []
    for bar in range(bars):
        x, before, coupler, rocker = 100.0 * bar, 2 * bar + 1, 2 * bar + 2, 2 * bar + 3
        places += [(x + 0j, (0, before)), (complex(x + 5, crank), (before, coupler))]
        places.append((complex(x + 97, 40), (coupler, rocker)))
    places.append((100.0 * bars + 0j, (0, 2 * bars + 1)))
    return large_linkage(places, 2 * bars + 2, drives=[Drive(link=1, against=0, rate=1.0)])
