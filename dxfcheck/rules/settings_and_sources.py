"""Words that the explanations of several rules share: settings that change what they find, and published sources."""

from __future__ import annotations

__all__ = [
    "BLOCK_REFERENCES",
    "CONSTRUCTION",
    "DRIVES",
    "FRAME",
    "GEARING",
    "MOBILITY",
    "PART_BLOCKS",
    "PITCH",
    "PLANES",
    "SYMBOLS",
    "TOLERANCE",
    "UNITS",
]

CONSTRUCTION = "reading.layers.construction"
DRIVES = "drives, or --drive"
FRAME = "reading.frame-pins, or --frame; reading.layers.frame"
PART_BLOCKS = "reading.part-blocks"
PITCH = "reading.layers.pitch"
TOLERANCE = "reading.tolerance, or --tolerance"
UNITS = "reading.units, or --units"

BLOCK_REFERENCES = "block references (DXF Reference, INSERT group codes 41 to 45, 70 and 71, from memory)"
GEARING = "the fundamental law of gearing: Norton, Design of Machinery, ch. 9 (from memory)"
MOBILITY = "Grübler's and Kutzbach's count: Norton, Design of Machinery, ch. 2 (from memory)"
PLANES = "object coordinate systems (DXF Reference, group codes 210 to 230, from memory)"
SYMBOLS = "symbols of kinematic diagrams: ISO 3952-1 (from memory)"
