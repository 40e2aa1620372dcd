"""How far each speed can be trusted: what it changes by when the drawing is off by its own resolution.

The driven motion u satisfies A(p) u = b, with the constraint matrix A, the drives as further rows, and the drawn places
p. A change of a place changes the motion by du = -A^-1 (dA/dp u) dp, to first order. What dA u is at a joint needs no
derivative of the matrix: a pin moved by dp meets its two links at another point, whose velocities differ by
i (omega_2 - omega_1) dp; a guide or slot turned by da lets its sliding speed in across, v_slide da.
Bounds add up what every place can do at its worst, each coordinate off by the resolution, whichever way makes it worst.
Source: any text on linear error propagation; the relative velocity of two points of a link, v = i omega r, is that of
the constraint matrix.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from contextlib import suppress

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.freedom.constraints import constraint_matrix
from dxfcheck.analysis.results import SpeedBounds
from dxfcheck.analysis.speeds.velocity import Motion, rate_row
from dxfcheck.analysis.topology import Topology
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Joint, Linkage, Pin
from dxfcheck.tolerances.analysis import RANK_RELATIVE, TRUST_LINKS

__all__ = ["speed_bounds"]

Matrix = NDArray[np.float64]
Complex = NDArray[np.complex128]


def speed_bounds(linkage: Linkage, topology: Topology, motion: Motion, resolution: float) -> SpeedBounds | None:
    """First-order bounds; None where the drives do not settle every link, or for more than TRUST_LINKS links.

    Cubic in the links. ValueError for a joint that needs a direction and has none.
    """
    if topology.links > TRUST_LINKS or not all(motion.settled):
        return None
    places = _Places(linkage)
    matrix = np.vstack([constraint_matrix(linkage, topology, motion.bodies), *_driven_rows(linkage, motion)])
    pushed = np.zeros((len(matrix), places.count))
    row = 0
    for joint, place in zip(linkage.joints, topology.joints, strict=True):
        row += _push(joint, place.acts_as, places, motion, pushed[row:])
    moved = np.insert(_solved(matrix, -pushed), [3 * linkage.frame] * 3, 0.0, axis=0)
    return _bounds(linkage, places, motion, moved, resolution)


def _solved(matrix: Matrix, pushed: Matrix) -> Matrix:
    """Least squares where constraints are redundant (lengths that are special stay so), or the pose is singular."""
    if matrix.shape[0] == matrix.shape[1]:
        with suppress(np.linalg.LinAlgError):
            return np.asarray(np.linalg.solve(matrix, pushed), dtype=np.float64)
    return np.asarray(np.linalg.lstsq(matrix, pushed, rcond=RANK_RELATIVE)[0], dtype=np.float64)


def _driven_rows(linkage: Linkage, motion: Motion) -> Iterator[Matrix]:
    for number in motion.taken:
        row = np.zeros(3 * (len(linkage.links) - 1))
        for column, weight in rate_row(linkage.drives[number], linkage, motion.bodies).cells:
            row[column] += weight
        yield row[np.newaxis]


class _Places:
    """What may be off: every pin in x and y, each guide and slot in its direction, each wheel's centre that is no pin.

    ``count`` columns: two for a pin or centre, one for a direction, in units of the resolution.
    """

    def __init__(self, linkage: Linkage) -> None:
        self._pins = {pin.at: 2 * number for number, pin in enumerate(linkage.pins)}
        self._centres: dict[Point, int] = {}
        self._ways: dict[int, int] = {}
        self.count = 2 * len(linkage.pins)
        for joint in linkage.joints:
            for centre in joint.curves if joint.kind == "rolling" else ():
                if centre is not None and centre not in self._pins and centre not in self._centres:
                    self._centres[centre] = self._taken(2)
            if joint.kind in ("slide", "pin in slot") and joint.drawn_length:
                self._ways[id(joint)] = self._taken(1)

    def _taken(self, columns: int) -> int:
        self.count += columns
        return self.count - columns

    def at(self, place: Point) -> int | None:
        """First column of a pin or centre; None for a place that is neither."""
        return self._pins.get(place, self._centres.get(place))

    def way(self, joint: Joint) -> int | None:
        """Column of a joint's direction, None where it is taken as exact: its guide's drawn length is not known."""
        return self._ways.get(id(joint))


def _push(joint: Joint, acts_as: str, places: _Places, motion: Motion, rows: Matrix) -> int:
    """Enter what each place does to the rows of one joint; returns how many rows it has."""
    turn = motion.turns[joint.second] - motion.turns[joint.first]
    along = joint.direction if joint.direction is not None else 1 + 0j
    if acts_as == "slide":
        _push_way(joint, places, motion, rows[1])
        return 2
    moving = _weights(joint, places)
    if acts_as == "pin":
        for column, weight in moving:
            rows[0, column : column + 2] += [0.0, -turn * weight]
            rows[1, column : column + 2] += [turn * weight, 0.0]
        return 2
    across = 1j * along if joint.kind == "pin in slot" else along
    for column, weight in moving:
        for part, step in enumerate((1.0 + 0j, 1j)):
            rows[0, column + part] += weight * turn * dot(1j * step, across)
    if joint.kind == "pin in slot":
        _push_way(joint, places, motion, rows[0])
        _push_bend(joint, places, motion, rows[0])
    return 1


def _push_way(joint: Joint, places: _Places, motion: Motion, row: Matrix) -> None:
    """A guide whose ends are off by the resolution, square to it and opposite ways, turns by twice it over the length.

    Its sliding speed then has a part across: v . i (i along) da = -v_slide da.
    """
    column = places.way(joint)
    if column is not None and joint.drawn_length:
        row[column] -= _slide_speed(joint, motion) * 2.0 / joint.drawn_length


def _push_bend(joint: Joint, places: _Places, motion: Motion, row: Matrix) -> None:
    """A pin that stands further along a curved slot meets it in another direction."""
    middle = next((each for each in joint.curves if each is not None), None)
    column = None if joint.pin is None else places.at(joint.at)
    if middle is None or column is None or joint.direction is None:
        return
    outward = joint.at - middle
    for part, step in enumerate((1.0 + 0j, 1j)):
        turned = dot(step, 1j * outward) / abs(outward) ** 2
        row[column + part] -= _slide_speed(joint, motion) * turned


def _weights(joint: Joint, places: _Places) -> list[tuple[int, float]]:
    """The columns that move a joint's place, and how far: a pin with itself, a pitch point with its wheels' centres."""
    if joint.kind != "rolling":
        column = places.at(joint.at)
        return [] if column is None else [(column, 1.0)]
    one, other = joint.curves
    if one is not None and other is not None:
        part = dot(joint.at - one, other - one) / abs(other - one) ** 2
        shares = [(one, 1.0 - part), (other, part)]
    else:
        shares = [(centre, 1.0) for centre in (one, other) if centre is not None]
    found = [(places.at(centre), weight) for centre, weight in shares]
    return [(column, weight) for column, weight in found if column is not None]


def _slide_speed(joint: Joint, motion: Motion) -> float:
    relative = motion.velocity(joint.second, joint.at) - motion.velocity(joint.first, joint.at)
    return dot(relative, joint.direction) if joint.direction is not None else 0.0


def _bounds(linkage: Linkage, places: _Places, motion: Motion, moved: Matrix, resolution: float) -> SpeedBounds:
    changes = _Changes(motion, moved)
    first = [joint.first for joint in linkage.joints]
    second = [joint.second for joint in linkage.joints]
    return SpeedBounds(
        resolution=resolution,
        links=_worst(changes.turns, resolution),
        pins=_worst(_pin_changes(linkage.pins, changes), resolution),
        turns=_worst(changes.turns[second] - changes.turns[first], resolution),
        slides=tuple([_slide_bound(joint, places, changes, resolution) for joint in linkage.joints]),
    )


class _Changes:
    """What each place (column) does to the turning of every link (row) and to the velocity of its centre."""

    def __init__(self, motion: Motion, moved: Matrix) -> None:
        self.motion = motion
        self.turns: Matrix = moved[0::3] / np.array([[body.size] for body in motion.bodies])
        self.centres: Complex = moved[1::3] + 1j * moved[2::3]

    def velocities(self, links: list[int], points: list[Point]) -> Complex:
        """The same for points of links that stay where they are, a row each."""
        bodies = self.motion.bodies
        arms = np.array([[point - bodies[link].centre] for link, point in zip(links, points, strict=True)])
        changed: Complex = self.centres[links] + 1j * self.turns[links] * arms
        return changed


def _pin_changes(pins: Sequence[Pin], changes: _Changes) -> Matrix:
    """What each place does to the size of the pins' velocities; of one at rest, the size of its change."""
    links, motion = [pin.links[-1] for pin in pins], changes.motion
    changed = changes.velocities(links, [pin.at for pin in pins])
    velocities = np.array([motion.velocity(link, pin.at) for link, pin in zip(links, pins, strict=True)])
    rows, turns = np.arange(len(pins)), np.array([motion.turns[link] for link in links])
    changed[rows, 2 * rows] += 1j * turns
    changed[rows, 2 * rows + 1] -= turns
    along = np.exp(1j * np.angle(velocities))[:, np.newaxis]
    moving = (velocities != 0.0)[:, np.newaxis]
    sized: Matrix = np.where(moving, (changed * along.conjugate()).real, np.abs(changed))
    return sized


def _slide_bound(joint: Joint, places: _Places, changes: _Changes, resolution: float) -> float:
    along, motion = joint.direction, changes.motion
    if along is None or joint.kind not in ("slide", "pin in slot"):
        return 0.0
    first, second = changes.velocities([joint.first, joint.second], [joint.at, joint.at])
    changed = second - first
    column = places.at(joint.at) if joint.kind == "pin in slot" else None
    if column is not None:
        turn = motion.turns[joint.second] - motion.turns[joint.first]
        changed[column] += 1j * turn
        changed[column + 1] -= turn
    return resolution * float(np.abs((changed * along.conjugate()).real).sum())


def _worst(changes: Matrix, resolution: float) -> tuple[float, ...]:
    """All places off at their worst, for each row."""
    return tuple((resolution * np.abs(changes).sum(axis=1)).tolist())
