from __future__ import annotations

import pytest

from dxfcheck.reading.gears.gearing import find_gearing, strands_at_wheels
from dxfcheck.reading.shapes.contact import Contact
from tests.reading.gears.trains import bodies_of, fixed_pin, geared, laid, mobility, pin, pitch, told
from tests.sketches import Drawn, line, path, ring

SUN, PLANET, ANNULUS = 32.0, 20.0, 72.0
HUB, SIDE = 0j, 52 + 0j
ARM = line(HUB, SIDE)
PLANETARY = (fixed_pin(HUB), pin(SIDE), ARM, pitch(HUB, SUN), pitch(SIDE, PLANET))
SUN_RING, PLANET_RING, ANNULUS_RING = 3, 4, 5


def test_a_planetary_with_all_central_members_free_has_two_freedoms() -> None:
    train = geared(*PLANETARY, pitch(HUB, ANNULUS))
    assert bodies_of(train) == [((0,), (SUN_RING,)), ((1,), (PLANET_RING,)), ((0,), (ANNULUS_RING,))]
    assert [(each.at, each.direction, each.full) for each in train.contacts] == [
        (32 + 0j, 1j, False),
        (72 + 0j, 1j, False),
    ]
    assert mobility(train) == 2
    assert train.oddities == ()


@pytest.mark.parametrize(
    "annulus",
    [
        pytest.param([pitch(HUB, ANNULUS, layer="GROUND", linetype="CENTER2")], id="by layer"),
        pytest.param([pitch(HUB, ANNULUS, block="FRAME_RING")], id="by block"),
        pytest.param([pitch(HUB, ANNULUS), line(72j, 90j, layer="FRAME")], id="by frame linework that ends on its rim"),
    ],
)
def test_an_annulus_that_is_frame_leaves_one_freedom(annulus: list[Drawn]) -> None:
    train = geared(*PLANETARY, *annulus)
    assert train.bodies[0].wheels == (ANNULUS_RING,)
    assert [each.bodies for each in train.contacts] == [(2, 3), (0, 2)]
    assert mobility(train) == 1
    assert train.oddities == ()


def test_a_line_of_the_frame_tangent_to_an_annulus_holds_it_with_a_doubt() -> None:
    train = geared(*PLANETARY, pitch(HUB, ANNULUS), line(-20 + 72j, 20 + 72j, layer="FRAME"))
    assert train.bodies[0].wheels == (ANNULUS_RING,)
    assert told(train) == ["wheel-owner"]


def test_the_symbol_under_a_wheels_own_pin_does_not_hold_it() -> None:
    symbol = [line(HUB, -32j, layer="FRAME"), line(-10 - 32j, 10 - 32j, layer="FRAME")]
    train = geared(*PLANETARY, *symbol)
    assert train.bodies[0].wheels == ()


def test_three_planets_roll_on_sun_and_annulus_and_not_on_one_another() -> None:
    places = [SIDE, SIDE * 1j, -SIDE]
    drawn = [fixed_pin(HUB), pitch(HUB, SUN), pitch(HUB, ANNULUS)]
    for at in places:
        drawn += [pin(at), pitch(at, PLANET), line(HUB, at)]
    train = geared(*drawn, line(20 + 0j, 20j), line(20j, -20 + 0j))
    assert len(train.contacts) == 6
    assert train.oddities == ()


def test_a_geared_five_bar_has_its_wheels_on_the_cranks() -> None:
    a, d, b, e, c = 0j, 60 + 0j, -30 + 40j, 90 + 50j, 30 + 100j
    pins = [fixed_pin(a), fixed_pin(d), pin(b), pin(e), pin(c)]
    bars = [line(a, b), line(b, c), line(c, e), line(e, d)]
    train = geared(*pins, *bars, pitch(a, 36.0), pitch(d, 24.0))
    assert bodies_of(train) == [((0, 2), (9,)), ((1, 3), (10,))]
    (contact,) = train.contacts
    assert contact.at == pytest.approx(36 + 0j)
    assert contact.rings == (9, 10)
    assert "36" in contact.why
    assert "outside" in contact.why
    assert mobility(train) == 1
    assert train.oddities == ()


def test_wheels_in_different_directions_touch_on_the_line_of_centres() -> None:
    at = 30 + 40j
    (contact,) = geared(fixed_pin(HUB), fixed_pin(at), pitch(HUB, 20.0), pitch(at, 30.0)).contacts
    assert contact.at == pytest.approx(12 + 16j)
    assert contact.direction == pytest.approx(0.8 - 0.6j)


COMPOUND = (
    fixed_pin(HUB),
    fixed_pin(50 + 0j),
    fixed_pin(50 + 50j),
    pitch(HUB, 20.0),
    pitch(50 + 0j, 30.0),
    pitch(50 + 0j, 15.0),
    pitch(50 + 50j, 35.0),
)


@pytest.mark.parametrize(
    "stroke",
    [
        pytest.param(line(65 + 0j, 80 + 0j), id="from rim to rim"),
        pytest.param(path(50 - 30j, 50 - 20j, 50 - 15j), id="a polyline"),
        pytest.param(path(50 + 0j, 65 + 0j, 80 + 0j), id="a spoke with a corner on the smaller"),
    ],
)
def test_a_stroke_that_touches_both_wheels_makes_them_one_part(stroke: Drawn) -> None:
    train = geared(*COMPOUND, stroke)
    assert ((1,), (4, 5)) in bodies_of(train)
    assert mobility(train) == 1
    assert train.oddities == ()


def test_two_wheels_on_one_fixed_pin_are_read_as_one_part_with_a_doubt() -> None:
    train = geared(*COMPOUND)
    assert ((1,), (4, 5)) in bodies_of(train)
    assert told(train) == ["shared-axis"]
    assert "30" in train.oddities[0].detail
    assert train.oddities[0].rings == (5, 4)
    assert mobility(train) == 1


def test_two_wheels_in_one_block_reference_are_one_part() -> None:
    drawn = list(COMPOUND)
    drawn[4] = pitch(50 + 0j, 30.0, block="CLUSTER")._replace(handle="C")
    drawn[5] = pitch(50 + 0j, 15.0, block="CLUSTER")._replace(handle="C")
    train = geared(*drawn)
    assert ((1,), (4, 5)) in bodies_of(train)
    assert train.oddities == ()


REVERTED = (pitch(HUB, 30.0), pitch(60 + 0j, 30.0), pitch(60 + 0j, 25.0), pitch(HUB, 35.0))


def test_a_train_that_comes_back_to_its_axis_has_two_links_there() -> None:
    train = geared(fixed_pin(HUB), fixed_pin(60 + 0j), *REVERTED, line(85 + 0j, 90 + 0j))
    assert bodies_of(train) == [((0,), (2,)), ((1,), (3, 4)), ((0,), (5,))]
    assert [each.rings for each in train.contacts] == [(2, 3), (4, 5)]
    assert mobility(train) == 1
    assert train.oddities == ()


def test_planets_on_one_moving_pin_are_one_part_with_a_doubt() -> None:
    train = geared(fixed_pin(HUB), pin(60 + 0j), line(HUB, 60 + 0j), *REVERTED)
    assert bodies_of(train) == [((0,), (3,)), ((1,), (4, 5)), ((0,), (6,))]
    assert told(train) == ["shared-axis"]


def test_a_spoke_goes_into_its_wheel() -> None:
    a, b = 0j, 50 + 0j
    drawn = [fixed_pin(a), fixed_pin(b), line(a, 20j), line(a, -20 + 0j), pitch(a, 20.0), pitch(b, 30.0)]
    assert len(laid(*drawn)[2]) == 3
    train = geared(*drawn)
    assert train.bodies[train.moved[1]].strands == (0, 1)
    assert train.moved == (0, 1, 1)
    assert mobility(train) == 1
    assert train.oddities == ()


def cranks(*strokes: Drawn, block: str = "") -> list[Drawn]:
    """Two wheels and two cranks on the pin of the first of them."""
    a, b, one, other = 0j, 50 + 0j, 60j, -60 + 0j
    first = line(a, one, block=block)
    return [fixed_pin(a), fixed_pin(b), pin(one), pin(other), first, line(a, other), *strokes]


def test_of_two_links_on_its_pin_a_wheel_belongs_to_the_one_whose_linework_touches_it() -> None:
    weld = line(-30 + 0j, -20 * 0.6 + 20j * 0.8)
    train = geared(*cranks(weld), pitch(0j, 20.0), pitch(50 + 0j, 30.0))
    assert bodies_of(train)[0] == ((0, 3), (7,))
    assert train.oddities == ()


def test_of_two_links_on_its_pin_a_wheel_belongs_to_the_one_in_its_block() -> None:
    drawn = cranks(block="CRANK")
    drawn[4] = drawn[4]._replace(handle="K")
    train = geared(*drawn, pitch(0j, 20.0, block="CRANK")._replace(handle="K"), pitch(50 + 0j, 30.0))
    assert bodies_of(train)[0] == ((0, 2), (6,))
    assert train.oddities == ()


def test_where_nothing_tells_its_owner_a_wheel_is_a_link_of_its_own_and_that_is_said() -> None:
    train = geared(*cranks(), pitch(0j, 20.0), pitch(50 + 0j, 30.0))
    assert bodies_of(train)[0] == ((0,), (6,))
    assert told(train) == ["wheel-owner"]
    assert train.oddities[0].severity == "warning"


def test_a_lever_that_ends_on_a_rim_belongs_to_the_wheel() -> None:
    train = geared(fixed_pin(HUB), fixed_pin(50 + 0j), pin(60j), line(20j, 60j), pitch(HUB, 20.0), pitch(50 + 0j, 30.0))
    assert bodies_of(train)[0] == ((0, 2), (4,))


def test_a_link_that_is_no_arm_takes_the_wheel_at_its_moving_end() -> None:
    far = 120 + 30j
    train = geared(*PLANETARY, line(SIDE, far), pin(far))
    assert ((1, 2), (PLANET_RING,)) in bodies_of(train)
    assert train.oddities == ()


def test_wheels_whose_centres_nothing_holds_apart_are_told() -> None:
    train = geared(fixed_pin(HUB), pin(SIDE), pitch(HUB, SUN), pitch(SIDE, PLANET))
    assert told(train) == ["gear-centres"]
    assert len(train.contacts) == 1


def test_a_frame_is_made_first_where_there_was_none() -> None:
    bare = [pin(HUB), pin(SIDE), ARM]
    assert not laid(*bare)[2][0].frame
    train = geared(*bare, pitch(HUB, SUN, layer="FRAME", linetype="CENTER"), pitch(SIDE, PLANET))
    assert train.bodies[0].frame
    assert train.bodies[0].pins == (0,)
    assert train.moved == (1,)
    assert [each.bodies for each in train.contacts] == [(0, 2)]


def test_pitch_circles_that_roll_on_nothing_are_idle() -> None:
    train = geared(fixed_pin(HUB), fixed_pin(300 + 0j), pitch(HUB, 20.0), pitch(300 + 0j, 30.0), pitch(HUB, 25.0))
    assert train.idle_rings == (2, 3, 4)
    assert train.contacts == ()
    assert train.oddities == ()


def test_without_pitch_circles_nothing_changes() -> None:
    train = geared(fixed_pin(HUB), pin(SIDE), ARM)
    assert train.moved == (0, 1)
    assert train.contacts == ()
    assert train.idle_rings == ()


def test_a_pitch_circle_without_a_pin_is_told_and_not_read() -> None:
    train = geared(fixed_pin(HUB), pitch(HUB, 20.0), pitch(50 + 0j, 30.0))
    assert train.contacts == ()
    assert told(train) == ["wheel-pin"]
    assert train.idle_rings == (1, 2)


def slide(bodies: tuple[int, int], direction: complex) -> Contact:
    return Contact("slide", bodies, 0j, direction, "a slide")


RACK = line(-60 + 20j, 60 + 20j, linetype="CENTER")
PINION = (fixed_pin(HUB), pin(60 + 20j), RACK, pitch(HUB, 20.0))


def test_a_rack_rolls_on_its_pinion() -> None:
    train = geared(*PINION, slides=[slide((0, 1), 1 + 0j)])
    (contact,) = train.contacts
    assert (contact.at, contact.direction) == (20j, 1 + 0j)
    assert (contact.bodies, contact.strands, contact.full) == ((1, 2), (0,), False)
    assert mobility(train, slides=1) == 1
    assert train.oddities == ()


@pytest.mark.parametrize("slides", [[], [slide((0, 1), 1j)]], ids=["no slide", "a slide across"])
def test_a_rack_that_no_slide_holds_is_told(slides: list[Contact]) -> None:
    assert told(geared(*PINION, slides=slides)) == ["gear-centres"]


def test_a_rack_with_no_other_linework_is_its_own_body() -> None:
    train = geared(fixed_pin(HUB), RACK, pitch(HUB, 20.0))
    assert [(body.strands, body.pins) for body in train.bodies if not body.frame] == [((), (0,)), ((0,), ())]


GROUND = line(-100 - 50j, 100 - 50j, layer="GROUND")


def test_a_wheel_alone_on_the_frame_rolls_as_a_full_joint() -> None:
    train = geared(pin(HUB), pitch(HUB, 50.0), GROUND)
    (contact,) = train.contacts
    assert (contact.bodies, contact.at, contact.direction, contact.full) == ((0, 1), -50j, 1 + 0j, True)
    assert train.bodies[0].strands == (0,)
    assert mobility(train) == 1


def test_a_wheel_whose_centre_slides_along_its_track_rolls_as_a_half_joint() -> None:
    rod = line(HUB, 120 + 40j)
    drawn = [pin(HUB), pin(120 + 40j), rod, pitch(HUB, 50.0), GROUND, fixed_pin(300 + 0j)]
    (contact,) = geared(*drawn, slides=[slide((0, 1), 1 + 0j)]).contacts
    assert not contact.full
    (contact,) = geared(*drawn, slides=[slide((0, 1), 1j)]).contacts
    assert contact.full


def test_the_rod_that_pushes_a_wheel_is_pinned_to_it() -> None:
    train = geared(pin(HUB), pin(120 + 40j), line(HUB, 120 + 40j), pitch(HUB, 50.0), GROUND)
    assert bodies_of(train) == [((0,), (3,))]
    assert [(each.kind, each.severity) for each in train.oddities] == [("wheel-owner", "note")]


def test_a_link_drawn_on_a_rolling_wheel_is_the_wheel() -> None:
    train = geared(pin(HUB), pin(20 + 20j), line(HUB, 20 + 20j), pitch(HUB, 50.0), GROUND)
    assert bodies_of(train) == [((0, 1), (3,))]


def test_a_track_interrupted_under_the_wheel_is_one_contact() -> None:
    track = [line(-100 - 50j, 0 - 50j, layer="GROUND"), line(0 - 50j, 100 - 50j, layer="GROUND")]
    assert len(geared(pin(HUB), pitch(HUB, 50.0), *track).contacts) == 1


def test_a_wheel_about_a_fixed_pin_does_not_roll_on_the_frame() -> None:
    assert geared(fixed_pin(HUB), pitch(HUB, 50.0), GROUND).contacts == ()


def test_a_moving_rack_over_a_wheel_that_rolls_on_the_frame_is_held_by_its_slide() -> None:
    rack = line(-80 + 50j, 80 + 50j, layer="GEAR")
    drawn = [pin(HUB), pin(80 + 50j), pitch(HUB, 50.0), GROUND, rack, fixed_pin(300 + 0j)]
    train = geared(*drawn, slides=[slide((0, 1), 1 + 0j)])
    assert [each.full for each in train.contacts] == [True, False]
    assert train.oddities == ()
    assert mobility(train, slides=1) == 1


@pytest.mark.parametrize("turn", [1, 1j, 0.6 + 0.8j])
def test_a_sheet_turned_reads_alike(turn: complex) -> None:
    drawn = [fixed_pin(HUB), pin(SIDE * turn), line(HUB, SIDE * turn), pitch(HUB, SUN), pitch(SIDE * turn, PLANET)]
    (contact,) = geared(*drawn, pitch(HUB, ANNULUS, layer="BASE", linetype="DASHDOT")).contacts[:1]
    assert contact.at == pytest.approx(32 * turn)


def test_a_ring_that_is_no_pitch_circle_rolls_on_nothing() -> None:
    assert geared(fixed_pin(HUB), fixed_pin(SIDE), ring(HUB, SUN), pitch(SIDE, PLANET)).contacts == ()


def test_an_annulus_of_the_frame_needs_no_pin() -> None:
    train = geared(pin(SIDE), pitch(SIDE, PLANET), pitch(HUB, ANNULUS, layer="GROUND", linetype="CENTER"))
    assert bodies_of(train) == [((0,), (1,)), ((), (2,))]
    assert [each.bodies for each in train.contacts] == [(0, 1)]
    assert told(train) == ["gear-centres"]


def test_what_lies_at_a_wheel_is_found_without_any_pin_on_it() -> None:
    stay, track, far = line(-20 + 0j, -60 + 0j), line(-60 - 20j, 60 - 20j), line(-60 - 30j, 60 - 30j)
    kinds, sheet, _ = laid(pin(HUB), pitch(HUB, 20.0), stay, track, far, ring(300 + 0j))
    assert strands_at_wheels(kinds.pitch_rings, sheet) == [0, 1]
    assert strands_at_wheels([], sheet) == []


def test_a_block_that_holds_the_whole_train_tells_nothing() -> None:
    drawn = [fixed_pin(HUB), pin(SIDE), pin(60j), ARM, line(HUB, 60j)]
    drawn += [pitch(HUB, SUN), pitch(HUB, ANNULUS), pitch(SIDE, PLANET)]
    whole = [thing._replace(block="PLAN", handle="W") for thing in drawn]
    train = geared(*whole)
    assert bodies_of(train) == [((0, 2), (5,)), ((0,), (6,)), ((1,), (7,))]
    assert told(train) == ["wheel-owner"], "the link could as well belong to the annulus"


def test_a_link_with_spokes_beside_it_takes_the_wheel_with_a_doubt() -> None:
    far = -60 + 0j
    drawn = [fixed_pin(HUB), fixed_pin(50 + 0j), pin(far), line(HUB, far), line(HUB, 20j)]
    train = geared(*drawn, pitch(HUB, 20.0), pitch(50 + 0j, 30.0))
    assert bodies_of(train)[0] == ((0, 2), (5,))
    assert told(train) == ["wheel-owner"]


def test_a_wheel_beside_a_sun_drives_the_arm_with_a_doubt() -> None:
    driver = -70 + 0j
    train = geared(*PLANETARY, fixed_pin(driver), pitch(HUB, 40.0), pitch(driver, 30.0))
    assert ((0, 1), (6,)) in bodies_of(train)
    assert ((0,), (SUN_RING,)) in bodies_of(train)
    assert told(train) == ["shared-axis"]
    assert "separate links" in train.oddities[0].detail


def test_spokes_of_two_wheels_on_one_pin_tell_them_apart() -> None:
    train = geared(*COMPOUND, line(50 + 0j, 50 - 30j), line(50 + 0j, 50 - 15j))
    assert [wheels for pins, wheels in bodies_of(train) if pins == (1,)] == [(4,), (5,)]
    assert train.oddities == ()


def test_a_wheel_rolls_on_a_line_that_a_symbol_makes_frame() -> None:
    kinds, sheet, bodies = laid(pin(HUB), pitch(HUB, 50.0), line(-100 - 50j, 100 - 50j))
    assert find_gearing(kinds.pitch_rings, kinds.racks, sheet, bodies, ()).contacts == ()
    (contact,) = find_gearing(kinds.pitch_rings, kinds.racks, sheet, bodies, [0]).contacts
    assert contact.full


def test_a_pin_inside_a_pitch_circle_that_nothing_else_carries_is_the_wheels() -> None:
    """A rod from a crank pin inside a pitch circle, site 1, to a rocker; no spoke is drawn."""
    crank, far = 10 + 15j, 40 + 60j
    wheels = [fixed_pin(0j), pitch(0j, 40.0), fixed_pin(60 + 0j), pitch(60 + 0j, 20.0)]
    rod = [pin(crank), pin(far), line(crank, far)]
    rocker = [line(far, 90 + 0j), fixed_pin(90 + 0j)]
    assert sorted(pins for pins, wheels in bodies_of(geared(*wheels, *rod, *rocker)) if wheels) == [(0, 2), (1,)]
    traced = [pin(crank), pin(far), path(crank, far, 100 + 40j), pin(100 + 40j), fixed_pin(100 - 20j)]
    held = [line(100 + 40j, 100 - 20j), *rocker]
    assert sorted(pins for pins, wheels in bodies_of(geared(*wheels, *traced, *held)) if wheels) == [(0,), (1,)]


def test_a_rim_drawn_round_an_annulus_is_no_disc() -> None:
    train = geared(*PLANETARY, pitch(HUB, ANNULUS), ring(HUB, 80.0), ring(HUB, 74.0))
    assert len(train.bodies) == len(geared(*PLANETARY, pitch(HUB, ANNULUS)).bodies)
    assert mobility(train) == 2


def test_a_rolling_contact_names_the_wheel_of_its_first_body_first() -> None:
    for radii in ((36.0, 24.0), (24.0, 36.0)):
        cranks = [fixed_pin(0j), fixed_pin(60 + 0j), pin(40j), pin(60 + 40j), line(60 + 0j, 60 + 40j), line(0j, 40j)]
        train = geared(*cranks, pitch(0j, radii[0]), pitch(60 + 0j, radii[1]))
        (contact,) = train.contacts
        sites = train.bodies[contact.bodies[0]].pins
        first = radii[0] if 0 in sites else radii[1]
        assert contact.why.startswith(f"pitch circle of radius {first:g} rolls on")
