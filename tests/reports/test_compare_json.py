from __future__ import annotations

import dataclasses
import json
from importlib.resources import files
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from dxfcheck.comparison.result import Comparison
from dxfcheck.reports.compare_json import comparison_as_dict, comparison_text
from fixtures.drafting import Plan, mechanisms, mechanisms_slides
from tests.comparison.drawn import compared, moved_pins

SCHEMA = json.loads((files("dxfcheck") / "reports" / "comparison.schema.json").read_text(encoding="utf-8"))
TIPPER = mechanisms.TRAY_TIPPER
FAN = mechanisms.LEAF_FAN
BARE = dataclasses.replace(TIPPER, notes=())
LONGER = moved_pins(TIPPER, {"B": 0.5})


def validated(comparison: Comparison) -> dict[str, object]:
    item = comparison_as_dict(comparison)
    Draft202012Validator(SCHEMA).validate(item)
    assert json.loads(comparison_text(comparison)) == item
    return item


def test_the_schema_is_itself_valid() -> None:
    Draft202012Validator.check_schema(SCHEMA)


@pytest.mark.parametrize(
    ("old", "new"),
    [
        (TIPPER, TIPPER),
        (TIPPER, LONGER),
        (TIPPER, mechanisms.TRANSFER_SHEET),
        (TIPPER, BARE),
        (FAN, dataclasses.replace(FAN, parts=FAN.parts[:-1], frame=("A", "D"))),
        (mechanisms_slides.LIFT_TABLE, mechanisms_slides.SOIL_PRESS),
        (TIPPER, mechanisms.TIPPER_DEAD_CENTRE),
    ],
    ids=["same", "longer", "added", "drive gone", "link gone", "another one", "finding"],
)
def test_comparisons_keep_to_the_schema(old: Plan, new: Plan, tmp_path: Path) -> None:
    validated(compared(tmp_path, old, new))
    validated(compared(tmp_path, new, old))


def test_what_is_not_known_is_null(tmp_path: Path) -> None:
    comparison = compared(tmp_path, FAN, dataclasses.replace(FAN, parts=FAN.parts[:-1], frame=("A", "D")))
    speeds = comparison_as_dict(comparison)["mechanisms"][0]["speeds"]
    lost = [speed for speed in speeds if speed["of"] == "C-E"]
    assert [(speed["new"], speed["difference"], speed["percent"]) for speed in lost] == [(None, None, None)]


def test_an_empty_drawing_is_a_valid_comparison(tmp_path: Path) -> None:
    assert validated(compared(tmp_path, [], []))["changed"] is False
