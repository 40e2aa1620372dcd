"""Wheels about one pin that the linework or a block shows to be one part (reading rule 6)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass
from typing import NamedTuple

from dxfcheck.drawing.primitives import BlockUse
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.body_pool import BodyPool
from dxfcheck.reading.gears.wheels import Wheel
from dxfcheck.reading.lines.unions import Unions

__all__ = ["Engaged", "Shaft", "make_shafts"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Engaged:
    """The wheels that roll on something, and what is known of them.

    ``partners`` are the wheels each meshes with, ``touched`` the strands on each rim as rim_touches gives them,
    ``held`` the wheels that are the frame's; ``fixed`` the sites on the frame.
    """

    wheels: Sequence[Wheel]
    rolling: Sequence[int]
    partners: Mapping[int, AbstractSet[int]]
    touched: Sequence[Mapping[int, Sequence[int]]]
    held: AbstractSet[int]
    fixed: AbstractSet[int]
    frame_strands: AbstractSet[int]


class Shaft(NamedTuple):
    """Wheels (numbers) about one pin that are one part, the strands on their rims and the bodies that are spokes."""

    wheels: tuple[int, ...]
    site: int | None
    strands: frozenset[int]
    spokes: tuple[int, ...]


def make_shafts(engaged: Engaged, pool: BodyPool) -> list[Shaft]:
    """The rolling wheels as shafts, the smallest wheel of each first."""
    wheels = engaged.wheels
    unions = Unions(len(wheels))
    for one, other in _ties(engaged):
        unions.join(one, other)
    members: defaultdict[int, list[int]] = defaultdict(list)
    for number in sorted(engaged.rolling, key=lambda each: (wheels[each].radius, each)):
        members[unions.of(number)].append(number)
    shafts = []
    for group in members.values():
        site = wheels[group[0]].site
        strands = frozenset(strand for wheel in group for strand in engaged.touched[wheel])
        on_pin = pool.pinned_at(site) if site is not None else []
        spokes = [key for key in on_pin if _is_spoke(pool.parts[key], strands)]
        shafts.append(Shaft(tuple(group), site, strands, tuple(spokes)))
    return shafts


def _is_spoke(body: Body, strands: AbstractSet[int]) -> bool:
    return len(body.pins) == 1 and not strands.isdisjoint(body.strands)


def _ties(engaged: Engaged) -> Iterator[tuple[int, int]]:
    """Wheels about one pin that one strand touches, or that lie in one block reference with nothing about another."""
    by_strand: defaultdict[tuple[int, int], list[int]] = defaultdict(list)
    by_block: defaultdict[tuple[BlockUse, ...], list[int]] = defaultdict(list)
    for number in engaged.rolling:
        wheel = engaged.wheels[number]
        if wheel.site is None:
            continue
        for strand, where in engaged.touched[number].items():
            if where and strand not in engaged.frame_strands:
                by_strand[wheel.site, strand].append(number)
        if wheel.source.blocks:
            by_block[wheel.source.blocks].append(number)
    together = [*by_strand.values()]
    together += [group for group in by_block.values() if len({engaged.wheels[each].site for each in group}) == 1]
    for group in together:
        yield from ((group[0], other) for other in group[1:])
