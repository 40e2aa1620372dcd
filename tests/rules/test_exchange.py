from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Entity, Fate, LengthUnit, Notice
from tests.rules.subjects import findings, only
from tests.sketches import line, tipper

UNITLESS = LengthUnit("unitless", "assumed", None)
AMONG, ELSEWHERE = 80 + 40j, 900 + 900j


def notice(kind: str, detail: str, at: complex | None = None) -> Notice:
    """About the first entity."""
    return Notice(kind, detail, 0, at, None)


def unread(kind: str, at: complex | None, why: str = "kind of entity that is not read") -> Entity:
    return Entity("5A", kind, "MISC", Fate("unread", why), at)


def hidden(why: str, layer: str = "OLD", kind: str = "LINE") -> Entity:
    return Entity("5B", kind, layer, Fate("skipped", why), 3 + 4j)


def test_a_clean_drawing_has_nothing_to_say_of_the_exchange() -> None:
    rules = ("damaged-file", "empty-model-space", "units-missing", "off-plane", "hidden-linework", "unread-entity")
    assert [found for rule in rules for found in findings(rule, *tipper())] == []


def test_a_damaged_file_names_what_was_repaired() -> None:
    found = only("damaged-file", *tipper(), notices=[notice("recovered", "2 entities had no end")])
    assert found.severity == "error"
    assert "2 entities had no end" in found.message
    assert "export the drawing again" in found.remedy


def test_several_repairs_are_one_finding() -> None:
    both = [notice("recovered", "the first"), notice("emptied", "the second")]
    assert only("damaged-file", *tipper(), notices=both).message.endswith("the first; the second")


def paper() -> Entity:
    return Entity("6", "LINE", "0", Fate("skipped", "paper space"), None)


@pytest.mark.parametrize(
    ("entities", "message"),
    [
        pytest.param([], "model space is empty", id="nothing at all"),
        pytest.param([paper()], "1 entity on paper layouts is not read", id="one on paper"),
        pytest.param([paper(), paper()], "2 entities on paper layouts are not read", id="two on paper"),
    ],
)
def test_an_empty_model_space_tells_of_paper(entities: list[Entity], message: str) -> None:
    found = only("empty-model-space", entities=entities)
    assert found.severity == "error"
    assert found.message.endswith(message)


def test_entities_in_model_space_beside_those_on_paper_are_no_empty_model_space() -> None:
    assert findings("empty-model-space", *tipper(), entities=[paper()]) == []


def test_units_are_missed_only_where_there_is_a_linkage() -> None:
    found = only("units-missing", *tipper(), unit=UNITLESS)
    assert found.severity == "warning"
    assert "--units" in found.remedy
    assert findings("units-missing", line(0j, 50j), unit=UNITLESS) == []
    assert findings("units-missing", *tipper(), unit=LengthUnit("unitless", "option", None)) == []


@pytest.mark.parametrize(
    ("rule", "kind", "severity"),
    [
        ("off-plane", "off-plane", "warning"),
        ("mirrored-plane", "mirrored-plane", "note"),
        ("uneven-scale", "uneven-scale", "warning"),
        ("outside-reference", "outside-reference", "warning"),
        ("far-from-origin", "far-from-origin", "warning"),
    ],
)
def test_a_notice_of_the_loading_becomes_a_finding_at_its_place(rule: str, kind: str, severity: str) -> None:
    found = only(rule, *tipper(), notices=[notice(kind, "a drawn detail", 7 + 8j)])
    assert found.severity == severity
    assert "a drawn detail" in found.message
    assert (found.at, found.handles, found.layer) == (7 + 8j, ("ring A",), "FRAME")


def test_many_notices_of_a_kind_are_one_finding_that_counts_them() -> None:
    found = only("off-plane", *tipper(), notices=[notice("off-plane", "z is 5 mm")] * 12)
    assert found.message.startswith("12 entities off the plane")
    assert len(found.handles) == 10


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
    entities = [unread("SPLINE", AMONG), unread("SPLINE", AMONG), unread("IMAGE", AMONG), unread("SPLINE", ELSEWHERE)]
    messages = [found.message for found in findings("unread-entity", *tipper(), entities=entities)]
    assert [message.split(" (")[0] for message in messages] == [
        "1 IMAGE among the links",
        "2 SPLINE among the links",
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
