"""Which drives move a linkage: stated in options, in notes on the sheet, or assumed (reading rules 9 and 10)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from typing import NamedTuple

from dxfcheck.drawing.primitives import LengthUnit, Text
from dxfcheck.linkage import Drive, DriveSource, Linkage
from dxfcheck.reading.drives.drive_assumed import Reasoned, assume_drive
from dxfcheck.reading.drives.drive_names import Target
from dxfcheck.reading.drives.drive_notes import Near, Shapes, near_links
from dxfcheck.reading.drives.drive_targets import Lookup, aim_of, make_lookup
from dxfcheck.reading.drives.drive_text import DriveStatement, find_statements, parse_drive
from dxfcheck.reading.reading import Evidence, Observation
from dxfcheck.settings import Settings
from dxfcheck.tolerances.drawing import COORDINATE_LIMIT
from dxfcheck.tolerances.sheet import NOTE_REACH_IN_HEIGHTS

__all__ = ["Driven", "Shapes", "drive_linkages"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Driven:
    """Linkages with their drives, what could not be understood, and the indices of the texts read as drive notes."""

    linkages: tuple[Linkage, ...]
    evidence: tuple[Evidence, ...]
    observations: tuple[Observation, ...]
    notes: frozenset[int]


class _Said(NamedTuple):
    """A statement, where it was made, and for a note its text with its handle and the links near it."""

    statement: DriveStatement
    source: DriveSource
    text: Text | None = None
    handle: str = ""
    near: Near = ()

    def observed(self, kind: str, detail: str, mechanism: str | None = None) -> Observation:
        """An observation on the statement."""
        text = self.text
        if text is None:
            return Observation(kind=kind, at=None, subject=self.statement.text, detail=detail, mechanism=mechanism)
        return Observation(
            kind=kind,
            at=text.at,
            handles=(self.handle,),
            layer=text.source.layer,
            subject=self.statement.text,
            detail=detail,
            mechanism=mechanism,
        )


SOURCES: tuple[DriveSource, ...] = ("option", "settings", "note", "assumed")
STATED = {
    "option": "stated by option: {}",
    "settings": "stated in the settings: {}",
    "note": "stated by the note '{}'",
}

Motion = tuple[int, int | None, frozenset[int]]
"""Linkage, slide joint, and the two links that move against one another."""


def drive_linkages(
    linkages: Sequence[Linkage],
    shapes: Shapes,
    texts: Sequence[Text],
    handles: Sequence[str],
    settings: Settings,
    unit: LengthUnit,
) -> Driven:
    """Give every grounded linkage its drives.

    ``handles`` are those of the texts, as a drafter would look for them; ``unit`` is the drawing's, in which sliding
    speeds are given a second.
    """
    notes = [(number, each) for number, text in enumerate(texts) for each in find_statements(text.content)]
    said = [_Said(parse_drive(option), "option") for option in settings.drives]
    said += [_Said(parse_drive(drive), "settings") for drive in settings.settings_drives]
    said += [_Said(statement, "note", texts[number], handles[number]) for number, statement in notes]
    stated, observations = _settle(said, linkages, shapes, unit) if said else ({}, [])
    drives = [_drives_of(linkage, stated.get(number, ())) for number, linkage in enumerate(linkages)]
    driven = tuple(
        replace(linkage, drives=tuple([each.drive for each in own]))
        for linkage, own in zip(linkages, drives, strict=True)
    )
    return Driven(
        linkages=driven,
        evidence=tuple(_evidence(driven, drives)),
        observations=tuple(observations),
        notes=frozenset(number for number, _ in notes),
    )


def _settle(
    said: Sequence[_Said], linkages: Sequence[Linkage], shapes: Shapes, unit: LengthUnit
) -> tuple[dict[int, list[Reasoned]], list[Observation]]:
    """The drives that the statements give each linkage, and what could not be understood or had to be assumed."""
    lookup = make_lookup(linkages, sliding=any(each.statement.kind == "slide" for each in said))
    said = _with_links_near(said, lookup, shapes)
    found: defaultdict[int, list[Reasoned]] = defaultdict(list)
    observations: list[Observation] = []
    taken: dict[Motion, DriveSource] = {}
    for each in said:
        reach = NOTE_REACH_IN_HEIGHTS * each.text.height if each.text is not None else 0.0
        target, why = aim_of(each.statement, lookup, each.near, reach)
        if target is None:
            if each.statement.explicit or each.near:
                observations.append(each.observed("unknown-drive", why))
            continue
        # Options come first, then settings, then notes: on the same motion the later kind gives way to the earlier.
        # Two of one kind both stand, to agree or to conflict.
        motion = (target.linkage, target.joint, frozenset((target.link, target.against)))
        if taken.setdefault(motion, each.source) != each.source:
            continue
        rate, seen = _rate(each, unit, linkages[target.linkage].name)
        observations += seen
        if rate is not None:
            found[target.linkage].append(_reasoned(each, target, rate))
    return found, observations


def _with_links_near(said: Sequence[_Said], lookup: Lookup, shapes: Shapes) -> list[_Said]:
    """The statements, those of notes whose name alone does not say what they mean with the links near them."""

    def unclear(each: _Said) -> bool:
        name = each.statement.name
        if each.text is None:
            return False
        return name is None or name.isdecimal() or aim_of(each.statement, lookup, (), 0.0).target is None

    places = [place for place, each in enumerate(said) if unclear(each)]
    near = near_links([text for place in places if (text := said[place].text) is not None], shapes)
    links = dict(zip(places, near, strict=True))
    return [each._replace(near=links.get(place, ())) for place, each in enumerate(said)]


def _rate(said: _Said, unit: LengthUnit, mechanism: str) -> tuple[float | None, list[Observation]]:
    """The stated speed in rad/s, or in the drawing's unit a second; a drawing without one takes it as it stands."""
    statement = said.statement
    if statement.kind == "turn":
        return statement.rate, []
    if unit.metres is None:
        assumed = f"the drawing has no length unit: it is taken as {statement.written:.6g} of its units a second"
        return statement.written, [said.observed("drive-unit-assumed", assumed, mechanism)]
    rate = statement.written * (statement.metres / unit.metres)
    if not abs(rate) <= COORDINATE_LIMIT:
        return None, [said.observed("unknown-drive", f"the speed is beyond all figures in {unit.name}/s")]
    return rate, []


def _reasoned(said: _Said, target: Target, rate: float) -> Reasoned:
    """The drive of a statement, and its evidence."""
    statement, text = said.statement, said.text
    drive = Drive(
        link=target.link,
        against=target.against,
        rate=rate,
        kind=statement.kind,
        source=said.source,
        joint=target.joint,
        stated=statement.text,
        at=None if text is None else text.at,
        handles=() if text is None else (said.handle,),
    )
    where = STATED[said.source].format(statement.text)
    return Reasoned(drive, f"{where}; {target.meaning}" if target.meaning else where)


def _drives_of(linkage: Linkage, stated: Sequence[Reasoned]) -> list[Reasoned]:
    """The stated drives, options first, then settings, or else an assumed one."""
    if not stated and linkage.grounded:
        assumed = assume_drive(linkage)
        return [assumed] if assumed is not None else []
    links = linkage.links
    return sorted(
        stated, key=lambda each: (SOURCES.index(each.drive.source), links[each.drive.link].name, each.drive.rate)
    )


def _evidence(linkages: Sequence[Linkage], drives: Sequence[Sequence[Reasoned]]) -> Iterator[Evidence]:
    for linkage, own in zip(linkages, drives, strict=True):
        for drive, why in own:
            name = linkage.links[drive.link].name
            if drive.against != linkage.frame:
                name += f" against {linkage.links[drive.against].name}"
            rule = 10 if drive.source == "assumed" else 9
            yield Evidence("drive", name, rule, why, drive.handles, drive.at, linkage.name)
