from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Entity, Fate, LengthUnit, Notice
from tests.rules.subjects import findings, only
from tests.sketches import line, tipper

UNITLESS = LengthUnit("unitless", "assumed", None)


def notice(kind: str, detail: str) -> Notice:
    """About the first entity."""
    return Notice(kind, detail, 0, None, None)


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
    ("furthest", "digits", "met"),
    [
        pytest.param(1e9, "9 of 16 digits", "so ends still meet", id="far"),
        pytest.param(1e14, "4 of 16 digits", "so ends may no longer meet", id="too far"),
    ],
)
def test_a_drawing_far_out_says_how_many_digits_are_left(furthest: float, digits: str, met: str) -> None:
    far = Notice("far-from-origin", "5e+06 diagonals from the origin", None, 7 + 8j, furthest)
    found = only("far-from-origin", *tipper(), notices=[far])
    assert (found.severity, found.at) == ("warning", 7 + 8j)
    assert found.message.startswith("the drawing lies 5e+06 diagonals from the origin: " + digits)
    assert found.message.endswith(met)
