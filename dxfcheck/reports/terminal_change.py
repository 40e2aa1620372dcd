"""What changed in one mechanism, on the terminal."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from dxfcheck.analysis.results import Mobility
from dxfcheck.comparison.result import DriveChange, FigureChange, MechanismChange, PinMove, SpeedChange, StatedDrive
from dxfcheck.reports.compare_words import motion_words
from dxfcheck.reports.terminal_layout import (
    NOT_APPLICABLE,
    UNKNOWN,
    Column,
    Line,
    count_of,
    figure,
    figure_column,
    fold,
    listed,
    place,
    table,
)
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["change_lines"]

LABEL = "  {:<10}"
INDENT = " " * 12
ROWS_SHOWN = 60
"""So many rows of one table are shown."""


def change_lines(change: MechanismChange, unit: str, allow: float, width: int) -> list[Line]:
    """Heading, what is to be said in words, and a table each of pins, lengths and speeds that changed."""
    called = change.new_name if change.old_name == change.new_name else f"{change.new_name} ({change.old_name} in OLD)"
    lines = [Line(called, "bold")]
    for label, text in _facts(change, unit, allow):
        lines += map(Line, fold(text, width, LABEL.format(label), INDENT))
    for columns in _tables(change, unit):
        lines += [*([Line("")] if len(lines) > 1 else []), *table(columns, width)]
    lines += _cut_short(change)
    return lines


def _facts(change: MechanismChange, unit: str, allow: float) -> Iterator[tuple[str, str]]:
    if change.placed is not None:
        yield "on sheet", f"lies elsewhere than the rest of the sheet: {motion_words(change.placed)}"
    if change.mobility_changed:
        yield "mobility", f"{_mobility(change.old_mobility)} -> {_mobility(change.new_mobility)}"
    for part in change.parts:
        at = "" if part.at is None else f", at {place(part.at)}"
        yield part.what, f"{part.subject} {part.change}" + (f": {part.detail}" if part.detail else "") + at
    for turned in change.turned:
        yield "direction", f"{turned.subject}: {figure(turned.old)} -> {figure(turned.new)} deg"
    for (old, new), pins in _by_radius(change.radii).items():
        yield "ring", f"{listed(pins)}: radius {old} -> {new} {unit}"
    if change.renamed:
        yield "labels", ", ".join(f"{old} -> {new}" for old, new in change.renamed)
    for drive in change.drives:
        yield "drive", _drive(drive, unit)
    yield from _sense(change)
    if change.other_pose:
        yield "pose", "the same links at another pose: no length changed"
    if change.within:
        most = max((abs(speed.percent) for speed in change.within if speed.percent is not None), default=None)
        by = "" if most is None else f", by {most:.2g} % at most"
        yield "within", f"{count_of(len(change.within), 'speed')} changed by less than {allow:g} %{by}"


def _by_radius(radii: Sequence[FigureChange]) -> dict[tuple[str, str], list[str]]:
    """The pins whose rings changed alike, by both radii."""
    groups: dict[tuple[str, str], list[str]] = {}
    for radius in radii:
        groups.setdefault((figure(radius.old), figure(radius.new)), []).append(radius.subject)
    return groups


def _sense(change: MechanismChange) -> Iterator[tuple[str, str]]:
    """Whether it runs the other way, and what the speeds are ratios to."""
    if change.turned_round:
        below = "; the speeds below are compared as if it did not" if change.speeds or change.within else ""
        yield "sense", f"it runs the other way{below}"
    elif change.reversed_motion:
        yield "sense", "its drives state the same sense as before, so it runs the other way than its mirror image would"
    if change.ratio_to and (change.speeds or change.within):
        yield "ratios", f"no drive is stated in either drawing: the speeds are ratios to {change.ratio_to}"


def _mobility(mobility: Mobility) -> str:
    formula = f"M = 3 x ({mobility.links} - 1) - 2 x {mobility.full_joints} - {mobility.half_joints}"
    return f"{formula} = {mobility.count}, {count_of(mobility.at_pose, 'freedom')} at the pose"


def _drive(drive: DriveChange, unit: str) -> str:
    if drive.old is None or drive.new is None:
        only = drive.new or drive.old
        rate = "" if only is None else f": {_stated(only, drive.kind, unit)}"
        return f"{drive.subject} {'driven in OLD only' if drive.new is None else 'driven in NEW only'}{rate}"
    return f"{drive.subject}: {_stated(drive.old, drive.kind, unit)} -> {_stated(drive.new, drive.kind, unit)}"


def _stated(drive: StatedDrive, kind: str, unit: str) -> str:
    rate = f"{figure(drive.rate)} {'rad/s' if kind == 'turn' else f'{unit}/s'}"
    return f"{rate} (assumed)" if drive.source == "assumed" else rate


def _tables(change: MechanismChange, unit: str) -> Iterator[list[Column]]:
    if change.moved:
        yield _moved(change.moved[:ROWS_SHOWN], unit)
    if change.lengths:
        yield _lengths(change.lengths[:ROWS_SHOWN], unit)
    turning = [speed for speed in change.speeds if speed.quantity == "turning"]
    along = [speed for speed in change.speeds if speed.quantity != "turning"]
    if turning:
        yield _speeds("turning", turning[:ROWS_SHOWN], "rad/s")
    if along:
        yield _speeds("speed", along[:ROWS_SHOWN], f"{unit}/s")


def _cut_short(change: MechanismChange) -> list[Line]:
    sizes = (len(change.moved), len(change.lengths), len(change.speeds))
    return [Line(f"  only {ROWS_SHOWN} rows of a table are shown; --json has all")] if max(sizes) > ROWS_SHOWN else []


def _moved(moved: Sequence[PinMove], unit: str) -> list[Column]:
    """By how much each pin moved, and where it is now."""
    return [
        Column("moved", "", [move.subject for move in moved], numeric=False),
        figure_column("dx", unit, [_signed(move.by.real, abs(move.by)) for move in moved]),
        figure_column("dy", unit, [_signed(move.by.imag, abs(move.by)) for move in moved]),
        figure_column("by", unit, [abs(move.by) for move in moved]),
        figure_column("x now", unit, [move.new.real for move in moved], SHOWN_AS_ZERO * abs(moved[0].new)),
        figure_column("y now", unit, [move.new.imag for move in moved], SHOWN_AS_ZERO * abs(moved[0].new)),
    ]


def _lengths(lengths: Sequence[FigureChange], unit: str) -> list[Column]:
    """The distances between pins of one link."""
    return [
        Column("length", "", ["-".join(each.between) for each in lengths], numeric=False),
        Column("of", "", [each.subject for each in lengths], numeric=False),
        figure_column("old", unit, [each.old for each in lengths]),
        figure_column("new", unit, [each.new for each in lengths]),
        figure_column("change", unit, [_signed(each.difference) for each in lengths]),
        figure_column("", "%", [_percent(each.percent) for each in lengths]),
    ]


def _speeds(title: str, speeds: Sequence[SpeedChange], unit: str) -> list[Column]:
    noise = SHOWN_AS_ZERO * max(max(abs(each.old or 0.0), abs(each.new or 0.0)) for each in speeds)
    names = [_speed_name(each) for each in speeds]
    return [
        Column(title, "", names, numeric=False),
        figure_column("old", unit, [each.old for each in speeds], noise),
        figure_column("new", unit, [each.new for each in speeds], noise),
        figure_column("change", unit, [_difference(each, noise) for each in speeds]),
        figure_column("", "%", [_speed_percent(each, noise) for each in speeds]),
    ]


def _speed_name(speed: SpeedChange) -> str:
    prefix = {"turning": "", "pin speed": "pin ", "sliding": "sliding, ", "rubbing": "rubbing at "}[speed.quantity]
    return prefix + speed.subject


def _difference(speed: SpeedChange, noise: float) -> str:
    if speed.old is None or speed.new is None:
        return "not known in OLD" if speed.old is None else "not known in NEW"
    return _signed(speed.new - speed.old, noise=noise)


def _speed_percent(speed: SpeedChange, noise: float) -> str:
    if speed.old is None or speed.new is None:
        return UNKNOWN
    return NOT_APPLICABLE if abs(speed.old) <= noise else _percent(speed.percent)


def _signed(value: float, beside: float = 0.0, *, noise: float = 0.0) -> str:
    """A difference with its sign; 0 where it is noise, as such or beside another figure."""
    text = figure(value, max(noise, SHOWN_AS_ZERO * beside))
    return f"+{text}" if value > 0 and text != "0" else text


def _percent(value: float | None) -> str:
    return NOT_APPLICABLE if value is None else f"{value:+.3g}"
