"""Links with a motion of their own: rollers, hanging arms, rods that slide at both ends."""

from __future__ import annotations

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import IdleLink, SettlingDrive
from dxfcheck.linkage import Drive
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import Other, linkage


def test_roller_of_a_follower_on_a_fixed_curve() -> None:
    """The roller touches at its rim, square to the curve: it may spin, and the follower is settled all the same."""
    along = (1 + 0.2j) / abs(1 + 0.2j)
    contact: list[Other] = [("pin in slot", 100 + 20j - 10j * along, "ground", "roller", along)]
    points = {"O": 0j, "B": 30 + 40j, "R": 100 + 20j}
    result = analyse(linkage(points, {"O": "ground crank", "B": "crank rod", "R": "rod roller"}, others=contact))
    assert result.idle_links == (IdleLink(3, 1, turns=True, pin=2),)
    driven = analyse(
        linkage(
            points,
            {"O": "ground crank", "B": "crank rod", "R": "rod roller"},
            others=contact,
            turn={"crank": 1.0},
        )
    )
    assert [link.determined for link in driven.links] == [True, True, True, False]
    assert driven.idle_links == (IdleLink(3, 1, turns=True, pin=2),)
    assert driven.settling_drives == ()


def test_rod_with_a_slide_at_both_ends() -> None:
    slides: list[Other] = [("slide", at, "block" + name, "bar", 1 + 0j) for name, at in (("1", 0j), ("2", 100 + 0j))]
    pins = {"A": "ground crank", "B": "crank block1", "D": "ground rocker", "C": "rocker block2"}
    points = {"A": -40 - 50j, "B": 0j, "C": 100 + 0j, "D": 130 - 60j}
    result = analyse(linkage(points, pins, others=slides, turn={"crank": 1.0}))
    assert result.idle_links == (IdleLink(5, 1, turns=False, pin=None),)
    assert result.settling_drives == (SettlingDrive(3, 0, None),)


def test_driven_arm_is_not_idle() -> None:
    points, pins = {**FOUR_BAR_POINTS, "E": 300 + 40j}, {**FOUR_BAR, "C": f"{FOUR_BAR['C']} arm"}
    model = linkage(points, pins, tracing={"E": "arm"}, turn={"crank": 1.0})
    arm = next(number for number, link in enumerate(model.links) if link.name == "arm")
    assert [each.link for each in analyse(model).idle_links] == [arm]
    against = Drive(link=arm, against=2, rate=1.0)
    both = linkage(points, pins, tracing={"E": "arm"}, turn={"crank": 1.0}, drives=[against])
    assert analyse(both).idle_links == ()
    assert analyse(both).solved


def test_mechanism_of_one_link_is_not_idle() -> None:
    assert analyse(linkage({"A": 0j, "B": 50 + 0j}, {"A": "ground a"}, tracing={"B": "a"})).idle_links == ()
