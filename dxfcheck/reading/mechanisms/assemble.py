"""Linkages from bodies and pins: joints, assemblies, names (reading rules 7 and 8)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass
from typing import NamedTuple

from dxfcheck.geometry import dot
from dxfcheck.linkage import Joint, Link, Linkage, Pin
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.unions import Unions
from dxfcheck.reading.shapes.contact import Contact

__all__ = ["Assembled", "Assembly", "Named", "assemble", "find_assemblies"]


class Assembled(NamedTuple):
    """A linkage, the body each of its links was made of (None for the frame) and the site of each of its pins.

    ``contacts`` run parallel to its joints other than pins.
    """

    linkage: Linkage
    bodies: tuple[int | None, ...]
    sites: tuple[int, ...]
    contacts: tuple[Contact, ...] = ()


class Assembly(NamedTuple):
    """Moving bodies (indices) that hang together otherwise than through the frame, and all their pins (sites).

    ``contacts`` are their joints other than pins; the frame, where it has part in one, is the first of its two bodies.
    ``grounded`` says whether a joint ties one of them to the frame; ``linkage`` whether the assembly shows enough to
    be called a linkage at all (reading rule 11).
    """

    bodies: tuple[int, ...]
    sites: tuple[int, ...]
    grounded: bool
    linkage: bool
    contacts: tuple[Contact, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class Named:
    """What the names and handles of links and pins come from.

    ``pin_names`` by site, ``pin_keys`` to sort them naturally; ``labelled`` the sites with a label on the sheet;
    ``strand_handles`` and ``ring_handles`` (of pitch circles, by primitive) are those of single shapes,
    ``body_handles`` and ``site_handles`` of bodies and of each site's rings, ``frame_handles`` of the frame linework on
    each fixed site; ``body_layers`` and ``site_layers`` the layer of each. ``resolution`` is that of the drawing.
    """

    pin_names: Mapping[int, str]
    pin_keys: Mapping[int, tuple[tuple[int, int | str], ...]]
    labelled: frozenset[int]
    strand_handles: Sequence[str]
    ring_handles: Mapping[int, str]
    frame_strands: AbstractSet[int]
    body_handles: Sequence[tuple[str, ...]]
    body_layers: Sequence[str | None]
    site_handles: Mapping[int, tuple[str, ...]]
    frame_handles: Mapping[int, tuple[str, ...]]
    site_layers: Mapping[int, str | None]
    resolution: float = 0.0


def find_assemblies(bodies: Sequence[Body], fixed: frozenset[int], contacts: Sequence[Contact] = ()) -> list[Assembly]:
    """Group moving bodies by pins they share that are not on the frame, and by contacts; by their first body."""
    at_site: defaultdict[int, list[int]] = defaultdict(list)
    for number, body in enumerate(bodies):
        if not body.frame:
            for site in body.pins:
                at_site[site].append(number)
    groups = Unions(len(bodies))
    for site, members in at_site.items():
        if site not in fixed:
            for other in members[1:]:
                groups.join(members[0], other)
    touching: defaultdict[int, list[Contact]] = defaultdict(list)
    for contact in contacts:
        one, other = contact.bodies
        touching[one].append(contact)
        touching[other].append(contact)
        if not bodies[one].frame and not bodies[other].frame:
            groups.join(one, other)
    return [
        _assembly(members, bodies, at_site, fixed, touching)
        for members in groups.groups()
        if not bodies[members[0]].frame
    ]


def _assembly(
    members: Sequence[int],
    bodies: Sequence[Body],
    at_site: Mapping[int, Sequence[int]],
    fixed: frozenset[int],
    touching: Mapping[int, Sequence[Contact]],
) -> Assembly:
    contacts = tuple(dict.fromkeys(contact for member in members for contact in touching.get(member, ())))
    # A pin of the frame that a slot of a member runs over belongs to no member.
    over = {each.site for each in contacts if each.carrier is not None and each.site is not None}
    sites = tuple(sorted(over.union(*(bodies[member].pins for member in members))))
    grounded = any(site in fixed for site in sites) or any(bodies[contact.bodies[0]].frame for contact in contacts)

    def joints_of(member: int) -> int:
        pinned = [each for each in touching.get(member, ()) if all(bodies[body].pins for body in each.bodies)]
        return sum(len(at_site[site]) > 1 for site in bodies[member].pins) + len(pinned)

    chained = any(joints_of(member) > 1 for member in members)
    return Assembly(tuple(members), sites, grounded, bool(sites) and (grounded or chained), contacts)


def assemble(
    assemblies: Sequence[Assembly],
    bodies: Sequence[Body],
    strands: Sequence[Strand],
    pins: Sequence[PinSite],
    fixed: frozenset[int],
    named: Named,
    tolerance: Tolerance,
) -> list[Assembled]:
    """The linkages M1, M2 ... by x, then y, of their leftmost pins."""

    def place(assembly: Assembly) -> tuple[int, int]:
        step = tolerance.t or 1.0
        places = [pins[site].at for site in assembly.sites] or [contact.at for contact in assembly.contacts]
        return min((round(at.real / step), round(at.imag / step)) for at in places)

    ordered = sorted(assemblies, key=place)
    return [
        _linkage(f"M{number}", assembly, bodies, strands, pins, fixed, named)
        for number, assembly in enumerate(ordered, start=1)
    ]


def _linkage(
    name: str,
    assembly: Assembly,
    bodies: Sequence[Body],
    strands: Sequence[Strand],
    sites: Sequence[PinSite],
    fixed: frozenset[int],
    named: Named,
) -> Assembled:
    ordered_sites = sorted(assembly.sites, key=lambda site: (named.pin_keys[site], site))
    pin_of = {site: number for number, site in enumerate(ordered_sites)}
    names = _link_names(assembly, bodies, strands, sites, named)
    pins_of = {body: sorted([pin_of[site] for site in bodies[body].pins]) for body in assembly.bodies}
    ordered = sorted(assembly.bodies, key=lambda body: (not pins_of[body], pins_of[body], names[body]))
    links = [
        Link(
            name=names[body],
            kind="block" if bodies[body].block else "link",
            pins=tuple(pins_of[body]),
            handles=named.body_handles[body],
            layer=named.body_layers[body],
        )
        for body in ordered
    ]
    frame = 0
    if assembly.grounded:
        links.insert(0, _frame_link(assembly, bodies, fixed, pin_of, named))
    else:
        frame = max(range(len(links)), key=lambda each: (_reach(links[each], ordered_sites, sites), -each))
    at_pin: defaultdict[int, list[int]] = defaultdict(list)
    for number, link in enumerate(links):
        for pin in link.pins:
            at_pin[pin].append(number)
    pins = [
        Pin(
            name=named.pin_names[site],
            at=sites[site].at,
            radius=sites[site].radius,
            links=tuple(at_pin[pin]),
            fixed=site in fixed,
            labelled=site in named.labelled,
            handles=named.site_handles[site],
            layer=named.site_layers[site],
        )
        for pin, site in enumerate(ordered_sites)
    ]
    others = _contact_joints(assembly, ordered, pins, pin_of, named, strands)
    linkage = Linkage(
        name=name,
        links=tuple(links),
        pins=tuple(pins),
        joints=(*_joints(pins), *(joint for joint, _ in others)),
        frame=frame,
        grounded=assembly.grounded,
        resolution=named.resolution,
    )
    made_of = (None, *ordered) if assembly.grounded else tuple(ordered)
    return Assembled(linkage, made_of, tuple(ordered_sites), tuple(contact for _, contact in others))


def _joints(pins: Iterable[Pin]) -> Iterator[Joint]:
    """k links at one pin are k - 1 full joints, each from the first of them to another."""
    for number, pin in enumerate(pins):
        for other in pin.links[1:]:
            yield Joint(kind="pin", first=pin.links[0], second=other, at=pin.at, pin=number, handles=pin.handles)


def _contact_joints(
    assembly: Assembly,
    ordered: Sequence[int],
    pins: Sequence[Pin],
    pin_of: Mapping[int, int],
    named: Named,
    strands: Sequence[Strand],
) -> list[tuple[Joint, Contact]]:
    """Slides, pins in slots and rolling contacts, each from the first of its links to the other."""
    link_of = {body: number for number, body in enumerate(ordered, start=int(assembly.grounded))}
    found = []
    for contact in assembly.contacts:
        one, other = (link_of.get(body, 0) for body in contact.bodies)
        pin = pin_of.get(contact.site) if contact.site is not None else None
        carrier = None if contact.carrier is None else (one, other)[contact.carrier]
        if carrier is not None and pin is not None:
            # A pin of several links runs in the slot as the first of them.
            runner = next(link for link in pins[pin].links if link != carrier)
            one, other = (carrier, runner) if contact.carrier == 0 else (runner, carrier)
        joint = Joint(
            kind=contact.kind,
            first=min(one, other),
            second=max(one, other),
            at=contact.at,
            pin=pin,
            direction=contact.direction,
            handles=tuple(
                dict.fromkeys(
                    (
                        *(named.strand_handles[strand] for strand in contact.strands),
                        *(named.ring_handles[ring] for ring in contact.rings),
                    )
                )
            ),
            full=contact.full,
            carrier=carrier,
            curves=contact.curves if one <= other else contact.curves[::-1],
            drawn_length=_drawn_length(contact, strands),
        )
        found.append((joint, contact))
    order = {"slide": 0, "pin in slot": 1, "rolling": 2}
    found.sort(key=lambda each: (order[each[0].kind], each[0].first, each[0].second, each[0].pin or 0))
    return found


def _drawn_length(contact: Contact, strands: Sequence[Strand]) -> float | None:
    """How far the guide, slot or block of a slide is drawn along its direction; None for rolling and for curves."""
    if contact.kind == "rolling" or contact.curves != (None, None):
        return None
    along = [
        dot(point, contact.direction)
        for strand in contact.strands
        for piece in strands[strand].pieces
        for point in (piece.start, piece.end)
    ]
    return max(along) - min(along) if along else None


def _frame_link(
    assembly: Assembly,
    bodies: Sequence[Body],
    fixed: frozenset[int],
    pin_of: Mapping[int, int],
    named: Named,
) -> Link:
    sites = [site for site in assembly.sites if site in fixed]
    handles = dict.fromkeys(handle for site in sites for handle in named.frame_handles.get(site, ()))
    for contact in assembly.contacts:
        if bodies[contact.bodies[0]].frame:
            own = (strand for strand in contact.strands if strand in named.frame_strands)
            handles.update(dict.fromkeys(named.strand_handles[strand] for strand in own))
    return Link(
        name="frame",
        kind="frame",
        pins=tuple(sorted(pin_of[site] for site in sites)),
        handles=tuple(handles),
        layer=named.body_layers[0] if bodies[0].frame else None,
    )


def _link_names(
    assembly: Assembly,
    bodies: Sequence[Body],
    strands: Sequence[Strand],
    sites: Sequence[PinSite],
    named: Named,
) -> dict[int, str]:
    """Names by pins in natural order; further links between the same pins are numbered, the shortest drawn first."""
    by_pins: defaultdict[str, list[int]] = defaultdict(list)
    for body in assembly.bodies:
        pins = sorted(bodies[body].pins, key=named.pin_keys.__getitem__)
        name = "-".join([named.pin_names[site] for site in pins])
        if bodies[body].block:
            name = f"block at {name}"
        by_pins[name or (named.body_handles[body] or ("wheel",))[0]].append(body)
    names: dict[int, str] = {}
    for name, members in by_pins.items():
        if len(members) == 1:
            names[members[0]] = name
            continue
        for number, body in enumerate(sorted(members, key=lambda each: _drawn(bodies[each], strands, sites)), start=1):
            names[body] = name if number == 1 else f"{name} ({number})"
    return names


def _drawn(body: Body, strands: Sequence[Strand], sites: Sequence[PinSite]) -> tuple[float, float]:
    """Length of a body's linework and how far it reaches from its first pin: nothing that turning a sheet changes."""
    first = sites[body.pins[0]].at if body.pins else 0j
    points = [point for index in body.strands for point in (*strands[index].ends, *strands[index].corners)]
    length = sum(strands[index].length for index in body.strands)
    return round(length, 9), max((abs(point - first) for point in points), default=0.0)


def _reach(link: Link, ordered_sites: Sequence[int], sites: Sequence[PinSite]) -> float:
    """Greatest distance between two pins of a link."""
    places = [sites[ordered_sites[pin]].at for pin in link.pins]
    return max((abs(one - other) for one in places for other in places), default=0.0)
