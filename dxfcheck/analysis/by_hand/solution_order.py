"""The order in which a person would solve the velocities of a linkage, link after link.

What is known grows from the frame: first single links that known ones hold in full (a driven crank, a geared wheel, a
slotted lever), then pairs of links joined to one another whose other joints are on known ones (dyads). Where neither is
left, the smallest set of links that become determined together is solved at once (block_order).
"""

from __future__ import annotations

from collections import deque
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from typing import Literal, NamedTuple

import numpy as np

from dxfcheck.analysis.by_hand.block_order import UNKNOWNS, blocks_in_order
from dxfcheck.analysis.freedom.constraints import CELLS, ROWS, Body, Matrix, bodies_of, rows_of_joint
from dxfcheck.analysis.speeds.velocity import rate_row
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import JointKind, Linkage
from dxfcheck.tolerances.analysis import DENSE_LINKS, RANK_RELATIVE

__all__ = ["SolutionStep", "StepKind", "solution_order"]

StepKind = Literal["single", "dyad", "group"]


@dataclass(frozen=True, slots=True, kw_only=True)
class SolutionStep:
    """Links that are solved together; ``joints`` and ``drives`` are all that tie them to known links and each other.

    All are indices into the linkage's own, each in order.
    """

    kind: StepKind
    links: tuple[int, ...]
    joints: tuple[int, ...]
    drives: tuple[int, ...]


class _Condition(NamedTuple):
    """One joint (``acts_as`` its kind) or drive (None): the links that it relates, and how many equations it gives."""

    ends: tuple[int, int]
    rows: int
    number: int
    acts_as: JointKind | None


def solution_order(linkage: Linkage, taken: Sequence[int]) -> tuple[SolutionStep, ...]:
    """Every moving link in exactly one step; ``taken`` are the drives (indices) that set the linkage in motion.

    It is meant for linkages whose every link is settled by these drives: what nothing settles is one last group. The
    order is the same every time. Cost near-linear in the links where few are solved at once.
    """
    return tuple(_Growth(linkage, taken).steps())


class _Growth:
    """What is known so far, and which links may have become simple to solve since."""

    def __init__(self, linkage: Linkage, taken: Sequence[int]) -> None:
        self._linkage = linkage
        self._bodies = bodies_of(linkage)
        self._conditions = _conditions(linkage, taken)
        self._of_link: list[list[int]] = [[] for _ in linkage.links]
        for number, condition in enumerate(self._conditions):
            for link in condition.ends:
                self._of_link[link].append(number)
        self._known = {linkage.frame}
        self._singles = deque(self._neighbours(linkage.frame))
        self._pairs = deque(self._singles)

    def steps(self) -> Iterator[SolutionStep]:
        """All steps, in order."""
        yield from self._simple_steps()
        unknown = self._unknown()
        for block in blocks_in_order(unknown, self._open_rows()) if unknown else ():
            rest = [link for link in block if link not in self._known]
            if rest and self._settles(rest):
                yield self._take("group", rest)
                yield from self._simple_steps()
        unknown = self._unknown()
        if unknown:
            yield self._take("group", unknown)

    def _simple_steps(self) -> Iterator[SolutionStep]:
        """Single links as long as there are any, and the first pair where there are none."""
        while self._singles or self._pairs:
            if self._singles:
                link = self._singles.popleft()
                if link not in self._known and self._settles([link]):
                    yield self._take("single", [link])
                continue
            link = self._pairs.popleft()
            others = [] if link in self._known else self._neighbours(link)
            other = next((other for other in others if self._settles([link, other])), None)
            if other is not None:
                yield self._take("dyad", sorted((link, other)))

    def _unknown(self) -> list[int]:
        return [link for link in range(len(self._linkage.links)) if link not in self._known]

    def _open_rows(self) -> list[tuple[int, ...]]:
        """The unknown links of every equation that has any."""
        rows = [
            tuple([link for link in each.ends if link not in self._known])
            for each in self._conditions
            for _ in range(each.rows)
        ]
        return [row for row in rows if row]

    def _neighbours(self, link: int) -> list[int]:
        """Unknown links that share a joint or drive with this one, in the order of those."""
        ends = [self._conditions[number].ends for number in self._of_link[link]]
        others = dict.fromkeys(first if second == link else second for first, second in ends)
        return [other for other in others if other not in self._known]

    def _take(self, kind: StepKind, links: list[int]) -> SolutionStep:
        inner = self._between(links)
        self._known.update(links)
        touched = dict.fromkeys(other for link in links for other in self._neighbours(link))
        self._singles.extend(touched)
        self._pairs.extend(touched)
        return SolutionStep(
            kind=kind,
            links=tuple(links),
            joints=tuple([each.number for each in inner if each.acts_as is not None]),
            drives=tuple([each.number for each in inner if each.acts_as is None]),
        )

    def _between(self, links: Iterable[int]) -> list[_Condition]:
        """The conditions that relate these links to known ones or to one another."""
        members = set(links)
        near = [self._conditions[number] for number in sorted({n for link in members for n in self._of_link[link]})]
        return [each for each in near if all(link in members or link in self._known for link in each.ends)]

    def _settles(self, links: list[int]) -> bool:
        """Whether these links are determined once the known ones are: by count, then by rank at the drawn pose.

        Of very many links the count is all that is asked for: nobody solves them by hand in any order.
        """
        between = self._between(links)
        if sum([each.rows for each in between]) < UNKNOWNS * len(links):
            return False
        if len(links) > DENSE_LINKS:
            return True
        matrix = _matrix(self._linkage, self._bodies, between, links)
        values: list[float] = np.linalg.svd(matrix, compute_uv=False).tolist()
        return values[-1] > RANK_RELATIVE * values[0]


def _conditions(linkage: Linkage, taken: Sequence[int]) -> list[_Condition]:
    joints = [
        _Condition((place.first, place.second), rows_of_joint(place.acts_as), number, place.acts_as)
        for number, place in enumerate(topology_of(linkage).joints)
    ]
    drives = [
        _Condition((linkage.drives[number].against, linkage.drives[number].link), 1, number, None) for number in taken
    ]
    return [*joints, *drives]


def _matrix(linkage: Linkage, bodies: list[Body], conditions: list[_Condition], links: list[int]) -> Matrix:
    """The equations over the unknowns of these links alone, scaled as in the first formulation."""
    column = {link: UNKNOWNS * place for place, link in enumerate(links)}
    matrix = np.zeros((sum([each.rows for each in conditions]), UNKNOWNS * len(links)))
    row = 0
    for each in conditions:
        if each.acts_as is None:
            _fill_drive(matrix[row], linkage, bodies, each.number, column)
        else:
            joint = linkage.joints[each.number]
            for link, sign in zip(each.ends, (-1.0, 1.0), strict=True):
                if link in column:
                    cells = ROWS[each.acts_as](joint, bodies[link], sign, bodies)
                    for (down, right), value in zip(CELLS[each.acts_as], cells, strict=True):
                        matrix[row + down, column[link] + right] = value
        row += each.rows
    return matrix


def _fill_drive(row: Matrix, linkage: Linkage, bodies: list[Body], number: int, column: dict[int, int]) -> None:
    """One drive over the unknowns of the links that have columns."""
    moving = {link - (link > linkage.frame): link for link in column}
    for cell, weight in rate_row(linkage.drives[number], linkage, bodies).cells:
        link = moving.get(cell // UNKNOWNS)
        if link is not None:
            row[column[link] + cell % UNKNOWNS] += weight
