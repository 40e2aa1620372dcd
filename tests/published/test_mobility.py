"""Published mobility counts; the coordinates are ours, a general pose of the published arrangement."""

from __future__ import annotations

from typing import NamedTuple

import pytest

from dxfcheck.analysis import analyse
from tests.model import Other, linkage


class Case(NamedTuple):
    """Published counts and our freedom at the pose; ``source`` says whether it was seen or is from memory."""

    source: str
    points: str
    pins: str
    counts: tuple[int, int, int]
    mobility: int
    at_pose: int
    others: tuple[Other, ...] = ()


SIX_BAR_POINTS = "A 0 0; B 20 35; C 100 70; D 120 0; E 150 60; F 230 90; G 240 0"
SIX_BAR_PINS = "A ground l2; B l2 l3; C l3 l4; D ground l4; E l4 l5; F l5 l6; G ground l6"
FIVE_LINKS = "A ground a; B a b; C b c; D ground c; E b d; F ground d"
EPICYCLIC: tuple[Other, ...] = (("rolling", 32 + 0j, "sun", "planet", 1j),)

CASES = {
    "M01 four-bar": Case(
        "R.L. Norton, Design of Machinery, solution manual problem 2-1 a (seen)",
        "A 0 0; B 20 34.641; C 163.327 78.8821; D 150 0",
        "A ground crank; B crank coupler; C coupler rocker; D ground rocker",
        (4, 4, 0),
        1,
        1,
    ),
    "M02 slider-crank": Case(
        "K. Lynch & F. Park, Modern Robotics (2017), sec. 2.2 (from memory)",
        "O 0 0; B 35.3553 35.3553; P 232.206 0",
        "O ground crank; B crank rod; P rod block",
        (4, 4, 0),
        1,
        1,
        (("slide", 232.206 + 0j, "ground", "block", 1 + 0j),),
    ),
    "M03 six-bar": Case(
        "R.L. Norton, Kinematics and Dynamics of Machinery, solution manual problem 2-49 (seen)",
        SIX_BAR_POINTS,
        SIX_BAR_PINS,
        (6, 7, 0),
        1,
        1,
    ),
    "M05 pin in slot": Case(
        "R.L. Norton, solution manual problem 2-7 b (seen)",
        "O 0 0; C 450 -225",
        "O ground a; C ground b",
        (3, 2, 1),
        1,
        1,
        (("pin in slot", 225 - 225j, "b", "a", 1 - 1j),),
    ),
    "M06 structure with a half joint": Case(
        "R.L. Norton, solution manual problem 2-7 a / 2-8 a (seen)",
        SIX_BAR_POINTS,
        SIX_BAR_PINS,
        (6, 7, 1),
        0,
        0,
        (("pin in slot", 60 + 52.5j, "ground", "l3", 1 + 3j),),
    ),
    "M09 telescoping arm": Case(
        "R.L. Norton, solution manual problem 2-1 b (seen)",
        "A 0 0; B 80 40; C 60 -50",
        "A ground hatch; B hatch rod; C ground tube",
        (4, 4, 0),
        1,
        1,
        (("slide", 70 - 5j, "rod", "tube", 20 + 90j),),
    ),
    "M11 open arm": Case(
        "B. Fabien, Analytical System Dynamics, Example 2.9 (seen)",
        "A 0 0; B 100 50",
        "A ground l2; B l2 l3",
        (3, 2, 0),
        2,
        2,
    ),
    "M12 triangle of bars": Case(
        "R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 5 (from memory)",
        "A 0 0; B 50 80; C 100 0",
        "A ground a; B a b; C ground b",
        (3, 3, 0),
        0,
        0,
    ),
    "M13 five-bar": Case(
        "R.S. Khurmi & J.K. Gupta, Theory of Machines, ch. 5; Modern Robotics sec. 2.2 (from memory)",
        "A 0 0; B -20 70; C 60 120; D 140 60; E 110 0",
        "A ground a; B a b; C b c; D c d; E ground d",
        (5, 5, 0),
        2,
        2,
    ),
    "M14 five links, six pins": Case(
        "R.S. Khurmi & J.K. Gupta, Theory of Machines, ch. 5; R.L. Norton sec. 2.8, E-quintet (from memory)",
        "A 0 0; B 30 60; C 110 75; D 100 0; E 70 90; F 55 5",
        FIVE_LINKS,
        (5, 6, 0),
        0,
        0,
    ),
    "M15 double parallelogram": Case(
        "K. Lynch & F. Park, Modern Robotics sec. 2.2, redundant crank; R.L. Norton sec. 2.8 (from memory)",
        "A 0 0; B 30 60; C 130 60; D 100 0; E 80 60; F 50 0",
        FIVE_LINKS,
        (5, 6, 0),
        0,
        1,
    ),
    "M16 six links, eight pins": Case(
        "R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 5 (from memory)",
        "A 0 0; B 10 70; C 90 80; D 100 0; E 40 85; F 150 60; G 60 10; H 160 0",
        "A ground a; B a b; C b c; D ground c; E b d; G ground d; F c e; H ground e",
        (6, 8, 0),
        -1,
        0,
    ),
    "M17 straight-line linkage of eight links": Case(
        "J.J. Uicker, G.R. Pennock & J.E. Shigley, Theory of Machines and Mechanisms, mobility figures (from memory)",
        "O 0 0; Q 60 0; P 105.963 38.5673; A 93.1888 117.541; B 146.941 -30.1409; R 134.167 48.8327",
        "O ground la lb; Q ground crank; P crank r1 r2; A la r1 r3; B lb r2 r4; R r3 r4",
        (8, 10, 0),
        1,
        1,
    ),
    "M19 yoke": Case(
        "R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 5, double slider crank (from memory)",
        "O 0 0; A 30 40",
        "O ground crank; A crank die",
        (4, 4, 0),
        1,
        1,
        (("slide", 30 + 40j, "die", "yoke", 1j), ("slide", 30 + 0j, "ground", "yoke", 1 + 0j)),
    ),
    "M20 cam with roller follower": Case(
        "rule F = 3 (l - 1) - 2 j - h (seen), the roller example as in textbooks (from memory); one is the idle "
        "spin of the roller. The contact holds across its tangent, as a pin in a slot does",
        "O 0 0; R 40 30",
        "O ground cam; R roller follower",
        (4, 3, 1),
        2,
        2,
        (("pin in slot", 28 + 21j, "cam", "roller", -0.6 + 0.8j), ("slide", 40 + 60j, "ground", "follower", 1j)),
    ),
    "M21 planetary, three central members free": Case(
        "R.L. Norton ch. 9 / J.E. Shigley (from memory)",
        "O 0 0; X 52 0",
        "O ground arm sun ring; X arm planet",
        (5, 4, 2),
        2,
        2,
        (*EPICYCLIC, ("rolling", 72 + 0j, "planet", "ring", 1j)),
    ),
    "M22 planetary, ring fixed": Case(
        "as M21 with the ring grounded (from memory)",
        "O 0 0; X 52 0",
        "O ground arm sun; X arm planet",
        (4, 3, 2),
        1,
        1,
        (*EPICYCLIC, ("rolling", 72 + 0j, "ground", "planet", 1j)),
    ),
    "M23 wheel rolling on the ground": Case(
        "B. Fabien, Analytical System Dynamics, p. 70 (seen): one freedom in pure rolling, a full joint",
        "C 0 50",
        "C wheel",
        (2, 1, 0),
        1,
        1,
        (("full rolling", 0j, "ground", "wheel", 1 + 0j),),
    ),
}


@pytest.mark.parametrize("name", CASES)
def test_published_count(name: str) -> None:
    case = CASES[name]
    points = {word[0]: complex(float(word[1]), float(word[2])) for word in map(str.split, case.points.split(";"))}
    pins = {word[0]: " ".join(word[1:]) for word in map(str.split, case.pins.split(";"))}
    mobility = analyse(linkage(points, pins, others=case.others)).mobility
    assert (mobility.links, mobility.full_joints, mobility.half_joints) == case.counts, case.source
    assert mobility.count == case.mobility, case.source
    assert mobility.at_pose == case.at_pose, case.source
    assert mobility.redundant == max(0, case.at_pose - case.mobility)
