"""Rules on the linework of the links: ends, doubled lines, pins and their labels."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from dxfcheck.geometry import Point
from dxfcheck.linkage import Pin
from dxfcheck.reading.reading import Observation
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import at_pin, figured, finding, moved, of_linkages, snap_place
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import SYMBOLS, TOLERANCE
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length, listed, place, plural
from dxfcheck.tolerances.findings import DOUBLES_TOLD
from dxfcheck.tolerances.sheet import PLACES_NAMED

__all__: list[str] = []


def _of_link(seen: Observation) -> str:
    return f"an end of link {seen.subject}" if seen.subject else "an end of a line"


@rule(
    "near-miss",
    "error",
    "An end that just misses what it should join",
    family="linework",
    also=("warning",),
    looks_for="An end that points at a pin and stops up to two ring diameters short of its rim, or stops between the "
    "coincidence tolerance and a thousandth of the sheet's diagonal short of other linework or past it (error); an "
    "end that runs up to two ring diameters past the centre of a pin, which is read as pinned there (warning).",
    matters="What does not meet is not joined: the link is missing from the loop, and the mobility count and all "
    "speeds are those of another mechanism.",
    remedy="Snap the end to the pin's centre or rim, or to the line it belongs to; the finding gives the place.",
    settings=TOLERANCE,
)
def near_miss(subject: RuleSubject) -> Iterator[Finding]:
    """Ends that stop short of a pin or a weld, or run past a pin."""
    for seen in of_linkages(subject, "near-miss"):
        unit = subject.sketch.unit
        message = f"{_of_link(seen)} {seen.detail.format(amount=length(seen.amount or 0.0, unit))}"
        tolerance = subject.reading.tolerance
        if seen.case in TO_TRIM and seen.snap is not None and seen.at is not None:
            by = length(abs(seen.snap - seen.at), unit)
            remedy = f"trim it by {by} to {snap_place(seen.snap, tolerance)}"
            remedy += ", or let it run on further if it is meant to" if seen.case == "past" else ""
        else:
            limit = length(seen.limit or 0.0, unit)
            remedy = f"{moved(seen, 'the end', tolerance)} (within {limit} it counts as meeting)"
        yield finding(seen, "error", message, remedy)


TO_TRIM = frozenset({"past", "overshoot"})
"""Cases of a near miss in which the line is too long, not too short."""


@rule(
    "off-centre-end",
    "warning",
    "A line at a pin that does not aim at its centre",
    family="linework",
    looks_for="An end that lands on a pin but points past its centre by more than 2 % of the ring's radius; a line "
    "that runs through a ring less than a quarter of its radius off the centre, and is therefore not pinned there.",
    matters="The link as drawn and the pin it turns on disagree: its true length is not the one that is drawn.",
    remedy="Draw the line on the pin's centre, or move the ring onto the line; the finding gives the place.",
    settings=TOLERANCE,
)
def off_centre_end(subject: RuleSubject) -> Iterator[Finding]:
    """Ends and lines that pass the centre of the pin they are on."""
    for seen in of_linkages(subject, "off-centre-end"):
        amount = length(seen.amount or 0.0, subject.sketch.unit)
        line = f"link {seen.subject}" if seen.subject else "a frame line" if seen.case == "frame" else "a line"
        ends = seen.case == "end"
        message = f"{_of_link(seen) if ends else line} {seen.detail.format(amount=amount)}"
        move = moved(seen, "the end" if ends else "the ring", subject.reading.tolerance)
        other = "so that it aims at the centre" if ends else "or draw the line through the ring's centre"
        yield finding(seen, "warning", message, f"{move}, {other}")


@rule(
    "loose-end",
    "warning",
    "An end on nothing",
    family="linework",
    also=("note",),
    looks_for="An end of a link that lands on no pin and meets no other line: a warning where the link has fewer than "
    "two joints, a note where it may be the free end of a lever.",
    matters="A joint or a weld may have been forgotten; the link then swings free in the count.",
    remedy="Put a ring on the end, join it to its neighbour, or leave it if the lever really ends there.",
    settings=TOLERANCE,
)
def loose_end(subject: RuleSubject) -> Iterator[Finding]:
    """Free ends of links."""
    for seen in of_linkages(subject, "loose-end"):
        if seen.severity == "note":
            message = f"{_of_link(seen)} is free: read as the free end of a lever"
            remedy = "nothing, if the lever ends there; else put a pin or its neighbour there"
        else:
            message = f"{_of_link(seen)} ends on nothing, and the link has fewer than two joints"
            remedy = "put a ring on it if it is pinned there, or join it to the line it belongs to"
        yield finding(seen, "warning", message, remedy)


@rule(
    "double-line",
    "warning",
    "A line drawn twice",
    family="linework",
    looks_for="Linework that lies on other linework between the same pins, or with the same two ends in one link. It "
    "is read once; three or more such lines are one finding, as when a drawing was pasted onto itself. Where it lies "
    "only nearly on the other, by less than the pin's radius, they are read as two links.",
    matters="Read as two links, they make the count one less than it is; the next program may read them so.",
    remedy="Delete one of the two.",
    settings=TOLERANCE,
)
def double_line(subject: RuleSubject) -> Iterator[Finding]:
    """Repeated lines of links: many at once are one finding, two links nearly on one another one each."""
    doubles = list(of_linkages(subject, "double-line"))
    repeated = [seen for seen in doubles if seen.amount is None]
    if len(repeated) > DOUBLES_TOLD:
        yield _many_doubles(subject, repeated)
        repeated = []
    for seen in repeated:
        message = f"a line of link {seen.subject} is drawn twice; it is read once"
        yield finding(seen, "warning", message, f"delete one of the two ({', '.join(seen.handles)})")
    for seen in doubles:
        if seen.amount is not None:
            apart = length(seen.amount, subject.sketch.unit)
            message = f"link {seen.subject} lies within {apart} of another between the same pins; read as two links"
            yield finding(seen, "warning", message, f"delete one of the two ({', '.join(seen.handles)})")


def _many_doubles(subject: RuleSubject, repeated: Sequence[Observation]) -> Finding:
    """One finding for a drawing in which line after line is there twice."""
    links = listed(list(dict.fromkeys(seen.subject for seen in repeated)), 3)
    moving = [link for linkage, _ in subject.mechanisms for link in linkage.links if link.kind != "frame"]
    every = {handle for link in moving for handle in link.handles}
    copies = {seen.handles[0] for seen in repeated}
    pasted = 2 * len(copies) >= len(every - {""})
    whole = "; the drawing seems to be pasted onto itself" if pasted else ""
    mechanisms = {seen.mechanism for seen in repeated}
    return Finding(
        rule="double-line",
        severity="warning",
        message=f"{len(repeated)} lines of links ({links}) are drawn twice; each is read once{whole}",
        remedy=f"delete the second copies ({listed(sorted(copies), 3)})",
        at=repeated[0].at,
        handles=tuple(dict.fromkeys(seen.handles[0] for seen in repeated[:PLACES_NAMED])),
        layer=repeated[0].layer,
        mechanism=mechanisms.pop() if len(mechanisms) == 1 else None,
    )


@rule(
    "short-line",
    "note",
    "A speck of a line",
    family="linework",
    looks_for="A line on the linkage that is shorter than ten coincidence tolerances.",
    matters="It is left over from trimming; it is no link, but it can keep two lines from meeting.",
    remedy="Delete it.",
    settings=TOLERANCE,
)
def short_line(subject: RuleSubject) -> Iterator[Finding]:
    """Lines too short to be links."""
    for seen in of_linkages(subject, "short-line"):
        amount = length(seen.amount or 0.0, subject.sketch.unit)
        yield finding(
            seen, "note", f"a line only {amount} long lies on the linkage; it is not read as a link", "delete it"
        )


@rule(
    "stacked-pins",
    "warning",
    "Two pins on one another",
    family="linework",
    looks_for="Two rings whose centres lie nearer than the radius of the greater, but further than the coincidence "
    "tolerance.",
    matters="Two rings meant as one pin split the joint: links that should turn on one another do not.",
    remedy="Move the two rings onto one centre, or apart.",
    settings=TOLERANCE,
)
def stacked_pins(subject: RuleSubject) -> Iterator[Finding]:
    """Pins that stand on one another."""
    for seen in of_linkages(subject, "stacked-pins"):
        amount = length(seen.amount or 0.0, subject.sketch.unit)
        message = f"pins {seen.subject} lie only {amount} apart; they are read as two pins"
        move = moved(seen, "the ring", subject.reading.tolerance)
        yield finding(seen, "warning", message, f"{move} if they are one pin, else draw them further apart")


@rule(
    "empty-pin",
    "warning",
    "A ring with no link on it",
    family="linework",
    looks_for="A ring among the pins of a linkage, of about their size, on which no link ends.",
    matters="A pin that carries nothing is a link forgotten, or a link that misses its pin.",
    remedy="Draw the link to it, or delete the ring.",
)
def empty_pin(subject: RuleSubject) -> Iterator[Finding]:
    """Rings without links."""
    for seen in of_linkages(subject, "empty-pin"):
        message = "this ring looks like a pin of the linkage, but no link ends on it"
        yield finding(seen, "warning", message, "draw the link to it, or delete the ring")


@rule(
    "duplicate-label",
    "warning",
    "One label on several pins",
    family="linework",
    looks_for="Pins of one mechanism that carry the same label.",
    matters="Drives and results that name the pin can mean either.",
    remedy="Give each pin a label of its own.",
)
def duplicate_label(subject: RuleSubject) -> Iterator[Finding]:
    """Labels that stand at several pins of one mechanism."""
    for seen in of_linkages(subject, "duplicate-label"):
        message = f"the label {seen.subject} stands at {int(seen.amount or 0)} pins, also at {seen.detail}"
        yield finding(seen, "warning", message, "give each pin a label of its own")


@rule(
    "unlabelled-pins",
    "note",
    "Pins without a label",
    family="linework",
    looks_for="Pins with no text of one to four characters near them; one finding a drawing.",
    matters="They get names by place (P1, P2 ...), which change when the drawing changes.",
    remedy="Write a label within two ring diameters of the pin.",
)
def unlabelled_pins(subject: RuleSubject) -> Iterator[Finding]:
    """Pins named by place; one finding a drawing."""
    pins: dict[tuple[Point, tuple[str, ...]], tuple[str, Pin]] = {}
    for linkage, _ in subject.mechanisms:
        for pin in linkage.pins:  # one on the frame may be of several mechanisms
            pins.setdefault((pin.at, pin.handles), (linkage.name, pin))
    unnamed = [(mechanism, pin) for mechanism, pin in pins.values() if not pin.labelled]
    if not unnamed:
        return
    first = [pin for _, pin in unnamed[:PLACES_NAMED]]
    more = f" and {len(unnamed) - len(first)} more" if len(unnamed) > len(first) else ""
    where = ", ".join(f"{pin.name} at {place(pin.at)}" for pin in first) + more
    mechanisms = {mechanism for mechanism, _ in unnamed}
    yield Finding(
        rule="unlabelled-pins",
        severity="note",
        message=f"{len(unnamed)} of {plural(len(pins), 'pin')} have no label and are named by place: {where}",
        remedy="write a label within two ring diameters of each",
        at=first[0].at,
        handles=tuple(handle for pin in first for handle in pin.handles),
        layer=first[0].layer,
        mechanism=unnamed[0][0] if len(mechanisms) == 1 else None,
    )


@rule(
    "missing-ring",
    "warning",
    "A label at a corner without a ring",
    family="linework",
    looks_for="A corner of a link, where two of its lines end without a ring, beside a text that is written like the "
    "labels of the pins and names none of them.",
    matters="Lines that meet without a ring are welded into one rigid link. If a pin was meant there, a joint and a "
    "link are missing from the count.",
    remedy="Draw the ring if a pin is meant; move the label away if the corner is rigid.",
    settings=TOLERANCE,
)
def missing_ring(subject: RuleSubject) -> Iterator[Finding]:
    """Labels beside corners of links."""
    for seen in of_linkages(subject, "missing-ring"):
        message = f"two lines of link {seen.subject} meet without a ring where the label {seen.detail} stands: read as "
        place_of_ring = snap_place(seen.at, subject.reading.tolerance) if seen.at is not None else "there"
        remedy = f"draw a ring at {place_of_ring} if {seen.detail} is a pin, else move the label away"
        yield finding(seen, "warning", message + "welded", remedy)


@rule(
    "weld-on-ring",
    "warning",
    "A weld mark at the ring of a pin",
    family="linework",
    looks_for="A small arc about the end of a link on the rim of a pin: it says that the ring is part of that link.",
    matters="The link is read as pinned there. Where it is the only link with the mark, that is the same; where two "
    "links are welded to one ring they are one rigid link, and the count is too high.",
    remedy="Draw links that are welded to one another as one polyline through the pin.",
    source=SYMBOLS,
)
def weld_on_ring(subject: RuleSubject) -> Iterator[Finding]:
    """Weld marks where links end on pins."""
    for seen in of_linkages(subject, "weld-on-ring"):
        remedy = "nothing, if one link alone is welded to the ring; draw two as one polyline through the pin"
        yield finding(seen, "warning", f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}", remedy)
