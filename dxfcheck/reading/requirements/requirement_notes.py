"""Which mechanism and which of its parts the limits and expectations in notes are about (reading rule 12)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

from dxfcheck.drawing.primitives import Text
from dxfcheck.linkage import Linkage
from dxfcheck.reading.drives.drive_notes import Near, Shapes, near_links
from dxfcheck.reading.drives.drive_targets import Lookup, aim_of, make_lookup
from dxfcheck.reading.drives.drive_text import DriveStatement
from dxfcheck.reading.reading import Evidence, Observation
from dxfcheck.reading.requirements.noted_requirement import (
    NotedRequirement,
    find_requirements,
    without_requirements,
)
from dxfcheck.settings import Quantity, Requirement
from dxfcheck.tolerances.sheet import NOTE_CLEARLY_NEARER, NOTE_REACH_IN_HEIGHTS

__all__ = ["Required", "read_requirement_notes"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Required:
    """What notes state: requirements, their evidence, what could not be understood, and the notes by index of text.

    ``texts`` are all texts, those notes without what was taken from them.
    """

    requirements: tuple[Requirement, ...] = ()
    evidence: tuple[Evidence, ...] = ()
    observations: tuple[Observation, ...] = ()
    notes: frozenset[int] = frozenset()
    texts: Sequence[Text] = ()


class _Noted(NamedTuple):
    """What a text states and the links near it."""

    stated: NotedRequirement
    number: int
    text: Text
    handle: str
    near: Near = ()


class _Subject(NamedTuple):
    """What a note turned out to be about; ``name`` and ``against`` as the mechanism's parts are called."""

    quantity: Quantity
    name: str
    against: str
    mechanism: str


def read_requirement_notes(
    linkages: Sequence[Linkage], shapes: Shapes, texts: Sequence[Text], handles: Sequence[str]
) -> Required:
    """The requirements that texts state; ``handles`` are those of the texts, ``shapes`` what the links are drawn with.

    On a sheet without a linkage nothing is held against them.
    """
    noted = [
        _Noted(stated, number, text, handles[number])
        for number, text in enumerate(texts)
        for stated in find_requirements(text.content)
    ]
    if not noted or not linkages:
        return Required(texts=texts)
    near = near_links([each.text for each in noted], shapes)
    places = _Places.of(linkages)
    requirements: list[Requirement] = []
    observations: list[Observation] = []
    taken: defaultdict[int, list[NotedRequirement]] = defaultdict(list)
    for each, links in zip(noted, near, strict=True):
        one = each._replace(near=links)
        subject = places.subject_of(one)
        if isinstance(subject, _Subject):
            requirements.append(_requirement(one, subject))
        elif subject:
            observations.append(_unknown(one, subject))
        else:
            continue
        taken[each.number].append(each.stated)
    left = list(texts)
    for number, stated in taken.items():
        left[number] = texts[number]._replace(content=without_requirements(texts[number].content, stated))
    return Required(
        requirements=tuple(requirements),
        evidence=tuple(_evidence(each) for each in requirements),
        observations=tuple(observations),
        notes=frozenset(taken),
        texts=left,
    )


@dataclass(frozen=True, slots=True)
class _Places:
    """Where names are: the links and slides of all linkages, and their pins, and pins in slots, by name."""

    lookup: Lookup
    pins: Mapping[str, Mapping[int, int]]
    slots: Mapping[str, Mapping[int, int]]

    @staticmethod
    def of(linkages: Sequence[Linkage]) -> _Places:
        pins: defaultdict[str, dict[int, int]] = defaultdict(dict)
        slots: defaultdict[str, dict[int, int]] = defaultdict(dict)
        for number, linkage in enumerate(linkages):
            for index, pin in enumerate(linkage.pins):
                pins[pin.name][number] = index
            for joint in linkage.joints:
                if joint.kind == "pin in slot" and joint.pin is not None:
                    slots[linkage.pins[joint.pin].name][number] = joint.pin
        return _Places(make_lookup(linkages, sliding=True), pins, slots)

    def subject_of(self, noted: _Noted) -> _Subject | str:
        """What a note is about, or why that cannot be told; '' where the text is no requirement after all."""
        stated = noted.stated
        if stated.doubt is not None:
            meant = stated.explicit or (stated.name is not None and self._is_known(stated.name))
            return stated.doubt if meant else ""
        if stated.quantity == "mobility":
            return self._mechanism(noted)
        if stated.quantity in {"pin-speed", "rubbing-speed"}:
            return self._pin(noted, stated.quantity)
        if stated.quantity is None and stated.name in self.pins and stated.against is None:
            return self._pin(noted, "pin-speed")
        if stated.name is None and stated.explicit is True and _is_for_all(stated):
            return _Subject(stated.quantity or "slide-speed", "*", "", "")
        return self._moving(noted)

    def _is_known(self, name: str) -> bool:
        return name in self.pins or bool(self.lookup.names.homes(name) or self.lookup.slides.homes(name))

    def _mechanism(self, noted: _Noted) -> _Subject | str:
        """The mechanism that a note stands nearest to; a lone 'F = 1' far from any is a force."""
        linkages = self.lookup.linkages
        if len(linkages) == 1 and noted.stated.explicit:
            return _Subject("mobility", "", "", linkages[0].name)
        homes = dict.fromkeys(place.linkage for _, place in noted.near) or (
            _nearest_linkages(noted.text, linkages) if noted.stated.explicit else {}
        )
        if not homes:
            return ""
        distances = {home: _distance(home, noted, linkages) for home in homes}
        first, *others = sorted(distances, key=lambda home: distances[home])
        if others and distances[first] > NOTE_CLEARLY_NEARER * distances[others[0]]:
            return f"it stands as near to {linkages[first].name} as to {linkages[others[0]].name}"
        return _Subject("mobility", "", "", linkages[first].name)

    def _pin(self, noted: _Noted, quantity: Quantity) -> _Subject | str:
        """The pin of that name; of several, the one in the mechanism that the note stands beside."""
        stated = noted.stated
        linkages = self.lookup.linkages
        if stated.name is None:
            return _Subject(quantity, "*", "", "")
        if stated.against is not None:
            return "the speed of a pin is taken against the frame only"
        homes = self.pins.get(stated.name, {})
        if not homes:
            return f"no pin is called {stated.name!r}"
        home = _home_beside(noted, homes, linkages)
        return home if isinstance(home, str) else _Subject(quantity, stated.name, "", linkages[home].name)

    def _moving(self, noted: _Noted) -> _Subject | str:
        """The link or slide that a drive note of such words would be about."""
        stated = noted.stated
        slides = stated.quantity in {None, "slide-speed"}
        statement = DriveStatement(
            name=stated.name,
            rate=0.0,
            kind="slide" if slides else "turn",
            doubt=None,
            text=stated.text,
            explicit=stated.explicit,
            against=stated.against,
        )
        target, why = aim_of(statement, self.lookup, noted.near, NOTE_REACH_IN_HEIGHTS * noted.text.height)
        if (
            target is None
            and stated.quantity == "slide-speed"
            and stated.name is not None
            and stated.name in self.slots
        ):
            return self._in_slot(noted, stated.name)
        if target is None and stated.quantity is None and stated.name is not None and not self._is_known(stated.name):
            return f"no pin, slide or link is called {stated.name!r}"
        if target is None:
            return why if stated.explicit or noted.near else ""
        linkage = self.lookup.linkages[target.linkage]
        named = stated.name is not None and not stated.name.isdecimal()
        own, other = linkage.links[target.link].name, linkage.links[target.against].name
        against = other if stated.against is not None or (slides and not named) else ""
        quantity: Quantity = stated.quantity or ("slide-speed" if slides else "link-speed")
        return _Subject(quantity, stated.name if slides and named and stated.name else own, against, linkage.name)

    def _in_slot(self, noted: _Noted, pin: str) -> _Subject | str:
        """The slot that the pin of that name runs in; drives move none, so their names do not tell it."""
        home = _home_beside(noted, self.slots[pin], self.lookup.linkages)
        if isinstance(home, str):
            return home
        return _Subject("slide-speed", f"pin {pin}", "", self.lookup.linkages[home].name)


def _home_beside(noted: _Noted, homes: Mapping[int, int], linkages: Sequence[Linkage]) -> int | str:
    """Which of the linkages with a pin of that name a note means, or why that cannot be told; ``homes`` by linkage."""
    if len(homes) == 1:
        return next(iter(homes))
    around = dict.fromkeys(place.linkage for _, place in noted.near if place.linkage in homes)
    reach = sorted((abs(noted.text.at - linkages[home].pins[homes[home]].at), home) for home in around)
    if not reach:
        return f"several mechanisms have a pin {noted.stated.name!r} and it stands beside none"
    if len(reach) > 1 and reach[0][0] > NOTE_CLEARLY_NEARER * reach[1][0]:
        names = f"{linkages[reach[0][1]].name} or {linkages[reach[1][1]].name}"
        return f"it could be about pin {noted.stated.name} of {names}"
    return reach[0][1]


def _is_for_all(stated: NotedRequirement) -> bool:
    """Whether words without a name mean every part of that kind: 'rubbing speed max 0.5 m/s'."""
    return stated.quantity is not None and "speed" in stated.text.lower() and stated.quantity != "speed-ratio"


def _nearest_linkages(text: Text, linkages: Sequence[Linkage]) -> dict[int, None]:
    """The linkages in the order of the distance of their nearest pin from the text."""
    order = sorted(
        range(len(linkages)),
        key=lambda number: min((abs(pin.at - text.at) for pin in linkages[number].pins), default=math.inf),
    )
    return dict.fromkeys(order[:2])


def _distance(home: int, noted: _Noted, linkages: Sequence[Linkage]) -> float:
    """How far a note lies from the linework of a linkage, or from its pins where that is far off."""
    beside = [distance for distance, place in noted.near if place.linkage == home]
    pins = [abs(pin.at - noted.text.at) for pin in linkages[home].pins]
    return min([*beside, *pins], default=math.inf)


def _requirement(noted: _Noted, subject: _Subject) -> Requirement:
    value = noted.stated.value
    assert value is not None  # noqa: S101 - a statement without a doubt has its value
    turns = subject.quantity == "link-speed"
    return Requirement(
        quantity=subject.quantity,
        subject=subject.name,
        against=subject.against,
        least=value.least,
        greatest=value.greatest,
        expected=value.expected,
        signed=value.signed or (turns and value.expected is not None),
        stated=noted.stated.text,
        source="note",
        at=noted.text.at,
        handles=(noted.handle,),
        mechanism=subject.mechanism,
    )


def _unknown(noted: _Noted, why: str) -> Observation:
    unnamed = noted.stated.quantity == "speed-ratio" and noted.stated.name is None
    return Observation(
        kind="unknown-requirement",
        at=noted.text.at,
        handles=(noted.handle,),
        layer=noted.text.source.layer,
        subject=noted.stated.text,
        detail=why,
        severity="note" if unnamed else None,
    )


def _evidence(requirement: Requirement) -> Evidence:
    expects = "is expected" if requirement.expected is not None else "is limited"
    of = f" of {requirement.subject}" if requirement.subject not in {"", "*"} else ""
    joined = "to" if requirement.quantity == "speed-ratio" else "against"
    against = f" {joined} {requirement.against}" if requirement.against else ""
    why = f"a note: the {requirement.quantity}{of}{against} {expects}"
    return Evidence(
        "requirement",
        requirement.stated,
        12,
        why,
        requirement.handles,
        requirement.at,
        requirement.mechanism or None,
    )
