from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Arc, BlockUse, Path, Ring, Segment, Source
from dxfcheck.reading.lines.linework import make_linework
from dxfcheck.reading.lines.pins import find_pins
from dxfcheck.reading.shapes.part_blocks import PartGroup, part_groups
from tests.sketches import TOLERANCE


def inside(entity: int, *uses: BlockUse) -> Source:
    return Source(entity, "1", "0", "CONTINUOUS", uses)


def parts(lines: list[Source], rings: list[tuple[Source, complex]], *patterns: str) -> list[PartGroup]:
    drawn: list[Segment | Arc | Path] = [Segment(source, 0j, 10 + number * 1j) for number, source in enumerate(lines)]
    sites = find_pins([Ring(source, at, 2.0) for source, at in rings], TOLERANCE)
    return part_groups(make_linework(drawn, ()).strands, sites.pins, patterns)


ARM, OTHER_ARM = BlockUse("ARM", "A1"), BlockUse("ARM", "A2")
SHEET = inside(9)


def test_a_reference_is_one_part_with_its_lines_and_rings() -> None:
    one, other = inside(0, ARM), inside(1, OTHER_ARM)
    lines = [one, one, SHEET, other]
    rings = [(one, 0j), (one, 50 + 0j), (other, 100 + 0j), (SHEET, 150 + 0j)]
    assert parts(lines, rings, "ARM") == [PartGroup("ARM", (0, 1), (0, 1)), PartGroup("ARM", (3,), (2,))]


def test_a_pin_with_rings_of_two_parts_belongs_to_both() -> None:
    one, other = inside(0, ARM), inside(1, OTHER_ARM)
    found = parts([one, other], [(one, 0j), (one, 50 + 0j), (other, 50 + 0j)], "ARM")
    assert [group.sites for group in found] == [(0, 1), (1,)]


@pytest.mark.parametrize(
    ("pattern", "count"), [("arm", 1), ("A*", 1), ("*r?", 1), ("ÄRM", 1), ("ARM2", 0), ("LEG", 0), ("", 0)]
)
def test_names_are_compared_as_patterns_without_case(pattern: str, count: int) -> None:
    assert len(parts([inside(0, ARM)], [], pattern)) == count


def test_without_patterns_there_are_no_parts() -> None:
    assert parts([inside(0, ARM)], []) == []


def test_of_nested_references_the_outermost_that_matches_counts() -> None:
    assembly, bolt = BlockUse("ASSEMBLY", "B1"), BlockUse("BOLT", "C1")
    nested = [inside(0, assembly, ARM), inside(0, assembly, ARM, bolt), inside(0, assembly, OTHER_ARM)]
    assert [group.strands for group in parts(nested, [], "ARM", "BOLT")] == [(0, 1), (2,)]
    assert [group.strands for group in parts(nested, [], "ARM", "ASSEMBLY")] == [(0, 1, 2)]


def test_two_references_to_an_assembly_hold_parts_of_their_own() -> None:
    assembly = BlockUse("ASSEMBLY", "B1")
    found = parts([inside(0, assembly, ARM), inside(1, assembly._replace(handle="B2"), ARM)], [], "ARM")
    assert [group.strands for group in found] == [(0,), (1,)]


def test_copies_of_an_array_are_parts_of_their_own() -> None:
    copies = [inside(0, ARM._replace(copy=number)) for number in (0, 1, 1)]
    assert [group.strands for group in parts(copies, [], "ARM")] == [(0,), (1, 2)]


def test_strands_used_up_as_rings_are_left_out() -> None:
    drawn = make_linework([Segment(inside(0, ARM), 0j, 10 + 0j), Segment(inside(0, ARM), 0j, 20 + 0j)], ())
    assert part_groups(drawn.strands, (), ("ARM",), apart={0}) == [PartGroup("ARM", (1,), ())]
