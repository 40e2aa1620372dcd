"""Every key a settings file may hold, in one place: the reader, its suggestions and `dxfcheck settings` go by it."""

from __future__ import annotations

from typing import Literal, NamedTuple

from dxfcheck.tolerances.findings import DOUBTFUL_SPEED_RELATIVE, LOW_TRANSMISSION_DEGREES
from dxfcheck.tolerances.linework import COINCIDENCE_OF_DIAGONAL, CONSTRUCTION_LAYERS, FRAME_NAMES, PITCH_LAYERS

__all__ = ["ACCEPT", "ACCEPT_KEYS", "ANY_NAME", "DRAWINGS", "KEYS", "SETTINGS", "AcceptKey", "Key", "Kind"]

ANY_NAME = "*"
"""Stands in a key for a name that the user chooses: of a pin, a link, a rule."""

DRAWINGS = "drawings"
ACCEPT = "accept"
"""The two tables that hold no single settings: tables for some drawings only, and findings that are accepted."""

Kind = Literal[
    "unit", "length", "names", "drives", "whole number", "speed", "ratio", "limit", "angle", "part", "weight"
]


class Key(NamedTuple):
    """One setting: its name with the tables it stands in, what kind of value it has, what it does, and an example.

    ``otherwise`` says what holds where nobody states it.
    """

    name: str
    kind: Kind
    does: str
    example: str
    otherwise: str

    @property
    def table(self) -> str:
        """The table it stands in, '' for the top of the file."""
        return self.name.rpartition(".")[0]

    @property
    def word(self) -> str:
        """The key itself."""
        return self.name.rpartition(".")[2]


SETTINGS = (
    Key(
        "drives",
        "drives",
        "what moves, as --drive states it; at the top of the file",
        '["A-B = 120 rpm cw"]',
        "notes on the sheet, else one is assumed",
    ),
    Key("reading.units", "unit", "the length unit, whatever the drawing's header says", '"mm"', "the drawing's header"),
    Key(
        "reading.tolerance",
        "length",
        "how far apart ends may lie and still meet, in the drawing's unit",
        "0.01",
        f"{COINCIDENCE_OF_DIAGONAL:g} of the sketch's diagonal",
    ),
    Key("reading.frame-pins", "names", "pins that are fixed", '["A", "D"]', "what the drawing shows"),
    Key("reading.part-blocks", "names", "blocks that are one rigid link each (patterns)", '["BAR-*"]', "none"),
    Key(
        "reading.layers.frame",
        "names",
        "layers and blocks that are frame (patterns)",
        '["GROUND*"]',
        ", ".join(FRAME_NAMES),
    ),
    Key(
        "reading.layers.pitch",
        "names",
        "layers of pitch circles and racks (patterns)",
        '["PITCH*"]',
        ", ".join(PITCH_LAYERS),
    ),
    Key(
        "reading.layers.construction",
        "names",
        "layers that hold no parts (patterns)",
        '["DIM*"]',
        ", ".join(CONSTRUCTION_LAYERS),
    ),
    Key("expect.mobility", "whole number", 'the mobility each mechanism ought to have, or "off"', "1", "none"),
    Key(
        "expect.speeds.*",
        "speed",
        'the speed a pin, link, block or telescope ought to have, or "off"',
        '"0.35 m/s ± 2 %"',
        "none",
    ),
    Key("expect.ratios.*", "ratio", 'the ratio of two links\' speeds of turning, or "off"', '"0.5 ± 2 %"', "none"),
    Key("limits.pin-speed", "limit", 'the greatest speed of pins, or "off"', '"2 m/s"', "none"),
    Key(
        "limits.slide-speed", "limit", 'the greatest speed along slides and telescopes, or "off"', '"500 mm/s"', "none"
    ),
    Key("limits.rubbing-speed", "limit", 'the greatest rubbing speed in pins, or "off"', '"0.5 m/s"', "none"),
    Key("limits.link-speed", "limit", 'the greatest speed of turning of links, or "off"', '"300 rpm"', "none"),
    Key(
        "limits.transmission-angle",
        "angle",
        "the least transmission angle, a right one being the best",
        '"45 deg"',
        f"{LOW_TRANSMISSION_DEGREES:g} deg",
    ),
    Key(
        "limits.doubtful-speed",
        "part",
        "how much of a speed the drawing may leave in doubt",
        '"2 %"',
        f"{100 * DOUBTFUL_SPEED_RELATIVE:g} %",
    ),
    Key("rules.*", "weight", "a rule's severity, or that it is not applied", '"off"', "as in 'dxfcheck explain'"),
)
"""In the order in which they are shown. Patterns are globs, without case."""

KEYS = {key.name: key for key in SETTINGS}


class AcceptKey(NamedTuple):
    """One key of an [[accept]] table."""

    word: str
    does: str
    example: str


ACCEPT_KEYS = (
    AcceptKey("rule", "the rule whose finding is accepted", '"near-miss"'),
    AcceptKey("drawing", "the drawing, by its path from the folder of the settings file", '"line 2/tipper.dxf"'),
    AcceptKey("at", "the place of the finding, in the drawing's unit", "[120.5, 40.0]"),
    AcceptKey("handle", "or the handle of one of its entities", '"2F"'),
    AcceptKey("reason", "why it is accepted", '"drawn so on purpose: stop face"'),
    AcceptKey("until", "the last day it holds", "2027-03-31"),
)
