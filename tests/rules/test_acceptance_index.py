from __future__ import annotations

import pytest

from dxfcheck.rules.acceptance_index import AcceptanceIndex
from dxfcheck.rules.finding import Finding
from dxfcheck.settings import Acceptance

REACH = 0.1


def finding(at: complex | None = None, *handles: str, rule: str = "near-miss") -> Finding:
    return Finding(rule=rule, severity="error", message="m", remedy="r", at=at, handles=handles)


def acceptance(at: complex | None = None, handle: str | None = None, rule: str = "near-miss") -> Acceptance:
    return Acceptance(rule=rule, reason="meant so", at=at, handle=handle)


@pytest.mark.parametrize(
    ("stated", "found", "meant"),
    [
        (acceptance(10 + 5j), finding(10 + 5j), True),
        (acceptance(10 + 5j), finding(10.09 + 5j, "2F"), True),
        (acceptance(10 + 5j), finding(10.08 + 5.08j), False),
        (acceptance(10 + 5j), finding(9.99 + 4.99j), True),
        (acceptance(-0.01 - 0.01j), finding(0.01 + 0.01j), True),
        (acceptance(10 + 5j), finding(11 + 5j), False),
        (acceptance(10 + 5j), finding(10 + 5j, rule="loose-end"), False),
        (acceptance(10 + 5j), finding(None), False),
        (acceptance(None, "2f"), finding(10 + 5j, "30", "2F"), True),
        (acceptance(None, "2F"), finding(10 + 5j, "30"), False),
        (acceptance(None, "2F"), finding(None), False),
        (acceptance(99 + 0j, "2F"), finding(10 + 5j, "2F"), True),
        (acceptance(), finding(), True),
        (acceptance(), finding(0j), False),
        (acceptance(), finding(None, "2F"), False),
    ],
)
def test_an_acceptance_is_about_what_is_at_its_place_or_has_its_handle_or_neither(
    stated: Acceptance,
    found: Finding,
    meant: bool,  # noqa: FBT001
) -> None:
    assert AcceptanceIndex([stated], REACH).about(found) == ([0] if meant else [])


def test_those_about_one_finding_come_in_the_order_of_adding() -> None:
    index = AcceptanceIndex([acceptance(handle="2F"), acceptance(5 + 5j)], REACH)
    index.add(acceptance(0.05j))
    index.add(acceptance(0j))
    assert index.about(finding(0j, "2F")) == [0, 2, 3]


def test_without_a_reach_only_the_very_place_counts() -> None:
    index = AcceptanceIndex([acceptance(2 + 3j)], 0.0)
    assert index.about(finding(2 + 3j)) == [0]
    assert index.about(finding(2 + 3.000001j)) == []
