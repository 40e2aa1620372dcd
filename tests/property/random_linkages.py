"""Linkages at random: a crank and some dyads with pins, slides, telescopes and slots, hung on one another.

A dyad adds as many freedoms as it takes away, so every such linkage has one. Links that further dyads are hung on get
pins of their own for it: they become ternary and more. What is drawn is a plan; what is solved is the model beside it.
"""

from __future__ import annotations

import cmath
import math
import random
from collections.abc import Callable
from typing import Literal

from fixtures.drafting import Slide, Slot, Telescope, on_slot, slot_direction
from tests.property.growing import FIXED, Contact, Growing
from tests.property.linkage_plans import RandomLinkage, finished

__all__ = ["random_linkage"]

CLOSEST_PINS = 50.0
BLOCK_IN_SLOT = 0.3
"""How often a pin in a straight slot sits in a block there."""
TRIES = 12
"""So often another place is tried for a dyad before it is left out."""

Step = Literal[
    "two bars", "slider", "slider on a link", "telescope", "lever", "slotted lever", "bar in a slot", "bar in a link"
]
STEPS: tuple[Step, ...] = (
    "two bars", "slider", "slider on a link", "telescope", "lever", "slotted lever", "bar in a slot", "bar in a link",
)  # fmt: skip


def random_linkage(seed: int, is_good: Callable[[RandomLinkage], bool]) -> RandomLinkage:
    """The first random linkage that is good with every dyad on the way; the same one for the same seed."""
    chance = random.Random(seed)  # noqa: S311 - a repeatable choice, nothing to guard
    while True:
        growing = Growing(chance)
        foot = growing.anywhere()
        growing.fixed.append(foot)
        growing.link("part", foot, growing.near(foot, 55.0, 110.0))
        found = None
        for step in chance.choices(STEPS, k=chance.choice((1, 2, 2, 3, 3))):
            for _ in range(TRIES):
                other = growing.copy()
                if not other.holders():
                    break
                _add(other, step)
                linkage = None if _too_near(list(other.points.values())) else finished(other)
                if linkage is not None and is_good(linkage):
                    growing, found = other, linkage
                    break
        if found is not None:
            return found


def _too_near(places: list[complex]) -> bool:
    return any(
        abs(place - other) < CLOSEST_PINS for number, place in enumerate(places) for other in places[number + 1 :]
    )


def _add(growing: Growing, step: Step) -> None:
    match step:
        case "two bars":
            near, owner = growing.moving_pin()
            far, middle = growing.far_pin(near, owner), growing.near(near)
            growing.link("part", near, middle)
            growing.link("part", middle, far)
        case "slider" | "slider on a link":
            _add_slider(growing, on_a_link=step == "slider on a link")
        case "telescope":
            near, owner = growing.moving_pin()
            _add_telescope(growing, near, growing.far_pin(near, owner))
        case "lever" | "slotted lever":
            _add_lever(growing, slotted=step == "slotted lever")
        case "bar in a slot" | "bar in a link":
            _add_bar_in_slot(growing, on_a_link=step == "bar in a link")


def _add_slider(growing: Growing, *, on_a_link: bool) -> None:
    """A rod from a moving pin to a block, on a guide of the frame or of another link."""
    near, owner = growing.moving_pin()
    end = growing.near(near)
    guides = [number for number, kind in enumerate(growing.kinds) if kind == "part" and number != owner]
    guide = growing.chance.choice(guides) if on_a_link and guides else FIXED
    at = growing.points[end]
    along = growing.direction(at - growing.points[near])
    growing.link("part", near, end)
    block = growing.link("block", end)
    reach = (growing.chance.uniform(30, 70), growing.chance.uniform(30, 70))
    growing.slides.append((Slide(pin=end, along=along, reach=reach), guide))
    growing.contacts.append(Contact(kind="slide", links=(guide, block), at=at, along=along))
    growing.taken.add(end)


def _add_telescope(growing: Growing, rear: str, front: str) -> None:
    way = growing.points[front] - growing.points[rear]
    tubes = growing.link("tube", rear), growing.link("tube", front)
    growing.telescopes.append(Telescope(rear=rear, front=front))
    growing.contacts.append(Contact(kind="slide", links=tubes, at=growing.points[rear] + way / 2, along=way / abs(way)))
    growing.taken |= {rear, front}


def _add_lever(growing: Growing, *, slotted: bool) -> None:
    """A lever whose line or slot a moving pin runs along, with a block or without."""
    pin, owner = growing.moving_pin()
    pivot = growing.far_pin(pin, owner)
    at = growing.points[pin]
    way = at - growing.points[pivot]
    growing.taken.add(pin)
    if slotted:
        lever = growing.link("slotted", pivot)
        _cut_slot(growing, pin, owner, lever, growing.direction(way * cmath.exp(-1j * math.pi / 2)))
        return
    pins = [pivot]
    if growing.chance.random() < 0.6:
        pins.append(growing.pin(at + way / abs(way) * growing.chance.uniform(60, 110)))
    lever, block = growing.link("lever", *pins), growing.link("block", pin)
    reach = (min(40.0, abs(way) / 2), 45.0)
    growing.slides.append((Slide(pin=pin, along=way / abs(way), reach=reach), lever))
    growing.contacts.append(Contact(kind="slide", links=(lever, block), at=at, along=way / abs(way)))


def _add_bar_in_slot(growing: Growing, *, on_a_link: bool) -> None:
    """A bar whose end runs in a slot of the frame or of another link."""
    near, owner = growing.moving_pin()
    end = growing.near(near)
    bar = growing.link("part", near, end)
    busy = {owner, bar, *(guide for _, guide in growing.slides)}
    guides = [number for number, kind in enumerate(growing.kinds) if kind == "part" and number not in busy]
    guide = growing.chance.choice(guides) if on_a_link and guides else FIXED
    if guide != FIXED:
        growing.kinds[guide] = "slotted"
    growing.taken.add(end)
    _cut_slot(growing, end, bar, guide, growing.direction(growing.points[end] - growing.points[near]))


def _cut_slot(growing: Growing, pin: str, link: int, owner: int, along: complex) -> None:
    """A slot, straight or curved, that the pin sits somewhere in the middle of, now and then in a block."""
    at, chance = growing.points[pin], growing.chance
    length, share = chance.uniform(70, 110), chance.uniform(0.35, 0.65)
    bend = chance.choice((0.0, 0.0, chance.uniform(0.1, 0.45), -chance.uniform(0.1, 0.45)))
    block = bend == 0.0 and chance.random() < BLOCK_IN_SLOT
    plain = Slot(pin=pin, first=0j, last=along * length, bend=bend)
    on_line = on_slot(plain, share)
    turned = along / slot_direction(plain, on_line)  # so that its tangent at the pin runs along
    slot = Slot(
        pin=pin,
        first=at + (plain.first - on_line) * turned,
        last=at + (plain.last - on_line) * turned,
        bend=bend,
        block=block,
    )
    growing.slots.append((slot, owner))
    if block:
        ends = (owner, growing.link("block", pin))
        growing.contacts.append(Contact(kind="slide", links=ends, at=at, along=along))
    else:
        growing.contacts.append(Contact(kind="pin in slot", links=(owner, link), at=at, along=along, pin=pin))
