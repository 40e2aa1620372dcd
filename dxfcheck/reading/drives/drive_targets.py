"""From a statement to what it moves, or to why that cannot be told (reading rule 9)."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from itertools import islice
from typing import NamedTuple

from dxfcheck.linkage import Linkage
from dxfcheck.reading.drives.drive_names import Names, Place, Target, index_names
from dxfcheck.reading.drives.drive_notes import Near, clearly_nearest, nearest_of
from dxfcheck.reading.drives.drive_slides import Slides, index_slides
from dxfcheck.reading.drives.drive_text import DriveStatement

__all__ = ["Aim", "Lookup", "aim_of", "make_lookup"]

NAMES_TOLD = 8
"""At most so many names of links are told where a name fits none."""

WHEEL = "wheel at "

CHOICES_TOLD = 4
"""At most so many links are told where a drive could belong to several."""


@dataclass(frozen=True, slots=True)
class Lookup:
    """The linkages, and the names of their moving links and slides."""

    linkages: Sequence[Linkage]
    names: Names
    slides: Slides


class Aim(NamedTuple):
    """What a statement moves; ``target`` is None where that cannot be told, and ``why`` says why."""

    target: Target | None
    why: str = ""


def make_lookup(linkages: Sequence[Linkage], *, sliding: bool) -> Lookup:
    """Index the names of all linkages, and their slides if some drive is ``sliding``; linear in links and joints."""
    names = index_names(linkages)
    return Lookup(linkages, names, index_slides(linkages if sliding else (), names))


def aim_of(statement: DriveStatement, lookup: Lookup, near: Near, reach: float) -> Aim:
    """The one thing a statement moves. ``near`` are the links around a note, ``reach`` how far it speaks unnamed."""
    if statement.doubt is not None:
        return Aim(None, statement.doubt)
    name = _name_of(statement, lookup, near)
    if name is not None:
        targets = _named(statement, name, lookup, near)
    else:
        within = [each for each in near if each[0] <= reach]
        targets = clearly_nearest(_unnamed(statement, within, lookup))
    if len(targets) == 1:
        return Aim(targets[0])
    if targets:
        return Aim(None, _why_several(targets, lookup))
    if name is None:
        return Aim(None, _why_none(statement, [place for _, place in within], lookup) or "no link lies near it")
    movers = lookup.slides.movers(name) if statement.kind == "slide" else lookup.names.homes(name)
    places = next(iter(movers.values()), ())
    return Aim(None, _why_unnamed(statement, name, lookup) if not places else _why_none(statement, places, lookup))


def _name_of(statement: DriveStatement, lookup: Lookup, near: Near) -> str | None:
    """The name a statement gives.

    The number in a note 'ω_2' is none, as links are not numbered here; an option may well name a link that goes by a
    handle of digits. A wheel is named by its pin.
    """
    name = statement.name
    if name is None:
        return None
    known = lookup.slides.homes(name) if statement.kind == "slide" else lookup.names.homes(name)
    if name.isdecimal() and (near or not known):
        return None
    return name.removeprefix(WHEEL) if not known else name


def _named(statement: DriveStatement, name: str, lookup: Lookup, near: Near) -> list[Target]:
    """What a name may mean; of several, what the note stands beside.

    Labels repeat from mechanism to mechanism on a sheet of several: the note means the one it stands in.
    """
    homes = lookup.slides.homes(name) if statement.kind == "slide" else lookup.names.homes(name)
    if near and len(homes) > 1:
        around = [home for home in dict.fromkeys(place.linkage for _, place in near) if home in homes]
        beside = nearest_of([target for home in around for target in _named_in(statement, name, home, lookup)], near)
        if beside:
            return beside
    everywhere = (target for home in homes for target in _named_in(statement, name, home, lookup))
    targets = list(islice(everywhere, CHOICES_TOLD + 1))
    return targets if len(targets) < 2 else nearest_of(targets, near) or targets


def _named_in(statement: DriveStatement, name: str, home: int, lookup: Lookup) -> list[Target]:
    """What a name may mean in one linkage."""
    if statement.kind == "turn":
        places = lookup.names.homes(name).get(home, ())
    elif statement.against is None:
        return lookup.slides.named(name, home)
    else:
        places = lookup.slides.movers(name).get(home, ())
    return [target for place in places for target in _of_place(statement, place, lookup)]


def _unnamed(statement: DriveStatement, near: Near, lookup: Lookup) -> list[tuple[float, Target]]:
    if statement.kind == "slide" and statement.against is None:
        return lookup.slides.beside(near)
    return [(distance, target) for distance, place in near for target in _of_place(statement, place, lookup)]


def _of_place(statement: DriveStatement, place: Place, lookup: Lookup) -> Iterator[Target]:
    """How a link may run against what the statement names, or against the frame."""
    linkage = lookup.linkages[place.linkage]
    others = [linkage.frame] if statement.against is None else _others(statement.against, place, lookup)
    for other in others:
        if statement.kind == "slide":
            yield from lookup.slides.against(place, other)
        else:
            yield Target(place.linkage, place.link, other, shown=(place.link,))


def _others(name: str, place: Place, lookup: Lookup) -> list[int]:
    """The other links of a link's own linkage that a name fits, the frame too."""
    linkage = lookup.linkages[place.linkage]
    if name == linkage.links[linkage.frame].name:
        return [linkage.frame]
    fitting = lookup.names.homes(name).get(place.linkage, ())
    return [each.link for each in fitting if each.link != place.link]


def _why_several(targets: Sequence[Target], lookup: Lookup) -> str:
    links = {(target.linkage, target.link) for target in targets}
    told = []
    for target in targets[:CHOICES_TOLD]:
        linkage = lookup.linkages[target.linkage]
        names = linkage.links[target.link].name, linkage.links[target.against].name
        relative = target.against != linkage.frame or len(links) == 1
        told.append(f"{names[0]} against {names[1]} of {linkage.name}" if relative else f"{names[0]} of {linkage.name}")
    return f"it could belong to {', '.join(dict.fromkeys(told))}"


def _why_none(statement: DriveStatement, places: Sequence[Place], lookup: Lookup) -> str:
    """Why none of these links can run so; nothing where there are none."""
    if not places:
        return ""
    place = places[0]
    linkage = lookup.linkages[place.linkage]
    link = f"{linkage.links[place.link].name} of {linkage.name}"
    if statement.against is not None and not any(_others(statement.against, each, lookup) for each in places):
        return f"{link} has no other link {statement.against!r} beside it to move against"
    if statement.against is not None:
        return f"no slide joins {link} and {statement.against}"
    if lookup.slides.of_link.get(place):
        return f"it does not tell which way {link} slides: name a block, or the two pins that it moves apart"
    return f"{link} does not slide, so it has no sliding speed"


def _why_unnamed(statement: DriveStatement, name: str, lookup: Lookup) -> str:
    """Why a name is none, and what the names are."""
    if statement.kind == "slide" and lookup.slides.is_side_by_side(name):
        return f"the slide between the pins of {name!r} moves them neither apart nor together: name the link instead"
    linkages = lookup.linkages
    # Counted as if it hung on a frame that is none of its links, to see whether the name is one of its links'.
    loose = [replace(linkage, grounded=True, frame=-1) for linkage in linkages if not linkage.grounded]
    if loose:
        held = make_lookup(loose, sliding=statement.kind == "slide")
        if held.names.homes(name) or (statement.kind == "slide" and held.slides.homes(name)):
            return f"its mechanism has no frame to {'turn' if statement.kind == 'turn' else 'move'} against"
    links = [link.name for each in linkages if each.grounded for link in each.links if link.kind != "frame"]
    known = ", ".join(links[:NAMES_TOLD]) + (" ..." if len(links) > NAMES_TOLD else "")
    return f"no link is called {name!r}" + (f"; the links are {known}" if links else "")
