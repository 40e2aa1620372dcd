"""Where linework lands on pins, and where it nearly does (reading rule 3)."""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal, NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, parameter_on_line
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.tolerances.linework import RIM_GAP_IN_DIAMETERS, TANGENT_ANGLE_DEGREES

__all__ = ["How", "Landing", "Landings", "Miss", "find_landings"]

How = Literal["end", "corner", "through", "beside", "loose", "across"]
"""'end' and 'corner': it ends or bends there; 'through': it runs on through the centre; 'beside': it runs on past the
ring, touching it; 'loose': it meets the ring as the legs and bases of frame symbols do, at any angle and within the
shape tolerance, which counts only where it is frame (a belt meets a ring like that, too); 'across': it runs on through
the ring but off its centre, which is never a landing, only a thing to report."""


FIRMNESS: tuple[How, ...] = ("end", "corner", "through", "beside", "loose", "across")
"""Of several pieces of a strand at one pin, the firmest landing counts."""


class Landing(NamedTuple):
    """A strand on a pin. ``end`` is 0 or 1 for an end, else None; ``offset`` how far its aim passes the centre."""

    strand: int
    pin: int
    how: How
    end: int | None
    offset: float


class Miss(NamedTuple):
    """An end in a pin's neighbourhood that does not land on it: ``gap`` short of its nearest rim."""

    strand: int
    pin: int
    end: int
    gap: float
    offset: float


@dataclass(frozen=True, slots=True, kw_only=True)
class Landings:
    """All landings and misses, by pin, then strand."""

    landings: tuple[Landing, ...]
    misses: tuple[Miss, ...]


def find_landings(pins: Sequence[PinSite], linework: Linework, tolerance: Tolerance) -> Landings:
    """Compare each pin with the linework in its neighbourhood. Cost near-linear in pins plus strands."""
    landings: list[Landing] = []
    misses: list[Miss] = []
    of_radii = {radii: _Rims.of(radii, tolerance) for radii in {pin.radii for pin in pins}}
    rims = [of_radii[pin.radii] for pin in pins]
    for pin, strand in _neighbours(pins, linework, tolerance):
        ended = False
        for end, point in enumerate(strand.ends):
            away = abs(point - pin.at)
            landing = _land_end(pin, strand, end, away, rims[pin.number]) if away <= rims[pin.number].furthest else None
            if landing is not None:
                ended = True
                landings.append(landing)
            if landing is None or landing.how == "loose":
                miss = _miss(pin, strand, end, away)
                if miss is not None:
                    misses.append(miss)
        landing = None if ended else _land_inside(pin, strand, rims[pin.number])
        if landing is not None:
            landings.append(landing)
    return Landings(landings=tuple(landings), misses=tuple(misses))


class _Rims(NamedTuple):
    """How far from a pin's centre what meets its rings may lie: within ``rim`` of each radius, loosely ``close``.

    An end is at its centre within ``t``, a line runs on through it within ``through``.
    """

    t: float
    through: float
    furthest: float
    bands: tuple[tuple[float, float, float], ...]

    @classmethod
    def of(cls, radii: Sequence[float], tolerance: Tolerance) -> _Rims:
        """The radii of a pin, each with its two tolerances."""
        bands = tuple((radius, tolerance.rim(radius), tolerance.close(radius)) for radius in radii)
        furthest = max(radius + max(rim, close) for radius, rim, close in bands)
        return cls(tolerance.t, tolerance.through(radii[0]), furthest, bands)

    def met(self, away: float) -> bool:
        """Whether what lies so far from the centre is on a rim."""
        return any(abs(away - radius) <= rim for radius, rim, _ in self.bands)

    def loose(self, away: float) -> bool:
        """Whether it is on a rim as frame symbols are."""
        return any(abs(away - radius) <= max(rim, close) for radius, rim, close in self.bands)


def _neighbours(pins: Sequence[PinSite], linework: Linework, tolerance: Tolerance) -> Iterator[tuple[PinSite, Strand]]:
    if not pins:
        return
    centres = np.array([pin.at for pin in pins], dtype=np.complex128)
    reach = np.array([_reach(pin, tolerance) for pin in pins])
    which, piece = near_pairs(centres, reach, linework.piece_starts, linework.piece_ends)
    pairs = set(zip(which.tolist(), linework.piece_strand[piece].tolist(), strict=True))
    if linework.chord_strand.size:
        which, chord = near_pairs(centres, reach, linework.chord_starts, linework.chord_ends)
        pairs.update(zip(which.tolist(), linework.chord_strand[chord].tolist(), strict=True))
    for pin, strand in sorted(pairs):
        yield pins[pin], linework.strands[strand]


def _reach(pin: PinSite, tolerance: Tolerance) -> float:
    largest = pin.radii[-1]
    return max(largest + tolerance.rim(largest), largest + RIM_GAP_IN_DIAMETERS * 2.0 * pin.radius)


def _land_inside(pin: PinSite, strand: Strand, rims: _Rims) -> Landing | None:
    """A strand that bends at a pin, or runs on through its centre or past its ring: one landing at most."""
    for corner in strand.corners:
        away = abs(corner - pin.at)
        if away <= rims.t or away < pin.radius:
            return Landing(strand.number, pin.number, "corner", None, away)
        if rims.loose(away):
            return Landing(strand.number, pin.number, "loose", None, away)
    found = filter(None, (_land_on(pin, strand, piece, rims) for piece in strand.pieces))
    return min(found, key=lambda landing: FIRMNESS.index(landing.how), default=None)


def _land_end(pin: PinSite, strand: Strand, end: int, away: float, rims: _Rims) -> Landing | None:
    """The landing of an end that lies ``away`` from a pin's centre."""
    if away <= rims.t:
        return Landing(strand.number, pin.number, "end", end, away)
    on_rim = rims.met(away)
    if away >= pin.radius and not on_rim:
        return Landing(strand.number, pin.number, "loose", end, away) if rims.loose(away) else None
    point = strand.ends[end]
    piece = strand.pieces[0] if end == 0 else strand.pieces[-1]
    offset = _aim_offset(piece, point, pin.at)
    how: How = "loose" if on_rim and _is_tangent(piece, point, pin.at, offset / away) else "end"
    return Landing(strand.number, pin.number, how, end, offset)


TANGENT_SINE = math.sin(math.radians(TANGENT_ANGLE_DEGREES))


def _is_tangent(piece: Segment | Arc, point: Point, centre: Point, sine: float) -> bool:
    """Whether an end at a rim passes the centre by; ``sine`` is that of a line's angle to the radius."""
    if isinstance(piece, Segment):
        return sine > TANGENT_SINE
    along = (point - piece.centre) * 1j
    return angle_between_lines(along, centre - point) > math.radians(TANGENT_ANGLE_DEGREES)


def _aim_offset(piece: Segment | Arc, point: Point, centre: Point) -> float:
    """How far a piece, run on past its end, would pass a centre."""
    if isinstance(piece, Arc):
        return abs(abs(centre - piece.centre) - piece.radius)
    along = piece.end - piece.start
    length = abs(along)
    return abs(cross(along, centre - point)) / length if length else abs(centre - point)


def _land_on(pin: PinSite, strand: Strand, piece: Segment | Arc, rims: _Rims) -> Landing | None:
    """A piece that runs on through a pin's centre, or past its ring touching it from one side."""
    if isinstance(piece, Arc):
        through = abs(abs(pin.at - piece.centre) - piece.radius) <= rims.through and _covers(piece, pin.at)
        return Landing(strand.number, pin.number, "through", None, 0.0) if through else None
    parameter = parameter_on_line(pin.at, piece.start, piece.end)
    if not 0.0 < parameter < 1.0:
        return None
    foot = piece.start + parameter * (piece.end - piece.start)
    away = abs(foot - pin.at)
    if away <= rims.through:
        return Landing(strand.number, pin.number, "through", None, away)
    if away < pin.radius and not rims.met(away):
        return Landing(strand.number, pin.number, "across", None, away)
    runs_on = min(abs(foot - piece.start), abs(foot - piece.end)) > pin.radius
    if not runs_on or not rims.loose(away):
        return None
    return Landing(strand.number, pin.number, "beside" if rims.met(away) else "loose", None, away)


def _covers(arc: Arc, point: Point) -> bool:
    """Whether an arc passes the direction in which a point lies from its centre."""
    out = point - arc.centre
    return out == 0 or (cmath.phase(out) - arc.start_angle) % math.tau < arc.sweep


def _miss(pin: PinSite, strand: Strand, end: int, away: float) -> Miss | None:
    """An end that stops short of a pin's nearest rim by no more than two of its diameters."""
    radii = pin.radii
    if away <= radii[0]:
        return None
    outer = radii[-1] if radii[-1] < away else max([radius for radius in radii if radius < away])
    if away - outer > RIM_GAP_IN_DIAMETERS * 2.0 * radii[0]:
        return None
    piece = strand.pieces[0] if end == 0 else strand.pieces[-1]
    return Miss(strand.number, pin.number, end, away - outer, _aim_offset(piece, strand.ends[end], pin.at))
