from __future__ import annotations

from itertools import permutations

from dxfcheck.reading.lines.unions import Unions


def joined(count: int, *pairs: tuple[int, int]) -> Unions:
    unions = Unions(count)
    for pair in pairs:
        unions.join(*pair)
    return unions


def test_everything_starts_in_a_set_of_its_own() -> None:
    assert Unions(3).groups() == [[0], [1], [2]]


def test_joining_is_transitive() -> None:
    unions = joined(5, (4, 2), (2, 3))
    assert unions.groups() == [[0], [1], [2, 3, 4]]
    assert unions.of(4) == unions.of(3)
    assert unions.of(4) != unions.of(0)


def test_the_least_member_stands_for_a_set_in_whatever_order_they_are_joined() -> None:
    for pairs in permutations([(5, 4), (4, 1), (1, 3)]):
        unions = joined(6, *pairs)
        assert {unions.of(member) for member in (1, 3, 4, 5)} == {1}


def test_a_chain_of_thousands_is_no_trouble() -> None:
    count = 5000
    assert len(joined(count, *((number, number - 1) for number in range(count - 1, 0, -1))).groups()) == 1


def test_no_members_make_no_groups() -> None:
    assert Unions(0).groups() == []
