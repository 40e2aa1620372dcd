"""Linkages with slides, named as the reading names them, and the drives that texts and options give them."""

from __future__ import annotations

import cmath
from collections.abc import Mapping, Sequence
from dataclasses import replace

from dxfcheck.drawing.primitives import LengthUnit, Source, Text
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.drives.drives import Driven, drive_linkages
from dxfcheck.settings import Settings
from tests.model import Other, linkage

MM = LengthUnit("mm", "header", 1e-3)
SOURCE = Source(0, "1", "0", "CONTINUOUS", ())
HEIGHT = 2.0
REACH = 8 * HEIGHT
"""How far a note of that height speaks without a name."""


def named(
    points: Mapping[str, complex],
    pins: Mapping[str, str],
    others: Sequence[Other],
    *,
    tracing: Mapping[str, str] | None = None,
) -> Linkage:
    """Links are called by their pins; those called 'block...' in ``pins`` are blocks, 'wheel...' a wheel.

    The slides' directions point to +x, as they do in all that is read.
    """
    turned = [(kind, at, first, second, _directed(along)) for kind, at, first, second, along in others]
    model = linkage(points, pins, others=turned, tracing=tracing)
    links = []
    for link in model.links:
        own = "-".join(sorted(model.pins[pin].name for pin in link.pins))
        if link.kind == "frame":
            links.append(replace(link, name="frame"))
        elif link.name.startswith("block"):
            links.append(replace(link, name=f"block at {own}" if len(link.pins) == 1 else own, kind="block"))
        elif link.name.startswith("wheel"):
            links.append(replace(link, name=f"wheel at {own}"))
        else:
            links.append(replace(link, name=own))
    return replace(model, links=tuple(links))


def _directed(along: complex) -> complex:
    return along if along.real > 0 or (along.real == 0 and along.imag > 0) else -along


DIBBER_POINTS = {"O": 0j, "B": 30 + 40j, "C": 150 + 10j}


def dibber(direction: complex = 1 + 0j) -> Linkage:
    """Slider-crank of the dibber: crank B-O, rod B-C, block at C on a guide of the frame."""
    pins = {"O": "ground crank", "B": "crank rod", "C": "rod block"}
    return named(DIBBER_POINTS, pins, [("slide", DIBBER_POINTS["C"], "ground", "block", direction)])


SHUTTLE_POINTS = {"O": 0j, "B": 30 + 40j, "P": -10 - 60j, "Q": 60 + 120j}


def shuttle() -> Linkage:
    """Slotted lever of the seed shuttle: crank B-O, block at B on the lever P-Q."""
    pins = {"O": "ground crank", "B": "crank block", "P": "ground lever"}
    along = SHUTTLE_POINTS["Q"] - SHUTTLE_POINTS["P"]
    slides: list[Other] = [("slide", SHUTTLE_POINTS["B"], "lever", "block", along)]
    return named(SHUTTLE_POINTS, pins, slides, tracing={"Q": "lever"})


def hoist(tip: complex = 60 + 80j, foot: complex = 90 + 0j) -> Linkage:
    """Lift arm A-C raised by a telescope with its barrel on the frame pin D and its rod at C."""
    points = {"A": 0j, "C": tip, "D": foot}
    pins = {"A": "ground arm", "C": "arm rod", "D": "ground barrel"}
    return named(points, pins, [("slide", (tip + foot) / 2, "barrel", "rod", tip - foot)])


LEG, REAR, FORE, LEAN = 100.0, 60.0, 40.0, 0.6
"""Lift table: length of half a leg, arms of the telescope's two pins from the crossing, lean of the legs (radians)."""


def lift_table(turned: complex = 1 + 0j) -> Linkage:
    """Scissor lift table, a telescope E-F between its two legs: leg A-C on the frame, leg P-Q on a block at P."""
    along = cmath.exp(1j * LEAN)
    back = -along.conjugate()
    points = {
        "A": -LEG * along,
        "C": LEG * along,
        "M": 0j,
        "P": -LEG * back,
        "Q": LEG * back,
        "E": -REAR * along,
        "F": FORE * back,
    }
    points = {name: at * turned for name, at in points.items()}
    pins = {"A": "ground leg", "M": "leg cross", "P": "cross block", "E": "leg barrel", "F": "cross rod"}
    slides: list[Other] = [
        ("slide", points["P"], "ground", "block", turned),
        ("slide", (points["E"] + points["F"]) / 2, "barrel", "rod", points["F"] - points["E"]),
    ]
    return named(points, pins, slides, tracing={"C": "leg", "Q": "cross"})


def carriage() -> Linkage:
    """A carriage P-Q that slides on the frame, and a block at C that slides on the carriage."""
    points = {"P": 0j, "Q": 100 + 0j, "C": 40 + 0j}
    slides: list[Other] = [("slide", 50 + 0j, "ground", "ram", 1 + 0j), ("slide", 40 + 0j, "ram", "block", 1 + 0j)]
    return named(points, {}, slides, tracing={"P": "ram", "Q": "ram", "C": "block"})


def note(content: str, at: complex = 0j, height: float = HEIGHT) -> Text:
    """A text of no width."""
    return Text(SOURCE, content, at, height, ())


def drive(
    *linkages: Linkage,
    notes: Sequence[Text] = (),
    options: Sequence[str] = (),
    shapes: Mapping[str, Sequence[tuple[complex, complex]]] | None = None,
    unit: LengthUnit = MM,
) -> Driven:
    """What drives the linkages; ``shapes`` are the pieces that links of these names are drawn with."""
    drawn = [[(shapes or {}).get(link.name, ()) for link in each.links] for each in linkages]
    handles = [f"note {number}" for number in range(len(notes))]
    return drive_linkages(linkages, drawn, notes, handles, Settings(drives=tuple(options)), unit)


Told = tuple[str, str, float, str]
"""Link, what it runs against, rate, kind."""


def told(driven: Driven) -> list[Told]:
    """All drives by the names of their links."""
    return [_told(each, one) for each in driven.linkages for one in each.drives]


def _told(model: Linkage, one: Drive) -> Told:
    return model.links[one.link].name, model.links[one.against].name, one.rate, one.kind


def unknown(driven: Driven) -> str:
    """Why the one unknown drive is none."""
    (seen,) = [each for each in driven.observations if each.kind == "unknown-drive"]
    return seen.detail
