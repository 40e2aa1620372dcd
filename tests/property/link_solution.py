"""The motion of a random linkage worked out by itself, by scipy, on the model that it was drawn from.

The unknowns are each link's turn and the velocity of its point at the origin. A pin gives its links one velocity, a
slide no relative turn and no relative speed across it, a slot no relative speed across it at its pin.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
import scipy.linalg
from numpy.typing import NDArray

from tests.property.growing import FIXED, Model

__all__ = ["LinkSolution", "solve_links"]

Matrix = NDArray[np.float64]
SMALLEST = 1e-9
"""Singular values below this part of the greatest are zero: the models are exact."""


@dataclass(frozen=True, slots=True, kw_only=True)
class LinkSolution:
    """Freedom at the pose, rad/s of each link, and the velocity of its point at the origin (lengths by ``size``).

    ``weakest`` is the smallest singular value of the constraints with the drive over the greatest.
    """

    freedom: int
    turning: tuple[float, ...]
    velocities: tuple[complex, ...]
    weakest: float

    def velocity(self, link: int, at: complex) -> complex:
        """Velocity of a link's point at a place; the frame is at rest."""
        return 0j if link == FIXED else self.velocities[link] + 1j * self.turning[link] * at


def solve_links(model: Model) -> LinkSolution:
    """The solution of a model; its speeds only mean something where the weakest singular value is not zero."""
    middle = sum(model.points.values()) / len(model.points)
    size = max(abs(at - middle) for at in model.points.values())
    width = 3 * len(model.links)
    constraints = np.array(list(_pin_rows(model, middle, size)) + list(_contact_rows(model, middle, size)))
    drive = np.zeros(width)
    drive[0] = 1.0
    if model.driven is not None:
        contact = model.contacts[model.driven]
        drive = _across(model, contact.links, (contact.at - middle) / size, contact.along)
    driven = np.vstack([constraints, drive])
    wanted = np.zeros(len(driven))
    wanted[-1] = model.rate if model.driven is None else model.rate / size
    values = scipy.linalg.svdvals(driven)
    motion = scipy.linalg.lstsq(driven, wanted)[0]
    turning = tuple(float(turn) for turn in motion[0::3])
    at_middle = motion[1::3] + 1j * motion[2::3]
    return LinkSolution(
        freedom=scipy.linalg.null_space(constraints, rcond=SMALLEST).shape[1],
        turning=turning,
        velocities=tuple(
            complex(velocity) * size - 1j * turn * middle for velocity, turn in zip(at_middle, turning, strict=True)
        ),
        weakest=float(values[-1] / values[0]) if len(driven) >= width else 0.0,
    )


def _pin_rows(model: Model, middle: complex, size: float) -> list[Matrix]:
    rows = []
    for name, at in model.points.items():
        links = [number for number, pins in enumerate(model.links) if name in pins]
        held = [FIXED, *links] if name in model.fixed else links
        for other in held[1:]:
            rows += [_across(model, (held[0], other), (at - middle) / size, along) for along in (1 + 0j, 1j)]
    return rows


def _contact_rows(model: Model, middle: complex, size: float) -> list[Matrix]:
    rows = []
    for contact in model.contacts:
        rows.append(_across(model, contact.links, (contact.at - middle) / size, 1j * contact.along))
        if contact.kind == "slide":
            rows.append(np.zeros(3 * len(model.links)))
            for link, sign in zip(contact.links, (-1.0, 1.0), strict=True):
                if link != FIXED:
                    rows[-1][3 * link] = sign
    return rows


def _across(model: Model, links: tuple[int, int], at: complex, along: complex) -> Matrix:
    """The second link's speed against the first at a place along a unit vector: v + i w at, dotted with it."""
    row = np.zeros(3 * len(model.links))
    for link, sign in zip(links, (-1.0, 1.0), strict=True):
        if link != FIXED:
            row[3 * link : 3 * link + 3] = (
                sign * (1j * at * along.conjugate()).real,
                sign * along.real,
                sign * along.imag,
            )
    return row
