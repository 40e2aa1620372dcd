from __future__ import annotations

import dataclasses

from dxfcheck.comparison.motion import UNMOVED
from dxfcheck.comparison.pairing import Pairing, pair_parts
from dxfcheck.linkage import Linkage
from tests.examples import STEPHENSON, STEPHENSON_POINTS
from tests.model import linkage

PLAIN = linkage(STEPHENSON_POINTS, STEPHENSON)


def unlabelled(model: Linkage, offset: complex) -> Linkage:
    """The same linkage with every pin elsewhere and no labels."""
    pins = tuple(
        dataclasses.replace(pin, at=pin.at * (1.1 + 0.05j * number) + offset, labelled=False, name=f"P{number}")
        for number, pin in enumerate(model.pins)
    )
    return dataclasses.replace(model, pins=pins)


def identity(model: Linkage) -> Pairing:
    return Pairing(
        links={number: number for number in range(len(model.links))},
        pins={number: number for number in range(len(model.pins))},
    )


def test_pins_at_their_places_give_the_links() -> None:
    pins = range(len(PLAIN.pins))
    assert pair_parts(PLAIN, PLAIN, UNMOVED, 1.0, zip(pins, pins, strict=True)) == identity(PLAIN)


def test_pins_that_moved_are_found_by_the_links_they_join() -> None:
    found = pair_parts(PLAIN, unlabelled(PLAIN, 3 + 1j), UNMOVED, 1.0, [(0, 0), (1, 1)])
    assert dict(found.pins) == dict(identity(PLAIN).pins)
    assert dict(found.links) == dict(identity(PLAIN).links)


def test_labels_tell_pins_that_all_moved() -> None:
    moved = dataclasses.replace(PLAIN, pins=tuple(dataclasses.replace(pin, at=1j * pin.at + 99) for pin in PLAIN.pins))
    assert pair_parts(PLAIN, moved, UNMOVED, 1.0, ()) == identity(PLAIN)
