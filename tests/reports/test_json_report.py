from __future__ import annotations

import json
from collections.abc import Callable
from dataclasses import replace
from importlib.resources import files
from typing import Any

import pytest
from jsonschema import Draft202012Validator
from jsonschema.exceptions import ValidationError

from dxfcheck import __version__
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.json_report import json_text, report_as_dict
from dxfcheck.requirements.verdict import Bounds, Outcome, Verdict
from dxfcheck.settings import Requirement
from tests.reports.contacts import seed_planet, shuttle_yoke, soil_roller
from tests.reports.samples import ACCEPTED, LOOSE_END, OMEGA_BC, TIPPER_ANALYSIS, press, tipper, unreadable

SCHEMA = json.loads((files("dxfcheck") / "reports" / "report.schema.json").read_text(encoding="utf-8"))
ALL = [tipper(), press(), unreadable()]


def validate(report: dict[str, Any]) -> None:
    Draft202012Validator(SCHEMA).validate(report)


def first_mechanism(report: DrawingReport) -> dict[str, Any]:
    mechanism: dict[str, Any] = report_as_dict([report])["drawings"][0]["mechanisms"][0]
    return mechanism


def test_the_schema_is_itself_valid() -> None:
    Draft202012Validator.check_schema(SCHEMA)


@pytest.mark.parametrize("with_evidence", [False, True])
def test_reports_keep_to_the_schema_and_the_text_says_the_same(*, with_evidence: bool) -> None:
    report = report_as_dict(ALL, with_evidence=with_evidence)
    validate(report)
    assert json.loads(json_text(ALL, with_evidence=with_evidence)) == report
    assert all(("evidence" in drawing) is with_evidence for drawing in report["drawings"])


def test_the_text_is_the_golden_one(golden: Callable[[str, str], None]) -> None:
    golden("report.json", json_text(ALL, with_evidence=True).replace(__version__, "VERSION"))


def test_no_drawing_at_all_is_a_valid_report() -> None:
    validate(json.loads(json_text([])))


def test_the_keys_stand_in_their_order() -> None:
    drawing = report_as_dict(ALL)["drawings"][0]
    assert list(drawing) == [
        "path", "status", "error", "units", "tolerance", "settings", "account", "entities", "mechanisms", "findings",
    ]  # fmt: skip
    assert list(drawing["mechanisms"][0])[:9] == [
        "name", "links", "pins", "joints", "mobility", "loops", "drives", "solved", "disagreement",
    ]  # fmt: skip


def test_figures_and_names_are_those_of_the_mechanism() -> None:
    mechanism = first_mechanism(tipper())
    coupler = mechanism["links"][2]
    assert coupler["name"] == "B-C"
    assert coupler["pins"] == ["B", "C"]
    assert coupler["angular_velocity"] == OMEGA_BC
    assert coupler["pole"] == [0.0, -240.0]
    assert mechanism["pins"][1]["speed"] == 400.0
    assert mechanism["pins"][1]["links"] == ["A-B", "B-C"]
    assert mechanism["joints"][2]["links"] == ["B-C", "C-D"]
    assert mechanism["joints"][2]["direction"] is None
    assert mechanism["loops"] == [["frame", "A-B", "B-C", "C-D"]]
    assert mechanism["drives"][0]["link"] == "A-B"
    assert mechanism["mobility"] == {
        "count": 1, "links": 4, "full_joints": 4, "half_joints": 0, "at_pose": 1, "redundant": 0,
    }  # fmt: skip


def test_what_is_not_known_is_null_never_zero() -> None:
    mechanism = first_mechanism(press())
    assert mechanism["links"][1]["angular_velocity"] is None
    assert mechanism["links"][1]["determined"] is False
    assert mechanism["pins"][1]["velocity"] is None
    assert mechanism["pins"][1]["speed"] is None
    assert mechanism["joints"][3]["slide_speed"] is None
    assert mechanism["joints"][3]["pin"] is None
    assert mechanism["disagreement"] is None
    assert mechanism["mobility"]["redundant"] == 1


def test_an_unreadable_drawing_says_why() -> None:
    drawing = report_as_dict([unreadable()])["drawings"][0]
    assert drawing["error"] == "is no DXF file; export it anew"
    assert drawing["units"] == {"length": None, "source": None}
    assert drawing["tolerance"] is None


def test_the_totals_count_drawings_and_findings() -> None:
    assert report_as_dict(ALL)["totals"] == {
        "drawings": 3, "unreadable": 1, "error": 0, "warning": 1, "note": 1, "accepted": 0,
    }  # fmt: skip


def test_an_accepted_finding_says_why_until_when_and_where_and_is_counted_apart() -> None:
    report = report_as_dict([tipper(findings=(LOOSE_END, ACCEPTED, ACCEPTED))])
    validate(report)
    assert [finding["accepted"] for finding in report["drawings"][0]["findings"]][:2] == [
        None,
        {"reason": "spare hole for the tray stop", "until": "2027-03-31", "where": "dxfcheck.toml:12"},
    ]
    assert report["totals"]["warning"] == 1
    assert report["totals"]["accepted"] == 2
    stated = ACCEPTED.accepted
    assert stated is not None
    endless = replace(ACCEPTED, accepted=replace(stated, until=None))
    assert report_as_dict([tipper(findings=(endless,))])["drawings"][0]["findings"][0]["accepted"]["until"] is None


def test_a_negative_zero_is_a_plain_zero() -> None:
    report = tipper()
    pins = tuple(replace(pin, velocity=complex(-0.0, -0.0)) for pin in TIPPER_ANALYSIS.pins)
    analysis = replace(TIPPER_ANALYSIS, pins=pins)
    report = replace(report, mechanisms=(replace(report.mechanisms[0], analysis=analysis),))
    assert "-0.0" not in json_text([report])


def test_a_figure_that_is_no_number_never_leaves_the_house() -> None:
    with pytest.raises(ValueError, match="not JSON compliant"):
        json_text([replace(tipper(), tolerance=float("nan"))])


def test_a_file_name_that_is_no_unicode_can_be_written() -> None:
    json_text([tipper("caf\udce9.dxf")]).encode("utf-8")
    assert json.loads(json_text([tipper("caf\udce9.dxf")]))["drawings"][0]["path"] == "caf?.dxf"


@pytest.mark.parametrize(
    ("where", "value"),
    [
        (["report_version"], 2),
        (["drawings", 0, "status"], "fine"),
        (["drawings", 0, "error"], "but it was checked"),
        (["drawings", 0, "units", "length"], None),
        (["drawings", 0, "tolerance"], -1),
        (["drawings", 0, "account", 0, "count"], 0),
        (["drawings", 0, "findings", 0, "severity"], "fatal"),
        (["drawings", 0, "findings", 0, "rule"], "Loose End"),
        (["drawings", 0, "findings", 0, "at"], [1.0]),
        (["drawings", 0, "mechanisms", 0, "joints", 0, "kind"], "hinge"),
        (["drawings", 0, "mechanisms", 0, "joints", 0, "direction"], [1.0, 0.0]),
        (["drawings", 0, "mechanisms", 0, "pins", 0, "speed"], -1.0),
        (["drawings", 0, "mechanisms", 0, "drives", 0, "source"], "guessed"),
        (["drawings", 2, "error"], None),
    ],
)
def test_the_schema_refuses_what_is_wrong(where: list[Any], value: object) -> None:
    report: Any = report_as_dict(ALL)
    place = report
    for step in where[:-1]:
        place = place[step]
    place[where[-1]] = value
    with pytest.raises(ValidationError):
        validate(report)


def test_links_without_pins_and_every_kind_of_joint_keep_to_the_schema() -> None:
    """A crank's block in a yoke that has no pin; a wheel that rolls on the frame; gears."""
    shuttle = tipper(findings=())
    report = report_as_dict([replace(shuttle, mechanisms=(shuttle_yoke(), soil_roller(), seed_planet()))])
    validate(report)
    yoke, roller, planet = report["drawings"][0]["mechanisms"]
    assert [(link["name"], link["kind"], link["pins"]) for link in yoke["links"][2:]] == [
        ("block at B", "block", ["B"]),
        ("1F", "link", []),
    ]
    assert [joint["kind"] for joint in yoke["joints"]] == ["pin", "pin", "slide", "slide"]
    assert yoke["joints"][3]["pin"] is None
    assert yoke["joints"][3]["slide_speed"] == pytest.approx(-80.0)
    assert yoke["links"][3]["pole"] is None
    assert (roller["joints"][0]["full"], roller["mobility"]["full_joints"]) == (True, 1)
    assert [joint["full"] for joint in planet["joints"] if joint["kind"] == "rolling"] == [False, False]
    assert "full" not in planet["joints"][0]


def test_the_schema_lets_keys_be_added() -> None:
    report = report_as_dict(ALL)
    report["drawings"][0]["mechanisms"][0]["added_later"] = 1
    validate(report)


def test_what_a_mechanism_is_held_against_stands_with_its_figures() -> None:
    (mechanism,) = tipper().mechanisms
    stated = Requirement(quantity="pin-speed", subject="C", stated="v_C <= 2 m/s", source="note")
    outcomes: tuple[tuple[Outcome, float | None], ...] = (("kept", 392.9), ("not known", None))
    verdicts = [
        Verdict(
            requirement=stated,
            mechanism="M1",
            quantity="pin-speed",
            subject="C",
            outcome=outcome,
            bounds=Bounds(None, 2000.0, None),
            actual=actual,
        )
        for outcome, actual in outcomes
    ]
    report = replace(tipper(), mechanisms=(replace(mechanism, requirements=tuple(verdicts)),))
    as_dict = report_as_dict([report])
    Draft202012Validator(SCHEMA).validate(as_dict)
    kept, unknown = as_dict["drawings"][0]["mechanisms"][0]["requirements"]
    assert [kept[key] for key in ("stated", "source", "quantity", "subject")] == [
        "v_C <= 2 m/s",
        "note",
        "pin-speed",
        "C",
    ]
    assert (kept["actual"], kept["least"], kept["greatest"], kept["outcome"]) == (392.9, None, 2000.0, "kept")
    assert (unknown["actual"], unknown["outcome"]) == (None, "not known")
