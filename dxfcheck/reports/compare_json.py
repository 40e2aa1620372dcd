"""The JSON report of a comparison, version 1; its form is reports/comparison.schema.json.

Lengths and places are in the unit named, on the new sheet, angles in degrees, speeds in rad/s or that unit a second.
What is not known is null, never 0. Keys are only ever added.
"""

from __future__ import annotations

import json
import math
from typing import Any

from dxfcheck import __version__
from dxfcheck.analysis.results import Mobility
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.result import (
    Comparison,
    DriveChange,
    FigureChange,
    MechanismChange,
    PartChange,
    PinMove,
    SpeedChange,
    StatedDrive,
)
from dxfcheck.geometry import Point
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.caution import CAUTION
from dxfcheck.reports.compare_words import verdict_words
from dxfcheck.reports.json_report import finding_as_dict

__all__ = ["comparison_as_dict", "comparison_text"]

Item = dict[str, Any]


def comparison_text(comparison: Comparison) -> str:
    """The comparison as JSON text; ValueError for a figure that is not finite, which no stage lets through."""
    return json.dumps(comparison_as_dict(comparison), indent=1, allow_nan=False) + "\n"


def comparison_as_dict(comparison: Comparison) -> Item:
    """The comparison as a JSON-ready dict."""
    return {
        "tool": {"name": "dxfcheck", "version": __version__},
        "comparison_version": 1,
        "caution": CAUTION,
        "old": _drawing(comparison.old),
        "new": _drawing(comparison.new),
        "verdict": verdict_words(comparison),
        "changed": comparison.changed,
        "beyond_allowance": comparison.beyond,
        "allow_percent": comparison.allow,
        "units": {"length": comparison.unit, "note": comparison.unit_note},
        "tolerance": comparison.tolerance,
        "rounded": comparison.rounded or None,
        "sheet": _motion(comparison.motion),
        "mechanisms": [_mechanism(change) for change in comparison.mechanisms],
        "mechanisms_added": [_part(part) for part in comparison.parts if part.change == "added"],
        "mechanisms_gone": [_part(part) for part in comparison.parts if part.change == "gone"],
        "findings": {
            "new": [finding_as_dict(finding) for finding in comparison.new_findings],
            "cured": [finding_as_dict(finding) for finding in comparison.cured_findings],
        },
    }


def _drawing(report: DrawingReport) -> Item:
    unit = report.unit
    return {
        "path": report.path.encode("utf-8", "replace").decode("utf-8"),
        "units": {"length": unit and unit.name, "source": unit and unit.source},
        "mechanisms": len(report.mechanisms),
    }


def _motion(motion: SheetMotion) -> Item:
    return {
        "turned": math.degrees(motion.angle) + 0.0,
        "moved": _pair(motion.shift),
        "mirrored": motion.mirrored,
        "scale": motion.scale,
    }


def _mechanism(change: MechanismChange) -> Item:
    return {
        "old_name": change.old_name,
        "new_name": change.new_name,
        "changed": change.changed,
        "beyond_allowance": change.beyond,
        "placed": None if change.placed is None else _motion(change.placed),
        "mobility": {"old": _mobility(change.old_mobility), "new": _mobility(change.new_mobility)},
        "parts": [_part(part) for part in change.parts],
        "renamed": [list(names) for names in change.renamed],
        "pins_moved": [_move(move) for move in change.moved],
        "lengths": [_figure_change(each) | {"between": list(each.between)} for each in change.lengths],
        "radii": [_figure_change(each) for each in change.radii],
        "directions": [{"of": each.subject, "old": each.old, "new": each.new} for each in change.turned],
        "drives": [_drive(drive) for drive in change.drives],
        "runs_the_other_way": change.reversed_motion,
        "ratio_to": change.ratio_to or None,
        "speeds_compared": change.speeds_compared,
        "speeds": [_speed(speed) for speed in change.speeds],
        "speeds_within_allowance": [_speed(speed) for speed in change.within],
    }


def _mobility(mobility: Mobility) -> Item:
    return {
        "count": mobility.count,
        "links": mobility.links,
        "full_joints": mobility.full_joints,
        "half_joints": mobility.half_joints,
        "at_pose": mobility.at_pose,
    }


def _part(part: PartChange) -> Item:
    return {
        "what": part.what,
        "change": part.change,
        "name": part.subject,
        "detail": part.detail,
        "at": _pair(part.at),
    }


def _move(move: PinMove) -> Item:
    return {"name": move.subject, "old": _pair(move.old), "new": _pair(move.new), "by": _pair(move.by)}


def _figure_change(change: FigureChange) -> Item:
    return {
        "of": change.subject,
        "old": change.old,
        "new": change.new,
        "difference": change.difference,
        "percent": change.percent,
    }


def _drive(drive: DriveChange) -> Item:
    return {
        "of": drive.subject,
        "kind": drive.kind,
        "old": _stated(drive.old),
        "new": _stated(drive.new),
        "beyond_allowance": drive.beyond,
    }


def _stated(drive: StatedDrive | None) -> Item | None:
    return None if drive is None else {"rate": drive.rate, "source": drive.source, "stated": drive.stated}


def _speed(speed: SpeedChange) -> Item:
    known = speed.old is not None and speed.new is not None
    item: Item = {
        "quantity": speed.quantity,
        "of": speed.subject,
        "old": speed.old,
        "new": speed.new,
        "difference": (speed.new or 0.0) - (speed.old or 0.0) if known else None,
        "percent": speed.percent,
    }
    if speed.quantity == "pin speed":
        item |= {"old_velocity": _pair(speed.old_velocity), "new_velocity": _pair(speed.new_velocity)}
    return item


def _pair(point: Point | None) -> list[float] | None:
    """A point as [x, y]; adding 0 makes a negative zero a plain one."""
    return None if point is None else [point.real + 0.0, point.imag + 0.0]
