"""The contacts of wheels with one another and with lines, and what is wrong about each (reading rule 6)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Mapping, Sequence
from collections.abc import Set as AbstractSet
from typing import Literal

from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.body_pool import BodyPool
from dxfcheck.reading.gears.tracks import Track
from dxfcheck.reading.gears.wheels import Mesh, Wheel
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.contact import Contact, Oddity, directed
from dxfcheck.tolerances.shapes import ROLLING_OF_RADIUS, TANGENT_OF_RADIUS

__all__ = ["Rolling", "too_far"]


class Rolling:
    """Makes contacts between keys of the pool's bodies; ``oddities`` gathers what looked wrong.

    ``owners`` are the keys by wheel; ``fixed`` the sites on the frame; ``slides`` contacts between bodies as given.
    """

    def __init__(
        self,
        wheels: Sequence[Wheel],
        owners: Mapping[int, int],
        pool: BodyPool,
        frame_strands: AbstractSet[int],
        fixed: frozenset[int],
        slides: Sequence[Contact],
        tolerance: Tolerance,
    ) -> None:
        self.oddities: list[Oddity] = []
        self._wheels = wheels
        self._owners = owners
        self._pool = pool
        self._frame_strands = frame_strands
        self._fixed = fixed | pool.frame_pins
        self._tolerance = tolerance
        self._slides_of: defaultdict[int, list[Contact]] = defaultdict(list)
        for slide in slides:
            if slide.kind == "slide":
                for body in slide.bodies:
                    self._slides_of[body].append(slide)

    def on_wheels(self, meshes: Sequence[Mesh]) -> list[Contact]:
        """The contacts of wheels that mesh; two wheels of one part have none."""
        owners = self._owners
        return [self._mesh_contact(mesh) for mesh in meshes if owners[mesh.first] != owners[mesh.second]]

    def _mesh_contact(self, mesh: Mesh) -> Contact:
        rings = (*self._wheels[mesh.first].rings, *self._wheels[mesh.second].rings)
        # In the order in which the contact names their bodies at last.
        one, other = sorted(
            (self._wheels[mesh.first], self._wheels[mesh.second]), key=lambda wheel: self._owners[wheel.number]
        )
        if not mesh.exact(self._tolerance):
            self.oddities.append(_off_tangency(mesh, one, other, self._tolerance.t))
        if not self._held_apart(one, other):
            detail = (
                f"no link holds the centres of the pitch circles of radius {one.radius:g} and {other.radius:g} apart"
            )
            self.oddities.append(Oddity("gear-centres", one.at, detail, site=one.site, rings=rings, severity="warning"))
        larger, smaller = (one, other) if one.radius >= other.radius else (other, one)
        along = smaller.at - larger.at
        # Divided in the ratio of the radii, so that the speeds are in that ratio even if the circles miss a little.
        rest = larger.radius + smaller.radius if mesh.outside else larger.radius - smaller.radius
        at = larger.at + along * (larger.radius / rest)
        where = "outside" if mesh.outside else "inside"
        return Contact(
            kind="rolling",
            bodies=(self._owners[one.number], self._owners[other.number]),
            at=at,
            direction=directed(along * 1j),
            why=f"pitch circle of radius {one.radius:g} rolls on that of radius {other.radius:g}, {where}",
            rings=rings,
            curves=(one.at, other.at),
        )

    def _held_apart(self, one: Wheel, other: Wheel) -> bool:
        if one.site is None or other.site is None:
            return False
        if one.site in self._fixed and other.site in self._fixed:
            return True
        return not set(self._pool.pinned_at(one.site)).isdisjoint(self._pool.pinned_at(other.site))

    def on_lines(self, tracks: Sequence[Track]) -> list[Contact]:
        """The contacts of wheels with racks and lines of the frame; an interrupted line counts once."""
        owners = self._owners
        contacts: list[Contact] = []
        of_wheel: defaultdict[int, list[tuple[Track, int]]] = defaultdict(list)
        for track in sorted(tracks, key=lambda each: (abs(each.miss), each.wheel, each.strand)):
            owner = self._owner_of_line(track.strand)
            again = any(known == owner and track.same_side(other) for other, known in of_wheel[track.wheel])
            if owner != owners[track.wheel] and not again:
                of_wheel[track.wheel].append((track, owner))
        for track, owner in sorted(pair for pairs in of_wheel.values() for pair in pairs):
            others = [pair for pair in of_wheel[track.wheel] if pair[0].strand != track.strand]
            beside = [line for other, line in others if track.runs_along(other.normal * 1j)]
            contacts.append(self._track_contact(track, owners[track.wheel], owner, beside))
        return contacts

    def _owner_of_line(self, strand: int) -> int:
        if strand in self._frame_strands:
            self._pool.give(self._pool.frame, strands=(strand,))
            return self._pool.frame
        if strand not in self._pool.body_of:
            return self._pool.add(Body(strands=(strand,), pins=(), frame=False))
        return self._pool.body_of[strand]

    def _track_contact(self, track: Track, wheel_owner: int, line_owner: int, beside: Sequence[int]) -> Contact:
        wheel = self._wheels[track.wheel]
        what = "the pitch line of a rack" if track.rack else "a line of the frame"
        silent = max(self._tolerance.t, TANGENT_OF_RADIUS * wheel.radius)
        if abs(track.miss) > silent:
            apart = (
                f"expected {wheel.radius:g} from centre to line, it is {wheel.radius + track.miss:g}; read as rolling"
            )
            detail = f"the pitch circle of radius {wheel.radius:g} misses {what} by {{amount}}: {apart}"
            self.oddities.append(
                _odd_track("off-tangency", track, wheel, detail)._replace(amount=track.miss, limit=silent)
            )
        on_frame = line_owner == self._pool.frame
        held = self._keeps_distance(track, line_owner, () if on_frame else beside)
        if not held and not on_frame:
            detail = (
                f"nothing holds the rack at the pitch circle of radius {wheel.radius:g}: no slide along it was found"
            )
            self.oddities.append(_odd_track("gear-centres", track, wheel, detail)._replace(case="rack"))
        return Contact(
            kind="rolling",
            bodies=(wheel_owner, line_owner),
            at=wheel.at + wheel.radius * track.normal,
            direction=directed(track.normal * 1j),
            why=f"pitch circle of radius {wheel.radius:g} rolls on {what}",
            strands=(track.strand,),
            rings=wheel.rings,
            full=on_frame and not held,
            curves=(wheel.at, None),
        )

    def _keeps_distance(self, track: Track, line_owner: int, beside: Collection[int]) -> bool:
        """Whether slides along the line keep it at its distance from the wheel's centre.

        Bodies joined by such slides neither turn on one another nor come nearer: one of them must be pinned at the
        centre, or own a line ``beside`` that the wheel rolls on as well.
        """
        site = self._wheels[track.wheel].site
        level, waiting = {line_owner}, [line_owner]
        while waiting:
            body = waiting.pop()
            for slide in self._slides_of[body]:
                if track.runs_along(slide.direction):
                    fresh = set(slide.bodies) - level
                    level |= fresh
                    waiting.extend(fresh)
        if self._pool.frame in level and site in self._fixed:
            return True
        parts = [self._pool.parts[key] for key in level if key in self._pool.parts]
        return any(site in body.pins for body in parts) or not level.isdisjoint(beside)


def _odd_track(kind: str, track: Track, wheel: Wheel, detail: str) -> Oddity:
    """Something wrong where a wheel meets a line."""
    return Oddity(
        kind, track.foot, detail, site=wheel.site, rings=wheel.rings, strands=(track.strand,), severity="warning"
    )


def _off_tangency(mesh: Mesh, one: Wheel, other: Wheel, t: float) -> Oddity:
    limit = max(t, TANGENT_OF_RADIUS * mesh.smaller)
    return _miss(mesh, one, other, limit, "read as rolling", "warning")


def too_far(mesh: Mesh, wheels: Sequence[Wheel], t: float) -> Oddity:
    """What is said of two wheels that miss tangency by too much to be read as rolling."""
    limit = max(t, ROLLING_OF_RADIUS * mesh.smaller)
    return _miss(mesh, wheels[mesh.first], wheels[mesh.second], limit, "too far to be read as rolling", "error")


def _miss(
    mesh: Mesh, one: Wheel, other: Wheel, limit: float, verdict: str, severity: Literal["error", "warning"]
) -> Oddity:
    by = "miss tangency by {amount}" if mesh.miss > 0.0 else "overlap, missing tangency by {amount}"
    apart = f"expected centres {mesh.expected:g} apart, they are {mesh.apart:g} apart"
    detail = f"pitch circles of radius {one.radius:g} and {other.radius:g} {by}: {apart}; {verdict}"
    at = one.at + (other.at - one.at) / 2
    return Oddity(
        "off-tangency", at, detail, mesh.miss, limit, site=one.site, rings=(*one.rings, *other.rings), severity=severity
    )
