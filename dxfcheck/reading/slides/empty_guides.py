"""Guides and slots with nothing in them: a block was forgotten, or the pin stands beside its slot (reading rule 6)."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Sequence

import numpy as np
from numpy.typing import NDArray

from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.nearness import near_pairs, pair_distances
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.contact import Contact, Oddity
from dxfcheck.reading.shapes.obrounds import Channel
from dxfcheck.tolerances.shapes import EMPTY_GUIDE_IN_DIAMETERS

__all__ = ["empty_guides"]


def empty_guides(
    sheet: Sheet, bodies: Sequence[Body], contacts: Sequence[Contact], empty: Sequence[Channel]
) -> Iterator[Oddity]:
    """Frame lines that hold nothing, and empty slots, near a pin with one link: each such pin's nearest one."""
    count = Counter(site for body in bodies for site in body.pins)
    sliding = {contact.site for contact in contacts}
    fixed = {site for body in bodies if body.frame for site in body.pins}
    free = [site for site, links in sorted(count.items()) if links == 1 and site not in sliding and site not in fixed]
    if not free:
        return
    slots = {strand for shape in empty for strand in shape.strands}
    wanted = _idle_frame_lines(sheet, bodies, contacts)
    wanted[list(slots)] = True
    chosen = wanted[sheet.linework.piece_strand]
    starts, ends = sheet.linework.piece_starts[chosen], sheet.linework.piece_ends[chosen]
    owners = sheet.linework.piece_strand[chosen]
    places = np.array([sheet.pins[site].at for site in free], dtype=np.complex128)
    reach = np.array([EMPTY_GUIDE_IN_DIAMETERS * 2.0 * sheet.pins[site].radius for site in free])
    which, piece = near_pairs(places, reach, starts, ends)
    away = pair_distances(places[which], starts[piece], ends[piece])
    for place in np.unique(which).tolist():
        mine = np.nonzero(which == place)[0]
        best = int(mine[np.argmin(away[mine])])
        strand = int(owners[piece[best]])
        if strand in slots or sheet.strands[strand].length >= float(reach[place]) / EMPTY_GUIDE_IN_DIAMETERS:
            yield _beside(sheet, free[place], strand, float(away[best]), float(reach[place]), slot=strand in slots)


def _beside(sheet: Sheet, site: int, strand: int, away: float, limit: float, *, slot: bool) -> Oddity:
    if slot:
        detail = "a slot holds no pin, and the pin stands {amount} from it; expected the pin on its centre line"
    else:
        detail = (
            "a frame line with nothing on it runs {amount} from the pin, and nothing ties the pin to it; "
            "expected a rectangle (a block) round the pin, along the line"
        )
    return Oddity("empty-guide", sheet.pins[site].at, detail, away, limit, site=site, strands=(strand,))


def _idle_frame_lines(sheet: Sheet, bodies: Sequence[Body], contacts: Sequence[Contact]) -> NDArray[np.bool_]:
    """Strands (N,) of no link that lie on a frame layer, or on which several lines stand, as hatch strokes do.

    What holds a pin, or guides something, is not idle; nor is what meets such linework.
    """
    ends, targets, _, _ = sheet.touching.as_pairs()
    alone = np.ones(len(sheet.strands), dtype=np.bool_)
    alone[[strand for body in bodies if not body.frame for strand in body.strands]] = False
    busy = [each.strand for each in sheet.landings.landings if each.how != "across"]
    busy += [strand for contact in contacts for strand in contact.strands]
    held = np.zeros(alone.size, dtype=np.bool_)
    held[busy] = True
    held[targets[held[ends // 2]]] = True
    held[(ends // 2)[held[targets]]] = True
    alone &= ~held
    standing = np.bincount(targets[alone[ends // 2]], minlength=alone.size)
    frame = np.array([strand.frame for strand in sheet.strands], dtype=np.bool_)
    straight = np.zeros(alone.size, dtype=np.bool_)
    straight[sheet.linework.piece_strand] = True
    idle: NDArray[np.bool_] = alone & straight & (frame | (standing >= STROKES_OF_A_GUIDE))
    return idle


STROKES_OF_A_GUIDE = 3
