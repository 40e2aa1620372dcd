"""Whose a pitch circle is: the frame's, a link's pinned at its centre, or a link of its own (reading rule 6).

Glossary
    shaft       wheels about one pin that the linework or a block shows to be one part
    arm         a link pinned at both centres of a mesh; it owns neither wheel
    spoke       linework that touches a wheel's rim and has no pin but the wheel's; it belongs to the wheel
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from itertools import takewhile
from typing import Literal, NamedTuple

from dxfcheck.drawing.primitives import BlockUse, Source
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.body_pool import BodyPool
from dxfcheck.reading.gears.shafts import Engaged, Shaft, make_shafts
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.contact import Oddity

__all__ = ["find_owners"]


class _Settled(NamedTuple):
    """A shaft, the key of its owner and whether something drawn told so."""

    shaft: Shaft
    owner: int
    told: bool


def find_owners(engaged: Engaged, sheet: Sheet, pool: BodyPool) -> tuple[dict[int, int], list[Oddity]]:
    """The key of the body that owns each rolling wheel; the pool's bodies are given their wheels and spokes.

    What the drawing tells comes first; then pins that move, then those on the frame with the fewest links.
    """
    shafts = make_shafts(engaged, pool)
    owners = _Owners(engaged, shafts, sheet, pool)
    waiting: list[Shaft] = []
    for shaft in shafts:
        owner = owners.told(shaft)
        if owner is None:
            waiting.append(shaft)
        else:
            owners.settle(shaft, owner, told=True)
    for shaft in sorted(waiting, key=owners.rank):
        owners.choose(shaft)
    return owners.of_wheel, owners.oddities


def _shared(source: Source, strand: Strand) -> tuple[BlockUse, ...]:
    """The block references, from outermost, that a wheel and a strand lie in together."""
    pairs = zip(source.blocks, strand.primitive.source.blocks, strict=False)
    return tuple(one for one, _ in takewhile(lambda pair: pair[0] == pair[1], pairs))


class _Owners:
    """Owners as they are settled, one shaft after another."""

    def __init__(self, engaged: Engaged, shafts: Sequence[Shaft], sheet: Sheet, pool: BodyPool) -> None:
        self.of_wheel: dict[int, int] = {}
        self.oddities: list[Oddity] = []
        self._engaged = engaged
        self._sheet = sheet
        self._pool = pool
        self._at_site: defaultdict[int | None, list[_Settled]] = defaultdict(list)
        self._sites_in: defaultdict[tuple[BlockUse, ...], set[int | None]] = defaultdict(set)
        for wheel in engaged.rolling:
            blocks = engaged.wheels[wheel].source.blocks
            for depth in range(1, len(blocks) + 1):
                self._sites_in[blocks[:depth]].add(engaged.wheels[wheel].site)
        self._shaft_of = {wheel: number for number, shaft in enumerate(shafts) for wheel in shaft.wheels}

    def rank(self, shaft: Shaft) -> tuple[bool, int, int, float]:
        """In which order shafts that nothing drawn tells about are settled."""
        site = -1 if shaft.site is None else shaft.site
        links = len(self._pool.pinned_at(site))
        return site in self._engaged.fixed, links, site, self._engaged.wheels[shaft.wheels[0]].radius

    def told(self, shaft: Shaft) -> int | None:
        """The owner that something drawn tells: the frame, a link drawn on the rim or in the same block reference."""
        if not self._engaged.held.isdisjoint(shaft.wheels):
            return self._pool.frame
        candidates = self._candidates(shaft)
        touching = [key for key in candidates if not shaft.strands.isdisjoint(self._pool.parts[key].strands)]
        touching += self._attached(shaft)
        if not touching:
            touching = self._in_same_block(shaft, candidates)
        if len(touching) == 1:
            return touching[0]
        return self._own(shaft) if shaft.spokes and not candidates and not touching else None

    def settle(self, shaft: Shaft, owner: int, *, told: bool) -> None:
        """Give a shaft to a body, with its spokes and whatever stroke ties its wheels together."""
        pool, wheels = self._pool, self._engaged.wheels
        strokes = [each for each in shaft.strands if each not in pool.body_of and self._is_stroke(shaft, each)]
        rings = [ring for wheel in shaft.wheels for ring in wheels[wheel].rings]
        pool.give(owner, strands=strokes, pins=() if shaft.site is None else (shaft.site,), wheels=rings)
        for spoke in shaft.spokes:
            if spoke != owner and spoke in pool.parts:
                pool.join(owner, spoke)
        self.of_wheel.update(dict.fromkeys(shaft.wheels, owner))
        self._at_site[shaft.site].append(_Settled(shaft, owner, told))

    def choose(self, shaft: Shaft) -> None:
        """Settle a shaft by the links on its pin."""
        others = list(self._at_site[shaft.site])
        candidates = self._candidates(shaft)
        free = [key for key in candidates if key not in {other.owner for other in others}]
        if len(free) == 1:
            if shaft.spokes:
                self._doubt(shaft, "has spokes, and a link is pinned at its centre; read as one with that link")
            if any(not other.told for other in others):
                self._share(shaft, others, "read as separate links")
            self.settle(shaft, free[0], told=False)
            return
        if free:
            how_many = f"could belong to any of {len(free)} links pinned at its centre"
            self._doubt(shaft, f"{how_many}; read as a link of its own")
            self.settle(shaft, self._own(shaft), told=False)
            return
        clashing = {other.owner for other in others if self._clash(shaft, other.shaft)}
        joinable = [other.owner for other in others if other.owner not in {*clashing, self._pool.frame}]
        if joinable:
            self._share(shaft, others, "read as one link")
        elif any(other.owner in candidates and not other.told for other in others):
            self._doubt(shaft, "could belong to the link that a smaller one about the same pin was given to")
        elif not others and not candidates and self._pushed(shaft):
            self._doubt(shaft, "is read as free to turn on the link pinned at its centre", "note")
        self.settle(shaft, joinable[0] if joinable else self._own(shaft), told=False)

    def _own(self, shaft: Shaft) -> int:
        pins = () if shaft.site is None else (shaft.site,)
        return self._pool.add(Body(strands=(), pins=pins, frame=False))

    def _candidates(self, shaft: Shaft) -> list[int]:
        """The links pinned at a shaft's centre that could own it: no arms, no blocks, no spokes."""
        if shaft.site is None:
            return []
        wheels, partners = self._engaged.wheels, self._engaged.partners
        meshing = {partner for wheel in shaft.wheels for partner in partners.get(wheel, ())}
        far = {wheels[partner].site for partner in meshing}
        found = [
            key
            for key in self._pool.pinned_at(shaft.site)
            if key in self._pool.given
            and key not in shaft.spokes
            and not self._pool.parts[key].block
            and far.isdisjoint(self._pool.parts[key].pins)
        ]
        return [] if found == self._pushed(shaft) else found

    def _pushed(self, shaft: Shaft) -> list[int]:
        """The one link that pushes a wheel along a line, if it is that: it is pinned to the wheel, not part of it."""
        site = shaft.site
        if (
            site is None
            or site in self._engaged.fixed
            or any(self._engaged.partners.get(each) for each in shaft.wheels)
        ):
            return []
        parts = self._pool.parts
        links = [key for key in self._pool.pinned_at(site) if key not in shaft.spokes and not parts[key].block]
        return links if len(links) == 1 and not self._lies_on(shaft, links[0]) else []

    def _lies_on(self, shaft: Shaft, key: int) -> bool:
        """Whether a link is drawn on a wheel: it touches its rim, or all its pins lie within it.

        The rod that pushes a wheel along a track has another pin outside; the wheel is free to turn on it.
        """
        body, wheel = self._pool.parts[key], self._engaged.wheels[shaft.wheels[-1]]
        reach = self._sheet.tolerance.rim(wheel.radius) + wheel.radius
        inside = all(abs(self._sheet.pins[pin].at - wheel.at) <= reach for pin in body.pins)
        return inside or not shaft.strands.isdisjoint(body.strands)

    def _attached(self, shaft: Shaft) -> list[int]:
        """Links not pinned at the centre that end on the rim: levers drawn from there."""
        on_rim = {
            strand
            for wheel in shaft.wheels
            for strand, ends in self._engaged.touched[wheel].items()
            if any(end >= 0 for end in ends) and strand not in self._engaged.frame_strands
        }
        found = {self._pool.body_of[strand] for strand in on_rim if strand in self._pool.body_of}
        parts = self._pool.parts
        return [key for key in sorted(found) if parts[key].pins and shaft.site not in parts[key].pins]

    def _in_same_block(self, shaft: Shaft, candidates: Sequence[int]) -> list[int]:
        """The links that share most of the block references round a wheel, if any.

        A reference that holds wheels about other pins as well is the whole machine: it tells nothing.
        """
        shared: defaultdict[int, list[int]] = defaultdict(list)
        sources = [self._engaged.wheels[wheel].source for wheel in shaft.wheels]
        for key in candidates:
            strands = [self._sheet.strands[strand] for strand in self._pool.parts[key].strands]
            common = [_shared(source, strand) for source in sources if source.blocks for strand in strands]
            own = [len(path) for path in common if self._sites_in[path] == {shaft.site}]
            shared[max(own, default=0)].append(key)
        deepest = max(shared, default=0)
        return shared[deepest] if deepest else []

    def _is_stroke(self, shaft: Shaft, strand: int) -> bool:
        """Whether a strand that no body owns ties the wheels of a shaft together."""
        return sum(bool(self._engaged.touched[wheel].get(strand)) for wheel in shaft.wheels) > 1

    def _clash(self, one: Shaft, other: Shaft) -> bool:
        """Whether two shafts about one pin mesh with wheels of one part: they would lock it if they were one."""
        return not self._parts_met(one).isdisjoint(self._parts_met(other))

    def _parts_met(self, shaft: Shaft) -> set[tuple[str, int]]:
        partners = {partner for wheel in shaft.wheels for partner in self._engaged.partners.get(wheel, ())}
        settled = {("body", self.of_wheel[partner]) for partner in partners if partner in self.of_wheel}
        return settled | {("shaft", self._shaft_of[partner]) for partner in partners}

    def _doubt(self, shaft: Shaft, what: str, severity: Literal["warning", "note"] = "warning") -> None:
        radii = " and ".join(f"{self._engaged.wheels[wheel].radius:g}" for wheel in shaft.wheels)
        self._note("wheel-owner", [shaft], f"the pitch circle of radius {radii} {what}", severity)

    def _share(self, shaft: Shaft, others: Sequence[_Settled], read_as: str) -> None:
        untold = [other.shaft for other in others if not other.told] or [other.shaft for other in others]
        shafts = [*untold, shaft]
        radii = " and ".join(f"{self._engaged.wheels[each].radius:g}" for one in shafts for each in one.wheels)
        detail = f"nothing shows whether the pitch circles of radius {radii} about one pin turn together; {read_as}"
        self._note("shared-axis", shafts, detail, "warning")

    def _note(self, kind: str, shafts: Sequence[Shaft], detail: str, severity: Literal["warning", "note"]) -> None:
        wheels = [self._engaged.wheels[wheel] for shaft in shafts for wheel in shaft.wheels]
        rings = tuple(ring for wheel in wheels for ring in wheel.rings)
        self.oddities.append(Oddity(kind, wheels[0].at, detail, site=wheels[0].site, rings=rings, severity=severity))
