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
from dxfcheck.reading.linework import Linework, Strand
from dxfcheck.reading.nearness import near_pairs
from dxfcheck.reading.pins import PinSite
from dxfcheck.reading.tolerance import Tolerance
from dxfcheck.settings import RIM_GAP_IN_DIAMETERS, TANGENT_ANGLE_DEGREES

__all__ = ["How", "Landing", "Landings", "Miss", "find_landings"]

How = Literal["end", "corner", "through", "beside", "loose", "across"]
"""'end' and 'corner': it ends or bends there; 'through': it runs on through the centre; 'beside': it runs on past the
ring, touching it; 'loose': it meets the ring as the legs and bases of frame symbols do, at any angle and within the
shape tolerance, which counts only where it is frame (a belt meets a ring like that, too); 'across': it runs on through
the ring but off its centre, which is never a landing, only a thing to report."""


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
    for pin, strand in _neighbours(pins, linework, tolerance):
        landed = list(_land(pin, strand, tolerance))
        landings.extend(landed)
        missing = [
            end for end in range(len(strand.ends)) if all(each.end != end or each.how == "loose" for each in landed)
        ]
        misses.extend(filter(None, (_miss(pin, strand, end) for end in missing)))
    return Landings(landings=tuple(landings), misses=tuple(misses))


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


def _land(pin: PinSite, strand: Strand, tolerance: Tolerance) -> Iterator[Landing]:
    ended = False
    for end, point in enumerate(strand.ends):
        landing = _land_end(pin, strand, end, point, tolerance)
        if landing is not None:
            ended = True
            yield landing
    for corner in () if ended else strand.corners:
        away = abs(corner - pin.at)
        if away <= tolerance.t or away < pin.radius:
            yield Landing(strand.number, pin.number, "corner", None, away)
            return
        if any(abs(away - radius) <= max(tolerance.rim(radius), tolerance.shape) for radius in pin.radii):
            yield Landing(strand.number, pin.number, "loose", None, away)
            return
    if not ended:
        yield from _land_partway(pin, strand, tolerance)


def _land_end(pin: PinSite, strand: Strand, end: int, point: Point, tolerance: Tolerance) -> Landing | None:
    away = abs(point - pin.at)
    if away <= tolerance.t:
        return Landing(strand.number, pin.number, "end", end, away)
    inside = away < pin.radius
    on_rim = any(abs(away - radius) <= tolerance.rim(radius) for radius in pin.radii)
    if not inside and not on_rim:
        if any(abs(away - radius) <= tolerance.shape for radius in pin.radii):
            return Landing(strand.number, pin.number, "loose", end, away)
        return None
    piece = strand.pieces[0] if end == 0 else strand.pieces[-1]
    offset = _aim_offset(piece, point, pin.at)
    how: How = "end"
    if on_rim and angle_between_lines(_direction_at(piece, point), pin.at - point) > math.radians(
        TANGENT_ANGLE_DEGREES
    ):
        how = "loose"
    return Landing(strand.number, pin.number, how, end, offset)


def _aim_offset(piece: Segment | Arc, point: Point, centre: Point) -> float:
    """How far a piece, run on past its end, would pass a centre."""
    if isinstance(piece, Arc):
        return abs(abs(centre - piece.centre) - piece.radius)
    along = piece.end - piece.start
    length = abs(along)
    return abs(cross(along, centre - point)) / length if length else abs(centre - point)


def _direction_at(piece: Segment | Arc, point: Point) -> Point:
    """Direction of a piece at one of its points, either way along it."""
    if isinstance(piece, Arc):
        return (point - piece.centre) * 1j
    return piece.end - piece.start


def _land_partway(pin: PinSite, strand: Strand, tolerance: Tolerance) -> Iterator[Landing]:
    """A strand that runs on through the centre, or past the ring touching it from one side: at most one landing."""
    for piece in strand.pieces:
        if isinstance(piece, Arc):
            out = pin.at - piece.centre
            turn = (cmath.phase(out) - piece.start_angle) % math.tau if out else 0.0
            if turn < piece.sweep and abs(abs(out) - piece.radius) <= tolerance.t:
                yield Landing(strand.number, pin.number, "through", None, 0.0)
                return
            continue
        parameter = parameter_on_line(pin.at, piece.start, piece.end)
        if not 0.0 < parameter < 1.0:
            continue
        foot = piece.start + parameter * (piece.end - piece.start)
        away = abs(foot - pin.at)
        if away <= tolerance.t:
            yield Landing(strand.number, pin.number, "through", None, away)
            return
        if away <= pin.radius - tolerance.rim(pin.radius):
            yield Landing(strand.number, pin.number, "across", None, away)
            return
        runs_on = min(abs(foot - piece.start), abs(foot - piece.end)) > pin.radius
        gap = min(abs(away - radius) - tolerance.rim(radius) for radius in pin.radii)
        if runs_on and gap <= tolerance.shape:
            yield Landing(strand.number, pin.number, "beside" if gap <= 0.0 else "loose", None, away)
            return


def _miss(pin: PinSite, strand: Strand, end: int) -> Miss | None:
    point = strand.ends[end]
    outer = [radius for radius in pin.radii if radius < abs(point - pin.at)]
    if not outer:
        return None
    gap = abs(point - pin.at) - outer[-1]
    if gap > RIM_GAP_IN_DIAMETERS * 2.0 * pin.radius:
        return None
    piece = strand.pieces[0] if end == 0 else strand.pieces[-1]
    return Miss(strand.number, pin.number, end, gap, _aim_offset(piece, point, pin.at))
