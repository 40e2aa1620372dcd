"""Drawing reports made by hand, whose figures can be checked with a pencil."""

from __future__ import annotations

from datetime import date

from dxfcheck.analysis.results import Analysis, DriveVerdict, JointMotion, LinkMotion, Mobility, PinMotion
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.inspection import DrawingReport, MechanismReport
from dxfcheck.linkage import Drive, Joint, Link, Linkage, Pin
from dxfcheck.reading.reading import AccountLine, Evidence
from dxfcheck.rules.finding import Finding
from dxfcheck.settings import Acceptance

MILLIMETRES = LengthUnit("mm", "header", 1e-3)
A, B, C, D = 0j, 40j, 160 + 80j, 120 + 0j

# Tray tipper: crank A-B turns at 10 rad/s, so B runs at 400 mm/s to the left. The pole of B-C lies where the lines of
# A-B and C-D meet: (0, -240). omega BC = 400 / 280, omega CD = omega BC * |C - pole| / |C - D| = 4 omega BC.
OMEGA_BC = 400 / 280
OMEGA_CD = 4 * OMEGA_BC
TIPPER_LINKS = (
    Link(name="frame", kind="frame", pins=(0, 3), handles=("20", "21"), layer="FRAME"),
    Link(name="A-B", kind="link", pins=(0, 1), handles=("2F",), layer="LINKS"),
    Link(name="B-C", kind="link", pins=(1, 2), handles=("30",), layer="LINKS"),
    Link(name="C-D", kind="link", pins=(2, 3), handles=("31",), layer="LINKS"),
)
TIPPER = Linkage(
    name="M1",
    links=TIPPER_LINKS,
    pins=(
        Pin(name="A", at=A, radius=3.0, links=(0, 1), fixed=True, handles=("40",)),
        Pin(name="B", at=B, radius=3.0, links=(1, 2), fixed=False, handles=("41",)),
        Pin(name="C", at=C, radius=3.0, links=(2, 3), fixed=False, handles=("42",)),
        Pin(name="D", at=D, radius=3.0, links=(0, 3), fixed=True, handles=("43",)),
    ),
    joints=(
        Joint(kind="pin", first=0, second=1, at=A, pin=0),
        Joint(kind="pin", first=1, second=2, at=B, pin=1),
        Joint(kind="pin", first=2, second=3, at=C, pin=2),
        Joint(kind="pin", first=0, second=3, at=D, pin=3),
    ),
    drives=(Drive(link=1, against=0, rate=10.0, source="note", stated="ω = 10 rad/s", at=-20 + 50j, handles=("50",)),),
)
TIPPER_ANALYSIS = Analysis(
    mobility=Mobility(count=1, links=4, full_joints=4, half_joints=0, at_pose=1),
    loops=((0, 1, 2, 3),),
    links=(
        LinkMotion(angular_velocity=0.0, pole=None, determined=True),
        LinkMotion(angular_velocity=10.0, pole=A, determined=True),
        LinkMotion(angular_velocity=OMEGA_BC, pole=-240j, determined=True),
        LinkMotion(angular_velocity=OMEGA_CD, pole=D, determined=True),
    ),
    pins=(
        PinMotion(velocity=0j),
        PinMotion(velocity=complex(-400.0, 1e-14)),
        PinMotion(velocity=OMEGA_BC * 1j * (C + 240j)),
        PinMotion(velocity=0j),
    ),
    joints=tuple(
        JointMotion(relative_angular_velocity=omega, slide_speed=None, rubbing_speed=3.0 * abs(omega))
        for omega in (10.0, OMEGA_BC - 10.0, OMEGA_CD - OMEGA_BC, OMEGA_CD)
    ),
    drives=(DriveVerdict(outcome="taken", implied=None),),
    solved=True,
    disagreement=3e-15,
)
LOOSE_END = Finding(
    rule="loose-end",
    severity="warning",
    message="The end of A-B-E stops on nothing: 7.4 mm from the rim of pin C, where ends within 0.0006 mm meet.",
    remedy="draw the end to the pin's rim or centre, or give it a ring of its own if it is a tracing point.",
    at=150 + 92.5j,
    handles=("2F",),
    layer="LINKS",
    mechanism="M1",
)
MIRRORED = Finding(
    rule="mirrored-plane",
    severity="note",
    message="The sheet is drawn from behind.",
    remedy="nothing, if it is meant so.",
)
ACCEPTED = Finding(
    rule="empty-pin",
    severity="warning",
    message="this ring looks like a pin of the linkage, but no link ends on it",
    remedy="draw the link to it, or delete the ring",
    at=60 + 10j,
    accepted=Acceptance(
        rule="empty-pin",
        reason="spare hole for the tray stop",
        at=60 + 10j,
        until=date(2027, 3, 31),
        where="dxfcheck.toml:12",
    ),
)
ACCOUNT = (
    AccountLine("LINE", "LINKS", "link", "a line between pins", 3),
    AccountLine("LINE", "FRAME", "frame", "on a frame layer", 2),
    AccountLine("CIRCLE", "PINS", "pin", "a ring", 4),
    AccountLine("TEXT", "0", "label", "names the pin nearest to it", 4),
    AccountLine("TEXT", "0", "note", "a drive note", 1),
    AccountLine("DIMENSION", "DIM", "skipped", "a dimension is no part", 2),
)
EVIDENCE = (
    Evidence("pin", "A", 2, "a circle of radius 3", ("40",), A, "M1"),
    Evidence("frame", "A", 5, "on frame linework", ("20",), A, "M1"),
    Evidence("link", "A-B", 3, "a line that ends at the rims of A and B", ("2F",), None, "M1"),
    Evidence("drive", "A-B", 9, "a drive note nearer to it than to any other link", ("50",), -20 + 50j, "M1"),
    Evidence("border", "", 1, "an outline that encloses whole links", ("99",), None, None),
)

# Soil press: a crank with a block on a guide; the crank is at its dead centre and nothing drives it.
PRESS = Linkage(
    name="M1",
    links=(
        Link(name="frame", kind="frame", pins=(0,)),
        Link(name="A-B", kind="link", pins=(0, 1)),
        Link(name="B-C", kind="link", pins=(1, 2)),
        Link(name="block at C", kind="block", pins=(2,)),
    ),
    pins=(
        Pin(name="A", at=0j, radius=2.0, links=(0, 1), fixed=True),
        Pin(name="B", at=30 + 40j, radius=2.0, links=(1, 2), fixed=False),
        Pin(name="C", at=150 + 0j, radius=2.0, links=(2, 3), fixed=False, labelled=False),
    ),
    joints=(
        Joint(kind="pin", first=0, second=1, at=0j, pin=0),
        Joint(kind="pin", first=1, second=2, at=30 + 40j, pin=1),
        Joint(kind="pin", first=2, second=3, at=150 + 0j, pin=2),
        Joint(kind="slide", first=0, second=3, at=150 + 0j, direction=1 + 0j),
    ),
)
PRESS_ANALYSIS = Analysis(
    mobility=Mobility(count=1, links=4, full_joints=4, half_joints=0, at_pose=2),
    loops=((0, 1, 2, 3),),
    links=(
        LinkMotion(angular_velocity=0.0, pole=None, determined=True),
        *(LinkMotion(angular_velocity=None, pole=None, determined=False) for _ in range(2)),
        LinkMotion(angular_velocity=0.0, pole=None, determined=False),
    ),
    pins=(PinMotion(velocity=0j), PinMotion(velocity=None), PinMotion(velocity=None)),
    joints=tuple(JointMotion(relative_angular_velocity=None, slide_speed=None, rubbing_speed=None) for _ in range(4)),
    drives=(),
    solved=False,
    disagreement=None,
)


def tipper(path: str = "tray-tipper.dxf", findings: tuple[Finding, ...] = (LOOSE_END, MIRRORED)) -> DrawingReport:
    """A four-bar with one freedom, solved."""
    return DrawingReport(
        path=path,
        status="checked",
        unit=MILLIMETRES,
        tolerance=6e-4,
        account=ACCOUNT,
        entities=16,
        mechanisms=(MechanismReport(linkage=TIPPER, analysis=TIPPER_ANALYSIS),),
        evidence=EVIDENCE,
        findings=findings,
    )


def press(path: str = "soil-press.dxf") -> DrawingReport:
    """A crank and slide whose motion is not settled, in a drawing without units."""
    return DrawingReport(
        path=path,
        status="checked",
        unit=LengthUnit("unitless", "assumed", None),
        tolerance=5e-4,
        account=(AccountLine("LINE", "0", "link", "a line between pins", 2),),
        entities=2,
        mechanisms=(MechanismReport(linkage=PRESS, analysis=PRESS_ANALYSIS),),
    )


def unreadable(path: str = "broken.dxf") -> DrawingReport:
    """A file that is no drawing."""
    return DrawingReport(path=path, status="unreadable", error="is no DXF file; export it anew")
