"""How the hand working names things: velocities, omega x r, speeds along slides; and vectors in figures.

v_C is the velocity of pin C against the frame, v_C/B that against pin B; r_C/B leads from B to C. v_C(A-B) is that of
the point of link A-B that lies at C; u(block at C) the speed of the block along its slide.
"""

from __future__ import annotations

import cmath
import math
from dataclasses import dataclass

from dxfcheck.analysis.by_hand.closure import Chain, Term
from dxfcheck.analysis.by_hand.solved_linkage import SolvedLinkage
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.reports.terminal_layout import figure
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["Names", "names_of", "rotation"]


def rotation(omega: float) -> str:
    """An angular velocity with its sense; '0 rad/s' has none."""
    return f"{figure(abs(omega))} rad/s {'ccw' if omega > 0.0 else 'cw'}" if omega else "0 rad/s"


@dataclass(frozen=True, slots=True)
class Names:
    """The names of one linkage's places and quantities, and what of its figures is rounding noise."""

    solved: SolvedLinkage
    unit: str
    pins: dict[Point, int]
    contacts: dict[Point, str]
    turning_noise: float

    @property
    def linkage(self) -> Linkage:
        """The linkage whose names these are."""
        return self.solved.linkage

    @property
    def noise(self) -> float:
        """Speeds up to this, length units a second, are shown as 0."""
        return SHOWN_AS_ZERO * self.solved.fastest

    def link(self, number: int) -> str:
        """A link's name; one without pins is named by a mere handle."""
        link = self.linkage.links[number]
        return link.name if link.pins or link.kind == "frame" else f"link {link.name}"

    def omega(self, number: int) -> str:
        """'omega(A-B)'."""
        return f"omega({self.link(number)})"

    def turning(self, number: int) -> float:
        """A link's angular velocity, rad/s; exactly 0 where it is rounding noise beside the fastest link's."""
        omega = self.solved.turns[number]
        return 0.0 if abs(omega) <= self.turning_noise else omega

    def pin_at(self, place: Point) -> int | None:
        """The pin that lies at a place."""
        if place in self.pins:
            return self.pins[place]
        near = SHOWN_AS_ZERO * self.solved.reach
        return next((number for number, pin in enumerate(self.linkage.pins) if abs(pin.at - place) <= near), None)

    def place(self, place: Point) -> str:
        """The pin's name, that of a rolling contact (K1, K2, ...), or the coordinates where neither lies."""
        pin = self.pin_at(place)
        return self.contacts.get(place, self.point(place)) if pin is None else self.linkage.pins[pin].name

    def point(self, place: Point) -> str:
        """Coordinates; what is noise beside the mechanism's size is 0."""
        least = SHOWN_AS_ZERO * self.solved.reach
        return f"({figure(place.real, least)}, {figure(place.imag, least)})"

    def components(self, velocity: Point) -> str:
        """'(vx, vy)' in figures."""
        return f"({figure(velocity.real, self.noise)}, {figure(velocity.imag, self.noise)})"

    def towards(self, vector: Point) -> str:
        """Degrees from +x, above -180 up to 180; '-' for a vector without length."""
        size = abs(vector)
        if not size:
            return "-"
        upward = 0.0 if abs(vector.imag) <= SHOWN_AS_ZERO * size else vector.imag
        return figure(math.degrees(cmath.phase(complex(vector.real, upward))), SHOWN_AS_ZERO)

    def speed(self, velocity: Point) -> str:
        """'600 mm/s towards 150 deg'."""
        size = abs(velocity)
        if size <= self.noise:
            return "0"
        return f"{figure(size)} {self.unit}/s towards {self.towards(velocity)} deg"

    def arm(self, term: Term) -> str:
        """'r_C/B' of a term that turns."""
        return f"r_{self.place(term.end)}/{self.place(term.start or 0j)}"

    def slider(self, term: Term) -> tuple[int, int]:
        """The link that slides, as a term counts the speed, and the one it slides on."""
        joint = self.linkage.joints[term.number]
        return slider_of(joint, term.factor)

    def written(self, term: Term) -> str:
        """The term as it stands in an equation: 'v_B', 'omega(B-C) x r_C/B', 'u(block at C)'."""
        if term.kind == "turn":
            return f"{self.omega(term.number)} x {self.arm(term)}"
        return self.velocity_name(term)

    def sliding(self, term: Term) -> str:
        """What slides on what, and along which line."""
        link, other = self.slider(term)
        joint = self.linkage.joints[term.number]
        base = "the frame" if other == self.linkage.frame else self.link(other)
        what = f"{self.link(link)} slides on {base}"
        if joint.kind == "pin in slot" and joint.pin in self.linkage.links[link].pins:
            what = f"pin {self.place(joint.at)} of {self.link(link)} slides in the slot of {base}"
        return f"{self.velocity_name(term)}: {what}, towards {self.towards(joint.direction or 0j)} deg or back"

    def sliding_positive(self, number: int, link: int) -> str:
        """Which way the speed along a slide, as that of ``link`` against the joint's other link, counts positive."""
        joint = self.linkage.joints[number]
        along = (joint.direction or 0j) * (1.0 if link == joint.second else -1.0)
        other = joint.first if link == joint.second else joint.second
        base = "the frame" if other == self.linkage.frame else self.link(other)
        return f"u({self.link(link)}): {self.link(link)} against {base}, positive towards {self.towards(along)} deg"

    def velocity_name(self, term: Term) -> str:
        """The velocity that a term is: 'v_B', 'v_C/B', 'u(block at C)'."""
        if term.kind == "turn":
            return f"v_{self.place(term.end)}/{self.place(term.start or 0j)}"
        if term.kind == "known":
            own = self.linkage.links[term.number].pins
            pin = self.pin_at(term.end)
            return f"v_{self.place(term.end)}" + ("" if pin in own else f"({self.link(term.number)})")
        return f"{'u' if term.kind == 'slide' else 'n'}({self.link(self.slider(term)[0])})"

    def moving(self, chain: Chain) -> list[Term]:
        """The terms of a chain but for known ones at rest."""
        return [term for term in chain if term.kind != "known" or abs(term.vector) > self.noise]

    def chain(self, chain: Chain) -> str:
        """A chain's terms as a sum; '0' where all it starts from rests and nothing follows."""
        return " + ".join(map(self.written, self.moving(chain))) or "0"


def names_of(solved: SolvedLinkage, unit: str) -> Names:
    """The names of a solved linkage; its rolling contacts are K1, K2, ..., KK1, ... where pins are named so."""
    letter = "KK" if any(pin.name.startswith("K") for pin in solved.linkage.pins) else "K"
    contacts = [joint.at for joint in solved.linkage.joints if joint.kind == "rolling"]
    return Names(
        solved=solved,
        unit=unit,
        pins={pin.at: number for number, pin in enumerate(solved.linkage.pins)},
        contacts={place: f"{letter}{number}" for number, place in enumerate(contacts, start=1)},
        turning_noise=SHOWN_AS_ZERO * max(map(abs, solved.turns)),
    )


def slider_of(joint: Joint, factor: Point) -> tuple[int, int]:
    """The second link against the first where the factor runs along the joint's direction, else the other way round."""
    along = dot(factor, joint.direction or 0j) >= 0.0
    return (joint.second, joint.first) if along else (joint.first, joint.second)
