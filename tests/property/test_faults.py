"""300 random linkages with a bar added or a joint removed: what is locked and what is free, by brute force.

A matrix of constraints that shares no code with the program is built here, and every pair of links compared: two are
rigid with one another where no vector of the null space moves them apart. Free is what some vector moves while the
drive stands still.
"""

from __future__ import annotations

import random
from dataclasses import replace
from itertools import combinations

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.linalg import null_space, svdvals

from dxfcheck.analysis import analyse
from dxfcheck.linkage import Joint, Link, Linkage
from tests.property.link_solution import solve_links
from tests.property.linkage_plans import RandomLinkage
from tests.property.random_linkages import random_linkage
from tests.property.test_speed_bounds import model_of

Matrix = NDArray[np.float64]

SIZE = 100.0
"""mm; turning is measured by the speed at this arm."""
WEAKEST = 1e-4
"""Singular values between this part of the greatest and NOISE make a pose nearly singular: another change is tried."""
NOISE = 1e-9
STILL = 1e-7
TRIES = 60


def rate_rows(model: Linkage, link: int, at: complex) -> Matrix:
    """Velocity of a link's point, x and y, and its turning times SIZE, over the unknowns of all links."""
    rows = np.zeros((3, 3 * len(model.links)))
    arm = at / SIZE
    rows[0, 3 * link : 3 * link + 2] = 1.0, -arm.imag
    rows[1, 3 * link + 1 : 3 * link + 3] = arm.real, 1.0
    rows[2, 3 * link + 1] = 1.0
    return rows


def joint_rows(model: Linkage, joint: Joint) -> Matrix:
    apart = rate_rows(model, joint.second, joint.at) - rate_rows(model, joint.first, joint.at)
    if joint.kind == "pin":
        return apart[:2]
    assert joint.direction is not None
    across = 1j * joint.direction
    held = across.real * apart[0:1] + across.imag * apart[1:2]
    return np.vstack([held, apart[2:]]) if joint.kind == "slide" else held


def constraints(model: Linkage) -> Matrix:
    """All joints, and the frame held."""
    held = np.eye(3, 3 * len(model.links))
    return np.vstack([held, *[joint_rows(model, joint) for joint in model.joints]])


def is_clear_cut(matrix: Matrix) -> bool:
    values = svdvals(matrix) / svdvals(matrix)[0]
    return bool(np.all((values > WEAKEST) | (values < NOISE)))


def rigid_pairs(model: Linkage) -> set[tuple[int, int]]:
    free = null_space(constraints(model), rcond=STILL)
    pairs = set()
    for one, other in combinations(range(len(model.links)), 2):
        places = (joint.at for joint in model.joints)
        apart = [
            np.abs((rate_rows(model, one, at) - rate_rows(model, other, at)) @ free).max(initial=0.0) for at in places
        ]
        if max(apart) < STILL:
            pairs.add((one, other))
    return pairs


def free_links(model: Linkage) -> set[int]:
    rows = [constraints(model)]
    for drive in model.drives:
        at = 0j if drive.joint is None else model.joints[drive.joint].at
        apart = rate_rows(model, drive.link, at) - rate_rows(model, drive.against, at)
        along = None if drive.joint is None else model.joints[drive.joint].direction
        rows.append(apart[2:] if along is None else along.real * apart[0:1] + along.imag * apart[1:2])
    free = null_space(np.vstack(rows), rcond=STILL)
    speeds = np.abs(free).max(axis=1, initial=0.0).reshape(-1, 3).max(axis=1)
    return {link for link, speed in enumerate(speeds) if speed > STILL}


def is_good(linkage: RandomLinkage) -> bool:
    return solve_links(linkage.model).weakest > WEAKEST


def with_bar(model: Linkage, chance: random.Random) -> Linkage:
    """A bar between new pins of two links."""
    one, other = chance.sample(range(len(model.links)), 2)
    new = len(model.links)
    ends = [complex(chance.uniform(0, 300), chance.uniform(0, 300)) for _ in range(2)]
    joints = tuple(
        Joint(kind="pin", first=link, second=new, at=at) for link, at in zip((one, other), ends, strict=True)
    )
    bar = Link(name="bar", kind="link", pins=())
    return replace(model, links=(*model.links, bar), joints=(*model.joints, *joints))


def without_joint(model: Linkage, chance: random.Random) -> Linkage:
    driven = {drive.joint for drive in model.drives}
    gone = chance.choice([number for number in range(len(model.joints)) if number not in driven])
    renumbered = tuple(
        drive if drive.joint is None else replace(drive, joint=drive.joint - (drive.joint > gone))
        for drive in model.drives
    )
    joints = (*model.joints[:gone], *model.joints[gone + 1 :])
    return replace(model, joints=joints, drives=renumbered)


def changed(seed: int) -> Linkage:
    """A random linkage with a bar more or a joint less, at a pose where each rank is clear-cut."""
    model = model_of(random_linkage(seed, is_good).model)
    chance = random.Random(f"fault {seed}")  # noqa: S311 - a repeatable choice, nothing to guard
    for number in range(TRIES):
        other = (with_bar if (seed + number // 10) % 2 else without_joint)(model, chance)
        if is_clear_cut(constraints(other)):
            return other
    pytest.fail(f"no change of linkage {seed} has a clear-cut rank")


@pytest.mark.parametrize("seed", range(1000, 1300))
def test_locked_and_free_are_what_brute_force_finds(seed: int) -> None:
    model = changed(seed)
    result = analyse(model)
    told: set[tuple[int, int]] = set()
    for part in result.locked_parts:
        held = (model.frame, *part.links) if part.with_frame else part.links
        told |= set(combinations(held, 2))
    with_frame = sorted({0, *(link for part in result.locked_parts if part.with_frame for link in part.links)})
    assert told | set(combinations(with_frame, 2)) == rigid_pairs(model)
    if not any(drive.outcome == "at limit" for drive in result.drives):
        assert {link for part in result.free_parts for link in part.links} == free_links(model)
    offered = [
        replace(model.drives[0], link=each.link, against=each.against, joint=each.joint)
        for each in result.settling_drives
    ]
    kinds = ["turn" if each.joint is None else "slide" for each in offered]
    added = tuple(replace(each, kind=kind) for each, kind in zip(offered, kinds, strict=True))  # type: ignore[arg-type]
    settled = analyse(replace(model, drives=(*model.drives, *added)))
    idle = {each.link for each in result.idle_links}
    if added:
        assert {number for number, link in enumerate(settled.links) if not link.determined} == idle
