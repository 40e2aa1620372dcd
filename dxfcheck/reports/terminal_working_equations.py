"""Equations of the hand working: a table of coefficients, the unknowns' values, and how well they fit."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.analysis.by_hand.closing import Closing, Equation, Unknown
from dxfcheck.analysis.by_hand.closure import Chain, Hanging, hang
from dxfcheck.analysis.by_hand.solved_linkage import acts_as
from dxfcheck.analysis.by_hand.working import StepWorking
from dxfcheck.geometry import Point
from dxfcheck.reports.terminal_layout import Column, Line, count_of, figure, fold, table
from dxfcheck.reports.terminal_working_terms import Names, rotation
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["equation_lines"]

FURTHER = " " * 4
COLUMNS = 5
"""Equations in more unknowns than this are written as sums, since a table would not fit a line."""


def equation_lines(names: Names, step: StepWorking, width: int, indent: str) -> Iterator[Line]:
    """What the links agree on, the equations with their numbers, the solution and what it leaves."""
    for sentence in _before(names, step):
        yield from map(Line, fold(sentence, width, indent, indent + FURTHER))
    if not step.closing.written_out:
        return
    closing = step.closing
    symbols = _symbols(names, closing)
    if len(symbols) <= COLUMNS:
        yield from table(_columns(names, closing, symbols), width, indent)
    else:
        for equation in closing.equations:
            yield from map(Line, fold(_sum(names, equation, symbols), width, indent, indent + FURTHER))
    share = _share(names, closing)
    for unknown in closing.unknowns:
        yield from map(Line, fold(_value(names, unknown, share), width, indent, indent + FURTHER))
    yield Line(f"{indent}put in, they leave at most {_left(names, closing)}")


def _before(names: Names, step: StepWorking) -> Iterator[str]:
    """How many equations there are, and where each comes from."""
    closing, solved = step.closing, names.solved
    if not closing.written_out:
        yield (
            f"{len(closing.unknowns)} unknowns hang together: too many to solve by hand; put into the equations, the "
            f"solution leaves at most {_left(names, closing)}"
        )
        return
    counted = f"{count_of(len(closing.equations), 'equation')} in {count_of(len(closing.unknowns), 'unknown')}"
    arms: dict[str, str] = {}
    known: dict[str, str] = {}
    for chains, where in _sums(names, hang(solved, step.step)):
        yield f"{where}: {' = '.join(map(names.chain, chains))}"
        for term in chains[0] + chains[1]:
            if term.kind == "turn" and term.start is not None:
                arms[names.arm(term)] = names.point(term.end - term.start)
            elif term.kind == "known" and abs(term.vector) > names.noise:
                known[names.velocity_name(term)] = f"{names.components(term.vector)} {names.unit}/s"
    if arms or known:
        yield ", ".join(f"{name} = {value}" for name, value in (*arms.items(), *known.items()))
    for unknown in closing.unknowns:
        if unknown.kind == "slide":
            yield names.sliding_positive(unknown.number, unknown.link)
    if len(closing.unknowns) > 1:
        pairs = zip(_symbols(names, closing), closing.unknowns, strict=True)
        yield f"{counted}: {', '.join(f'{short} = {_symbol(names, each)}' for short, each in pairs)}"


def _sums(names: Names, hanging: Hanging) -> Iterator[tuple[tuple[Chain, Chain], str]]:
    """Both chains to each closing joint, and where it lies."""
    for number in hanging.closing:
        joint = names.linkage.joints[number]
        kind, at = acts_as(joint), names.place(joint.at)
        contact = f"along the contact {at} at {names.point(joint.at)}"
        where = {"pin": f"at {at}", "rolling": contact, "slide": f"across the slide at {at}"}
        chains = hanging.chain(joint.first, joint.at), hanging.chain(joint.second, joint.at)
        yield chains, where.get(kind, f"across the slot at {at}")


def _symbols(names: Names, closing: Closing) -> list[str]:
    """x1, x2, ... for several unknowns; one keeps its name."""
    if len(closing.unknowns) == 1:
        return [_symbol(names, closing.unknowns[0])]
    return [f"x{number}" for number in range(1, len(closing.unknowns) + 1)]


def _left(names: Names, closing: Closing) -> str:
    return f"{closing.gap:.1g} {names.unit}/s"


def _symbol(names: Names, unknown: Unknown) -> str:
    if unknown.kind == "turn":
        return names.omega(unknown.link)
    return f"{'u' if unknown.kind == 'slide' else 'n'}({names.link(unknown.link)})"


def _share(names: Names, closing: Closing) -> str:
    """'200 / -60 = ' where one equation gives one unknown; nothing else."""
    if len(closing.unknowns) != 1 or len(closing.equations) != 1:
        return ""
    equation = closing.equations[0]
    return f"{figure(equation.right, names.noise)} / {figure(equation.cells[0])} = "


def _value(names: Names, unknown: Unknown, share: str) -> str:
    name = f"{_symbol(names, unknown)} = {share}"
    if unknown.kind != "turn":
        return f"{name}{figure(unknown.value, names.noise)} {names.unit}/s"
    omega = names.turning(unknown.link)
    plain = f"{figure(omega)}: " if share and omega < 0.0 else ""
    return f"{name}{plain}{rotation(omega)}"


def _columns(names: Names, closing: Closing, symbols: list[str]) -> list[Column]:
    """A row an equation; coefficients of omega are lengths, those of speeds numbers."""
    equations = closing.equations
    columns = [Column("at", "", [_where(names, equation) for equation in equations], numeric=False)]
    least = SHOWN_AS_ZERO * names.solved.reach
    for number, (symbol, unknown) in enumerate(zip(symbols, closing.unknowns, strict=True)):
        turns = unknown.kind == "turn"
        cells = [figure(each.cells[number], least if turns else SHOWN_AS_ZERO) for each in equations]
        columns.append(Column(symbol, names.unit if turns else "", cells))
    right = [figure(each.right, names.noise) for each in equations]
    return [*columns, Column("= right side", f"{names.unit}/s", right)]


def _sum(names: Names, equation: Equation, symbols: list[str]) -> str:
    """'C along x: -56.38 x1 + 120 x3 = 227.2'."""
    text = ""
    for cell, symbol in zip(equation.cells, symbols, strict=True):
        size = figure(abs(cell), SHOWN_AS_ZERO * names.solved.reach)
        if size != "0":
            sign = ("- " if cell < 0.0 else "+ ") if text else ("-" if cell < 0.0 else "")
            text += f"{' ' if text else ''}{sign}{size} {symbol}"
    return f"{_where(names, equation)}: {text or '0'} = {figure(equation.right, names.noise)}"


def _where(names: Names, equation: Equation) -> str:
    """What an equation is about: a joint and a direction there, or a drive."""
    if equation.joint is None:
        return "the drive, rad/s" if equation.axis is None else "the drive"
    joint = names.linkage.joints[equation.joint]
    at = names.place(joint.at)
    if equation.axis is None:
        return f"{at} turning, rad/s"
    kind = acts_as(joint)
    return f"{at} {'contact, ' if kind == 'rolling' else ''}{_way(names, equation.axis)}"


def _way(names: Names, axis: Point) -> str:
    if axis in (1, 1j):
        return "along x" if axis == 1 else "along y"
    return f"towards {names.towards(axis)} deg"
