"""Pin-jointed linkages at general poses that several tests share: points and pins for tests.model.linkage."""

from __future__ import annotations

FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "ground rocker"}
FOUR_BAR_POINTS = {"A": 0j, "B": 20 + 35j, "C": 160 + 80j, "D": 150 + 0j}

WATT = {
    "A": "ground l2",
    "B": "l2 l3",
    "C": "l3 l4",
    "D": "ground l4",
    "E": "l4 l5",
    "F": "l5 l6",
    "G": "ground l6",
}
WATT_POINTS = {
    "A": 0j,
    "B": 20 + 35j,
    "C": 100 + 70j,
    "D": 120 + 0j,
    "E": 150 + 60j,
    "F": 230 + 90j,
    "G": 240 + 0j,
}

STEPHENSON = {
    "A": "ground crank",
    "B": "crank coupler",
    "C": "coupler rocker",
    "D": "ground rocker",
    "E": "coupler rod",
    "F": "rod lever",
    "G": "ground lever",
}
"""Driven at its lever, no pin's place follows from two known ones: all loops must be solved at once."""
STEPHENSON_POINTS = {
    "A": 0j,
    "B": 30 + 45j,
    "C": 130 + 80j,
    "D": 150 - 10j,
    "E": 70 + 120j,
    "F": 190 + 140j,
    "G": 230 + 30j,
}

STRAIGHT_LINE = {
    "O": "ground la lb",
    "Q": "ground crank",
    "P": "crank r1 r2",
    "A": "la r1 r3",
    "B": "lb r2 r4",
    "R": "r3 r4",
}
"""Eight links; four pins join three links each."""
STRAIGHT_LINE_POINTS = {
    "O": 0j,
    "Q": 60 + 0j,
    "P": 105.963 + 38.5673j,
    "A": 93.1888 + 117.541j,
    "B": 146.941 - 30.1409j,
    "R": 134.167 + 48.8327j,
}
