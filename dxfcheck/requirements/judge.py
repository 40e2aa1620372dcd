"""Hold the mechanisms of a drawing against its limits and expectations."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence
from dataclasses import replace

from dxfcheck.analysis.results import Analysis
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.linkage import Linkage
from dxfcheck.requirements.subjects import Parts, Subject, is_pattern
from dxfcheck.requirements.verdict import Bounds, Judged, Outcome, Unmatched, Verdict
from dxfcheck.settings import Figure, Requirement, Settings
from dxfcheck.tolerances.findings import LIMIT_RELATIVE, SHOWN_AS_ZERO

__all__ = ["judge_requirements"]

SOURCES = ("option", "settings", "note")
"""What is stated by the first stands before what is stated by the others."""
NAMES_TOLD = 8
"""At most so many names are told where one fits nothing."""
ALONG = frozenset({"pin-speed", "slide-speed", "rubbing-speed"})
NO_FRAME = "no joint ties the mechanism to a frame"

Mechanisms = Sequence[tuple[Linkage, Analysis]]


def judge_requirements(
    mechanisms: Mechanisms, settings: Settings, noted: Sequence[Requirement], unit: LengthUnit
) -> Judged:
    """The verdict on each requirement and each part that it is about; ``noted`` are those of notes on the sheet.

    A plain name stands before a pattern, settings before a note on the same part; what is lifted is not judged. Cost
    linear in the parts for each requirement.
    """
    stated = [*_expected_mobility(settings), *settings.requirements, *noted]
    if not stated:
        return Judged()
    parts = Parts(mechanisms)
    matched: set[int] = set()
    verdicts: list[Verdict] = []
    of_mechanism: defaultdict[str, list[int]] = defaultdict(list)
    for index, each in enumerate(stated):
        of_mechanism[each.mechanism].append(index)
    for number, (linkage, analysis) in enumerate(mechanisms):
        own = [*of_mechanism[""], *of_mechanism[linkage.name]]
        verdicts += _mobility(linkage, analysis, [stated[index] for index in own])
        found = [(index, part) for index in own for part in _about(stated[index], parts, number)]
        matched.update(index for index, _ in found)
        for requirement, part, superseded in _ranked([(stated[index], part) for index, part in found]):
            if requirement.lifts:
                continue
            scale = parts.greatest(requirement.quantity, number)
            verdict = _verdict(requirement, part, (linkage, analysis), unit, scale)
            verdicts.append(_given_way(verdict) if superseded else verdict)
    return Judged(tuple(verdicts), tuple(_unmatched(stated, matched, mechanisms)))


def _expected_mobility(settings: Settings) -> Iterator[Requirement]:
    if settings.expected_mobility is not None:
        count = float(settings.expected_mobility)
        figure = Figure(count, count)
        yield Requirement(
            quantity="mobility",
            least=figure,
            greatest=figure,
            expected=figure,
            signed=True,
            stated=f"mobility {settings.expected_mobility}",
            source="settings" if settings.files else "option",
        )


def _about(requirement: Requirement, parts: Parts, number: int) -> list[Subject]:
    return [] if requirement.quantity == "mobility" else parts.of(requirement, number)


def _mobility(linkage: Linkage, analysis: Analysis, stated: Sequence[Requirement]) -> Iterator[Verdict]:
    """Verdicts on the count; what an option or the settings expect takes the place of what a note does."""
    expected = [each for each in stated if each.quantity == "mobility"]
    first = min((SOURCES.index(each.source) for each in expected), default=0)
    count = analysis.mobility.count
    for each in expected:
        bounds = _bounds(each, None)
        kept = bounds.expected == count
        verdict = Verdict(
            requirement=each,
            mechanism=linkage.name,
            quantity="mobility",
            subject=linkage.name,
            outcome="kept" if kept else "broken",
            bounds=bounds,
            actual=float(count),
        )
        yield verdict if SOURCES.index(each.source) == first else _given_way(verdict)


def _ranked(found: Sequence[tuple[Requirement, Subject]]) -> Iterator[tuple[Requirement, Subject, bool]]:
    """What is to be judged of several requirements about one part, and whether it gives way to another."""
    groups: defaultdict[tuple[object, ...], list[tuple[Requirement, Subject]]] = defaultdict(list)
    for requirement, part in found:
        expects = requirement.expected is not None
        groups[requirement.quantity, expects, part.key].append((requirement, part))
    for group in groups.values():
        settled = any(each.source != "note" and not is_pattern(each.subject) for each, _ in group)
        for noted in (False, True):
            own = [each for each in group if (each[0].source == "note") == noted]
            for requirement, part in _plainest(own):
                yield requirement, part, noted and settled


def _plainest(group: Sequence[tuple[Requirement, Subject]]) -> Sequence[tuple[Requirement, Subject]]:
    """Those with plain names, else those whose patterns hold the most letters."""
    if len(group) < 2:
        return group
    most = max(_plainness(each) for each, _ in group)
    return [each for each in group if _plainness(each[0]) == most]


def _plainness(requirement: Requirement) -> tuple[bool, int]:
    name = requirement.subject
    return (True, 0) if not is_pattern(name) else (False, sum(letter not in "*?[]" for letter in name))


def _given_way(verdict: Verdict) -> Verdict:
    why = "what the settings or options state takes its place"
    return replace(verdict, outcome="not judged", why=why, superseded=True)


def _verdict(
    requirement: Requirement,
    part: Subject,
    mechanism: tuple[Linkage, Analysis],
    unit: LengthUnit,
    scale: float,
) -> Verdict:
    linkage, analysis = mechanism
    along = requirement.quantity in ALONG
    bounds = _bounds(requirement, unit if along else None)
    outcome, why = _outcome(requirement, part, bounds, scale)
    if outcome == "not known":
        why = _why_not_known(requirement, linkage, analysis)
    elif requirement.quantity != "speed-ratio" and any(drive.source == "assumed" for drive in linkage.drives):
        outcome, why = "not judged", "no drive is stated, so every speed is a ratio to an assumed one"
    return Verdict(
        requirement=requirement,
        mechanism=linkage.name,
        quantity=requirement.quantity,
        subject=part.name,
        against=part.against,
        outcome=outcome,
        bounds=bounds,
        actual=_without_noise(part.actual, 0.0 if requirement.quantity == "speed-ratio" else scale),
        why=why,
        at=part.at,
        handles=part.handles,
        layer=part.layer,
        unit_assumed=along and unit.metres is None,
    )


def _outcome(requirement: Requirement, part: Subject, bounds: Bounds, scale: float) -> tuple[Outcome, str]:
    if part.actual is None:
        return "not known", ""
    figure = part.actual if requirement.signed else abs(part.actual)
    noise = SHOWN_AS_ZERO * (1.0 if requirement.quantity == "speed-ratio" else scale)
    under = bounds.least is not None and figure < bounds.least - LIMIT_RELATIVE * abs(bounds.least) - noise
    over = bounds.greatest is not None and figure > bounds.greatest + LIMIT_RELATIVE * abs(bounds.greatest) + noise
    return ("broken" if under or over else "kept"), ""


def _without_noise(actual: float | None, scale: float) -> float | None:
    """A figure that is rounding error beside the fastest part is 0."""
    return 0.0 if actual is not None and abs(actual) <= SHOWN_AS_ZERO * scale else actual


def _why_not_known(requirement: Requirement, linkage: Linkage, analysis: Analysis) -> str:
    if not linkage.grounded:
        return NO_FRAME
    if analysis.mobility.at_pose == 0:
        return "the mechanism cannot move at this pose"
    if requirement.quantity == "speed-ratio" and analysis.solved:
        return f"{requirement.against} does not turn at this pose, so there is no ratio to it"
    return "the drives do not settle it at this pose"


def _bounds(requirement: Requirement, unit: LengthUnit | None) -> Bounds:
    """The bounds in the drawing's unit a second (``unit`` None: as they are); as written where it has no unit."""

    def brought(figure: Figure | None) -> float | None:
        if figure is None:
            return None
        if unit is None:
            return figure.amount
        return figure.written if unit.metres is None else figure.amount / unit.metres

    return Bounds(brought(requirement.least), brought(requirement.greatest), brought(requirement.expected))


def _unmatched(stated: Sequence[Requirement], matched: set[int], mechanisms: Mechanisms) -> Iterator[Unmatched]:
    """What the settings state of parts that are not there; '*' is about whatever there is."""
    for index, each in enumerate(stated):
        named = each.quantity != "mobility" and each.subject != "*" and not each.lifts
        if index in matched or each.source == "note" or not named:
            continue
        yield Unmatched(each, _why_unmatched(each, mechanisms), is_pattern(each.subject))


def _why_unmatched(requirement: Requirement, mechanisms: Mechanisms) -> str:
    if not mechanisms:
        return "the drawing holds no linkage"
    name, pins = requirement.subject, requirement.quantity in {"pin-speed", "rubbing-speed"}
    if pins:
        names = [pin.name for linkage, _ in mechanisms for pin in linkage.pins]
    else:
        names = [link.name for linkage, _ in mechanisms for link in linkage.links if link.kind != "frame"]
    known = list(dict.fromkeys(names))
    told = ", ".join(known[:NAMES_TOLD]) + (" ..." if len(known) > NAMES_TOLD else "")
    kind = "pin" if pins else "link"
    if name in known and requirement.quantity == "rubbing-speed":
        return f"no two links turn on one another at pin {name}"
    if name in known and requirement.quantity == "slide-speed":
        return f"{name} does not slide"
    if name in known:
        return f"there is no link {requirement.against!r} beside {name}; the {kind}s are {told}"
    what = "slide" if requirement.quantity == "slide-speed" else kind
    fits = f"the pattern {name!r} fits no {what}" if is_pattern(name) else f"no {what} is called {name!r}"
    return f"{fits}; the {kind}s are {told}"
