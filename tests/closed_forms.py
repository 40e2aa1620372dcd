"""Exact answers that owe nothing to the package: poses by circles that meet, rates by the textbook formulas."""

from __future__ import annotations

import cmath
import math

RPM = 2.0 * math.pi / 60.0
"""rad/s of one turn a minute."""


def circles_meet(centre: complex, radius: float, other: complex, other_radius: float, *, left: bool) -> complex:
    """Where two circles meet, on the left or the right of the way from one centre to the other (law of cosines)."""
    way = other - centre
    along = (abs(way) ** 2 + radius**2 - other_radius**2) / (2.0 * abs(way))
    aside = math.sqrt(radius**2 - along**2)
    return centre + way / abs(way) * complex(along, aside if left else -aside)


def four_bar_rates(a: complex, b: complex, c: complex, d: complex, crank: float) -> tuple[float, float]:
    """Rates of coupler BC and rocker DC of the four-bar ABCD whose crank AB turns at a rate.

    omega3 = omega2 (a / b) sin(t4 - t2) / sin(t3 - t4), omega4 = omega2 (a / c) sin(t2 - t3) / sin(t4 - t3).
    Source: Norton, Design of Machinery, eq. 6.18 (from memory).
    """
    t2, t3, t4 = cmath.phase(b - a), cmath.phase(c - b), cmath.phase(c - d)
    coupler = crank * abs(b - a) / abs(c - b) * math.sin(t4 - t2) / math.sin(t3 - t4)
    rocker = crank * abs(b - a) / abs(c - d) * math.sin(t2 - t3) / math.sin(t4 - t3)
    return coupler, rocker


def slotted_lever(pivot: complex, pin: complex, velocity: complex) -> tuple[float, float]:
    """Rate of a slotted lever about its pivot, and the speed along the slot, away from the pivot, of the pin in it.

    With d = pin - pivot, velocity / d has the rate at which d grows in its real part, that at which it turns in its
    imaginary one: the components along and across the lever (Norton, Design of Machinery, sec. 6.7; from memory).
    """
    relative = velocity / (pin - pivot)
    return relative.imag, relative.real * abs(pin - pivot)


def willis(sun: float, ring: float, arm_rate: float, ring_rate: float) -> float:
    """Rate of the sun of a planetary train: (sun - arm) / (ring - arm) = - ring teeth / sun teeth (R. Willis)."""
    return arm_rate - (ring_rate - arm_rate) * ring / sun


def lift_rate(arm: float, foot: float, reach: float, angle: float) -> float:
    """How fast a table on crossed arms rises to a unit rate of its telescope, from the base to a pin of one arm.

    h = arm sin t and e^2 = foot^2 + reach^2 - 2 foot reach cos t (law of cosines), both differentiated.
    """
    length = math.sqrt(foot**2 + reach**2 - 2.0 * foot * reach * math.cos(angle))
    return arm * math.cos(angle) * length / (foot * reach * math.sin(angle))


def slider_crank(
    crank: float, rod: float, offset: float, angle: float, rate: float
) -> tuple[complex, complex, float, float]:
    """Crank pin, slider pin (height ``offset``, on the right), rod rate and slider speed of a crank about the origin.

    r cos t + l cos p = x, r sin t + l sin p = offset, differentiated.
    """
    pin = crank * cmath.exp(1j * angle)
    lean = math.asin((offset - pin.imag) / rod)
    slider = complex(pin.real + rod * math.cos(lean), offset)
    rod_rate = -crank * rate * math.cos(angle) / (rod * math.cos(lean))
    speed = -crank * rate * math.sin(angle) - rod * rod_rate * math.sin(lean)
    return pin, slider, rod_rate, speed
