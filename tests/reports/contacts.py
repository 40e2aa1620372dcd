"""Solved mechanisms with slides, slots and rolling contacts, small enough to check with a pencil."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from dxfcheck.analysis import analyse
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Linkage
from tests.model import Other, linkage

__all__ = ["gas_spring", "named", "seed_planet", "shuttle_yoke", "slotted_indexer", "soil_roller", "tray_rack"]


def named(model: Linkage, names: Mapping[str, str]) -> MechanismReport:
    """The model solved, its links renamed; what is then called a block is one."""
    links = [replace(link, name=names.get(link.name, link.name)) for link in model.links]
    blocks = [replace(link, kind="block" if link.name.startswith("block") else link.kind) for link in links]
    model = replace(model, links=(replace(blocks[0], name="frame"), *blocks[1:]))
    return MechanismReport(linkage=model, analysis=analyse(model))


def shuttle_yoke() -> MechanismReport:
    """A crank turns at 2 rad/s; its pin at (30, 40) has a block in an upright yoke that slides level on the frame."""
    slides: list[Other] = [("slide", 30 + 40j, "die", "yoke", 1j), ("slide", 30 + 0j, "ground", "yoke", 1 + 0j)]
    pins = {"A": "ground crank", "B": "crank die"}
    model = linkage({"A": 0j, "B": 30 + 40j}, pins, others=slides, turn={"crank": 2.0})
    return named(model, {"crank": "A-B", "die": "block at B", "yoke": "1F"})


def slotted_indexer(*, pin_first: bool = False) -> MechanismReport:
    """Pin B of a crank A-B at 2 rad/s runs in the slot of a lever about C, straight below it."""
    ends = ("crank", "lever") if pin_first else ("lever", "crank")
    slot: list[Other] = [("pin in slot", 30 + 40j, *ends, 1j)]
    pins = {"A": "ground crank", "C": "ground lever"}
    points = {"A": 0j, "B": 30 + 40j, "C": 30 - 60j}
    model = linkage(points, pins, others=slot, turn={"crank": 2.0}, tracing={"B": "crank"})
    at_pin = tuple(replace(joint, pin=2) if joint.kind == "pin in slot" else joint for joint in model.joints)
    return named(replace(model, joints=at_pin), {"crank": "A-B", "lever": "C"})


def gas_spring(rate: float) -> MechanismReport:
    """A lid about D, turned at a rate, with a spring from A to its pin C: |AC| grows by 80 mm a radian."""
    slide: list[Other] = [("slide", 30 + 40j, "tube", "rod", 3 + 4j)]
    pins = {"A": "ground tube", "C": "rod lid", "D": "ground lid"}
    model = linkage({"A": 0j, "C": 60 + 80j, "D": 100 + 0j}, pins, others=slide, turn={"lid": rate})
    return named(model, {"tube": "A", "rod": "C", "lid": "C-D"})


def soil_roller() -> MechanismReport:
    """A wheel of radius 50 on the frame, turning at 2 rad/s clockwise."""
    contact: list[Other] = [("full rolling", 0j, "ground", "wheel", 1 + 0j)]
    return named(linkage({"C": 50j}, {"C": "wheel"}, others=contact, turn={"wheel": -2.0}), {"wheel": "C"})


def seed_planet() -> MechanismReport:
    """Sun of 32, planet of 20, ring of 72 on the frame; the arm turns at 1 rad/s."""
    pins = {"O": "ground arm sun", "X": "arm planet"}
    meshes: list[Other] = [
        ("rolling", 32 + 0j, "planet", "sun", 1j),
        ("rolling", 72 + 0j, "ground", "planet", 1j),
    ]
    model = linkage({"O": 0j, "X": 52 + 0j}, pins, others=meshes, turn={"arm": 1.0})
    return named(model, {"arm": "O-X", "sun": "O", "planet": "X"})


def tray_rack(*, rack_first: bool = False) -> MechanismReport:
    """A wheel of 50 about C at 2 rad/s rolls on a rack 50 below that slides level; its pin D carries a tray."""
    ends = ("rack", "wheel") if rack_first else ("wheel", "rack")
    others: list[Other] = [("rolling", -50j, *ends, 1 + 0j), ("slide", -50j, "ground", "rack", 1 + 0j)]
    points = {"C": 0j, "D": -30 - 50j, "E": 20j}
    tracing = {"D": "rack", "E": "wheel"}
    return named(linkage(points, {"C": "ground wheel"}, others=others, turn={"wheel": 2.0}, tracing=tracing), {})
