from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Entity, Fate, Notice
from tests.rules.subjects import findings, only
from tests.sketches import tipper

AMONG, ELSEWHERE = 80 + 40j, 900 + 900j


def notice(kind: str, detail: str, at: complex | None = None) -> Notice:
    """About the first entity."""
    return Notice(kind, detail, 0, at, None)


def unread(kind: str, at: complex | None, why: str = "kind of entity that is not read") -> Entity:
    return Entity("5A", kind, "MISC", Fate("unread", why), at)


def hidden(why: str, layer: str = "OLD", kind: str = "LINE", at: complex = 3 + 4j) -> Entity:
    return Entity("5B", kind, layer, Fate("skipped", why), at)


@pytest.mark.parametrize("why", ["layer is off", "layer is frozen", "invisible"])
def test_hidden_linework_is_told_by_layer_and_reason(why: str) -> None:
    found = only("hidden-linework", *tipper(), entities=[hidden(why), hidden(why)])
    assert found.severity == "warning"
    assert found.message == f"2 entities on layer OLD not read: {why}"
    assert (found.at, found.handles, found.layer) == (3 + 4j, ("5B", "5B"), "OLD")


def test_each_hidden_layer_is_a_finding_of_its_own() -> None:
    entities = [hidden("layer is off"), hidden("layer is off", "OLDER")]
    assert [found.layer for found in findings("hidden-linework", *tipper(), entities=entities)] == ["OLD", "OLDER"]


def test_hidden_texts_are_no_hidden_linework() -> None:
    assert findings("hidden-linework", *tipper(), entities=[hidden("layer is off", kind="TEXT")]) == []
    assert findings("hidden-linework", *tipper(), entities=[hidden("paper space")]) == []


def test_hidden_parts_of_a_block_reference_are_told() -> None:
    found = only("hidden-linework", *tipper(), notices=[notice("hidden-part", "layer is off")])
    assert found.message.endswith("layer is off inside the block reference")


@pytest.mark.parametrize(
    ("at", "severity", "where"),
    [
        pytest.param(AMONG, "warning", "among the links", id="among the links"),
        pytest.param(ELSEWHERE, "note", "elsewhere", id="elsewhere"),
        pytest.param(None, "note", "elsewhere", id="nowhere"),
    ],
)
def test_an_unread_entity_weighs_more_among_the_links(at: complex | None, severity: str, where: str) -> None:
    found = only("unread-entity", *tipper(), entities=[unread("SPLINE", at)])
    assert found.severity == severity
    assert found.message.startswith(f"1 SPLINE {where}")
    assert (found.at, found.handles, found.layer) == (at, ("5A",), "MISC")


def test_unread_entities_are_grouped_by_type_and_reason() -> None:
    entities = [unread("SPLINE", AMONG), unread("SPLINE", AMONG), unread("BODY", AMONG), unread("SPLINE", ELSEWHERE)]
    messages = [found.message for found in findings("unread-entity", *tipper(), entities=entities)]
    assert [message.split(" (")[0] for message in messages] == [
        "1 BODY among the links at",
        "2 SPLINE among the links at",
        "1 SPLINE elsewhere on the sheet",
    ]


def test_what_another_rule_tells_is_not_told_twice() -> None:
    off = unread("LINE", AMONG, "lies off the plane of the sheet")
    assert findings("unread-entity", *tipper(), entities=[off]) == []


def test_a_block_with_unread_parts_is_told() -> None:
    found = only("unread-entity", *tipper(), notices=[notice("unread-part", "a SPLINE in block CAM", AMONG)])
    assert found.severity == "warning"
    assert "parts of a block reference" in found.message
    assert "a SPLINE in block CAM" in found.message


def test_hidden_linework_away_from_the_links_is_a_note() -> None:
    found = only("hidden-linework", *tipper(), entities=[hidden("layer is off", at=ELSEWHERE)])
    assert (found.severity, found.message) == (
        "note",
        "1 entity on layer OLD, away from the links, not read: layer is off",
    )


def test_hidden_linework_weighs_where_no_linkage_was_read() -> None:
    assert only("hidden-linework", entities=[hidden("layer is off", at=ELSEWHERE)]).severity == "warning"


def test_hidden_construction_linework_would_not_be_read_anyway() -> None:
    assert findings("hidden-linework", *tipper(), entities=[hidden("layer is frozen", "CENTER LINES")]) == []


def test_what_is_not_read_elsewhere_is_one_note() -> None:
    entities = [unread(kind, ELSEWHERE, f"{kind} is not read") for kind in ("SPLINE", "3DFACE", "SPLINE")]
    found = only("unread-entity", *tipper(), entities=entities)
    assert (found.severity, found.message) == (
        "note",
        "2 SPLINE, 1 3DFACE elsewhere on the sheet (layer MISC) not read",
    )
