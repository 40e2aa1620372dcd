"""Rules on the planes that entities are drawn in: at another height, tilted, or seen from behind."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import Notice, Ring
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.noticed import about_notices, noticed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import PLANES
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length, listed, plural

__all__: list[str] = []


@rule(
    "off-plane",
    "warning",
    "Linework off the plane of the sheet",
    family="exchange",
    also=("error",),
    looks_for="Entities at another z than the rest of the sheet, or in a tilted plane; an error where no ring is left "
    "to read, as on a sheet drawn in a tilted user coordinate system.",
    matters="They are left out of the reading: seen from above they seem to meet what they do not meet, and lengths "
    "in a tilted plane look shorter than they are.",
    remedy="Flatten the drawing to one plane; turn a tilted sheet back into the plane of the world's x and y.",
    source=PLANES,
)
def off_plane(subject: RuleSubject) -> Iterator[Finding]:
    """Entities that lie off the sheet."""
    notices = noticed(subject, "off-plane")
    if not notices:
        return
    lost = any(subject.sketch.entities[each.entity].type in RINGED for each in notices if each.entity is not None)
    drawn = not lost or any(isinstance(shape, Ring) for shape in subject.sketch.primitives)
    message = f"{plural(len(notices), 'entity')} off the plane of the sheet left out of the reading: " + listed(
        _how(subject, notices), 3
    )
    if drawn:
        remedy = "bring everything to one z and lay it flat"
    else:
        message += "; no ring is left to read"
        remedy = "turn the drawing back into the plane of the world's x and y"
    yield from about_notices(subject, "off-plane", "warning" if drawn else "error", notices, message, remedy)


RINGED = frozenset({"CIRCLE", "ARC", "ELLIPSE", "INSERT"})
"""Kinds of which pins are drawn."""


def _how(subject: RuleSubject, notices: Sequence[Notice]) -> list[str]:
    """'9 tilted by 30 degrees', the most of them first; then how far off the others lie at most."""
    tilted = Counter(notice.detail for notice in notices if notice.amount is None)
    said = [f"{count} {detail}" for detail, count in tilted.most_common()]
    apart = [notice for notice in notices if notice.amount is not None]
    if len(apart) == 1:
        return [*said, f"one {apart[0].detail}"]
    if apart:
        furthest = max(abs(notice.amount or 0.0) for notice in apart)
        said.append(f"{len(apart)} up to {length(furthest, subject.sketch.unit)} above or below it")
    return said


@rule(
    "mirrored-plane",
    "note",
    "Linework drawn seen from behind",
    family="exchange",
    looks_for="Entities whose plane faces away from the viewer (extrusion 0, 0, -1), as mirroring in 3D does it.",
    matters="Other programs may show or read them mirrored; here they are read where they truly lie.",
    remedy="Redraw or explode them if the next program shows them elsewhere.",
    source=PLANES,
)
def mirrored_plane(subject: RuleSubject) -> Iterator[Finding]:
    """Entities with a mirrored plane."""
    notices = noticed(subject, "mirrored-plane")
    message = f"{notices[0].detail}, seen from behind; read where they truly lie" if notices else ""
    yield from about_notices(
        subject, "mirrored-plane", "note", notices, message, "redraw them if another program shows them mirrored"
    )
