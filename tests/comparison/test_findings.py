from __future__ import annotations

import dataclasses

from dxfcheck.comparison.findings import FindingPlaces, compare_findings
from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding
from tests.reports.samples import tipper

REPORT = tipper()
PINS = {(0, number): (0, number) for number in range(len(REPORT.mechanisms[0].linkage.pins))}
REACH = 2.0


def finding(rule: str = "loose-end", at: Point | None = None, mechanism: str | None = None) -> Finding:
    return Finding(rule=rule, severity="warning", message="m", remedy="r", at=at, mechanism=mechanism)


def places(shift: Point = 0j) -> FindingPlaces:
    return FindingPlaces(REPORT, lambda place: place + shift, PINS, {"M1": "M1"})


def differences(old: list[Finding], new: list[Finding], shift: Point = 0j) -> tuple[int, int]:
    fresh, cured = compare_findings(old, new, places(shift), places(), REACH)
    return len(fresh), len(cured)


def test_one_that_lies_where_it_lay_on_the_moved_sheet_stays() -> None:
    assert differences([finding(at=500j)], [finding(at=501j + 30)], shift=30) == (0, 0)
    assert differences([finding(at=500j)], [finding(at=510j + 30)], shift=30) == (1, 1)


def test_one_of_another_rule_or_mechanism_is_another_one() -> None:
    assert differences([finding(at=500j)], [finding("empty-pin", at=500j)]) == (1, 1)
    assert differences([finding(at=500j, mechanism="M1")], [finding(at=500j)]) == (1, 1)


def test_a_pin_that_moved_takes_its_finding_along() -> None:
    pin = REPORT.mechanisms[0].linkage.pins[1].at
    assert differences([finding(at=pin)], [finding(at=pin)], shift=1000) == (0, 0)


def test_findings_without_a_place_go_by_rule_and_mechanism_and_are_counted() -> None:
    bare = finding("units-missing")
    assert differences([bare], [bare, dataclasses.replace(bare, message="other")]) == (1, 0)
    assert differences([finding("no-motion", mechanism="M1")], [finding("no-motion")]) == (1, 1)


def test_the_one_finding_on_unlabelled_pins_stays_wherever_the_first_of_them_is() -> None:
    assert differences([finding("unlabelled-pins", at=0j)], [finding("unlabelled-pins", at=900j)]) == (0, 0)


def test_of_two_near_ones_the_nearest_stays() -> None:
    fresh, cured = compare_findings(
        [finding(at=500j), finding(at=501j)], [finding(at=500.9j)], places(), places(), REACH
    )
    assert fresh == ()
    assert [each.at for each in cured] == [500j]
