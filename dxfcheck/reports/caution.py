"""What every report must say of its own limits."""

from __future__ import annotations

__all__ = ["CAUTION"]

CAUTION = (
    "Kinematics at the drawn pose only: no forces, strength, clearance or guarding. "
    "Local codes and licensed practice come first; a qualified person signs the drawing."
)
