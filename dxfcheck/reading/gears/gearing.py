"""Rolling contacts: pitch circles on one another, on racks and on lines of the frame (reading rule 6)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass, field

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.body_pool import BodyPool
from dxfcheck.reading.gears.rolling import Rolling, too_far
from dxfcheck.reading.gears.shafts import Engaged
from dxfcheck.reading.gears.tracks import Track, find_tracks, held_by_frame
from dxfcheck.reading.gears.wheel_owners import find_owners
from dxfcheck.reading.gears.wheels import Mesh, choose_meshes, find_meshes, place_wheels, rim_touches
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.contact import Contact, Oddity
from dxfcheck.tolerances.shapes import TANGENT_OF_RADIUS

__all__ = ["Gearing", "find_gearing", "strands_at_wheels"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Gearing:
    """All bodies, those that wheels were given to or made for among them, and their rolling contacts.

    ``moved`` is the new index of each body that was given: a spoke goes into its wheel, and a frame that had to be made
    comes first. ``idle_rings`` are pitch circles (indices of primitives) that roll on nothing.
    """

    bodies: tuple[Body, ...]
    contacts: tuple[Contact, ...] = ()
    oddities: tuple[Oddity, ...] = ()
    idle_rings: tuple[int, ...] = ()
    moved: tuple[int, ...] = field(default=())


def find_gearing(
    pitch_rings: Sequence[tuple[int, Ring]],
    racks: Collection[int],
    sheet: Sheet,
    bodies: Sequence[Body],
    frame_strands: Collection[int],
    slides: Sequence[Contact] = (),
    fixed: AbstractSet[int] = frozenset(),
) -> Gearing:
    """Read the rolling contacts of a sheet.

    ``racks`` and ``frame_strands`` are strands, ``slides`` contacts already found between ``bodies`` (indices), and
    ``fixed`` sites on the frame besides the frame body's own pins.
    """
    if not pitch_rings or not sheet.pins:
        return Gearing(
            bodies=tuple(bodies), idle_rings=tuple(index for index, _ in pitch_rings), moved=tuple(range(len(bodies)))
        )
    return _Train(pitch_rings, racks, sheet, bodies, frame_strands, slides, fixed).read()


def strands_at_wheels(pitch_rings: Sequence[tuple[int, Ring]], sheet: Sheet) -> list[int]:
    """Strands that belong to a linkage for a pitch circle about a pin: on its rim, or straight and tangent to it.

    They need not hang together with any pin: a line that a wheel rolls on, a stay that holds an annulus.
    """
    placed = [wheel for wheel in place_wheels(pitch_rings, sheet.pins, sheet.tolerance)[0] if wheel.site is not None]
    wheels = [wheel._replace(number=number) for number, wheel in enumerate(placed)]
    every = range(len(sheet.strands))
    found = {track.strand for track in find_tracks(wheels, (), every, sheet)}
    if found or len(wheels) > 1:
        found.update(strand for touched in rim_touches(wheels, sheet, frozenset()) for strand in touched)
    return sorted(found - sheet.ring_strands)


class _Train:
    """The steps of reading the gearing of one sheet, with what they all look at."""

    def __init__(
        self,
        pitch_rings: Sequence[tuple[int, Ring]],
        racks: Collection[int],
        sheet: Sheet,
        bodies: Sequence[Body],
        frame_strands: Collection[int],
        slides: Sequence[Contact],
        fixed: AbstractSet[int],
    ) -> None:
        self.sheet = sheet
        self.pool = BodyPool(bodies)
        self.slides = slides
        self.given = len(bodies)
        self.racks = frozenset(racks)
        on_frame = [body for body in bodies if body.frame]
        drawn = {strand for body in on_frame for strand in body.strands}
        layered = {strand.number for strand in sheet.strands if strand.frame}
        self.frame_strands = frozenset({*frame_strands, *drawn, *layered} - sheet.ring_strands)
        pins = {site for body in on_frame for site in body.pins}
        self.fixed = frozenset({*fixed, *pins, *(pin.number for pin in sheet.pins if pin.frame is not None)})
        self.wheels, self.oddities = place_wheels(pitch_rings, sheet.pins, sheet.tolerance)

    def read(self) -> Gearing:
        """The contacts, the bodies they need and what looked wrong."""
        wheels, sheet = self.wheels, self.sheet
        possible = find_meshes(wheels)
        tracks = find_tracks(wheels, self.racks, self.frame_strands, sheet)
        if not possible and not tracks:
            return self._join((), (), [{} for _ in wheels], frozenset())
        at_pin = {(each.strand, each.end) for each in sheet.landings.landings if each.end is not None}
        touched = rim_touches(wheels, sheet, at_pin)
        annuli = {
            max((each.first, each.second), key=lambda one: wheels[one].radius)
            for each in possible
            if not each.outside and each.rolls(sheet.tolerance)
        }
        for track in tracks:
            touched[track.wheel].pop(track.strand, None)
        held = held_by_frame(wheels, touched, self.frame_strands, sheet)
        held |= self._propped(annuli - held, tracks)
        rooted = [mesh for mesh in possible if self._rooted(mesh, held)]
        meshes, missing = choose_meshes(rooted, wheels, sheet.tolerance)
        self.oddities += [too_far(mesh, wheels, sheet.tolerance.t) for mesh in missing]
        tracks = self._rolled_on(tracks, meshes, held)
        return self._join(meshes, tracks, touched, held)

    def _rooted(self, mesh: Mesh, held: Collection[int]) -> bool:
        """Whether both wheels have a pin or are part of the frame; what would roll otherwise is told."""
        loose = [self.wheels[each] for each in (mesh.first, mesh.second) if self.wheels[each].site is None]
        loose = [wheel for wheel in loose if wheel.number not in held]
        if loose and mesh.rolls(self.sheet.tolerance):
            detail = (
                f"the pitch circle of radius {loose[0].radius:g} touches another but has no pin at its centre; not read"
            )
            self.oddities.append(Oddity("wheel-pin", loose[0].at, detail, rings=loose[0].rings, severity="warning"))
        return not loose

    def _propped(self, annuli: Collection[int], tracks: Sequence[Track]) -> set[int]:
        """Annuli about a fixed pin that a line of the frame touches from outside: held there, which is doubtful."""
        found = set()
        for track in tracks:
            wheel = self.wheels[track.wheel]
            if track.wheel in annuli and track.wheel not in found and not track.rack and wheel.site in self.fixed:
                found.add(track.wheel)
                detail = f"a line of the frame touches the pitch circle of radius {wheel.radius:g}; read as held there"
                self.oddities.append(
                    Oddity("wheel-owner", track.foot, detail, site=wheel.site, rings=wheel.rings, severity="warning")
                )
        return found

    def _rolled_on(self, tracks: Sequence[Track], meshes: Sequence[Mesh], held: Collection[int]) -> list[Track]:
        """The racks, and the lines of the frame that a wheel with a moving centre rolls on.

        A wheel that meshes with others rolls on a line of the frame as well only where it was drawn exactly so.
        """
        meshing = {wheel for mesh in meshes for wheel in (mesh.first, mesh.second)}
        kept = []
        for track in tracks:
            wheel = self.wheels[track.wheel]
            exact = abs(track.miss) <= max(self.sheet.tolerance.t, TANGENT_OF_RADIUS * wheel.radius)
            moving = track.wheel not in held and wheel.site not in self.fixed
            if wheel.site is not None and (track.rack or (moving and (exact or track.wheel not in meshing))):
                kept.append(track)
        return kept

    def _join(
        self,
        meshes: Sequence[Mesh],
        tracks: Sequence[Track],
        touched: Sequence[Mapping[int, Sequence[int]]],
        held: AbstractSet[int],
    ) -> Gearing:
        partners: defaultdict[int, set[int]] = defaultdict(set)
        for mesh in meshes:
            partners[mesh.first].add(mesh.second)
            partners[mesh.second].add(mesh.first)
        engaging = sorted({*partners, *(track.wheel for track in tracks)})
        engaged = Engaged(
            wheels=self.wheels,
            rolling=engaging,
            partners=partners,
            touched=touched,
            held=held,
            fixed=self.fixed,
            frame_strands=self.frame_strands,
        )
        owners, doubts = find_owners(engaged, self.sheet, self.pool)
        self._give_crank_pins(owners)
        rolling = Rolling(
            self.wheels, owners, self.pool, self.frame_strands, self.fixed, self.slides, self.sheet.tolerance
        )
        contacts = [*rolling.on_wheels(meshes), *rolling.on_lines(tracks)]
        made, index = self.pool.finish()
        idle = {ring for wheel in self.wheels for ring in wheel.rings if wheel.number not in owners}
        return Gearing(
            bodies=made,
            contacts=tuple(_renumbered(contact, index) for contact in contacts),
            oddities=(*self.oddities, *doubts, *rolling.oddities),
            idle_rings=tuple(sorted(idle)),
            moved=tuple(index[key] for key in range(self.given)),
        )

    def _give_crank_pins(self, owners: Mapping[int, int]) -> None:
        """Pins inside a pitch circle that nothing else carries are the wheel's: it is a crank plate."""
        pins, pool = self.sheet.pins, self.pool
        sliding = {body for slide in self.slides for body in slide.bodies}
        centres = {wheel.site for wheel in self.wheels}
        loose = [
            pin
            for pin in pins
            if pin.number not in centres and pin.number not in self.fixed
            if len(pool.pinned_at(pin.number)) == 1
            if sliding.isdisjoint(pool.pinned_at(pin.number)) and self._joints(pool.pinned_at(pin.number)[0]) == 1
        ]
        turning = [self.wheels[each] for each in owners if owners[each] != pool.frame] if loose else []
        for pin in loose:
            carried = pool.parts[pool.pinned_at(pin.number)[0]].pins
            over = [wheel for wheel in turning if abs(wheel.at - pin.at) < wheel.radius]
            round_it = {owners[wheel.number] for wheel in over}
            # A link on the wheel's own pin turns beside it.
            if len(round_it) == 1 and not any(wheel.site in carried for wheel in over):
                pool.give(min(round_it), pins=(pin.number,))

    def _joints(self, key: int) -> int:
        """How many pins of a body are the frame's or another body's as well."""
        pins = self.pool.parts[key].pins
        return sum(pin in self.fixed or len(self.pool.pinned_at(pin)) > 1 for pin in pins)


def _renumbered(contact: Contact, index: Mapping[int, int]) -> Contact:
    """A contact between keys as one between indices, the frame (or else the lower index) first."""
    one, other = (index[body] for body in contact.bodies)
    numbered = contact._replace(bodies=(one, other))
    return numbered if one <= other else numbered.swapped()
