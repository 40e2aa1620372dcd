"""Which drives move a linkage: stated in options, in notes on the sheet, or assumed (reading rules 9 and 10)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Text
from dxfcheck.geometry import Point
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.drive_text import DriveStatement, find_statements, parse_drive
from dxfcheck.reading.reading import Evidence, Observation
from dxfcheck.reading.text_places import texts_near
from dxfcheck.settings import (
    ASSUMED_TIE,
    NAMED_NOTE_REACH_IN_HEIGHTS,
    NOTE_CLEARLY_NEARER,
    NOTE_REACH_IN_HEIGHTS,
    Settings,
)

__all__ = ["Driven", "Shapes", "drive_linkages"]

Shapes = Sequence[Sequence[Sequence[tuple[Point, Point]]]]
"""For each linkage and each of its links, the straight pieces it is drawn with."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Driven:
    """Linkages with their drives, what could not be understood, and the indices of the texts read as drive notes."""

    linkages: tuple[Linkage, ...]
    evidence: tuple[Evidence, ...]
    observations: tuple[Observation, ...]
    notes: frozenset[int]


class _Place(NamedTuple):
    """One link of one linkage, by indices."""

    linkage: int
    link: int


class _Stated(NamedTuple):
    """A drive and the linkage it belongs to."""

    place: _Place
    drive: Drive


def drive_linkages(
    linkages: Sequence[Linkage], shapes: Shapes, texts: Sequence[Text], handles: Sequence[str], settings: Settings
) -> Driven:
    """Give every grounded linkage its drives. ``handles`` are those of the texts, as a drafter would look for them."""
    observations: list[Observation] = []
    stated: list[_Stated] = []
    notes = [(number, each) for number, text in enumerate(texts) for each in find_statements(text.content)]
    names = _index_names(linkages if settings.drives or notes else ())
    for option in settings.drives:
        outcome = _from_option(option, names, linkages)
        (stated if isinstance(outcome, _Stated) else observations).append(outcome)  # type: ignore[arg-type]
    by_option = {each.place for each in stated}
    near = _near_links([texts[number] for number, _ in notes], shapes)
    for (number, statement), links in zip(notes, near, strict=True):
        noted = _from_note(statement, texts[number], handles[number], links, names, linkages)
        if isinstance(noted, Observation):
            if statement.explicit or links:
                observations.append(noted)
        elif noted.place not in by_option:
            stated.append(noted)
    of_linkage: defaultdict[int, list[Drive]] = defaultdict(list)
    for each in stated:
        of_linkage[each.place.linkage].append(each.drive)
    driven = tuple(
        replace(linkage, drives=_drives_of(linkage, of_linkage[number])) for number, linkage in enumerate(linkages)
    )
    evidence = tuple(_evidence(driven))
    return Driven(
        linkages=driven,
        evidence=evidence,
        observations=tuple(observations),
        notes=frozenset(number for number, _ in notes),
    )


def _drives_of(linkage: Linkage, stated: Sequence[Drive]) -> tuple[Drive, ...]:
    """The stated drives, options first, or else an assumed one."""
    if stated or not linkage.grounded:
        links = linkage.links
        return tuple(sorted(stated, key=lambda each: (each.source != "option", links[each.link].name, each.rate)))
    assumed = _assumed(linkage)
    return (assumed,) if assumed is not None else ()


def _assumed(linkage: Linkage) -> Drive | None:
    """1 rad/s on the link with the shortest distance between a pin on the frame and another of its pins."""
    arms = [
        (abs(linkage.pins[pin].at - linkage.pins[pivot].at), number)
        for number, link in enumerate(linkage.links)
        if number != linkage.frame
        for pivot in link.pins
        if linkage.pins[pivot].fixed
        for pin in link.pins
        if pin != pivot and not linkage.pins[pin].fixed
    ]
    if not arms:
        return None
    # Equal arms (a parallelogram) must give the same choice whatever way the sheet is turned: the first by name.
    shortest = min(arms)[0]
    link = min(number for length, number in arms if length <= shortest * (1.0 + ASSUMED_TIE))
    return Drive(link=link, against=linkage.frame, rate=1.0, source="assumed")


def _from_option(option: str, names: _Names, linkages: Sequence[Linkage]) -> _Stated | Observation:
    statement = parse_drive(option)
    assert statement.name is not None  # noqa: S101 (parse_drive refuses an option without a name)
    places = list(names.places(statement.name))
    if len(places) == 1 and statement.kind == "turn":
        drive = Drive(link=places[0].link, against=_frame_of(places[0], linkages), rate=statement.rate, stated=option)
        return _Stated(places[0], drive)
    return Observation(
        kind="unknown-drive",
        at=None,
        subject=statement.text,
        detail=_why_unknown(statement, places, linkages),
    )


def _from_note(
    statement: DriveStatement,
    text: Text,
    handle: str,
    near: Sequence[tuple[float, _Place]],
    names: _Names,
    linkages: Sequence[Linkage],
) -> _Stated | Observation:
    if statement.name is not None and not statement.name.isdecimal():
        # Labels repeat from mechanism to mechanism on a sheet of several: the note means the one it stands in.
        named = names.places(statement.name)
        nearest = _clearly_nearest([each for each in near if each[1] in named]) if len(named) > 1 else []
        places = nearest or list(named)
    else:
        reach = NOTE_REACH_IN_HEIGHTS * text.height
        places = _clearly_nearest([each for each in near if each[0] <= reach])
    if len(places) == 1 and statement.kind == "turn" and statement.doubt is None:
        drive = Drive(
            link=places[0].link,
            against=_frame_of(places[0], linkages),
            rate=statement.rate,
            source="note",
            stated=statement.text,
            at=text.at,
            handles=(handle,),
        )
        return _Stated(places[0], drive)
    return Observation(
        kind="unknown-drive",
        at=text.at,
        handles=(handle,),
        layer=text.source.layer,
        subject=statement.text,
        detail=_why_unknown(statement, places, linkages),
    )


def _clearly_nearest(near: Sequence[tuple[float, _Place]]) -> list[_Place]:
    """The nearest link alone where the next is clearly further off, else all of them."""
    if len(near) > 1 and near[0][0] <= NOTE_CLEARLY_NEARER * near[1][0]:
        return [near[0][1]]
    return [place for _, place in near]


def _frame_of(place: _Place, linkages: Sequence[Linkage]) -> int:
    return linkages[place.linkage].frame


def _near_links(texts: Sequence[Text], shapes: Shapes) -> list[list[tuple[float, _Place]]]:
    """For each text, the links in its neighbourhood with their distances from it, nearest first."""
    pieces = [
        (_Place(number, link), piece)
        for number, links in enumerate(shapes)
        for link, drawn in enumerate(links)
        for piece in drawn
    ]
    found: list[dict[_Place, float]] = [{} for _ in texts]
    reaches = np.array([NAMED_NOTE_REACH_IN_HEIGHTS * text.height for text in texts])
    starts = np.array([piece[0] for _, piece in pieces], dtype=np.complex128)
    ends = np.array([piece[1] for _, piece in pieces], dtype=np.complex128)
    near = texts_near(texts, reaches, starts, ends)
    for number, index, distance in zip(*(each.tolist() for each in near), strict=True):
        place = pieces[index][0]
        found[number][place] = min(distance, found[number].get(place, math.inf))
    return [sorted((distance, place) for place, distance in each.items()) for each in found]


class _Names(NamedTuple):
    """Moving links by their names, and by two of their pins written 'AB' or 'A-B' in either order."""

    links: Mapping[str, dict[_Place, None]]
    pairs: Mapping[str, dict[_Place, None]]

    def places(self, name: str) -> Mapping[_Place, None]:
        """The links that a name fits, in order."""
        return self.links.get(name, self.pairs.get(name, {}))


def _index_names(linkages: Sequence[Linkage]) -> _Names:
    links: defaultdict[str, dict[_Place, None]] = defaultdict(dict)
    pairs: defaultdict[str, dict[_Place, None]] = defaultdict(dict)
    for number, linkage in enumerate(linkages):
        for index, link in enumerate(linkage.links if linkage.grounded else ()):
            if index == linkage.frame:
                continue
            place = _Place(number, index)
            links[link.name][place] = None
            own = [linkage.pins[pin].name for pin in link.pins]
            for name in {f"{one}{joint}{other}" for one in own for other in own if one != other for joint in ("", "-")}:
                pairs[name][place] = None
    return _Names(links, pairs)


def _why_unknown(statement: DriveStatement, places: Sequence[_Place], linkages: Sequence[Linkage]) -> str:
    names = [f"{linkages[place.linkage].links[place.link].name} of {linkages[place.linkage].name}" for place in places]
    if statement.doubt is not None:
        return statement.doubt
    if len(places) > 1:
        return f"it could belong to {', '.join(names[:4])}"
    if statement.kind == "slide" and places:
        return f"{names[0]} does not slide: a sliding speed cannot drive it"
    if statement.name is not None and not statement.name.isdecimal():
        if any(_has_link(linkage, statement.name) for linkage in linkages if not linkage.grounded):
            return "its mechanism has no frame to turn against"
        moving = (linkage.links for linkage in linkages if linkage.grounded)
        links = [link.name for each in moving for link in each if link.kind != "frame"]
        known = ", ".join(links[:8]) + (" ..." if len(links) > 8 else "")
        return f"no link is called {statement.name!r}" + (f"; the links are {known}" if links else "")
    return "no link lies near it"


def _has_link(linkage: Linkage, name: str) -> bool:
    """Whether a name is that of a link, or of two of its pins, whatever the linkage hangs on."""
    return bool(_index_names([replace(linkage, grounded=True, frame=-1)]).places(name))


def _evidence(linkages: Sequence[Linkage]) -> Iterator[Evidence]:
    for linkage in linkages:
        for drive in linkage.drives:
            link = linkage.links[drive.link]
            rule = 10 if drive.source == "assumed" else 9
            why = {
                "option": f"stated by option: {drive.stated}",
                "settings": f"stated in the settings: {drive.stated}",
                "note": f"stated by the note '{drive.stated}'",
                "assumed": "no drive is stated: the link with the shortest arm on the frame turns at 1 rad/s",
            }[drive.source]
            yield Evidence("drive", link.name, rule, why, drive.handles, drive.at, linkage.name)
