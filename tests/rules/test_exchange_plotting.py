from __future__ import annotations

import dataclasses

from dxfcheck.analysis import analyse
from dxfcheck.reading.read import read_linkages
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import run_rules
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.settings import Settings
from tests.sketches import A, B, C, D, Drawn, labels, line, pins, ring, rod, sketch, tipper


def unplotted(*things: Drawn, layers: frozenset[str] = frozenset({"DEFPOINTS"})) -> list[Finding]:
    drawn = dataclasses.replace(sketch(*things), unplotted=layers)
    reading = read_linkages(drawn, Settings())
    mechanisms = tuple((linkage, analyse(linkage)) for linkage in reading.linkages)
    subject = RuleSubject(sketch=drawn, reading=reading, mechanisms=mechanisms, settings=Settings())
    return [found for found in run_rules(subject) if found.rule == "unplotted-linework"]


def forgotten(start: complex, end: complex) -> Drawn:
    return line(start, end, layer="DEFPOINTS", handle="forgotten")


def test_links_on_a_layer_that_is_not_plotted_are_counted() -> None:
    rods = (line(A, B, layer="HIDE"), line(B, C, layer="HIDE"), rod(C, D))
    (found,) = unplotted(*pins(), *rods, *labels(), layers=frozenset({"HIDE"}))
    assert (found.severity, found.layer) == ("warning", "HIDE")
    assert found.message.startswith("2 entities of the linkage on layer HIDE, which is not plotted")


def test_other_things_on_such_a_layer_are_nothing_to_tell() -> None:
    assert unplotted(*tipper(), line(900j, 950j, layer="HIDE"), layers=frozenset({"HIDE"})) == []
    assert unplotted(*tipper(), layers=frozenset()) == []


def test_a_link_forgotten_on_defpoints_is_told() -> None:
    (found,) = unplotted(*pins(), rod(A, B), forgotten(B, C), rod(C, D), *labels())
    assert (found.severity, found.handles) == ("warning", ("forgotten",))
    assert "from (20, 35) to (160, 80)" in found.message


def test_construction_lines_on_defpoints_are_no_links() -> None:
    assert unplotted(*tipper(), forgotten(A, D)) == []
    assert unplotted(*tipper(), forgotten(A, C)) == []
    assert unplotted(*tipper(), forgotten(B + 7j, C + 7j)) == []


def test_a_whole_linkage_on_defpoints_is_told_and_a_lone_line_is_not() -> None:
    rings = [ring(at) for at in (A, B, C, D)]
    assert len(unplotted(*rings, forgotten(A, B), forgotten(B, C))) == 1
    assert unplotted(*rings, forgotten(A, B)) == []
