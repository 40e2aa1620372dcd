from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.errors import OptionInvalid
from dxfcheck.inspection import DrawingReport, inspect_drawing
from dxfcheck.settings import Settings

FIXTURES = Path(__file__).parent.parent / "fixtures"
DRAWINGS = sorted(path.stem for path in FIXTURES.glob("*.dxf"))


def inspect(name: str, settings: Settings | None = None, *, with_evidence: bool = True) -> DrawingReport:
    return inspect_drawing(str(FIXTURES / f"{name}.dxf"), settings or Settings(), with_evidence=with_evidence)


@pytest.mark.parametrize(
    "content",
    [
        pytest.param(b"", id="empty"),
        pytest.param(b"Plan of the potting shed\n", id="prose"),
        pytest.param(bytes(range(256)), id="bytes"),
    ],
)
def test_what_is_no_drawing_is_unreadable_and_says_why_and_what_to_do(tmp_path: Path, content: bytes) -> None:
    path = tmp_path / "shed.dxf"
    path.write_bytes(content)
    report = inspect_drawing(str(path), Settings())
    assert (report.path, report.status) == (str(path), "unreadable")
    assert report.error is not None
    assert "; " in report.error
    assert "Traceback" not in report.error
    assert (report.mechanisms, report.findings, report.account, report.entities) == ((), (), (), 0)
    assert report.unit is None
    assert report.tolerance is None


def test_a_file_that_is_not_there_is_unreadable(tmp_path: Path) -> None:
    assert inspect_drawing(str(tmp_path / "none.dxf"), Settings()).status == "unreadable"


@pytest.mark.parametrize("name", DRAWINGS)
def test_the_account_sums_to_the_entities(name: str) -> None:
    report = inspect(name)
    assert report.status == "checked"
    assert report.error is None
    assert sum(line.count for line in report.account) == report.entities > 0
    assert all(line.read_as and line.why for line in report.account)


def test_every_pin_link_joint_and_drive_has_its_evidence() -> None:
    report = inspect("tray-tipper")
    (mechanism,) = report.mechanisms
    told = {(each.subject, each.name) for each in report.evidence}
    assert {("pin", pin.name) for pin in mechanism.linkage.pins} <= told
    assert {("link", link.name) for link in mechanism.linkage.links if link.kind != "frame"} <= told
    assert sum(each.subject == "joint" for each in report.evidence) == len(mechanism.linkage.joints)
    assert {each.mechanism for each in report.evidence} == {"M1"}


@pytest.mark.parametrize("name", ["tray-tipper", "transfer-sheet"])
def test_without_evidence_all_else_is_the_same(name: str) -> None:
    full, lean = inspect(name), inspect(name, with_evidence=False)
    assert full.evidence
    assert lean.evidence == ()
    assert (lean.mechanisms, lean.findings, lean.account) == (full.mechanisms, full.findings, full.account)


def test_mechanisms_come_with_an_analysis_that_runs_parallel() -> None:
    for mechanism in inspect("transfer-sheet").mechanisms:
        assert len(mechanism.analysis.links) == len(mechanism.linkage.links)
        assert len(mechanism.analysis.pins) == len(mechanism.linkage.pins)
        assert len(mechanism.analysis.joints) == len(mechanism.linkage.joints)
        assert len(mechanism.analysis.drives) == len(mechanism.linkage.drives)


def test_stated_unit_tolerance_and_expectation_are_used() -> None:
    report = inspect("tray-tipper", Settings(unit="in", tolerance=0.01, expected_mobility=3))
    assert report.unit is not None
    assert (report.unit.name, report.unit.source, report.tolerance) == ("in", "option", 0.01)
    assert "expected-mobility" in [finding.rule for finding in report.findings]


def test_an_option_that_cannot_be_used_stops_the_work() -> None:
    with pytest.raises(OptionInvalid, match="names no link"):
        inspect("tray-tipper", Settings(drives=("10 rad/s",)))


def test_the_drawing_itself_is_left_alone(tmp_path: Path) -> None:
    copy = tmp_path / "copy.dxf"
    copy.write_bytes((FIXTURES / "tray-tipper.dxf").read_bytes())
    before = copy.read_bytes()
    inspect_drawing(str(copy), Settings())
    assert copy.read_bytes() == before
    assert list(tmp_path.iterdir()) == [copy]
