"""A random linkage as it grows, and the model of it that is solved, which knows nothing of how it is drawn."""

from __future__ import annotations

import cmath
import math
import random
from dataclasses import dataclass, field
from string import ascii_uppercase
from typing import Literal

from fixtures.drafting import Slide, Slot, Telescope

__all__ = ["FIXED", "Contact", "Growing", "LinkKind", "Model"]

FIXED = -1
"""The frame, where a contact names its links."""
SHEET = 700.0
MOST_PINS_OF_A_LINK = 4
FLATTEST = math.radians(20)
"""The smallest angle between a link and the guide or slot at its end."""
LinkKind = Literal["part", "lever", "slotted", "block", "tube"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Contact:
    """A slide or a pin in a slot between two links (indices or FIXED), its place and its direction.

    The second link of a pin in a slot has the ``pin``.
    """

    kind: Literal["slide", "pin in slot"]
    links: tuple[int, int]
    at: complex
    along: complex
    pin: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class Model:
    """Pins of each moving link, pins on the frame, contacts, and the drive.

    ``driven`` is the contact that is driven, ``rate`` its second link's speed against the first; where it is None, link
    0 turns at so many rad/s.
    """

    points: dict[str, complex]
    links: tuple[tuple[str, ...], ...]
    fixed: frozenset[str]
    contacts: tuple[Contact, ...]
    rate: float
    driven: int | None = None


@dataclass(slots=True)
class Growing:
    """A linkage while dyads are added; a link's kind says what draws it.

    ``taken`` are pins that have a block, a slot or a telescope already.
    """

    chance: random.Random
    points: dict[str, complex] = field(default_factory=dict)
    fixed: list[str] = field(default_factory=list)
    links: list[list[str]] = field(default_factory=list)
    kinds: list[LinkKind] = field(default_factory=list)
    contacts: list[Contact] = field(default_factory=list)
    slides: list[tuple[Slide, int]] = field(default_factory=list)
    slots: list[tuple[Slot, int]] = field(default_factory=list)
    telescopes: list[Telescope] = field(default_factory=list)
    taken: set[str] = field(default_factory=set)

    def copy(self) -> Growing:
        """The same linkage, to go on with by another way."""
        return Growing(
            self.chance,
            dict(self.points),
            list(self.fixed),
            [list(pins) for pins in self.links],
            list(self.kinds),
            list(self.contacts),
            list(self.slides),
            list(self.slots),
            list(self.telescopes),
            set(self.taken),
        )

    def pin(self, at: complex) -> str:
        name = ascii_uppercase[len(self.points)]
        self.points[name] = at
        return name

    def anywhere(self) -> str:
        return self.pin(complex(self.chance.uniform(0, SHEET), self.chance.uniform(0, SHEET)))

    def near(self, name: str, least: float = 60.0, most: float = 220.0) -> str:
        way = cmath.rect(self.chance.uniform(least, most), self.chance.uniform(-math.pi, math.pi))
        return self.pin(self.points[name] + way)

    def link(self, kind: LinkKind, *pins: str) -> int:
        self.links.append(list(pins))
        self.kinds.append(kind)
        return len(self.links) - 1

    def free_pins(self, link: int) -> list[str]:
        """The pins of a link that a dyad can be hung on as they are."""
        return [name for name in self.links[link] if name not in self.fixed and name not in self.taken]

    def is_roomy(self, link: int) -> bool:
        """Whether a link can get another pin."""
        return self.kinds[link] == "part" and len(self.links[link]) < MOST_PINS_OF_A_LINK

    def holders(self, but: int | None = None) -> list[int]:
        """The links that a dyad can be hung on."""
        return [
            link
            for link, kind in enumerate(self.kinds)
            if link != but and (self.is_roomy(link) or (kind == "lever" and self.free_pins(link)))
        ]

    def moving_pin(self, but: int | None = None) -> tuple[str, int]:
        """A pin of a moving link that is not on the frame, old or new, and the link; IndexError if there is none."""
        owner = self.chance.choice(self.holders(but))
        old, roomy = self.free_pins(owner), self.is_roomy(owner)
        if old and (not roomy or self.chance.random() < 0.4):
            return self.chance.choice(old), owner
        name = self.near(self.links[owner][0])
        self.links[owner].append(name)
        return name, owner

    def far_pin(self, near: str, but: int) -> str:
        """Where a dyad's other end is held: mostly a new pin on the frame."""
        if self.holders(but) and self.chance.random() < 0.25:
            far = self.moving_pin(but)[0]
            if far != near:
                return far
        name = self.anywhere()
        self.fixed.append(name)
        return name

    def direction(self, clear_of: complex) -> complex:
        """A unit vector at an angle to another."""
        way = clear_of / abs(clear_of)
        return way * cmath.exp(1j * self.chance.uniform(FLATTEST, math.pi - FLATTEST))
