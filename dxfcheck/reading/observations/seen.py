"""What the observations on the linework are made on, and how one is written down."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.bodies.bodies import Bodies
from dxfcheck.reading.lines.landing import Landing, Miss
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSites
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.reading import Observation
from dxfcheck.reading.slides.boxes import Box

__all__ = ["Seen", "about_strand", "pin_name"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Seen:
    """The results of the earlier steps that the observations are made on.

    ``body_names`` and ``mechanisms`` are the names of bodies' links and mechanisms, ``pin_names`` those of sites.
    """

    strands: Sequence[Strand]
    gaps: Touches
    """What lies near the ends of the bodies' strands, as far off as an end may miss a weld."""
    sites: PinSites
    landings: Sequence[Landing]
    misses: Sequence[Miss]
    bodies: Bodies
    body_names: dict[int, str]
    mechanisms: dict[int, str]
    pin_names: dict[int, str]
    site_mechanisms: Mapping[int, str]
    """A mechanism that each site is a pin of."""
    body_of: Mapping[int, int]
    """The body of each strand that has one."""
    shared: frozenset[int]
    """Sites where two or more bodies meet, the frame counted."""
    sliding: frozenset[tuple[int, int]]
    """Pairs of bodies, both ways round, with a joint other than a pin between them."""
    shaped: frozenset[int]
    """Strands of blocks and slots: their ends meet one another, if loosely."""
    guides: frozenset[int]
    """Strands of guides, and of rods in barrels: they may end on nothing."""
    boxes: Sequence[Box]
    """Blocks and barrels."""
    wheels: Mapping[int, Ring]
    """Pitch circles by index of their primitive."""
    idle: frozenset[int]
    """Strands that are marks, strokes, borders, blocks or slots: they are meant to meet nothing."""
    handles: Sequence[str]
    """Handle of each strand's top-level entity."""
    tolerance: Tolerance


def about_strand(  # noqa: PLR0913 (the fields of an observation)
    seen: Seen,
    kind: str,
    strand: Strand,
    at: complex,
    *,
    amount: float | None = None,
    limit: float | None = None,
    detail: str = "",
    severity: str | None = None,
    snap: complex | None = None,
    case: str = "",
    also: Iterable[str] = (),
) -> Observation:
    """An observation about one strand, with the names of its link and mechanism."""
    body = seen.body_of.get(strand.number)
    return Observation(
        kind=kind,
        at=at,
        handles=(seen.handles[strand.number], *also),
        layer=strand.primitive.source.layer,
        amount=amount,
        limit=limit,
        subject=seen.body_names.get(body, "") if body is not None else "",
        detail=detail,
        mechanism=seen.mechanisms.get(body) if body is not None else None,
        severity=severity,  # type: ignore[arg-type]
        snap=snap,
        case=case,
    )


def pin_name(seen: Seen, site: int) -> str:
    """The name of a pin, or where it lies if it has none."""
    at = seen.sites.pins[site].at
    return seen.pin_names.get(site, f"at ({at.real:g}, {at.imag:g})")
