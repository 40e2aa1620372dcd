"""The hand working of one mechanism on the terminal: step by step, so that a pocket calculator can follow it."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator

from dxfcheck.analysis.by_hand.closing import Closing, Triangle
from dxfcheck.analysis.by_hand.closure import Chain, Term, hang
from dxfcheck.analysis.by_hand.working import PointVelocity, StepWorking, Working, work_out
from dxfcheck.geometry import Point
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Drive
from dxfcheck.reports.terminal_layout import NOT_APPLICABLE, Column, Line, figure, fold, listed, table
from dxfcheck.reports.terminal_working_equations import equation_lines
from dxfcheck.reports.terminal_working_poles import pole_sentences
from dxfcheck.reports.terminal_working_terms import Names, names_of, rotation
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["working_lines"]

INDENT = " " * 5
FURTHER = " " * 9
NAMED = 8
"""The links of a step are named where there are at most so many."""
LEGEND = (
    "By relative velocities, with the figures of the solution: r_C/B leads from B to C, v_C/B is the velocity of C "
    "against B; lengths in {unit}, angles from +x, counter-clockwise; omega x r = omega (-r_y, r_x), ccw positive."
)


def working_lines(report: MechanismReport, unit: str, width: int, *, legend: bool = True) -> list[Line]:
    """The working under a heading, or why there is none; ``unit`` is that of lengths.

    ``legend`` says first how things are named, which one drawing need hear only once.
    """
    working = work_out(report.linkage, report.analysis)
    if working is None:
        return [Line(text) for text in fold(f"Working: none, as {_why_none(report)}", width, "  ", "  ")]
    names = names_of(working.solved, unit)
    lines = [Line(f"Working, {report.linkage.name}", "bold")]
    if legend:
        lines += [Line(text, "dim") for text in fold(LEGEND.format(unit=unit), width, "  ", "  ")]
    for number, step in enumerate(working.steps, start=1):
        title, *more = fold(_title(names, step), width, f"  {number:<3}", INDENT)
        lines += [Line(""), Line(title, "bold"), *map(Line, more)]
        lines += _step_lines(names, step, width)
    lines += [Line("")]
    return lines + [Line(text) for text in fold(_closing_words(names, working), width, "  ", "  ")]


def _why_none(report: MechanismReport) -> str:
    if not report.linkage.grounded:
        return "nothing ties the mechanism to a frame"
    if report.analysis.mobility.at_pose == 0:
        return "the mechanism cannot move"
    return "the drives do not settle all speeds"


def _title(names: Names, step: StepWorking) -> str:
    several = step.step.links
    links = f"{len(several)} links" if len(several) > NAMED else listed([names.link(link) for link in several])
    if step.closing.form == "given":
        return f"{links}: driven" if step.step.drives else links
    if step.closing.joint is None:
        return f"{links}: to be solved together" if step.step.kind == "group" else links
    at = names.place(names.linkage.joints[step.closing.joint].at)
    return f"{links}, closed at {at}"


def _step_lines(names: Names, step: StepWorking, width: int) -> Iterator[Line]:
    """All that is said of one step."""
    closing = step.closing
    sentences = [_drive_sentence(names, step, names.linkage.drives[number]) for number in step.step.drives]
    sentences += [_shared_sentence(names, *pair) for pair in step.shared]
    yield from _folded(sentences, width)
    if closing.chains is not None:
        yield from _folded(_chain_sentences(names, closing.chains), width)
        if closing.triangle is not None:
            yield from table(_side_columns(names, closing, closing.chains), width, INDENT)
        yield from _folded(_result_sentences(names, closing, closing.chains), width)
    elif closing.form == "equations":
        yield from equation_lines(names, step, width, INDENT)
    if closing.form == "given":
        yield from _folded(_carried_sentences(names, step), width)
    told = _told(names, closing)
    for point in step.points:
        if point.pin != told:
            first, *more = _point_sentences(names, point)
            yield from _folded([first], width)
            for text in more:
                yield from map(Line, fold(text, width, FURTHER, FURTHER))
    guided = {link for link, other in step.shared if other == names.linkage.frame}
    yield from _folded(pole_sentences(names, [pole for pole in step.poles if pole.link not in guided]), width)


def _folded(sentences: Iterable[str], width: int) -> Iterator[Line]:
    for sentence in sentences:
        yield from map(Line, fold(sentence, width, INDENT, FURTHER))


def _carried_sentences(names: Names, step: StepWorking) -> Iterator[str]:
    """The velocities of pins of driven links that no known pin of the same link leads to: of blocks, of rollers."""
    hanging = hang(names.solved, step.step)
    for link in step.step.links:
        pins = names.linkage.links[link].pins
        if pins and not any(point.link == link or point.pin in pins for point in step.points):
            pin = names.linkage.pins[pins[0]]
            chain = hanging.chain(link, pin.at)
            if not pin.fixed and any(term.kind != "known" for term in names.moving(chain)):
                speed = names.speed(names.solved.velocity(link, pin.at))
                yield f"v_{pin.name} = {names.chain(chain)} = {speed}"


def _drive_sentence(names: Names, step: StepWorking, drive: Drive) -> str:
    stated = "assumed" if drive.source == "assumed" else "stated"
    on_frame = drive.against == names.linkage.frame
    if drive.kind == "slide" and drive.joint is not None:
        joint = names.linkage.joints[drive.joint]
        other, link = joint.first, joint.second
        pace = (joint.direction or 0j) * (drive.rate if drive.link == link else -drive.rate)
        if link == names.linkage.frame:
            other, link, pace = link, other, -pace
        base = "the frame" if other == names.linkage.frame else names.link(other)
        return f"{names.link(link)} slides on {base} at {names.speed(pace)}, as {stated}"
    if on_frame:
        return f"{names.omega(drive.link)} = {rotation(drive.rate)}, as {stated}"
    if drive.against in step.step.links:
        relation = f"{names.omega(drive.link)} - {names.omega(drive.against)}"
        return f"{relation} = {figure(drive.rate)} rad/s, as {stated}"
    sign = "+" if drive.rate >= 0.0 else "-"
    total = f"{names.omega(drive.against)} {sign} {figure(abs(drive.rate))} = {rotation(names.turning(drive.link))}"
    return f"{names.omega(drive.link)} = {total}, as {stated} against {names.link(drive.against)}"


def _shared_sentence(names: Names, link: int, other: int) -> str:
    if other == names.linkage.frame:
        return f"{names.link(link)} slides on the frame and does not turn"
    return f"{names.omega(link)} = {names.omega(other)}, as {names.link(link)} slides on {names.link(other)}"


def _chain_sentences(names: Names, chains: tuple[Chain, Chain]) -> list[str]:
    """Both ways to the closing place as sums, and every r in figures."""
    end = names.place(chains[0][-1].end)
    sentences = []
    for chain in sorted(chains, key=len):
        moving = names.moving(chain)
        plain = len(moving) == 1 and moving[0].given
        sentences.append(
            f"v_{end} = {names.speed(moving[0].vector)}, known" if plain else f"v_{end} = {names.chain(chain)}"
        )
    for term in (term for chain in chains for term in chain):
        if term.kind == "turn" and term.start is not None:
            arm = term.end - term.start
            length = f"{figure(abs(arm))} {names.unit} towards {names.towards(arm)} deg"
            square = f"so {_side_name(names, term, chains)} is towards {names.towards(1j * arm)} deg or back"
            sentences.append(f"{names.arm(term)} = {names.point(arm)}: {length}, {square}")
        elif term.kind == "slide":
            sentences.append(names.sliding(term))
    return sentences


def _side_name(names: Names, term: Term, chains: tuple[Chain, Chain]) -> str:
    """What a side is called: a pin's whole velocity where nothing that moves stands before or beside it."""
    moving = names.moving(next(chain for chain in chains if term in chain))
    alone = moving == [term] and term.end == chains[0][-1].end
    own = term.kind == "turn" and names.pin_at(term.end) in names.linkage.links[term.number].pins
    return f"v_{names.place(term.end)}" if alone or (own and moving[:1] == [term]) else names.velocity_name(term)


def _side_columns(names: Names, closing: Closing, chains: tuple[Chain, Chain]) -> list[Column]:
    """The sides: what is known, then what is sought; with the angles opposite and the sine rule in a triangle."""
    moving = [(term, sign) for chain, sign in zip(chains, ("", "-"), strict=True) for term in names.moving(chain)]
    known = [(term, sign) for term, sign in moving if term.given]
    rows: list[tuple[str, Point]] = [(_side_name(names, term, chains), term.vector) for term, _ in known]
    if len(known) != 1:
        together = sum([-term.vector if sign else term.vector for term, sign in known], 0j)
        rows.append((_sum_name(names, known), together))
    before = len(rows) - 1
    rows += [(_side_name(names, term, chains), term.vector) for term, _ in moving if not term.given]
    columns = [
        Column("side", "", [name for name, _ in rows], numeric=False),
        Column("size", f"{names.unit}/s", [figure(abs(vector), names.noise) for _, vector in rows]),
        Column("towards", "deg", [_heading(names, vector) for _, vector in rows]),
    ]
    triangle = closing.triangle
    if triangle is not None and triangle.angles is not None and triangle.ratios is not None:
        blank = [NOT_APPLICABLE] * before
        angles = [figure(math.degrees(angle)) for angle in triangle.angles]
        columns.append(Column("angle opposite", "deg", [*blank, *angles]))
        columns.append(Column("size/sin", f"{names.unit}/s", [*blank, *map(figure, triangle.ratios)]))
    return columns


def _sum_name(names: Names, known: list[tuple[Term, str]]) -> str:
    """'v_B - v_D': the known side where several velocities make it; '0' where all that is known rests."""
    text = ""
    for term, sign in known:
        joiner = (" - " if sign else " + ") if text else sign
        text += joiner + names.velocity_name(term)
    return text or "known"


def _heading(names: Names, vector: Point) -> str:
    return NOT_APPLICABLE if abs(vector) <= names.noise else names.towards(vector)


def _result_sentences(names: Names, closing: Closing, chains: tuple[Chain, Chain]) -> Iterator[str]:
    """Why there is no triangle where there is none, and the angular velocities that follow."""
    sought = [term for chain in chains for term in chain if not term.given]
    if closing.triangle is not None and closing.triangle.angles is None:
        yield _no_triangle(names, closing.triangle, sought, chains)
    for term in sought:
        if term.kind == "turn":
            size, arm = abs(term.vector), figure(abs(term.factor))
            name, omega = _side_name(names, term, chains), names.turning(term.number)
            share = f"{name} / {names.arm(term)} = {figure(size, names.noise)} / {arm}"
            yield f"{names.omega(term.number)} = {share} = {rotation(omega)}"


def _no_triangle(names: Names, triangle: Triangle, sought: list[Term], chains: tuple[Chain, Chain]) -> str:
    """What the sides do where they enclose no triangle."""
    if abs(triangle.sides[0]) <= names.noise:
        return "no triangle: the known side is 0, and the sides sought have two directions, so they are 0 too"
    still = [_side_name(names, term, chains) for term in sought if abs(term.vector) <= names.noise]
    if still:
        return f"no triangle: the known side lies along one of those sought, so {listed(still)} = 0"
    return "no triangle: all three lie along one line (within rounding); the sizes are the solution's"


def _told(names: Names, closing: Closing) -> int | None:
    """The pin whose whole velocity the table of sides shows already."""
    if closing.chains is None:
        return None
    alone = any(len(names.moving(chain)) <= 1 for chain in closing.chains)
    return names.pin_at(closing.chains[0][-1].end) if alone else None


def _point_sentences(names: Names, point: PointVelocity) -> list[str]:
    """One pin's velocity from another of its link: a product where that rests, else by components."""
    pins, omega = names.linkage.pins, names.turning(point.link)
    pin, base = pins[point.pin].name, pins[point.base].name
    result = names.speed(point.velocity)
    if not omega:
        return [f"v_{pin} = v_{base} = {result}, as {names.link(point.link)} does not turn"]
    turn = f"{names.omega(point.link)} x r_{pin}/{base}"
    if abs(point.base_velocity) <= names.noise:
        return [f"v_{pin} = {turn}: {figure(abs(omega))} x {figure(abs(point.arm))} = {result}"]
    least = SHOWN_AS_ZERO * names.solved.reach
    across = _added(
        figure(point.base_velocity.real, names.noise), -omega * point.arm.imag, omega, point.arm.imag, least
    )
    up = _added(figure(point.base_velocity.imag, names.noise), omega * point.arm.real, omega, point.arm.real, least)
    return [
        f"v_{pin} = v_{base} + {turn}, r_{pin}/{base} = {names.point(point.arm)}",
        f"= ({across}, {up})",
        f"= {names.components(point.velocity)}: {result}",
    ]


def _added(start: str, product: float, omega: float, arm: float, least: float) -> str:
    """'start + |omega| x |arm|', the sign being that of the product."""
    sign = "-" if product < 0.0 else "+"
    return f"{start} {sign} {figure(abs(omega))} x {figure(abs(arm), least)}"


def _closing_words(names: Names, working: Working) -> str:
    """By how much what is written fails to close."""
    poles = [pole.gap for step in working.steps for pole in step.poles if pole.case == "crossing"]
    if not names.solved.fastest:
        return "Nothing moves"
    words = (
        f"Closing error: at most {working.closing:.1g} of the greatest speed, {figure(names.solved.fastest)} "
        f"{names.unit}/s"
    )
    return words + (f"; lines cross within {max(poles):.1g} {names.unit} of the solution's poles" if poles else "")
