"""The account: what became of every entity of the drawing. Its counts sum to the entities."""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping

from dxfcheck.drawing.primitives import Fate, Sketch
from dxfcheck.reading.reading import AccountLine

__all__ = ["make_account"]

RANK = (
    "link",
    "frame",
    "pin",
    "slide",
    "slot",
    "pitch circle",
    "disc",
    "label",
    "drive note",
    "other linework",
    "note",
    "skipped",
    "unread",
)
"""What a block reference counts as when its parts were read differently: the first of these among them."""
_PLACE = {word: place for place, word in enumerate(RANK)}


def make_account(sketch: Sketch, fates: Mapping[int, Fate]) -> tuple[AccountLine, ...]:
    """One line for each type, layer, role and reason, in the order of first appearance.

    ``fates`` are by index of the primitive; entities whose fate was sealed on loading keep it.
    """
    of_entity: dict[int, Fate] = {}
    for index, primitive in enumerate(sketch.primitives):
        fate = fates[index]
        known = of_entity.get(primitive.source.entity)
        if known is None or _PLACE[fate.read_as] < _PLACE[known.read_as]:
            of_entity[primitive.source.entity] = fate
    counts: Counter[tuple[str, str, str, str]] = Counter()
    for number, entity in enumerate(sketch.entities):
        fate = entity.fate or of_entity.get(number) or Fate("skipped", "nothing in it to read")
        counts[entity.type, entity.layer, fate.read_as, fate.why] += 1
    return tuple(AccountLine(*key, count) for key, count in counts.items())
