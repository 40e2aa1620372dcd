"""Linkages at random that need not move, nor hold: over-constrained, loose and special ones among them."""

from __future__ import annotations

import cmath
import math
import random

from dxfcheck.linkage import Drive, Linkage
from tests.model import Other, linkage

__all__ = ["random_model", "stacked_floors"]

KINDS = ("slide", "pin in slot", "rolling", "full rolling")


def random_model(seed: int, most_links: int = 40, *, coarse: bool = False) -> Linkage:
    """Up to so many moving links that hang together, most joined to links near them, with drives at random.

    ``coarse`` places lie on a grid, so that many lines are parallel and many pins in line.
    """
    chance = random.Random(seed)  # noqa: S311 - a repeatable choice, nothing to guard
    names = ["ground", *[f"k{number}" for number in range(chance.randint(3, most_links))]]
    points: dict[str, complex] = {}
    pins: dict[str, str] = {}
    others: list[Other] = []

    def place() -> complex:
        at = complex(chance.uniform(0, 100), chance.uniform(0, 100))
        return complex(20 * round(at.real / 20), 20 * round(at.imag / 20)) if coarse else at

    def pin(one: str, other: str) -> None:
        name = f"P{len(points)}"
        points[name], pins[name] = place(), f"{one} {other}"

    for number in range(1, len(names)):
        nearby = max(0, number - chance.randint(1, 4))
        pin(names[nearby if chance.random() < 0.8 else chance.randrange(number)], names[number])
    removed, wanted = 2 * len(pins), chance.choice((0.7, 0.9, 1.0, 1.1)) * 3 * (len(names) - 1)
    while removed < wanted:
        one = chance.randrange(len(names))
        other = min(len(names) - 1, max(0, one + chance.randint(-4, 4)))
        if one != other and chance.random() < 0.75:
            pin(names[one], names[other])
        elif one != other:
            angle = chance.randrange(4) * math.pi / 4 if coarse else chance.uniform(0, math.pi)
            others.append((chance.choice(KINDS), place(), names[one], names[other], cmath.rect(1, angle)))  # type: ignore[arg-type]
        removed += 2 * (one != other)
    driven = chance.sample(range(1, len(names)), chance.randint(0, 2))
    drives = [Drive(link=link, against=0, rate=chance.uniform(-3, 3)) for link in driven]
    return linkage(points, pins, others=others, order=names[1:], drives=drives)


def stacked_floors(floors: int, decimals: int | None = None) -> Linkage:
    """Platforms one on another, each on three cranks of which one is redundant; one freedom a floor, all driven."""
    points: dict[str, complex] = {}
    pins: dict[str, str] = {}
    base, turned = 0j, cmath.rect(1.0, 0.3)

    def at(place: complex) -> complex:
        place = place * turned + 17.3
        return place if decimals is None else complex(round(place.real, decimals), round(place.imag, decimals))

    for floor in range(floors):
        crank = cmath.rect(60.0, 1.1 + 0.37 * floor)
        below = "ground" if floor == 0 else f"floor{floor - 1}"
        for number in range(3):
            foot = base + 70 * number + 3.7 * ((5 * floor + number) % 3)
            points[f"F{floor}.{number}"], points[f"T{floor}.{number}"] = at(foot), at(foot + crank)
            pins[f"F{floor}.{number}"] = f"{below} crank{floor}.{number}"
            pins[f"T{floor}.{number}"] = f"crank{floor}.{number} floor{floor}"
        base += crank
    return linkage(points, pins, turn={f"crank{floor}.0": 1.0 for floor in range(floors)})
